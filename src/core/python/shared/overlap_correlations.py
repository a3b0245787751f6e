import numpy as np


def overlap_correlations(window, step, segments):
    """Correlations of the powers of segments 1, 2, ... steps apart and the weights 1 - j/segments of each (Welch 1967)."""
    lags = np.arange(1, segments)
    lags = lags[lags * step < len(window)]
    rho = np.array([np.dot(window[: len(window) - j * step], window[j * step :]) for j in lags]) / np.dot(window, window)
    return rho**2, 1 - lags / segments
