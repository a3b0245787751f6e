"""High-pass, band-pass and notch by scipy.signal on noise with a gap. Prints JSON. Noise: the Lehmer generator of fft.py."""
import json

import numpy as np
from scipy import signal

RATE = 2048
N = 8192


def samples(n, seed):
    out, s = np.empty(n), seed
    for i in range(n):
        s = s * 16807 % 2147483647
        out[i] = (s >> 7) / 2**24 - 0.5
    return out


X = samples(N, 5)


def sections(notches, q):
    return np.vstack([np.concatenate(signal.iirnotch(f, q, RATE))[None] for f in notches])


FILTERS = {
    "high-pass butterworth": signal.butter(4, 20, "highpass", fs=RATE, output="sos"),
    "high-pass elliptic": signal.ellip(5, 0.5, 60, 40, "highpass", fs=RATE, output="sos"),
    "band-pass chebyshev-1": signal.cheby1(3, 1, [30, 300], "bandpass", fs=RATE, output="sos"),
    "band-pass chebyshev-2": signal.cheby2(4, 50, [20, 400], "bandpass", fs=RATE, output="sos"),
    "notch": sections([60, 120, 180], 20),
}


def both(sos, x):
    return signal.sosfiltfilt(sos, x)


def causal(sos, x):
    return signal.sosfilt(sos, x, zi=signal.sosfilt_zi(sos) * x[0])[0]


KEEP = list(range(0, N, 61))
print(
    json.dumps(
        {
            name: {
                "keep": KEEP,
                "zero-phase": both(sos, X)[KEEP].tolist(),
                "causal": causal(sos, X)[KEEP].tolist(),
                # The second half alone, as after a gap that ends at N/2.
                "half": both(sos, X[N // 2 :])[: N // 2 : 61].tolist(),
            }
            for name, sos in FILTERS.items()
        }
    )
)
