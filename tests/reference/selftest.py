"""Checks the reference computation against other ways to the same numbers: `python3 selftest.py`.

Prints the largest difference of every check beside what is allowed, and fails if one is too large.
"""

import itertools
import math
import sys

import mpmath
import numpy as np
from scipy.linalg import eigh
from scipy.optimize import least_squares, minimize, minimize_scalar
from scipy.spatial import ConvexHull

import fretting
import mode
import neck
import optimise
import plans
import saddles
import selftest_styles

CASES = [1, 2, 3, 4, 6, 7, 10, 13, 22, 30]


def mode_in_many_digits():
    """Largest relative difference of the first mode from the same determinant in many digits."""
    worst = 0.0
    for e, left, right in itertools.product((0.0005, 0.003, 0.02, 0.045), (0.0, 0.3, 0.5, 1.0), (0.0, 0.5, 1.0)):
        found = mode.quotient(e, left, right)
        # cosh and sinh agree in some 0.87/e digits: carry that many and fifty more.
        with mpmath.workdps(int(0.9 / e) + 50):
            exact = mpmath.findroot(lambda q, e=e, a=left, b=right: many_digits(e, q, a, b), (found, found * (1 + 1e-9)),
                                    tol=1e-40, verify=False)
            worst = max(worst, abs(float(found / exact - 1)))
            worst = max(worst, abs(float(mode.quotients([e], left, right)[0] / exact - 1)))
    return worst


def many_digits(e, q, left, right):
    """The boundary determinant in mpmath, with hyperbolic functions in place of scaled exponentials."""
    e, q, left, right = (mpmath.mpf(v) for v in (e, q, left, right))
    w = mpmath.pi * q
    b2 = (mpmath.sqrt(1 / e**4 + 4 * (w / e) ** 2) - 1 / e**2) / 2
    b, a = mpmath.sqrt(b2), mpmath.sqrt(b2 + 1 / e**2)
    cos, sin, cosh, sinh = mpmath.cos(b), mpmath.sin(b), mpmath.cosh(a), mpmath.sinh(a)
    return expanded([
        [1, 0, 1, 0],
        [cos, sin, cosh, sinh],
        [-(1 - left) * e * b2, -left * b, (1 - left) * e * a**2, -left * a],
        [-(1 - right) * e * b2 * cos - right * b * sin, -(1 - right) * e * b2 * sin + right * b * cos,
         (1 - right) * e * a**2 * cosh + right * a * sinh, (1 - right) * e * a**2 * sinh + right * a * cosh]])


def expanded(rows):
    """A determinant as the sum over all permutations."""
    total = mpmath.mpf(0)
    for order in itertools.permutations(range(len(rows))):
        swaps = sum(order[i] > order[j] for i in range(len(order)) for j in range(i + 1, len(order)))
        total += (-1) ** swaps * mpmath.fprod(row[k] for row, k in zip(rows, order))
    return total


def published_modes():
    """Largest difference in cents from clamped and pinned modes given to twelve digits (exact equations)."""
    table = [(0.001, 0.00854325543579, 1.74064632954, 3.47448407175),
             (0.01, 0.853908441855, 18.2560510734, 35.8344675456),
             (0.02, 3.41059122168, 38.4056842231, 74.115450477)]
    worst = 0.0
    for e, pinned, half, clamped in table:
        for value, ends in ((pinned, (0, 0)), (half, (1, 0)), (half, (0, 1)), (clamped, (1, 1))):
            worst = max(worst, abs(1200.0 * math.log2(mode.quotient(e, *ends)) - value))
    return worst


def beam(e, left, right, count=300, order=1):
    """Mode number `order` over the first one of the flexible string by Hermite finite elements, graded toward the ends."""
    nodes = 0.5 * (1.0 - np.cos(np.pi * np.linspace(0.0, 1.0, count + 1)))
    size = 2 * (count + 1)
    stiff, mass = np.zeros((size, size)), np.zeros((size, size))
    for k in range(count):
        h = nodes[k + 1] - nodes[k]
        bend = np.array([[12, 6 * h, -12, 6 * h], [6 * h, 4 * h * h, -6 * h, 2 * h * h],
                         [-12, -6 * h, 12, -6 * h], [6 * h, 2 * h * h, -6 * h, 4 * h * h]]) * e * e / h**3
        pull = np.array([[36, 3 * h, -36, 3 * h], [3 * h, 4 * h * h, -3 * h, -h * h],
                         [-36, -3 * h, 36, -3 * h], [3 * h, -h * h, -3 * h, 4 * h * h]]) / (30 * h)
        weight = np.array([[156, 22 * h, 54, -13 * h], [22 * h, 4 * h * h, 13 * h, -3 * h * h],
                           [54, 13 * h, 156, -22 * h], [-13 * h, -3 * h * h, -22 * h, 4 * h * h]]) * h / 420
        part = slice(2 * k, 2 * k + 4)
        stiff[part, part] += bend + pull
        mass[part, part] += weight
    gone = [0, size - 2]
    for place, k in ((1, left), (size - 1, right)):
        if k == 1.0:
            gone.append(place)
        else:
            stiff[place, place] += k / (1.0 - k) * e
    keep = [i for i in range(size) if i not in gone]
    # Each freedom in its own unit, and the largest of 1/w^2: so the lowest mode keeps its digits.
    unit = 1.0 / np.sqrt(np.diag(stiff)[keep])
    scaled = [m[np.ix_(keep, keep)] * np.outer(unit, unit) for m in (mass, stiff)]
    value = eigh(*scaled, eigvals_only=True, subset_by_index=[len(keep) - order, len(keep) - order])[0]
    return 1.0 / (math.sqrt(value) * math.pi)


def mode_by_elements():
    """Largest difference in cents between determinant and finite elements."""
    worst = 0.0
    for e, left, right in itertools.product((0.003, 0.01, 0.03), (0.0, 0.4, 0.5, 1.0), (0.5, 1.0)):
        worst = max(worst, abs(1200.0 * math.log2(beam(e, left, right) / mode.quotient(e, left, right))))
    return worst


def tension_back():
    """Largest relative difference of the pitch that the found tension gives from the pitch asked for."""
    worst = 0.0
    for mu, ei, length, pitch in [(4.0e-4, 9e-5, 0.648, 329.6), (6e-3, 3e-4, 0.65, 82.4), (0.02, 6e-3, 0.864, 41.2)]:
        for left, right in itertools.product((0.0, 0.5, 1.0), repeat=2):
            for pull in (mode.tension(mu, ei, length, pitch, left, right),
                         float(mode.tensions(np.array([mu]), np.array([ei]), np.array([length]), pitch, left, right)[0])):
                e = math.sqrt(ei / pull) / length
                sounded = mode.quotient(e, left, right) * math.sqrt(pull / mu) / (2.0 * length)
                worst = max(worst, abs(sounded / pitch - 1.0))
    return worst


def random_profiles():
    """Ends and crowns like those of necks with more relief and lower strings than any, so that many are touched."""
    rng = np.random.default_rng(7)
    for _ in range(200):
        s = np.cumsum(rng.uniform(8.0, 40.0, rng.integers(3, 22)))
        z = rng.uniform(0.0, 1.5) * (((s - s.mean()) / (np.ptp(s) / 2.0)) ** 2 - 1.0) + rng.uniform(-0.05, 0.05, len(s))
        yield (0.0, rng.uniform(-0.5, 0.8)), (s[-1] + rng.uniform(30.0, 300.0), rng.uniform(-0.8, 3.0)), s, z


def lengths_by_hull():
    """Largest difference in mm of path lengths from those along a convex hull (scipy.spatial)."""
    worst = 0.0
    for start, end, s, z in random_profiles():
        found = fretting.polyline([start] + [(s[i], z[i]) for i in fretting.taut(start, end, s, z)] + [end])
        cloud = np.array([start, end, (start[0], -500.0), (end[0], -500.0)] + list(zip(s, z)))
        corners = cloud[ConvexHull(cloud).vertices]
        upper = corners[corners[:, 1] > -400.0]
        worst = max(worst, abs(fretting.polyline(upper[np.argsort(upper[:, 0])]) - found))
    return worst


def lengths_by_minimum():
    """Largest difference in mm from the smallest length over all heights above the crowns."""
    worst = 0.0
    for start, end, s, z in itertools.islice(random_profiles(), 40):
        found = fretting.polyline([start] + [(s[i], z[i]) for i in fretting.taut(start, end, s, z)] + [end])
        x = np.concatenate([[start[0]], s, [end[0]]])

        def length(y, x=x, start=start, end=end):
            height = np.concatenate([[start[1]], y, [end[1]]])
            dx, dy = np.diff(x), np.diff(height)
            step = np.hypot(dx, dy)
            slope = dy / step
            # The excess over the flat length, so that few digits are lost.
            return (dy * dy / (step + dx)).sum() * 1e3, (slope[:-1] - slope[1:]) * 1e3
        best = minimize(length, np.maximum(z, 0.5) + 0.5, jac=True, method="L-BFGS-B", bounds=[(v, None) for v in z],
                        options={"ftol": 1e-16, "gtol": 1e-10, "maxiter": 5000, "maxfun": 50000})
        worst = max(worst, abs(best.fun * 1e-3 - (found - (x[-1] - x[0]))))
    return worst


def settings():
    """Ready settings of the plans used below."""
    for number in CASES:
        plan = plans.random_plan(number)
        strings = neck.build(plan)
        yield plan, saddles.Setting(plan, strings, fretting.Bench(plan, strings))


def parts_sum():
    """Largest difference in cents between an error and the sum of its four parts."""
    worst = 0.0
    for plan, setting in settings():
        for i in range(setting.count):
            o = setting.bench.sound([(i, 0.1, 1.3, list(range(1, plan["instrument"]["frets"] + 1)))], confirm=True)[0]
            total = o["length_part"] + o["tension_part"] + o["mass_part"] + o["stiffness_part"]
            worst = max(worst, np.abs(total - o["cents"]).max())
    return worst


def one_note_by_hand():
    """Largest difference in cents of errors from a scalar computation with brentq, one note at a time."""
    worst = 0.0
    for plan, setting in itertools.islice(settings(), 4):
        hold, slip = setting.bench.supports, setting.bench.slip
        for i, string in enumerate(setting.strings):
            near, far = fretting.contacts(string, 0.2, 2.0)
            opened = math.dist(near, far)
            pull = mode.tension(string.unit_mass, string.bending_nm2, opened * 1e-3, string.frequency, hold["nut"], hold["saddle"])
            for fret in (1, 5, 12):
                note = fretting.press(string, fret, near, far, setting.bench.pressing)
                spread = opened + slip["head"] * string.head + slip["tail"] * string.tail
                strain = (1.0 + pull / string.axial_n) * (1.0 + (note.path - opened) / spread) - 1.0
                tight = string.axial_n * strain
                mass = string.unit_mass * (1.0 + pull / string.axial_n) / (1.0 + strain)
                e = math.sqrt(string.bending_nm2 / tight) / (note.speaking * 1e-3)
                sounded = mode.quotient(e, hold["fret"], hold["saddle"]) * math.sqrt(tight / mass) / (2e-3 * note.speaking)
                cents = 1200.0 * math.log2(sounded / (string.frequency * string.ratios[fret - 1]))
                worst = max(worst, abs(cents - setting.bench.sound([(i, 0.2, 2.0, [fret])])[0]["cents"][0]))
    return worst


def squared(setting, nuts, crests):
    """Residuals over the fit's frets of all strings."""
    return np.concatenate([o["cents"] for o in setting.bench.sound(
        [(i, n, c, setting.fit_frets[i]) for i, (n, c) in enumerate(zip(nuts, crests))])])


def separate_by_scipy():
    """Largest difference in mm of separate and straight least-squares setbacks from scipy's bounded solver."""
    worst = 0.0
    for _, setting in settings():
        zero = np.zeros(setting.count)
        for style in ("separate", "straight"):
            found = setting.solve(style, "least_squares", "fixed")[1]
            problem = saddles.Problem(setting, setting.pieces(style), "fixed", zero, setting.fit_frets)
            low, high = setting.saddle_travel
            start = np.clip(np.full(len(problem.lower), 1.0), low + 0.01, high - 0.01)
            # Scipy stops on the smallest gain; starting again from there takes it down to the noise.
            for _ in range(3):
                start = least_squares(lambda x: squared(setting, zero, problem.crests(x)), start, bounds=(low, high),
                                      jac="3-point", diff_step=1e-3, method="dogbox", xtol=1e-15, ftol=1e-15, gtol=1e-13).x
            other = problem.crests(start)
            if np.all(other > low - 1e-9) and np.all(other < high + 1e-9):
                worst = max(worst, np.abs(found - other).max())
    return worst


def minimax_by_search():
    """Largest difference in mm of separate minimax crests from a golden-section search."""
    worst = 0.0
    for _, setting in settings():
        found = setting.solve("separate", "minimax", "fixed")[1]
        for i in range(setting.count):
            def largest(crest, i=i, setting=setting):
                return float(np.abs(setting.bench.sound([(i, 0.0, crest, setting.fit_frets[i])])[0]["cents"]).max())
            best = minimize_scalar(largest, bounds=setting.saddle_travel, method="bounded", options={"xatol": 1e-10})
            worst = max(worst, abs(best.x - found[i]))
    return worst


def strip_by_turning():
    """Largest difference in mm of the narrowest strip's half width from a search over directions."""
    rng = np.random.default_rng(3)
    worst = 0.0
    for _ in range(60):
        points = np.column_stack([650.0 + rng.uniform(-3.0, 3.0, 6), np.linspace(27.0, -27.0, 6) + rng.uniform(-0.5, 0.5, 6)])
        width = optimise.narrowest_strip(points)[2]

        def half(turn, start=0.0, points=points):
            return np.ptp(points @ np.array([math.cos(start + turn), math.sin(start + turn)])) / 2.0
        grid = np.linspace(-0.3, 0.3, 601)
        start = grid[np.argmin([half(a) for a in grid])]
        # The turn is counted from the best of the grid: scipy's search is as fine as the number is small.
        for reach in (2e-3, 1e-6, 1e-9):
            best = minimize_scalar(half, bounds=(-reach, reach), args=(start,), method="bounded", options={"xatol": 1e-16})
            start += best.x
        worst = max(worst, abs(best.fun - width))
    return worst


CHECKS = [
    (mode_in_many_digits, 1e-12, "relative"), (published_modes, 1e-9, "cent"), (mode_by_elements, 2e-5, "cent"),
    (tension_back, 1e-12, "relative"), (lengths_by_hull, 1e-10, "mm"), (lengths_by_minimum, 1e-6, "mm"),
    (parts_sum, 1e-9, "cent"), (one_note_by_hand, 1e-8, "cent"), (separate_by_scipy, 1e-6, "mm"),
    (minimax_by_search, 1e-6, "mm"), (strip_by_turning, 1e-9, "mm"),
    # SLSQP stops where the noise of the errors hides what is left to gain: some 1e-6 mm.
    (selftest_styles.squares_by_slsqp, 1e-5, "mm"), (selftest_styles.minimax_by_slsqp, 1e-8, "cent"),
]


def main():
    """Runs every check."""
    bad = 0
    for check, allowed, unit in CHECKS:
        worst = check()
        bad += not worst <= allowed
        print(f"{check.__name__:22} {worst:9.2e} {unit} (at most {allowed:.0e}) {'ok' if worst <= allowed else 'TOO LARGE'}", flush=True)
    return 1 if bad else 0


if __name__ == "__main__":
    sys.exit(main())
