import math
import numpy as np


def segment_starts(x, rate_hz, segment_s, overlap, exclude_s):
    """First samples of the overlapping segments: each run of valid samples has its own grid, and no segment leaves its run.

    exclude_s: pairs of seconds after the start of x that no segment may touch.
    Returns the starts, the samples per segment, the samples from one segment to the next, and the samples that are in any segment as a mask.
    """
    size = math.floor(segment_s * rate_hz + 0.5)
    step = max(1, size - math.floor(size * overlap + 1e-9))
    usable = np.array(x)
    for first, last in exclude_s:
        usable[max(0, math.floor(first * rate_hz)) : max(0, math.ceil(last * rate_hz))] = np.nan
    starts = []
    used = np.zeros(len(x), dtype=bool)
    for first, last in valid_runs(usable):
        here = range(first, last - size + 1, step)
        starts.extend(here)
        if len(here) > 0:
            used[first : here[-1] + size] = True
    return np.array(starts, dtype=int), size, step, used
