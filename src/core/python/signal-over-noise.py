import math

import numpy as np


def signal_over_noise(waves, spectra_in, *, low_hz):
    """Optimal SNR of every waveform over every noise curve, the area between 2 f |h| and sqrt(f S) in log frequency.

    waves: list of results of the step that makes waveforms; spectra_in: list of (frequency in Hz, one-sided density).
    Source: Moore, Cole, Berry, Class. Quantum Grav. 32, 015014 (2015).
    """
    numbers = {}
    for i, wave in enumerate(waves):
        for k, (f, s) in enumerate(spectra_in):
            numbers[f"snr-{i + 1}-{k + 1}"] = math.sqrt(np.sum(snr_parts(wave, f, s, low_hz, np.inf)[1]))
    return {"numbers": numbers}
