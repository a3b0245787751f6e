"""Magnitude-squared coherence by scipy.signal.coherence, and over segments between gaps by NumPy. Prints JSON.

Samples: the Lehmer generator of fft.py (Park and Miller, CACM 31, 1192, 1988), scaled like strain.
"""
import json

import numpy as np
from scipy import signal

RATE = 512.0


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5
    return out


def pair(n):
    """Two channels with independent noise, a common line at 60 Hz, and noise common to both, delayed by 3 samples."""
    t = np.arange(n) / RATE
    common = samples(n + 3, 5)
    line = 0.05 * np.sin(2 * np.pi * 60 * t)
    first = samples(n, 21) + 0.5 * common[3:] + line + 0.2
    second = 0.8 * samples(n, 22) + 0.3 * common[:-3] + line
    return 1e-21 * first, 3e-22 * second


def whole(n, segment, overlap, window, detrend):
    a, b = pair(n)
    size = round(segment * RATE)
    kw = {"nperseg": size, "noverlap": int(size * overlap), "detrend": detrend, "window": signal.get_window(window, size)}
    _, c = signal.coherence(a, b, RATE, **kw)
    _, cross = signal.csd(a * 1e21, b * 1e21, RATE, **kw)
    return {
        "n": n, "segment": segment, "overlap": overlap, "window": window,
        "detrend": "none" if detrend is False else detrend, "coherence": c.tolist(),
        "re": cross.real.tolist(), "im": cross.imag.tolist(),
    }


def gappy(n, spans, size):
    a, b = pair(n)
    w = signal.get_window("hann", size)
    paa, pbb, pab, k = 0, 0, 0, 0
    for lo, hi in spans:
        for at in range(lo, hi - size + 1, size // 2):
            x, y = (np.fft.rfft((s[at : at + size] - s[at : at + size].mean()) * w) for s in (a, b))
            paa, pbb, pab, k = paa + abs(x) ** 2, pbb + abs(y) ** 2, pab + x * np.conj(y), k + 1
    return {"n": n, "spans": spans, "size": size, "segments": k, "coherence": (abs(pab) ** 2 / paa / pbb).tolist()}


print(json.dumps({
    "rate": RATE,
    "whole": [
        whole(8192, 1.0, 0.5, "hann", "constant"), whole(8000, 255 / RATE, 0.5, "hann", "constant"),
        whole(8000, 0.5, 0.75, "blackman", "constant"), whole(6000, 101 / RATE, 0.0, "boxcar", False),
        whole(6000, 0.5, 0.5, "flattop", "constant"),
    ],
    "gappy": gappy(6000, [[0, 1500], [1501, 2000], [2300, 6000]], 256),
}))
