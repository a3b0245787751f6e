"""Averaged spectra by scipy.signal. Prints JSON. Samples: the Lehmer generator of fft.py plus an offset and a saw."""
import json

import numpy as np
from scipy import signal

RATE = 64.0


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5 + 3 + 0.25 * (i % 7)
    return out


def welch(n, segment, step, average, detrend):
    x = samples(n, 11)
    _, p = signal.welch(
        x, RATE, signal.get_window("hann", segment), nperseg=segment, noverlap=segment - step,
        average=average, detrend="constant" if detrend == "constant" else False,
    )
    return {"n": n, "segment": segment, "step": step, "average": average, "detrend": detrend, "density": p.tolist()}


def pair(n, segment, step):
    x = samples(n, 11)
    y = 0.5 * x + samples(n, 12)
    kw = dict(nperseg=segment, noverlap=segment - step, window=signal.get_window("hann", segment))
    _, c = signal.csd(x, y, RATE, **kw)
    _, g = signal.coherence(x, y, RATE, **kw)
    return {"n": n, "segment": segment, "step": step, "re": c.real.tolist(), "im": c.imag.tolist(), "coherence": g.tolist()}


def magnitudes(n, segment, step):
    x, w = samples(n, 11), signal.get_window("hann", segment)
    m = np.abs([np.fft.rfft((s - s.mean()) * w) for s in np.lib.stride_tricks.sliding_window_view(x, segment)[::step]])
    return {"n": n, "segment": segment, "step": step, "mean": m.mean(axis=0).tolist(), "variance": m.var(axis=0).tolist()}


CASES = [(3000, 256, 128), (3000, 255, 127), (2900, 100, 50), (2048, 33, 17), (700, 256, 128), (256, 256, 128), (2000, 90, 90)]
print(json.dumps({
    "rate": RATE,
    "welch": [welch(*c, a, d) for c in CASES for a in ("mean", "median") for d in ("constant", "none")],
    "pair": pair(3000, 200, 100),
    "magnitudes": magnitudes(3000, 200, 100),
}))
