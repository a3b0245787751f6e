def filter_valid_runs(sos, x, rate_hz, direction, crop_s):
    """Each run of valid samples filtered on its own; what the filter's ringing reaches from an edge becomes NaN.

    direction: "zero-phase" (scipy.signal.sosfiltfilt, odd padding of three times the number of taps) or "causal"
    (scipy.signal.sosfilt from the steady state of the first sample). crop_s: seconds dropped at each edge, None: the ringing to 1 %.
    Returns samples, the ringing and the crop in seconds.
    """
    ring = ringing_s(sos, rate_hz)
    crop = ring if crop_s is None else crop_s
    drop = math.ceil(crop * rate_hz - 1e-9)
    # Sections of first order have a zero in their last column of either side; they count as one tap less.
    taps = 2 * len(sos) + 1 - min((sos[:, 2] == 0).sum(), (sos[:, 5] == 0).sum())
    y = np.full(len(x), np.nan)
    good = np.concatenate(([False], np.isfinite(x), [False]))
    edges = np.flatnonzero(good[1:] != good[:-1])
    for a, b in zip(edges[::2], edges[1::2]):
        if b - a <= 3 * taps:
            continue
        if direction == "zero-phase":
            out = signal.sosfiltfilt(sos, x[a:b], axis=0, padtype="odd", padlen=3 * taps)
            y[a + drop : max(a + drop, b - drop)] = out[drop : max(drop, b - a - drop)]
        else:
            out, _ = signal.sosfilt(sos, x[a:b], axis=0, zi=signal.sosfilt_zi(sos) * x[a])
            y[a + drop : b] = out[drop:]
    return y, ring, crop
