"""The parts to move, and the axis that needs the fewest: python3 examples/python/fewest-moves.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/fewest-moves", read_request("fewest-moves/casing-and-shroud-low"))
unit = answer["units"]["offset"]
result = answer["result"]
print(f"Record {answer['id']}")
for caution in answer["cautions"]:
    print(f"Caution: {caution['text']}")
if result["infeasible"]:
    print(f"No choice: {result['infeasible']['reason']}")
else:
    print(f"Cost {result['cost']:g}")
for at in result["axis"]["float"]:
    print(f"axis at {at['id']}: h {at['h']:.4f} {unit}, v {at['v']:.4f} {unit}")
for component in result["components"]:
    if component["moved"]:
        for move in component["moves"]:
            print(f"{component['id']} at {move['support']}: move h {move['h']:.4f} {unit}, v {move['v']:.4f} {unit}")
for advice in result["advice"]:
    print(f"  {advice['code']}: {advice['detail']}")
