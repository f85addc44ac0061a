#!/bin/sh
# How to move the source of a line of sight: sh examples/curl/sight-line-setups.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/sight-line-setups "${1:-$here/../requests/sight-line-setups/laser-upstream-with-drift.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit = answer["units"]["offset"]
result = answer["result"]
vector = lambda pair: "h {:.4f} {}, v {:.4f} {}".format(pair["h"], unit, pair["v"], unit)
print("Record", answer["id"])
for caution in answer["cautions"]:
    print("Caution: {}".format(caution["text"]))
for station in result["stations"]:
    print("{}: beam off {}; {}".format(station["id"], vector(station["off"]), "within" if station["within"] else "not within"))
adjustment = result["adjustment"]
if adjustment is not None:
    print("Source: shift {}".format(vector(adjustment["shift"])))
    print("Source: tilt h {h:.4f} mrad, v {v:.4f} mrad".format(**adjustment["tiltMilliradians"]))
    for move in adjustment["moves"] or []:
        print("  {}: move {}".format(move["at"], vector(move)))
print("Next: {}".format(result["next"]))
for warning in result["warnings"]:
    print("  {}: {}".format(warning["code"], warning["detail"]))
' <"$answer"
