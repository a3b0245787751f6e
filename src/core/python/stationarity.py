import math

import numpy as np
from scipy import stats


def stationarity(x, rate_hz, start_gps, *, bands_hz, stride_s, segment_s, overlap, window, reach_from_hz, exclude_s):
    """Power in bands and relative reach per stride of time, against the scatter that steady Gaussian noise has.

    x: samples, NaN where not valid. The expected scatter of a sum over bins follows from the correlation of neighbouring bins and of
    overlapping segments through the window. Source: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967).
    """
    size, stride = int(math.floor(segment_s * rate_hz + 0.5)), int(math.floor(stride_s * rate_hz + 0.5))
    step = max(1, size - math.floor(size * overlap + 1e-9))
    w = make_window(window, size)
    used = np.isfinite(x)
    for a, b in exclude_s:
        used[max(0, math.floor(a * rate_hz)) : max(0, math.ceil(b * rate_hz))] = False
    strides = len(x) // stride
    whole = (stride - size) // step + 1
    powers, counts = [], []
    for s in range(strides):
        part = np.where(used, x, np.nan)[s * stride : (s + 1) * stride]
        starts = [k for a, b in valid_runs(part) for k in range(a, b - size + 1, step)]
        counts.append(len(starts) if 2 * len(starts) >= whole else 0)
        if counts[-1] == 0:
            powers.append(None)
            continue
        pieces = np.array([part[k : k + size] for k in starts])
        pieces = (pieces - pieces.mean(axis=1, keepdims=True)) * w
        powers.append(np.mean(np.abs(np.fft.rfft(pieces, axis=1)) ** 2, axis=0))
    good = [p for p in powers if p is not None]
    df, last = rate_hz / size, math.ceil(size / 2)
    sums = []
    for low, high in bands_hz:
        if low < last * df:
            bins = np.arange(max(1, math.ceil(low / df - 1e-9)), min(last, math.floor(min(high, last * df) / df + 1e-9) + 1))
            sums.append((bins, lambda p, b: p[b], 1.0, False))
    first = max(1, math.ceil(reach_from_hz / df - 1e-9))
    if last - first >= 4:
        sums.append((np.arange(first, last), lambda p, b: (b * df) ** (-7 / 3) / p[b], 0.5, True))
    segments = math.floor(np.median([c for c in counts if c > 0]) + 0.5)
    n = np.arange(size)
    covariance = []
    for d in range(9):
        total = 0.0
        for j in range(-(-size // step)):
            if j >= segments:
                break
            lag = j * step
            product = w[: size - lag] * w[lag:] if lag else w * w
            r = np.abs(np.sum(product * np.exp(-2j * np.pi * d * n[: len(product)] / size))) ** 2 / np.sum(w * w) ** 2
            total += r if j == 0 else 2 * (1 - j / segments) * r
        covariance.append(total / segments)
    numbers = {"strides": len(good)}
    for i, (bins, weigh, exponent, inverse) in enumerate(sums):
        parts = np.array([weigh(p, bins) for p in good])
        mean = parts.mean(axis=0)
        square = covariance[0] * np.sum(mean**2) + sum(2 * covariance[d] * np.sum(mean[:-d] * mean[d:]) for d in range(1, 9) if d < len(mean))
        wider = (1 / covariance[0]) / (1 / covariance[0] - 2) if inverse and 1 / covariance[0] > 3 else 1.0
        expected = exponent * math.sqrt(wider * square / np.sum(mean) ** 2)
        values = parts.sum(axis=1) ** exponent
        values = values / np.median(values)
        chi2 = np.sum(((values - values.mean()) / expected) ** 2)
        numbers[f"expected-{i + 1}"] = 100 * expected
        numbers[f"excess-{i + 1}"] = math.sqrt(chi2 / (len(values) - 1))
        numbers[f"p-value-{i + 1}"] = stats.chi2.sf(chi2, len(values) - 1)
    return {"numbers": numbers}
