"""scipy.signal.spectrogram of noise. Prints JSON. Noise: the Lehmer generator of fft.py."""
import json

import numpy as np
from scipy import signal


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5
    return out


x = samples(8192, 7)
f, t, p = signal.spectrogram(x, fs=1024, window=signal.get_window("hann", 512), noverlap=256, detrend="constant", scaling="density", mode="psd")
print(json.dumps({"f": f[10:60].tolist(), "t": t.tolist(), "root": np.sqrt(p[10:60]).tolist()}))
