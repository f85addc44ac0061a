"""How to move the source of a line of sight: python3 examples/python/sight-line-setups.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/sight-line-setups", read_request("sight-line-setups/laser-upstream-with-drift"))
unit = answer["units"]["offset"]
result = answer["result"]


def vector(pair):
    return f"h {pair['h']:.4f} {unit}, v {pair['v']:.4f} {unit}"


print(f"Record {answer['id']}")
for caution in answer["cautions"]:
    print(f"Caution: {caution['text']}")
for station in result["stations"]:
    print(f"{station['id']}: beam off {vector(station['off'])}; {'within' if station['within'] else 'not within'}")
adjustment = result["adjustment"]
if adjustment is not None:
    tilt = adjustment["tiltMilliradians"]
    print(f"Source: shift {vector(adjustment['shift'])}")
    print(f"Source: tilt h {tilt['h']:.4f} mrad, v {tilt['v']:.4f} mrad")
    for move in adjustment["moves"] or []:
        print(f"  {move['at']}: move {vector(move)}")
print(f"Next: {result['next']}")
for warning in result["warnings"]:
    print(f"  {warning['code']}: {warning['detail']}")
