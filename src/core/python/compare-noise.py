import numpy as np
from scipy import stats


def compare_noise(
    first_frequency_hz, first_density, second_frequency_hz, second_density, *,
    spectra, bands_hz, probability, false_bins, low_hz, high_hz
):  # fmt: skip
    """Ratio of the amplitude densities of two one-sided spectra, first over second, and the band that their errors explain.

    spectra: the two results, for the error, window and rate of those that are estimates. The ratio of two estimates with
    nu = 2/(relative error)^2 degrees of freedom each follows F (Abramowitz & Stegun 26.6). Frequencies that differ: the finer spectrum is
    interpolated straight in log density against log frequency. The median of n bins scatters by sqrt(pi/2) sigma/sqrt(n).
    """
    estimates = [s.get("estimate") for s in spectra]

    def on_grid(f, x, y):
        inside = (f >= x[0]) & (f <= x[-1])
        ok = (x > 0) & (y > 0)
        out = np.exp(np.interp(np.log(f), np.log(x[ok]), np.log(y[ok])))
        # A point without a positive density leaves a hole up to its neighbours.
        right = np.clip(np.searchsorted(x, f, side="left"), 0, len(x) - 1)
        left = np.where(x[right] == f, right, np.maximum(right - 1, 0))
        return np.where(inside & ok[left] & ok[right], out, np.nan)

    def spacing(x):
        d = np.diff(x)
        return d[0] if np.allclose(d, d[0], rtol=1e-6, atol=0) else 0.0

    count = min(len(first_frequency_hz), len(second_frequency_hz))
    a, b = first_frequency_hz[:count], second_frequency_hz[:count]
    if np.all(np.abs(a - b) <= 1e-9 * np.abs(a)):
        keep = a > 0
        frequency, first, second = a[keep], first_density[:count][keep], second_density[:count][keep]
    else:
        low, high = max(first_frequency_hz[0], second_frequency_hz[0]), min(first_frequency_hz[-1], second_frequency_hz[-1])
        if (estimates[0] is None) != (estimates[1] is None):
            keep_first = estimates[0] is not None
        else:
            keep_first = spacing(first_frequency_hz) >= spacing(second_frequency_hz)
        grid = first_frequency_hz if keep_first else second_frequency_hz
        keep = (grid > 0) & (grid >= low) & (grid <= high)
        frequency = grid[keep]
        if keep_first:
            first, second = first_density[keep], on_grid(frequency, second_frequency_hz, second_density)
        else:
            first, second = on_grid(frequency, first_frequency_hz, first_density), second_density[keep]

    lowest, highest = frequency[0], frequency[-1]
    for e in estimates:
        if e is not None:
            lowest = max(lowest, detrended_bins(e["window"]) * e["df_hz"])
            highest = min(highest, e["rate_hz"] / 2 - e["df_hz"] / 2)
    lowest = lowest if low_hz is None else low_hz
    highest = highest if high_hz is None else high_hz
    judged = (frequency >= lowest * (1 - 1e-12)) & (frequency < highest * (1 + 1e-12))
    with np.errstate(divide="ignore", invalid="ignore"):
        ratio = np.where(judged & (first > 0) & (second > 0), np.sqrt(first / second), np.nan)
    bins = int(np.count_nonzero(np.isfinite(ratio)))

    nu = [np.inf if e is None else 2 / e["relative_error"] ** 2 for e in estimates]

    def quantile(p, upper):
        if np.isinf(nu[0]) and np.isinf(nu[1]):
            return 1.0
        if np.isinf(nu[1]):
            f = (stats.chi2.isf if upper else stats.chi2.ppf)(p, nu[0]) / nu[0]
        elif np.isinf(nu[0]):
            f = nu[1] / (stats.chi2.ppf if upper else stats.chi2.isf)(p, nu[1])
        else:
            f = (stats.f.isf if upper else stats.f.ppf)(p, nu[0], nu[1])
        return np.sqrt(f)

    windows = [make_window(e["window"], 1024) for e in estimates if e is not None]
    side = (1 - probability) / 2
    rare = min(side, false_bins / (2 * bins))
    reach = max([2] + [int(np.ceil(2 * 1024 * np.sum(w**2) / np.sum(w) ** 2 - 1e-9)) for w in windows])
    numbers = {}
    first_judged, last_judged = frequency[judged][0], frequency[judged][-1]
    cut = [(max(p, first_judged), min(q, last_judged)) for p, q in bands_hz]
    cut = [(p, q) for p, q in cut if q >= p] or [(first_judged, last_judged)]
    for p, q in cut:
        part = ratio[(frequency >= p * (1 - 1e-12)) & (frequency < q * (1 + 1e-12))]
        part = part[np.isfinite(part)]
        if len(part) > 0:
            name = "-".join(f"{v:.0f}" if v >= 1e4 else f"{v:.4g}" for v in (p, q))
            numbers[f"ratio-{name}"] = np.median(part)
    numbers["bins"] = bins
    if np.isfinite(nu).any():
        numbers["bin-interval"] = 1.0
        outside = (ratio < quantile(side, False)) | (ratio > quantile(side, True))
        numbers["outside"] = np.count_nonzero(outside) / bins
        numbers["ranges"] = sum(group_ranges(ratio, quantile(rare, False), quantile(rare, True), reach))
    return {"frequency_hz": frequency, "values": ratio, "numbers": numbers}
