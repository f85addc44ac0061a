"""Bore centres from wall readings: python3 examples/python/bore-fits.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/bore-fits", read_request("bore-fits/points-with-uncertainty"))
offset, bore_unit = answer["units"]["offset"], answer["units"]["bore"]
print(f"Record {answer['id']}")
for bore in answer["result"]["bores"]:
    h, v, diameter = bore["centre"]["h"], bore["centre"]["v"], bore["diameter"]
    size = "not known" if diameter is None else f"{diameter:.3f} {bore_unit}"
    print(f"{bore['id']}: centre h {h:.4f} {offset}, v {v:.4f} {offset}; diameter {size}")
    for warning in bore["warnings"]:
        print(f"  {warning['code']}: {warning['detail']}")
