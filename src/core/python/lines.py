import math

import numpy as np
from scipy import optimize, special

# not computed families: because the search for them is our own and has no counterpart in SciPy
# not computed drifting: because it compares the lines of parts of the time, which would be this function four times over
# tolerance threshold: rel 1e-6, because a shape of the law is found by a search in both
# tolerance lines: abs 1e-9, a count


def lines(
    x, rate_hz, start_gps, *spectrum, segment_s, overlap, window, average, false_alarms, floor_width_hz, low_hz, high_hz, mains_hz, exclude_s
):
    """Narrow features above a running median of an averaged spectrum: how many, and frequency, height and power of the strongest.

    The threshold over the floor is what one bin of Gaussian noise exceeds with probability false_alarms / bins: a median of exponential
    variables (David & Nagaraja, Order Statistics, 2003, 2.1) or a gamma variable, with the variance of the overlapping average. A given
    spectrum has no equivalent here. mains_hz is used by the search for harmonic families alone, which is not computed.
    """
    if spectrum and spectrum[0] is not None:
        raise NotImplementedError("lines in a given spectrum have no equivalent in Python")
    starts, size, step, _ = segment_starts(x, rate_hz, segment_s, overlap, exclude_s)
    w = make_window(window, size)
    power = np.abs(segment_transforms(x, starts, w, "constant")) ** 2
    n = len(starts)
    averaged = np.median(power, axis=0) / median_bias(n) if average == "median" else np.mean(power, axis=0)
    density = averaged / (rate_hz * np.sum(w**2))
    density[1 : -1 if size % 2 == 0 else None] *= 2
    df = rate_hz / size
    variance = median_variance(w, step, n) if average == "median" else mean_variance(w, step, n)
    margin = detrended_bins(window) + 1
    usable = (margin, len(density) - margin)
    frequency = np.arange(len(density)) * df
    asked = np.flatnonzero((frequency >= (low_hz or 0) * (1 - 1e-12)) & (frequency < (np.inf if high_hz is None else high_hz) * (1 + 1e-12)))
    first, last = max(asked[0], usable[0] + 12), min(asked[-1] + 1, usable[1] - 12)
    half = max(32, math.floor(3 / df + 0.5)) if floor_width_hz is None else max(12, math.floor(floor_width_hz / df / 2 + 0.5))
    # Correlation of neighbouring bins through the window; windows longer than 16384 samples are thinned by Fringeside too.
    thin = w[:: max(1, size // 16384)]
    k = np.arange(size)[:: max(1, size // 16384)]
    neighbours = 1.0
    for d in range(1, min(13, math.ceil(size / 2))):
        r = np.abs(np.sum(thin**2 * np.exp(-2j * np.pi * d * k / size))) ** 2 / np.sum(thin**2) ** 2
        neighbours += 2 * r
        if r < 1e-6:
            break

    def law(v):
        """Median of one bin over its mean, and the value exceeded with a probability."""
        if average == "mean":
            return special.gammaincinv(1 / v, 0.5) * v, lambda p: special.gammainccinv(1 / v, p) * v
        m = math.exp(
            optimize.brentq(
                lambda u: (special.polygamma(1, math.exp(u)) - special.polygamma(1, 2 * math.exp(u)))
                / (special.digamma(2 * math.exp(u)) - special.digamma(math.exp(u))) ** 2
                - v,
                math.log(0.51),
                math.log(1e7),
                xtol=1e-14,
            )
        )
        mean = special.digamma(2 * m) - special.digamma(m)
        return math.log(2) / mean, lambda p: -math.log(special.betaincinv(m, m, p)) / mean

    _, above = law(variance * (1 + math.pi / 2 * neighbours / (2 * half)))
    threshold = float(above(min(0.5, false_alarms / (last - first))))
    middle, _ = law(variance)
    enbw = size * np.sum(w**2) / np.sum(w) ** 2
    reach = max(2, math.ceil(2 * enbw - 1e-9))
    masked = np.zeros(len(density), bool)
    for rounds in range(3):
        floor = np.full(len(density), np.nan)
        clean = np.where(masked, np.nan, density)
        for b in range(usable[0] + 12, usable[1] - 12):
            side = min(half, b - usable[0], usable[1] - 1 - b)
            inside = clean[b - side : b + side + 1]
            crowded = 2 * np.count_nonzero(~np.isnan(inside)) < len(inside)
            floor[b] = np.median(density[b - side : b + side + 1] if crowded else inside[~np.isnan(inside)]) / middle
        peaks = line_peaks(density, floor, threshold, first, last, reach, half)
        if rounds == 2 or not peaks:
            break
        masked[:] = False
        for a, b, _at in peaks:
            masked[max(0, a - reach) : b + reach] = True
    # Full width of the window's main lobe at half power, in bins.
    t = np.arange(size) - (size - 1) / 2
    lobe = 2 * optimize.brentq(lambda u: abs(np.sum(w * np.exp(-2j * np.pi * u * t / size))) / np.sum(w) - math.sqrt(0.5), 1e-9, enbw, xtol=1e-12)
    found = []
    for i, (_, _, at) in enumerate(peaks):
        low = max(usable[0], math.ceil((peaks[i - 1][2] + at) / 2) if i > 0 else 0)
        high = min(usable[1], math.floor((peaks[i + 1][2] + at) / 2) + 1 if i + 1 < len(peaks) else len(density))
        found.append(line_shape(density, floor, df, lobe, at, low, high))
    numbers = {
        "lines": len(found),
        "unresolved": sum(s["unresolved"] for s in found),
        "threshold": threshold,
        "false-alarms": false_alarms,
        "bins": last - first,
    }
    if found:
        strongest = max(found, key=lambda s: s["height"])
        numbers.update({"strongest": strongest["frequency_hz"], "strongest-height": strongest["height"], "strongest-power": strongest["power"]})
    return {"lines": found, "numbers": numbers}
