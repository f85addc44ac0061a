#!/bin/sh
# Bore centres from wall readings: sh examples/curl/bore-fits.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/bore-fits "${1:-$here/../requests/bore-fits/points-with-uncertainty.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
offset, bore_unit = answer["units"]["offset"], answer["units"]["bore"]
print("Record", answer["id"])
for bore in answer["result"]["bores"]:
    h, v, diameter = bore["centre"]["h"], bore["centre"]["v"], bore["diameter"]
    size = "not known" if diameter is None else f"{diameter:.3f} {bore_unit}"
    print("{}: centre h {:.4f} {}, v {:.4f} {}; diameter {}".format(bore["id"], h, offset, v, offset, size))
    for warning in bore["warnings"]:
        print("  {code}: {detail}".format(**warning))
' <"$answer"
