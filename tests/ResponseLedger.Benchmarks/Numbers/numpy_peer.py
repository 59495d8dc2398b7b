"""The six margins of the benchmark's mask in numpy: python3 numpy_peer.py PLANES ROUNDS.

PLANES holds frequency in Hz, level in dB and phase in degrees as float64, one plane after the other. Between points level and
phase run straight against log f, as in the engine: a limit is looked at on the union of the sweep's points and its corners.
Unwrapping is part of each round, as it is there. Prints JSON.
"""

import json
import sys
import time

import numpy as np

planes = np.fromfile(sys.argv[1]).reshape(3, -1)
FREQUENCY, LEVEL, PHASE = (np.ascontiguousarray(plane) for plane in planes)


def limit_margin(x, y, corners, side, shift=0.0):
    cx = np.log(np.array([c[0] for c in corners], float))
    cy = np.array([c[1] for c in corners], float) + shift
    inside = (x > cx[0]) & (x < cx[-1])
    at = np.concatenate((x[inside], cx))
    apart = np.interp(at, cx, cy) - np.interp(at, x, y)
    return apart.min() if side == "upper" else -apart.max()


def upper_cutoff(x, y, reference_x, drop):
    level = np.interp(reference_x, x, y) - drop
    first = np.searchsorted(x, reference_x)
    k = first + np.flatnonzero(y[first:] < level)[0]
    return np.exp(x[k - 1] + (level - y[k - 1]) / (y[k] - y[k - 1]) * (x[k] - x[k - 1]))


def ripple(x, y, from_hz, to_hz):
    edges = np.log(np.array([from_hz, to_hz]))
    inside = (x > edges[0]) & (x < edges[1])
    values = np.concatenate((y[inside], np.interp(edges, x, y)))
    return values.max() - values.min()


def margins():
    x = np.log(FREQUENCY)
    phase = np.unwrap(PHASE, period=360)
    reference = np.log(20.0)
    ceiling = [(10, 0.5), (1500, 0.5), (10000, -36), (100000, -76)]
    band = [(10, -0.2), (200, -0.2), (900, -4)]
    upper = upper_cutoff(x, LEVEL, reference, 3.010299956639812)
    return [
        limit_margin(x, LEVEL, ceiling, "upper"),
        limit_margin(x, LEVEL, band, "lower", np.interp(reference, x, LEVEL)),
        limit_margin(x, phase, [(10, 5), (1000, -70), (100000, -160)], "upper"),
        limit_margin(x, phase, [(10, -10), (1000, -110), (100000, -185)], "lower"),
        min(upper - 950, 1050 - upper),
        0.1 - ripple(x, LEVEL, 10, 200),
    ]


rounds = int(sys.argv[2])
for _ in range(rounds // 4):
    margins()
times = []
for _ in range(rounds):
    start = time.perf_counter()
    found = margins()
    times.append(1e3 * (time.perf_counter() - start))
print(json.dumps({"medianMs": float(np.median(times)), "p95Ms": float(np.percentile(times, 95)), "margins": [float(m) for m in found]}))
