"""Cold targets: python3 examples/python/cold-targets.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/cold-targets", read_request("cold-targets/rotor-sag-and-growth"))
unit, result = answer["units"]["offset"], answer["result"]
print(f"Record {answer['id']}")
for station in result["stations"]:
    h, v = (f"{station['target'][name]:.4f} {unit}" for name in ("h", "v"))
    print(f"{station['id']}: target h {h}, v {v}")
    for warning in station["warnings"]:
        print(f"  {warning['code']}: {warning['detail']}")
for warning in result.get("rotor", {"warnings": []})["warnings"]:
    print(f"{warning['code']}: {warning['detail']}")
