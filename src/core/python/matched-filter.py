import math

import numpy as np
from scipy import fft

# tolerance chance: rel 1e-6, because it is the exponential of the square of the ratio
# tolerance phase: abs 1e-6, because it is an angle in degrees


def matched_filter(x, rate_hz, start_gps, wave, *spectrum, low_hz, high_hz, reach_s, segment_s, fade_s, block_s, count, window_s):
    """Complex SNR of one template against time: z(t) = 4 int s(f) h*(f)/S e^(2 pi i f t) df over sigma, sigma^2 = 4 int |h|^2/S df.

    x: samples, NaN where not valid. spectrum: frequency in Hz and one-sided density, left out the median spectrum of x. Overlap-save in
    blocks whose ends are faded over fade_s; what rests on them is NaN. Times are those of the template's t = 0.
    Source: Allen et al., Phys. Rev. D 85, 122006 (2012); crossings of a level: Rice, Bell Syst. Tech. J. 24, 46 (1945).
    """
    f, s = spectrum if spectrum else median_spectrum(x, rate_hz, segment_s)
    low = max(low_hz, wave["low_hz"])
    high = min(np.inf if high_hz is None else high_hz, wave["high_hz"], rate_hz / 2)
    usable = f[(f > 0) & (s > 0) & np.isfinite(s)]
    low, high = max(low, usable[0]), min(high, usable[-1])
    runs = valid_runs(x)
    longest = max(b - a for a, b in runs)
    largest = 2 ** math.ceil(math.log2(max(2, longest)))
    size = min(2**19, largest) if block_s is None else 2 ** math.ceil(math.log2(max(2, math.floor(block_s * rate_hz + 0.5))))
    fade = int(math.floor(fade_s * rate_hz + 0.5))
    while True:
        df = rate_hz / size
        k = np.arange(size // 2 + 1)
        inverse = truncated_inverse(f, s, size, rate_hz, low, high, reach_s)
        template = wave["at"](k * df)
        weight = np.abs(template) ** 2 * inverse
        sigma = math.sqrt(4 * np.sum(weight) * df)
        q = template * inverse * 4 / (size * sigma)
        energy = np.abs(np.fft.ifft(q, size)) ** 2
        limit = 0.5e-6 * np.sum(energy)
        # Samples after and before t = 0 beyond which at most half a millionth of the filter's energy lies.
        tail_sum = np.cumsum(energy[: size // 2][::-1])
        tail = size // 2 - 1 - int(np.searchsorted(tail_sum, limit, side="right"))
        lead_sum = np.cumsum(energy[size // 2 :])
        lead = size // 2 - int(np.searchsorted(lead_sum, limit, side="right"))
        margin = lead + tail + 2 * fade
        if margin <= size / 2 or (size >= largest and margin < longest):
            break
        size *= 2
    z = np.full(len(x), np.nan, complex)
    step = size - margin
    for a, b in runs:
        end = b - tail - fade
        for first in range(a + lead + fade, end, step):
            begin = first - lead - fade
            part = np.array(x[begin : min(b, begin + size)])
            m = min(fade, len(part) // 2)
            ramp = 0.5 - 0.5 * np.cos(np.pi * (np.arange(m) + 0.5) / m) if m else np.ones(0)
            part[:m] *= ramp
            part[len(part) - m :] *= ramp[::-1]
            product = fft.rfft(part, size) * np.conj(q)
            values = fft.ifft(product, size) * size
            last = begin + len(part) - tail - fade
            z[first:last] = values[first - begin : last - begin]
    good = np.isfinite(z.real)
    power = np.where(good, np.abs(z) ** 2, -1.0)
    peaks = []
    free = power.copy()
    gap = max(1, int(math.floor(window_s * rate_hz + 0.5)))
    for _ in range(count):
        i = int(np.argmax(free))
        if free[i] <= 0:
            break
        free[max(0, i - gap + 1) : i + gap] = -1.0
        angle, place, height = np.angle(z[i]), float(i), math.sqrt(power[i])
        a, b, c = power[i - 1], power[i], power[i + 1]
        if a >= 0 and c >= 0 and a - 2 * b + c < 0:
            shift = min(0.5, max(-0.5, 0.5 * (a - c) / (a - 2 * b + c)))
            turn = np.angle(z[i + 1] * np.conj(z[i - 1])) / 2
            if math.cos(np.angle(z[i + 1] * np.conj(z[i])) - turn) < 0:
                turn += math.pi
            turn = (turn + math.pi) % (2 * math.pi) - math.pi
            place, height = i + shift, math.sqrt(b - 0.25 * (a - c) * shift)
            angle = (angle + shift * turn + math.pi) % (2 * math.pi) - math.pi
        peaks.append((place, height, angle))
    peaks.sort(key=lambda p: -p[1])
    at, snr, angle = peaks[0]
    seconds = np.sum(good) / rate_hz
    mean = np.sum(weight * k) / np.sum(weight)
    spread = math.sqrt(max(0.0, np.sum(weight * k * k) / np.sum(weight) - mean**2)) * df
    level = 3.0
    for _ in range(60):
        level = math.sqrt(2 * math.log(max(math.e, seconds * math.sqrt(2 * math.pi) * spread * level)))
    used = np.abs(z[good])
    numbers = {
        "snr": snr,
        "time": round(at / rate_hz * 1e6) / 1e6,
        "phase": math.degrees(angle),
        "chance": -math.expm1(-seconds * math.sqrt(2 * math.pi) * spread * max(1, snr) * math.exp(-max(1, snr) ** 2 / 2)),
        "sigma": sigma,
        "independent": seconds * np.sum(weight) ** 2 / np.sum(weight**2) * df,
        "expected-loudest": level,
        "median": math.sqrt(np.median(used**2)),
        "rms": math.sqrt(np.mean(used**2)),
        "above": np.mean(used**2 > 2 * math.log(20)),
        "variance": np.sum(weight * inverse * np.where(inverse > 0, np.interp(k * df, f, s), 0)) / np.sum(weight),
        "valid": seconds,
    }
    if wave["distance_mpc"] is None:
        numbers["amplitude"] = snr / sigma
    else:
        numbers["effective-distance"] = wave["distance_mpc"] * sigma / snr
    return {
        "z": z, "x": x, "rate_hz": rate_hz, "start_gps": start_gps, "peaks": peaks, "size": size, "fade": fade, "sigma": sigma,
        "template": template, "inverse": inverse, "runs": runs, "numbers": numbers,
    }
