"""Second-order sections run by scipy.signal. Prints JSON. Samples: the Lehmer generator of fft.py."""
import json

import numpy as np
from scipy import signal


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5
    return out


def notch(f, q, rate):
    b, a = signal.iirnotch(f, q, rate)
    return np.concatenate([b, a])[None]


RATE = 4096
FILTERS = {
    "band-pass 8": signal.butter(8, [30, 400], "bandpass", fs=RATE, output="sos"),
    "band-pass 8 and 5 notches": np.vstack(
        [signal.butter(8, [30, 400], "bandpass", fs=RATE, output="sos")]
        + [notch(f, 30, RATE) for f in (60, 120, 180, 240, 300)]
    ),
    "high-pass 3": signal.butter(3, 20, "highpass", fs=RATE, output="sos"),
    "low-pass 5": signal.cheby1(5, 1, 500, "lowpass", fs=RATE, output="sos"),
    "one section": signal.butter(2, 100, "lowpass", fs=RATE, output="sos"),
    "first order": signal.butter(1, 100, "lowpass", fs=RATE, output="sos"),
}


def case(name, sos, n):
    x = samples(n, n) + 0.5
    zi = signal.sosfilt_zi(sos)
    y, zf = signal.sosfilt(sos, x, zi=zi * x[0])
    z = signal.sosfiltfilt(sos, x)
    keep = list(range(n)) if n < 100 else list(range(0, n, max(1, n // 60)))
    return {
        "name": name, "sos": sos.tolist(), "n": n, "zi": zi.ravel().tolist(), "keep": keep,
        "causal": y[keep].tolist(), "zf": zf.ravel().tolist(), "both": z[keep].tolist(),
    }


print(json.dumps({"cases": [case(k, s, n) for k, s in FILTERS.items() for n in (90, 1000, 20000)]}))
