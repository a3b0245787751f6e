def passes_gain(sos, frequency_hz, rate_hz, direction):
    """Gain of all passes together: |H| for one causal pass, |H|^2 for forwards and backwards."""
    z = np.exp(-2j * np.pi * np.atleast_1d(frequency_hz) / rate_hz)
    gain = np.ones(len(z))
    for b0, b1, b2, a0, a1, a2 in sos:
        gain = gain * np.abs((b0 + b1 * z + b2 * z * z) / (a0 + a1 * z + a2 * z * z))
    return gain**2 if direction == "zero-phase" else gain
