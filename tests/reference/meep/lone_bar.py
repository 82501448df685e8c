"""Where the solver's metal wall stands: a lone bar in uniform ground, set beside the exact series, in both polarisations:
    /usr/bin/python3 tests/reference/meep/lone_bar.py
For radii, cells and places of the bar between the cells (about ten minutes) it prints how far off the solver is (RMS of the trace),
how far off with the radius of the series that fits it best, and by how much of a cell that radius is the smaller one.
What record.py says of metal and its INSET rest on this.
"""

import math

import meep as mp
import numpy as np
from scipy.interpolate import CubicSpline
from scipy.optimize import minimize_scalar
from scipy.special import h2vp, hankel2, jv, jvp

import record

FREQUENCY, EPS, SIGMA = 500e6, 9.0, 0.01
SEPARATION, DEPTH = 0.12, 0.2  # of the antennas, and of the bar below them, m
AT = np.arange(0, 12e-9, 0.05e-9)
MU0 = record.IMPEDANCE / record.LIGHT


def recorded(polarisation, radius, cell, place):
    ground = record.medium({"permittivity": EPS, "conductivity": SIGMA})
    component = mp.Ez if polarisation == "along" else mp.Ex
    current = mp.CustomSource(
        lambda t: record.ricker(FREQUENCY * t / record.LIGHT - record.DELAY), is_integrated=False
    )
    bar = mp.Cylinder(
        radius=radius, height=mp.inf, center=mp.Vector3(place[0], place[1] - DEPTH / 2), material=mp.metal
    )
    traces = []
    for geometry in ([], [bar]):
        sim = mp.Simulation(
            cell_size=mp.Vector3(0.96, 0.96),
            resolution=round(1 / cell, 6),
            Courant=record.COURANT,
            default_material=ground,
            geometry=geometry,
            sources=[mp.Source(current, component=component, center=mp.Vector3(-SEPARATION / 2, DEPTH / 2))],
            boundary_layers=[mp.PML(0.12)],
        )
        sim.init_sim()
        step = sim.fields.dt / record.LIGHT
        values = np.zeros(math.ceil((AT[-1] + record.DELAY / FREQUENCY) / step) + 3)
        for n in range(1, len(values)):
            sim.fields.step()
            values[n] = sim.get_field_point(component, mp.Vector3(SEPARATION / 2, DEPTH / 2)).real
        traces.append(values)
    times = np.arange(len(values)) * step - record.DELAY / FREQUENCY
    return CubicSpline(times, record.IMPEDANCE * (traces[1] - traces[0]))(AT)


def series(polarisation, radius, place):
    length = 60e-9
    f = np.arange(1, int(4.5 * FREQUENCY * length)) / length
    w = 2 * np.pi * f
    eps = record.EPS0 * EPS - 1j * SIGMA / w
    k = w * np.sqrt(MU0 * eps)
    up, left, right = DEPTH - place[1], -SEPARATION / 2 - place[0], SEPARATION / 2 - place[0]
    r1, r2 = math.hypot(left, up), math.hypot(right, up)
    angle1, angle2 = math.atan2(up, left), math.atan2(up, right)

    def slope(n, r, angle):  # of H_n(k r) exp(-jn angle) upwards: a horizontal current's magnetic field
        turn = np.exp(-1j * n * angle)
        return turn * (k * h2vp(n, k * r) * math.sin(angle) - 1j * n * math.cos(angle) / r * hankel2(n, k * r))

    total = 0
    for n in range(-12, 13):
        if polarisation == "along":
            answer = -jv(n, k * radius) / hankel2(n, k * radius)
            ways = hankel2(n, k * r1) * hankel2(n, k * r2) * np.exp(1j * n * (angle2 - angle1))
            total = total - w * MU0 / 4 * answer * ways
        else:
            answer = -jvp(n, k * radius) / h2vp(n, k * radius)
            total = total - (-1) ** n * answer * slope(n, r1, angle1) * slope(-n, r2, angle2) / (4 * w * eps)
    sent = 2 / math.sqrt(math.pi) / FREQUENCY * (f / FREQUENCY) ** 2 * np.exp(-((f / FREQUENCY) ** 2))
    return 2 / length * (np.exp(1j * np.outer(AT, w)) @ (sent * total)).real


if __name__ == "__main__":
    mp.verbosity(0)
    for polarisation in ("along", "across"):
        for radius in (0.02, 0.048):
            for cell in (0.0015, 0.002, 0.003):
                for share in ((0, 0), (0.5, 0.5), (0.5, 0)):
                    place = (share[0] * cell, share[1] * cell)
                    theirs = recorded(polarisation, radius, cell, place)
                    off = lambda r: np.sqrt(
                        np.mean((theirs - series(polarisation, r, place)) ** 2) / np.mean(theirs**2)
                    )
                    best = minimize_scalar(off, bounds=(radius - 1.5 * cell, radius + 1.5 * cell), method="bounded")
                    print(
                        f"{polarisation} radius {1e3 * radius:g} cell {1e3 * cell:g} mm at {share}: "
                        f"{100 * off(radius):.1f} % off, at best {100 * best.fun:.1f} %, "
                        f"{(radius - best.x) / cell:.2f} of a cell inside",
                        flush=True,
                    )
