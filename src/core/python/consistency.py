import math

import numpy as np
from scipy import fft, special, stats

# tolerance shape-p-value: rel 1e-6, because of the sums over lags behind it


def consistency(match, *, bands, time_gps, count, around_s):
    """Chi-squared over frequency bands of equal expected loudness, and the shape of the SNR around the loudest peak.

    match: result of the matched filter. chi2 = sum |rho_l - q_l rho|^2 / q_l, 2 bands - 2 degrees of freedom (Allen, Phys. Rev. D 71,
    062001, 2005); re-weighted rho / [(1 + (chi_r^2)^3)/2]^(1/6) above chi_r^2 = 1 (Babak et al., Phys. Rev. D 87, 024033, 2013). Shape:
    sum |rho(t + tau) - rho(t) R(tau)|^2 over its mean, by the template's autocorrelation R (Satterthwaite, Biometrics Bull. 2, 110, 1946).
    """
    rate, size, fade = match["rate_hz"], match["size"], match["fade"]
    weights = np.abs(match["template"]) ** 2 * match["inverse"]
    at = match["peaks"][0][0] if time_gps is None else (time_gps - match["start_gps"]) * rate
    middle = int(math.floor(at + 0.5))
    run = next((a, b) for a, b in match["runs"] if a <= middle < b)
    kept = next((a, b) for a, b in valid_runs(match["z"].real) if a <= middle < b)
    begin = max(run[0], min(middle - size // 2, run[1] - size))
    end = min(run[1], begin + size)
    part = np.array(match["x"][begin:end])
    m = min(fade, len(part) // 2)
    ramp = 0.5 - 0.5 * np.cos(np.pi * (np.arange(m) + 0.5) / m) if m else np.ones(0)
    part[:m] *= ramp
    part[len(part) - m :] *= ramp[::-1]
    k = np.arange(size // 2 + 1)
    product = fft.rfft(part, size) * np.conj(match["template"]) * match["inverse"] * 4 / (size * match["sigma"])
    product = product * np.exp(2j * np.pi * k * (at - middle) / size)
    turned = product * np.exp(2j * np.pi * ((k * (middle - begin)) % size) / size)
    cumulative = np.cumsum(weights)
    owner = np.minimum(bands - 1, np.floor((cumulative - weights / 2) / cumulative[-1] * bands).astype(int))
    rho_l = np.array([np.sum(turned[owner == b]) for b in range(bands)])
    share = np.array([np.sum(weights[owner == b]) for b in range(bands)]) / cumulative[-1]
    rho = np.sum(rho_l)
    chi2 = float(np.sum(np.abs(rho_l - share * rho) ** 2 / share))
    freedom = 2 * bands - 2
    reduced, snr = chi2 / freedom, abs(rho)
    reach = max(1, min(int(math.floor(around_s * rate + 0.5)), size // 4))
    before, after = min(reach, middle - kept[0]), min(reach, kept[1] - 1 - middle)
    step = max(1, math.ceil((before + after) / 400))
    lags = np.arange(-(before // step), after // step + 1) * step
    values = (fft.ifft(product, size) * size)[middle - begin + lags]
    correlation = fft.ifft(weights / np.sum(weights), size) * size
    r = correlation[lags % size]
    rest = values - rho * r
    expected = 2 * np.sum(1 - np.abs(r) ** 2)
    covariance = correlation[(lags[:, None] - lags[None, :]) % size] - r[:, None] * np.conj(r)[None, :]
    variance = 4 * np.sum(np.abs(covariance) ** 2)
    found = np.sum(np.abs(rest) ** 2)
    return {
        "numbers": {
            "snr": snr,
            "chi-squared": chi2,
            "freedom": freedom,
            "reduced": reduced,
            "p-value": stats.chi2.sf(chi2, freedom),
            "reweighted": snr / ((1 + reduced**3) / 2) ** (1 / 6) if reduced > 1 else snr,
            "shape": found / expected,
            "shape-p-value": special.gammaincc(expected**2 / variance, found * expected / variance),
        }
    }
