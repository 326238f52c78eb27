"""Writes sets/plans/NN.json and sets/results/NN.json, random plans with alternatives: `python3 make_sets.py`.

Each is one of the random plans of `plans.py` with one or two alternatives: the strings with thicker or thinner cores and
another action, or the own strings at other pitches. What is drawn must be legal for every set.
"""

import copy
import multiprocessing
import os
import sys

import make_tables
import neck
import plans
import reference
import sets

COUNT = 16
# Numbers of the plans beneath, behind those of the tables, and the stream of what is drawn for the sets.
FIRST_PLAN, STREAM, ATTEMPTS = 1000, 30_000, 200
STYLES = ["straight", "shaped", "separate", "two_piece"]
NUTS = ["plain", "plain", "common", "shaped"]


def other_strings(draw, plan):
    """The strings with other cores, wraps and actions."""
    strings = copy.deepcopy(plan["strings"])
    for string in strings:
        by = draw.between(0.88, 1.15, 3)
        string["core"]["diameter_mm"] = round(string["core"]["diameter_mm"] * by, 3)
        if "wrap" in string:
            string["wrap"]["outside_mm"] = round(string["wrap"]["outside_mm"] * by, 3)
        string.pop("measured", None)
        string["action_mm"]["twelfth"] = round(string["action_mm"]["twelfth"] + draw.between(-0.2, 0.4, 2), 2)
    return strings


def other_pitches(draw, plan):
    """Some of the strings up to three semitones lower or one higher, in hertz."""
    pitches = []
    for string in plan["strings"]:
        by = draw.pick([-3, -2, -2, -1, 1])
        hertz = neck.pitch_hz(string["pitch"], plan.get("reference_hz", 440.0)) * 2.0 ** (by / 12.0)
        pitches.append({"frequency_hz": round(hertz, 3)} if draw.chance(0.6) else None)
    return pitches


def with_sets(number):
    """Plan `number` with its alternatives, the first draw that is legal for all sets."""
    draw = plans.Draw(STREAM + number)
    for attempt in range(ATTEMPTS):
        plan = plans.random_plan(FIRST_PLAN + number + 100 * attempt)
        plan["title"], plan["fit"]["rule"] = f"Several sets {number}", "least_squares"
        plan["notes"] = f"Drawn by tests/reference/make_sets.py, seed {plans.SEED}; no real instrument."
        plan["saddle"].pop("split_after", None)
        plan["saddle"]["style"] = STYLES[number % 4]
        plan["nut"] = (plan.get("nut") or {}) | {"style": NUTS[number // 4 % 4]}
        if plan["saddle"]["style"] == "two_piece":
            if len(plan["strings"]) < 2:
                continue
            plan["saddle"]["split_after"] = int(draw.rng.integers(1, len(plan["strings"])))
        others = [{"name": f"Set {k + 1}", "weight": draw.between(0.2, 3.0, 2)} for k in range(draw.pick([1, 2]))]
        for k, other in enumerate(others):
            if (number + k) % 2:
                other["strings"] = other_strings(draw, plan)
            else:
                other["pitches"] = other_pitches(draw, plan)
        if draw.chance(0.5):
            plan["strings_weight"] = draw.between(0.2, 3.0, 2)
        plan["alternatives"] = others
        if all(plans.acceptable(own) for _, _, own in sets.own_plans(plan)):
            return plan
    raise ValueError(f"no legal plan {number}")


def make(number):
    """One plan with its result."""
    plan = with_sets(number)
    report = make_tables.rounded(make_tables.compact(reference.plain(sets.solve(plan))))
    for folder, data in (("plans", plan), ("results", {"origin": ORIGIN, "plan": f"sets/plans/{number:02}.json"} | report)):
        make_tables.write(make_tables.HERE / "sets" / folder / f"{number:02}.json", data)
    return number


ORIGIN = make_tables.ORIGIN.replace("make_tables.py", "make_sets.py")


def main():
    """Makes all plans."""
    for folder in ("plans", "results"):
        os.makedirs(make_tables.HERE / "sets" / folder, exist_ok=True)
    with multiprocessing.Pool(2) as pool:
        made = list(pool.imap_unordered(make, range(1, COUNT + 1), chunksize=1))
    print(f"{len(made)} plans with several sets written")
    return 0


if __name__ == "__main__":
    sys.exit(main())
