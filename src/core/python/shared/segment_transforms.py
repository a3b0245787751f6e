import numpy as np
from scipy import fft


def segment_transforms(x, starts, window, detrend):
    """Discrete Fourier transforms of windowed segments, one row each. detrend: "constant" takes each segment's mean off first, "none" does not."""
    pieces = np.stack([x[first : first + len(window)] for first in starts])
    if detrend == "constant":
        pieces = pieces - pieces.mean(axis=1, keepdims=True)
    return fft.rfft(pieces * window, axis=1)
