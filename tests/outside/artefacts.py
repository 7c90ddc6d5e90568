"""What moving reads add to a tone, dB: the read of exp(jwn) against exp(jw(n - D(n))) with D true at every sample, less the mean complex gain.

Taps are written from the formulas of Laakso et al. 1996 and Niemitalo 2001, the all-pass is run sample by sample: nothing of the project is used."""
import json

import numpy as np

FS = 48000
PERIOD = 16384
BASE, DEPTH, RATE = 240.0, 48.0, 1.0


def true_delay(n):
    return BASE + DEPTH * np.sin(2 * np.pi * RATE * n / FS)


def read_delay(n, every, between):
    if every == 1:
        return true_delay(n)
    start = n - n % every
    # A held delay is late by (every - 1)/2 samples in the mean: its sweep is taken that much earlier.
    if between == "hold":
        return true_delay(start + (every - 1) / 2)
    a, b = true_delay(start), true_delay(start + every)
    return a + (b - a) * (n - start) / every


def gain(kind, d, w):
    """The read over exp(jwn) at every sample."""
    if kind == "nearest":
        return np.exp(-1j * w * np.floor(d + 0.5))
    if kind == "allpass1":
        m = np.floor(d - 0.5)
        t = d - m
        eta = (1 - t) / (1 + t)
        y = 0j
        out = np.empty(len(d), complex)
        for i in range(len(d)):
            y = eta[i] * (np.exp(1j * w * (i - m[i])) - y) + np.exp(1j * w * (i - m[i] - 1))
            out[i] = y
        return out * np.exp(-1j * w * np.arange(len(d)))
    whole = np.floor(d)
    f = d - whole
    if kind == "linear":
        points = {0: 1 - f, 1: f}
    elif kind == "lagrange3":
        x = f + 1
        points = {-1: -(x - 1) * (x - 2) * (x - 3) / 6, 0: x * (x - 2) * (x - 3) / 2, 1: -x * (x - 1) * (x - 3) / 2, 2: x * (x - 1) * (x - 2) / 6}
    else:
        points = {
            -1: (-f + 2 * f**2 - f**3) / 2,
            0: (2 - 5 * f**2 + 3 * f**3) / 2,
            1: (f + 4 * f**2 - 3 * f**3) / 2,
            2: (f**3 - f**2) / 2,
        }
    return sum(h * np.exp(-1j * w * (whole + k)) for k, h in points.items())


out = []
n = np.arange(FS + 4800)
for kind, every, between in [
    ("nearest", 1, "ramp"),
    ("linear", 1, "ramp"),
    ("hermite4", 1, "ramp"),
    ("lagrange3", 1, "ramp"),
    ("allpass1", 1, "ramp"),
    ("lagrange3", 64, "ramp"),
    ("lagrange3", 16, "hold"),
    ("linear", 64, "hold"),
]:
    for k in [137, 341, 1707, 3413]:
        w = 2 * np.pi * k / PERIOD
        ratio = gain(kind, read_delay(n, every, between), w) * np.exp(1j * w * true_delay(n))
        # One whole cycle, the all-pass having started before it.
        ratio = ratio[4800:]
        moving = np.mean(np.abs(ratio - ratio.mean()) ** 2)
        out.append({"kind": kind, "every": every, "between": between, "bin": k, "db": float(10 * np.log10(moving))})
print(json.dumps(out))
