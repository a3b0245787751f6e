"""Windows of scipy.signal, and the bias of the median of periodograms. Prints JSON."""
import json

from scipy.signal import windows as W
from scipy.signal._spectral_py import _median_bias

SHAPED = [
    ("tukey", {"alpha": 0.25}, lambda n, sym: W.tukey(n, 0.25, sym=sym)),
    ("tukey", {"alpha": 0}, lambda n, sym: W.tukey(n, 0, sym=sym)),
    ("tukey", {"alpha": 0.37}, lambda n, sym: W.tukey(n, 0.37, sym=sym)),
    ("tukey", {"alpha": 1}, lambda n, sym: W.tukey(n, 1, sym=sym)),
    ("kaiser", {"beta": 0}, lambda n, sym: W.kaiser(n, 0, sym=sym)),
    ("kaiser", {"beta": 5}, lambda n, sym: W.kaiser(n, 5, sym=sym)),
    ("kaiser", {"beta": 14.5}, lambda n, sym: W.kaiser(n, 14.5, sym=sym)),
    ("kaiser", {"beta": 60}, lambda n, sym: W.kaiser(n, 60, sym=sym)),
    ("gaussian", {"std": 3.5}, lambda n, sym: W.gaussian(n, 3.5, sym=sym)),
    ("gaussian", {"std": 40}, lambda n, sym: W.gaussian(n, 40, sym=sym)),
]
PLAIN = [
    ("boxcar", W.boxcar),
    ("bartlett", W.bartlett),
    ("cosine", W.cosine),
    ("hann", W.hann),
    ("hamming", W.hamming),
    ("blackman", W.blackman),
    ("nuttall", W.nuttall),
    ("blackman-harris", W.blackmanharris),
    ("flat-top", W.flattop),
]
ALL = SHAPED + [(name, {}, lambda n, sym, f=f: f(n, sym=sym)) for name, f in PLAIN]

cases = []
for name, shape, make in ALL:
    for n in (1, 2, 3, 8, 33, 128):
        for sym in (False, True):
            cases.append(
                {"name": name, "shape": shape, "n": n, "periodic": not sym, "w": make(n, sym).tolist()}
            )
slepian = []
for n, nw, k in ((8, 1.5, 3), (33, 2.5, 4), (64, 4, 8), (200, 3, 5)):
    v, ratios = W.dpss(n, nw, k, return_ratios=True)
    slepian.append({"n": n, "nw": nw, "tapers": v.tolist(), "ratios": ratios.tolist()})
print(
    json.dumps(
        {
            "windows": cases,
            "slepian": slepian,
            "median_bias": {str(n): float(_median_bias(n)) for n in (1, 2, 3, 4, 5, 10, 31, 64, 1001)},
        }
    )
)
