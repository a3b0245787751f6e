import math

import numpy as np


def line_shape(density, floor, df_hz, lobe, at, low, high):
    """Frequency, width, height and power of the feature whose highest bin is `at`, from the bins low to high.

    Width: full width of the excess over the floor at half its height, freed of the window's (Olivero & Longbothum, JQSRT 17, 233, 1977);
    below half of the window's only that is stated. Frequency: vertex of a parabola through logarithms, or the centroid of the excess.
    """
    base = floor[at]
    top = density[at] - base

    def edge(side):
        d = 1
        while True:
            k = at + side * d
            if k >= high or k < low:
                return d
            a, b = density[k - side] - base, density[k] - base
            if b <= top / 2:
                return d - 1 + math.log(2 * a / top) / math.log(a / max(b, top / 2000))
            d += 1

    seen = edge(1) + edge(-1)
    c = 0.5346**2 - 0.2166
    root = math.sqrt(max(0.0, (0.5346 * seen) ** 2 - c * (seen**2 - lobe**2)))
    own = 0.0 if seen <= lobe else (0.5346 * seen - root) / c
    unresolved = own < lobe / 2
    if unresolved:
        y = np.log(np.maximum(density[at - 1 : at + 2], 5e-324))
        bend = 2 * y[1] - y[0] - y[2]
        place = at + min(0.5, max(-0.5, (y[2] - y[0]) / (2 * bend))) if bend > 0 else float(at)
    else:
        place, half = float(at), max(2.0, seen)
        for _ in range(6):
            k = np.arange(max(low, math.ceil(place - half)), min(high, math.floor(place + half) + 1))
            excess = density[k] - base
            moved = at + np.sum(excess * (k - at)) / np.sum(excess)
            if not abs(moved - at) <= half:
                place = float(at)
                break
            place = moved
    reach = max(4, math.ceil(3 * seen))
    k = np.arange(max(low, at - reach), min(high, at + reach + 1))
    power = np.sum(density[k] - np.where(np.isnan(floor[k]), base, floor[k])) * df_hz
    return {
        "frequency_hz": place * df_hz,
        "width_hz": (lobe / 2 if unresolved else own) * df_hz,
        "unresolved": unresolved,
        "height": density[at] / base,
        "power": max(0.0, power),
    }
