"""Integrated, momentary and short-term loudness of a made-up stereo programme, by scipy.signal.lfilter with the 48 kHz coefficients that
ITU-R BS.1770-5 Annex 1 prints in Tables 1 and 2. The programme is noise of numpy's Mersenne Twister, whose level changes so that both gates act."""
import json

import numpy as np
from scipy.signal import lfilter

FS = 48000
SHELF = ([1.53512485958697, -2.69169618940638, 1.19839281085285], [1, -1.69065929318241, 0.73248077421585])
HIGH_PASS = ([1, -2, 1], [1, -1.99004745483398, 0.99007225036621])
# Seed, then (gain, seconds) of each part: loud, soft (under the relative gate), nearly silent (under the absolute gate), loud.
SEED = 1770
PARTS = [(0.2, 3.0), (0.02, 2.0), (0.0002, 1.5), (0.1, 4.3)]

gain = np.concatenate([np.full(round(s * FS), g) for g, s in PARTS])
random = np.random.RandomState(SEED)
left = (2 * random.random_sample(len(gain)) - 1) * gain
right = (2 * random.random_sample(len(gain)) - 1) * gain * 0.5

energy = np.zeros(len(gain))
for x in (left, right):
    energy += lfilter(*HIGH_PASS, lfilter(*SHELF, x)) ** 2


def lufs(z):
    return -0.691 + 10 * np.log10(z)


def windows(seconds):
    n, hop = round(seconds * FS), FS // 10
    return np.array([np.mean(energy[a : a + n]) for a in range(0, len(energy) - n + 1, hop)])


blocks = windows(0.4)
loud = blocks[lufs(blocks) > -70]
gated = loud[lufs(loud) > lufs(np.mean(loud)) - 10]
print(
    json.dumps(
        {
            "seed": SEED,
            "parts": PARTS,
            "integrated": lufs(np.mean(gated)),
            "blocks": [len(blocks), len(loud), len(gated)],
            "momentary": list(lufs(windows(0.4))),
            "shortTerm": list(lufs(windows(3.0))),
        },
        indent=1,
    )
)
