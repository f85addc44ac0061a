#!/bin/sh
# How readings repeat: sh examples/curl/repeatability-studies.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/repeatability-studies "${1:-$here/../requests/repeatability-studies/one-station-with-drift.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit, result = answer["units"]["offset"], answer["result"]
vector = lambda of: "h {:.4f} {u}, v {:.4f} {u}".format(of["h"], of["v"], u=unit)
print("Record", answer["id"])
if result["form"] == "one_station":
    print("{}: mean {}".format(result["station"], vector(result["mean"])))
    print("standard deviation {}".format(vector(result["standardDeviation"])))
    print("uncertainty of the mean {}".format(vector(result["uncertainty"])))
else:
    for source, component in result["components"].items():
        print("{}: standard deviation {}".format(source, vector(component)))
for warning in result["warnings"]:
    print("  {}: {}".format(warning["code"], warning["detail"]))
' <"$answer"
