import numpy as np


def read_npz(path, facts):
    """One channel of an array of a NumPy archive: the index fixes every axis but that of time."""
    with np.load(path, allow_pickle=False) as archive:
        return archive[facts["member"]][facts["index"]]
