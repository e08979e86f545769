"""Values of elementary and error functions with 50 digits and more, rounded once to double precision.

Writes test/data/elementary-functions.json. Run from the root: python3 test/tools/elementary-functions.py (needs mpmath)
"""
import json
import math
import random

import mpmath as mp

# Sine and cosine of 1e308 take 310 digits before the point.
mp.mp.dps = 400
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
powers += [(x, draw.uniform(-740, 700) / math.log(x)) for x in [10 ** draw.uniform(-300, 300) for _ in range(200)]]
powers += [(1 + draw.uniform(-1e-6, 1e-6), draw.uniform(-7e8, 7e8)) for _ in range(100)]
powers += [(5e-324, -0.9), (1.7976931348623157e308, 0.99), (-2.0, 3.0), (-2.5, -4.0), (0.1, 310.5)]
# Worst of all doubles is 6381956970095103 2^797, within 2^-62 of a multiple of pi/2.
angles = [0.0, 5e-324, 1e-300, 1e-9, 0.7853981633974483, 0.7853981633974484, 1e22, 1.7976931348623157e308]
angles += [math.ldexp(6381956970095103, 797), 1048575.9, 1048576.0, 9007199254740993.0]
angles += [n * math.pi / 2 for n in (1, 2, 3, 4, 1001, 600000, 10**6, 10**9)]
angles += [draw.uniform(-8, 8) for _ in range(200)] + [draw.choice((1, -1)) * 10 ** draw.uniform(-5, 308) for _ in range(200)]
# Close to a quarter turn, where the reduced angle has lost most of its digits.
angles += [n * math.pi / 2 + step for n in (1, 1001, 100003, 600000, 667543) for step in (2e-9, -1e-7, 1e-5)]
slopes = [0.0, 5e-324, 1e-10, 0.4375, 0.6875, 1.0, 1.1875, 2.4375, 1e20, 1.7976931348623157e308]
slopes += [draw.uniform(-4, 4) for _ in range(300)] + [draw.choice((1, -1)) * 10 ** draw.uniform(-12, 12) for _ in range(100)]
errors = [0.0, 5e-324, 1e-300, 1e-17, -1e-10, 0.84375, 1.25, 1 / 0.35, 6.0, 26.5, -5.9, -30.0]
errors += [draw.uniform(-1.5, 1.5) for _ in range(300)] + [draw.uniform(-6, 26.5) for _ in range(300)]

cases = {
    "about": "[arguments..., value]; 50 digits (mpmath), rounded once. Written by test/tools/elementary-functions.py.",
    "exp": [value(mp.exp, x) for x in exponents],
    "log": [value(mp.log, x) for x in positives],
    "log10": [value(mp.log10, x) for x in positives],
    "pow": [value(mp.power, x, y) for x, y in powers],
    "sin": [value(mp.sin, x) for x in angles],
    "cos": [value(mp.cos, x) for x in angles],
    "atan": [value(mp.atan, x) for x in slopes],
    "erf": [value(mp.erf, x) for x in errors],
    "erfc": [value(mp.erfc, x) for x in errors],
}
with open("test/data/elementary-functions.json", "w") as file:
    rows = {k: v if isinstance(v, str) else "[\n" + ",\n".join(json.dumps(c) for c in v) + "\n]" for k, v in cases.items()}
    body = ",\n".join(f'"{k}": {json.dumps(v) if k == "about" else v}' for k, v in rows.items())
    file.write("{\n" + body + "\n}\n")
