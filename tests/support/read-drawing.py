"""Reads a DXF drawing with ezdxf and writes what stands in it as JSON: an eye that is not the project's own."""

import json
import sys

import ezdxf


def place(point):
    return [point[0], point[1]]


def content(entity):
    kind = entity.dxftype()
    common = {"kind": kind, "layer": entity.dxf.layer}
    if kind == "LINE":
        return {**common, "points": [place(entity.dxf.start), place(entity.dxf.end)]}
    if kind == "LWPOLYLINE":
        return {**common, "points": [place(p) for p in entity.get_points("xy")], "closed": entity.closed}
    if kind == "CIRCLE":
        return {**common, "points": [place(entity.dxf.center)], "radius": entity.dxf.radius}
    if kind == "TEXT":
        return {
            **common,
            "points": [place(entity.dxf.insert)],
            "text": entity.plain_text(),
            "height": entity.dxf.height,
        }
    return common


drawing = ezdxf.readfile(sys.argv[1])
audit = drawing.audit()
json.dump(
    {
        "errors": [error.message for error in audit.errors],
        "fixes": [fix.message for fix in audit.fixes],
        "units": drawing.header["$INSUNITS"],
        "layers": [layer.dxf.name for layer in drawing.layers],
        "entities": [content(entity) for entity in drawing.modelspace()],
    },
    sys.stdout,
)
