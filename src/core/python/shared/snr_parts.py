def snr_parts(wave, f, s, low_hz, high_hz):
    """What each bin of a spectrum adds to the squared optimal SNR, 4 |h|^2/S times its width, over the band of both.

    Even bins are centred on those of the spectrum, the outer ones cut at the band; other curves are taken on 20000 steps even in the
    logarithm. Returns middles and parts, and the band in Hz.
    """
    low = max(low_hz, wave["low_hz"])
    high = min(high_hz, wave["high_hz"])
    usable = f[(f > 0) & (s > 0) & np.isfinite(s)]
    # A band that begins or ends between two bins is covered by them.
    low, high = max(low, usable[0]), min(high, usable[-1])
    steps = np.diff(f)
    if np.ptp(steps) < 1e-6 * np.max(steps):
        df = (f[-1] - f[0]) / (len(f) - 1)
        edges = (np.arange(math.floor(low / df + 0.5), math.ceil(high / df) + 1) + 0.5) * df
        edges = np.concatenate(([low], edges[(edges > low) & (edges < high)], [high]))
    else:
        edges = low * (high / low) ** (np.arange(20001) / 20000)
    middle = (edges[:-1] + edges[1:]) / 2
    parts = 4 * np.abs(wave["at"](middle)) ** 2 * np.diff(edges) / np.interp(middle, f, s)
    return middle, parts, low, high
