import numpy as np
from scipy import special


def median_variance(window, step, segments):
    """Variance of the bias-corrected median of overlapping periodograms over the square of the density.

    Order statistics of exponential variables (Renyi 1953); overlap through the Laguerre expansion of the bivariate exponential law.
    """
    n = segments
    k = np.arange(n // 2 + 1, n + 1)
    single = np.sum(1.0 / k**2) + (1.0 / n**2 if n % 2 == 0 else 0.0)
    rho, weight = overlap_correlations(window, step, segments)
    order = np.arange(1, 400)
    log2 = np.log(2.0)
    laguerre = (special.eval_laguerre(order - 1, log2) - special.eval_laguerre(order, log2)) ** 2
    phi = np.array([np.sum(laguerre * r**order) for r in rho])
    return single / median_bias(n) ** 2 * (1 + 2 * np.sum(weight * phi))
