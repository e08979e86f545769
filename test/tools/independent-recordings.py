"""Recordings with known truth that share no code with the program, for test/reference/simulation.test.ts.

Voigt profiles by scipy.special.wofz, integrated over each pixel by 12-point Gauss-Legendre quadrature; levels, weights
and transition probabilities from A. Kramida, At. Data Nucl. Data Tables 96, 586 (2010) and W. L. Wiese, J. R. Fuhr,
J. Phys. Chem. Ref. Data 38, 565 (2009); wavelengths from J. Reader, Appl. Spectrosc. 58, 1469 (2004); H-beta's Stark
width by M. A. Gigosos et al., Spectrochim. Acta B 58, 1489 (2003). Noise by NumPy's generators.
Run: python3 test/tools/independent-recordings.py > test/data/independent-recordings.json
"""

import json

import numpy as np
from scipy.special import wofz

K_EV = 8.617333262e-5
LINES = [  # id, air nm, upper level, E eV, A per s, Stark width relative to H-beta
    ("H-alpha", 656.2795, 3, 12.08750516, 4.4101e7, 0.229),
    ("H-beta", 486.1325, 4, 12.74853932, 8.4193e6, 1.0),
    ("H-gamma", 434.0463, 5, 13.05450169, 2.5304e6, 1.25),
    ("H-delta", 410.1735, 6, 13.22070389, 9.7320e5, 2.1),
    ("H-epsilon", 397.0072, 7, 13.32091817, 4.3889e5, 2.22),
]
NODES, WEIGHTS = np.polynomial.legendre.leggauss(12)


def voigt(x, sigma, gamma):
    return wofz((x + 1j * gamma) / (sigma * np.sqrt(2))).real / (sigma * np.sqrt(2 * np.pi))


def recording(seed, kelvin, density, fwhm, first, last, count, peak, continuum, gain, read, offset, response):
    centres = np.linspace(first, last, count)
    half = (centres[1] - centres[0]) / 2
    points = centres[:, None] + half * NODES[None, :]
    stark = 4.800 * (density / 1e23) ** 0.68116
    electrons = np.zeros(count)
    areas = {}
    for name, nm, level, energy, rate, ratio in LINES:
        doppler = 7.162326e-7 * nm * np.sqrt(1000 / 1.007825)
        fine = 2.354820 * {3: 6.763e-3, 4: 3.931e-3}.get(level, 3.206e-3 * (nm / 434.0463) ** 2)
        sigma = np.sqrt(fwhm**2 + doppler**2 + fine**2) / 2.354820
        area = response(nm) * 2 * level**2 * rate * np.exp(-(energy - 12.0875) / (K_EV * kelvin))
        areas[name] = area
        profile = voigt(points - nm, sigma, stark * ratio / 2)
        electrons += area * half * (profile @ WEIGHTS)
    scale = peak / electrons.max()
    electrons = electrons * scale + continuum
    random = np.random.default_rng(seed)
    counts = np.round(offset + (random.poisson(electrons) + read * random.standard_normal(count)) / gain)
    return {
        "seed": seed,
        "kelvin": kelvin,
        "perCubicMetre": density,
        "firstNm": first,
        "lastNm": last,
        "areaElectrons": {name: area * scale for name, area in areas.items()},
        "counts": [int(value) for value in counts],
    }


flat = lambda nm: 1.0
bell = lambda nm: float(np.exp(-0.5 * ((nm - 560) / 140) ** 2))
common = {"fwhm": 0.18, "first": 370.0, "last": 700.0, "count": 3648, "gain": 5.0, "read": 12.0, "offset": 1000.0}
print(
    json.dumps(
        {
            "generator": "test/tools/independent-recordings.py",
            "response": [[nm, bell(nm)] for nm in range(370, 701, 2)],
            "recordings": [
                {"response": "flat", **recording(1, 5200, 1e19, peak=2.0e5, continuum=60, response=flat, **common)},
                {"response": "flat", **recording(2, 9500, 2e21, peak=1.5e5, continuum=60, response=flat, **common)},
                {"response": "flat", **recording(3, 7000, 3e20, peak=6.0e3, continuum=40, response=flat, **common)},
                {"response": "bell", **recording(4, 6300, 3e20, peak=2.2e5, continuum=200, response=bell, **common)},
            ],
        }
    )
)
