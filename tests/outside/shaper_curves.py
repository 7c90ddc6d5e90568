"""Shapers driven by a sine, and their tables, by numpy and scipy: harmonics from a long FFT of the curve, what folds from the same FFT beyond
half the rate (antialiased: of the published difference of antiderivatives), table errors from numpy.interp on a fine grid."""
import json

import numpy as np
from scipy.optimize import newton

PHASES = 1 << 17
RATE = 48000
TONE = 5000


def diode(t):
    return newton(lambda v: v + 0.002 * np.sinh(v / 0.12) - t, np.minimum(t, 0.12 * np.arcsinh(t / 0.002)), tol=1e-15, maxiter=100)


def half(p, t):
    kind = p["curve"]
    if kind == "hardClip":
        return np.minimum(t, 1)
    if kind == "arctan":
        return 2 / np.pi * np.arctan(np.pi * t / 2)
    if kind == "tanh":
        return np.tanh(t)
    if kind == "cubic":
        return np.where(t < 1.5, t - 4 * t**3 / 27, 1.0)
    if kind == "diode":
        return diode(t)
    if kind == "deadZone":
        return np.maximum(0, t - p["deadZone"])
    x, y = np.array(p["points"]).T
    return np.interp(t, x, y)


def antiderivative(p, t):
    """Of `half` from 0, of the curves whose antiderivative FACTS 7 lists."""
    kind = p["curve"]
    if kind == "hardClip":
        return np.where(t < 1, t * t / 2, t - 0.5)
    if kind == "tanh":
        return np.logaddexp(t, -t) - np.log(2)
    u = np.pi * t / 2
    return (2 / np.pi) ** 2 * (u * np.arctan(u) - np.log1p(u * u) / 2)


def signed(p, x, above, power):
    v = p["drive"] * x
    p_, n_ = p["positive"], p["negative"]
    up = p_**power * above(p, np.maximum(v, 0) / p_)
    down = n_**power * above(p, np.maximum(-v, 0) / n_)
    return p["ceiling"] * np.where(v >= 0, up, (-1) ** power * down)


def shaper(p, x):
    return signed(p, x, half, 1)


def spectrum(y):
    """Amplitudes of cos n psi."""
    return 2 * np.real(np.fft.rfft(y)) / len(y)


def sine(p, amplitude):
    psi = 2 * np.pi * np.arange(PHASES) / PHASES
    c = spectrum(shaper(p, amplitude * np.cos(psi)))
    kept = RATE // 2 // TONE
    row = {"dc": c[0] / 2, "harmonics": c[1:11].tolist(), "folded": 10 * np.log10(np.sum(c[kept + 1 :] ** 2) / c[1] ** 2)}
    if p["curve"] in ("hardClip", "tanh", "arctan"):
        w = np.pi * TONE / RATE
        before, now = amplitude * np.cos(psi - w), amplitude * np.cos(psi + w)
        near = np.abs(now - before) < 1e-6
        gap = np.where(near, 1.0, now - before)
        mean = (signed(p, now, antiderivative, 2) - signed(p, before, antiderivative, 2)) / (p["drive"] * gap)
        m = spectrum(np.where(near, shaper(p, (now + before) / 2), mean))
        row["foldedMeans"] = 10 * np.log10(np.sum(m[kept + 1 :] ** 2) / m[1] ** 2)
    return row


def table(p, size, reach):
    x = reach * (2 * np.arange(size + 1) - size) / size
    fine = np.concatenate([np.linspace(-reach, reach, 100001), (x[1:] + x[:-1]) / 2])
    return {"size": size, "range": reach, "largest": float(np.max(np.abs(np.interp(fine, x, shaper(p, x)) - shaper(p, fine))))}


BASE = {"drive": 1, "ceiling": 1, "positive": 1, "negative": 1, "deadZone": 0, "points": []}
POINTS = [[0, 0], [0.3, 0.5], [0.8, 0.2], [0.9, 1]]
KINDS = [
    {"curve": "hardClip"},
    {"curve": "arctan"},
    {"curve": "tanh"},
    {"curve": "cubic"},
    {"curve": "diode"},
    {"curve": "deadZone", "deadZone": 0.13},
    {"curve": "drawn", "points": POINTS},
]
CASES = [{"drive": 2.5}, {"drive": 9, "ceiling": 0.7, "positive": 0.8, "negative": 0.45}]

rows = []
for kind in KINDS:
    for case in CASES:
        p = {**BASE, **kind, **case}
        rows.append({"shaper": p, "amplitude": 0.5, **sine(p, 0.5), "tables": [table(p, 64, 1), table(p, 1024, 1.7)]})
print(json.dumps(rows))
