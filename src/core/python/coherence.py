import numpy as np


def coherence(
    first, first_rate_hz, first_start_gps, second, second_rate_hz, second_start_gps, *,
    segment_s, overlap, window, detrend, false_probability, exclude_s
):  # fmt: skip
    """Magnitude-squared coherence of two series over the segments that are valid in both (Carter, Knapp, Nuttall, IEEE Trans. AU-21, 337 (1973)).

    The series are aligned to the nearest sample by GPS time. Level of one bin: 1 - p^(1/(n-1)) with n effective averages (Welch 1967).
    """
    rate_hz = first_rate_hz
    lag = int(np.floor((second_start_gps - first_start_gps) * rate_hz + 0.5))
    a, b = first[max(0, lag) :], second[max(0, -lag) :]
    length = min(len(a), len(b))
    a, b = a[:length], b[:length]
    starts, size, step, _ = segment_starts(np.where(np.isfinite(a + b), a, np.nan), rate_hz, segment_s, overlap, exclude_s)
    segments = len(starts)
    weights = make_window(window, size)
    spectrum_a = segment_transforms(a, starts, weights, detrend)
    spectrum_b = segment_transforms(b, starts, weights, detrend)
    # Scaled first: the squares of strain squared are below the smallest float64.
    scale_a, scale_b = np.sqrt(np.mean(np.abs(spectrum_a) ** 2, axis=0)), np.sqrt(np.mean(np.abs(spectrum_b) ** 2, axis=0))
    with np.errstate(divide="ignore", invalid="ignore"):
        values = np.abs(np.mean(spectrum_a / scale_a * np.conj(spectrum_b / scale_b), axis=0)) ** 2
    averages = 1 / mean_variance(weights, step, segments)
    frequency = np.arange(len(values)) * (rate_hz / size)
    lowest = max(1, detrended_bins(window) if detrend == "constant" else 1)
    highest = len(values) - 1 if size % 2 == 0 else len(values)
    inside = values[lowest:highest]
    good = np.isfinite(inside)

    def level(p):
        return -np.expm1(np.log(p) / (averages - 1))

    search = level(false_probability / max(1, len(inside)))
    reach = max(2, int(np.ceil(2 * size * np.sum(weights**2) / np.sum(weights) ** 2 - 1e-9)))
    numbers = {
        "segments": segments,
        "averages": averages,
        "floor": 1 / averages,
        "level": level(false_probability),
        "above": np.count_nonzero(inside[good] > level(false_probability)),
        "search-level": search,
        "ranges": group_ranges(inside, -1.0, search, reach)[1],
    }
    if np.any(good):
        strongest = int(np.nanargmax(inside))
        numbers |= {"strongest": inside[strongest], "strongest-at": frequency[lowest + strongest]}
    return {"frequency_hz": frequency, "values": values, "numbers": numbers}
