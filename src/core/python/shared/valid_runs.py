import numpy as np


def valid_runs(x):
    """Runs of valid (finite) samples as half-open pairs of indices."""
    good = np.concatenate(([False], np.isfinite(x), [False]))
    edges = np.flatnonzero(good[1:] != good[:-1])
    return list(zip(edges[::2].tolist(), edges[1::2].tolist()))
