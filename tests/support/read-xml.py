"""Reads XML documents, a JSON list of texts on standard input, into lists of their elements in order."""

import json
import sys
from xml.etree import ElementTree


def elements(text):
    return [
        {
            "name": element.tag.partition("}")[2],
            "namespace": element.tag.partition("}")[0][1:],
            "attributes": dict(element.attrib),
            "text": element.text or "",
        }
        for element in ElementTree.fromstring(text.encode("utf-8")).iter()
    ]


json.dump([elements(text) for text in json.load(sys.stdin)], sys.stdout)
