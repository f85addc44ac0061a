"""Times scipy's SLSQP on narrowest zones read from standard input: [[[h, v], ...], ...] in, microseconds and widths out."""

import json
import sys
import time

import numpy as np
from scipy.optimize import least_squares, minimize

sets = [np.array(points) for points in json.load(sys.stdin)]


def fit(points):
    h, v = points[:, 0], points[:, 1]
    start = [h.mean(), v.mean(), np.hypot(h - h.mean(), v - v.mean()).mean()]
    ring = least_squares(lambda x: np.hypot(h - x[0], v - x[1]) - x[2], start, method="lm").x
    # About the least-squares centre and radius: small numbers, which SLSQP needs.
    dh, dv = h - ring[0], v - ring[1]

    def inside(x):
        excess = np.hypot(dh - x[0], dv - x[1]) - ring[2]
        return np.concatenate([x[2] - excess, excess - x[3]])

    def slopes(x):
        distance = np.hypot(dh - x[0], dv - x[1])
        a, b = (x[0] - dh) / distance, (x[1] - dv) / distance
        one, none = np.ones(len(h)), np.zeros(len(h))
        return np.vstack([np.column_stack([-a, -b, one, none]), np.column_stack([a, b, none, -one])])

    excess = np.hypot(dh, dv) - ring[2]
    found = minimize(
        lambda x: x[2] - x[3],
        [0, 0, excess.max(), excess.min()],
        jac=lambda x: np.array([0, 0, 1.0, -1.0]),
        constraints=[{"type": "ineq", "fun": inside, "jac": slopes}],
        method="SLSQP",
        options={"ftol": 1e-14, "maxiter": 200},
    )
    distance = np.hypot(dh - found.x[0], dv - found.x[1])
    return distance.max() - distance.min()


answers = []
for points in sets:
    width = fit(points)
    rounds = []
    for _ in range(10):
        started = time.perf_counter()
        fit(points)
        rounds.append((time.perf_counter() - started) * 1e6)
    # The least: what is longer is other work of the machine.
    answers.append({"microseconds": min(rounds), "width": width})
print(json.dumps(answers))
