import math

import numpy as np
from scipy import integrate, optimize

# tolerance horizon-1: rel 1e-6, because the redshift is found to a tolerance in both
# tolerance horizon-2: rel 1e-6, because the redshift is found to a tolerance in both
# tolerance horizon-3: rel 1e-6, because the redshift is found to a tolerance in both
# tolerance average-1: rel 1e-6, because the redshift is found to a tolerance in both
# tolerance average-2: rel 1e-6, because the redshift is found to a tolerance in both
# tolerance average-3: rel 1e-6, because the redshift is found to a tolerance in both


def reach(frequency_hz, density, *, masses_msun, ratio, model, threshold, low_hz, high_hz, redshift, hubble_kmsmpc, matter):
    """Horizon and sky average in Mpc of compact binaries of given total masses (frame of the source) in this noise.

    Horizon: luminosity distance of a source straight above and face on with the threshold SNR; average: horizon / 2.26478.
    model: "inspiral" (lowest order up to the last stable orbit); the other one is not computed here.
    Source: Finn & Chernoff, Phys. Rev. D 47, 2198 (1993); Hogg, astro-ph/9905116 (1999).
    """
    if model != "inspiral":
        raise NotImplementedError("only the inspiral has an equivalent in Python")
    sun, mpc = 1.3271244e20 / 299792458.0**3, 3.085677581491367e22 / 299792458.0
    f, s = frequency_hz, density
    steps = np.diff(f)
    top = min(np.inf if high_hz is None else high_hz, f[-1])
    if np.ptp(steps) < 1e-6 * np.max(steps):
        df = (f[-1] - f[0]) / (len(f) - 1)
        grid = f[(f >= low_hz) & (f <= top)]
        width = np.full(len(grid), df)
    else:
        grid = low_hz * (top / low_hz) ** ((np.arange(4000) + 0.5) / 4000)
        width = grid * math.log(top / low_hz) / 4000
    value = np.interp(grid, f, s)
    weight = np.where((value > 0) & np.isfinite(value), 4 * width / value, 0.0)
    gaps = np.append(np.diff(grid), grid[-1] - grid[-2])

    def snr_at_one(total):
        eta = ratio / (1 + ratio) ** 2
        chirp = total * eta**0.6 * sun
        end = 1 / (6**1.5 * math.pi * total * sun)
        amplitude = math.sqrt(5 / 24) * math.pi ** (-2 / 3) * chirp ** (5 / 6) * np.minimum(grid, end) ** (-7 / 6) / mpc
        part = np.clip((end - grid) / gaps + 0.5, 0, 1)
        return math.sqrt(np.sum(part * weight * amplitude**2))

    def luminosity(z):
        inner = integrate.quad(lambda u: 1 / math.sqrt(matter * (1 + u) ** 3 + 1 - matter), 0, z, epsabs=0, epsrel=1e-12)[0]
        return (1 + z) * 299792.458 / hubble_kmsmpc * inner

    numbers = {}
    for i, total in enumerate(masses_msun):
        if redshift == "neglected":
            horizon = snr_at_one(total) / threshold
        else:
            z = optimize.brentq(lambda u: luminosity(u) - snr_at_one(total * (1 + u)) / threshold, 1e-12, 1000, xtol=1e-14, rtol=1e-13)
            horizon = luminosity(z)
        numbers[f"horizon-{i + 1}"] = horizon
        numbers[f"average-{i + 1}"] = horizon / 2.26478
    return {"numbers": numbers}
