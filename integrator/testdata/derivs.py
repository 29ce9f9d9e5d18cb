#!/usr/bin/python3
"""Counts the calls of the derivative that another code of the same pair takes.

Writes derivs.csv: for each problem of the package odetest, and for each
tolerance, the calls that scipy.integrate.solve_ivp(method="RK45") makes with
rtol = atol = tolerance. It too steps by the pair of Dormand & Prince, in local
extrapolation, with the same norm of the error. Debian package: python3-scipy.

    /usr/bin/python3 derivs.py > derivs.csv
"""
import numpy as np
import scipy
from scipy.integrate import solve_ivp


def first_only(n):
    y = np.zeros(n)
    y[0] = 1
    return y


def torus(t, y):
    r = np.hypot(y[0], y[1])
    return [-y[1] - y[0] * y[2] / r, y[0] - y[1] * y[2] / r, y[0] / r]


def decay_chain(t, y):
    return np.concatenate(([-y[0]], y[:8] - y[1:9], [y[8]]))


def birth_chain(t, y):
    i = np.arange(1, 9)
    return np.concatenate(([-y[0]], i * y[:8] - (i + 1) * y[1:9], [9 * y[8]]))


def heat(t, y):
    dy = -2 * y
    dy[1:] += y[:-1]
    dy[:-1] += y[1:]
    return dy


def kepler(t, y):
    r3 = np.hypot(y[0], y[1]) ** 3
    return [y[2], y[3], -y[0] / r3, -y[1] / r3]


MU = 0.012277471


def three_bodies(t, y):
    d1 = np.hypot(y[0] + MU, y[1]) ** 3
    d2 = np.hypot(y[0] - 1 + MU, y[1]) ** 3
    return [
        y[2],
        y[3],
        y[0] + 2 * y[3] - (1 - MU) * (y[0] + MU) / d1 - MU * (y[0] - 1 + MU) / d2,
        y[1] - 2 * y[2] - (1 - MU) * y[1] / d1 - MU * y[1] / d2,
    ]


def orbit(e):
    return kepler, [1 - e, 0, 0, np.sqrt((1 + e) / (1 - e))], 20


def bessel(t, y):
    x = t + 1
    return [y[1], -y[1] / x - (1 - 0.25 / x**2) * y[0]]


BESSEL0 = np.sqrt(2 / np.pi) * np.array([np.sin(1), np.cos(1) - np.sin(1) / 2])

PROBLEMS = {
    "decay": (lambda t, y: -y, [1], 20),
    "cubic": (lambda t, y: -(y**3) / 2, [1], 20),
    "wave": (lambda t, y: y * np.cos(t), [1], 20),
    "logistic": (lambda t, y: y / 4 * (1 - y / 20), [1], 20),
    "spiral": (lambda t, y: (y - t) / (y + t), [4], 20),
    "oscillator": (lambda t, y: [y[1], -y[0]], [1, 0], 20),
    "reaction": (lambda t, y: [-y[0] + y[1], y[0] - 2 * y[1] + y[2], y[1] - y[2]], [2, 0, 1], 20),
    "torus": (torus, [3, 0, 0], 20),
    "rigid body": (lambda t, y: [y[1] * y[2], -y[0] * y[2], -0.51 * y[0] * y[1]], [0, 1, 1], 20),
    "decay chain": (decay_chain, first_only(10), 20),
    "birth chain": (birth_chain, first_only(10), 20),
    "heat, 10 pieces": (heat, first_only(10), 20),
    "heat, 51 pieces": (heat, first_only(51), 20),
    "orbit of eccentricity 0.1": orbit(0.1),
    "orbit of eccentricity 0.5": orbit(0.5),
    "orbit of eccentricity 0.9": orbit(0.9),
    "closing orbit": (three_bodies, [0.994, 0, 0, -2.00158510637908252], 17.0652165601579626),
    "Bessel": (bessel, BESSEL0, 20),
    "fall": (lambda t, y: [y[1], 0.032 - 0.4 * y[1] ** 2], [30, 0], 20),
    "pursuit": (lambda t, y: [y[1], np.sqrt(1 + y[1] ** 2) / (25 - t)], [0, 0], 20),
}

print(f"# written by derivs.py with scipy {scipy.__version__}, method RK45")
print("problem;tolerance;derivs")
for name, (f, y0, end) in PROBLEMS.items():
    for tol in (1e-4, 1e-6, 1e-8, 1e-10):
        sol = solve_ivp(f, (0, end), y0, method="RK45", rtol=tol, atol=tol)
        assert sol.success, (name, tol, sol.message)
        print(f"{name};{tol:g};{sol.nfev}")
