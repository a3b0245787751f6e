import numpy as np
from scipy import fft


def detrended_bins(name):
    """Number of lowest bins that lose more than 1 % of white noise when a segment's mean is taken off: |W(k)|^2 / (N sum w^2)."""
    window = make_window(name, 512)
    share = np.abs(fft.rfft(window)) ** 2 / (512 * np.sum(window**2))
    return int(np.argmax(share[:17] <= 0.01))
