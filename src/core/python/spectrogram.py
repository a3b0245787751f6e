import math

import numpy as np
from scipy import signal

# tolerance loudest: rel 1e-5, because Fringeside keeps a cell in float32


def spectrogram(x, rate_hz, start_gps, *, start_at_gps, duration_s, segment_s, overlap, window, scale, low_hz, high_hz):
    """One-sided densities of mean-free windowed segments against time, or their power over the median of each frequency.

    x: samples, NaN where not valid; segments that touch one are left out. scale: "density" (amplitude) or "over-median" (power).
    Source: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967).
    """
    size = int(math.floor(segment_s * rate_hz + 0.5))
    step = max(1, int(math.floor(size * (1 - overlap) + 0.5)))
    good = np.flatnonzero(np.isfinite(x))
    first = good[0] if start_at_gps is None else round((start_at_gps - start_gps) * rate_hz)
    last = good[-1] + 1 if duration_s is None else min(len(x), first + round(duration_s * rate_hz))
    w = make_window(window, size)
    df = rate_hz / size
    high = min(size // 2, math.floor((rate_hz / 2 if high_hz is None else high_hz) / df + 1e-9))
    low = max(1, math.ceil(low_hz / df - 1e-9))
    _, times, power = signal.spectrogram(
        x[first:last], fs=rate_hz, window=w, nperseg=size, noverlap=size - step, nfft=size, detrend="constant", return_onesided=True, scaling="density", mode="psd"
    )
    power = power[low : high + 1]
    cells = power / np.nanmedian(power, axis=1, keepdims=True) if scale == "over-median" else np.sqrt(power)
    row, column = np.unravel_index(np.nanargmax(cells), cells.shape)
    return {
        "frequency_hz": np.arange(low, high + 1) * df,
        "time_s": times,
        "cells": cells,
        "numbers": {
            "segments": int(np.isfinite(power[0]).sum()),
            "resolution": rate_hz * np.sum(w**2) / np.sum(w) ** 2,
            "loudest": cells[row, column],
            "loudest-time": times[column],
            "loudest-frequency": (low + row) * df,
        },
    }
