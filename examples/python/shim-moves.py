"""Shim moves from deviations: python3 examples/python/shim-moves.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/shim-moves", read_request("shim-moves/casing-and-bearing"))
unit = answer["units"]["offset"]
print(f"Record {answer['id']}")
for caution in answer["cautions"]:
    print(f"Caution: {caution['text']}")
for component in answer["result"]["components"]:
    for move in component["realised"]:
        print(f"{component['id']} at {move['support']}: move h {move['h']:.4f} {unit}, v {move['v']:.4f} {unit}")
    for stack in component["stacks"]:
        before, after, change = (f"{stack[name]:.4f} {unit}" for name in ("from", "to", "change"))
        print(f"  {stack['support']} {stack['place']}: from {before} to {after}, change {change}")
