"""Readings to moves in one call: python3 examples/python/alignments.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/alignments", read_request("alignments/gauge-readings-to-shims"))
unit, result = answer["units"]["offset"], answer["result"]
print(f"Record {answer['id']}")
for caution in answer["cautions"]:
    print(f"Caution: {caution['text']}")
for station in result["stations"]:
    deviation = station["deviation"]
    h, v = (f"{deviation[name]:.4f} {unit}" for name in ("h", "v"))
    print(f"{station['id']}: deviation h {h}, v {v}; {station['verdict'] or 'no tolerance'}")
for component in (result["moves"] or {"components": []})["components"]:
    for move in component["realised"]:
        print(f"{component['id']} at {move['support']}: move h {move['h']:.4f} {unit}, v {move['v']:.4f} {unit}")
