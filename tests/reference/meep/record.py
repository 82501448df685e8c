"""Records what a general-purpose finite-difference time-domain solver gives for each scene of scenes.json.

Afresh, all scenes (about an hour of one core) or the ones named:
    /usr/bin/python3 tests/reference/meep/record.py [NAME ...]
Needs Debian's python3-meep, python3-numpy, python3-scipy and python3-matplotlib.

Writes traces/NAME_fine.csv and traces/NAME_coarse.csv (time in ns, then one column per antenna position and
separation, V/m, rounded to 1e-6 of the scene's peak) and recorded.json, where
  rms_between_grids  RMS(fine - coarse) / RMS(fine)
  beyond_fine        fine + beyond_fine (fine - coarse) extrapolates to cells of no size: 0.8 where the solver's error falls with
                     the square of the cell, 2 where it falls with the cell: it does not average conductivity at a boundary,
                     which shows where layers conduct well
  rms_error_of_fine  beyond_fine * rms_between_grids, the fine grid's own error

Metal is drawn in whole cells, so its error leaps from grid to grid: a scene with nothing else is compared on its fine grid, not
extrapolated. Where the field lies along it the solver's wall stands inside the radius asked for, by 0.18 to 0.54 of a cell on a
lone bar in uniform ground set beside the exact series (lone_bar.py), which makes 4 to 12 %: so metal is drawn 0.35 of a cell
larger there. Across it no radius sets it right: 4 to 11 % off, and 2 to 11 % with the radius that fits best. So no scene has
metal with the field across; there the exact series alone speaks for it (tests/echo/scatterer_test.cpp, section_test.cpp).

The source is the Ricker current of scenes.json itself, so nothing has to be deconvolved. Solver units: length 1 m, c = 1,
mu0 = eps0 = 1; a field in them times the impedance of vacuum is V/m per ampere. Conductivity is sigma / (eps0 eps_r) * 1 m / c.
Each layer goes down to the bottom and the next one is laid over it, so that no cell of vacuum is left between two.
"""

import json
import math
import pathlib
import sys
import time

import meep as mp
import numpy as np
from scipy.interpolate import CubicSpline

LIGHT = 299792458.0
EPS0 = 8.8541878128e-12
IMPEDANCE = 376.730313668
COURANT = 0.65  # of a cell over c; 0.707 is the limit in two dimensions
DELAY = 1.6  # periods of the peak frequency before the Ricker's peak, where it is 1e-9 of it
SMOOTH, STEEP = 1 / (1.5**2 - 1), 1 / (1.5 - 1)  # beyond_fine for an error that goes with cell^2, with cell
INSET = 0.35  # of a cell
HERE = pathlib.Path(__file__).resolve().parent


def medium(matter):
    eps = matter["permittivity"]
    return mp.Medium(epsilon=eps, D_conductivity=matter["conductivity"] / (EPS0 * eps) / LIGHT)


def ricker(t):
    u = (math.pi * t) ** 2
    return (1 - 2 * u) * math.exp(-u)


def box_of(scene):
    """Left, right, top and bottom (depth) of what is computed, on whole cells of both grids, and the absorbing rim's width."""
    wave = LIGHT / scene["peak_frequency"]
    ends = [x + side * s / 2 for x in scene["positions"] for s in scene["separations"] for side in (-1, 1)]
    ends += [t["x"] + side * t["radius"] for t in scene["targets"] for side in (-1, 1)]
    lowest_boundary = sum(layer.get("thickness", 0) for layer in scene["layers"])
    deepest = max([lowest_boundary] + [t["depth"] + t["radius"] for t in scene["targets"]])
    rim = 0.25 * wave
    grain = 4 * scene["cell"]
    outward = lambda v: grain * math.ceil(v / grain - 1e-9)
    left, right = -outward(-min(ends) + 0.08 * wave + rim), outward(max(ends) + 0.08 * wave + rim)
    return left, right, -outward(scene["height"] + 0.12 * wave + rim), outward(deepest + 0.06 * wave + rim), rim


def runs_of(scene):
    """Transmitter positions and, for each, the traces it gives: one run gives every receiver, a swapped pair is the same trace
    (reciprocity), and so is the mirrored pair where the targets mirror onto themselves."""
    faced = lambda side: sorted(json.dumps(dict(t, x=side * t["x"] + 0), sort_keys=True) for t in scene["targets"])
    mirrors = faced(1) == faced(-1)
    pairs = []
    for s in scene["separations"]:
        for x in scene["positions"]:
            a, b = round(x - s / 2, 9), round(x + s / 2, 9)
            pairs.append([(a, b), (b, a)] + ([(-a, -b), (-b, -a)] if mirrors else []))
    if not scene["targets"]:  # all places are alike: one transmitter at the left, receivers to its right
        left = -max(scene["separations"]) / 2
        return {left: {i: round(left + s, 9) for i, s in enumerate(scene["separations"])}}
    runs, left = {}, set(range(len(pairs)))
    while left:
        gives = {}
        for i in left:
            for a, b in pairs[i]:
                gives.setdefault(a, {})[i] = b
        best = max(sorted(gives), key=lambda a: (len(gives[a]), a))
        runs[best] = gives[best]
        left -= set(gives[best])
    return runs


def simulation(scene, cell, layers, targets, transmitter):
    """The solver, set up and at rest; which component is sent and received; how many steps the traces need; where in it a point
    (x, depth) is."""
    left, right, top, bottom, rim = box_of(scene)
    shift = lambda x, depth: mp.Vector3(x - (left + right) / 2, (top + bottom) / 2 - depth)
    geometry, down = [], 0.0
    for layer in layers:
        middle = mp.Vector3(0, shift(0, (down + 2 * bottom) / 2).y)
        geometry.append(mp.Block(mp.Vector3(mp.inf, 2 * bottom - down, mp.inf), center=middle, material=medium(layer)))
        down += layer.get("thickness", 0)
    for t in targets:
        wall = t.get("wall", {"thickness": 0})
        rings = [(t["radius"], wall)] if wall["thickness"] else []
        inset = t.get("metal") and scene["polarisation"] == "along"
        drawn = t["radius"] + (INSET * cell if inset else 0)
        for radius, matter in rings + [(drawn - wall["thickness"], t)]:
            filling = mp.metal if matter.get("metal") else medium(matter)
            geometry.append(mp.Cylinder(radius=radius, height=mp.inf, center=shift(t["x"], t["depth"]), material=filling))
    f = scene["peak_frequency"]
    component = mp.Ez if scene["polarisation"] == "along" else mp.Ex
    current = mp.CustomSource(lambda t: ricker(f * t / LIGHT - DELAY), is_integrated=False)
    sim = mp.Simulation(
        cell_size=mp.Vector3(round(right - left, 9), round(bottom - top, 9)),
        resolution=round(1 / cell, 6),
        Courant=COURANT,
        default_material=mp.air,
        geometry=geometry,
        sources=[mp.Source(current, component=component, center=shift(transmitter, -scene["height"]))],
        boundary_layers=[mp.PML(rim)],
    )
    sim.init_sim()
    steps = math.ceil((scene["step"] * (scene["samples"] - 1) + DELAY / f) / (sim.fields.dt / LIGHT)) + 3
    return sim, component, steps, shift


def fields(scene, cell, layers, targets, transmitter, receivers):
    """Field at each receiver (rows) against time from the Ricker's peak, V/m, and those times, s."""
    sim, component, count, place = simulation(scene, cell, layers, targets, transmitter)
    points = [place(x, -scene["height"]) for x in receivers]
    values = np.zeros((len(points), count))
    for n in range(1, count):
        sim.fields.step()
        for i, point in enumerate(points):
            values[i, n] = sim.get_field_point(component, point).real
    return np.arange(count) * sim.fields.dt / LIGHT - DELAY / scene["peak_frequency"], IMPEDANCE * values


def traces(scene, cell):
    """Traces as the scene wants them, one row per antenna position."""
    at = np.arange(scene["samples"]) * scene["step"]
    runs = runs_of(scene)
    out = np.zeros((sum(len(r) for r in runs.values()), scene["samples"]))
    apart = sorted({round(abs(rx - tx), 9) for tx, r in runs.items() for rx in r.values()})
    bare = scene["layers"] if scene["wanted"] == "targets" else [dict(scene["layers"][0], thickness=0)]
    # Without targets all places are alike, so one run serves.
    origin = -max(apart) / 2
    times, without = fields(scene, cell, bare, [], origin, [origin + s for s in apart])
    for tx, wanted in runs.items():
        _, full = fields(scene, cell, scene["layers"], scene["targets"], tx, list(wanted.values()))
        for (i, rx), row in zip(wanted.items(), full):
            out[i] = CubicSpline(times, row - without[apart.index(round(abs(rx - tx), 9))])(at)
    return out


def write(path, scene, rows, peak):
    places = 6 - math.ceil(math.log10(peak))
    heads = [f"x={x:g} s={s:g}" for s in scene["separations"] for x in scene["positions"]]
    lines = ["time_ns," + ",".join(heads)]
    for n, values in enumerate(rows.T):
        # + 0.0 turns a rounded -0.0 into 0.0
        lines.append(f"{n * scene['step'] * 1e9:.6g}," + ",".join(f"{round(v, places) + 0.0:.{max(places, 0)}f}" for v in values))
    path.write_text("\n".join(lines) + "\n")


def record(scene):
    start = time.time()
    coarse, fine = traces(scene, scene["cell"]), traces(scene, scene["cell"] / 1.5)
    peak = np.abs(fine).max()
    write(HERE / "traces" / f"{scene['name']}_coarse.csv", scene, coarse, peak)
    write(HERE / "traces" / f"{scene['name']}_fine.csv", scene, fine, peak)
    apart = float(np.sqrt(np.mean((fine - coarse) ** 2) / np.mean(fine**2)))
    beyond = STEEP if max(layer["conductivity"] for layer in scene["layers"]) >= 0.05 else SMOOTH
    book = HERE / "recorded.json"
    recorded = json.loads(book.read_text()) if book.exists() else {}
    recorded[scene["name"]] = {
        "solver": f"MEEP {mp.__version__}",
        "coarse_cell": scene["cell"],
        "fine_cell": round(scene["cell"] / 1.5, 9),
        "peak": float(f"{peak:.6g}"),
        "rms_between_grids": float(f"{apart:.4g}"),
        "beyond_fine": round(beyond, 6),
        "rms_error_of_fine": float(f"{beyond * apart:.4g}"),
    }
    book.write_text(json.dumps(recorded, indent=2, sort_keys=True) + "\n")
    print(f"{scene['name']}: grids differ by {100 * apart:.2f} % RMS, {time.time() - start:.0f} s", flush=True)


if __name__ == "__main__":
    mp.verbosity(0)
    for scene in json.loads((HERE / "scenes.json").read_text())["scenes"]:
        if len(sys.argv) < 2 or scene["name"] in sys.argv[1:]:
            record(scene)
