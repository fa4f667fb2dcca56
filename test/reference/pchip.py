"""Writes pchip.json: monotone piecewise cubics through sets of points, evaluated with
scipy.interpolate.PchipInterpolator; beyond the ends straight on with the interpolant's end slope.

    python3 test/reference/pchip.py
"""

import json
import os

import numpy as np
import scipy
from scipy.interpolate import PchipInterpolator

SETS = {
    "two points": [[10, 0.8], [30, 0.9]],
    "rising evenly": [[10, 0.5], [20, 0.6], [30, 0.65], [40, 0.66]],
    "with a summit, widths uneven": [[10, 0.7], [12, 0.82], [20, 0.88], [33, 0.86], [40, 0.61]],
    "with a flat stretch": [[10, 0.6], [20, 0.7], [30, 0.7], [40, 0.9]],
    "zigzag": [[10, 0.6], [15, 0.9], [20, 0.5], [30, 0.8], [36, 0.4]],
    "end slope against the first secant": [[10, 0.80], [20, 0.79], [22, 0.50], [40, 0.45]],
    "end slope cut at three times": [[10, 0.70], [12, 0.90], [40, 0.30]],
    "three points falling": [[10, 0.9], [25, 0.8], [40, 0.5]],
}


def values(points):
    r = np.array([p[0] for p in points], float)
    q = np.array([p[1] for p in points], float)
    curve = PchipInterpolator(r, q, extrapolate=False)
    slope = curve.derivative()
    inside = np.unique(np.concatenate([np.linspace(r[0], r[-1], 5), (r[:-1] + r[1:]) / 2, r]))
    rows = [[float(x), float(curve(x))] for x in inside]
    for x in (r[0] - 3, r[-1] + 5):
        end = 0 if x < r[0] else -1
        rows.append([float(x), float(q[end] + slope(r[end]) * (x - r[end]))])
    return rows


data = {
    "source": f"scipy {scipy.__version__}, scipy.interpolate.PchipInterpolator",
    "sets": [
        {"name": name, "points": points, "values": values(points)} for name, points in SETS.items()
    ],
}
path = os.path.join(os.path.dirname(os.path.abspath(__file__)), "pchip.json")
with open(path, "w") as file:
    json.dump(data, file, indent=1)
    file.write("\n")
