"""Random legal plans: six families of instruments, drawn from a fixed seed and numbered from 1.

Sizes of strings and necks are ordinary ones from memory of the trade (common practice), spread at random;
they stand for nobody's product. A drawn plan is kept only if it is legal and well posed (see `acceptable`).
"""

import math

import numpy as np

import fretting
import neck
import saddles

SEED = 20240611
FIRST_SET = 40
# From this plan on kind of neck and supports are not drawn but go through all combinations with styles and rules.
COVERING_SET = 301
# A plan whose notes are farther off than this with no setback is pressed or made like no instrument.
WILD_CENTS = 40.0
# What a plan is must not change while its numbers are drawn anew: separate streams decide that.
FAMILY_STREAM, LOW_STREAM = 10_000, 20_000
STEEL, NYLON = ("steel", 7850, (195, 207), 2200), ("nylon", 1150, (5.0, 7.5), 420)
RULES = ["least_squares", "twelfth", "minimax"]
STYLES = ["separate", "straight", "two_piece", "shaped"]
NUTS = ["plain", "common", "shaped"]
SUPPORTS = [None, {"nut": 0.0, "fret": 0.0, "saddle": 0.0}, {"nut": 1.0, "fret": 1.0, "saddle": 1.0},
            {"nut": 0.0, "fret": 0.0, "saddle": 1.0}]
RUNS_ON = {"nut": 0.5, "fret": 0.5, "saddle": 0.5}
NECKS = ["one scale", "measured", "fanned"]

# Note, core diameter, outside diameter (None: plain), mm.
STEEL_SIX = [("E4", 0.28, None), ("B3", 0.37, None), ("G3", 0.36, 0.61), ("D3", 0.37, 0.80), ("A2", 0.41, 1.06),
             ("E2", 0.45, 1.35)]
PLAIN_THIRD = [("E4", 0.26, None), ("B3", 0.34, None), ("G3", 0.44, None), ("D3", 0.36, 0.70), ("A2", 0.40, 0.94),
               ("E2", 0.43, 1.20)]
NYLON_SIX = [("E4", 0.72, None), ("B3", 0.82, None), ("G3", 1.02, None), ("D3", 0.55, 0.76), ("A2", 0.60, 0.90),
             ("E2", 0.64, 1.10)]
BASS = [("G2", 0.55, 1.09), ("D2", 0.66, 1.58), ("A1", 0.75, 2.05), ("E1", 0.92, 2.62)]
MANDOLIN = [("E5", 0.265, None), ("E5", 0.265, None), ("A4", 0.36, None), ("A4", 0.36, None), ("D4", 0.30, 0.61),
            ("D4", 0.30, 0.61), ("G3", 0.36, 0.96), ("G3", 0.36, 0.96)]
UKULELE = [("A4", 0.64, None), ("E4", 0.77, None), ("C4", 0.90, None), ("G4", 0.62, None)]
EIGHT = PLAIN_THIRD + [("B1", 0.50, 1.58), ("F#1", 0.53, 2.00)]
FAMILIES = {
    "steel": {"sets": [STEEL_SIX, PLAIN_THIRD, STEEL_SIX[:1], STEEL_SIX[1:3]], "core": STEEL, "scale": (610, 665),
              "frets": (14, 24), "first": (0.3, 0.6), "twelfth": (1.3, 2.6), "pitch_mm": (7.0, 10.6)},
    "nylon": {"sets": [NYLON_SIX, NYLON_SIX[:5]], "core": NYLON, "scale": (615, 665), "frets": (12, 20),
              "first": (0.5, 0.9), "twelfth": (2.6, 4.2), "pitch_mm": (8.4, 11.6)},
    "bass": {"sets": [BASS, BASS + [("B0", 1.0, 3.3)]], "core": STEEL, "scale": (762, 900), "frets": (20, 24),
             "first": (0.4, 0.8), "twelfth": (1.8, 3.2), "pitch_mm": (9.5, 19.0)},
    "mandolin": {"sets": [MANDOLIN], "core": STEEL, "scale": (342, 362), "frets": (17, 29), "first": (0.3, 0.5),
                 "twelfth": (1.2, 2.0), "pitch_mm": (3.2, 5.6)},
    "ukulele": {"sets": [UKULELE], "core": NYLON, "scale": (345, 440), "frets": (12, 19), "first": (0.4, 0.8),
                "twelfth": (2.0, 3.2), "pitch_mm": (9.0, 13.0)},
    "fanned": {"sets": [EIGHT, EIGHT[:7], PLAIN_THIRD], "core": STEEL, "scale": (620, 650), "frets": (20, 24),
               "first": (0.3, 0.6), "twelfth": (1.4, 2.4), "pitch_mm": (7.0, 10.5)},
}


class Draw:
    """A random source that gives rounded decimal numbers."""

    def __init__(self, number):
        self.rng = np.random.default_rng([SEED, number])

    def between(self, low, high, digits):
        """A number of that many decimals."""
        return round(float(self.rng.uniform(low, high)), digits)

    def chance(self, share):
        """True that often."""
        return bool(self.rng.random() < share)

    def pick(self, things):
        """One of them."""
        return things[int(self.rng.integers(len(things)))]


def settings(number):
    """(style, nut, rule) of plan `number`: the first set is separate and straight, the rest is everything."""
    if number <= FIRST_SET:
        return STYLES[number % 2], "plain", RULES[(number // 2) % 3]
    k = number - (FIRST_SET + 1 if number < COVERING_SET else COVERING_SET)
    return STYLES[k % 4], NUTS[(k // 4) % 3], RULES[(k // 12) % 3]


def covered(number):
    """(kind of neck, index of the supports) that plan `number` of the covering set has, (None, None) before it.

    180 plans go once through every rule, style, nut and supports; the neck is shifted from one supports to the next, so
    that necks meet every pair of the others too.
    """
    if number < COVERING_SET:
        return None, None
    k = number - COVERING_SET
    return NECKS[(k % 36 + k // 36 + k // 12) % 3], k // 36 % 5


def string_entry(draw, family, note, core, outside):
    """One string near the family's pattern."""
    material, density, modulus, tensile = family["core"]
    core = round(core * draw.between(0.96, 1.04, 3), 3)
    hexagonal = outside is not None and material == "steel" and draw.chance(0.5)
    size = round(core * 0.93, 3) if hexagonal else core
    entry = {
        "pitch": {"note": note},
        "core": {"shape": "hex" if hexagonal else "round", "diameter_mm": size,
                 "youngs_modulus_gpa": draw.between(*modulus, 1), "density_kg_m3": density},
        "action_mm": {"first": draw.between(*family["first"], 2), "twelfth": draw.between(*family["twelfth"], 2)},
    }
    if draw.chance(0.7):
        entry["core"]["tensile_mpa"] = tensile
        entry["core"]["material"] = material
    if outside is not None:
        entry["wrap"] = {"outside_mm": round(outside * draw.between(0.97, 1.03, 3), 3),
                         "density_kg_m3": draw.pick([7850, 8000, 8700, 8800])}
    if draw.chance(0.5):
        entry["afterlength_mm"] = {"head": draw.between(0, 190, 1), "tail": draw.between(0, 150, 1)}
    return entry


def measure(draw, entry):
    """Gives a string measured values near the computed ones."""
    own = neck.properties(entry)
    measured = {}
    if draw.chance(0.7):
        measured["unit_mass_kg_per_m"] = float(f"{own['unit_mass'] * draw.between(0.95, 1.05, 3):.5g}")
    if draw.chance(0.7):
        measured["axial_stiffness_n"] = float(f"{own['axial_n'] * draw.between(0.8, 1.2, 2):.4g}")
    if draw.chance(0.7):
        measured["bending_stiffness_n_mm2"] = float(f"{own['bending_nm2'] * 1e6 * draw.between(0.8, 1.5, 2):.4g}")
    if measured:
        entry["measured"] = measured


def neck_entry(draw, name, family, count, wanted):
    """Scale, frets, spacing and what goes with them; measured frets by chance where no kind of neck is wanted."""
    frets = int(draw.rng.integers(family["frets"][0], family["frets"][1] + 1))
    entry = {"scale_mm": draw.between(*family["scale"], 1), "frets": frets}
    if name == "fanned":
        treble = entry["scale_mm"]
        entry["scale_mm"] = {"bass": round(treble + draw.between(15, 60, 1), 1), "treble": treble,
                             "square_fret": draw.pick([0, 5, 7, 7.5, 9, 12])}
    elif wanted == "measured" or (wanted is None and draw.chance(0.2)):
        divisor = draw.pick([17.817, 17.8171537, 17.835])
        place, positions = 0.0, []
        for _ in range(frets):
            place += (entry["scale_mm"] - place) / divisor
            positions.append(round(place + draw.between(-0.08, 0.08, 2), 2))
        entry["fret_positions_mm"] = positions
    if draw.chance(0.2):
        entry["zero_fret"] = True
    if draw.chance(0.7):
        entry["relief_mm"] = draw.between(0.02, 0.4, 2)
    if draw.chance(0.3):
        entry["fret_height_mm"] = draw.between(0.9, 1.4, 2)
    gap = draw.between(*family["pitch_mm"], 2)
    nut = gap * draw.between(0.62, 0.85, 2)
    if name == "mandolin" or draw.chance(0.25):
        entry["across_mm"] = {"nut": spaced(draw, name, count, nut), "saddle": spaced(draw, name, count, gap)}
    else:
        entry["spread_mm"] = {"nut": round(nut * (count - 1), 1) or 36.0, "saddle": round(gap * (count - 1), 1) or 52.0}
    return entry


def spaced(draw, name, count, gap):
    """y of each string, string 1 first: courses of two on a mandolin, else a little uneven."""
    y = [-k * gap for k in range(count)]
    if name == "mandolin":
        y = [-(k // 2) * 2.6 * gap - (k % 2) * 0.55 * gap for k in range(count)]
    middle = (y[0] + y[-1]) / 2.0
    return [round(v - middle + draw.between(-0.15, 0.15, 2), 2) for v in y]


def plan_entry(draw, number, low):
    """A plan, not yet known to be legal; with a low action or an ordinary one."""
    neck_kind, supports_index = covered(number)
    names = [name for name in FAMILIES if neck_kind is None or (name == "fanned") == (neck_kind == "fanned")]
    name = Draw(FAMILY_STREAM + number).pick(names)
    family = FAMILIES[name]
    strings_of = draw.pick(family["sets"])
    style, nut, rule = settings(number)
    if style == "two_piece" and len(strings_of) < 2:
        strings_of = family["sets"][0]
    strings = [string_entry(draw, family, *pattern) for pattern in strings_of]
    instrument = neck_entry(draw, name, family, len(strings), neck_kind)
    depth = draw.pick([0.0, 0.05, 0.1, 0.2, 0.35])
    plan = {
        "format": "crestline-plan", "version": 1, "title": f"Random plan {number} ({name})",
        "notes": f"Drawn by tests/reference/plans.py, seed {SEED}, plan {number}; no real instrument.",
        "instrument": instrument,
    }
    if draw.chance(0.7):
        plan["pressing"] = {"finger_fraction": draw.between(0.1, 0.8, 2), "depth_mm": depth}
    own = {k: draw.between(0, 1, 2) for k in ("nut", "fret", "saddle")}
    supports = draw.pick(SUPPORTS + [own]) if supports_index is None else ([RUNS_ON] + SUPPORTS[1:] + [own])[supports_index]
    if supports:
        plan["supports"] = supports
    if draw.chance(0.4):
        plan["slip"] = {"head": draw.between(0, 1, 2), "tail": draw.between(0, 1, 2)}
    plan["strings"] = strings
    finish_strings(draw, plan)
    first = int(draw.rng.integers(1, 4))
    plan["fit"] = {"rule": rule, "frets": [first, int(draw.rng.integers(max(first + 5, 9), instrument["frets"] + 1))]}
    add_styles(draw, plan, style, nut, len(strings))
    if draw.chance(0.3):
        low, high = plan["saddle"].get("travel_mm", [-5, 15])
        plan["as_built"] = {
            "saddle_setback_mm": [draw.between(max(low, 0.0), min(high, 5.0), 2) for _ in strings],
            "nut_setback_mm": [draw.between(0, 0.6, 2) for _ in strings]}
    if number > FIRST_SET and draw.chance(0.25):
        plan["targets"] = {"open_cents": [draw.between(-6, 6, 1) for _ in strings],
                           "pitch_class_cents": [draw.between(-8, 8, 1) for _ in range(12)]}
    if low:
        lower_the_action(draw, plan)
    return plan


def finish_strings(draw, plan):
    """Measured values, pitches in hertz, the reference pitch, and no first action beside a zero fret."""
    if draw.chance(0.3):
        plan["reference_hz"] = draw.pick([415, 432, 442, 443.5])
    paired = plan["title"].endswith("(mandolin)")
    for k, entry in enumerate(plan["strings"]):
        if draw.chance(0.3):
            measure(draw, entry)
        if draw.chance(0.15):
            hertz = neck.pitch_hz(entry["pitch"], plan.get("reference_hz", 440.0))
            entry["pitch"] = {"frequency_hz": round(hertz * draw.between(0.97, 1.02, 3), 3)}
        if paired and k % 2:
            entry["core"] = dict(plan["strings"][k - 1]["core"])
        if plan["instrument"].get("zero_fret"):
            del entry["action_mm"]["first"]


def add_styles(draw, plan, style, nut, count):
    """Saddle and nut with their limits."""
    saddle = {"style": style}
    if style == "two_piece":
        saddle["split_after"] = int(draw.rng.integers(1, count))
    if style == "shaped":
        saddle["thickness_mm"] = draw.pick([0.9, 1.2, 1.6, 2.4, 3.0])
        saddle["edge_margin_mm"] = draw.pick([0.1, 0.25, 0.4])
    if draw.chance(0.35):
        saddle["travel_mm"] = [draw.between(-1.0, 0.5, 1), draw.between(1.8, 4.0, 1)]
    plan["saddle"] = saddle
    if nut != "plain" or draw.chance(0.3):
        plan["nut"] = {"style": nut}
        if draw.chance(0.4):
            plan["nut"]["travel_mm"] = [draw.between(-0.2, 0.1, 2), draw.between(0.25, 1.5, 2)]


def lower_the_action(draw, plan):
    """Much relief under a low string: on most of these necks some notes buzz on higher frets."""
    relief = draw.between(0.4, 1.4, 2)
    plan["instrument"]["relief_mm"] = relief
    middle = draw.between(0.8, 1.3, 2) * relief
    for entry in plan["strings"]:
        entry["action_mm"]["twelfth"] = round(middle + draw.between(0.15, 0.8, 2), 2)


def clear(string):
    """Does the open string clear every crown by a hair's breadth and more?"""
    return bool(np.all(string.height(string.fret_s) - string.crown_z > 0.05))


def steady(plan, string, setbacks):
    """Touched frets are the same for all these setbacks, and stay so if higher crowns move a little."""
    pressing = plan.get("pressing") or {"finger_fraction": 0.33, "depth_mm": 0.1}
    for fret in range(1, plan["instrument"]["frets"] + 1):
        seen = set()
        for setback in setbacks:
            near, far = fretting.contacts(string, 0.0, setback)
            for lift in (-2e-5, 0.0, 2e-5):
                z = string.crown_z + np.where(np.arange(len(string.crown_z)) >= fret, lift, 0.0)
                seen.add(tuple(fretting.taut((string.fret_s[fret - 1], string.crown_z[fret - 1]), far, string.fret_s, z)))
        if len(seen) > 1:
            return False
    return pressing["depth_mm"] <= plan["instrument"].get("fret_height_mm", 1.1)


def acceptable(plan):
    """Legal and well posed: strings that hold, a stiffness the model covers, no note on the edge of buzzing."""
    strings = neck.build(plan)
    travel = plan["saddle"].get("travel_mm", [-5, 15])
    setbacks = [travel[0], 0.0, travel[1]] + (plan.get("as_built") or {}).get("saddle_setback_mm", [])
    for string in strings:
        positions = np.concatenate([[0.0], string.fret_s, [string.scale - 20.0]])
        if np.any(np.diff(positions) < 3.0) or not clear(string) or not steady(plan, string, setbacks):
            return False
        rough = string.unit_mass * (2.0 * string.scale * 1e-3 * string.frequency) ** 2
        strong = string.tensile_pa or (420e6 if string.axial_n / string.core_area_m2 < 50e9 else 2200e6)
        if not 12.0 < rough < 0.8 * strong * string.core_area_m2:
            return False
        if math.sqrt(string.bending_nm2 / rough) / ((string.scale - string.fret_s[-1]) * 1e-3) > 0.045:
            return False
    bench = fretting.Bench(plan, strings)
    try:
        setting = saddles.Setting(plan, strings, bench)
    except ValueError:
        return False
    if any(len(frets) < 5 for frets in setting.fit_frets):
        return False
    notes = [bench.sound([(i, 0.0, 0.0, sorted(set(setting.fit_frets[i] + setting.octave[i])))])[0]["cents"]
             for i in range(setting.count)]
    return max(np.abs(cents).max() for cents in notes) < WILD_CENTS


def random_plan(number):
    """Plan `number`, the first legal one of its own random sequence."""
    draw = Draw(number)
    low = Draw(LOW_STREAM + number).chance(0.12)
    for attempt in range(400):
        # Some kinds of neck leave hardly any room for a low action: then it is an ordinary one.
        plan = plan_entry(draw, number, low and attempt < 200)
        if acceptable(plan):
            return plan
    raise ValueError(f"no legal plan {number}")
