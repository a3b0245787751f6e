import numpy as np
from scipy.io import wavfile


def read_wav(path, facts):
    """One track of a WAVE file, integers divided by their full scale (8-bit ones are centred on 128 first)."""
    _, data = wavfile.read(path)
    track = data.reshape(len(data), -1)[:, facts["track"]]
    if track.dtype.kind == "f":
        return track.astype(np.float64)
    # SciPy puts 24-bit samples at the top of 32 bits, so the width of the array's own type sets the scale.
    zero = 128 if track.dtype == np.uint8 else 0
    return (track.astype(np.float64) - zero) / 2.0 ** (8 * track.dtype.itemsize - 1)
