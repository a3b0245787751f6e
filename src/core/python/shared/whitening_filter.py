def whitening_filter(f, s, rate_hz, low_hz, high_hz, reach_s):
    """Filter symmetric in time that divides by the root of a one-sided density: output density 2/rate in the band.

    Response sqrt(2 / (rate S)) between low_hz and high_hz (None: half the rate), drawn in by 2 / reach_s, truncated to less than
    reach_s seconds on either side by a 4-term Blackman-Harris window. Returns taps (2 half - 1), half, band kept in Hz, the grid in
    Hz with response and density on it, and the response before it was truncated.
    """
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
    return taps, half, (low, high), grid, response, density, root
