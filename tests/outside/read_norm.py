"""Largest singular value (numpy.linalg.norm(R, 2)) of moving reads, R written out as a dense matrix of 200 rows."""
import json

import numpy as np

rng = np.random.default_rng(3)
ROWS = 200
BEFORE = 60


def taps(kind, f):
    if kind == "nearest":
        return [1.0]
    if kind == "linear":
        return [1 - f, f]
    if kind == "lagrange3":
        return [-f * (f - 1) * (f - 2) / 6, (f + 1) * (f - 1) * (f - 2) / 2, -(f + 1) * f * (f - 2) / 2, (f + 1) * f * (f - 1) / 6]
    return [(-f + 2 * f**2 - f**3) / 2, (2 - 5 * f**2 + 3 * f**3) / 2, (f + 4 * f**2 - 3 * f**3) / 2, (-(f**2) + f**3) / 2]


def movement(kind, label):
    n = np.arange(ROWS)
    base = rng.uniform(6, 12)
    if label == "sine" or kind == "allpass1":
        return base + 3 * np.sin(2 * np.pi * n / rng.uniform(90, 400))
    if label == "hop":
        return base + (n % 2) * rng.uniform(0.3, 1.2)
    if label == "walk":
        return np.clip(base + np.cumsum(rng.uniform(-0.2, 0.2, ROWS)), 3, 30)
    return base + 5 * ((n // 50) % 2)


def norm(kind, delays):
    r = np.zeros((ROWS, ROWS + BEFORE))
    state = np.eye(ROWS)
    for n, delay in enumerate(delays):
        if kind == "allpass1":
            whole = int(np.floor(delay - 0.5))
            eta = (1 - (delay - whole)) / (1 + (delay - whole))
            r[n, n - whole + BEFORE] = eta
            r[n, n - whole - 1 + BEFORE] = 1
            if n:
                state[n, n - 1] = eta
            continue
        whole = int(np.floor(delay + 0.5)) if kind == "nearest" else int(np.floor(delay))
        h = taps(kind, 0 if kind == "nearest" else delay - whole)
        newest = -1 if len(h) == 4 else 0
        for k, x in enumerate(h):
            r[n, n - whole - newest - k + BEFORE] += x
    return float(np.linalg.norm(np.linalg.solve(state, r), 2))


out = []
for label in ["sine", "hop", "walk", "square"]:
    for kind in ["nearest", "linear", "lagrange3", "hermite4", "allpass1"]:
        delays = [round(float(d), 6) for d in movement(kind, label)]
        out.append({"kind": kind, "label": label, "delays": delays, "norm": norm(kind, delays)})
print(json.dumps(out))
