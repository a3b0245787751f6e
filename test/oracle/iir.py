"""Filters of scipy.signal as sections, their response, notches, steady states. Prints JSON."""
import json

import numpy as np
from scipy import signal as S

FAMILIES = {
    "butterworth": (S.butter, ()),
    "chebyshev-1": (S.cheby1, ("ripple",)),
    "chebyshev-2": (S.cheby2, ("attenuation",)),
    "elliptic": (S.ellip, ("ripple", "attenuation")),
}
BANDS = {"lowpass": "low", "highpass": "high", "bandpass": "bandpass", "bandstop": "bandstop"}


def case(family, band, order, edges, rate, ripple=0.5, attenuation=60.0):
    make, needs = FAMILIES[family]
    values = {"ripple": ripple, "attenuation": attenuation}
    edge = edges[0] if len(edges) == 1 else edges
    args = (order, *[values[n] for n in needs], edge)
    sos = make(*args, btype=BANDS[band], fs=rate, output="sos")
    f = np.geomspace(edges[0] / 8, min(edges[-1] * 8, 0.49 * rate), 9)
    f = np.concatenate((f, edges))
    # From zeros and poles: at low frequencies freqz_sos itself loses digits (2e-9 at 1.25 Hz of 16384 Hz).
    _, h = S.freqz_zpk(*make(*args, btype=BANDS[band], fs=rate, output="zpk"), worN=f, fs=rate)
    spec = {"family": family, "band": band, "order": order, "edges": edges, "rate": rate}
    spec.update({n: values[n] for n in needs})
    return {
        "spec": spec,
        "sos": sos.tolist(),
        "f": f.tolist(),
        "re": h.real.tolist(),
        "im": h.imag.tolist(),
    }


EDGES = {"lowpass": ([130], 4096), "highpass": ([130], 4096), "bandpass": ([35, 350], 4096), "bandstop": ([55, 65], 1024)}

cases = []
for family in FAMILIES:
    for order in (1, 2, 3, 4, 5, 8):
        for band, (edges, rate) in EDGES.items():
            cases.append(case(family, band, order, edges, rate))
# Low and wide bands at a high rate, where the transfer-function form fails.
for family in FAMILIES:
    cases.append(case(family, "bandpass", 8, [20, 300], 16384))
    cases.append(case(family, "bandpass", 6, [20, 1700], 16384, 1.0, 40.0))
    cases.append(case(family, "highpass", 12, [10], 16384, 0.1, 80.0))
    cases.append(case(family, "lowpass", 7, [7000], 16384, 3.0, 20.0))

notches = []
for f0, q, rate in ((60, 30, 4096), (60, 300, 16384), (50.02, 5, 1024), (331.7, 1000, 4096), (500, 1, 4096)):
    b, a = S.iirnotch(f0, q, fs=rate)
    notches.append({"f0": f0, "q": q, "rate": rate, "b": b.tolist(), "a": a.tolist()})

sos = S.butter(4, [20, 500], "bandpass", fs=4096, output="sos")
w = np.array([5.0, 20, 60, 200, 490, 900, 1900])
b, a = S.butter(3, 100, fs=4096)
delay = S.group_delay((b, a), w=w, fs=4096)[1] / 4096

print(
    json.dumps(
        {
            "cases": cases,
            "notches": notches,
            "delay": {"f": w.tolist(), "seconds": delay.tolist()},
            "decibel_at_10_20_500_1000": (
                20 * np.log10(np.abs(S.freqz_sos(sos, worN=[10, 20, 500, 1000], fs=4096)[1]))
            ).tolist(),
        }
    )
)
