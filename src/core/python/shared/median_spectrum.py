def median_spectrum(x, rate_hz, segment_s):
    """One-sided density: median over half-overlapping Hann segments of all valid runs, mean taken off, bias removed.

    x: samples, NaN where not valid. Returns frequency in Hz and density in (unit of x)^2/Hz.
    Source: Welch (1967); bias of the median: Allen et al., Phys. Rev. D 85, 122006 (2012), App. B.
    """
    size = int(np.floor(segment_s * rate_hz + 0.5))
    step = size - size // 2
    starts = [at for a, b in valid_runs(x) for at in range(a, b - size + 1, step)]
    window = signal.get_window("hann", size, fftbins=True)
    segments = np.stack([x[at : at + size] for at in starts])
    segments = segments - segments.mean(axis=1, keepdims=True)
    power = np.abs(np.fft.rfft(segments * window, axis=1)) ** 2 / (rate_hz * np.sum(window**2))
    power[:, 1 : (size + 1) // 2] *= 2
    n = len(starts)
    odd = n if n % 2 == 1 else n - 1
    bias = np.sum((-1.0) ** (np.arange(1, odd + 1) + 1) / np.arange(1, odd + 1))
    return np.arange(size // 2 + 1) * rate_hz / size, np.median(power, axis=0) / bias
