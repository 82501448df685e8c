"""Times the grid solver on the section of scenes.json's "timed", so that the full-wave section can be set beside it:
    /usr/bin/python3 tests/reference/meep/time_section.py [--error]
The solver needs a run for every antenna position, and one without targets. Timed are some steps of one run (each costs the
same), at the position whose distance from the line's middle is the mean over the line, in a box no wider than that position
needs. Cells are a third of "cell", which leaves about 2 % RMS of a trace; --error (some minutes) finds that error anew, from two
coarser grids. Times are of the processor, so that other work on the machine does not count; the solver uses one core.
The last line is the number of seconds per section.
"""

import json
import sys
import time

import meep as mp
import numpy as np

import record

STEPS = 100

if __name__ == "__main__":
    mp.verbosity(0)
    timed = json.loads((record.HERE / "scenes.json").read_text())["timed"]
    cell, runs = timed["cell"] / 3, timed["traces"] + 1
    # |x| over an even line about 0 has its mean at a quarter of the length.
    scene = dict(timed, positions=[timed["traces"] * timed["position_step"] / 4])
    transmitter = scene["positions"][0] - scene["separations"][0] / 2
    sim, component, steps, place = record.simulation(scene, cell, scene["layers"], scene["targets"], transmitter)
    receiver = place(scene["positions"][0] + scene["separations"][0] / 2, -scene["height"])
    start = time.process_time()
    for _ in range(STEPS):
        sim.fields.step()
        sim.get_field_point(component, receiver)
    seconds = (time.process_time() - start) / STEPS * steps
    if "--error" in sys.argv:
        near = dict(timed, positions=[0.2])  # over a target, where the error matters
        coarse, fine = record.traces(near, timed["cell"]), record.traces(near, timed["cell"] / 1.5)
        better = fine + record.SMOOTH * (fine - coarse)
        error = np.sqrt(np.mean((fine - better) ** 2) / np.mean(better**2)) * (1.5 / 3) ** 2
        print(f"error {100 * error:.1f} % RMS of a trace")
    print(f"{steps} steps, {seconds:.0f} s a run, {runs} runs; seconds per section:")
    print(f"{seconds * runs:.0f}")
