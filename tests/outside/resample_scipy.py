"""Sample rate conversion by scipy.signal.resample_poly with a long FIR filter of scipy.signal.firwin (Kaiser window, 130 dB, transition from
0.9 to 1 of the slower Nyquist frequency), of noise of numpy's Mersenne Twister that is first cleared above 0.85 of it."""
import json
from math import gcd

import numpy as np
from scipy.signal import firwin, kaiserord, resample_poly

SEED = 4410
FRAMES = 600
CASES = [(44100, 48000), (48000, 44100), (48000, 96000), (96000, 48000), (48000, 32000)]
KEEP = 40


def noise(rate, top):
    """Noise of FRAMES samples as it comes from the generator, and the same cleared above `top` Hz by its transform."""
    x = 2 * np.random.RandomState(SEED).random_sample(FRAMES) - 1
    spectrum = np.fft.rfft(x)
    spectrum[np.fft.rfftfreq(FRAMES, 1 / rate) > top] = 0
    return np.fft.irfft(spectrum, FRAMES) * np.hanning(FRAMES)


out = []
for rate, to in CASES:
    up, down = to // gcd(rate, to), rate // gcd(rate, to)
    slower = min(rate, to)
    # At the rate in between, up times the input's.
    nyquist = rate * up / 2
    taps, beta = kaiserord(130, 0.1 * slower / 2 / nyquist)
    taps = 2 * (taps // 2) + 1
    filter = firwin(taps, 0.95 * slower / 2 / nyquist, window=("kaiser", beta))
    x = noise(rate, 0.85 * slower / 2)
    y = resample_poly(x, up, down, window=filter)
    middle = len(y) // 2
    out.append({"from": rate, "to": to, "input": list(x), "length": len(y), "at": middle, "output": list(y[middle : middle + KEEP])})
print(json.dumps({"cases": out}))
