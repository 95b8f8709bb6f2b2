"""Runs the second version on a case and writes its result: python3 run.py [case [method [file]]].

Without arguments: case.json by LSODA to result.csv. With `hot`: hot.json to hot.csv.
"""

import csv
import json
import sys
import time
from pathlib import Path

import numpy as np
from scipy.integrate import solve_ivp

from model import Model

HERE = Path(__file__).parent
COLUMNS = ["temperature_upper", "temperature_lower", "interface", "oxygen_upper", "oxygen_lower",
           "heat_release", "given_off", "flamed_share", "door_in", "door_out", "pressure"]
UNITS = ["K", "K", "m", "mol/mol", "mol/mol", "W", "W", "1", "kg/s", "kg/s", "Pa"]


def absolute(start):
    """Absolute tolerance: 1e-9 of each state's own size."""
    size = np.maximum(np.abs(start), 1e-2)
    size[0] = start[0] + 1.0
    size[1:15] = 1e-1
    size[15:20] = [100.0, 1.0, 1e-2, 1e-2, 1e-1]
    return 1e-9 * size


def pieces(case):
    door = case["door"]
    begin, end = door["opens_from"], door["opens_from"] + door["opens_over"]
    yield 0.0, begin, lambda t: 0.0
    yield begin, end, lambda t: door["width"] * (t - begin) / (end - begin)
    yield end, case["duration"], lambda t: door["width"]


def main():
    name, method, target = (sys.argv[1:] + [None] * 3)[:3]
    name, method = name or "case", method or "LSODA"
    target = HERE / (target or ("result.csv" if name == "case" else f"{name}.csv"))
    case = json.loads((HERE / f"{name}.json").read_text(encoding="utf-8"))
    model = Model(case)
    state = model.start()
    tolerance = absolute(state)
    times = np.arange(0.0, case["duration"] + .5 * case["every"], case["every"])
    rows, evaluations, highest, began = [], 0, 0.0, time.time()
    for begin, end, clear in pieces(case):
        model.clear = clear
        # the instants of the actions belong to the piece before them
        wanted = [t for t in times if begin < t <= end or (begin == 0.0 and t == 0.0)]
        found = solve_ivp(model.rates, (begin, end), state, method=method, rtol=1e-9, atol=tolerance,
                          t_eval=sorted(set(wanted) | {end}), max_step=1.0)
        assert found.success, found.message
        evaluations += found.nfev
        for t, column in zip(found.t, found.y.T):
            if t in wanted:
                report = model.evaluate(t, column)[1]
                rows.append([t] + [report[name] for name in COLUMNS])
                highest = max(highest, abs(report["pressure"]))
        state = found.y[:, -1]
    with target.open("w", newline="") as out:
        writer = csv.writer(out, lineterminator="\n")
        writer.writerow(["time (s)"] + [f"{c} ({u})" for c, u in zip(COLUMNS, UNITS)])
        for row in rows:
            writer.writerow([f"{row[0]:.1f}"] + [f"{value:.9g}" for value in row[1:]])
    print(f"{method}: {evaluations} evaluations, {time.time() - began:.1f} s, "
          f"largest pressure among the rows {highest:.1f} Pa")


if __name__ == "__main__":
    main()
