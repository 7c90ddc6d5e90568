"""Largest closed-loop pole radii by numpy.roots, loops up to 64 samples: one line, and two lines fed into each other.

Reads: floor(D + 1/2); linear; Lagrange 3 and Catmull-Rom on points I-1 .. I+2; first-order Thiran all-pass with its fraction in
[0.5, 1.5). Filters (1-a)/(1 - a v) and (1+b)/2 (1 - v)/(1 - b v), v = 1/z. Polynomials are formed with numpy.convolve.
"""
import json

import numpy as np

rng = np.random.default_rng(20)
KINDS = ["nearest", "linear", "lagrange3", "hermite4", "allpass1"]
LEAST = {"nearest": 1, "linear": 1, "lagrange3": 2, "hermite4": 2, "allpass1": 1.5}


def read(kind, delay):
    """Numerator and denominator in v of the read."""
    if kind == "allpass1":
        whole = int(np.floor(delay - 0.5))
        d = delay - whole
        eta = (1 - d) / (1 + d)
        return np.concatenate([np.zeros(whole), [eta, 1.0]]), np.array([1.0, eta])
    if kind == "nearest":
        return np.concatenate([np.zeros(int(np.floor(delay + 0.5))), [1.0]]), np.array([1.0])
    whole = int(np.floor(delay))
    f = delay - whole
    if kind == "linear":
        return np.concatenate([np.zeros(whole), [1 - f, f]]), np.array([1.0])
    if kind == "lagrange3":
        taps = [-f * (f - 1) * (f - 2) / 6, (f + 1) * (f - 1) * (f - 2) / 2, -(f + 1) * f * (f - 2) / 2, (f + 1) * f * (f - 1) / 6]
    else:
        taps = [(-f + 2 * f**2 - f**3) / 2, (2 - 5 * f**2 + 3 * f**3) / 2, (f + 4 * f**2 - 3 * f**3) / 2, (-(f**2) + f**3) / 2]
    return np.concatenate([np.zeros(whole - 1), taps]), np.array([1.0])


def open_loop(kind, delay, g, a, b, averaged):
    num, den = read(kind, delay)
    num = g * num
    if averaged:
        num = np.convolve(num, [0.5, 0.5])
    if a is not None:
        num, den = num * (1 - a), np.convolve(den, [1, -a])
    if b is not None:
        num, den = np.convolve(num, [(1 + b) / 2, -(1 + b) / 2]), np.convolve(den, [1, -b])
    return num, den


def total(*terms):
    out = np.zeros(max(len(t) for t in terms))
    for t in terms:
        out[: len(t)] += t
    return np.trim_zeros(out, "b")


def radius(polynomial):
    return float(np.max(np.abs(np.roots(polynomial))))


def draw(low, high):
    kind = KINDS[rng.integers(5)]
    delay = float(rng.uniform(max(low, LEAST[kind]), high)) if rng.random() < 0.8 else float(rng.integers(max(low, 2), high))
    return kind, delay


def gain():
    size = rng.uniform(0.05, 1.3) if rng.random() < 0.6 else 1 - 10 ** rng.uniform(-5, -1)
    return float(size * rng.choice([-1, 1]))


def tone(slow):
    # Filters much slower than the loop put poles close together, where numpy.roots itself loses digits.
    a = float(np.exp(-2 * np.pi * 10 ** rng.uniform(slow, -0.3))) if rng.random() < 0.5 else None
    b = float(np.exp(-2 * np.pi * 10 ** rng.uniform(slow, -0.5))) if rng.random() < 0.5 else None
    return a, b


lines = []
for _ in range(400):
    kind, delay = draw(1, 62)
    g, (a, b), averaged = gain(), tone(-3.5), bool(rng.random() < 0.2)
    num, den = open_loop(kind, delay, g, a, b, averaged)
    lines.append([kind, delay, g, a, b, averaged, radius(total(den, -num))])

pairs = []
for _ in range(120):
    kind, delay = draw(2, 32)
    other = float(rng.uniform(LEAST[kind], 32))
    g, (a, b), k = gain(), tone(-2), float(rng.uniform(0, 1)) if rng.random() < 0.9 else float(rng.integers(2))
    if rng.random() < 0.1:
        other = delay
    (n0, d0), (n1, d1) = open_loop(kind, delay, g, a, b, False), open_loop(kind, other, g, a, b, False)
    c = np.convolve
    p = total(c(d0, d1), -(1 - k) * c(n0, d1), -(1 - k) * c(n1, d0), (1 - 2 * k) * c(n0, n1))
    pairs.append([kind, delay, other, g, a, b, k, radius(p)])

print(json.dumps({"lines": lines, "pairs": pairs}))
