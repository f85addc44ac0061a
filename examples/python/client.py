"""A small client of the service: Python's standard library alone."""

import json
import os
import sys
import urllib.error
import urllib.request
from pathlib import Path

URL = os.environ.get("BOREWRIGHT_URL", "http://127.0.0.1:4100")
KEY = os.environ.get("BOREWRIGHT_KEY")
REQUESTS = Path(__file__).parent.parent / "requests"


def read_request(example):
    """The request file named on the command line, or the example beside this folder."""
    path = Path(sys.argv[1]) if len(sys.argv) > 1 else REQUESTS / f"{example}.json"
    return json.loads(path.read_text(encoding="utf-8"))


def post_calculation(path, request):
    """Posts a request and returns its answer; ends the program with the problem told when it is refused."""
    if not KEY:
        sys.exit("Set BOREWRIGHT_KEY to an API key with the scope calculations:write.")
    call = urllib.request.Request(
        URL + path,
        data=json.dumps(request).encode("utf-8"),
        headers={"Authorization": f"Bearer {KEY}", "Content-Type": "application/json"},
    )
    try:
        with urllib.request.urlopen(call, timeout=60) as response:
            return json.load(response)
    except urllib.error.HTTPError as refusal:
        sys.exit(describe_problem(refusal.status, json.load(refusal)))
    except urllib.error.URLError as failure:
        sys.exit(f"{URL} does not answer: {failure.reason}")


def describe_problem(status, problem):
    lines = [f"{status} {problem['code']}: {problem['detail']}"]
    for error in problem.get("errors", []):
        lines.append(f"  {error.get('pointer', '')} {error['code']}: {error['detail']}")
    return "\n".join(lines)
