import numpy as np
from scipy import signal


def resample(x, old_rate_hz, start_gps, *, rate_hz, stop_band):
    """Series at another rate through scipy.signal.resample_poly.

    x: samples, NaN where not valid; old_rate_hz, rate_hz: old and new rate in Hz (None: half the old one); start_gps: GPS seconds
    of sample 0, which stays. stop_band: "53 dB" (Kaiser beta 5) or "90 dB" (beta 9). Each run of valid samples is resampled
    on its own; samples that the filter's ends have touched become NaN.
    Source: Crochiere & Rabiner, Multirate Digital Signal Processing (1983).
    """
    new = old_rate_hz / 2 if rate_hz is None else rate_hz
    downs = np.arange(1, 65537)
    ups = np.round(new / old_rate_hz * downs)
    first_exact = np.flatnonzero(np.abs(ups / downs / (new / old_rate_hz) - 1) < 1e-14)[0]
    up, down = int(ups[first_exact]), int(downs[first_exact])
    beta = {"53 dB": 5.0, "90 dB": 9.0}[stop_band]
    clean = {"53 dB": 0.84, "90 dB": 0.71}[stop_band]
    half = 0 if up == down else 10 * max(up, down)
    n = len(x)
    y = np.full(-(-n * up // down), np.nan)
    for a, b in valid_runs(x):
        first = -(-(a * up + half) // down)
        last = ((b - 1) * up - half) // down + 1
        if last <= first:
            continue
        # The grid of the outputs hangs on sample 0 of the series: start the run on a multiple of `down` at or before it.
        lead = a - a // down * down
        run = np.concatenate((np.zeros(lead), x[a:b]))
        out = signal.resample_poly(run, up, down, axis=0, window=("kaiser", beta), padtype="constant", cval=0.0)
        origin = a // down * up
        y[first:last] = out[first - origin : last - origin]
    nyquist = min(old_rate_hz, new) / 2
    kept = y[np.isfinite(y)]
    return {
        "x": y,
        "rate_hz": new,
        "start_gps": start_gps,
        "numbers": {
            "rate": new,
            "up": up,
            "down": down,
            "taps": 2 * half + 1,
            "cutoff": nyquist,
            "clean": clean * nyquist,
            "stop": (2 - clean) * nyquist,
            "edge": half / up / old_rate_hz,
            "kept": len(kept) / new,
            "rms": np.sqrt(np.mean(kept**2)),
        },
    }
