"""Where to read a bore: python3 examples/python/measurement-plans.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/measurement-plans", read_request("measurement-plans/lower-halves-read"))
unit = answer["units"]["offset"]
print(f"Record {answer['id']}")
for bore in answer["result"]["bores"]:
    after = bore["after"]
    reached = "not known" if after is None else f"{after['expandedUncertainty']['radial']:.4f} {unit}"
    print(f"{bore['id']}: {bore['status']}; add {bore['addCount']}, then U {reached}")
    for place in bore["add"]:
        print(f"  at {place['clockDeg']:.1f} deg: {place['readings']}")
    for warning in bore["warnings"]:
        print(f"  {warning['code']}: {warning['detail']}")
