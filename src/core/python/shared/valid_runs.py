def valid_runs(x):
    """Half-open runs of finite samples as pairs of indices."""
    good = np.concatenate(([False], np.isfinite(x), [False]))
    edges = np.flatnonzero(good[1:] != good[:-1])
    return [(int(a), int(b)) for a, b in zip(edges[::2], edges[1::2])]
