#!/bin/sh
# Deviations from the reference axis: sh examples/curl/axis-deviations.sh [request.json]
. "$(dirname "$0")/client.sh"

post_calculation /v1/axis-deviations "${1:-$here/../requests/axis-deviations/least-squares-as-found.json}"
python3 -c '
import json, sys
answer = json.load(sys.stdin)
unit = answer["units"]["offset"]
print("Record", answer["id"])
for station in answer["result"]["stations"]:
    deviation = station["deviation"]
    h, v, radial = (f"{deviation[name]:.4f} {unit}" for name in ("h", "v", "radial"))
    verdict = station["verdict"] or "no tolerance"
    print("{}: deviation h {}, v {}, radial {}; {}".format(station["id"], h, v, radial, verdict))
' <"$answer"
