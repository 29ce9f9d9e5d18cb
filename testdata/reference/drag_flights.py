#!/usr/bin/python3
"""Reference flights of spheres through air that turns with a habitat.

Run: /usr/bin/python3 drag_flights.py > drag_flights.csv

Each flight is integrated twice by SciPy's DOP853 (Hairer, Norsett & Wanner,
Solving Ordinary Differential Equations I): in the turning frame, with the
centrifugal and the Coriolis acceleration, which gives the figures of the
table, and in the inertial frame, where the air moves as a solid. The largest
difference of the two stands in the header and tells how far the figures can be
trusted.

Habitat frame: x outward through the release, y spinward there, z axial.
Drag: a smooth sphere by Clift & Gauvin 1970,
Cd = 24/Re (1 + 0.15 Re^0.687) + 0.42/(1 + 42500 Re^-1.16), or a constant;
air: ideal gas of 287.05287 J/(kg K), viscosity 1.458e-6 T^1.5/(T + 110.4).
"""
import sys
from math import atan2, hypot, pi, sqrt

import numpy as np
import scipy
from scipy.integrate import solve_ivp

RTOL, ATOL = 1e-13, 1e-14

INPUTS = ("name floor_radius_m spin_rad_s pressure_Pa temperature_K mass_kg diameter_m drag_coefficient "
          "drag_area_m2 height_m v_spinward_m_s v_axial_m_s v_up_m_s").split()
OUTPUTS = "time_s offset_m offset_axial_m speed_m_s normal_speed_m_s".split()

# 0 for drag coefficient and area: those of a sphere.
FLIGHTS = [
    ("water drop of 1 mm",        18.0,  0.5445,  70000, 295.15, 5.226e-7, 0.001, 0, 0,   1.9,  0, 0, 0),
    ("mist drop of 0.2 mm",        6.0, -0.9,    101325, 293.15, 4.18e-9, 0.0002, 0, 0,   0.4,  0, 0, 0),
    ("wrench let go",             18.0,  0.5445,  70000, 295.15, 1.4,     0.060, 0, 0,    1.9,  0, 0, 0),
    ("wrench thrown spinward",    18.0,  0.5445,  70000, 295.15, 1.4,     0.060, 0, 0,    1.2,  4, 0.5, 2),
    ("foam let go, spin negative", 56.0, -0.4189, 101325, 293.15, 1.63,   0.5,   0, 0,    2.5,  0, 0, 0),
    ("foam thrown up",           224.0,  0.2093, 101325, 293.15, 1.63,    0.5,   0, 0,    1.5,  3, 1, 9),
    ("light ball at rim speed",   12.0,  0.7,    101325, 293.15, 0.0027,  0.040, 0, 0,    1.5, -8, 0, 0),
    ("ball along the axis",       40.0, -0.5,     56000, 288.15, 0.145,   0.073, 0, 0,    1.6,  0, 14, 1),
    ("ball past the axis",         9.0, -1.0,    101325, 293.15, 0.2,     0.073, 0, 0,    1.1,  6.5, -0.4, 11),
    ("tool from a spoke",        895.0,  0.1047, 101325, 293.15, 0.9,     0.080, 0, 0,  100.0,  0, 0, 0),
    ("dense air, antispinward",   25.0,  0.6283, 200000, 320.0,  0.058,   0.067, 0, 0,    1.4, -7, -2, 3),
    ("thin air, aslant",          30.0, -0.55,    10000, 250.0,  0.004,   0.030, 0, 0,    1.0,  5, -6, 4),
    ("thrown at the floor",       20.0,  0.5,    101325, 293.15, 0.058,   0.067, 0, 0,    2.0, -2, 1, -12),
    ("sheet of known drag",       18.0, -0.5445,  70000, 295.15, 0.035,   0.010, 1.1, 0.06, 2.2, 1, 0.5, 1.5),
    ("booth",                      3.0,  2.0,    101325, 293.15, 0.05,    0.060, 0, 0,    1.2,  1, 0.3, 1),
    ("fast pitch, spin negative", 50.0, -0.44,    80000, 290.0,  0.145,   0.073, 0, 0,    1.8, -25, 5, 6),
]


class Flight:
    def __init__(self, row):
        (self.name, self.R, self.spin, pressure, temperature, self.mass, self.d, self.cd, self.area,
         self.height, self.vs, self.vz, self.vu) = row
        self.rho = pressure / (287.05287 * temperature)
        self.mu = 1.458e-6 * temperature ** 1.5 / (temperature + 110.4)
        self.area = self.area or pi * self.d ** 2 / 4
        self.reach = self.R - self.d / 2

    def drag(self, u):
        """Acceleration by drag at the velocity u relative to the air."""
        speed = sqrt(u[0] * u[0] + u[1] * u[1] + u[2] * u[2])
        if self.cd:
            k = 0.5 * self.rho * self.cd * self.area * speed
        else:
            d = sqrt(4 * self.area / pi)
            re = self.rho * speed * d / self.mu
            cd_re = 24.0
            if re > 0:
                cd_re = re * (24 / re * (1 + 0.15 * re ** 0.687) + 0.42 / (1 + 42500 * re ** -1.16))
            k = 0.5 * self.mu * cd_re * self.area / d
        return [-k / self.mass * c for c in u]

    def turning(self, _, s):
        x, y, z, vx, vy, vz = s
        w = self.spin
        ax, ay, az = self.drag((vx, vy, vz))
        return [vx, vy, vz, ax + 2 * w * vy + w * w * x, ay - 2 * w * vx + w * w * y, az]

    def inertial(self, _, s):
        x, y, z, vx, vy, vz = s
        w = self.spin
        return [vx, vy, vz, *self.drag((vx + w * y, vy - w * x, vz))]

    def start(self, turning):
        r = self.R - self.height
        return np.array([r, 0.0, 0.0, -self.vu, self.vs + (0 if turning else self.spin * r), self.vz])

    def lands(self, turning):
        f = self.turning if turning else self.inertial
        gap = lambda t, s: self.reach - hypot(s[0], s[1])
        gap.terminal, gap.direction = True, -1
        s0 = self.start(turning)
        how = dict(method="DOP853", rtol=RTOL, atol=ATOL)
        found = solve_ivp(f, (0, 1e4), s0, events=gap, dense_output=True, **how)
        t = found.t_events[0][0]
        # From an end of the integration itself, not of its interpolant: a step
        # that ends at the time found, then Newton's with short ones.
        s = solve_ivp(f, (0, t), s0, **how).y[:, -1]
        for _ in range(5):
            rate = (s[0] * s[3] + s[1] * s[4]) / hypot(s[0], s[1])
            dt = gap(t, s) / rate
            t, s = t + dt, short(f, s, dt)
        way = found.sol(np.linspace(0, found.t[-1], 20001))
        angle = np.unwrap(np.arctan2(way[1], way[0]))[-1]
        angle += np.remainder(atan2(s[1], s[0]) - angle + pi, 2 * pi) - pi
        return self.figures(t, s, angle, turning)

    def figures(self, t, s, angle, turning):
        x, y, z, vx, vy, vz = s
        if not turning:
            angle -= self.spin * t
            vx, vy = vx + self.spin * y, vy - self.spin * x
        return [t, self.R * angle, z, sqrt(vx * vx + vy * vy + vz * vz), abs(x * vx + y * vy) / hypot(x, y)]


def short(f, s, dt):
    """A step of the classical Runge-Kutta method."""
    k1 = np.array(f(0, s))
    k2 = np.array(f(0, s + dt / 2 * k1))
    k3 = np.array(f(0, s + dt / 2 * k2))
    k4 = np.array(f(0, s + dt * k3))
    return s + dt / 6 * (k1 + 2 * k2 + 2 * k3 + k4)


def main():
    rows, spread = [], 0.0
    for row in FLIGHTS:
        flight = Flight(row)
        a, b = flight.lands(True), flight.lands(False)
        scale = [a[0], abs(a[1]) + flight.height, abs(a[2]) + flight.height, a[3], a[3]]
        spread = max(spread, max(abs(p - q) / c for p, q, c in zip(a, b, scale)))
        rows.append(list(row) + a)
    print(f"# source: SciPy {scipy.__version__}, NumPy {np.__version__} (Debian python3-scipy, python3-numpy)")
    print(f"# method: solve_ivp, DOP853, rtol {RTOL:g}, atol {ATOL:g}, in the turning frame")
    print("# script: drag_flights.py")
    print(f"# precision: the same in the inertial frame differs by {spread:.1e} at most, "
          "relative (lengths: to the length and the height)")
    print(",".join(INPUTS + OUTPUTS))
    for r in rows:
        print(",".join([f'"{r[0]}"'] + [repr(float(v)) for v in r[1:]]))


if __name__ == "__main__":
    main()
