"""Transforms by SciPy in long double, rounded to double. Prints JSON.

Samples: a Lehmer generator (16807 s mod 2^31 - 1; Park and Miller, CACM 31, 1192, 1988), reduced to 24 bits so that
they are exact in float32 too.
"""
import json

import numpy as np
import scipy.fft as sf


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5
    return out


FULL = [1, 2, 3, 4, 5, 6, 7, 8, 9, 11, 12, 15, 16, 17, 20, 24, 25, 27, 31, 32, 40, 48, 60, 64, 97, 100, 105, 128]
LONG = [240, 243, 256, 331, 512, 1000, 1021, 1024, 2048, 3125, 4096, 4099, 6561, 8192, 10240, 16384, 20480, 32768]
HUGE = [65536, 98304, 131072, 262144, 1048576]


def case(n):
    re, im = samples(n, n + 1), samples(n, n + 2)
    x = re.astype(np.longdouble) + 1j * im.astype(np.longdouble)
    y = sf.fft(x)
    assert y.dtype == np.clongdouble
    r = sf.rfft(re.astype(np.longdouble))
    bins = list(range(n)) if n in FULL else sorted({(k * 7919 * 13) % n for k in range(24)} | {0, n // 2, n - 1})
    half = [k for k in bins if k <= n // 2]
    rms = float(np.sqrt(np.mean(np.abs(y) ** 2)))
    return {
        "n": n,
        "bins": bins,
        "re": [float(v) for v in y.real[bins]],
        "im": [float(v) for v in y.imag[bins]],
        "rms": rms,
        "realRe": [float(v) for v in r.real[half]],
        "realIm": [float(v) for v in r.imag[half]],
    }


print(json.dumps({"cases": [case(n) for n in FULL + LONG + HUGE]}))
