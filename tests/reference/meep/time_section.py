"""Times the grid solver on the section of scenes.json's "timed", so that the full-wave section can be set beside it:
    /usr/bin/python3 tests/reference/meep/time_section.py [--error]
The solver needs a run for every antenna position, and one without targets. One run is timed, at the position whose distance
from the line's middle is the mean over the line, in a box no wider than that position needs; a section takes traces + 1
times as long. With --error the echo is also computed on both grids of "timed", and their distance is printed: the time
belongs to that error. The last line is the number of seconds per section.
"""

import json
import sys
import time

import meep as mp
import numpy as np

import record

if __name__ == "__main__":
    mp.verbosity(0)
    timed = json.loads((record.HERE / "scenes.json").read_text())["timed"]
    # |x| over an even line about 0 has its mean at a quarter of the length.
    scene = dict(timed, positions=[timed["traces"] * timed["position_step"] / 4])
    x, s = scene["positions"][0], scene["separations"][0]
    start = time.perf_counter()
    record.fields(scene, scene["cell"], scene["layers"], scene["targets"], x - s / 2, [x + s / 2])
    seconds = time.perf_counter() - start
    if "--error" in sys.argv:
        coarse, fine = record.traces(scene, scene["cell"]), record.traces(scene, scene["cell"] / 1.5)
        better = fine + record.SMOOTH * (fine - coarse)
        error = np.sqrt(np.mean((coarse - better) ** 2) / np.mean(better**2))
        print(f"error of a trace {100 * error:.1f} % RMS, by extrapolation from cells of {scene['cell']} m and two thirds of it")
    print(f"{seconds:.1f} s a run, {timed['traces'] + 1} runs; seconds per section:")
    print(f"{seconds * (timed['traces'] + 1):.0f}")
