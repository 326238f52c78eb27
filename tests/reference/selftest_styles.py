"""Checks of the joint optima: the same problems put to scipy's SLSQP, with the lines as unknowns.

Here every string has its own crest and nut among the unknowns, and each crest line is two more unknowns
(its x at y = 0 beyond the first string's saddle, and ten times its slope); that crests lie on it, within the strip or within the travel, are constraints.
"""

import numpy as np
from scipy.optimize import minimize

import fretting
import neck
import plans
import saddles

# Plans with each style, nut and rule; found among the random ones.
LEAST_SQUARES = [("straight", "plain"), ("straight", "common"), ("straight", "shaped"), ("two_piece", "common"),
                 ("shaped", "plain"), ("shaped", "common"), ("shaped", "shaped"), ("separate", "common")]


def setting_of(number):
    """A plan with its setting."""
    plan = plans.random_plan(number)
    strings = neck.build(plan)
    return plan, saddles.Setting(plan, strings, fretting.Bench(plan, strings))


def numbers_with(style, nut, rule, wanted):
    """The first plans of a kind, as the sequence of settings has them."""
    found = [n for n in range(plans.FIRST_SET + 1, 201) if plans.settings(n) == (style, nut, rule)]
    return found[:wanted]


class Open:
    """All setbacks of a plan as unknowns, with one or two explicit lines behind them."""

    def __init__(self, setting, strip):
        self.setting, self.strip, self.last, n = setting, strip, None, setting.count
        self.count = n
        self.pieces = setting.pieces("straight" if strip is not None else setting.style)
        self.lined = [] if setting.style == "separate" else self.pieces
        size = 2 * n + 2 * len(self.lined)
        bounds = [setting.saddle_travel] * n
        bounds += [(0.0, 0.0) if setting.nut_style == "plain" else tuple(setting.nut_travel)] * n
        self.bounds = bounds + [(None, None)] * (size - 2 * n)
        self.free = saddles.Problem(setting, [[i] for i in range(n)], "each", np.zeros(n), setting.fit_frets)

    def errors(self, x):
        """Residuals and Jacobian of all strings over crests and nuts; the last answer is kept."""
        if self.last is None or not np.array_equal(self.last[0], x):
            self.last = (np.array(x), self._errors(x))
        return self.last[1]

    def _errors(self, x):
        n = self.count
        residuals, jacobians = self.free.evaluate(x[:2 * n])
        whole = np.vstack(jacobians)
        return np.concatenate(residuals), np.hstack([whole, np.zeros((len(whole), len(x) - 2 * n))])

    def off_lines(self, x):
        """Perpendicular distance of each crest from its line."""
        out = []
        for k, piece in enumerate(self.lined):
            at, slope = x[2 * self.count + 2 * k:2 * self.count + 2 * k + 2]
            for i in piece:
                point = self.setting.crest_point(i, x[i])
                out.append(self._off(point, at, slope))
        return np.array(out)

    def _off(self, point, at, slope):
        base = self.setting.strings[0].saddle[0]
        return (point[0] - base - at - slope * point[1] / 10.0) / np.hypot(1.0, slope / 10.0)

    def constraints(self):
        """Lines, strip and common nut for SLSQP."""
        out = []
        if self.lined:
            if self.strip is None:
                out.append({"type": "eq", "fun": self.off_lines, "jac": lambda x: saddles.derivative(self.off_lines, x, 0.01)})
            else:
                half = self.strip / 2.0
                for sign in (1.0, -1.0):
                    out.append({"type": "ineq", "fun": lambda x, s=sign: half + s * self.off_lines(x),
                                "jac": lambda x, s=sign: s * saddles.derivative(self.off_lines, x, 0.01)})
        if self.setting.nut_style == "common" and self.count > 1:
            def gaps(x):
                return np.diff(x[self.count:2 * self.count])
            out.append({"type": "eq", "fun": gaps, "jac": lambda x: saddles.derivative(gaps, x, 0.01)})
        return out

    def start(self):
        """Crests on a straight line near the nominal one."""
        x = np.zeros(len(self.bounds))
        base = self.setting.strings[0].saddle[0]
        for k, piece in enumerate(self.lined):
            p, q = (self.setting.crest_point(i, 1.0) for i in (piece[0], piece[-1]))
            slope = (p[0] - q[0]) / (p[1] - q[1]) if len(piece) > 1 else 0.0
            x[2 * self.count + 2 * k:2 * self.count + 2 * k + 2] = p[0] - base - slope * p[1], 10.0 * slope
        x[:self.count] = np.clip(1.0, *self.setting.saddle_travel)
        return x


def squares_by_slsqp():
    """Largest difference in mm of crests and nuts from SLSQP's, least squares."""
    worst = 0.0
    for style, nut in LEAST_SQUARES:
        for number in numbers_with(style, nut, "least_squares", 2):
            setting = setting_of(number)[1]
            if style == "shaped":
                (nuts, crests, *_), fits = setting.in_blank("least_squares")
                problem = Open(setting, None if fits else setting.strip)
                if fits:
                    continue
            else:
                nuts, crests = setting.solve(style, "least_squares")[:2]
                problem = Open(setting, None)

            def cost(x, problem=problem):
                e, jacobian = problem.errors(x)
                return float(e @ e), 2.0 * jacobian.T @ e
            x = problem.start()
            # A second, short run: nearer than this the noise of the errors keeps SLSQP searching for ever.
            for gain, rounds in ((1e-8, 40), (1e-11, 6)):
                x = minimize(cost, x, jac=True, method="SLSQP", bounds=problem.bounds, constraints=problem.constraints(),
                             options={"ftol": gain, "maxiter": rounds}).x
            n = setting.count
            worst = max(worst, np.abs(x[:n] - crests).max(), np.abs(x[n:2 * n] - nuts).max())
    return worst


def minimax_by_slsqp():
    """Largest amount in cents by which SLSQP finds a smaller largest error, or misses ours by more than is allowed."""
    worst = 0.0
    for style, nut in LEAST_SQUARES:
        for number in numbers_with(style, nut, "minimax", 2):
            setting = setting_of(number)[1]
            strip = None
            if style == "shaped":
                found, fits = setting.in_blank("minimax")
                if fits:
                    continue
                strip = setting.strip
            else:
                found = setting.solve(style, "minimax")
            e = np.concatenate([o["cents"] for o in setting.bench.sound(
                [(i, found[0][i], found[1][i], setting.fit_frets[i]) for i in range(setting.count)])])
            worst = max(worst, abs(np.abs(e).max() - smallest_largest(Open(setting, strip))))
    return worst


def smallest_largest(problem):
    """The least possible largest error by SLSQP, with the largest error as one more unknown."""
    x = problem.start()
    e = problem.errors(x)[0]
    x = np.append(x, np.abs(e).max())

    def widened(constraint):
        return {"type": constraint["type"], "fun": lambda v: constraint["fun"](v[:-1]),
                "jac": lambda v: np.hstack([constraint["jac"](v[:-1]), np.zeros((len(constraint["fun"](v[:-1])), 1))])}
    rules = [widened(c) for c in problem.constraints()]
    for sign in (1.0, -1.0):
        rules.append({"type": "ineq", "fun": lambda v, s=sign: v[-1] - s * problem.errors(v[:-1])[0],
                      "jac": lambda v, s=sign: np.hstack([-s * problem.errors(v[:-1])[1], np.ones((len(e), 1))])})
    gradient = np.zeros(len(x))
    gradient[-1] = 1.0
    x = minimize(lambda v: (v[-1], gradient), x, jac=True, method="SLSQP", bounds=problem.bounds + [(0.0, None)],
                 constraints=rules, options={"ftol": 1e-10, "maxiter": 25}).x
    return float(np.abs(problem.errors(x[:-1])[0]).max())
