import numpy as np


def reference_noise(over_frequency_hz, over_density, *, curve, file, holds, low_hz, high_hz):
    """One-sided strain density in 1/Hz of a published model, or of a curve in a two-column file, at the frequencies of an estimate.

    Models: Damour, Iyer, Sathyaprakash, Phys. Rev. D 63, 044023 (2001); Sathyaprakash & Schutz, Living Rev. Relativity 12, 2 (2009).
    A curve runs straight in log density against log frequency. Nothing is extrapolated: NaN there. over_frequency_hz, over_density:
    the estimate it is compared with, or None.
    """
    def bowl(x):
        return (1 - x**2 + x**4 / 2) / (1 + x**2 / 2)

    models = {
        "first-generation-4km": (40, lambda f: 9e-46 * ((4.49 * f / 150) ** -56 + 0.16 * (f / 150) ** -4.52 + 0.52 + 0.32 * (f / 150) ** 2)),
        "first-generation-3km": (20, lambda f: 3.2e-46 * ((7.8 * f / 500) ** -5 + 2 / (f / 500) + 0.63 + (f / 500) ** 2)),
        "first-generation-600m": (40, lambda f: 1e-46 * ((3.4 * f / 150) ** -30 + 34 / (f / 150) + 20 * bowl(f / 150))),
        "second-generation-4km-2009": (20, lambda f: 1e-49 * ((f / 215) ** -4.14 - 5 * (f / 215) ** -2 + 111 * bowl(f / 215))),
        "third-generation-underground": (
            10,
            lambda f: 1e-50
            * (2.39e-27 * (f / 100) ** -15.64 + 0.349 * (f / 100) ** -2.145 + 1.76 * (f / 100) ** -0.12 + 0.409 * (f / 100) ** 1.1) ** 2,
        ),
    }
    if curve == "file":
        rows = []
        with open(file, encoding="utf-8-sig") as lines:
            for line in lines:
                cells = line.replace(",", " ").replace(";", " ").split()
                if cells == [] or cells[0][0] in "#%;!" or cells[0].startswith("//"):
                    continue
                try:
                    rows.append([float(c) for c in cells])
                except ValueError:
                    if rows:
                        raise
        known, value = np.array([r for r in rows if r[0] > 0]).T
        value = value**2 if holds == "amplitude density" else value
        first, last, own = known[0], known[-1], known

        def at(f):
            with np.errstate(divide="ignore"):
                y = np.exp(np.interp(np.log(f), np.log(known), np.log(value)))
            return np.where((f >= first) & (f <= last), y, np.nan)
    else:
        first, formula = models[curve]
        last = np.inf
        points = int(np.ceil(400 * np.log10(8192 / first))) + 1
        own = first * (8192 / first) ** (np.arange(points) / (points - 1))

        def at(f):
            return np.where(f >= first, formula(np.maximum(f, first)), np.nan)

    frequency = own if over_frequency_hz is None else over_frequency_hz
    density = at(frequency)
    numbers = {"range-from": first, "range-to": min(last, frequency[-1])}
    for f in (100.0, 1000.0):
        numbers[f"at-{f:.0f}"] = np.sqrt(at(np.array([f]))[0])
    if over_density is not None:
        band = (frequency >= low_hz * (1 - 1e-12)) & (frequency < high_hz * (1 + 1e-12))
        ratio = np.sqrt(over_density[band] / density[band])
        numbers["ratio"] = np.median(ratio[np.isfinite(ratio)]) if np.any(np.isfinite(ratio)) else np.nan
    return {"frequency_hz": frequency, "density": density, "numbers": numbers}
