import math
import numpy as np


def overview(x, rate_hz, start_gps):
    """Counts, extremes and moments of the valid samples, in the samples' unit; rms about zero, deviation about the mean.

    saturated: samples in runs of 8 or more equal ones at the smallest or largest value of all, runs of zeros of at least 0.05 s (drop-outs)
    not counted; none when that is more than half of all samples (a state channel). robust-width: 1.4826 times the median absolute
    deviation (Hampel, J. Am. Stat. Assoc. 69, 383 (1974)), from 64 blocks of 4096 spread evenly when there are more than 2^18 samples.
    """
    valid = x[np.isfinite(x)]
    numbers = {"rate": rate_hz, "duration": len(x) / rate_hz, "samples": len(x), "unusable": len(x) - len(valid), "saturated": 0}
    if len(valid) == 0:
        return {"numbers": numbers}
    change = np.flatnonzero(np.concatenate(([True], x[1:] != x[:-1])))
    length = np.diff(np.concatenate((change, [len(x)])))
    value = x[change]
    dropped = (value == 0) & (length >= max(8, math.ceil(0.05 * rate_hz)))
    at_end = ((value == valid.min()) | (value == valid.max())) & (length >= 8) & ~dropped
    both = length[at_end].sum()
    numbers["saturated"] = 0 if valid.min() == valid.max() or both > len(valid) / 2 else int(both)
    part = valid
    if len(valid) > 2**18:
        firsts = [(k * (len(valid) - 4096)) // 63 for k in range(64)]
        part = np.concatenate([valid[a : a + 4096] for a in firsts])
    width = 1.482602218505602 * np.median(np.abs(part - np.median(part)))
    numbers |= {
        "min": valid.min(),
        "max": valid.max(),
        "mean": valid.mean(),
        "rms": np.sqrt(np.mean(valid**2)),
        "deviation": valid.std(ddof=0),
        "robust-width": width,
    }
    return {"x": x, "rate_hz": rate_hz, "start_gps": start_gps, "numbers": numbers}
