def pass_sections(band, edges_hz, rate_hz, order, family, ripple_db, attenuation_db):
    """Second-order sections of a high-pass ("highpass", one edge) or band-pass ("bandpass", two edges)."""
    edge = edges_hz[0] if band == "highpass" else edges_hz
    if family == "butterworth":
        return signal.butter(order, edge, btype=band, analog=False, output="sos", fs=rate_hz)
    if family == "chebyshev-1":
        return signal.cheby1(order, ripple_db, edge, btype=band, analog=False, output="sos", fs=rate_hz)
    if family == "chebyshev-2":
        return signal.cheby2(order, attenuation_db, edge, btype=band, analog=False, output="sos", fs=rate_hz)
    return signal.ellip(order, ripple_db, attenuation_db, edge, btype=band, analog=False, output="sos", fs=rate_hz)
