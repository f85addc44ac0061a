"""Deviations from the reference axis: python3 examples/python/axis-deviations.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/axis-deviations", read_request("axis-deviations/least-squares-as-found"))
unit = answer["units"]["offset"]
print(f"Record {answer['id']}")
for station in answer["result"]["stations"]:
    deviation = station["deviation"]
    h, v, radial = (f"{deviation[name]:.4f} {unit}" for name in ("h", "v", "radial"))
    verdict = station["verdict"] or "no tolerance"
    print(f"{station['id']}: deviation h {h}, v {v}, radial {radial}; {verdict}")
