"""The whitening of src/core/python on a fixed series with a wall, a line and a gap. Prints JSON: every 37th sample."""
import json
import pathlib

import numpy as np
from scipy import signal, stats

here = pathlib.Path(__file__).resolve().parents[2] / "src/core/python"
for name in ("shared/valid_runs", "shared/median_spectrum", "shared/whitening_filter", "whiten"):
    exec((here / f"{name}.py").read_text())


def series(n, rate):
    k = np.arange(n)
    t = k / rate
    noise = ((k * 7919 + (k * k) % 1009) % 2003) / 1001.5 - 1
    x = noise + 300 * np.sin(2 * np.pi * 1.3 * t) + 3 * np.sin(2 * np.pi * 60.25 * t)
    x[9000:9100] = np.nan
    x[15000] = np.nan
    return 1e-21 * x


rate = 512.0
f = np.arange(0, 257)
curve = (f.astype(float), 1e-45 * (1 + (30 / np.maximum(f, 1.0)) ** 4 + (f / 100.0) ** 2))
cases = []
for given, low, high, reach, segment in (
    (False, 20, None, 1, 4),
    (False, 30, 200, 0.5, 2),
    (True, 10, None, 0.5, 4),
    (True, 0, None, 1, 4),
):
    out = whiten(
        series(24000, rate), rate, 1400000000, *(curve if given else ()), low_hz=low, high_hz=high, reach_s=reach, segment_s=segment
    )
    numbers = {k: float(v) for k, v in out["numbers"].items()}
    # Far in the tail the two ways of computing it differ in their last digits only relative to 1.
    del numbers["p-value"]
    x = out["x"][::37]
    cases.append(
        {
            "given": given,
            "low": low,
            "high": high,
            "reach": reach,
            "segment": segment,
            "numbers": numbers,
            "x": [None if np.isnan(v) else float(v) for v in x],
        }
    )
print(json.dumps({"rate": rate, "n": 24000, "frequency": curve[0].tolist(), "density": curve[1].tolist(), "cases": cases}))
