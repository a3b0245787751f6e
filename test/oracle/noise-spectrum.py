"""Noise spectra of the step by scipy.signal, its error by scipy.stats, statistics by NumPy. Prints JSON.

Samples: the Lehmer generator of fft.py (Park and Miller, CACM 31, 1192, 1988), scaled like strain.
"""
import json

import numpy as np
from scipy import signal, special, stats

RATE, SCALE = 512.0, 1e-21


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5
    return out


def strain(n):
    """Noise on an offset, with a line at 60 Hz."""
    t = np.arange(n) / RATE
    return SCALE * (samples(n, 21) + 0.3 + 0.1 * np.sin(2 * np.pi * 60 * t))


def welch(n, segment, overlap, window, average):
    size = round(segment * RATE)
    f, p = signal.welch(
        strain(n), RATE, signal.get_window(window, size), nperseg=size, noverlap=int(size * overlap), average=average
    )
    band = (f >= 100) & (f <= 200)
    w = signal.get_window(window, size)
    return {
        "n": n, "segment": segment, "overlap": overlap, "window": window, "average": average,
        "density": (p / SCALE**2).tolist(),
        "floor": np.median(np.sqrt(p[band])) / SCALE,
        "enbw": RATE * np.sum(w**2) / np.sum(w) ** 2,
        "parseval": np.sqrt(np.sum(p) * RATE / size) / SCALE,
    }


def gappy(spans, segment, average):
    """Segments laid into each span on its own, half overlapping."""
    x, size = strain(6000), round(segment * RATE)
    w = signal.get_window("hann", size)
    rows = []
    for a, b in spans:
        for at in range(a, b - size + 1, size - size // 2):
            s = x[at : at + size]
            p = np.abs(np.fft.rfft((s - s.mean()) * w)) ** 2 * 2 / (RATE * np.sum(w**2))
            p[0] /= 2
            if size % 2 == 0:
                p[-1] /= 2
            rows.append(p)
    rows = np.array(rows)
    k = len(rows)
    bias = np.sum((-1.0) ** np.arange(k if k % 2 else k - 1) / np.arange(1, (k if k % 2 else k - 1) + 1))
    p = rows.mean(axis=0) if average == "mean" else np.median(rows, axis=0) / bias
    return {"spans": spans, "segment": segment, "average": average, "segments": k, "density": (p / SCALE**2).tolist()}


def moments(n):
    x = strain(n) / SCALE
    return {
        "n": n, "min": x.min(), "max": x.max(), "mean": x.mean(), "rms": np.sqrt(np.mean(x**2)), "deviation": x.std(),
        "width": stats.median_abs_deviation(x, scale="normal"),
    }


CASES = [
    (8192, 1.0, 0.5, "hann"), (8192, 255 / RATE, 0.5, "hann"), (8000, 0.5, 0.75, "blackman"),
    (8000, 101 / RATE, 0.0, "boxcar"), (6000, 1.0, 0.5, "flattop"), (5000, 0.75, 0.5, "hamming"), (512, 1.0, 0.5, "hann"),
]
PROBABILITIES = [1e-6, 0.05, 0.5, 0.95, 0.999999]
FREEDOMS = [0.4, 1, 2, 3.7, 30, 250.5, 4000, 200000]
print(json.dumps({
    "rate": RATE,
    "scale": SCALE,
    "welch": [welch(*c, a) for c in CASES for a in ("mean", "median")],
    "gappy": [gappy([[0, 1500], [1501, 2000], [2300, 6000]], s, a) for s in (1.0, 255 / RATE) for a in ("mean", "median")],
    "moments": moments(7001),
    "chi2": [[p, v, stats.chi2.ppf(p, v)] for p in PROBABILITIES for v in FREEDOMS],
    "gamma": [[a, x, float(special.gammainc(a, x))] for a in (0.3, 1, 5.5, 80, 3000) for x in (1e-3, 0.5, 4, 90, 3100)],
}))
