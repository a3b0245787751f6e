import hashlib
import sys
from pathlib import Path
import numpy as np


def read_input(name, facts, reader):
    """One input as Fringeside took it: samples from the file, span, scale; then what must agree before anything is computed.

    Holes of a time column are put in as NaN. The SHA-256 is over the samples as little-endian float64, every NaN as
    7ff8000000000000, so it does not depend on the file's format. Afterwards NaN and infinities are both NaN: not valid.
    """
    path = FOLDER / facts["file"]
    if not path.exists():
        raise SystemExit(f"{name}: there is no file {path}; give the folder of the data as the first argument")
    rows = reader(path, facts)
    if facts["runs"] is not None:
        placed, at = np.full(facts["length"], np.nan), 0
        for first, last in facts["runs"]:
            placed[first:last] = rows[at : at + last - first]
            at += last - first
        rows = placed
    x = np.array(rows[facts["from_sample"] : facts["from_sample"] + facts["samples"]], dtype=np.float64)
    if facts["scale"] != 1:
        x *= facts["scale"]
    x[np.isnan(x)] = np.nan
    digest = hashlib.sha256(x.astype("<f8").tobytes()).hexdigest()
    if len(x) != facts["samples"] or digest != facts["sha256"]:
        raise SystemExit(
            f"{name}: the samples in {path} are not those Fringeside read "
            f"({len(x)} samples, SHA-256 {digest}; expected {facts['samples']}, {facts['sha256']})"
        )
    x[~np.isfinite(x)] = np.nan
    if np.count_nonzero(np.isfinite(x)) != facts["valid_samples"]:
        raise SystemExit(f"{name}: {np.count_nonzero(np.isfinite(x))} valid samples, Fringeside found {facts['valid_samples']}")
    return {"x": x, "rate_hz": facts["rate_hz"], "start_gps": facts["start_gps"]}


def series(result):
    """A series as positional arguments."""
    return result["x"], result["rate_hz"], result["start_gps"]


def spectrum(result):
    """A one-sided spectrum as positional arguments."""
    return result["frequency_hz"], result["density"]
