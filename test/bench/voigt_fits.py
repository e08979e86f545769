"""Five weighted Voigt fits a recording with scipy.optimize.curve_fit and scipy.special.wofz: the bench's reference.

Reads {"recordings": [{"lines": [{"nm": [...], "counts": [...], "sigma": [...], "centre": c}]}], "rounds": n} from
standard input, prints the seconds a recording takes, once with the profile sampled at the pixel centres and once
integrated over the pixels (three-point Gauss-Legendre), as the program does. Every line has its own area, centre, two
widths and a straight baseline.
"""

import json
import sys
import time

import numpy as np
from scipy.optimize import curve_fit
from scipy.special import wofz


def voigt(x, area, centre, sigma, gamma, base, slope):
    z = (x - centre + 1j * abs(gamma)) / (abs(sigma) * np.sqrt(2))
    return area * wofz(z).real / (abs(sigma) * np.sqrt(2 * np.pi)) + base + slope * (x - centre)


NODES = np.sqrt(0.6) * np.array([-1.0, 0.0, 1.0])
WEIGHTS = np.array([5.0, 8.0, 5.0]) / 18.0


def pixel_voigt(x, area, centre, sigma, gamma, base, slope):
    step = x[1] - x[0]
    inside = x[:, None] + 0.5 * step * NODES
    z = (inside - centre + 1j * abs(gamma)) / (abs(sigma) * np.sqrt(2))
    mean = wofz(z).real @ WEIGHTS
    return area * mean / (abs(sigma) * np.sqrt(2 * np.pi)) + base + slope * (x - centre)


job = json.load(sys.stdin)
recordings = [
    [
        (np.array(line["nm"]), np.array(line["counts"]), np.array(line["sigma"]), line["centre"])
        for line in recording["lines"]
    ]
    for recording in job["recordings"]
]


def run(profile):
    for lines in recordings:
        for nm, counts, sigma, centre in lines:
            step = nm[1] - nm[0]
            floor = np.percentile(counts, 25)
            top = nm[np.argmax(counts)]
            start = [max(1.0, (counts - floor).sum() * step), top, 0.08, 0.01, floor, 0.0]
            curve_fit(profile, nm, counts, p0=start, sigma=sigma, absolute_sigma=True, maxfev=2000)


def best_seconds(profile):
    run(profile)
    best = None
    for _ in range(job["rounds"]):
        begin = time.perf_counter()
        run(profile)
        seconds = (time.perf_counter() - begin) / len(recordings)
        best = seconds if best is None else min(best, seconds)
    return best


print(best_seconds(voigt), best_seconds(pixel_voigt))
