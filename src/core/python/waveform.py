import math

import numpy as np


def waveform(
    *, model, mass_1_msun, mass_2_msun, spin_1, spin_2, redshift, distance_mpc, low_hz, high_hz, taper, order, phase_deg,
    remnant_mass_msun, remnant_spin, frequency_hz, quality, amplitude, energy, file, holds, units, file_distance_mpc,
):
    """A signal as its transform: "at" gives h-plus in strain/Hz (kernel e^(-2 pi i f t)) at frequencies in Hz, t = 0 at its origin.

    Detector-frame masses are (1 + redshift) times those given; optimal orientation. Models: inspiral (stationary phase, aligned spins,
    Buonanno et al., Phys. Rev. D 80, 084043, 2009), inspiral-merger-ringdown (Ajith et al., Phys. Rev. D 77, 104017, 2008),
    damped-sinusoid (Berti, Cardoso, Will, Phys. Rev. D 73, 064030, 2006), sine-gaussian. A file has no equivalent here.
    """
    sun, mpc = 1.3271244e20 / 299792458.0**3, 3.085677581491367e22 / 299792458.0
    phase = math.radians(phase_deg)

    def edges(f, low, high):
        """1 in the band, 0 outside, with half a cosine over a part of each edge's frequency."""
        w = np.where((f >= low) & (f <= high), 1.0, 0.0)
        if taper > 0:
            rise = np.clip((f - low) / (low * taper), 0, 1)
            fall = np.clip((f - high * (1 - taper)) / (high * taper), 0, 1)
            w = w * (0.5 - 0.5 * np.cos(np.pi * rise)) * (0.5 + 0.5 * np.cos(np.pi * fall))
        return w

    def mode(mass, j):
        """Frequency in Hz and quality factor of the l = m = 2 mode of a black hole."""
        return (1.5251 - 1.1568 * (1 - j) ** 0.1292) / (2 * math.pi * mass * sun), 0.7 + 1.4187 * (1 - j) ** -0.499

    if model in ("inspiral", "inspiral-merger-ringdown"):
        spins = (spin_1, spin_2) if model == "inspiral" else (0.0, 0.0)
        (m1, s1), (m2, s2) = sorted(zip((mass_1_msun, mass_2_msun), spins), key=lambda b: -b[0])
        m1, m2 = m1 * (1 + redshift), m2 * (1 + redshift)
        total, eta = m1 + m2, m1 * m2 / (m1 + m2) ** 2
        seconds = math.pi * total * sun
        chirp = total * eta**0.6
        isco = 1 / (6**1.5 * seconds)
        s = (m1 / total) ** 2 * s1 + (m2 / total) ** 2 * s2
        spin = (
            2 * math.sqrt(3) * eta - 4.399 * eta**2 + 9.397 * eta**3 - 13.181 * eta**4 + s
            + (-0.085 * s + 0.102 * s**2 - 1.355 * s**3 - 0.868 * s**4) * eta
            + (-5.837 * s - 2.097 * s**2 + 4.109 * s**3 + 2.064 * s**4) * eta**2
        )
        hat = s / (1 - 2 * eta)
        radiated = (
            (0.0559745 * eta + 0.580951 * eta**2 - 0.960673 * eta**3 + 3.35241 * eta**4)
            * (1 + hat * (-0.00303023 - 2.00661 * eta + 7.70506 * eta**2))
            / (1 + hat * (-0.67144 - 1.47569 * eta + 7.30468 * eta**2))
        )
        numbers = {
            "chirp-mass": chirp,
            "total-mass": total,
            "symmetric-ratio": eta,
            "isco": isco,
            "tau0": 5 / (256 * math.pi * low_hz * eta) * (seconds * low_hz) ** (-5 / 3),
            "tau3": 1 / (8 * low_hz * eta) * (seconds * low_hz) ** (-2 / 3),
            "remnant-mass": total * (1 - radiated),
            "remnant-spin": spin,
        }
        if redshift != 0:
            numbers["source-chirp-mass"] = chirp / (1 + redshift)
        if 0 <= spin < 1:
            f_ring, q_ring = mode(total * (1 - radiated), spin)
            numbers["ringdown-frequency"] = f_ring
            numbers["ringdown-decay"] = q_ring / (math.pi * f_ring)
    if model == "inspiral":
        high = isco if high_hz is None else high_hz
        d, cs, ca = (m1 - m2) / total, (s1 + s2) / 2, (s1 - s2) / 2
        five = (
            math.pi * (38645 / 756 - 65 * eta / 9) + d * (-732985 / 2268 - 140 * eta / 9) * ca
            + (-732985 / 2268 + 24260 * eta / 81 + 340 * eta**2 / 9) * cs
        )
        plain = [
            1.0,
            0.0,
            3715 / 756 + 55 * eta / 9,
            -16 * math.pi + 113 / 3 * d * ca + (113 / 3 - 76 * eta / 3) * cs,
            15293365 / 508032 + 27145 * eta / 504 + 3085 * eta**2 / 72 + (-405 / 8 + 200 * eta) * ca**2
            - 405 / 4 * d * ca * cs + (-405 / 8 + 5 * eta / 2) * cs**2,
            five,
            11583231236531 / 4694215680 - 640 * math.pi**2 / 3 - 6848 / 21 * (np.euler_gamma + math.log(4))
            + (-15737765635 / 3048192 + 2255 * math.pi**2 / 12) * eta + 76055 * eta**2 / 1728 - 127825 * eta**3 / 1296
            + math.pi * (2270 / 3 * d * ca + (2270 / 3 - 520 * eta) * cs),
            math.pi * (77096675 / 254016 + 378515 * eta / 1512 - 74045 * eta**2 / 756)
            + d * (-25150083775 / 3048192 + 26804935 * eta / 6048 - 1985 * eta**2 / 48) * ca
            + (-25150083775 / 3048192 + 10566655595 * eta / 762048 - 1042165 * eta**2 / 3024 + 5345 * eta**3 / 36) * cs,
        ]
        logs = [0.0, 0.0, 0.0, 0.0, 0.0, 3 * five, -6848 / 21, 0.0]
        last = round(2 * float(order[:-2]))

        def series(f, slope, upto):
            """Phase in radians, or its derivative with respect to ln f."""
            v = np.cbrt(seconds * f)
            terms = [(plain[k] + logs[k] * np.log(v), logs[k]) for k in range(upto + 1)]
            total_ = sum((((k - 5) * p + log) / 3 if slope else p) * v ** (k - 5) for k, (p, log) in enumerate(terms))
            return 3 / (128 * eta) * total_

        def cycles(upto):
            turns = [(series(f, True, upto) - series(f, False, upto)) / (2 * math.pi) for f in (low_hz, high)]
            return turns[1] - turns[0]

        size = math.sqrt(5 / 24) * math.pi ** (-2 / 3) * (chirp * sun) ** (5 / 6) / (distance_mpc * mpc)
        numbers["duration"] = (series(high, True, last) / high - series(low_hz, True, last) / low_hz) / (2 * math.pi)
        numbers["cycles"] = cycles(last)
        before = {7: 6, 6: 5, 5: 4, 4: 3, 3: 2, 2: 0, 0: None}[last]
        numbers["last-term-cycles"] = cycles(last) - (0.0 if before is None else cycles(before))

        def at(f):
            f = np.asarray(f, float)
            safe = np.where(f > 0, f, 1.0)
            wave = size * safe ** (-7 / 6) * np.exp(1j * (phase + math.pi / 4 - series(safe, False, last)))
            return edges(f, low_hz, high) * wave

        distance, low, notes = distance_mpc, low_hz, "coalescence"
    elif model == "inspiral-merger-ringdown":
        def poly(a, b, c):
            return (a * eta + b) * eta + c

        merger, ring, width, cut = (
            poly(*row) / seconds
            for row in ((0.2974, 0.04481, 0.09556), (0.59411, 0.089794, 0.19111), (0.50801, 0.077515, 0.022369), (0.84845, 0.12848, 0.27299))
        )
        rows = {
            0: (0.17516, 0.079483, -0.07239), 2: (-51.571, -17.595, 13.253), 3: (658.66, 178.03, -159.72),
            4: (-3903.1, -774.93, 881.95), 6: (-24874, -1489.2, 4458.8), 7: (25196, 339.7, -3957.3),
        }
        terms = [((k - 5) / 3, poly(*row) / eta) for k, row in rows.items()]

        def psi(f):
            return sum(c * (seconds * f) ** p for p, c in terms)

        def slope(f):
            return sum(p * c * (seconds * f) ** p for p, c in terms) / f

        high = cut if high_hz is None else min(high_hz, cut)
        size = math.sqrt(5 * eta / 24) * (total * sun) ** (5 / 6) * merger ** (-7 / 6) / (mpc * math.pi ** (2 / 3) * distance_mpc)
        end = min(high, ring)
        start = min(low_hz, end)
        numbers["duration"] = (slope(start) - slope(end)) / (2 * math.pi)
        numbers["cycles"] = ((psi(end) - end * slope(end)) - (psi(start) - start * slope(start))) / (2 * math.pi)
        numbers.update({"merger-frequency": merger, "ring-frequency": ring, "ring-width": width, "cut-frequency": cut})

        def at(f):
            f = np.asarray(f, float)
            g = np.where(f > 0, f, 1.0)
            shape = np.where(
                g < merger,
                (g / merger) ** (-7 / 6),
                np.where(g < ring, (g / merger) ** (-2 / 3), (ring / merger) ** (-2 / 3) / (1 + (2 * (g - ring) / width) ** 2)),
            )
            angle = psi(g) - psi(ring) - slope(ring) * (g - ring) + phase + math.pi / 4
            return edges(f, low_hz, high) * size * shape * np.exp(1j * angle)

        distance, low, notes = distance_mpc, low_hz, "amplitude peak"
    elif model == "damped-sinusoid":
        given = frequency_hz is not None and quality is not None
        f_hole, q_hole = mode(remnant_mass_msun, remnant_spin)
        f0 = f_hole if frequency_hz is None else frequency_hz
        q = q_hole if quality is None else quality
        tau = q / (math.pi * f0)
        if amplitude is None:
            power = 20 * energy * remnant_mass_msun * sun
            h0 = math.sqrt(power / ((distance_mpc * mpc) ** 2 * tau * ((2 * math.pi * f0) ** 2 + 1 / tau**2)))
        else:
            h0 = amplitude
        high, low = 50 * f0 if high_hz is None else high_hz, low_hz
        swing = np.real(np.exp(2j * phase) / (2 / tau - 4j * math.pi * f0))
        numbers = {
            "frequency": f0, "quality": q, "decay": tau, "amplitude": h0, "root-sum-square": h0 * math.sqrt((tau / 2 + swing) / 2)
        }
        if not given and (frequency_hz is not None or quality is not None):
            numbers.update({"ringdown-frequency": f_hole, "ringdown-decay": q_hole / (math.pi * f_hole)})

        def at(f):
            f = np.asarray(f, float)
            one = np.exp(1j * phase) / (1 / tau + 2j * np.pi * (f - f0)) + np.exp(-1j * phase) / (1 / tau + 2j * np.pi * (f + f0))
            return np.where((f >= low) & (f <= high), h0 * one / 2, 0)

        distance, notes = (distance_mpc if amplitude is None else None), "start"
    elif model == "sine-gaussian":
        f0 = 150.0 if frequency_hz is None else frequency_hz
        q = 9.0 if quality is None else quality
        h0 = 1e-22 if amplitude is None else amplitude
        tau = q / (math.sqrt(2) * math.pi * f0)
        half = 6 / (math.pi * tau)
        low = low_hz if low_hz > 0 else max(0.0, f0 - half)
        high = f0 + half if high_hz is None else high_hz
        numbers = {
            "root-sum-square": h0 * math.sqrt(q / (4 * math.sqrt(math.pi) * f0) * (1 + math.cos(2 * phase) * math.exp(-q * q))),
            "amplitude": h0,
            "envelope-time": tau,
            "bandwidth": f0 / q,
        }

        def at(f):
            f = np.asarray(f, float)
            a, b = np.exp(-((np.pi * tau * (f - f0)) ** 2)), np.exp(-((np.pi * tau * (f + f0)) ** 2))
            wave = h0 * tau * math.sqrt(math.pi) / 2 * (math.cos(phase) * (a + b) + 1j * math.sin(phase) * (a - b))
            return np.where((f >= low) & (f <= high), wave, 0)

        distance, notes = None, "middle"
    else:
        raise NotImplementedError("a waveform from a file has no equivalent here")
    return {"at": at, "low_hz": low, "high_hz": high, "distance_mpc": distance, "origin": notes, "numbers": numbers}
