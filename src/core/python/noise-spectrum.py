# tolerance decades: abs 1e-6, a logarithm
import numpy as np


def noise_spectrum(x, rate_hz, start_gps, *, segment_s, overlap, window, average, detrend, low_hz, high_hz, exclude_s):
    """One-sided power spectral density in unit^2/Hz by averaging windowed overlapping segments (Welch, IEEE Trans. AU-15, 70 (1967)).

    Medians are divided by their bias in Gaussian noise (Allen et al., Phys. Rev. D 85, 122006 (2012), App. B). Segments touch valid
    samples only. low_hz, high_hz: band in which the floor is read off (None: 100 to 200 Hz, or a quarter to half of the Nyquist
    frequency when that is 250 Hz or less). The numbers' densities are amplitude densities, unit per root Hz.
    """
    starts, size, step, used = segment_starts(x, rate_hz, segment_s, overlap, exclude_s)
    segments = len(starts)
    weights = make_window(window, size)
    power = np.abs(segment_transforms(x, starts, weights, detrend)) ** 2
    if average == "mean" or segments == 1:
        averaged = np.mean(power, axis=0)
    elif average == "median":
        averaged = np.median(power, axis=0) / median_bias(segments)
    else:
        halves = [power[::2], power[1::2]]
        averaged = np.mean([np.median(h, axis=0) / median_bias(len(h)) for h in halves], axis=0)
    density = averaged / (rate_hz * np.sum(weights**2))
    density[1 : -1 if size % 2 == 0 else None] *= 2
    frequency = np.arange(len(density)) * (rate_hz / size)

    if average == "mean":
        variance = mean_variance(weights, step, segments)
    elif average == "median" or segments < 2:
        variance = median_variance(weights, step, segments)
    else:
        one = np.ones(1)
        split = (median_variance(one, 1, segments - segments // 2) + median_variance(one, 1, segments // 2)) / 4
        variance = median_variance(weights, step, segments) * split / median_variance(one, 1, segments)

    nyquist = rate_hz / 2
    usual = (100.0, 200.0) if nyquist > 250 else (nyquist / 4, nyquist / 2)
    low = low_hz if low_hz is not None else min(usual[0], np.inf if high_hz is None else high_hz / 2)
    high = high_hz if high_hz is not None else max(usual[1], min(nyquist, 2 * (low_hz or 0.0)))
    band = (frequency >= low * (1 - 1e-12)) & (frequency < high * (1 + 1e-12))
    lowest = np.flatnonzero(band)[np.argmin(density[band])]
    kept = density[(detrended_bins(window) if detrend == "constant" else 0) :]
    positive = kept[:-1][kept[:-1] > 0]
    deviation = np.std(x[used], ddof=0)
    parseval = np.sqrt(np.sum(density) * rate_hz / size)
    enbw = rate_hz * np.sum(weights**2) / np.sum(weights) ** 2
    return {
        "frequency_hz": frequency,
        "density": density,
        "estimate": {"relative_error": np.sqrt(variance), "window": window, "rate_hz": rate_hz, "df_hz": rate_hz / size},
        "numbers": {
            "floor": np.median(np.sqrt(density[band])),
            "lowest": np.sqrt(density[lowest]),
            "lowest-at": frequency[lowest],
            "segments": segments,
            "averages": 1 / variance,
            "relative-error": np.sqrt(variance),
            "bin-interval": 1.0,
            "resolution": enbw,
            "spacing": rate_hz / size,
            "parseval": parseval,
            "rms": deviation,
            "parseval-ratio": parseval / deviation if deviation > 0 else np.nan,
            "decades": np.log10(positive.max() / positive.min()) if len(positive) > 1 else 0.0,
            "zero-bins": np.count_nonzero(kept == 0),
        },
    }
