"""Writes test/data/least-squares.json: answers of SciPy, mpmath and exact fractions to small least-squares problems.

    python3 test/tools/least-squares.py
"""

import json
from fractions import Fraction
from pathlib import Path

import mpmath
import numpy as np
import scipy
from scipy.optimize import least_squares, lsq_linear

mpmath.mp.dps = 50
OUT = Path(__file__).resolve().parents[1] / "data" / "least-squares.json"
rng = np.random.default_rng(20240)


def bounded_linear():
    cases = []
    for rows, columns in ((6, 3), (9, 4), (12, 5), (7, 2)):
        for _ in range(3):
            matrix = np.round(rng.normal(size=(rows, columns)) * rng.uniform(0.1, 30, size=columns), 3)
            right = np.round(rng.normal(size=rows) * 10, 3)
            free = np.linalg.lstsq(matrix, right, rcond=None)[0]
            # Bounds hold the start 0 and cut off the unbounded answer in some directions.
            low = np.round(np.where(rng.random(columns) < 0.5, -0.4 * np.abs(free), -10 * np.abs(free) - 1), 3)
            high = np.round(np.where(rng.random(columns) < 0.5, 0.4 * np.abs(free), 10 * np.abs(free) + 1), 3)
            answer = lsq_linear(matrix, right, bounds=(low, high), method="bvls", tol=1e-15)
            cases.append(
                {
                    "matrix": matrix.tolist(),
                    "right": right.tolist(),
                    "lowest": low.tolist(),
                    "highest": high.tolist(),
                    "values": answer.x.tolist(),
                    "held": (answer.active_mask != 0).tolist(),
                    "objective": float(2 * answer.cost),
                }
            )
    return cases


X = [0.0, 0.5, 1.0, 1.5, 2.0, 3.0, 4.0, 5.0, 6.0, 8.0]


def decay(b, x, exp=mpmath.exp):
    return b[0] * exp(-b[1] * x) + b[2]


def decay_jacobian(b, x, exp=mpmath.exp):
    e = exp(-b[1] * x)
    return [e, -x * b[0] * e, mpmath.mpf(1)]


def quasi_likelihood(y, variance, start):
    """Root of sum (y - m)/V dm/db = 0 and (J^T W J)^-1 there; variance(i, m) of observation i with model m."""
    xs = [mpmath.mpf(x) for x in X]
    ys = [mpmath.mpf(v) for v in y]
    b = [mpmath.mpf(v) for v in start]
    for _ in range(200):
        normal, right = mpmath.zeros(3, 3), mpmath.zeros(3, 1)
        chi = mpmath.mpf(0)
        for k, (x, value) in enumerate(zip(xs, ys)):
            m, row = decay(b, x), decay_jacobian(b, x)
            weight = 1 / variance(k, m)
            chi += weight * (value - m) ** 2
            for i in range(3):
                right[i] += weight * (value - m) * row[i]
                for j in range(3):
                    normal[i, j] += weight * row[i] * row[j]
        step = mpmath.lu_solve(normal, right)
        b = [b[i] + step[i] for i in range(3)]
    inverse = normal**-1
    return {
        "values": [float(v) for v in b],
        "covariance": [[float(inverse[i, j]) for j in range(3)] for i in range(3)],
        "chiSquare": float(chi),
    }


def decay_cases():
    truth = [90.0, 0.7, 12.0]
    counts = [float(rng.poisson(90 * np.exp(-0.7 * x) + 12)) for x in X]
    sigma = [round(0.5 + 0.3 * i, 2) for i in range(len(X))]
    weighted_data = [round(float(90 * np.exp(-0.7 * x) + 12 + s * rng.normal()), 3) for x, s in zip(X, sigma)]
    low, high = [0.0, 0.0, 14.0], [200.0, 5.0, 50.0]
    bounded = least_squares(
        lambda b: (decay(b, np.array(X), np.exp) - weighted_data) / sigma,
        [50.0, 1.0, 20.0],
        bounds=(low, high),
        xtol=1e-15,
        ftol=1e-15,
        gtol=1e-15,
    )
    # With the background on its bound, two parameters are left.
    jacobian = bounded.jac[:, :2]
    weighted = quasi_likelihood(weighted_data, lambda i, _: mpmath.mpf(sigma[i]) ** 2, truth)
    return {
        "x": X,
        "counts": counts,
        "readVariance": 4.0,
        "followed": quasi_likelihood(counts, lambda _, m: m + 4, truth),
        "weightedData": weighted_data,
        "sigma": sigma,
        "weighted": weighted,
        "lowest": low,
        "highest": high,
        "bounded": {
            "values": bounded.x.tolist(),
            "chiSquare": float(2 * bounded.cost),
            "covariance": np.linalg.inv(jacobian.T @ jacobian).tolist(),
        },
    }


def dots():
    cases = []
    for length in (3, 10, 60):
        for spread in (0, 8, 16):
            a = rng.normal(size=length) * 10.0 ** rng.integers(-spread, spread + 1, size=length)
            b = rng.normal(size=length) * 10.0 ** rng.integers(-spread, spread + 1, size=length)
            exact = sum(Fraction(float(p)) * Fraction(float(q)) for p, q in zip(a, b))
            # The start takes away nearly all of it, so that a plain sum is left without digits.
            start = -float(exact)
            rest = exact + Fraction(start)
            cases.append({"start": start, "a": a.tolist(), "b": b.tolist(), "exact": float(rest), "size": float(sum(abs(Fraction(float(p)) * Fraction(float(q))) for p, q in zip(a, b)))})
    return cases


def weighted_linear():
    x = [1.0, 2.0, 3.0, 5.0, 8.0, 13.0]
    y = [2.1, 2.9, 4.2, 5.8, 9.1, 13.7]
    weights = [4.0, 1.0, 0.25, 9.0, 2.0, 0.5]
    w = [mpmath.mpf(v) for v in weights]
    a = mpmath.matrix([[1, v] for v in x])
    normal = a.T * mpmath.diag(w) * a
    values = mpmath.lu_solve(normal, a.T * mpmath.diag(w) * mpmath.matrix(y))
    residual = mpmath.matrix(y) - a * values
    chi = sum(w[i] * residual[i] ** 2 for i in range(6))
    mean = sum(w[i] * mpmath.mpf(y[i]) for i in range(6)) / sum(w)
    total = sum(w[i] * (mpmath.mpf(y[i]) - mean) ** 2 for i in range(6))
    inverse = normal**-1
    return {
        "x": x,
        "y": y,
        "weights": weights,
        "values": [float(v) for v in values],
        "covariance": [[float(inverse[i, j]) for j in range(2)] for i in range(2)],
        "chiSquare": float(chi),
        "rSquared": float(1 - chi / total),
    }


def inverse_of_normal():
    matrix = np.round(rng.normal(size=(7, 4)), 2)
    exact = mpmath.matrix(matrix.tolist())
    inverse = (exact.T * exact) ** -1
    return {"matrix": matrix.tolist(), "inverse": [[float(inverse[i, j]) for j in range(4)] for i in range(4)]}


OUT.write_text(
    json.dumps(
        {
            "about": f"SciPy {scipy.__version__}, NumPy {np.__version__}, mpmath {mpmath.__version__} (50 digits), fractions; test/tools/least-squares.py",
            "boundedLinear": bounded_linear(),
            "decay": decay_cases(),
            "dots": dots(),
            "weightedLinear": weighted_linear(),
            "inverseOfNormal": inverse_of_normal(),
        },
        indent=1,
    )
    + "\n"
)
