#!/bin/sh
# Shim moves from deviations: sh examples/curl/shim-moves.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/shim-moves "${1:-$here/../requests/shim-moves/casing-and-bearing.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit = answer["units"]["offset"]
print("Record", answer["id"])
for caution in answer["cautions"]:
    print("Caution:", caution["text"])
for component in answer["result"]["components"]:
    for move in component["realised"]:
        h, v = (f"{move[name]:.4f} {unit}" for name in ("h", "v"))
        print("{} at {}: move h {}, v {}".format(component["id"], move["support"], h, v))
    for stack in component["stacks"]:
        before, after, change = (f"{stack[name]:.4f} {unit}" for name in ("from", "to", "change"))
        print("  {} {}: from {} to {}, change {}".format(stack["support"], stack["place"], before, after, change))
' <"$answer"
