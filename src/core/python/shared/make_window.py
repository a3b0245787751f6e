import numpy as np
from scipy import signal


def make_window(name, n):
    """Window of n samples in its periodic form, as for spectra (Harris, Proc. IEEE 66, 51 (1978); HFT: Heinzel, Rüdiger, Schilling, 2002)."""
    cosine_sums = {
        "hamming": [0.54, 0.46],
        "HFT70": [1, 1.90796, 1.07349, 0.18199],
        "HFT90D": [1, 1.942604, 1.340318, 0.440811, 0.043097],
        "HFT95": [1, 1.9383379, 1.3045202, 0.402827, 0.0350665],
        "HFT116D": [1, 1.9575375, 1.4780705, 0.6367431, 0.1228389, 0.0066288],
        "HFT144D": [1, 1.96760033, 1.57983607, 0.81123644, 0.22583558, 0.02773848, 0.0009036],
        "HFT196D": [1, 1.97928042, 1.710288951, 1.081629853, 0.448734314, 0.112376628, 0.015122992, 0.000871252, 0.000011896],
        "HFT223D": [
            1, 1.98298997309, 1.75556083063, 1.19037717712, 0.56155440797, 0.17296769663, 0.03233247087, 0.00324954578,
            0.0001380104, 0.00000132725,
        ],
        "HFT248D": [
            1, 1.985844164102, 1.791176438506, 1.282075284005, 0.667777530266, 0.240160796576, 0.056656381764, 0.008134974479,
            0.00062454465, 1.9808998e-5, 1.32974e-7,
        ],
    }  # fmt: skip
    if name in cosine_sums:
        return signal.windows.general_cosine(n, cosine_sums[name], sym=False)
    if name == "blackman-harris":
        return signal.windows.blackmanharris(n, sym=False)
    if name == "flat-top":
        return signal.windows.flattop(n, sym=False)
    if name == "tukey":
        return signal.windows.tukey(n, alpha=0.25, sym=False)
    if name == "kaiser":
        return signal.windows.kaiser(n, beta=3 * np.pi, sym=False)
    if name == "gaussian":
        return signal.windows.gaussian(n, std=n / 6, sym=False)
    return getattr(signal.windows, name)(n, sym=False)
