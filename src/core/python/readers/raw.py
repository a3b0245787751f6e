import numpy as np


def read_raw(path, facts):
    """One of several interleaved channels of raw samples, as the sidecar described them."""
    bytes_ = np.fromfile(path, dtype=np.uint8, offset=facts["offset_bytes"])
    if facts["dtype"] == "int24":
        frames = len(bytes_) // (3 * facts["tracks"])
        part = bytes_[: frames * 3 * facts["tracks"]].reshape(frames, facts["tracks"], 3)[:, facts["track"]].astype(np.int32)
        low, middle, high = (part[:, k] for k in ((0, 1, 2) if facts["little_endian"] else (2, 1, 0)))
        value = low + 256 * middle + 65536 * high
        return np.where(value >= 1 << 23, value - (1 << 24), value).astype(np.float64)
    dtype = np.dtype(facts["dtype"]).newbyteorder("<" if facts["little_endian"] else ">")
    frame = dtype.itemsize * facts["tracks"]
    frames = len(bytes_) // frame
    return bytes_[: frames * frame].view(dtype).reshape(frames, facts["tracks"])[:, facts["track"]].astype(np.float64)
