"""How setbacks and errors spread where a plan's figures are uncertain: `python3 spread.py [DRAWS]`.

Writes spread/NAME.json for two example plans: mean and standard deviation of every string's ideal saddle setback and
of every note's error on the saddle as built, over independent pseudo-random draws, each with its standard error.
Written from the description of `tolerances` alone: a lognormal figure has the plan's value for its median, a normal
one is held at the ends of its range. Every draw is a plan of its own, built and solved as any other here.
"""

import copy
import json
import math
import pathlib
import sys

import numpy as np
import scipy

import fretting
import neck
import saddles

HERE = pathlib.Path(__file__).resolve().parent
EXAMPLES = HERE.parent.parent / "assets" / "examples"
SEED = 20_240_601
DRAWS = 500
KIND = {"core_diameter_mm": 0.006, "modulus_fraction": 0.04, "mass_fraction": 0.01, "measured_mass_fraction": 0.004,
        "measured_stiffness_fraction": 0.06, "pitch_cents": 3.0, "action_first_mm": 0.03, "action_twelfth_mm": 0.1}
TOLERANCES = {
    "seed": 11, "samples": 8192, "limit_cents": 5.0, "reference_cents": 2.0,
    "neck": {"relief_mm": 0.03, "scale_mm": 0.15, "fret_mm": 0.04},
    "pressing": {"finger_fraction": 0.06, "depth_fraction": 0.35},
    "supports": {"nut": 0.07, "fret": 0.06, "saddle": 0.05}, "slip": {"head": 0.1, "tail": 0.05},
    "making": {"crest_mm": 0.12, "nut_edge_mm": 0.06},
    "plain": KIND, "wound": KIND | {"core_diameter_mm": 0.012, "mass_fraction": 0.03},
    "polymer": KIND | {"core_diameter_mm": 0.01, "modulus_fraction": 0.15},
    "strings": [{"string": 2, "core_diameter_mm": 0.002, "action_first_mm": 0.05}],
}


def kind(string):
    """Which entry of the tolerances a string belongs to."""
    if string["core"]["youngs_modulus_gpa"] < 50.0:
        return "polymer"
    return "wound" if string.get("wrap") else "plain"


def draw_shared(draw, plan):
    """What is the same for all strings, put into the plan."""
    tolerances = plan["tolerances"]
    pressing, supports, slip = (dict(plan.get(key) or usual) for key, usual in (
        ("pressing", {"finger_fraction": 0.33, "depth_mm": 0.1}), ("supports", {"nut": 0.5, "fret": 0.5, "saddle": 0.5}),
        ("slip", {"head": 0.0, "tail": 0.0})))
    spread = tolerances["pressing"]
    pressing["finger_fraction"] = min(0.95, max(0.05, draw.normal(pressing["finger_fraction"], spread["finger_fraction"])))
    pressing["depth_mm"] = min(plan["instrument"].get("fret_height_mm", 1.1),
                               draw.lognormal(math.log(pressing["depth_mm"]), spread["depth_fraction"]))
    for part, key in ((supports, "supports"), (slip, "slip")):
        for end in part:
            part[end] = min(1.0, max(0.0, draw.normal(part[end], tolerances[key][end])))
    plan |= {"pressing": pressing, "supports": supports, "slip": slip}
    instrument = plan["instrument"]
    relief = draw.normal(instrument.get("relief_mm", 0.0), tolerances["neck"]["relief_mm"])
    instrument["relief_mm"] = min(3.0, max(0.0, relief))
    scale = instrument["scale_mm"]
    longer = draw.normal(scale, tolerances["neck"]["scale_mm"]) / scale
    places = scale * neck.equal_fraction(np.arange(1, instrument["frets"] + 1))
    instrument["fret_positions_mm"] = list(draw.normal(places * longer, tolerances["neck"]["fret_mm"]))
    return draw.normal(0.0, tolerances["reference_cents"])


def draw_string(draw, plan, number, string, tuned):
    """What is a string's own, put into the string; the mass factor is given back."""
    spread = dict(plan["tolerances"][kind(string)])
    for own in plan["tolerances"]["strings"]:
        if own["string"] == number:
            spread |= {key: value for key, value in own.items() if key != "string"}
    core, action = string["core"], string["action_mm"]

    def near(value, deviation):
        return draw.lognormal(math.log(value), deviation / value)

    def factor(share):
        return draw.lognormal(0.0, share)
    hertz = neck.pitch_hz(string["pitch"], plan.get("reference_hz", 440.0))
    string["pitch"] = {"frequency_hz": hertz * 2.0 ** ((tuned + draw.normal(0.0, spread["pitch_cents"])) / 1200.0)}
    core["diameter_mm"] = near(core["diameter_mm"], spread["core_diameter_mm"])
    core["youngs_modulus_gpa"] *= factor(spread["modulus_fraction"])
    action["first"] = near(action["first"], spread["action_first_mm"])
    action["twelfth"] = near(action["twelfth"], spread["action_twelfth_mm"])
    measured = string.get("measured") or {}
    for key in ("axial_stiffness_n", "bending_stiffness_n_mm2"):
        if measured.get(key) is not None:
            measured[key] *= factor(spread["measured_stiffness_fraction"])
    weighed = measured.get("unit_mass_kg_per_m") is not None
    return factor(spread["measured_mass_fraction" if weighed else "mass_fraction"])


def instrument(draw, plan):
    """One instrument as the tolerances say it may be: strings and bench."""
    true = copy.deepcopy(plan)
    tuned = draw_shared(draw, true)
    heavier = [draw_string(draw, true, n, string, tuned) for n, string in enumerate(true["strings"], 1)]
    strings = neck.build(true)
    for string, factor in zip(strings, heavier):
        string.unit_mass *= factor
    return strings, fretting.Bench(true, strings)


def ideal(strings, bench, start, frets=range(1, 13)):
    """Saddle setbacks with the least squares of every string by itself, from a start near by: Gauss and Newton's steps
    with central differences, all strings at once."""
    crests, half = np.array(start, float), 0.02
    for _ in range(20):
        jobs = [(i, 0.0, crest + by, frets) for i, crest in enumerate(crests) for by in (-half, 0.0, half)]
        cents = np.array([o["cents"] for o in bench.sound(jobs)]).reshape(len(strings), 3, -1)
        slopes = (cents[:, 2] - cents[:, 0]) / (2.0 * half)
        step = -(slopes * cents[:, 1]).sum(axis=1) / (slopes * slopes).sum(axis=1)
        crests += step
        if np.abs(step).max() < 1e-7:
            if crests.min() < -5.0 or crests.max() > 15.0:
                raise ValueError("a crest outside the travel")
            return crests
    raise ArithmeticError("setbacks did not settle")


def figures(values, named):
    """Mean and standard deviation over the draws, with their standard errors: the deviation's from the fourth moment."""
    values = np.asarray(values)
    mean, deviation = values.mean(axis=0), values.std(axis=0, ddof=1)
    fourth = ((values - mean) ** 4).mean(axis=0) / deviation**4
    errors = deviation / math.sqrt(len(values)), deviation * np.sqrt((fourth - 1.0) / (4.0 * len(values)))
    rows = np.round(np.array([mean, deviation, *errors]), 6).T.tolist()
    return [dict(zip(("mean", "sd", "mean_error", "sd_error"), row)) for row in rows] if named else rows


def spread(name, draws):
    """The table of one example."""
    plan = json.loads((EXAMPLES / f"{name}.json").read_text(encoding="utf-8"))
    plan["saddle"] = {"style": "separate"}
    plan["nut"] = {"style": "plain"}
    plan["fit"] = {"rule": "least_squares", "frets": [1, 12]}
    plan.pop("readings", None)
    plan.pop("as_built", None)
    plan["tolerances"] = TOLERANCES
    strings = neck.build(plan)
    still = saddles.Setting(plan, strings, fretting.Bench(plan, strings))
    built = still.separate("least_squares")[1]
    if np.abs(ideal(strings, still.bench, built + 0.1) - built).max() > 1e-5:
        raise ArithmeticError("the two ways to ideal setbacks differ")
    draw = np.random.default_rng([SEED, len(name)])
    numbers = list(range(1, plan["instrument"]["frets"] + 1))
    setbacks, errors = [], []
    for _ in range(draws):
        strings, bench = instrument(draw, plan)
        setbacks.append(ideal(strings, bench, built))
        crests = draw.normal(built, TOLERANCES["making"]["crest_mm"])
        nuts = draw.normal(0.0, TOLERANCES["making"]["nut_edge_mm"], len(strings))
        notes = bench.sound([(i, nuts[i], crests[i], numbers) for i in range(len(strings))])
        if any(touched for o in notes for touched in o["touched"]):
            raise ValueError("a note buzzes: choose an example with more action")
        errors.append([o["cents"] for o in notes])
    errors = np.asarray(errors)
    origin = f"tests/reference/spread.py, seed {SEED}, numpy {np.__version__}, scipy {scipy.__version__}"
    return {"origin": origin, "draws": draws, "plan": plan, "setback_mm": figures(setbacks, True),
            "error_cents": [figures(errors[:, i], False) for i in range(errors.shape[1])]}


def main():
    """Writes the tables."""
    draws = int(sys.argv[1]) if len(sys.argv) > 1 else DRAWS
    (HERE / "spread").mkdir(exist_ok=True)
    for name in ("steel_six", "classical_nylon"):
        table = json.dumps(spread(name, draws), indent=1, allow_nan=False)
        (HERE / "spread" / f"{name}.json").write_text(table + "\n", encoding="utf-8")
        print(name, "written", flush=True)


if __name__ == "__main__":
    main()
