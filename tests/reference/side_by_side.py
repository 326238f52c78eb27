"""The same plans through the reference and through the program, timed in one run: `python3 side_by_side.py [COUNT]`.

COUNT plans (20 unless told otherwise), evenly spread over `plans/`. Both sides read the plan's file and give the whole solve report as JSON, on one
core; neither's start counts twice: the reference is loaded once, the program solves all plans in one process. The
program is the release build where there is one. Results are compared, so that both did the same work.
"""

import json
import os
import pathlib
import subprocess
import sys
import time

# One core for both: numpy's threads off before it is loaded.
os.environ["OMP_NUM_THREADS"] = os.environ["OPENBLAS_NUM_THREADS"] = "1"

import reference  # noqa: E402

HERE = pathlib.Path(__file__).resolve().parent
# As the program's own test allows.
SETBACK_MM = 0.001
REPEATS = 5


def program():
    """(path, name of the build) of the program in the target folder."""
    target = pathlib.Path(os.environ.get("CARGO_TARGET_DIR", HERE.parent.parent / "target"))
    for build in ("release", "debug"):
        path = target / build / "crestline"
        if path.exists():
            return path, build
    sys.exit(f"no program in {target}: build it first (cargo build --release)")


def by_reference(paths):
    """Reports and seconds of the reference."""
    began = time.perf_counter()
    reports = [reference.plain(reference.solve(json.loads(path.read_text(encoding="utf-8")))) for path in paths]
    text = json.dumps(reports)
    return json.loads(text), time.perf_counter() - began


def by_program(path, paths, threads):
    """Reports and seconds of the program, the fastest of a few runs."""
    environment = os.environ | {"RAYON_NUM_THREADS": str(threads)}
    seconds = []
    for _ in range(REPEATS):
        began = time.perf_counter()
        done = subprocess.run([path, "solve", "--lines", *paths], env=environment, capture_output=True, check=True)
        seconds.append(time.perf_counter() - began)
    return [json.loads(line)["report"] for line in done.stdout.splitlines()], min(seconds)


def start(path):
    """Seconds that the program takes to do nothing."""
    def once():
        began = time.perf_counter()
        subprocess.run([path, "--version"], capture_output=True, check=True)
        return time.perf_counter() - began
    return min(once() for _ in range(REPEATS))


def apart(ours, theirs):
    """Largest difference of ideal setbacks, mm, where the rule settles them."""
    return max((abs(a["ideal"][key] - b["ideal"][key])
                for x, y in zip(ours, theirs, strict=True) for a, b in zip(x["strings"], y["strings"], strict=True)
                if b["ideal_settled"] for key in ("saddle_setback_mm", "nut_setback_mm")), default=0.0)


def main():
    """Runs both and prints the ratio."""
    count = int(sys.argv[1]) if len(sys.argv) > 1 else 20
    every = sorted((HERE / "plans").glob("*.json"))
    paths = every[::max(1, len(every) // count)][:count]
    path, build = program()
    theirs, reference_s = by_reference(paths)
    ours, one_s = by_program(path, paths, 1)
    _, all_s = by_program(path, paths, os.cpu_count() or 1)
    difference = apart(ours, theirs)
    strings = sum(len(report["strings"]) for report in ours)
    print(f"{len(paths)} plans with {strings} strings; ideal setbacks at most {difference:.1e} mm apart")
    print(f"program: {build} build" + (", slow; a release build counts" if build == "debug" else ""))
    print(f"{'':34}{'in all, s':>12}{'a plan, ms':>12}{'times faster':>14}")
    rows = [("reference, Python with scipy", reference_s), ("program, one core", one_s),
            (f"program, {os.cpu_count()} cores", all_s), ("of which the program's start", start(path))]
    for name, seconds in rows:
        print(f"{name:34}{seconds:12.4f}{1e3 * seconds / len(paths):12.3f}{reference_s / seconds:14.0f}")
    if difference > SETBACK_MM:
        sys.exit("the two do not agree: their times say nothing")


if __name__ == "__main__":
    main()
