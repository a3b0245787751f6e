"""Philox of Salmon et al. (2011), written once for both word lengths. Prints JSON.

With 64-bit words it is asserted equal to numpy.random.Philox (which has no 32-bit form); the same lines with the 32-bit
constants give the words, and through NumPy's log and cos the Gaussian numbers, that the demo must draw.
"""
import json

import numpy as np

CONSTANTS = {
    32: ((0xD2511F53, 0xCD9E8D57), (0x9E3779B9, 0xBB67AE85)),
    64: ((0xD2E7470EE14C6C93, 0xCA5A826395121157), (0x9E3779B97F4A7C15, 0xBB67AE8584CAA73B)),
}


def philox(counter, key, bits):
    (m0, m1), weyl = CONSTANTS[bits]
    mask = 2**bits - 1
    c, k = list(counter), list(key)
    for _ in range(10):
        p0, p1 = m0 * c[0], m1 * c[2]
        c = [(p1 >> bits) ^ c[1] ^ k[0], p1 & mask, (p0 >> bits) ^ c[3] ^ k[1], p0 & mask]
        k = [(a + b) & mask for a, b in zip(k, weyl)]
    return c


for counter, key in [((0, 0, 0, 0), (0, 0)), ((12345, 6, 7, 2**63 + 8), (2**64 - 1, 9))]:
    raw = np.random.Philox(counter=np.array(counter, np.uint64), key=np.array(key, np.uint64)).random_raw(4)
    following = (counter[0] + 1, *counter[1:])  # NumPy counts up before it draws
    assert [int(v) for v in raw] == philox(following, key, 64)

CASES = [
    ([0, 0, 0, 0], [0, 0]),
    ([0xFFFFFFFF] * 4, [0xFFFFFFFF] * 2),
    ([0x243F6A88, 0x85A308D3, 0x13198A2E, 0x03707344], [0xA4093822, 0x299F31D0]),
    ([1, 2, 3, 4], [5, 6]),
    ([0xFFFF0000, 0x0000FFFF, 0x80000000, 0x7FFFFFFF], [0x80000001, 0xFFFFFFFE]),
]


def gaussian(seed, stream, pairs, first=0):
    out = []
    for i in range(first, first + pairs):
        w = philox([i & 0xFFFFFFFF, i >> 32, 0, 0], [seed, stream], 32)
        u, v = (((w[j] >> 6) * 2**26 + (w[j + 1] >> 6) + 0.5) / 2**52 for j in (0, 2))
        r = np.sqrt(-2 * np.log(u))
        out += [float(r * np.cos(2 * np.pi * v)), float(r * np.sin(2 * np.pi * v))]
    return out


print(
    json.dumps(
        {
            "blocks": [{"counter": c, "key": k, "words": philox(c, k, 32)} for c, k in CASES],
            "gaussian": gaussian(20240519, 1, 64),
            "far": gaussian(7, 3, 4, first=2**33),
        }
    )
)
