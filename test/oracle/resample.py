"""scipy.signal.resample_poly on a fixed noise-like series. Prints JSON."""
import json

import numpy as np
from scipy import signal as S


def series(n):
    """Deterministic, broad-band, simple enough to write down twice."""
    k = np.arange(n)
    return ((k * 7919 + (k * k) % 1009) % 2003) / 1001.5 - 1


cases = []
for up, down, n in (
    (1, 2, 101),
    (1, 4, 400),
    (1, 16, 1000),
    (2, 1, 60),
    (3, 2, 100),
    (2, 3, 101),
    (4, 6, 101),
    (160, 147, 300),
    (147, 160, 300),
    (25, 256, 3000),
    (5, 5, 12),
    (7, 3, 1),
    (1, 8, 5),
):
    cases.append({"up": up, "down": down, "n": n, "y": S.resample_poly(series(n), up, down).tolist()})
n = 300
strong = {"up": 3, "down": 8, "n": n, "beta": 9, "y": S.resample_poly(series(n), 3, 8, window=("kaiser", 9.0)).tolist()}
print(json.dumps({"cases": cases, "strong": strong}))
