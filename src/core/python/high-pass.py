import math

import numpy as np
from scipy import optimize, signal


def high_pass(x, rate_hz, start_gps, *, frequency_hz, order, family, ripple_db, attenuation_db, direction, crop_s):
    """High-pass filter as second-order sections, without delay ("zero-phase") or "causal".

    x: samples, NaN where not valid. frequency_hz: edge (Butterworth: -3 dB of one pass). crop_s: seconds dropped at each edge of a
    valid run, None: until the ringing is down to 1 %. Numbers: corner in Hz (half power of all passes), gains in dB.
    Source: Parks & Burrus, Digital Filter Design (1987); Gustafsson, IEEE Trans. Signal Process. 44, 988 (1996).
    """
    sos = pass_sections("highpass", [frequency_hz], rate_hz, order, family, ripple_db, attenuation_db)
    y, ring, crop = filter_valid_runs(sos, x, rate_hz, direction, crop_s)
    gain = 20 * np.log10(passes_gain(sos, np.array([frequency_hz, frequency_hz / 2]), rate_hz, direction))
    kept = y[np.isfinite(y)]
    return {
        "x": y,
        "rate_hz": rate_hz,
        "start_gps": start_gps,
        "numbers": {
            "corner": half_power_hz(sos, frequency_hz / 1000, 0.499 * rate_hz, rate_hz, direction),
            "gain-at-edge": gain[0],
            "gain-below": gain[1],
            "ringing": ring,
            "crop": crop,
            "kept": len(kept) / rate_hz,
            "rms": np.sqrt(np.mean(kept**2)),
        },
    }
