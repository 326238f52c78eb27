"""Holds the synthetic instruments against other ways to the same numbers: `python3 selftest_instruments.py`.

Everything is read back from the files: errors from the hidden figures, the best moves by scipy's solver, the
second mode by finite elements, and the spread of what was drawn. Figures in the files have four decimals (cents
three, readings one), which is what the differences are made of.
"""

import json
import pathlib
import sys

import numpy as np
from scipy.optimize import least_squares

import detectability
import faults
import fretting
import neck
import selftest

HERE = pathlib.Path(__file__).parent / "instruments"
# Figures rounded to 1e-4 mm, stiffness factors to 1e-4: together they move a note by less than this.
ROUNDED_CENTS = 0.02
# An optimum made from rounded figures.
ROUNDED_MM = 0.01
# Expected statistics of faults are linear: what draws of whole instruments may differ by in their mean and in their spread of 1, for the
# curvature of the model and three standard deviations of so many draws (0.21 and 0.15).
DRAWS = 200
DRAWN_Z = 0.25
# The finite elements' own error.
ELEMENTS_CENTS = 1e-3


def everything():
    """All instruments of the files there are."""
    return [x for path in sorted(HERE.glob("*.json")) for x in json.loads(path.read_text(encoding="utf-8"))]


def true_bench(item):
    """Strings and bench of the true instrument, with the figures put straight into the strings."""
    plan, truth = json.loads(json.dumps(item["plan"])), item["truth"]
    entry = plan["instrument"]
    entry["relief_mm"] = truth["relief_mm"]
    entry["fret_positions_mm"] = [entry["scale_mm"] * (1.0 - 2.0 ** (-n / 12.0)) + shift
                                  for n, shift in enumerate(truth["fret_shift_mm"], start=1)]
    for string, own in zip(plan["strings"], truth["strings"]):
        string["action_mm"] = {"first": own["slot_height_mm"], "twelfth": own["action_mm"]}
    plan["pressing"]["depth_mm"] = truth["press_depth_mm"]
    strings = neck.build(plan)
    for string, own in zip(strings, truth["strings"]):
        string.axial_n *= own["axial_factor"]
        string.bending_nm2 *= own["bending_factor"]
    return strings, fretting.Bench(plan, strings)


def errors(bench, k, nut, crest, frets):
    """Errors of one string."""
    return bench.sound([(k, nut, crest, frets)])[0]["cents"]


def errors_again(items):
    """Largest difference of the stated errors."""
    worst = 0.0
    for item in items:
        _, bench = true_bench(item)
        for k, own in enumerate(item["truth"]["strings"]):
            again = errors(bench, k, own["nut_setback_mm"], own["crest_setback_mm"], item["truth"]["measured_frets"])
            worst = max(worst, np.abs(again - own["errors_cents"]).max())
    return worst


def moves_by_scipy(items):
    """Largest difference of the stated moves (mm) and of what is left (cents)."""
    worst, left = 0.0, 0.0
    for item in items:
        _, bench = true_bench(item)
        frets = item["truth"]["measured_frets"]
        for k, own in enumerate(item["truth"]["strings"]):
            nut, crest = own["nut_setback_mm"], own["crest_setback_mm"]
            for key, start in (("saddle_only", [0.0]), ("saddle_and_nut", [0.0, 0.0])):
                stated = own[key]
                found = least_squares(lambda x: errors(bench, k, nut + (x[1] if len(x) > 1 else 0.0), crest + x[0], frets),
                                      start, xtol=1e-12, ftol=1e-14, gtol=1e-12, diff_step=1e-3, x_scale=1.0)
                named = [stated["saddle_move_mm"]] + ([stated["nut_move_mm"]] if len(start) > 1 else [])
                worst = max(worst, np.abs(found.x - named).max())
                left = max(left, abs(np.sqrt(np.mean(found.fun**2)) - stated["rms_after_cents"]))
    return worst, left


def second_mode_by_elements():
    """Largest difference (cents) of the second mode from finite elements."""
    return max(abs(1200.0 * np.log2(faults.second_mode(e, left, right) / selftest.beam(e, left, right, order=2)))
               for e in (0.003, 0.01, 0.03) for left, right in ((0.0, 0.0), (0.5, 0.5), (1.0, 1.0), (0.0, 1.0)))


def statistics_by_draws(item, rng):
    """What the test of an instrument's fault makes of drawn instruments with it, less what is expected."""
    truth, plan = item["truth"], item["plan"]
    names = ("axial_factor", "bending_factor", "slot_height_mm", "action_mm", "nut_setback_mm", "crest_setback_mm")
    own = {name: np.array([string[name] for string in truth["strings"]]) for name in names}
    nut, crest = own.pop("nut_setback_mm"), own.pop("crest_setback_mm")
    shared = {"press_depth_mm": truth["press_depth_mm"], "relief_mm": truth["relief_mm"],
              "fret_shift_mm": np.array(truth["fret_shift_mm"])}
    state = detectability.State(plan, own | shared, truth["measured_frets"], nut, crest)
    scatter = detectability.Scatter(state, truth)
    if truth["bad_fret"]:
        without, slot, stated = detectability.without_shift(state, truth["bad_fret"]["fret"]), None, truth["bad_fret"]
        here = state.sounds()
    else:
        stated = truth["high_slots"][0]
        slot = stated["string"] - 1
        without = detectability.with_slot_right(state, slot)
        here = scatter.of(state.sounds(), slot)
    calm = without.sounds()
    change = (here - (calm if slot is None else scatter.of(calm, slot))).ravel()
    covariance = scatter.without_fault(slot)
    pull = np.linalg.solve(covariance, change) / detectability.expected(change, covariance)
    found = []
    while len(found) < DRAWS:
        try:
            found.append(pull @ (drawn_readings(state, scatter, truth, slot, rng) - calm).ravel() - stated["expected_z"])
        except (faults.Unfit, ValueError):
            continue
    return np.array(found)


def drawn_readings(state, scatter, truth, slot, rng):
    """Readings of an instrument like this one, all that is not known drawn anew; a tested slot stands as it is."""
    other = state
    for name in (*detectability.OWN, "press_depth_mm", "relief_mm", "fret_shift_mm"):
        by = rng.standard_normal(np.shape(state.figures[name]))
        if name == "slot_height_mm":
            by[scatter.high] *= detectability.HIGH_SLOT_MM / detectability.SLOT_MM
            if slot is not None:
                by[slot] = 0.0
        if name == "relief_mm" and state.figures[name] + by * detectability.RELIEF_MM < 0.0:
            raise faults.Unfit("a neck bent backward")
        other = other.moved(name, by)
    sounds = other.sounds()
    tuned = detectability.TUNING_CENTS * rng.standard_normal((len(sounds), 1)) * np.ones(sounds.shape)
    tuned[:, -2] = 0.0
    noise = np.sqrt(scatter.noise(truth, state.frets, sounds.shape))
    return sounds + tuned + noise * rng.standard_normal(sounds.shape)


def statistics(items):
    """Largest difference of a mean from what is stated, and of a spread from 1, over some frets and single slots."""
    rng = np.random.default_rng(5)
    # Draws about less relief would be cut off at a straight neck, and their mean with them.
    free = [x for x in items if x["truth"]["relief_mm"] > 2.0 * detectability.RELIEF_MM]
    frets = [x for x in free if x["truth"]["kind"] == "fret" and not x["truth"]["outlier"]][:4]
    slots = [x for x in free if x["truth"]["kind"] == "nut_slots" and len(x["truth"]["high_slots"]) == 1][:4]
    drawn = [statistics_by_draws(item, rng) for item in frets + slots]
    return max(abs(d.mean()) for d in drawn), max(abs(d.std() - 1.0) for d in drawn)


def leftovers(items):
    """Readings less all that is known of them, with the false notes taken off: the noise, by kind of reading."""
    noise = {"fretted": [], "open": [], "octave_harmonic": []}
    for item in items:
        truth = item["truth"]
        dead, outlier = truth["dead_string"], truth["outlier"]
        for reading in item["plan"]["readings"]:
            own = truth["strings"][reading["string"] - 1]
            value = reading["cents"]
            ill = dead if dead and dead["string"] == reading["string"] else None
            if reading["kind"] == "fretted":
                at = truth["measured_frets"].index(reading["fret"])
                value -= own["errors_cents"][at] + own["tuning_cents"] + (ill["false_cents"][at] if ill else 0.0)
                if outlier and (outlier["string"], outlier["fret"]) == (reading["string"], reading["fret"]):
                    value -= outlier["cents"]
            elif reading["kind"] == "open":
                value -= own["tuning_cents"]
            else:
                value -= ill["false_octave_cents"] if ill else 0.0
            noise[reading["kind"]].append(value)
    return {kind: np.array(values) for kind, values in noise.items()}


def spreads(items):
    """Standard deviations (about the nominal value) of what was drawn, where nothing selects."""
    rows = {"nut edge, mm": [], "axial, log": [], "bending, log": [], "slot, mm": [], "action, mm": [], "press depth, log": [],
            "frets, mm": [], "as-built crest, mm": [], "as-built nut edge, mm": []}
    for item in items:
        truth, plan = item["truth"], item["plan"]
        rows["press depth, log"].append(np.log(truth["press_depth_mm"] / 0.1))
        if truth["kind"] != "mixture":
            bad = truth["bad_fret"]["fret"] if truth["bad_fret"] else None
            rows["frets, mm"] += [s for n, s in enumerate(truth["fret_shift_mm"], start=1) if n != bad]
        raised = {r["string"] for r in truth["high_slots"]}
        for k, (own, entry) in enumerate(zip(truth["strings"], plan["strings"])):
            if truth["kind"] not in ("sound", "saddle"):
                rows["nut edge, mm"].append(own["nut_setback_mm"])
            rows["axial, log"].append(np.log(own["axial_factor"]))
            rows["bending, log"].append(np.log(own["bending_factor"]))
            if k + 1 not in raised:
                rows["slot, mm"].append(own["slot_height_mm"] - entry["action_mm"]["first"])
            rows["action, mm"].append(own["action_mm"] - entry["action_mm"]["twelfth"])
            if "as_built" in plan:
                rows["as-built crest, mm"].append(plan["as_built"]["saddle_setback_mm"][k] - own["crest_setback_mm"])
                rows["as-built nut edge, mm"].append(plan["as_built"]["nut_setback_mm"][k] - own["nut_setback_mm"])
    return {name: np.array(values) for name, values in rows.items()}


def main():
    """Prints every figure; returns 1 if one is too large."""
    items = everything()
    kinds = [x["truth"]["kind"] for x in items]
    print(len(items), "instruments:", ", ".join(f"{k} {kinds.count(k)}" for k in sorted(set(kinds))))
    moved, left = moves_by_scipy(items[::12])
    figures = [("errors, cents", errors_again(items), ROUNDED_CENTS), ("best moves, mm", moved, ROUNDED_MM),
               ("rms after the moves, cents", left, ROUNDED_CENTS),
               ("second mode, cents", second_mode_by_elements(), ELEMENTS_CENTS)]
    off, wide = statistics(items)
    figures += [("expected statistics, mean of draws", off, DRAWN_Z), ("expected statistics, spread of draws", wide, DRAWN_Z)]
    worst_sound = max(np.abs(s["errors_cents"]).max() for x in items if x["truth"]["kind"] == "sound" for s in x["truth"]["strings"])
    figures.append(("worst note of a sound instrument, cents", worst_sound, 1.0))
    for name, value, limit in figures:
        print(f"{name}: {value:.3g} (limit {limit:g})")
    for name, values in leftovers(items).items():
        print(f"noise, {name}: mean {values.mean():.3f}, sd {values.std():.3f}, largest {np.abs(values).max():.2f}, n {len(values)}")
        figures.append((name, abs(values.std() - 1.0), 5.0 / np.sqrt(2 * len(values)) + 0.005))
    for name, values in spreads(items).items():
        print(f"drawn, {name}: mean {values.mean():.3f}, sd {values.std():.3f}, n {len(values)}")
    bad = [name for name, value, limit in figures if not value <= limit]
    print("too large: " + ", ".join(bad) if bad else "all within their limits")
    return 1 if bad else 0


if __name__ == "__main__":
    sys.exit(main())
