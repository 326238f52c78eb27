"""Synthetic instruments with tuner readings and a hidden truth: `python3 instruments.py [FIRST LAST]` (default 601 1200).

Writes instruments/FFF-LLL.json, fifty to a file, an array with one object a line. Each comes from its own
random sequence, so that a file made again is the same. See "Synthetic instruments" in README.md.
"""

import json
import os
import pathlib
import sys

import numpy as np
from scipy.special import ndtr, ndtri

import detectability
import faults
import neck
import nominal
import plans
from detectability import (ACTION_MM, AS_BUILT_MM, CREST_MM, NOISE_CENTS, NUT_MM, PRESS_FACTOR, RELIEF_MM, SLOT_MM,
                           STIFFNESS)

SEED = 20240903
HERE = pathlib.Path(__file__).parent
PER_FILE = 50
# Fifteen in turn: every fifteenth has the same kind.
KINDS = ["sound", "saddle", "nut_slots", "fret", "sound", "dead_string", "mixture", "saddle", "sound", "fret", "nut_slots",
         "sound", "dead_string", "saddle", "mixture"]
FRET_SETS = [[1, 2, 3, 5, 7, 9, 10, 12, 14, 15]] * 4 + [[1, 2, 3, 5, 7, 9, 12, 14]]
# Frets lie closer than a repairer may count on, but for mixtures; strings are tuned before they are read.
FRET_MM, ROUGH_FRET_MM = 0.03, 0.08
TUNING_CENTS = 0.5
SOUND_CENTS = 1.0
# So far from the best nut edge (on a 648 mm scale) the saddle alone still brings an instrument near SOUND_CENTS.
GOOD_NUT_MM = 0.3
# A worse note than this would be put down to a wrong fret or string.
WORST_CENTS = 60.0
# A fault smaller than this could not be told from the noise, and nobody would look for it.
SLOT_CENTS, FRET_CENTS = (3.0, 8.0), 1.5
SLOT_RAISE_MM = (0.25, 1.2)


class Draw(plans.Draw):
    """The random source of one instrument."""

    def __init__(self, number):
        self.rng = np.random.default_rng([SEED, number])

    def normal(self, sd, size=None):
        """Gaussian numbers about zero."""
        return sd * self.rng.standard_normal(size)

    def positive(self, middle, sd, least):
        """A Gaussian number, drawn again until it is at least `least`."""
        while True:
            value = middle + self.normal(sd)
            if value >= least:
                return float(value)

    def within(self, sd, middle, reach):
        """A Gaussian number about zero, given that it lies no farther than `reach` from `middle`."""
        low, high = (ndtr((middle + side * reach) / sd) for side in (-1.0, 1.0))
        return float(sd * ndtri(self.rng.uniform(low, high)))

    def sign(self):
        """Plus or minus one."""
        return 1.0 if self.chance(0.5) else -1.0


def draw_hidden(draw, plan, kind):
    """True figures at prior scale, all but crest and nut edge."""
    strings = plan["strings"]
    frets = plan["instrument"]["frets"]
    return {
        "press_depth_mm": float(0.1 * PRESS_FACTOR ** draw.normal(1.0)),
        "relief_mm": draw.positive(plan["instrument"]["relief_mm"], RELIEF_MM, 0.0),
        "fret_shift_mm": draw.normal(ROUGH_FRET_MM if kind == "mixture" else FRET_MM, frets),
        "axial_factor": np.exp(draw.normal(STIFFNESS, len(strings))),
        "bending_factor": np.exp(draw.normal(STIFFNESS, len(strings))),
        "slot_height_mm": np.array([draw.positive(s["action_mm"]["first"], SLOT_MM, 0.1) for s in strings]),
        "action_mm": np.array([draw.positive(s["action_mm"]["twelfth"], ACTION_MM, 0.5) for s in strings]),
    }


def place_contacts(draw, true, kind):
    """Crest and nut edge of each string, by kind."""
    size = true.plan["instrument"]["scale_mm"] / 648.0
    count = true.count
    best_nut, best_crest, left = true.best(True, np.full(count, 0.3), np.full(count, 2.0 * size))
    if kind in ("sound", "saddle"):
        if np.abs(left).max() > SOUND_CENTS:
            raise faults.Unfit("no nut edge would make it sound")
        true.nut = np.array([draw.within(NUT_MM, best, GOOD_NUT_MM * size) for best in best_nut])
    else:
        true.nut = draw.normal(NUT_MM, count)
    crest = true.best(False, true.nut, best_crest)[1]
    if kind == "saddle":
        across = np.linspace(-1.0, 1.0, count)
        crest = crest + size * (draw.sign() * draw.between(1.0, 4.0, 3) + draw.between(-1.0, 1.0, 3) * across
                                + draw.normal(0.2, count))
    elif kind == "mixture":
        crest = crest + draw.normal(CREST_MM, count)
    elif kind != "sound":
        crest = crest + size * draw.normal(0.4, count)
    true.crest = crest


def raise_slots(draw, true, hidden, how_many):
    """High nut slots: raises some strings' gap over fret 1 and says which and by how much."""
    heights = np.linspace(0.0, SLOT_RAISE_MM[1], 13)
    raised = []
    for k in draw.rng.permutation(true.count):
        rise = true.raised_slot(k, heights)
        wanted = min(draw.between(*SLOT_CENTS, 2), float(rise[-1]))
        height = max(float(np.interp(wanted, rise, heights)), SLOT_RAISE_MM[0])
        if wanted < SLOT_CENTS[0] or np.any(np.diff(rise) <= 0.0):
            continue
        hidden["slot_height_mm"][k] += height
        raised.append({"string": int(k) + 1, "raise_mm": height, "cents": float(np.interp(height, heights, rise))})
        if len(raised) == how_many:
            break
    if not raised:
        raise faults.Unfit("no string on which a high slot is heard")
    return sorted(raised, key=lambda r: r["string"])


def instrument(number):
    """Instrument `number`: the first one of its random sequence that is fit for its kind."""
    draw = Draw(number)
    kind = KINDS[number % len(KINDS)]
    for _ in range(400):
        try:
            return attempt(draw, number, kind)
        except faults.Unfit:
            continue
    raise ValueError(f"no instrument {number} ({kind})")


def attempt(draw, number, kind):
    """One draw of everything; raises Unfit if it will not do."""
    mixed = kind == "mixture"
    plan = nominal.plan(draw, number)
    frets = draw.pick(FRET_SETS)
    hidden = draw_hidden(draw, plan, kind)
    bad, shift = None, None
    if kind == "fret" or mixed and draw.chance(0.2):
        bad, shift = draw.pick(frets), draw.sign() * draw.between(0.3, 0.8, 3)
    true = faults.Instrument(plan, hidden, frets)
    sane(plan, true)
    place_contacts(draw, true, kind)
    nut, crest = true.nut, true.crest
    slots = []
    if kind == "nut_slots" or mixed and draw.chance(0.2):
        slots = raise_slots(draw, true, hidden, draw.pick([1, 1, 2, 3, true.count]))
    if bad:
        hidden["fret_shift_mm"][bad - 1] += shift
    true = faults.Instrument(plan, hidden, frets)
    true.nut, true.crest = nut, crest
    sane(plan, true)
    errors = true.errors(nut, crest)
    if np.abs(errors).max() > (SOUND_CENTS if kind == "sound" else WORST_CENTS):
        raise faults.Unfit("not what its kind should be")
    truth = {"kind": kind, "family": nominal.ORDER[number % len(nominal.ORDER)], "measured_frets": frets,
             "bad_fret": None, "high_slots": slots} | {k: hidden[k] for k in ("press_depth_mm", "relief_mm", "fret_shift_mm")}
    if bad:
        truth["bad_fret"] = {"fret": bad, "shift_mm": float(hidden["fret_shift_mm"][bad - 1]),
                             "cents": true.shifted_fret(bad, errors)}
        if abs(truth["bad_fret"]["cents"]) < FRET_CENTS:
            raise faults.Unfit("a shift that nobody hears")
    tuning = draw.normal(TUNING_CENTS, true.count)
    plan["readings"] = readings(draw, true, tuning, truth, kind == "dead_string" or mixed and draw.chance(0.2))
    if draw.chance(0.5):
        plan["as_built"] = {"saddle_setback_mm": near(draw, crest), "nut_setback_mm": near(draw, nut)}
    detectability.add(plan, hidden, frets, nut, crest, truth)
    truth["strings"] = cures(true, hidden, tuning, errors)
    return {"origin": f"tests/reference/instruments.py, seed {SEED}, instrument {number}", "plan": plan, "truth": truth}


def sane(plan, true):
    """Strings that hold and clear every fret."""
    scale = plan["instrument"]["scale_mm"]
    strings = true.strings + neck.build(plan)
    if not all(nominal.holds(entry, scale) for entry in plan["strings"]) or not all(plans.clear(s) for s in strings):
        raise faults.Unfit("strings break or buzz")


def near(draw, values):
    """Measured with a ruler, to a tenth of a millimetre."""
    return [round(float(v), 1) + 0.0 for v in values + draw.normal(AS_BUILT_MM, len(values))]


def readings(draw, true, tuning, truth, dead):
    """Tuner readings of every string: open, octave harmonic, fretted; to a tenth of a cent."""
    count, frets = true.count, true.frets
    fretted = true.at_pitch(tuning) + tuning[:, None] + draw.normal(NOISE_CENTS, (count, len(frets)))
    opened = tuning + draw.normal(NOISE_CENTS, count)
    octave = true.harmonics(tuning) + draw.normal(NOISE_CENTS, count)
    truth["dead_string"], truth["outlier"] = None, None
    k = None
    if dead:
        k = int(draw.rng.integers(count))
        false = np.array([draw.sign() * draw.between(5.0, 12.0, 2) for _ in range(len(frets) + 1)])
        fretted[k] += false[:-1]
        octave[k] += false[-1]
        truth["dead_string"] = {"string": k + 1, "false_cents": list(false[:-1]), "false_octave_cents": false[-1]}
    if draw.chance(0.1):
        at = draw.pick([i for i in range(count) if i != k])
        column, off = int(draw.rng.integers(len(frets))), draw.sign() * draw.between(5.0, 15.0, 2)
        fretted[at, column] += off
        truth["outlier"] = {"string": at + 1, "fret": frets[column], "cents": off}
    out = []
    for i in range(count):
        out.append({"string": i + 1, "fret": 0, "kind": "open", "cents": tenth(opened[i])})
        out.append({"string": i + 1, "fret": 12, "kind": "octave_harmonic", "cents": tenth(octave[i])})
        out += [{"string": i + 1, "fret": n, "kind": "fretted", "cents": tenth(c)} for n, c in zip(frets, fretted[i])]
    return out


def tenth(value):
    """To a tenth, never minus zero."""
    return round(float(value), 1) + 0.0


def cures(true, hidden, tuning, errors):
    """For each string its true figures, its errors, and the moves that make it best."""
    alone = true.best(False)
    both = true.best(True)

    def rms(rows):
        return np.sqrt(np.mean(rows**2, axis=1))
    return [{
        "crest_setback_mm": true.crest[k], "nut_setback_mm": true.nut[k],
        "axial_factor": hidden["axial_factor"][k], "bending_factor": hidden["bending_factor"][k],
        "slot_height_mm": hidden["slot_height_mm"][k], "action_mm": hidden["action_mm"][k],
        "tuning_cents": tuning[k], "errors_cents": list(errors[k]), "rms_before_cents": rms(errors)[k],
        "saddle_only": {"saddle_move_mm": alone[1][k] - true.crest[k], "rms_after_cents": rms(alone[2])[k]},
        "saddle_and_nut": {"saddle_move_mm": both[1][k] - true.crest[k], "nut_move_mm": both[0][k] - true.nut[k],
                           "rms_after_cents": rms(both[2])[k]},
    } for k in range(true.count)]


def tidy(value, key=""):
    """Plain data; cents to three decimals, the rest to four."""
    if isinstance(value, dict):
        return {k: tidy(v, k) for k, v in value.items()}
    if isinstance(value, (list, np.ndarray)):
        return [tidy(v, key) for v in value]
    if isinstance(value, np.generic):
        value = value.item()
    return round(value, 3 if key.endswith("cents") else 4) + 0.0 if isinstance(value, float) else value


def main():
    """Writes the files that hold instruments FIRST to LAST."""
    first, last = (int(a) for a in sys.argv[1:3]) if len(sys.argv) > 2 else (601, 1200)
    os.makedirs(HERE / "instruments", exist_ok=True)
    for start in range(first, last + 1, PER_FILE):
        stop = min(start + PER_FILE - 1, last)
        lines = [json.dumps(tidy(instrument(n)), allow_nan=False, separators=(",", ":")) for n in range(start, stop + 1)]
        name = f"{start:03}-{stop:03}.json"
        (HERE / "instruments" / name).write_text("[\n" + ",\n".join(lines) + "\n]\n", encoding="utf-8")
        print(name, "written")


if __name__ == "__main__":
    main()
