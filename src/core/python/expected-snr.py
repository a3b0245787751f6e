import math

import numpy as np


def expected_snr(wave, frequency_hz, density, *, low_hz, high_hz, threshold):
    """Optimal SNR of a waveform in noise of one-sided density: rho^2 = 4 int |h|^2/S df.

    wave: result of the step that made it. threshold: SNR at which the distance in Mpc is stated.
    Source: Finn & Chernoff, Phys. Rev. D 47, 2198 (1993).
    """
    f, parts, low, high = snr_parts(wave, frequency_hz, density, low_hz, np.inf if high_hz is None else high_hz)
    snr = math.sqrt(np.sum(parts))
    below = np.cumsum(parts)

    def share(part):
        return f[min(int(np.searchsorted(below, part * snr * snr)), len(f) - 1)]

    numbers = {"snr": snr, "quarter": share(0.25), "half": share(0.5), "most": share(0.9), "from": low, "to": high}
    if wave["distance_mpc"] is not None:
        numbers["distance"] = wave["distance_mpc"] * snr / threshold
    return {"numbers": numbers}
