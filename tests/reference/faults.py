"""The true instrument behind a nominal plan: what it is really like, how it sounds, what would cure it."""

import copy
import dataclasses

import numpy as np

import fretting
import mode
import neck

PROBE_MM = 0.05
SETTLED_MM = 1e-5
SLOPES_GOOD_MM = 0.02


class Instrument:
    """A nominal plan with its hidden truth; crest and nut edge are arrays, one value a string."""

    def __init__(self, plan, hidden, frets):
        self.frets = frets
        self.index = np.array(frets) - 1
        self.plan = true_plan(plan, hidden)
        self.strings = neck.build(self.plan)
        self.bench = fretting.Bench(self.plan, self.strings)
        self.count = len(self.strings)
        self.nut = np.zeros(self.count)
        self.crest = np.zeros(self.count)

    def notes(self, nut, crest, strings=None):
        """Error of each fretted note against the own open string, a row a string; raises if a note buzzes."""
        bench = self.bench if strings is None else fretting.Bench(self.plan, strings)
        out = bench.sound([(i, nut[i], crest[i], self.frets) for i in range(len(nut))])
        if any(touched for o in out for touched in o["touched"]):
            raise Unfit("a note buzzes")
        return out

    def errors(self, nut, crest):
        """The errors alone."""
        return np.array([o["cents"] for o in self.notes(nut, crest)])

    def slopes(self, nut, crest, with_nut):
        """Change of the errors by a millimetre of crest (and nut), strings x frets x unknowns."""
        moves = [(0.0, 1.0)] + ([(1.0, 0.0)] if with_nut else [])
        columns = []
        for by_nut, by_crest in moves:
            ahead = self.errors(nut + by_nut * PROBE_MM, crest + by_crest * PROBE_MM)
            behind = self.errors(nut - by_nut * PROBE_MM, crest - by_crest * PROBE_MM)
            columns.append((ahead - behind) / (2.0 * PROBE_MM))
        return np.stack(columns, axis=-1)

    def best(self, with_nut, nut=None, crest=None):
        """(nut, crest, errors) of least squares over the frets, each string for itself, without any limits."""
        nut = np.array(self.nut if nut is None else nut, float)
        crest = np.array(self.crest if crest is None else crest, float)
        moved = np.inf
        for _ in range(15):
            left = self.errors(nut, crest)
            # Slopes taken this near are as good as those at the place itself.
            if moved > SLOPES_GOOD_MM:
                slopes = self.slopes(nut, crest, with_nut)
            step = np.array([np.linalg.lstsq(s, -e, rcond=None)[0] for s, e in zip(slopes, left)])
            crest = crest + step[:, 0]
            nut = nut + (step[:, 1] if with_nut else 0.0)
            moved = np.abs(step).max()
            if moved < SETTLED_MM:
                return nut, crest, self.errors(nut, crest)
        raise ArithmeticError("the best crest was not reached")

    def raised_slot(self, k, heights):
        """Rise of string k's error at fret 1, in cents, for each height (mm) added to the gap over that fret."""
        lifted = [self.strings[k]]
        for height in heights:
            (s, z), far = self.strings[k].line
            lifted.append(dataclasses.replace(self.strings[k], line=((s, z + height), far)))
        count = len(lifted)
        out = self.notes(np.full(count, self.nut[k]), np.full(count, self.crest[k]), lifted)
        first = np.array([o["cents"][0] for o in out])
        return first[1:] - first[0]

    def shifted_fret(self, fret, errors):
        """Mean change (cents) of the notes at `fret` against the same neck with that fret where it belongs."""
        plan = copy.deepcopy(self.plan)
        neck_entry = plan["instrument"]
        neck_entry["fret_positions_mm"][fret - 1] = float(neck_entry["scale_mm"] * neck.equal_fraction(fret))
        strings = neck.build(plan)
        column = self.frets.index(fret)
        was = [o["cents"][column] for o in self.notes(self.nut, self.crest, strings)]
        return float(np.mean(errors[:, column] - was))

    def harmonics(self, tuning):
        """Second mode of each open string over twice its first, in cents, at its actual pitch."""
        hold = self.bench.supports
        out = []
        for k, string in enumerate(self.strings):
            near, far = fretting.contacts(string, self.nut[k], self.crest[k])
            length = fretting.polyline([near, far]) * 1e-3
            pull = mode.tensions(np.array([string.unit_mass]), np.array([string.bending_nm2]), np.array([length]),
                                 np.array([string.frequency * 2.0 ** (tuning[k] / 1200.0)]), hold["nut"], hold["saddle"])[0]
            stiffness = np.sqrt(string.bending_nm2 / pull) / length
            first = mode.quotients(np.array([stiffness]), hold["nut"], hold["saddle"])[0]
            out.append(1200.0 * np.log2(second_mode(stiffness, hold["nut"], hold["saddle"]) / (2.0 * first)))
        return np.array(out)

    def at_pitch(self, tuning):
        """The errors, each string tuned off by `tuning` cents."""
        strings = [dataclasses.replace(s, frequency=s.frequency * 2.0 ** (t / 1200.0)) for s, t in zip(self.strings, tuning)]
        return np.array([o["cents"] for o in self.notes(self.nut, self.crest, strings)])


class Unfit(ValueError):
    """A drawn instrument that no repairer would meet, or that its kind rules out."""


def second_mode(stiffness, k_left, k_right):
    """Second mode over the first one of the flexible string: the determinant's root next above 2 (or at it)."""
    def miss(q):
        return mode.determinant(np.array([stiffness]), np.pi * q, k_left, k_right)
    root = mode._secant(miss, np.array([2.0001]), np.array([2.02]))[0]
    if not 1.999 < root < 2.6:
        raise ArithmeticError("not the second mode")
    return root


def true_plan(plan, hidden):
    """The plan with the true figures in it: relief, press depth, frets, actions, stiffnesses."""
    plan = copy.deepcopy(plan)
    neck_entry = plan["instrument"]
    numbers = np.arange(1, neck_entry["frets"] + 1)
    places = neck_entry["scale_mm"] * neck.equal_fraction(numbers) + hidden["fret_shift_mm"]
    neck_entry["fret_positions_mm"] = [float(x) for x in places]
    neck_entry["relief_mm"] = hidden["relief_mm"]
    plan["pressing"]["depth_mm"] = hidden["press_depth_mm"]
    for k, entry in enumerate(plan["strings"]):
        own = neck.properties(entry)
        entry["measured"] = {"axial_stiffness_n": own["axial_n"] * hidden["axial_factor"][k],
                             "bending_stiffness_n_mm2": own["bending_nm2"] * 1e6 * hidden["bending_factor"][k]}
        entry["action_mm"] = {"first": hidden["slot_height_mm"][k], "twelfth": hidden["action_mm"][k]}
    return plan
