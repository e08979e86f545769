"""Coefficients of Weideman's rational series for the Faddeeva function, by direct DFT of its defining samples.

J. A. C. Weideman, SIAM J. Numer. Anal. 31, 1497 (1994), section 5. Run: python3 test/tools/weideman-coefficients.py
"""
import numpy as np

N = 32
M = 2 * N
L = np.sqrt(N / np.sqrt(2.0))
k = np.arange(-M + 1, M)
theta = k * np.pi / M
t = L * np.tan(theta / 2)
f = np.concatenate(([0.0], np.exp(-(t**2)) * (L**2 + t**2)))
a = np.real(np.fft.fft(np.fft.fftshift(f))) / (2 * M)
for value in a[1 : N + 1]:
    print(repr(float(value)) + ",")
