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
    top = np.inf if high_hz is None else high_hz
    df = (f[-1] - f[0]) / (len(f) - 1) if np.ptp(np.diff(f)) < 1e-6 * np.max(np.diff(f)) else 0.0
    from_zero = low_hz == 0 and df > 0 and f[0] <= 2 * df
    to_nyquist = top >= nyquist and f[-1] >= nyquist - 1.01 * df
    usable = f[(f > 0) & (s > 0)]
    low = 0.0 if from_zero else max(low_hz, usable[0])
    high = nyquist if to_nyquist else min(top, usable[-1])
    half = int(np.floor(reach_s * rate_hz + 0.5))
    wanted = max(8 * half, min(2**21, 2 * rate_hz / df) if df > 0 else 0)
    size = 2 ** int(np.ceil(np.log2(wanted)))
    grid = np.arange(size // 2 + 1) * (rate_hz / size)
    # Bins that are not what their neighbours are: the last at rate/2, and the lowest when they are used.
    keep = f < nyquist * (1 - 1e-12)
    fk, sk = (f[keep][4:], s[keep][4:]) if from_zero else (f[keep], s[keep])
    density = np.interp(grid, fk, sk)
    drawn = 2 * rate_hz / half
    inside = np.ones(len(grid), bool)
    if not from_zero:
        inside &= np.arange(len(grid)) >= np.ceil((low + drawn) / (rate_hz / size))
    if not to_nyquist:
        inside &= np.arange(len(grid)) <= np.floor((high - drawn) / (rate_hz / size))
    root = np.zeros(len(grid))
    root[inside] = np.sqrt(2 / (rate_hz * density[inside]))
    window = signal.get_window("blackmanharris", 2 * half, fftbins=True)
    impulse = np.fft.irfft(root, size)
    taps = np.concatenate((impulse[-half:], impulse[:half])) * window
    taps = taps[1:]
    response = np.abs(np.fft.rfft(np.roll(np.pad(taps, (0, size - len(taps))), -(half - 1))))
    weights = np.where((grid == 0) | (grid == grid[-1]), 0.5, 1.0)
    expected = np.nansum(weights * response**2 * density) * rate_hz / size
    share = np.nansum(weights * root**2 * density) * rate_hz / size
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
