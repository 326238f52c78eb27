"""Setbacks for a plan: the joint problems of the saddle and nut styles, handed to the optimisers."""

import itertools

import numpy as np
from scipy.optimize import brentq

import neck
import optimise

STENCIL = ((-2.0, 1.0 / 12.0), (-1.0, -8.0 / 12.0), (1.0, 8.0 / 12.0), (2.0, -1.0 / 12.0))
STEP_MM = 0.02


def derivative(function, x, step):
    """Five-point Jacobian of a vector function."""
    columns = []
    for k in range(len(x)):
        total = 0.0
        for place, weight in STENCIL:
            moved = np.array(x, float)
            moved[k] += place * step
            total = total + weight * np.asarray(function(moved))
        columns.append(total / step)
    return np.stack(columns, axis=-1)


class Problem:
    """Unknown setbacks of some strings of a plan, tied together by a saddle and a nut style.

    `pieces` lists groups of strings whose crests lie on one straight line (a group of one is a free crest);
    `nut` is "fixed", "common" or "each"; `strip` is the width that all crests must share, or None.
    """

    def __init__(self, setting, pieces, nut, nut_values, frets, strip=None):
        self.setting, self.pieces, self.nut, self.strip = setting, pieces, nut, strip
        self.members = [i for piece in pieces for i in piece]
        self.nut_values = np.array(nut_values, float)
        self.frets = frets
        self.crest_count = sum(min(len(piece), 2) for piece in pieces)
        nuts = {"fixed": 0, "common": 1, "each": len(self.members)}[nut]
        low, high = setting.saddle_travel, setting.nut_travel
        self.lower = np.array([low[0]] * self.crest_count + [high[0]] * nuts)
        self.upper = np.array([low[1]] * self.crest_count + [high[1]] * nuts)

    def crests(self, x):
        """Saddle setbacks of the members."""
        out, start = [], 0
        for piece in self.pieces:
            ends = x[start:start + min(len(piece), 2)]
            start += len(ends)
            out.extend(ends if len(piece) < 3 else self._between(piece, ends))
        return np.array(out, float)

    def _between(self, piece, ends):
        strings = self.setting.strings
        first, last = strings[piece[0]], strings[piece[-1]]
        p, q = first.point(first.scale + ends[0]), last.point(last.scale + ends[1])
        out = []
        for i in piece:
            string = strings[i]
            meet = neck.cross(p, q, string.nut, string.saddle)
            out.append((meet - string.saddle) @ (string.saddle - string.nut) / string.scale)
        return out

    def nuts(self, x):
        """Nut setbacks of the members."""
        rest = x[self.crest_count:]
        if self.nut == "fixed":
            return self.nut_values[self.members]
        return np.full(len(self.members), rest[0]) if self.nut == "common" else np.array(rest, float)

    def crest_forms(self, x):
        """Jacobian of the crests by the unknowns."""
        return derivative(self.crests, x, 0.05)

    def shared_forms(self, x):
        """The same for what strings share: crests on a common line or in a common blank, and a common nut."""
        tied = [self.strip is not None or len(piece) > 1 for piece in self.pieces for _ in piece]
        rows = [row for row, wanted in zip(self.crest_forms(x), tied) if wanted]
        if self.nut == "common":
            rows.append(np.eye(len(x))[-1])
        return np.array(rows)

    def evaluate(self, x):
        """Errors of each member's frets, and their Jacobians by the unknowns."""
        nuts, crests = self.nuts(x), self.crests(x)
        nut_forms, crest_forms = derivative(self.nuts, x, 0.05), self.crest_forms(x)
        shifts = [(0.0, 0.0)] + [(0.0, p * STEP_MM) for p, _ in STENCIL]
        if self.nut != "fixed":
            shifts += [(p * STEP_MM, 0.0) for p, _ in STENCIL]
        jobs = [(i, n + dn, c + dc, self.frets[i])
                for i, n, c in zip(self.members, nuts, crests) for dn, dc in shifts]
        cents = [o["cents"] for o in self.setting.bench.sound(jobs)]
        residuals, jacobians = [], []
        weights = np.array([w for _, w in STENCIL]) / STEP_MM
        for k in range(len(self.members)):
            mine = np.array(cents[k * len(shifts):(k + 1) * len(shifts)])
            slope = np.outer(weights @ mine[1:5], crest_forms[k])
            if self.nut != "fixed":
                slope = slope + np.outer(weights @ mine[5:9], nut_forms[k])
            residuals.append(mine[0])
            jacobians.append(slope)
        return residuals, jacobians

    def limits(self, x):
        """Travel of crests between the ends of a line, and the strip that crests must share."""
        value = self._limit_values(x)
        if len(value) == 0:
            return value, np.zeros((0, len(x)))
        return value, derivative(self._limit_values, x, 0.02)

    def _limit_values(self, x):
        crests = self.crests(x)
        low, high = self.setting.saddle_travel
        out = []
        if any(len(piece) > 2 for piece in self.pieces):
            out += [crests - low, high - crests]
        if self.strip is not None and len(self.members) > 2:
            away = self._bows(crests)
            out += [self.strip - away, self.strip + away]
        return np.concatenate(out) if out else np.zeros(0)

    def _bows(self, crests):
        """Distance of each crest from the chord of each pair around it: points share a strip if no three forbid it."""
        points = np.array([self.setting.crest_point(i, c) for i, c in zip(self.members, crests)])
        triples = np.array(list(itertools.combinations(range(len(points)), 3)))
        p, q, r = (points[triples[:, k]] for k in range(3))
        chord, arm = r - p, q - p
        return (chord[:, 0] * arm[:, 1] - chord[:, 1] * arm[:, 0]) / np.hypot(chord[:, 0], chord[:, 1])


class Setting:
    """What every problem of one plan shares."""

    # What a joint optimum is made of.
    problem = Problem

    def __init__(self, plan, strings, bench):
        self.strings, self.bench, self.known = strings, bench, {}
        saddle, nut = plan["saddle"], plan.get("nut") or {"style": "plain"}
        fit = plan.get("fit") or {"rule": "least_squares", "frets": [1, 12]}
        self.rule, (self.first, self.last) = fit["rule"], fit["frets"]
        self.style, self.nut_style = saddle["style"], nut["style"]
        self.saddle_travel = saddle.get("travel_mm", [-5.0, 15.0])
        self.nut_travel = nut.get("travel_mm", [0.0, 3.0])
        self.strip = saddle.get("thickness_mm", 3.0) - 2.0 * saddle.get("edge_margin_mm", 0.4)
        self.split = saddle.get("split_after")
        self.count = len(strings)
        numbers = list(range(1, plan["instrument"]["frets"] + 1))
        none = bench.sound([(i, 0.0, 0.0, numbers) for i in range(self.count)])
        clean = [[n for n, over in zip(numbers, o["touched"]) if not over] for o in none]
        self.octave = [[12] if 12 in frets else [] for frets in clean]
        self.fit_frets = [[n for n in frets if self.first <= n <= self.last] for frets in clean]
        if any(not f for f in self.fit_frets) or (self.rule == "twelfth" and any(not f for f in self.octave)):
            raise ValueError("a string has no fret to fit")

    def crest_point(self, index, setback):
        """Plan point of a crest."""
        string = self.strings[index]
        return string.point(string.scale + setback)

    def pieces(self, style):
        """Groups of strings whose crests share a line."""
        every = list(range(self.count))
        if style == "straight":
            return [every]
        if style == "two_piece":
            return [every[:self.split], every[self.split:]]
        return [[i] for i in every]

    def clip(self, value):
        """A setback moved inside the saddle's travel."""
        return float(np.clip(value, *self.saddle_travel))

    def solve(self, style, rule, nut=None, nut_values=None, strip=None):
        """(nut setbacks, saddle setbacks, crests settled by the joint optimum, all shared settled) of a style."""
        nut = nut or {"plain": "fixed", "common": "common", "shaped": "each"}[self.nut_style]
        values = np.zeros(self.count) if nut_values is None else nut_values
        pieces = self.pieces(style)
        tied = nut == "common" or strip is not None
        groups = [pieces] if tied else [[piece] for piece in pieces]
        nuts, crests = np.zeros(self.count), np.zeros(self.count)
        determined, shared = [True] * self.count, True
        for group in groups:
            problem = self.problem(self, group, nut, values, self.octave if rule == "twelfth" else self.fit_frets, strip)
            start = np.clip(np.full(len(problem.lower), 0.1), problem.lower, problem.upper)
            if rule == "minimax":
                x, _, known, common = optimise.lexicographic_minimax(problem, start)
                shared = shared and common
            else:
                x, known = optimise.least_squares(problem, start), [True] * len(problem.members)
            for i, n, c, k in zip(problem.members, problem.nuts(x), problem.crests(x), known):
                nuts[i], crests[i], determined[i] = n, c, k
        return nuts, crests, determined, shared

    def octave_crests(self, nuts):
        """Crests that make fret 12 true, each on its own, with these nut setbacks."""
        out = []
        for i, nut in enumerate(nuts):
            def miss(setback):
                return float(self.bench.sound([(i, nut, setback, [12])])[0]["cents"][0])
            low, high = self.saddle_travel
            at_low, at_high = miss(low), miss(high)
            if at_low * at_high < 0.0:
                out.append(brentq(miss, low, high, xtol=1e-13, rtol=1e-14))
            else:
                out.append(low if abs(at_low) < abs(at_high) else high)
        return np.array(out)

    def separate(self, rule):
        """Setbacks with a free crest a string: the ideal ones."""
        if rule not in self.known:
            self.known[rule] = self.solve("separate", rule) if rule != "twelfth" else self._separate_octaves()
        return self.known[rule]

    def _separate_octaves(self):
        nuts = np.zeros(self.count) if self.nut_style == "plain" else self.separate("least_squares")[0]
        return nuts, self.octave_crests(nuts), [True] * self.count, True

    def on_lines(self, rule):
        """Setbacks on one or two straight crests."""
        if rule != "twelfth":
            return self.solve(self.style, rule)
        nuts = np.zeros(self.count) if self.nut_style == "plain" else self.solve(self.style, "least_squares")[0]
        return self.solve(self.style, "twelfth", "fixed", nuts)

    def fits(self, crests):
        """Do these crests fit the top of the blank?"""
        return self.count < 3 or self.slot(crests)[2] <= self.strip / 2.0

    def in_blank(self, rule):
        """Setbacks on the top of one straight blank, and whether the free ones fit it."""
        if rule != "twelfth":
            found = self.separate(rule)
            if self.fits(found[1]):
                return found, True
            return self.solve("shaped", rule, strip=self.strip), False
        nuts = np.zeros(self.count)
        if self.nut_style != "plain":
            nuts = self.in_blank("least_squares")[0][0]
        crests = self.octave_crests(nuts)
        if self.fits(crests):
            return (nuts, crests, [True] * self.count, True), True
        return self.solve("shaped", "twelfth", "fixed", nuts, strip=self.strip), False

    def slot(self, crests):
        """The slot's centre line (point, direction, largest distance)."""
        points = [self.crest_point(i, c) for i, c in enumerate(crests)]
        if self.count == 1:
            return points[0], np.array([0.0, 1.0]), 0.0
        return optimise.narrowest_strip(points)
