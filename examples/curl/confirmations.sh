#!/bin/sh
# What moved between two surveys: sh examples/curl/confirmations.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/confirmations "${1:-$here/../requests/confirmations/casing-moved-same-set-up.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit, result = answer["units"]["offset"], answer["result"]
vector = lambda of: "h {:.4f} {u}, v {:.4f} {u}".format(of["h"], of["v"], u=unit)
print("Record", answer["id"])
for caution in answer["cautions"]:
    print("Caution:", caution["text"])
repeats = {True: "repeat", False: "do not repeat", None: "are not shown to repeat"}[result["reference"]["repeats"]]
print("Reference stations", repeats)
for moved in result["moved"]:
    achieved = vector(moved["achieved"]) if moved["achieved"] else "not known"
    planned = vector(moved["planned"]) if moved["planned"] else "nothing"
    print("{}: planned {}; achieved {}".format(moved["id"], planned, achieved))
print("Unexpected:", ", ".join(result["unexpected"]) or "none")
print("Outstanding:", ", ".join(result["outstanding"]) or "none")
for warning in result["warnings"]:
    print("  {}: {}".format(warning["code"], warning["detail"]))
' <"$answer"
