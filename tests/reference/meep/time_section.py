"""Times the grid solver on the section of scenes.json's "timed", so that the full-wave section can be set beside it:
    /usr/bin/python3 tests/reference/meep/time_section.py [--error]
The solver needs a run for every antenna position, and one without targets. One run is timed, at the position whose distance
from the targets is the mean over the line, in a box no wider than that position needs; the section takes traces + 1 times as
long. The cell is the coarse one of "timed". With --error the same trace is also computed on the fine grid, and printed is how
far the two are apart, RMS: cell size and time belong to that error.
Prints seconds per section on the last line. Set-up of the solver is not counted.
"""

import json
import sys
import time

import meep as mp
import numpy as np

import record


def middle(scene):
    """The scene at the one position that stands for all: the mean distance from the line's middle is a quarter of its length."""
    quarter = scene["traces"] * scene["position_step"] / 4
    return dict(scene, positions=[quarter])


def trace(scene, cell):
    """The targets' echo at the position, and the seconds that the run with targets took."""
    x, s = scene["positions"][0], scene["separations"][0]
    transmitter, receiver = x - s / 2, x + s / 2
    start = time.perf_counter()
    times, full = record.fields(scene, cell, scene["layers"], scene["targets"], transmitter, [receiver])
    seconds = time.perf_counter() - start
    return times, full[0], seconds


if __name__ == "__main__":
    mp.verbosity(0)
    scene = middle(json.loads((record.HERE / "scenes.json").read_text())["timed"])
    runs = scene["traces"] + 1
    _, _, seconds = trace(scene, scene["cell"])
