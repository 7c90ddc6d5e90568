"""Frozen responses by scipy.signal.freqz and group_delay, from numerator and denominator polynomials that are written out here:
static combs, combs with a loop and its filters, fractional delays by Lagrange's formula, Catmull-Rom and Thiran's all-pass."""
import json

import numpy as np
from scipy.interpolate import lagrange
from scipy.signal import freqz, group_delay

FS = 48000
HZ = [1, 20, 97.5, 440, 1000, 2503, 6000, 9999, 15000, 20000, 23900]


def delayed(taps, first):
    return np.concatenate([np.zeros(first), np.asarray(taps, float)])


def lagrange3(f):
    """Taps by scipy's Lagrange polynomial: weight of a unit point at -1, 0, 1, 2, read at f."""
    points = np.array([-1, 0, 1, 2])
    return [np.polyval(lagrange(points, np.eye(4)[k]).coef, f) for k in range(4)]


def catmull_rom(f):
    """Taps by solving for the cubic through points 0 and 1 whose slopes there are half the chords around them."""
    m = np.array([[1, 0, 0, 0], [1, 1, 1, 1], [0, 1, 0, 0], [0, 1, 2, 3]], float)
    right = np.array([[0, 1, 0, 0], [0, 0, 1, 0], [-0.5, 0, 0.5, 0], [0, -0.5, 0, 0.5]])
    return list(np.array([1, f, f * f, f**3]) @ np.linalg.solve(m, right))


def read(kind, samples):
    """(numerator, denominator) of one interpolated read."""
    whole = int(np.floor(samples))
    f = samples - whole
    if kind == "nearest":
        return delayed([1], int(np.floor(samples + 0.5))), [1]
    if kind == "linear":
        return delayed([1 - f, f], whole), [1]
    if kind == "lagrange3":
        return delayed(lagrange3(f), whole - 1), [1]
    if kind == "hermite4":
        return delayed(catmull_rom(f), whole - 1), [1]
    first = int(np.floor(samples - 0.5))
    eta = (1 - (samples - first)) / (1 + (samples - first))
    return delayed([eta, 1], first), [1, eta]


def add(a, b):
    n = max(len(a), len(b))
    return np.pad(a, (0, n - len(a))) + np.pad(b, (0, n - len(b)))


def tone(low_pass, high_pass):
    num, den = np.array([1.0]), np.array([1.0])
    if low_pass:
        a = np.exp(-2 * np.pi * low_pass / FS)
        num, den = np.convolve(num, [1 - a]), np.convolve(den, [1, -a])
    if high_pass:
        b = np.exp(-2 * np.pi * high_pass / FS)
        num, den = np.convolve(num, [(1 + b) / 2, -(1 + b) / 2]), np.convolve(den, [1, -b])
    return num, den


def comb(c):
    """y = dry d + wet W A / (1 - g F A_loop) as one fraction."""
    bn, bd = read(c["voice"], c["samples"])
    ln, ld = read(c["loop"], c["samples"])
    fn, fd = tone(c["damping"], c["lowCut"])
    wn, wd = tone(c["highCut"], c["wetLowCut"])
    closed = np.convolve(ld, fd)
    loop = add(closed, -c["feedback"] * np.convolve(ln, fn))
    wet_num = c["wet"] * np.convolve(np.convolve(bn, wn), closed)
    wet_den = np.convolve(np.convolve(bd, wd), loop)
    dry = delayed([c["dry"]], c["dryDelay"])
    if c["tap"] == "line":
        num = add(np.convolve(np.convolve(dry, closed), np.convolve(bd, wd)), wet_num)
        return num, wet_den
    return add(np.convolve(dry, wet_den), wet_num), wet_den


BASE = {"voice": "linear", "loop": "linear", "samples": 48, "feedback": 0, "dry": 1, "wet": 1, "tap": "input", "dryDelay": 0}
BASE.update({"damping": None, "lowCut": None, "highCut": None, "wetLowCut": None})
CASES = [
    {"wet": 0.7},
    {"wet": -0.6, "samples": 31},
    {"dry": 0, "feedback": 0.7},
    {"dry": 0, "feedback": -0.9, "samples": 100},
    # Dattorro 1997 table 6, flanger and white chorus, denominator sign turned to ours.
    {"dry": 0.7071, "wet": 0.7071, "feedback": 0.7071, "tap": "line", "samples": 60},
    {"dry": 0.7071, "wet": 1, "feedback": -0.7071, "tap": "line", "samples": 400},
    {"samples": 48.3, "feedback": 0.6},
    {"samples": 20.7, "voice": "lagrange3", "loop": "lagrange3", "feedback": -0.8, "damping": 3000},
    {"samples": 20.25, "voice": "hermite4", "loop": "hermite4", "feedback": 0.8, "lowCut": 120},
    {"samples": 33.9, "voice": "allpass1", "loop": "allpass1", "feedback": 0.75, "damping": 8000, "lowCut": 40},
    {"samples": 33.6, "voice": "nearest", "loop": "nearest", "feedback": 0.5, "dryDelay": 12},
    {"samples": 91.4, "voice": "lagrange3", "feedback": 0.9, "damping": 1500, "lowCut": 200, "highCut": 5000, "wetLowCut": 90, "tap": "line"},
    {"samples": 7.5, "dry": 0, "voice": "lagrange3"},
    {"samples": 7.5, "dry": 0, "voice": "linear"},
]

out = []
w = 2 * np.pi * np.array(HZ) / FS
for change in CASES:
    case = {**BASE, **change}
    num, den = comb(case)
    h = freqz(num, den, worN=w)[1]
    delay = group_delay((num, den), w=w)[1]
    out.append({"case": case, "hz": HZ, "re": list(h.real), "im": list(h.imag), "groupDelay": list(delay)})
print(json.dumps({"sampleRate": FS, "cases": out}))
