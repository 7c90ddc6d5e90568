"""WAV files written by scipy.io.wavfile, and what scipy.io.wavfile reads in files given by name. With `write DIR` writes one file a format and prints
the samples it put in, as integers or doubles; with `read FILE…` prints rate and samples of each."""
import json
import sys

import numpy as np
from scipy.io import wavfile

RATE = 44100
FRAMES = 64


def written(folder):
    random = np.random.RandomState(10)
    x = 1.8 * random.random_sample((FRAMES, 2)) - 0.9
    out = {}
    for name, dtype, scale in [("u8", np.uint8, 128), ("i16", np.int16, 2**15), ("i32", np.int32, 2**31), ("f32", np.float32, 0), ("f64", np.float64, 0)]:
        data = (np.round(x * scale) + (128 if name == "u8" else 0)).astype(dtype) if scale else x.astype(dtype)
        wavfile.write(f"{folder}/{name}.wav", RATE, data)
        out[name] = data.T.tolist()
    return out


def read(files):
    out = []
    for file in files:
        rate, data = wavfile.read(file)
        out.append({"rate": rate, "dtype": str(data.dtype), "channels": np.atleast_2d(data.T).tolist()})
    return out


print(json.dumps(written(sys.argv[2]) if sys.argv[1] == "write" else read(sys.argv[2:])))
