#!/bin/sh
# Readings to moves in one call: sh examples/curl/alignments.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/alignments "${1:-$here/../requests/alignments/gauge-readings-to-shims.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit, result = answer["units"]["offset"], answer["result"]
print("Record", answer["id"])
for caution in answer["cautions"]:
    print("Caution:", caution["text"])
for station in result["stations"]:
    deviation = station["deviation"]
    h, v = (f"{deviation[name]:.4f} {unit}" for name in ("h", "v"))
    print("{}: deviation h {}, v {}; {}".format(station["id"], h, v, station["verdict"] or "no tolerance"))
for component in (result["moves"] or {"components": []})["components"]:
    for move in component["realised"]:
        h, v = (f"{move[name]:.4f} {unit}" for name in ("h", "v"))
        print("{} at {}: move h {}, v {}".format(component["id"], move["support"], h, v))
' <"$answer"
