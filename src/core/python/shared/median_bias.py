import numpy as np


def median_bias(n):
    """Expected median of n exponential variables of mean 1 (Allen et al., Phys. Rev. D 85, 122006 (2012), App. B): 1 - 1/2 + 1/3 - ... 1/n, n odd."""
    odd = n if n % 2 == 1 else n - 1
    k = np.arange(1, odd + 1)
    return np.sum((-1.0) ** (k + 1) / k)
