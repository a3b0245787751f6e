"""Quantiles of F by scipy.stats, straight lines in log-log by NumPy, ratio of two Welch estimates by scipy.signal. Prints JSON.

Samples: the Lehmer generator of fft.py (Park and Miller, CACM 31, 1192, 1988).
"""
import json

import numpy as np
from scipy import signal, special, stats

RATE = 512.0


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5
    return out


def density(n, seed, size):
    return signal.welch(samples(n, seed), RATE, "hann", size, average="mean")


def ratio():
    f, a = density(20000, 21, 512)
    g, b = density(30000, 22, 128)
    return {
        "same": np.sqrt(a / density(20000, 23, 512)[1]).tolist(),
        "coarse": {
            "frequency": g[1:].tolist(),
            "ratio": np.sqrt(np.exp(np.interp(np.log(g[1:]), np.log(f[1:]), np.log(a[1:]))) / b[1:]).tolist(),
        },
    }


FREEDOMS = [(2, 2), (2, 30), (9.5, 40), (250, 240), (3000, 12)]
X = [0.1, 0.5, 1, 1.9, 3, 9.99, 10, 25.5, 300]
print(json.dumps({
    "rate": RATE,
    "f": [[p, a, b, stats.f.ppf(p, a, b), stats.f.isf(p, a, b)] for p in (1e-7, 1e-3, 0.05, 0.5) for a, b in FREEDOMS],
    "digamma": [[x, float(special.digamma(x))] for x in X],
    "trigamma": [[x, float(special.polygamma(1, x))] for x in X],
    "ratio": ratio(),
}))
