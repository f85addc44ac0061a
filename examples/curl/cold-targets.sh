#!/bin/sh
# Cold targets: sh examples/curl/cold-targets.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/cold-targets "${1:-$here/../requests/cold-targets/rotor-sag-and-growth.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit, result = answer["units"]["offset"], answer["result"]
print("Record", answer["id"])
for station in result["stations"]:
    target = station["target"]
    h, v = (f"{target[name]:.4f} {unit}" for name in ("h", "v"))
    print("{}: target h {}, v {}".format(station["id"], h, v))
    for warning in station["warnings"]:
        print("  {}: {}".format(warning["code"], warning["detail"]))
for warning in result.get("rotor", {"warnings": []})["warnings"]:
    print("{}: {}".format(warning["code"], warning["detail"]))
' <"$answer"
