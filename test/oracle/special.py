"""Special functions, quantiles and the Kolmogorov distribution from scipy.special and scipy.stats. Prints JSON."""
import json

import numpy as np
from scipy import special as F
from scipy import stats
from scipy.stats import _ksstats


def rows(f, *args):
    return [[*map(float, a), float(f(*a))] for a in args[0]]


def grid(*axes):
    return [tuple(x) for x in np.stack(np.meshgrid(*axes, indexing="ij"), -1).reshape(-1, len(axes))]


x = [(v,) for v in (-6, -2.3, -0.7, -1e-9, 1e-300, 1e-5, 0.1, 0.5, 1, 1.49, 1.51, 2, 2.9, 4, 5.5, 9, 20, 26)]
positive = [(v,) for v in (1e-10, 0.01, 0.3, 0.5, 0.9, 1.5, 2.7, 5, 7.5, 11.9, 12.1, 33.3, 100, 171, 1000, 1e6)]
tails = (1e-300, 1e-40, 1e-9, 1e-3, 0.05, 0.31, 0.5)
a_x = grid((0.5, 1, 1.5, 7, 50, 1000, 1e5), (0.01, 0.3, 0.8, 0.99, 1.01, 1.3, 3, 20))
a_x = [(a, a * r) for a, r in a_x]
abx = grid((0.5, 1, 3.5, 40, 3000), (0.5, 2, 11, 500, 1e5), (1e-6, 0.02, 0.3, 0.5, 0.9, 0.999))
counts = [(0, 1), (0, 10), (1, 10), (9, 10), (10, 10), (5, 20), (37, 1000), (999, 1000), (50000, 100000)]


def interval(k, n, level, method):
    r = stats.binomtest(k, n).proportion_ci(level, method)
    return [k, n, level, float(r.low), float(r.high)]


def ks(d, n):
    """kstwo turns to an expansion for more than 140 samples (off by 3e-7 at 400), so Pomeranz' exact sums there."""
    if 140 < n <= 1000 and d * np.sqrt(n) < 1.9:
        return float(_ksstats._kolmogn_Pomeranz(n, d, cdf=False))
    return float(stats.kstwo.sf(d, n))


print(
    json.dumps(
        {
            "erf": rows(F.erf, x),
            "erfc": rows(F.erfc, x),
            "i0e": rows(F.i0e, [(v,) for v in (0, 1e-8, 0.5, -1, 3.7, 12, 24.9, 25.1, 60, 800, 1e6)]),
            "gamma": rows(F.gamma, positive[:14] + [(-0.5,), (-3.7,), (-10.25,), (-1e-6,)]),
            "ln_gamma": rows(F.gammaln, positive),
            "normal_upper": [[q, float(stats.norm.isf(q))] for q in tails + (0.9, 0.999999)],
            "gamma_lower": rows(F.gammainc, a_x),
            "gamma_upper": rows(F.gammaincc, a_x),
            "beta_lower": rows(lambda a, b, x: F.betainc(a, b, x), abx),
            "beta_upper": rows(lambda a, b, x: F.betaincc(a, b, x), abx),
            "chi2_lower": [[p, k, float(stats.chi2.ppf(p, k))] for p in tails + (0.9,) for k in (1, 2, 3, 10, 30, 1000)],
            "chi2_upper": [[p, k, float(stats.chi2.isf(p, k))] for p in tails + (0.9,) for k in (1, 2, 3, 10, 30, 1000)],
            "beta_inverse": [
                [p, a, b, float(F.betaincinv(a, b, p))]
                for p in (1e-12, 0.025, 0.16, 0.5, 0.84, 0.975)
                for a, b in ((0.5, 0.5), (1, 20), (5, 6), (300, 2), (1000, 1000), (2, 1e5))
            ],
            "clopper_pearson": [interval(k, n, level, "exact") for k, n in counts for level in (0.68, 0.9, 0.99)],
            "wilson": [interval(k, n, level, "wilson") for k, n in counts for level in (0.68, 0.9, 0.99)],
            "kolmogorov": rows(F.kolmogorov, [(v,) for v in (0.1, 0.3, 0.6, 0.9, 0.999, 1, 1.2, 1.36, 2, 3, 6)]),
            "smirnov": [[n, d, float(F.smirnov(n, d))] for n, d in ((1, 0.3), (10, 0.1), (10, 0.41), (100, 0.2), (5000, 0.01))],
            "ks": [
                [n, float(d), ks(d, n)]
                for n in (1, 2, 5, 10, 37, 140, 400, 700, 2000, 10000, 100000)
                for d in np.array([0.3, 0.5, 0.8, 1.1, 1.36, 1.63, 1.95, 2.05, 3, 5]) / np.sqrt(n)
                if d < 1
            ],
            "elliptic_k": rows(F.ellipk, [(v,) for v in (0, 1e-9, 0.1, 0.5, 0.9, 0.999)]),
            "elliptic_k_complement": rows(F.ellipkm1, [(v,) for v in (1e-300, 1e-12, 1e-3, 0.4)]),
            "elliptic_f": rows(F.ellipkinc, grid((0.01, 0.5, 1, 1.4, 1.57), (0, 0.3, 0.9, 0.9999))),
            "jacobi": [
                [float(u), float(m), *map(float, F.ellipj(u, m)[:3])]
                for u, m in grid((-2.3, 0, 0.1, 0.9, 1.7, 4), (0, 1e-6, 0.3, 0.8, 0.999, 1))
            ],
        }
    )
)
