"""How readings repeat: python3 examples/python/repeatability-studies.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/repeatability-studies", read_request("repeatability-studies/one-station-with-drift"))
unit, result = answer["units"]["offset"], answer["result"]


def vector(of):
    return f"h {of['h']:.4f} {unit}, v {of['v']:.4f} {unit}"


print(f"Record {answer['id']}")
if result["form"] == "one_station":
    print(f"{result['station']}: mean {vector(result['mean'])}")
    print(f"standard deviation {vector(result['standardDeviation'])}")
    print(f"uncertainty of the mean {vector(result['uncertainty'])}")
else:
    for source, component in result["components"].items():
        print(f"{source}: standard deviation {vector(component)}")
for warning in result["warnings"]:
    print(f"  {warning['code']}: {warning['detail']}")
