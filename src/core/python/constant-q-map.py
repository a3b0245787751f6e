import math

import numpy as np
from scipy import fft, signal

# tolerance time: abs 1e-9, because the grid of a row is in float64 in both
# tolerance energy: rel 1e-4, because Fringeside transforms the whitened data in float32
# tolerance snr: rel 1e-4, because Fringeside transforms the whitened data in float32
# tolerance chance: rel 1e-2, because it is the exponential of the energy
# tolerance mean-energy: rel 1e-5, because Fringeside transforms the whitened data in float32


def constant_q_map(
    x, rate_hz, start_gps, *spectrum, start_at_gps, duration_s, low_hz, high_hz, q_low, q_high, mismatch, whitening, reach_s, segment_s, tiles
):
    """Tile energies at several Q over time and frequency, mean 1 and exponential in Gaussian noise.

    x: samples, NaN where not valid; spectrum: frequency in Hz and one-sided density to whiten with, left out the median spectrum of x.
    Window (1 - u^2)^2, u = (f - phi) Q / (phi sqrt(11)); step 2 sqrt(mismatch / 3) along each axis of the metric
    (4 pi^2 phi^2/Q^2) dt^2 + ((2 + Q^2)/4 phi^2) dphi^2 + dQ^2/2Q^2. `tiles` is how many loud ones Fringeside lists; here only the
    loudest is looked for. Source: Chatterji et al., Class. Quantum Grav. 21, S1809 (2004).
    """
    nyquist = rate_hz / 2
    if whitening == "divide":
        f, s = spectrum if spectrum else median_spectrum(x, rate_hz, segment_s)
        lowest = min(low_hz / 2, low_hz * (1 - math.sqrt(11) / q_high))
        taps, half, _, grid, response, density, _ = whitening_filter(f, s, rate_hz, lowest, nyquist, reach_s)
        y = np.full(len(x), np.nan)
        for a, b in valid_runs(x):
            if b - a >= len(taps):
                y[a + half - 1 : b - half + 1] = signal.oaconvolve(x[a:b], taps, mode="valid")
        # Power of the noise that is left, on a grid eight times as fine as the filter needs.
        size = 2 ** math.ceil(math.log2(8 * half))
        fine = np.arange(size // 2 + 1) * rate_hz / size
        shape = np.real(fft.rfft(np.roll(np.pad(taps, (0, size - len(taps))), -(half - 1))))
        inside = (fine >= f[0]) & (fine <= f[-1])
        left = np.where(inside, shape**2 * np.interp(fine, f, s) * rate_hz / 2, 0.0)
    else:
        y = np.array(x)
        fine, left = np.array([0.0, nyquist]), np.ones(2)
    good = np.flatnonzero(np.isfinite(y))
    first = good[0] if start_at_gps is None else round((start_at_gps - start_gps) * rate_hz)
    last = good[-1] + 1 if duration_s is None else min(len(y), first + round(duration_s * rate_hz))
    part = y[first:last]
    white = np.where(np.isfinite(part), part, 0.0)
    seconds = len(part) / rate_hz
    holes = [(-np.inf, 0.0), (seconds, np.inf)] + [(a / rate_hz, b / rate_hz) for a, b in valid_runs(np.where(np.isfinite(part), np.nan, 0.0))]
    step = 2 * math.sqrt(mismatch / 3)
    high = nyquist if high_hz is None else min(high_hz, nyquist)
    count = max(1, math.ceil(math.log(q_high / q_low) / math.sqrt(2) / step))
    rows = []
    planes = 0
    for i in range(count):
        q = q_low * (q_high / q_low) ** ((i + 0.5) / count)
        top = min(high, nyquist / (1 + math.sqrt(11) / q))
        if top <= low_hz:
            continue
        planes += 1
        n_rows = max(1, math.ceil(0.5 * math.sqrt(2 + q * q) * math.log(top / low_hz) / step))
        rows += [(q, low_hz * (top / low_hz) ** ((k + 0.5) / n_rows)) for k in range(n_rows)]
    n = 2 ** math.ceil(math.log2(len(white) + math.ceil(2 * max(0.5 * q / phi for q, phi in rows) * rate_hz)))
    transform = fft.rfft(white, n)
    best = (-np.inf, 0.0, 0.0, 0.0)
    wanted, total, cells, empty = 0, 0.0, 0, 0
    for q, phi in rows:
        need = math.ceil(2 * math.pi * seconds * phi / q / step)
        wanted += need
        reach = phi * math.sqrt(11) / q
        a = max(1, math.ceil((phi - reach) * n / rate_hz))
        b = min(n // 2 - 1, math.floor((phi + reach) * n / rate_hz))
        bins = np.arange(a, b + 1) * rate_hz / n
        weights = np.maximum(0, 1 - ((bins - phi) / reach) ** 2) ** 2
        length = min(n, smooth_length(max(16, b - a + 1, need * n / len(white))))
        series = fft.ifft(weights * transform[a : b + 1], length) * length
        energy = np.abs(series) ** 2 / (n * np.sum(weights**2 * np.interp(bins, fine, left)))
        cell = n / length / rate_hz
        energy = energy[: min(length, math.ceil(seconds / cell + 0.5))]
        for h0, h1 in holes:
            i0 = max(0, math.floor((h0 - 0.5 * q / phi) / cell)) if np.isfinite(h0) else 0
            i1 = min(len(energy), math.ceil((h1 + 0.5 * q / phi) / cell) + 1) if np.isfinite(h1) else len(energy)
            energy[i0:i1] = np.nan
        total += np.nansum(energy)
        cells += np.isfinite(energy).sum()
        empty += np.isnan(energy).sum()
        if np.any(np.isfinite(energy)) and np.nanmax(energy) > best[0]:
            k = int(np.nanargmax(energy))
            best = (float(energy[k]), k * cell, phi, q)
    trials = round(cells / (cells + empty) * wanted)
    energy, time, phi, q = best
    return {
        "energy": energy,
        "numbers": {
            "time": time,
            "frequency": phi,
            "q": q,
            "energy": energy,
            "snr": math.sqrt(max(0.0, 2 * (energy - 1))),
            "chance": -math.expm1(trials * math.log1p(-math.exp(-energy))),
            "tiles": trials,
            "planes": planes,
            "mean-energy": total / cells,
        },
    }
