#!/usr/bin/python3
"""Reference flights of light spheres in air with drafts, layers and buoyancy.

The equation of Maxey & Riley with a drag of finite Reynolds numbers, solved in
the inertial frame; the acceleration of the air, Du/Dt, is differenced from its
velocity field there, so that no formula for it is shared with the program. The
draft is interpolated by SciPy's PchipInterpolator (Fritsch & Butland 1984).
"""
import sys
from math import cos, exp, log, pi, sin, sqrt, hypot

import numpy as np
import scipy
from scipy.integrate import solve_ivp
from scipy.interpolate import PchipInterpolator

RTOL, ATOL = 1e-12, 1e-14
GAS = 287.05287
CORE = 0.05
HEIGHTS = [0.0, 1.0, 2.5, 6.0]
PROFILE = {"spinward": [0.0, 0.8, 1.2, 0.3], "axial": [0.2, -0.1, 0.4, 0.4], "up": [0.0, 0.15, 0.1, 0.0]}

NAMES = ["name", "floor_radius_m", "spin_rad_s", "pressure_Pa", "temperature_K", "stratified", "buoyancy", "draft",
         "mass_kg", "diameter_m", "radius_m", "v_spinward_m_s", "v_axial_m_s", "v_up_m_s", "time_s"]
OUTPUTS = ["x_m", "y_m", "z_m", "vx_m_s", "vy_m_s", "vz_m_s"]
FLIGHTS = [
    ["balloon in a draft", 14, 0.8, 101325, 293.15, 0, 1, 1, 0.011, 0.28, 12.2, 0, 0, 0, 4],
    ["foam ball in a draft", 14, 0.8, 101325, 293.15, 0, 1, 1, 0.004, 0.12, 12, -2, 1, 3, 2],
    ["the same without buoyancy", 14, 0.8, 101325, 293.15, 0, 0, 1, 0.004, 0.12, 12, -2, 1, 3, 0.8],
    ["mirrored spin", 14, -0.8, 90000, 300, 0, 1, 1, 0.009, 0.26, 10.5, 1, 0, -1, 4],
    ["balloon in layers", 4000, 0.05, 101325, 293.15, 1, 1, 0, 0.011, 0.28, 3000, 5, 0, 2, 20],
    ["feather light in layers", 2000, 0.07, 60000, 280, 1, 0, 1, 0.0005, 0.05, 500, 0, 3, 0, 30],
]


class Flight:
    def __init__(self, row):
        (_, self.R, self.w, self.p, self.T, self.layers, self.buoy, draft, self.m, self.d, r, vs, va, vu, self.time) = row
        self.rho0 = self.p / (GAS * self.T)
        self.mu = 1.458e-6 * self.T ** 1.5 / (self.T + 110.4)
        self.draft = {k: PchipInterpolator(HEIGHTS, v) for k, v in PROFILE.items()} if draft else None
        self.y0 = np.array([r, 0, 0, -vu, vs + self.w * r, va], float)

    def local(self, q):
        """The draft at a place of the habitat."""
        if not self.draft:
            return np.zeros(3)
        r = hypot(q[0], q[1])
        h = min(max(self.R - r, HEIGHTS[0]), HEIGHTS[-1])
        s, z, u = (float(self.draft[k](h)) for k in ("spinward", "axial", "up"))
        x = min(1.0, r / (CORE * self.R))
        fade = 1.5 * x - 0.5 * x ** 3
        c, n = q[0] / r, q[1] / r
        return np.array([-u * fade * c - s * fade * n, -u * fade * n + s * fade * c, z])

    def air(self, t, p):
        """The air's velocity at an inertial place."""
        c, s = cos(self.w * t), sin(self.w * t)
        q = np.array([c * p[0] + s * p[1], -s * p[0] + c * p[1], p[2]])
        l = self.local(q)
        return np.array([c * l[0] - s * l[1] - self.w * p[1], s * l[0] + c * l[1] + self.w * p[0], l[2]])

    def gains(self, t, p):
        """Du/Dt by differences of the fourth order along the air's way."""
        u, h = self.air(t, p), 1e-4
        f = lambda k: self.air(t + k * h, p + k * h * u)
        return (8 * (f(1) - f(-1)) - (f(2) - f(-2))) / (12 * h)

    def deriv(self, t, y):
        p, v = y[:3], y[3:]
        r = hypot(p[0], p[1])
        rho = self.rho0 * (exp(self.w ** 2 * (r * r - self.R ** 2) / (2 * GAS * self.T)) if self.layers else 1)
        rel = v - self.air(t, p)
        speed = sqrt(rel @ rel)
        re = rho * speed * self.d / self.mu
        if re > 0:
            cd = 24 / re * (1 + 0.15 * re ** 0.687) + 0.42 / (1 + 42500 * re ** -1.16)
            force = -rho * cd * pi / 8 * self.d ** 2 * speed * rel
        else:
            force = np.zeros(3)
        moved = rho * pi / 6 * self.d ** 3 if self.buoy else 0.0
        return np.concatenate([v, (force + 1.5 * moved * self.gains(t, p)) / (self.m + 0.5 * moved)])

    def flown(self, method):
        out = solve_ivp(self.deriv, (0, self.time), self.y0, method=method, rtol=RTOL, atol=ATOL, max_step=self.time / 200)
        if not out.success:
            sys.exit(out.message)
        return out.y[:, -1]


def main():
    rows, worst = [], 0.0
    for row in FLIGHTS:
        f = Flight(row)
        y, other = f.flown("DOP853"), f.flown("Radau") if row[-1] < 5 else None
        if other is not None:
            worst = max(worst, abs(y - other).max())
        rows.append([row[0], *map(repr, map(float, row[1:])), *map(repr, map(float, y))])
    print(f"# source: SciPy {scipy.__version__}, NumPy {np.__version__} (Debian python3-scipy, python3-numpy)")
    print(f"# method: solve_ivp, DOP853, rtol {RTOL:g}, atol {ATOL:g}, in the inertial frame; the state at the end, inertial")
    print("# script: air_flights.py")
    print(f"# precision: Radau differs by {worst:.1e} at most, m or m/s")
    print(",".join(NAMES + OUTPUTS))
    for row in rows:
        print(",".join(row))


if __name__ == "__main__":
    sys.exit(main())
