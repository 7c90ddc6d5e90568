"""Worst gains and worst samples of combs by numpy and scipy: scipy.signal.freqz on a dense grid refined by scipy.optimize, l1 norms from
scipy.signal.lfilter's impulse response, and swept combs by numpy's FFT of their taps at many positions."""
import json

import numpy as np
from scipy.optimize import minimize_scalar
from scipy.signal import freqz, lfilter

FS = 48000


def add(a, b):
    n = max(len(a), len(b))
    return np.pad(a, (0, n - len(a))) + np.pad(b, (0, n - len(b)))


def linear(samples):
    whole = int(np.floor(samples))
    f = samples - whole
    return np.concatenate([np.zeros(whole), [1 - f, f]])


def lagrange3(samples):
    whole = int(np.floor(samples))
    d = samples - whole + 1
    taps = [np.prod([(d - k) / (n - k) for k in range(4) if k != n]) for n in range(4)]
    return np.concatenate([np.zeros(whole - 1), taps])


READS = {"linear": linear, "lagrange3": lagrange3}


def tone(low_pass, high_pass):
    num, den = np.array([1.0]), np.array([1.0])
    if low_pass:
        a = np.exp(-2 * np.pi * low_pass / FS)
        num, den = num * (1 - a), np.convolve(den, [1, -a])
    if high_pass:
        b = np.exp(-2 * np.pi * high_pass / FS)
        num, den = np.convolve(num, [(1 + b) / 2, -(1 + b) / 2]), np.convolve(den, [1, -b])
    return num, den


def comb(c):
    """y = dry d + wet W A w, w = u/(1 - g F A), as one fraction; and w itself."""
    a = READS[c["read"]](c["samples"])
    fn, fd = tone(c["damping"], c["lowCut"])
    wn, wd = tone(c["highCut"], c["wetLowCut"])
    loop = add(fd, -c["feedback"] * np.convolve(a, fn))
    wet = c["wet"] * np.convolve(np.convolve(a, wn), fd)
    den = np.convolve(loop, wd)
    dry = np.array([c["dry"]])
    num = add(np.convolve(dry, np.convolve(fd if c["tap"] == "line" else loop, wd)), wet)
    return (num, den), (fd, loop)


def worst_gain(num, den):
    w = np.linspace(0, np.pi, 2**18)
    size = np.abs(freqz(num, den, worN=w)[1])
    at = int(np.argmax(size))
    low, high = w[max(0, at - 1)], w[min(len(w) - 1, at + 1)]
    found = minimize_scalar(lambda x: -abs(freqz(num, den, worN=[x])[1][0]), bounds=(low, high), method="bounded", options={"xatol": 1e-12})
    return max(float(size[at]), float(-found.fun))


def l1(num, den, samples=400000):
    impulse = np.zeros(samples)
    impulse[0] = 1
    return float(np.sum(np.abs(lfilter(num, den, impulse))))


BASE = {"read": "linear", "samples": 48, "feedback": 0, "dry": 0.7071, "wet": 0.7071, "tap": "input"}
BASE.update({"damping": None, "lowCut": None, "highCut": None, "wetLowCut": None})
STILL = [
    {},
    {"wet": -0.7071, "samples": 31.5},
    {"samples": 48.5, "read": "lagrange3", "feedback": 0.8},
    {"samples": 60, "feedback": 0.7071, "tap": "line"},
    {"samples": 400, "wet": 1, "feedback": -0.7071, "tap": "line"},
    {"samples": 100.25, "feedback": -0.9, "damping": 4000},
    {"samples": 77.6, "read": "lagrange3", "feedback": 0.85, "damping": 6000, "lowCut": 150},
    {"samples": 52.3, "feedback": 0.6, "lowCut": 200, "wetLowCut": 300, "tap": "line"},
    {"samples": 217.5, "read": "lagrange3", "feedback": 0.94, "damping": 7000, "highCut": 5000},
]


def swept(c):
    """Largest |H| of V voices without a loop over positions of a sine sweep, by FFT: |dry + wet V^-1/2 W sum A|."""
    best = 0.0
    size = 2**16
    voices, depth = c["voices"], c["depth"]
    wn, wd = tone(None, c["wetLowCut"])
    w = np.linspace(0, np.pi, size // 2 + 1)
    wet_filter = freqz(wn, wd, worN=w)[1]
    for position in np.arange(600) / 600:
        taps = np.zeros(size)
        for v in range(voices):
            delay = c["samples"] + depth * np.sin(2 * np.pi * (position + v / voices))
            h = READS[c["read"]](delay)
            taps[: len(h)] += h
        spectrum = c["dry"] + c["wet"] / np.sqrt(voices) * wet_filter * np.fft.rfft(taps)
        best = max(best, float(np.max(np.abs(spectrum))))
    return best


SWEPT = [
    {"read": "linear", "samples": 60, "depth": 40, "voices": 1, "dry": 0.7071, "wet": -0.7071, "wetLowCut": None},
    {"read": "lagrange3", "samples": 120, "depth": 60, "voices": 2, "dry": 0.7071, "wet": 0.7071, "wetLowCut": 300},
    {"read": "linear", "samples": 300, "depth": 120, "voices": 3, "dry": 0.7071, "wet": -0.7071, "wetLowCut": None},
    {"read": "lagrange3", "samples": 200, "depth": 150, "voices": 3, "dry": 0.5, "wet": 1, "wetLowCut": 500},
]

still = []
for change in STILL:
    case = {**BASE, **change}
    out, line = comb(case)
    still.append({"case": case, "peak": worst_gain(*out), "line": worst_gain(*line), "peakL1": l1(*out), "lineL1": l1(*line)})
print(json.dumps({"sampleRate": FS, "still": still, "swept": [{"case": c, "peak": swept(c)} for c in SWEPT]}))
