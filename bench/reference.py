"""The same works in straightforward SciPy. Reads "NAME" a line, answers one JSON line: CPU seconds and some numbers."""
import json
import sys
import time

import numpy as np
import scipy.fft as sf
from scipy import signal

FOLDER = sys.argv[1]
with open(f"{FOLDER}/setup.json") as setup:
    SECTIONS, TILES = json.load(setup).values()
RATE = 4096


def load(name):
    return np.fromfile(f"{FOLDER}/{name}.f64")


def fft(kind):
    n = 1 << 17
    noise = load("noise64")
    x = (noise[:n] + 1j * noise[n : 2 * n]).astype(kind)

    def run():
        for _ in range(40):
            y = sf.fft(x, workers=1)
        return [float(y[k].real) for k in (1, 1000, 77777)]

    return run


def welch():
    x = load("noise4096")

    def run():
        _, p = signal.welch(x, RATE, "hann", nperseg=4 * RATE, noverlap=2 * RATE, average="median")
        return [float(p[k]) for k in (10, 400, 4000)]

    return run


def zero_phase():
    x, sos = load("noise4096"), np.array(SECTIONS)

    def run():
        y = signal.sosfiltfilt(sos, x)
        return [float(y[i]) for i in (1000, 1000000, 16000000)]

    return run


def constant_q():
    x = load("noise64").astype(np.float32)
    rows = [(t["q"], t["f"], t["low"], np.array(t["weights"], np.float32), t["length"]) for t in TILES]

    def run():
        spectrum = sf.rfft(x, workers=1)
        best = (0, 0, 0)
        for q, f, low, weights, n in rows:
            band = np.zeros(n, np.complex64)
            band[: len(weights)] = spectrum[low : low + len(weights)] * weights
            z = sf.ifft(band, workers=1)
            e = z.real**2 + z.imag**2
            m = e.max() / e.mean()
            if m > best[0]:
                best = (float(m), q, f)
        return best

    return run


def matched_filter(kind):
    n = 1 << 19
    bins = n // 2 + 1
    d = load("spectrum")
    data = (d[:bins] + 1j * d[bins:]).astype(kind)
    bank = [(t[:bins] + 1j * t[bins:]).astype(kind) for t in load("templates").reshape(64, -1)]
    product = np.zeros(n, kind)

    def run():
        found = []
        for t in bank:
            np.multiply(data, t, out=product[:bins])
            z = sf.ifft(product, workers=1)
            p = z.real**2 + z.imag**2
            k = int(p.argmax())
            found.append((k, float(p[k])))
        return [found[0][0], found[63][0], found[31][1]]

    return run


WORKS = {
    "fft-f64-2^17": lambda: fft(np.complex128),
    "fft-f32-2^17": lambda: fft(np.complex64),
    "welch-median-4096s": welch,
    "zero-phase-4096s": zero_phase,
    "constant-q-64s": constant_q,
    "matched-filter-f32": lambda: matched_filter(np.complex64),
    "matched-filter-f64": lambda: matched_filter(np.complex128),
}
name, run = "", None
for line in sys.stdin:
    if line.strip() != name:
        run = None  # the last work's arrays go before the next are made
        name = line.strip()
        run = WORKS[name]()
    start = time.process_time()
    numbers = run()
    print(json.dumps({"cpu": time.process_time() - start, "numbers": numbers}), flush=True)
