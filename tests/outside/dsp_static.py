#!/usr/bin/python3
"""Static combs and their filters by scipy.signal.lfilter, as the difference equations of the literature.

Every case is the signal path at rate 0 with a whole delay, so that one rational transfer function says it all. The polynomials are put
together here from the printed transfer functions: feed-forward comb, feedback comb, general comb, a damping one-pole and a high-pass low cut
in the loop, wet tone. Prints JSON: the cases as b and a in words of the design, and the filtered noise.
"""
import json
import math

import numpy as np
from scipy.signal import lfilter

FS = 48000


def noise(seed, frames):
    """Numerical Recipes' 32-bit linear congruential generator, scaled to [-0.5, 0.5)."""
    out = []
    for _ in range(frames):
        seed = (1664525 * seed + 1013904223) % 2**32
        out.append(seed / 2**32 - 0.5)
    return np.array(out)


def delayed(m):
    return np.array([0.0] * m + [1.0])


def low_pass(hz):
    """(1 - a)/(1 - a z^-1), a = exp(-2 pi f/fs)."""
    a = math.exp(-2 * math.pi * hz / FS)
    return np.array([1 - a]), np.array([1.0, -a])


def high_pass(hz):
    """(1 + b)/2 (1 - z^-1)/(1 - b z^-1), b = exp(-2 pi f/fs)."""
    b = math.exp(-2 * math.pi * hz / FS)
    return (1 + b) / 2 * np.array([1.0, -1.0]), np.array([1.0, -b])


def cascade(*filters):
    num, den = np.array([1.0]), np.array([1.0])
    for b, a in filters:
        num, den = np.convolve(num, b), np.convolve(den, a)
    return num, den


def plus(p, q):
    out = np.zeros(max(len(p), len(q)))
    out[: len(p)] += p
    out[: len(q)] += q
    return out


def comb(x, m, dry, wet, g, dry_tap, loop=(), tone=()):
    """y = dry d + wet z^-m tone w, w = x/(1 - g z^-m loop), d = x or w. The tone filters run one after another: over one common
    denominator with the loop lfilter itself loses three digits."""
    lb, la = cascade(*loop)
    w = lfilter(la, plus(la, -g * np.convolve(delayed(m), lb)), x)
    wet_signal = lfilter(delayed(m), [1.0], w)
    for b, a in tone:
        wet_signal = lfilter(b, a, wet_signal)
    return dry * (w if dry_tap == "line" else x) + wet * wet_signal


CASES = [
    # name, M, dry, wet, g, dryTap, dampingHz, lowCutHz, wetHighCutHz, wetLowCutHz
    ("feed-forward comb", 48, 1, 0.7, 0, "input", None, None, None, None),
    ("feed-forward comb, opposite signs", 17, 1, -1, 0, "input", None, None, None, None),
    ("feedback comb, positive", 30, 0, 1, 0.9, "input", None, None, None, None),
    ("feedback comb, negative", 31, 0, 1, -0.95, "input", None, None, None, None),
    ("general comb, blend and feedback", 100, 0.7071, 0.7071, 0.7071, "line", None, None, None, None),
    ("general comb, all-pass", 400, 0.7071, 1, -0.7071, "line", None, None, None, None),
    ("input tap with feedback", 60, 0.5, 0.8, 0.6, "input", None, None, None, None),
    ("shortest loop", 1, 0.3, 0.8, -0.9, "line", None, None, None, None),
    ("damped loop", 80, 0, 1, 0.95, "input", 3000, None, None, None),
    ("damped loop, damping above fs/2", 80, 0, 1, 0.95, "input", 40000, None, None, None),
    ("loop with low cut", 80, 0, 1, -0.9, "input", None, 200, None, None),
    ("loop with both filters", 120, 0.5, 0.7, 0.97, "line", 6000, 80, None, None),
    ("wet tone", 40, 0.5, 0.7, 0.5, "input", None, None, 5000, 150),
    ("everything", 55, 0.4, -0.8, -0.8, "line", 4000, 60, 9000, 100),
]


def main():
    frames = 1200
    x = noise(1, frames)
    out = []
    for name, m, dry, wet, g, tap, damping, low_cut, high, low in CASES:
        loop = [low_pass(damping)] if damping else []
        loop += [high_pass(low_cut)] if low_cut else []
        tone = [low_pass(high)] if high else []
        tone += [high_pass(low)] if low else []
        y = comb(x, m, dry, wet, g, tap, loop, tone)
        at = list(range(0, frames, 7))
        out.append({
            "name": name, "samples": m, "dry": dry, "wet": wet, "feedback": g, "dryTap": tap, "dampingHz": damping, "lowCutHz": low_cut,
            "wetHighCutHz": high, "wetLowCutHz": low, "at": at, "y": [float(y[n]) for n in at],
        })
    # Half power of the two filters alone, from scipy's own response.
    from scipy.signal import freqz
    from scipy.optimize import brentq

    def half_power(filt, low, high):
        def excess(hz):
            _, h = freqz(*filt, worN=[2 * math.pi * hz / FS])
            return abs(h[0]) ** 2 - 0.5
        if excess(low) * excess(high) > 0:
            return None
        return brentq(excess, low, high, xtol=1e-9)

    halves = [
        {"hz": hz, "lowPass": half_power(low_pass(hz), 1e-3, FS / 2), "highPass": half_power(high_pass(hz), 1e-3, FS / 2)}
        for hz in (20, 200, 2000, 6000, 9000, 15000, 30000)
    ]
    print(json.dumps({"fs": FS, "frames": frames, "cases": out, "halfPower": halves}))


main()
