import numpy as np
from scipy import fft, stats


def gaussianity(x, rate_hz, start_gps, *, segment_s, overlap, window, probability, false_ranges, low_hz, high_hz, exclude_s):
    """Standard deviation over mean (both over n) of the magnitudes of the segments, per bin; 0.5227 in Gaussian noise (Rayleigh's distribution).

    The law for n overlapping segments: delta method with the Laguerre expansion of the bivariate exponential law, Cornish & Fisher's
    expansion (1938) for the quantiles, with skewness and kurtosis from a simulation (1.27/sqrt(n) (1 - 1.2/n), 3.9/n (1 - 2.4/n)).
    """
    starts, size, step, _ = segment_starts(x, rate_hz, segment_s, overlap, exclude_s)
    segments = len(starts)
    weights = make_window(window, size)
    magnitude = np.abs(segment_transforms(x, starts, weights, "constant"))
    frequency = np.arange(magnitude.shape[1]) * (rate_hz / size)
    margin = detrended_bins(window) + 1
    low = 0.0 if low_hz is None else low_hz
    high = rate_hz / 2 if high_hz is None else high_hz
    judged = (frequency >= low * (1 - 1e-12)) & (frequency < high * (1 + 1e-12))
    judged[:margin] = False
    judged[len(judged) - margin :] = False
    mean = magnitude.mean(axis=0)
    with np.errstate(divide="ignore", invalid="ignore"):
        values = np.where(mean > 0, magnitude.std(axis=0, ddof=0) / mean, np.nan)[judged]

    ratio = np.sqrt(4 / np.pi - 1)
    rayleigh = stats.rayleigh
    m, v, skew, kurtosis = rayleigh.mean(), rayleigh.var(), float(rayleigh.stats(moments="s")), float(rayleigh.stats(moments="k")) + 3
    rest = 4 / np.pi - 1.25
    rho, weight = overlap_correlations(weights, step, segments)
    order = np.arange(1, 200)
    squares = np.cumprod((order - 1.5) / order) ** 2
    phi = np.array([np.sum((squares * r**order)[1:]) / rest for r in rho])
    n = max(1.0, segments / (1 + 2 * np.sum(weight * phi)))
    bias = -(kurtosis - 1) / 8 - skew * np.sqrt(v) / (2 * m) + ratio**2 - 0.5
    expected = ratio * (1 + bias * mean_variance(weights, step, segments))
    deviation = np.sqrt(ratio**2 * m**2 * (m / v + 1 / m) ** 2 * rest / n) * (1 - 0.29 / n)
    s, k = 1.27 / np.sqrt(n) * (1 - 1.2 / n), 3.9 / n * (1 - 2.4 / n)

    def quantile(z):
        return max(0.0, expected + deviation * (z + s / 6 * (z**2 - 1) + k / 24 * (z**3 - 3 * z) - s**2 / 36 * (2 * z**3 - 5 * z)))

    side = (1 - probability) / 2
    rare = min(side, false_ranges / (2 * len(values)))
    low_limit, high_limit = quantile(stats.norm.ppf(side)), quantile(stats.norm.isf(side))
    reach = max(2, int(np.ceil(2 * size * np.sum(weights**2) / np.sum(weights) ** 2 - 1e-9)))
    ranges = group_ranges(values, quantile(stats.norm.ppf(rare)), quantile(stats.norm.isf(rare)), reach)
    good = values[np.isfinite(values)]
    below, above = np.count_nonzero(good < low_limit), np.count_nonzero(good > high_limit)
    return {
        "frequency_hz": frequency[judged],
        "values": values,
        "numbers": {
            "median": np.median(good),
            "expected": expected,
            "segments": segments,
            "effective-segments": n,
            "outside": (below + above) / len(good),
            "below": below / len(good),
            "above": above / len(good),
            "ranges-low": ranges[0],
            "ranges-high": ranges[1],
        },
    }
