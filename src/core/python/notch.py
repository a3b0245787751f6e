import math

import numpy as np
from scipy import signal


def notch(x, rate_hz, start_gps, lines=None, *, frequencies_hz, harmonics, q, height, direction, crop_s):
    """Notches at listed frequencies, their multiples up to `harmonics`, and found lines that stand `height` times above the floor.

    x: samples, NaN where not valid; lines: result of the step that finds them. q: frequency over width at half power of one pass.
    A frequency within a quarter of a width of one that is there is the same notch; those at or above half the rate are left out.
    Source: Orfanidis, Introduction to Signal Processing (1996), 11.3.
    """
    found = [] if lines is None else [line["frequency_hz"] for line in lines["lines"] if line["height"] >= height]
    wanted = list(frequencies_hz) + [k * f for f in frequencies_hz for k in range(2, harmonics + 1)] + found
    places = []
    for f in wanted:
        if f < 0.999 * rate_hz / 2 and all(abs(p - f) >= f / q / 4 for p in places):
            places.append(f)
    places.sort()
    sos = np.array([np.concatenate(signal.iirnotch(f, q, fs=rate_hz)) for f in places])
    y, ring, crop = filter_valid_runs(sos, x, rate_hz, direction, crop_s)
    kept = y[np.isfinite(y)]
    return {
        "x": y,
        "rate_hz": rate_hz,
        "start_gps": start_gps,
        "numbers": {
            "notches": len(places),
            "width": sum(f / q for f in places),
            "ringing": ring,
            "crop": crop,
            "kept": len(kept) / rate_hz,
            "rms": np.sqrt(np.mean(kept**2)),
        },
    }
