import numpy as np


def mean_variance(window, step, segments):
    """Variance of the mean of overlapping periodograms over the square of the density: (1/K)[1 + 2 sum (1 - j/K) rho_j] (Welch 1967)."""
    rho, weight = overlap_correlations(window, step, segments)
    return (1 + 2 * np.sum(weight * rho)) / segments
