"""Writes plans/NNN.json and results/NNN.json: `python3 make_tables.py [FIRST LAST]` (without them: all of NUMBERS).

A result whose plan and scripts have not changed comes out the same; numbers are kept to 12 significant
digits, cents, millimetres and finger forces to 1e-7. Each result names the versions of the libraries that computed it.
"""

import json
import multiprocessing
import os
import pathlib
import platform
import sys

import numpy
import scipy

import plans
import reference

HERE = pathlib.Path(__file__).parent
ORIGIN = ("tests/reference/make_tables.py, an independent computation in Python "
          f"{platform.python_version()}, numpy {numpy.__version__}, scipy {scipy.__version__}")
# Plans drawn at random, and those that go through all combinations (see `plans.covered`).
NUMBERS = [*range(1, 201), *range(301, 481)]
PER_FRET = {
    "position_mm": "position_mm", "none_cents": "none_cents", "ideal_cents": "ideal_cents",
    "built_cents": "built_cents", "as_built_cents": "as_built_cents", "length_cents": "length_cents",
    "tension_cents": "tension_cents", "mass_cents": "mass_cents", "stiffness_cents": "stiffness_cents",
    "finger_force_n": "finger_force_n", "touches_fret": "touches_fret",
}


def rounded(value, key=""):
    """Numbers to 12 significant digits; cents, lengths and finger forces to seven decimals at most."""
    if isinstance(value, dict):
        return {k: rounded(v, k) for k, v in value.items()}
    if isinstance(value, list):
        return [rounded(v, key) for v in value]
    if not isinstance(value, float):
        return value
    value = float(f"{value:.12g}")
    short = key.endswith(("_cents", "_force_n")) or (key.endswith("_mm") and key != "bending_length_mm")
    return round(value, 7) + 0.0 if short or key in ("x", "y", "z") else value


def compact(report):
    """The report with the frets of a string as columns, and without what is null throughout."""
    for string in report["strings"]:
        rows = string.pop("frets")
        columns = {name: [row[key] for row in rows] for name, key in PER_FRET.items()}
        string["frets"] = {name: column for name, column in columns.items() if any(v is not None for v in column)}
    return report


def write(path, data):
    """JSON with one line for each string's column, so that changes can be read line by line."""
    text = json.dumps(data, allow_nan=False, separators=(",", ":"), ensure_ascii=True)
    for mark in ('"strings":[', '"saddle":{"lines"', '"instrument":', '"pressing":', '"supports":', '"fit":', '"saddle":{"style"',
                 '"as_built":', '"targets":', '"pitch":', '"frets":{', '"ideal":', '"built":{') + tuple(
                     f'"{name}":[' for name in PER_FRET):
        text = text.replace("," + mark, ",\n" + mark)
    text = text.replace('},{"string"', '},\n{"string"').replace('},{"pitch"', '},\n{"pitch"')
    path.write_text(text + "\n", encoding="utf-8")


def make(number):
    """One plan with its result."""
    plan = plans.random_plan(number)
    try:
        report = rounded(compact(reference.plain(reference.solve(plan))))
    except ArithmeticError as fault:
        return f"plan {number} ({plan['saddle']['style']}, {plan.get('nut')}, {plan['fit']}): {fault}"
    write(HERE / "plans" / f"{number:03}.json", plan)
    write(HERE / "results" / f"{number:03}.json", {"origin": ORIGIN, "plan": f"plans/{number:03}.json"} | report)
    return None


def main():
    """Makes the numbers asked for and says which failed."""
    numbers = range(int(sys.argv[1]), int(sys.argv[2]) + 1) if len(sys.argv) > 2 else NUMBERS
    for folder in ("plans", "results"):
        os.makedirs(HERE / folder, exist_ok=True)
    with multiprocessing.Pool(2) as pool:
        faults = [f for f in pool.imap_unordered(make, numbers, chunksize=1) if f]
    print("\n".join(sorted(faults)) or f"{len(numbers)} plans written")
    return 1 if faults else 0


if __name__ == "__main__":
    sys.exit(main())
