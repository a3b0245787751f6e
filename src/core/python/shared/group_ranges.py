import numpy as np


def group_ranges(values, low, high, reach):
    """Numbers of ranges below low and above high; bins of one side at most `reach` bins apart share a range."""
    counts = []
    for outside in (values < low, values > high):
        at = np.flatnonzero(outside)
        counts.append(0 if len(at) == 0 else 1 + int(np.count_nonzero(np.diff(at) > reach)))
    return counts
