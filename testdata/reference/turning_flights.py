#!/usr/bin/python3
"""Reference flights of spheres in habitats whose spin changes and whose axis cones.

Run: /usr/bin/python3 turning_flights.py > turning_flights.csv

Each flight is integrated twice by SciPy's DOP853 (Hairer, Norsett & Wanner,
Solving Ordinary Differential Equations I): in the habitat's frame, with the
centrifugal, the Coriolis and the Euler acceleration, which gives the figures of
the table, and in the inertial frame, where the air moves as a solid and the
attitude, a rotation matrix R, is integrated beside the flight from R' = R [w x].
The largest difference of the two stands in the header and tells how far the
figures can be trusted. The integrations stop at each joint of the spin.

The angular velocity w and its derivative, in components along the habitat's own
axes, are those of a spin s(t) along z and a fixed direction that the habitat
sees at the half angle from z, at the angle theta = phase - integral of q round
it, q = s - p cos(half angle), p = 2 pi/period:

    w  = (p sin cos(theta), p sin sin(theta), s)
    w' = (p sin q sin(theta), -p sin q cos(theta), s')

Habitat frame: x outward through spinward zero, y spinward there, z axial.
Drag: a smooth sphere by Clift & Gauvin 1970,
Cd = 24/Re (1 + 0.15 Re^0.687) + 0.42/(1 + 42500 Re^-1.16);
air: ideal gas of 287.05287 J/(kg K), viscosity 1.458e-6 T^1.5/(T + 110.4).
"""
import sys
from math import cos, pi, sin, sqrt

import numpy as np
import scipy
from scipy.integrate import quad, solve_ivp

RTOL, ATOL = 1e-13, 1e-14
NAMES = ("name spin_rad_s start_s over_s to_rad_s linear half_angle_rad period_s phase_rad pressure_Pa mass_kg "
         "diameter_m begin_s radius_m axial_m v_spinward_m_s v_axial_m_s v_up_m_s duration_s").split()
OUTPUTS = "x_m y_m z_m vx_m_s vy_m_s vz_m_s".split()
TEMPERATURE = 293.15

# over 0: no change; half angle 0: no coning.
FLIGHTS = [
    ("ball in a spin-up",           0.2,  1.0, 6.0,  0.9, 0, 0, 1, 0,             101325, 0.058, 0.067, 0.0, 15, 0.0,  0, 0, 0, 4.0),
    ("ball in a linear spin-down",  0.6,  0.5, 3.0,  0.0, 1, 0, 1, 0,             101325, 0.0027, 0.04, 0.0, 16, 0.0,  1, 0.5, 2, 5.0),
    ("through zero",               -0.7,  0.3, 2.0,  0.6, 0, 0, 1, 0,              70000, 0.02, 0.06,   0.0, 12, 0.0,  0, 0, 0, 3.0),
    ("let go in a coning ring",        0.42, 0.0, 0.0,  0.0, 0, 0.03, 9.4, 0.0,      101325, 0.12, 0.03,   2.0, 18, 1.0,  0, 0, 0, 1.2),
    ("thrown where it cones hard",       0.5,  0.0, 0.0,  0.0, 0, 0.6, 7.0, 1.0,       101325, 0.0027, 0.04, 0.7, 14, -2.0, 3, 1, 4, 3.0),
    ("coning the other way",       -0.5,  0.0, 0.0,  0.0, 0, 0.25, 5.0, -2.0,      56000, 0.145, 0.073, 3.1, 17, 0.5,  2, -3, 3, 3.0),
    ("spin-up of a coning ring",    0.1,  0.2, 4.0,  0.8, 1, 0.15, 12.0, 0.5,     101325, 0.035, 0.1,   0.0, 15, 0.0,  1, 1, 1, 4.0),
    ("spin-down of a coning ring",  0.9,  1.0, 2.5, -0.3, 0, 1.2, -20.0, 2.5,     101325, 0.005, 0.08,  0.5, 9, 3.0,   0, 0, 2, 4.0),
]


class Flight:
    def __init__(self, row):
        v = dict(zip(NAMES, row))
        self.__dict__.update(s=v["spin_rad_s"], start=v["start_s"], over=v["over_s"], to=v["to_rad_s"], linear=v["linear"],
                             half=v["half_angle_rad"], phase=v["phase_rad"], mass=v["mass_kg"], d=v["diameter_m"],
                             begin=v["begin_s"], end=v["begin_s"] + v["duration_s"])
        self.p = 2 * pi / v["period_s"] if self.half else 0.0
        self.rho = v["pressure_Pa"] / (287.05287 * TEMPERATURE)
        self.mu = 1.458e-6 * TEMPERATURE ** 1.5 / (TEMPERATURE + 110.4)
        self.first = np.array([v["radius_m"], 0.0, v["axial_m"], -v["v_up_m_s"], v["v_spinward_m_s"], v["v_axial_m_s"]])

    def spin(self, t):
        """The spin and its derivative."""
        if not self.over or t <= self.start:
            return self.s, 0.0
        if t >= self.start + self.over:
            return self.to, 0.0
        u, by = (t - self.start) / self.over, self.to - self.s
        if self.linear:
            return self.s + by * u, by / self.over
        return self.s + by * u * u * (3 - 2 * u), by * 6 * u * (1 - u) / self.over

    def joints(self, a, b):
        inner = [x for x in (self.start, self.start + self.over) if self.over and a < x < b]
        return [a, *inner, b]

    def turns(self, t, theta):
        """w and w' along the habitat's axes; the spin a hair within the stretch."""
        s, ds = self.spin(t)
        side, q = self.p * sin(self.half), s - self.p * cos(self.half)
        w = np.array([side * cos(theta), side * sin(theta), s])
        return w, np.array([side * q * sin(theta), -side * q * cos(theta), ds]), q

    def drag(self, u):
        speed = sqrt(u @ u)
        re = self.rho * speed * self.d / self.mu
        cd_re = 24.0
        if re > 0:
            cd_re = re * (24 / re * (1 + 0.15 * re ** 0.687) + 0.42 / (1 + 42500 * re ** -1.16))
        return -0.5 * self.mu * cd_re * pi * self.d / 4 / self.mass * u

    def onboard(self, t, y):
        """The state is place, velocity, and theta."""
        r, v = y[:3], y[3:6]
        w, dw, q = self.turns(t, y[6])
        a = self.drag(v) - 2 * np.cross(w, v) - np.cross(w, np.cross(w, r)) - np.cross(dw, r)
        return [*v, *a, -q]

    def outside(self, t, y):
        """The state is place and velocity, inertial, the attitude by rows, and theta."""
        r, v, m = y[:3], y[3:6], y[6:15].reshape(3, 3)
        w, _, q = self.turns(t, y[15])
        a = self.drag(v - np.cross(m @ w, r))
        cross = np.array([[0, -w[2], w[1]], [w[2], 0, -w[0]], [-w[1], w[0], 0]])
        return [*v, *a, *(m @ cross).ravel(), -q]

    def run(self, f, y, a, b):
        stops = self.joints(a, b)
        for t0, t1 in zip(stops, stops[1:]):
            # a jump of w' belongs to the stretch that it begins or ends
            inside = lambda t, s, lo=np.nextafter(t0, t1), hi=np.nextafter(t1, t0): f(min(max(t, lo), hi), s)
            y = solve_ivp(inside, (t0, t1), y, method="DOP853", rtol=RTOL, atol=ATOL).y[:, -1]
        return y

    def theta(self):
        """At the release."""
        stops, turned = self.joints(0, self.begin), 0.0
        for a, b in zip(stops, stops[1:]):
            turned += quad(lambda t: self.spin(t)[0], a, b, epsabs=1e-14, epsrel=1e-13)[0]
        return self.phase - turned + self.p * cos(self.half) * self.begin

    def flown(self):
        """On board, and from outside."""
        theta = self.theta()
        here = self.run(self.onboard, np.array([*self.first, theta]), self.begin, self.end)[:6]
        w, _, _ = self.turns(self.begin, theta)
        r, v = self.first[:3], self.first[3:]
        y = self.run(self.outside, np.array([*r, *(v + np.cross(w, r)), *np.eye(3).ravel(), theta]), self.begin, self.end)
        m = y[6:15].reshape(3, 3)
        w, _, _ = self.turns(self.end, y[15])
        there = m.T @ y[:3]
        return here, np.array([*there, *(m.T @ y[3:6] - np.cross(w, there))])


def main():
    rows, worst = [], 0.0
    for row in FLIGHTS:
        here, there = Flight(row).flown()
        worst = max(worst, abs(here - there).max())
        rows.append([row[0], *map(repr, map(float, row[1:])), *map(repr, map(float, here))])
    print(f"# source: SciPy {scipy.__version__}, NumPy {np.__version__} (Debian python3-scipy, python3-numpy)")
    print(f"# method: solve_ivp, DOP853, rtol {RTOL:g}, atol {ATOL:g}, in the habitat's frame")
    print("# script: turning_flights.py")
    print(f"# precision: the same in the inertial frame differs by {worst:.1e} at most, m or m/s")
    print(",".join(NAMES + OUTPUTS))
    for row in rows:
        print(",".join(row))


if __name__ == "__main__":
    sys.exit(main())
