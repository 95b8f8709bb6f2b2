"""Figures of the measured room series that tests/evidence_room.rs holds.

Source: DOI 10.5281/zenodo.5703474 (MIT licence), reduced to tables of means
over the repeated tests and of time histories on a 5 s grid. Run with the
folder of those tables as the only argument:

    python3 tests/reference/room_series.py FOLDER

Mean over the height: eight thermocouples at 0.34 to 2.42 m, straight lines
between them, the lowest reading held down to the floor and the highest up to
the ceiling at 2.44 m. The rise is taken over the room's own temperature before
ignition. Scatter of a mean over the height: the standard deviations of the
eight readings weighted like the readings themselves, as if all eight erred
together (an upper bound). Gas in the room: 353 kg K/m3 times the floor area
times the integral of dz/T on the same lines.

Open door: the last 60 s of burning. Shut door: the largest mean over the
height in the mean history of the repeated tests, and flame-out as logged (of
the 100 kW centre tests the third was shut off by hand and does not count).
"""

import csv
import math
import pathlib
import statistics
import sys

HEIGHTS = [0.34, 0.64, 0.94, 1.24, 1.54, 1.84, 2.14, 2.42]
CEILING = 2.44
AREA = 3.66 * 3.66
ZERO = 273.15


def weights():
    """Trapezium weights with both ends extended, m."""
    points = [0.0, *HEIGHTS, CEILING]
    share = [0.0] * len(points)
    for low, high in zip(range(len(points) - 1), range(1, len(points))):
        share[low] += 0.5 * (points[high] - points[low])
        share[high] += 0.5 * (points[high] - points[low])
    share[1] += share[0]
    share[-2] += share[-1]
    return share[1:-1]


WEIGHTS = weights()


def mean(profile):
    return sum(w * t for w, t in zip(WEIGHTS, profile)) / CEILING


def gas_mass(profile):
    """353 A times the integral of dz/T on straight lines, kg."""
    points = [0.0, *HEIGHTS, CEILING]
    kelvin = [t + ZERO for t in (profile[0], *profile, profile[-1])]
    total = 0.0
    for i in range(len(points) - 1):
        low, high, step = kelvin[i], kelvin[i + 1], points[i + 1] - points[i]
        slope = (high - low) / step
        total += math.log(high / low) / slope if abs(slope) > 1e-9 else step / low
    return 353.0 * AREA * total


def profile(row, suffix=""):
    return [float(row[f"T4_z{z:.2f}_C{suffix}"] or "nan") for z in HEIGHTS]


def number(row, key):
    return float(row[key]) if row.get(key) else math.nan


def rows(path):
    with open(path, newline="") as file:
        return list(csv.DictReader(file))


def flame_out(folder):
    """Logged flame-out, s: mean and standard deviation, tests that went out by themselves."""
    found = {}
    for row in rows(folder / "closed_summary.csv"):
        if row["off_note"] != "logged burner off" and row["fuel"] != "500kW":
            found.setdefault((row["fuel"], row["position"]), []).append(row)
    return found


def main(folder):
    out = flame_out(folder)
    print("open door: last 60 s of burning")
    for row in rows(folder / "steady.csv"):
        key = (row["fuel"], row["position"])
        start = number(row, "T_amb_room_C")
        if row["door"] == "Open":
            temperatures = profile(row)
            print(
                f"{key[0]:8} {key[1]:7} tests {row['n_replicates']} start {start:.1f} outside"
                f" {number(row, 'T_amb_door_C'):.1f} rise {mean(temperatures) - start:.1f}"
                f" +- {mean(profile(row, '_std')):.1f} K, gas {number(row, 'room_mass_kg'):.2f}"
                f" +- {number(row, 'room_mass_kg_std'):.2f} kg (from the mean profile"
                f" {gas_mass(temperatures):.2f}), in {number(row, 'm_in_hydro'):.3f}"
                f" kg/s (hydrostatic), burning stops {number(row, 't_off_detected_s'):.0f} s"
            )
    print("shut door: largest mean over the height")
    for row in rows(folder / "steady.csv"):
        if row["door"] != "Closed":
            continue
        key = (row["fuel"], row["position"])
        start = number(row, "T_amb_room_C")
        history = rows(folder / f"closed_{key[0]}_{key[1]}.csv")
        means = [mean(profile(point)) for point in history]
        top = max(range(len(means)), key=means.__getitem__)
        line = (
            f"{key[0]:8} {key[1]:7} tests {row['n_replicates']} start {start:.1f} rise"
            f" {means[top] - start:.1f} K at {history[top]['t_s']} s (upper peak scatter"
            f" {number(row, 'Tu_peak_C_std'):.1f} K, time of upper peak"
            f" {number(row, 't_Tu_peak_s'):.0f} +- {number(row, 't_Tu_peak_s_std'):.0f} s)"
        )
        if key in out:
            times = [float(test["t_off_detected_s"]) for test in out[key]]
            deep = statistics.mean(float(test["O2_0p6_at_out"]) for test in out[key])
            low = statistics.mean(float(test["O2_1p8_at_out"]) for test in out[key])
            spread = statistics.stdev(times) if len(times) > 1 else math.nan
            line += (
                f", out {statistics.mean(times):.0f} +- {spread:.0f} s with {deep:.1f} and"
                f" {low:.1f} vol-% dry at 0.6 and 1.8 m below the ceiling"
            )
        print(line)


if __name__ == "__main__":
    main(pathlib.Path(sys.argv[1]))
