def ringing_s(sos, rate_hz):
    """Seconds until second-order sections have rung down to 1 % of their amplitude (1e-4 of their energy).

    The larger of the decay of the slowest pole to 0.01 and the time after which less than 1e-4 of the energy of the impulse
    response follows.
    """
    radius = max(np.max(np.abs(np.roots(row[3:]))) for row in sos)
    decay = 0.0 if radius == 0 else math.log(1e-4) / 2 / math.log(radius)
    n = 16 + math.ceil(4 * decay)
    while n <= 2**24:
        impulse = np.zeros(n)
        impulse[0] = 1.0
        energy = signal.sosfilt(sos, impulse) ** 2
        if np.sum(energy[n // 2 :]) <= 1e-7 * np.sum(energy):
            after = np.cumsum(energy[::-1])[::-1]
            return max(decay, float(np.flatnonzero(after >= 1e-4 * after[0])[-1])) / rate_hz
        n *= 2
    return decay / rate_hz
