#!/bin/sh
# The parts to move, and the axis that needs the fewest of them: sh examples/curl/fewest-moves.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/fewest-moves "${1:-$here/../requests/fewest-moves/casing-and-shroud-low.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit = answer["units"]["offset"]
result = answer["result"]
print("Record", answer["id"])
for caution in answer["cautions"]:
    print("Caution:", caution["text"])
if result["infeasible"]:
    print("No choice:", result["infeasible"]["reason"])
else:
    print("Cost {:g}".format(result["cost"]))
for at in result["axis"]["float"]:
    h, v = (f"{at[name]:.4f} {unit}" for name in ("h", "v"))
    print("axis at {}: h {}, v {}".format(at["id"], h, v))
for component in result["components"]:
    if component["moved"]:
        for move in component["moves"]:
            h, v = (f"{move[name]:.4f} {unit}" for name in ("h", "v"))
            print("{} at {}: move h {}, v {}".format(component["id"], move["support"], h, v))
for advice in result["advice"]:
    print("  {}: {}".format(advice["code"], advice["detail"]))
' <"$answer"
