def truncated_inverse(f, s, size, rate_hz, low_hz, high_hz, reach_s):
    """1/S on the bins of a block of `size` samples, made to reach reach_s to either side in time.

    1/sqrt(S) inside the band drawn in by 2/reach_s is taken to time, multiplied by a Hann window over +- reach_s/2, taken back and
    squared; zero outside the band.
    """
    df = rate_hz / size
    half = min(size // 2, int(math.floor(reach_s / 2 * rate_hz + 0.5)))
    k = np.arange(size // 2 + 1)
    first = max(1, math.ceil((low_hz + 2 / reach_s) / df))
    last = min(size // 2 - 1, math.floor((high_hz - 2 / reach_s) / df))
    inside = (k >= first) & (k <= last)
    root = np.zeros(len(k))
    root[inside] = 1 / np.sqrt(np.interp(k[inside] * df, f, s))
    top = root.max()
    impulse = np.fft.irfft(root / top, size)
    lag = np.minimum(np.arange(size), size - np.arange(size))
    impulse *= np.where(lag < half, 0.5 + 0.5 * np.cos(np.pi * lag / half), 0)
    response = np.real(np.fft.rfft(impulse)) * top
    kept = (k >= math.ceil(low_hz / df - 1e-9)) & (k <= math.floor(high_hz / df + 1e-9))
    return np.where(kept, response**2, 0)
