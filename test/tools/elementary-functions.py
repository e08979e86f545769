"""Values of exp, ln, log10 and powers with 50 digits, rounded once to double precision.

Writes test/data/elementary-functions.json. Run from the root: python3 test/tools/elementary-functions.py (needs mpmath)
"""
import json
import math
import random

import mpmath as mp

mp.mp.dps = 50
draw = random.Random(1993)


def value(function, *arguments):
    """One case: arguments and the nearest double."""
    return [*arguments, float(function(*[mp.mpf(argument) for argument in arguments]))]


small = [0.0, 5e-324, -5e-324, 1e-300, -1e-20, 2.7e-17, 2.9e-17, 1e-8]
edges = [0.34657359027997264, 0.3465735902799727, 1.0, -1.0, 709.782712893, 709.0, 700.0, -708.3, -708.5, -740.0, -745.1]
exponents = small + edges + [draw.uniform(-1, 1) for _ in range(200)] + [draw.uniform(-745, 709) for _ in range(400)]
positives = [5e-324, 1e-310, 2.2250738585072014e-308, 1.7976931348623157e308, 1.0, 10.0, 1e22, 1e-22, 2.0, 0.5]
positives += [math.nextafter(1, 0), math.nextafter(1, 2), math.sqrt(2), math.sqrt(0.5), 0.99, 1.01]
positives += [draw.uniform(0.5, 2) for _ in range(200)] + [10 ** draw.uniform(-307, 308) for _ in range(400)]
powers = [(2.0, 10.0), (10.0, -3.0), (0.01, 0.68116), (1e-300, 0.5), (1e300, -0.4)]
powers += [(10 ** draw.uniform(-5, 5), draw.uniform(-8, 8)) for _ in range(200)]

cases = {
    "about": "[arguments..., value]; 50 digits (mpmath), rounded once. Written by test/tools/elementary-functions.py.",
    "exp": [value(mp.exp, x) for x in exponents],
    "log": [value(mp.log, x) for x in positives],
    "log10": [value(mp.log10, x) for x in positives],
    "pow": [value(mp.power, x, y) for x, y in powers],
}
with open("test/data/elementary-functions.json", "w") as file:
    rows = {k: v if isinstance(v, str) else "[\n" + ",\n".join(json.dumps(c) for c in v) + "\n]" for k, v in cases.items()}
    body = ",\n".join(f'"{k}": {json.dumps(v) if k == "about" else v}' for k, v in rows.items())
    file.write("{\n" + body + "\n}\n")
