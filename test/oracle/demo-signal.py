"""Optimal SNRs of the demo's signal and glitch by NumPy from the published formulas. Prints JSON.

Inspiral at lowest order in amplitude, |h| = sqrt(5/24) pi^(-2/3) (c/D) (GM_c/c^3)^(5/6) f^(-7/6); the phase does not matter
here. Noise: wall, slope, floor, Lorentzian resonances. Everything that is a choice of the demo is listed in DEMO; antenna
factors were computed with Astropy's position of the site and mean sidereal time of 1982 (UT1 taken as UTC), NumPy for the rest.
"""
import json

import numpy as np

SUN = 4.9254909476412675e-6
MPC = 3.085677581491367e22 / 299792458
SIGNAL = dict(m1=14.6, m2=10.9, distance=485.0, inclination=0.09 * 2 * np.pi, ra=14.5, dec=-27.0, psi=21.0)
GMST = 129.13805148095437 + 168.4 * 360.98564736629 / 86400  # Astropy 8.0.1 at GPS 1400000000, then 168.4 s on
SITES = {
    "alder": dict(
        latitude=61.4, longitude=98.7, azimuths=(37, 127),
        position=(-463028.1633557537, 3025902.5975751933, 5576914.089888601),
        wall=(1.5e-18, 4.5), slope=(1e-23, 40), floor=(8e-24, 300),
        resonances=[(34.6, 90, 1.2e-22), (331.7, 1100, 9e-22), (502.4, 4000, 1.6e-21), (1003.1, 9000, 2.5e-21)],
    ),
    "birch": dict(
        latitude=42.6, longitude=69.2, azimuths=(64, 154),
        position=(1669844.006633785, 4395895.373020403, 4295104.593695124),
        wall=(2.2e-18, 4.6), slope=(1.2e-23, 44), floor=(1e-23, 260),
        resonances=[(29.3, 60, 2.5e-22), (318.9, 900, 1.1e-21), (507.2, 3500, 1.4e-21), (1012.8, 8000, 2.2e-21)],
    ),
}
BURST = dict(site="birch", frequency=140.0, q=4.0, phase=0.15 * 2 * np.pi, snr=25.0)


def density(s, f):
    (wall, knee), (slope, at), (floor, corner) = s["wall"], s["slope"], s["floor"]
    out = wall**2 / (1 + (f / knee) ** 20) + slope**2 * (at / np.maximum(f, knee)) ** 3 + floor**2 * (1 + (f / corner) ** 2)
    for f0, q, peak in s["resonances"]:
        u = f / f0
        out = out + peak**2 / ((q * (1 - u * u)) ** 2 + u * u)
    return out


def geometry(s):
    lat, lon = np.radians([s["latitude"], s["longitude"]])
    east = np.array([-np.sin(lon), np.cos(lon), 0])
    north = np.array([-np.sin(lat) * np.cos(lon), -np.sin(lat) * np.sin(lon), np.cos(lat)])
    x, y = (np.sin(a) * east + np.cos(a) * north for a in np.radians(s["azimuths"]))
    d = (np.outer(x, x) - np.outer(y, y)) / 2
    phi, dec, psi = np.radians([SIGNAL["ra"] - GMST, SIGNAL["dec"], SIGNAL["psi"]])
    west = np.array([np.sin(phi), -np.cos(phi), 0])
    up = np.array([-np.sin(dec) * np.cos(phi), -np.sin(dec) * np.sin(phi), np.cos(dec)])
    n = np.array([np.cos(dec) * np.cos(phi), np.cos(dec) * np.sin(phi), np.sin(dec)])
    p, q = np.cos(psi) * west + np.sin(psi) * up, np.cos(psi) * up - np.sin(psi) * west
    plus = np.sum(d * (np.outer(p, p) - np.outer(q, q)))
    cross = np.sum(d * (np.outer(p, q) + np.outer(q, p)))
    return float(plus), float(cross), float(-np.dot(s["position"], n) / 299792458)


def snr(s):
    plus, cross, _ = geometry(s)
    m = SIGNAL["m1"] + SIGNAL["m2"]
    chirp = m * (SIGNAL["m1"] * SIGNAL["m2"] / m**2) ** 0.6 * SUN
    end = 1 / (6**1.5 * np.pi * m * SUN)
    f = np.linspace(9, 1.05 * end, 400001)
    amplitude = np.sqrt(5 / 24) * np.pi ** (-2 / 3) / (SIGNAL["distance"] * MPC) * chirp ** (5 / 6) * f ** (-7 / 6)
    amplitude *= 0.5 - 0.5 * np.cos(np.pi * np.clip((f - 9) / 2, 0, 1))
    amplitude *= 0.5 + 0.5 * np.cos(np.pi * np.clip((f - 0.95 * end) / (0.1 * end), 0, 1))
    c = np.cos(SIGNAL["inclination"])
    factor = np.hypot(plus * (1 + c * c) / 2, cross * c)
    return float(np.sqrt(4 * np.trapezoid((factor * amplitude) ** 2 / density(s, f), f)))


def burst_amplitude():
    """Amplitude that gives the SNR, from the closed form of the transform of a Gaussian times a cosine."""
    f0, tau = BURST["frequency"], BURST["q"] / (np.sqrt(2) * np.pi * BURST["frequency"])
    f = np.linspace(1, 2048, 2000001)
    gauss = lambda x: np.sqrt(np.pi) * tau / 2 * np.exp(-((np.pi * tau * x) ** 2))
    h = np.abs(np.exp(1j * BURST["phase"]) * gauss(f - f0) + np.exp(-1j * BURST["phase"]) * gauss(f + f0))
    return BURST["snr"] / float(np.sqrt(4 * np.trapezoid(h**2 / density(SITES[BURST["site"]], f), f)))


F = np.array([2.0, 8.0, 12.0, 34.6, 100.0, 150.0, 318.9, 502.0, 1003.1, 2000.0])
print(
    json.dumps(
        {
            "sites": {
                name: {"geometry": geometry(s), "snr": snr(s), "f": F.tolist(), "density": density(s, F).tolist()}
                for name, s in SITES.items()
            },
            "burstAmplitude": burst_amplitude(),
        }
    )
)
