"""Listens for webhooks, and prints each one whose signature is good.

    BOREWRIGHT_WEBHOOK_SECRET=whsec_… python3 examples/python/receive-webhooks.py [port]

Standard Webhooks: the signature is an HMAC-SHA-256 over id, timestamp and the body exactly as it was received, so the
body is checked before it is read. Several signatures stand beside each other while a secret is replaced; one that is
good will do. A message that comes again carries the id it had: what was done with it is not done twice.
"""

import base64
import hashlib
import hmac
import json
import os
import sys
import time
from http.server import BaseHTTPRequestHandler, HTTPServer

SECRET = base64.b64decode(os.environ["BOREWRIGHT_WEBHOOK_SECRET"].removeprefix("whsec_"))
TOLERANCE_SECONDS = 300
seen = set()


def is_signed(headers, body: bytes) -> bool:
    """Whether one of the signatures is by our secret, and the message not an old one sent anew by a stranger."""
    sent_at = headers.get("webhook-timestamp", "")
    if not sent_at.isdigit() or abs(time.time() - int(sent_at)) > TOLERANCE_SECONDS:
        return False
    signed = f"{headers.get('webhook-id', '')}.{sent_at}.".encode() + body
    expected = "v1," + base64.b64encode(hmac.new(SECRET, signed, hashlib.sha256).digest()).decode()
    return any(hmac.compare_digest(expected, given) for given in headers.get("webhook-signature", "").split(" "))


class Receiver(BaseHTTPRequestHandler):
    def do_POST(self):
        body = self.rfile.read(int(self.headers.get("content-length", "0")))
        if not is_signed(self.headers, body):
            self.answer(401)
            return
        # Answered first, so that slow work here does not look like a failure there.
        self.answer(204)
        identity = self.headers["webhook-id"]
        if identity in seen:
            return
        seen.add(identity)
        message = json.loads(body)
        print(f"{message['type']} {json.dumps(message['data'], sort_keys=True)}", flush=True)

    def answer(self, status: int):
        self.send_response(status)
        self.end_headers()

    def log_message(self, *_):
        """Says nothing of each request."""


server = HTTPServer(("127.0.0.1", int(sys.argv[1]) if len(sys.argv) > 1 else 0), Receiver)
print(f"listening on port {server.server_port}", flush=True)
server.serve_forever()
