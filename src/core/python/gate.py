import numpy as np
from scipy import signal, special, stats


def gate(x, rate_hz, start_gps, *, spans_s, gps_spans_s, threshold, low_hz, high_hz, margin_s, taper_s):
    """Series multiplied by 0 in gates and by half-cosine tapers of taper_s seconds outside of them.

    x: samples, NaN where not valid. spans_s: pairs of seconds after the start; gps_spans_s: pairs of GPS seconds; threshold
    (None: nothing is looked for): also margin_s around samples further from the median than so many robust widths, in a copy
    of the band low_hz to high_hz (None, None: in x itself). Common practice, no source.
    """
    n = len(x)
    taper = int(np.floor(taper_s * rate_hz + 0.5))
    margin = int(np.floor(margin_s * rate_hz + 0.5))
    pairs = [np.reshape(np.asarray(spans_s, float), (-1, 2)), np.reshape(np.asarray(gps_spans_s, float), (-1, 2)) - start_gps]
    cores = []
    for a, b in np.concatenate(pairs):
        a, b = max(0, int(np.floor(a * rate_hz + 0.01))), min(n, int(np.ceil(b * rate_hz - 0.01)))
        if b > a:
            cores.append((a, b))
    numbers = {}
    if threshold is not None:
        tested = x
        if low_hz is not None or high_hz is not None:
            low = 0.0 if low_hz is None else low_hz
            high = rate_hz / 2 if high_hz is None else high_hz
            half = int(np.floor(4 * rate_hz / (high if low_hz is None else low) + 0.5))
            k = np.arange(-half, half)
            ideal = 2 * high / rate_hz * np.sinc(2 * high * k / rate_hz) - 2 * low / rate_hz * np.sinc(2 * low * k / rate_hz)
            taps = (ideal * signal.get_window("blackmanharris", 2 * half, fftbins=True))[1:]
            tested = np.full(n, np.nan)
            for a, b in valid_runs(x):
                if b - a >= len(taps):
                    tested[a + half - 1 : b - half + 1] = signal.oaconvolve(x[a:b], taps, mode="valid")
        median, width = robust_width(tested)
        distance = np.abs(tested - median)
        over = np.flatnonzero(distance > threshold * width)
        cores += [(max(0, int(i) - margin), min(n, int(i) + 1 + margin)) for i in over]
        count = np.sum(np.isfinite(tested))
        numbers = {
            "over": len(over),
            "loudest": np.nanmax(distance) / width,
            "width": width,
            "searched": count / rate_hz,
            "chance": special.erfc(threshold / np.sqrt(2)) * count,
        }
    joined = []
    for a, b in sorted(cores):
        if joined and a - joined[-1][1] < 2 * taper:
            joined[-1] = (joined[-1][0], max(joined[-1][1], b))
        else:
            joined.append((a, b))
    weight = np.ones(n)
    ramp = 0.5 - 0.5 * np.cos(np.pi * np.arange(1, taper + 1) / (taper + 1))
    zero = np.zeros(n, bool)
    for a, b in joined:
        zero[a:b] = True
        after = weight[b : b + taper]
        after *= ramp[: len(after)]
        before = weight[max(0, a - taper) : a]
        before *= ramp[: len(before)][::-1]
    weight[zero] = 0
    good = np.isfinite(x)
    y = x * weight
    return {
        "x": y,
        "rate_hz": rate_hz,
        "start_gps": start_gps,
        "numbers": {
            "gates": len(joined),
            "zero": np.sum(zero & good) / rate_hz,
            "gated": np.sum((weight < 1) & good) / rate_hz,
            "share": np.sum((weight < 1) & good) / np.sum(good),
            "power-lost": np.mean(1 - weight[good] ** 2),
            "rms": np.sqrt(np.mean(y[good] ** 2)),
            **numbers,
        },
    }
