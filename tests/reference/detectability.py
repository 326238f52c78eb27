"""How far a fault stands out of what the readings leave open: the statistic that the best test of it expects.

Readings of an instrument without the fault scatter with the covariance C = N + J S J': N is the noise, S the spread of
all that a repairer cannot know, J how the readings change with it. A fault that changes them by g is tested best by
t = g'C^-1 y / sqrt(g'C^-1 g) (matched filter: S. M. Kay, Fundamentals of Statistical Signal Processing, vol. 2, ch. 4),
which has a standard deviation of 1, and a mean of 0 without the fault and of sqrt(g'C^-1 g) with it. Where a test calls a
fault above some limit, one that expects 1.645 more is found 95 times in 100.
"""

import numpy as np

import faults

# What a repairer takes as standard deviations; instruments are drawn with them but for frets (0.03 mm mostly) and tuning
# (0.5 cent). Stiffness and press depth: of the logarithm.
CREST_MM, AS_BUILT_MM, NUT_MM, STIFFNESS, SLOT_MM, ACTION_MM, RELIEF_MM = 2.0, 0.3, 0.5, 0.15, 0.1, 0.15, 0.1
PRESS_FACTOR, FRET_MM, TUNING_CENTS, NOISE_CENTS = 1.6, 0.08, 3.0, 1.0
# Where a slot is high others of the same nut may be so too, by some such height, mm.
HIGH_SLOT_MM = 0.8
# Steps for slopes, in standard deviations.
STEP = 0.02
# A reading known to be wrong says nothing: its standard deviation, cents.
WRONG_CENTS = 1e3
OWN = ("crest", "nut", "axial_factor", "bending_factor", "slot_height_mm", "action_mm")


class State:
    """A true instrument that can be moved away from itself; what it sounds."""

    def __init__(self, plan, hidden, frets, nut, crest):
        self.plan, self.frets = plan, frets
        self.figures = {**hidden, "nut": nut, "crest": crest}
        self.crest_mm = AS_BUILT_MM if "as_built" in plan else CREST_MM

    def moved(self, name, by):
        """The same with one figure moved by so many standard deviations: arrays string by string (or fret by fret)."""
        value = self.figures[name]
        if name in ("axial_factor", "bending_factor"):
            value = value * np.exp(STIFFNESS * by)
        elif name == "press_depth_mm":
            value = value * PRESS_FACTOR**by
        else:
            value = value + by * {"crest": self.crest_mm, "nut": NUT_MM, "slot_height_mm": SLOT_MM, "action_mm": ACTION_MM,
                                  "relief_mm": RELIEF_MM, "fret_shift_mm": FRET_MM}[name]
        return self.replaced(name, value)

    def replaced(self, name, value):
        """The same with one figure replaced."""
        other = State(self.plan, {}, self.frets, None, None)
        other.figures = {**self.figures, name: value}
        return other

    def sounds(self):
        """What is read without tuning and noise, a row a string: fretted errors, octave harmonic, open string."""
        true = faults.Instrument(self.plan, self.figures, self.frets)
        errors = true.errors(self.figures["nut"], self.figures["crest"])
        true.nut, true.crest = self.figures["nut"], self.figures["crest"]
        return np.column_stack([errors, true.harmonics(np.zeros(true.count)), np.zeros(true.count)])

    def only(self, fret):
        """One standard deviation at one fret, none at the others."""
        return (np.arange(len(self.figures["fret_shift_mm"])) == fret - 1).astype(float)


class Scatter:
    """The covariance of the readings without a fault, string by string."""

    def __init__(self, state, truth):
        here = state.sounds()
        self.count = len(here)

        def slope(name, by=1.0):
            return (state.moved(name, STEP * by).sounds() - here) / STEP
        self.own = {name: slope(name) for name in OWN}
        shared = [slope("press_depth_mm"), slope("relief_mm")] + [slope("fret_shift_mm", state.only(n)) for n in state.frets]
        tuned = np.full(here.shape, TUNING_CENTS)
        tuned[:, -2] = 0.0
        changes = shared + [self.of(rows, k) for rows in [tuned, *self.own.values()] for k in range(self.count)]
        self.covariance = np.diag(self.noise(truth, state.frets, here.shape).ravel())
        self.covariance += sum(np.outer(change, change) for change in changes)
        self.high = [raised["string"] - 1 for raised in truth["high_slots"]]

    @staticmethod
    def noise(truth, frets, shape):
        """Variance of each reading's noise."""
        noise = np.full(shape, NOISE_CENTS**2)
        if truth["outlier"]:
            noise[truth["outlier"]["string"] - 1, frets.index(truth["outlier"]["fret"])] = WRONG_CENTS**2
        if truth["dead_string"]:
            noise[truth["dead_string"]["string"] - 1] = WRONG_CENTS**2
        return noise

    def of(self, rows, string):
        """Changes of one string's readings, none of the others."""
        return np.where(np.arange(self.count)[:, None] == string, rows, 0.0)

    def slot(self, string, height_mm):
        """Part of the covariance that comes from a string's height over fret 1, if it spreads so far."""
        change = self.of(self.own["slot_height_mm"], string).ravel() * height_mm / SLOT_MM
        return np.outer(change, change)

    def without_fault(self, slot=None):
        """The covariance for a test of a fret, or of one string's slot: then of its height as the plan says it."""
        others = sum((self.slot(k, HIGH_SLOT_MM) for k in self.high if k != slot), np.zeros_like(self.covariance))
        return self.covariance + others - (0.0 if slot is None else self.slot(slot, SLOT_MM))


def expected(change, covariance):
    """Mean of the best statistic for a fault that changes the readings so."""
    change = change.ravel()
    return float(np.sqrt(change @ np.linalg.solve(covariance, change)))


def without_shift(state, fret):
    """The same instrument with one fret where it belongs."""
    places = state.figures["fret_shift_mm"].copy()
    places[fret - 1] = 0.0
    return state.replaced("fret_shift_mm", places)


def with_slot_right(state, string):
    """The same instrument with one string as high over fret 1 as the plan says."""
    heights = state.figures["slot_height_mm"].copy()
    heights[string] = state.plan["strings"][string]["action_mm"]["first"]
    return state.replaced("slot_height_mm", heights)


def add(plan, hidden, frets, nut, crest, truth):
    """Writes `expected_z` into the misplaced fret and the high slots of `truth`: of the whole fault, spread included."""
    if not truth["bad_fret"] and not truth["high_slots"]:
        return
    state = State(plan, hidden, frets, nut, crest)
    scatter, here = Scatter(state, truth), state.sounds()
    if truth["bad_fret"]:
        change = here - without_shift(state, truth["bad_fret"]["fret"]).sounds()
        truth["bad_fret"]["expected_z"] = expected(change, scatter.without_fault())
    for raised in truth["high_slots"]:
        k = raised["string"] - 1
        change = scatter.of(here - with_slot_right(state, k).sounds(), k)
        raised["expected_z"] = expected(change, scatter.without_fault(k))
