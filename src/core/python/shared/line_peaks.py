import numpy as np


def line_peaks(density, floor, threshold, first, last, reach, half):
    """Highest bins and runs of the features above `threshold` times the floor, as (from, to, at), by frequency.

    Runs closer than `reach` bins are one feature; a run is cut at a valley from which both sides rise by the threshold squared; near a
    stronger feature one must also stand above the bins right around it.
    """
    runs = []
    for k in range(first, last):
        if density[k] > threshold * floor[k]:
            if runs and k - runs[-1][1] < reach:
                runs[-1][1] = k + 1
            else:
                runs.append([k, k + 1])

    def split(a, b):
        at = a + int(np.argmax(density[a:b]))
        for side in (-1, 1):
            valley, k = at, at
            while a <= k < b:
                if density[k] < density[valley]:
                    valley = k
                if abs(k - at) > 2 * reach and density[k] >= threshold**2 * density[valley]:
                    cut = valley if side > 0 else valley + 1
                    return split(a, cut) + split(cut, b)
                k += side
        return [(a, b, at)]

    found = [p for a, b in runs for p in split(a, b)]
    kept = []
    for p in sorted(found, key=lambda q: -density[q[2]]):
        near = any(abs(q[2] - p[2]) < 2 * half and density[q[2]] > 4 * density[p[2]] for q in kept)
        left = density[max(0, p[2] - reach - 13) : max(0, p[2] - reach - 1)]
        right = density[p[2] + reach + 1 : p[2] + reach + 13]
        around = max(np.median(left) if len(left) else 0.0, np.median(right) if len(right) else 0.0)
        if not near or density[p[2]] > threshold * around:
            kept.append(p)
    return sorted(kept, key=lambda p: p[2])
