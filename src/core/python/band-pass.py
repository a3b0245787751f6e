import math

import numpy as np
from scipy import optimize, signal


def band_pass(x, rate_hz, start_gps, *, low_hz, high_hz, order, family, ripple_db, attenuation_db, direction, crop_s):
    """Band-pass filter as second-order sections, without delay ("zero-phase") or "causal".

    x: samples, NaN where not valid. low_hz, high_hz: edges (Butterworth: -3 dB of one pass). crop_s: seconds dropped at each edge of a
    valid run, None: until the ringing is down to 1 %. Numbers: corners in Hz (half power of all passes), gains in dB.
    Source: Parks & Burrus, Digital Filter Design (1987); Gustafsson, IEEE Trans. Signal Process. 44, 988 (1996).
    """
    sos = pass_sections("bandpass", [low_hz, high_hz], rate_hz, order, family, ripple_db, attenuation_db)
    y, ring, crop = filter_valid_runs(sos, x, rate_hz, direction, crop_s)
    middle = math.sqrt(low_hz * high_hz)
    gain = 20 * np.log10(passes_gain(sos, np.array([low_hz, middle, high_hz]), rate_hz, direction))
    kept = y[np.isfinite(y)]
    return {
        "x": y,
        "rate_hz": rate_hz,
        "start_gps": start_gps,
        "numbers": {
            "low-corner": half_power_hz(sos, low_hz / 1000, middle, rate_hz, direction),
            "high-corner": half_power_hz(sos, high_hz + 0.999 * (rate_hz / 2 - high_hz), middle, rate_hz, direction),
            "gain-low": gain[0],
            "gain-middle": gain[1],
            "gain-high": gain[2],
            "ringing": ring,
            "crop": crop,
            "kept": len(kept) / rate_hz,
            "rms": np.sqrt(np.mean(kept**2)),
        },
    }
