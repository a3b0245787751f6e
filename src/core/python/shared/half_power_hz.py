def half_power_hz(sos, below_hz, above_hz, rate_hz, direction):
    """Frequency between below_hz (gain under half power) and above_hz (over it) where all passes leave half the power."""
    def excess(f):
        return passes_gain(sos, f, rate_hz, direction)[0] - math.sqrt(0.5)

    return float(optimize.brentq(excess, below_hz, above_hz, xtol=1e-12, rtol=1e-12))
