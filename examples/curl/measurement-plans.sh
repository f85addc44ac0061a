#!/bin/sh
# Where to read a bore: sh examples/curl/measurement-plans.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/measurement-plans "${1:-$here/../requests/measurement-plans/lower-halves-read.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit = answer["units"]["offset"]
print("Record", answer["id"])
for bore in answer["result"]["bores"]:
    after = bore["after"]
    reached = "not known" if after is None else "{:.4f} {}".format(after["expandedUncertainty"]["radial"], unit)
    print("{}: {}; add {}, then U {}".format(bore["id"], bore["status"], bore["addCount"], reached))
    for place in bore["add"]:
        print("  at {:.1f} deg: {}".format(place["clockDeg"], place["readings"]))
    for warning in bore["warnings"]:
        print("  {}: {}".format(warning["code"], warning["detail"]))
' <"$answer"
