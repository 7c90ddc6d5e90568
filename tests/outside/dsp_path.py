#!/usr/bin/python3
"""An independent model of the signal path, written from the printed design alone, in plain loops over whole histories.

It knows nothing of rings, chunks, ramps or tables: every line is a growing list, every read goes back to the formula. Random sets cover
every sweep shape, layout, law, interpolator, shaper curve and update mode. Prints JSON: per case the set, how its input is made, and the
output at some samples. Antiderivative anti-aliasing is done as its definition says, by integrating the curve between neighbouring inputs
with Gauss-Legendre quadrature, so it also checks the closed antiderivatives.
"""
import json
import math
import random

import numpy.polynomial.legendre as legendre

NODES, WEIGHTS = (list(map(float, a)) for a in legendre.leggauss(12))


# --- input ------------------------------------------------------------------------------------------------------------
def noise(seed, frames):
    """Numerical Recipes' 32-bit linear congruential generator, scaled to [-0.5, 0.5)."""
    out = []
    state = seed
    for _ in range(frames):
        state = (1664525 * state + 1013904223) % 2**32
        out.append(state / 2**32 - 0.5)
    return out


# --- sweep ------------------------------------------------------------------------------------------------------------
def triangle(phi):
    if phi < 0.25:
        return 4 * phi
    if phi < 0.75:
        return 2 - 4 * phi
    return 4 * phi - 4


def fmix32(h):
    h &= 0xFFFFFFFF
    h ^= h >> 16
    h = (h * 0x85EBCA6B) & 0xFFFFFFFF
    h ^= h >> 13
    h = (h * 0xC2B2AE35) & 0xFFFFFFFF
    h ^= h >> 16
    return h


def level(seed, v, k):
    h = fmix32((seed + 0x9E3779B9 * v + 0x85EBCA6B * k) % 2**32)
    return (h - 2**32 if h >= 2**31 else h) / 2**31


def shape(sweep, Phi, v):
    phi = Phi - math.floor(Phi)
    kind = sweep["shape"]
    e = min(sweep["edgeMs"] * sweep["rateHz"] / 1000, 0.5)
    psi = phi - 1 if phi >= 0.5 else phi
    if kind == "sine":
        return math.sin(2 * math.pi * phi)
    if kind == "triangle":
        return triangle(phi)
    if kind == "square":
        if e == 0:
            return 1.0 if phi < 0.5 else -1.0
        return max(-1.0, min(1.0, triangle(phi) / (2 * e)))
    if kind in ("rampUp", "rampDown"):
        if e == 0:
            up = 2 * phi - 1
        elif abs(psi) < e / 2:
            up = -2 * psi / e
        else:
            up = (2 * phi - 1) / (1 - e)
        return up if kind == "rampUp" else -up
    if kind == "drift":
        k = math.floor(Phi)
        a, b = level(sweep["seed"], v, k), level(sweep["seed"], v, k + 1)
        return a + (b - a) * (1 - math.cos(math.pi * (Phi - k))) / 2
    points = [[x - 1, y] for x, y in sweep["points"]] + sweep["points"] + [[x + 1, y] for x, y in sweep["points"]]
    for (x0, y0), (x1, y1) in zip(points, points[1:]):
        if x0 <= phi < x1:
            return y0 + (y1 - y0) * (phi - x0) / (x1 - x0)
    raise AssertionError(phi)


def law(s, centre, value):
    if s["sweep"]["law"] == "time":
        return centre + s["sweep"]["depthMs"] * value
    return centre * 2 ** (s["sweep"]["depthOctaves"] * value)


def evaluate(s, n, c, v, loop):
    """Delay in samples of a voice, or of the loop, at sample n."""
    V = s["voices"]["count"]
    Phi = n * s["sweep"]["rateHz"] / s["sampleRate"] + s["sweep"]["startPhase"]
    Phi = Phi + v * s["voices"]["phaseSpread"] / (360 * V) + c * s["sweep"]["stereoPhase"] / 360
    base = s["line"]["baseMs"]
    if loop:
        tau = base if s["loop"]["delay"] == "fixed" else law(s, base, shape(s["sweep"], Phi, 0))
        shaper = s["loop"]["shaper"]
        return tau * s["sampleRate"] / 1000 - (0.5 if shaper and shaper["antialias"] == "adaa1" else 0)
    offset = 0 if V == 1 else s["voices"]["spreadMs"] * (v / (V - 1) - 0.5)
    return law(s, base + offset, shape(s["sweep"], Phi, v)) * s["sampleRate"] / 1000


def delay(s, n, c, v, loop=False):
    K = s["sweep"]["updateEvery"]
    k = n // K
    d0 = evaluate(s, k * K, c, v, loop)
    if s["sweep"]["between"] == "hold":
        return d0
    d1 = evaluate(s, (k + 1) * K, c, v, loop)
    return d0 + (d1 - d0) * (n - k * K) / K


# --- reads ------------------------------------------------------------------------------------------------------------
class Reader:
    def __init__(self, kind):
        self.kind = kind
        self.y = 0.0

    def read(self, w, n, D):
        def at(i):
            return w[i] if 0 <= i < len(w) else 0.0 if i < 0 else 1 / 0

        if self.kind == "nearest":
            return at(n - math.floor(D + 0.5))
        if self.kind == "allpass1":
            M = math.floor(D - 0.5)
            d = D - M
            eta = (1 - d) / (1 + d)
            self.y = eta * at(n - M) + at(n - M - 1) - eta * self.y
            return self.y
        I = math.floor(D)
        f = D - I
        if self.kind == "linear":
            return (1 - f) * at(n - I) + f * at(n - I - 1)
        x = [at(n - I + 1), at(n - I), at(n - I - 1), at(n - I - 2)]
        if self.kind == "lagrange3":
            # h_n = prod over k of (D − k)/(n − k), with D = 1 + f between the points 0 … 3
            total = 0.0
            for i in range(4):
                h = 1.0
                for k in range(4):
                    if k != i:
                        h *= (1 + f - k) / (i - k)
                total += h * x[i]
            return total
        # Catmull-Rom: cubic with the points' central differences as slopes at its ends
        m1, m2 = (x[2] - x[0]) / 2, (x[3] - x[1]) / 2
        return (
            (2 * f**3 - 3 * f**2 + 1) * x[1] + (f**3 - 2 * f**2 + f) * m1 + (-2 * f**3 + 3 * f**2) * x[2] + (f**3 - f**2) * m2
        )


# --- filters ----------------------------------------------------------------------------------------------------------
class LowPass:
    def __init__(self, hz, fs):
        self.a = None if hz is None else math.exp(-2 * math.pi * hz / fs)
        self.y = 0.0

    def run(self, x):
        if self.a is None:
            return x
        self.y = (1 - self.a) * x + self.a * self.y
        return self.y


class HighPass:
    def __init__(self, hz, fs):
        self.b = None if hz is None else math.exp(-2 * math.pi * hz / fs)
        self.x = self.y = 0.0

    def run(self, x):
        if self.b is None:
            return x
        self.y = (1 + self.b) / 2 * (x - self.x) + self.b * self.y
        self.x = x
        return self.y


# --- shaper -----------------------------------------------------------------------------------------------------------
def k_of(p, t):
    curve = p["curve"]
    if curve == "hardClip":
        return min(t, 1.0)
    if curve == "arctan":
        return 2 / math.pi * math.atan(math.pi * t / 2)
    if curve == "tanh":
        return math.tanh(t)
    if curve == "cubic":
        return t - 4 * t**3 / 27 if t < 1.5 else 1.0
    if curve == "deadZone":
        return max(0.0, t - p["deadZone"])
    if curve == "diode":
        low, high = 0.0, t
        for _ in range(200):  # bisection to the last place
            v = (low + high) / 2
            if v in (low, high):
                break
            if v / 0.12 > 700 or v + 0.002 * math.sinh(v / 0.12) > t:
                high = v
            else:
                low = v
        return (low + high) / 2
    points = p["points"]
    for (t0, k0), (t1, k1) in zip(points, points[1:]):
        if t <= t1:
            return k0 + (k1 - k0) * (t - t0) / (t1 - t0)
    return points[-1][1]


def c_of(p, v):
    if v >= 0:
        return p["positive"] * k_of(p, v / p["positive"])
    return -p["negative"] * k_of(p, -v / p["negative"])


def corners(p):
    t = {"hardClip": [1.0], "cubic": [1.5], "deadZone": [p["deadZone"]], "drawn": [t for t, _ in p["points"]]}.get(p["curve"], [])
    return [0.0] + [p["positive"] * x for x in t] + [-p["negative"] * x for x in t]


def integral(p, a, b):
    """Of c from a to b, a < b: Gauss-Legendre on pieces without corners and no wider than a quarter of the smaller limit."""
    marks = [a] + sorted(x for x in set(corners(p)) if a < x < b) + [b]
    total = 0.0
    for low, high in zip(marks, marks[1:]):
        pieces = max(1, math.ceil((high - low) / (0.1 * min(p["positive"], p["negative"]))))
        step = (high - low) / pieces
        for i in range(pieces):
            middle = low + (i + 0.5) * step
            total += step / 2 * sum(w * c_of(p, middle + x * step / 2) for x, w in zip(NODES, WEIGHTS))
    return total


class ShaperUnit:
    def __init__(self, p):
        self.p = p
        self.v = 0.0

    def run(self, x):
        p = self.p
        if p is None:
            return x
        v = p["drive"] * x
        if p["antialias"] == "none":
            return p["ceiling"] * c_of(p, v)
        before, self.v = self.v, v
        if v == before:
            return p["ceiling"] * c_of(p, v)
        return p["ceiling"] * integral(p, min(v, before), max(v, before)) / abs(v - before)


# --- the path ---------------------------------------------------------------------------------------------------------
def render(s, x):
    fs = s["sampleRate"]
    lines = 2 if s["layout"] == "stereo" else 1
    outputs = 1 if s["layout"] == "mono" else 2
    V = s["voices"]["count"]
    frames = len(x[0])
    if len(x) > lines:
        x = [[sum(v) / len(x) for v in zip(*x)]] * lines
    elif len(x) < lines:
        x = [x[0]] * lines
    gain_in, gain_out = 10 ** (s["input"]["gainDb"] / 20), 10 ** (s["mix"]["outputGainDb"] / 20)
    shaper_in = [ShaperUnit(s["input"]["shaper"]) for _ in range(lines)]
    shaper_loop = [ShaperUnit(s["loop"]["shaper"]) for _ in range(lines)]
    shaper_out = [ShaperUnit(s["mix"]["shaper"]) for _ in range(outputs)]
    damping = [LowPass(s["loop"]["dampingHz"], fs) for _ in range(lines)]
    low_cut = [HighPass(s["loop"]["lowCutHz"], fs) for _ in range(lines)]
    wet_high = [LowPass(s["mix"]["wetHighCutHz"], fs) for _ in range(outputs)]
    wet_low = [HighPass(s["mix"]["wetLowCutHz"], fs) for _ in range(outputs)]
    loop_read = [Reader(s["loop"]["interpolation"]) for _ in range(lines)]
    reads = [[Reader(s["line"]["interpolation"]) for _ in range(V)] for _ in range(outputs)]
    g, k = s["loop"]["feedback"], s["loop"]["crossFeed"]
    X = [[1 - k, k], [k, 1 - k]] if lines == 2 else [[1.0]]
    late = math.floor(s["mix"]["dryDelayMs"] * fs / 1000 + 0.5)
    u = [[] for _ in range(lines)]
    w = [[] for _ in range(lines)]
    y = [[] for _ in range(outputs)]
    for n in range(frames):
        loops = []
        for c in range(lines):
            u[c].append(shaper_in[c].run(gain_in * x[c][n]))
            q = loop_read[c].read(w[c], n, delay(s, n, c, 0, True)) if g != 0 else 0.0
            loops.append(shaper_loop[c].run(low_cut[c].run(damping[c].run(q))))
        for c in range(lines):
            w[c].append(u[c][n] + g * sum(X[c][d] * loops[d] for d in range(lines)))
        for c in range(outputs):
            line = c if lines == 2 else 0
            wet = sum(reads[c][v].read(w[line], n, delay(s, n, c, v)) for v in range(V)) / math.sqrt(V)
            wet = wet_low[c].run(wet_high[c].run(wet))
            source = u if s["mix"]["dryTap"] == "input" else w
            dry = source[line][n - late] if n >= late else 0.0
            sign = -1 if s["mix"]["invertRight"] and c == 1 else 1
            y[c].append(gain_out * shaper_out[c].run(s["mix"]["dry"] * dry + sign * s["mix"]["wet"] * wet))
    return y


# --- random sets ------------------------------------------------------------------------------------------------------
SHAPES = ["sine", "triangle", "square", "rampUp", "rampDown", "drift", "drawn"]
KINDS = ["nearest", "linear", "lagrange3", "hermite4", "allpass1"]
CURVES = ["hardClip", "arctan", "tanh", "cubic", "diode", "deadZone", "drawn"]
LAYOUTS = ["mono", "stereo", "monoToStereo"]


def drawn_shaper(r):
    t = sorted({round(r.uniform(0.05, 3), 3) for _ in range(r.randint(1, 6))})
    return [[0, 0]] + [[a, round(r.uniform(-0.2, 1), 3)] for a in t]


def a_shaper(r, curve, antialias, gain):
    """A shaper whose sector bound is at most about `gain`."""
    points = drawn_shaper(r) if curve == "drawn" else []
    steepest = max((abs(k) / t for t, k in points[1:]), default=1)
    drive = round(r.uniform(0.3, 6), 3)
    return {
        "curve": curve, "drive": drive, "ceiling": round(gain / drive / max(steepest, 1), 4), "positive": round(r.uniform(0.3, 1.5), 3),
        "negative": round(r.uniform(0.3, 1.5), 3), "deadZone": round(r.uniform(0, 0.4), 3) if curve == "deadZone" else 0, "points": points,
        "tableSize": 1024, "tableRange": 1, "tableInterpolation": "linear", "antialias": antialias,
    }


def a_set(r, i):
    fs = r.choice([8000, 44100, 48000, 96000])
    shape_kind = SHAPES[i % 7]
    voice_kind = KINDS[i % 5]
    loop_kind = KINDS[(i // 5) % 5]
    voices = [1, 2, 3, 8, 1, 5][i % 6]
    sample = 1000 / fs
    close = i % 6 == 5  # down to the interpolators' limits, where a loop can only be run sample by sample
    base = round((r.uniform(4, 12) if close else r.uniform(40, 170)) * sample, 4)
    spread = round(r.uniform(0, 0.2 if close else 0.5) * base, 4) if r.random() < 0.7 else 0
    least = base - spread / 2 - (2.6 if close else 3) * sample
    octaves = round(max(0, min(2, math.log2((base - spread / 2) / (2.6 * sample)))) * r.uniform(0, 0.99), 4)
    looped = i % 4 != 3
    points = []
    if shape_kind == "drawn":
        xs = sorted({round(r.random() * 0.999, 3) for _ in range(r.randint(2, 9))} | {0.5})
        xs = xs if len(xs) > 1 else [0.25, 0.5]
        points = [[a, round(r.uniform(-1, 1), 3)] for a in xs]

    def shaper(where, offset, gain):
        if (i + offset) % 3 != 0:
            return None
        curve = CURVES[(i // 3 + offset) % 7]
        return a_shaper(r, curve, "adaa1" if (i // 6 + offset) % 2 else "none", gain)

    return {
        "format": "combwright-set", "version": 1, "name": f"case {i}", "notes": "", "intent": "other", "sampleRate": fs,
        "layout": LAYOUTS[(i // 2) % 3],
        "input": {"gainDb": round(r.uniform(-6, 3), 2) if i % 2 else 0, "shaper": shaper("input", 0, 1.5)},
        "line": {"baseMs": base, "interpolation": voice_kind},
        "sweep": {
            "shape": shape_kind, "rateHz": 0 if i % 17 == 16 else round(10 ** r.uniform(-0.5, 2), 3), "law": ["time", "ratio"][(i // 3) % 2],
            "depthMs": round(least * r.uniform(0.1, 0.95), 4), "depthOctaves": octaves, "startPhase": round(r.random(), 4),
            "stereoPhase": round(r.uniform(-360, 360), 1), "edgeMs": 0 if i % 5 == 4 else round(10 ** r.uniform(-1, 2), 3),
            "seed": r.randrange(2**32), "points": points, "updateEvery": [1, 2, 4, 8, 16, 32, 64][(i // 7 + i) % 7], "between": ["ramp", "hold"][(i // 7) % 2],
        },
        "voices": {"count": voices, "phaseSpread": round(r.uniform(-360, 360), 1), "spreadMs": spread},
        "loop": {
            "feedback": round(r.uniform(0.3, 0.85) * r.choice([-1, 1]), 3) if looped else 0, "delay": ["moving", "fixed"][(i // 4) % 2],
            "interpolation": loop_kind, "dampingHz": round(10 ** r.uniform(2, 4.3), 1) if r.random() < 0.5 else None,
            "lowCutHz": round(10 ** r.uniform(0.5, 3), 1) if r.random() < 0.5 else None, "crossFeed": round(r.random(), 3) if i % 2 else 0,
            "shaper": shaper("loop", 1, 0.9),
        },
        "mix": {
            "dry": round(r.uniform(-1, 1), 4), "wet": round(r.uniform(-1.2, 1.2), 4), "dryTap": ["input", "line"][(i // 3) % 2],
            "dryDelayMs": round(r.uniform(0, 60) * sample, 4) if i % 3 == 1 else 0, "wetLowCutHz": round(10 ** r.uniform(1, 3), 1) if i % 5 == 2 else None,
            "wetHighCutHz": round(10 ** r.uniform(3, 4.3), 1) if i % 4 == 2 else None, "invertRight": i % 3 == 2,
            "outputGainDb": round(r.uniform(-6, 3), 2) if i % 2 == 0 else 0, "shaper": shaper("mix", 2, 1.2),
        },
        "panel": [], "limits": {},
        "target": {
            "part": "cortex-m4", "numberFormat": "q15", "ramBytes": 65536, "flashBytes": 262144, "clockHz": 96000000, "cpuShare": 0.5,
            "blockSize": 32, "headroomDb": 12, "cyclesPerSample": None,
        },
    }


def main():
    r = random.Random(20260731)
    cases = []
    for i in range(84):
        s = a_set(r, i)
        frames = 640
        channels = [1, 2, 2, 3][i % 4]
        seeds = [r.randrange(2**32) for _ in range(channels)]
        out = render(s, [noise(seed, frames) for seed in seeds])
        at = sorted(r.sample(range(frames), 60) + [0, frames - 1])
        cases.append({
            "set": s, "frames": frames, "seeds": seeds, "at": at, "out": [[y[n] for n in at] for y in out],
            "peak": max(abs(v) for y in out for v in y), "sum": [sum(y) for y in out],
        })
    print(json.dumps({"cases": cases}))


main()
