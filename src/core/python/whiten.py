import numpy as np
from scipy import signal, stats

# tolerance p-value: abs 1e-5, because above 1000 samples Fringeside takes an expansion good to 3e-6
# tolerance kurtosis: abs 1e-9, because it is a difference of nearly equal numbers


def whiten(x, rate_hz, start_gps, *spectrum, low_hz, high_hz, reach_s, segment_s):
    """Series divided by its noise: one-sided density 2/rate in the band, variance 1 when the band is 0 to rate/2.

    x: samples, NaN where not valid. spectrum: frequency in Hz and one-sided density; left out, the median spectrum of x with
    segments of segment_s. The response sqrt(2 / (rate S)) between low_hz and high_hz (None: half the rate), drawn in by
    2 / reach_s, is truncated to less than reach_s seconds on either side by a 4-term Blackman-Harris window and applied
    without delay; as much is dropped at each end of a valid run.
    Source: truncation of the inverse spectrum: Allen et al., Phys. Rev. D 85, 122006 (2012).
    """
    f, s = spectrum if spectrum else median_spectrum(x, rate_hz, segment_s)
    nyquist = rate_hz / 2
    taps, half, (low, high), grid, response, density, root = whitening_filter(f, s, rate_hz, low_hz, high_hz, reach_s)
    weights = np.where((grid == 0) | (grid == grid[-1]), 0.5, 1.0)
    expected = np.nansum(weights * response**2 * density) * grid[1]
    share = np.nansum(weights * root**2 * density) * grid[1]
    y = np.full(len(x), np.nan)
    for a, b in valid_runs(x):
        if b - a >= len(taps):
            y[a + half - 1 : b - half + 1] = signal.oaconvolve(x[a:b], taps, mode="valid")
    kept = y[np.isfinite(y)]
    stride = max(1, int(np.ceil(nyquist / (high - low) - 1e-9)), int(np.ceil(len(kept) / 65536)))
    test = stats.kstest(kept[::stride], stats.norm(scale=np.sqrt(np.mean(kept**2))).cdf, method="auto")
    return {
        "x": y,
        "rate_hz": rate_hz,
        "start_gps": start_gps,
        "numbers": {
            "variance": np.var(kept),
            "expected": expected,
            "share": share,
            "kurtosis": stats.kurtosis(kept, fisher=True, bias=True),
            "p-value": test.pvalue,
            "distance": test.statistic,
            "tested": len(kept[::stride]),
            "low": low,
            "high": high,
            "resolution": 1.36 * rate_hz / half,
            "edge": (half - 1) / rate_hz,
            "kept": len(kept) / rate_hz,
        },
    }
