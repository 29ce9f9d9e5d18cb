#!/usr/bin/python3
"""Reference slides of spheres in a turning habitat, with friction and drag.

Run: /usr/bin/python3 slides.py > slides.csv

Spoke: a sphere let go at rest, touching the antispinward wall of a radial
shaft, its centre on a line at the distance b from the radial one. Along the
line, from the force balance in the turning frame,
    x'' = w^2 x - mu N - drag,  N = 2 w x' + w^2 b.
Floor: a sphere that slides along a cylindrical floor, its centre at the
distance R - a from the axis, with the speed v spinward (relative to the
floor), until it stops,
    v' = -mu N - drag,  N = (w + v/(R - a))^2 (R - a).
Drag: a smooth sphere by Clift & Gauvin 1970 in air that turns along.
Integrated by SciPy's DOP853 (Hairer, Norsett & Wanner).
"""
from math import copysign, pi

import scipy
from scipy.integrate import solve_ivp

RTOL, ATOL = 1e-13, 1e-14
RHO, MU = 1.2041, 1.813e-5


def drag(v, d, m):
    re = RHO * abs(v) * d / MU
    if re == 0:
        return 0.0
    cd = 24 / re * (1 + 0.15 * re ** 0.687) + 0.42 / (1 + 42500 * re ** -1.16)
    return RHO * cd * pi * d * d / 4 * v * abs(v) / 2 / m


def spoke(w, mu, b, x0, m, d, time):
    f = lambda t, y: [y[1], w * w * y[0] - mu * (2 * w * y[1] + w * w * b) - drag(y[1], d, m)]
    y = solve_ivp(f, (0, time), [x0, 0], "DOP853", rtol=RTOL, atol=ATOL).y[:, -1]
    return time, y[0], y[1]


def floor(w, mu, R, v0, m, d):
    r = R - d / 2
    f = lambda t, y: [y[1], -copysign(mu * (w + y[1] / r) ** 2 * r, v0) - drag(y[1], d, m)]
    stop = lambda t, y: y[1]
    stop.terminal = True
    s = solve_ivp(f, (0, 1e3), [0, v0], "DOP853", rtol=RTOL, atol=ATOL, events=stop)
    return s.t_events[0][0], s.y_events[0][0][0] * R / r, 0.0


print("# SciPy %s, DOP853, rtol %g, atol %g; slides.py" % (scipy.__version__, RTOL, ATOL))
print("# air %g kg/m^3, %g Pa s; spoke: place and speed along it after a time; floor: time, arc on it and speed at the stop" % (RHO, MU))
print("kind,spin_rad_s,friction,beside_m,start,mass_kg,diameter_m,floor_m,time_s,place_m,speed_m_s")
for w, mu, b, x0, m, d, t in [(0.6, 0, 0, 8, 0.05, 0.1, 3.0), (0.6, 0.3, 0, 8, 0.05, 0.1, 3.5), (-0.5, 0.2, 0.4, 10, 0.4, 0.2, 3.0), (0.4, 0.1, 0.3, 6, 0.01, 0.06, 5.0)]:
    time, x, v = spoke(abs(w), mu, b, x0, m, d, t)
    print("spoke,%r,%r,%r,%r,%r,%r,60,%r,%r,%r" % (w, mu, b, x0, m, d, time, x, v))
for w, mu, R, v, m, d in [(0.55, 0.3, 18, 3, 0.05, 0.1), (0.55, 0.3, 18, -3, 0.05, 0.1), (-0.4, 0.1, 30, 4, 0.02, 0.08), (0.9, 0.05, 9, -2, 1.0, 0.3)]:
    time, s, vend = floor(w, mu, R, v, m, d)
    print("floor,%r,%r,0,%r,%r,%r,%r,%r,%r,%r" % (w, mu, v, m, d, R, time, s, vend))
