"""Two constrained optimisers and the narrowest strip, all on scipy's linear solvers.

* `least_squares`: sequence of linearised least-squares problems with linear inequalities, each solved
  exactly by Lawson and Hanson's reduction to non-negative least squares (Solving Least Squares Problems,
  chapter 23; scipy.optimize.nnls).
* `lexicographic_minimax`: sequence of linear programmes (scipy.optimize.linprog). The largest error of all
  strings is made smallest; strings that no optimum can better are then held there and the largest error
  of the rest is made smallest, and so on until every string is held. Where the joint optimum leaves
  something undetermined this settles it, without giving up anything of the joint optimum.
* `narrowest_strip`: the line with the smallest largest perpendicular distance to points (linprog).

A problem gives `evaluate(x) -> (list of residual arrays, list of Jacobians)`, one entry a string,
`lower`, `upper`, and `limits(x) -> (c, dc/dx)` with c >= 0 wanted.
"""

import numpy as np
from scipy.optimize import linprog, nnls

STEP_TOLERANCE = 1e-11
NOISE_MM = 1e-8
HELD_SLACKS = (2e-10, 2e-9, 2e-8)
# A gain of the largest error that is noise only, cents.
NOISE_CENTS = 1e-9
LP_OPTIONS = {"primal_feasibility_tolerance": 1e-10, "dual_feasibility_tolerance": 1e-10}
# A setback counts as settled by the joint minimax if all optima agree on it within this.
SETTLED_MM = 1e-4


def inequalities(problem, x):
    """Linearised limits and bounds at x as G dx >= h."""
    eye = np.eye(len(x))
    value, slope = problem.limits(x)
    matrix = np.vstack([eye, -eye, slope.reshape(-1, len(x))])
    bound = np.concatenate([problem.lower - x, x - problem.upper, -value])
    return matrix, bound


def constrained_step(residual, jacobian, matrix, bound):
    """dx that makes |residual + jacobian dx| smallest under matrix dx >= bound."""
    q, r = np.linalg.qr(jacobian)
    if np.abs(np.diag(r)).min() < 1e-9 * np.abs(np.diag(r)).max():
        raise ArithmeticError("the setbacks are not determined by these errors")
    free = q.T @ residual
    turned = np.linalg.solve(r.T, matrix.T).T
    wanted = bound + turned @ free
    if np.all(wanted <= 0.0):
        z = np.zeros(len(free))
    else:
        system = np.vstack([turned.T, wanted])
        target = np.zeros(len(free) + 1)
        target[-1] = 1.0
        u, _ = nnls(system, target, maxiter=200 * system.shape[1])
        miss = system @ u - target
        if abs(miss[-1]) < 1e-12:
            raise ArithmeticError("the limits cannot be met together")
        z = -miss[:-1] / miss[-1]
    return np.linalg.solve(r, z - free)


def least_squares(problem, start):
    """x with the smallest sum of squared residuals within the problem's limits."""
    x = np.array(start, float)
    before = np.inf
    for _ in range(60):
        residuals, jacobians = problem.evaluate(x)
        matrix, bound = inequalities(problem, x)
        step = constrained_step(np.concatenate(residuals), np.vstack(jacobians), matrix, bound)
        x = x + step
        size = np.abs(step).max()
        # Done when nothing moves, or when what still moves no longer shrinks: the noise of the derivatives.
        if size <= STEP_TOLERANCE or (size <= NOISE_MM and size > 0.3 * before):
            return x
        before = size
    raise ArithmeticError("least squares did not settle")


def minimax_step(residuals, jacobians, held, matrix, bound, reach):
    """One linear programme: smallest t with |e| <= t for free strings, |e| <= held value for the others.

    Held values carry the noise of the errors; where that leaves no room at all, a little more slack does.
    """
    for slack in HELD_SLACKS:
        found = programme(residuals, jacobians, held + slack, matrix, bound, reach)
        if found[0].status == 0:
            return found
    raise ArithmeticError("linear programme: " + found[0].message)


def programme(residuals, jacobians, held, matrix, bound, reach):
    """Sets the linear programme up and hands it to scipy: (answer, owner of each row, rows, right sides)."""
    size = matrix.shape[1]
    rows, right, owner = [], [], []
    for index, (e, j) in enumerate(zip(residuals, jacobians)):
        free = -1.0 if np.isnan(held[index]) else 0.0
        limit = 0.0 if free else held[index]
        for sign in (1.0, -1.0):
            rows.append(np.hstack([sign * j, np.full((len(e), 1), free)]))
            right.append(limit - sign * e)
            owner.extend([index] * len(e))
    rows.append(np.hstack([-matrix, np.zeros((len(matrix), 1))]))
    right.append(-bound)
    owner.extend([-1] * len(matrix))
    cost = np.zeros(size + 1)
    cost[-1] = 1.0
    answer = linprog(cost, A_ub=np.vstack(rows), b_ub=np.concatenate(right),
                     bounds=[(-reach, reach)] * size + [(0.0, None)], method="highs", options=LP_OPTIONS)
    return answer, np.array(owner), np.vstack(rows)[:, :-1], np.concatenate(right)


def minimax_stage(problem, x, held):
    """Repeats the linear programme until it predicts nothing better; returns x and the last programme."""
    reach = 2.0
    for count in range(80):
        residuals, jacobians = problem.evaluate(x)
        matrix, bound = inequalities(problem, x)
        answer, owner, rows, right = minimax_step(residuals, jacobians, held, matrix, bound, reach)
        step = answer.x[:-1]
        free = [i for i in range(len(residuals)) if np.isnan(held[i])]
        now = max(np.abs(residuals[i]).max() for i in free)
        kept = max([np.abs(residuals[i]).max() - held[i] for i in range(len(residuals)) if i not in free] + [0.0])
        met = bool(np.all(bound <= 1e-9)) and kept <= 1e-9
        x = x + step
        if np.abs(step).max() <= 1e-10 or (met and count > 3 and abs(now - answer.x[-1]) <= NOISE_CENTS):
            return x, answer, owner, rows, right
        if count > 8:
            reach = max(0.6 * reach, 1e-6)
    raise ArithmeticError("minimax did not settle")


def settled(answer, owner, rows, right, held, tightness):
    """For every row of `tightness` (a linear form of x): do all optima of this stage agree on it?"""
    limit = right.copy()
    free = np.array([i >= 0 and np.isnan(held[i]) for i in owner])
    limit[free] += answer.x[-1]
    limit = limit + 1e-9
    result = []
    for form in tightness:
        ends = []
        for sign in (1.0, -1.0):
            found = linprog(sign * form, A_ub=rows, b_ub=limit, bounds=[(-4.0, 4.0)] * rows.shape[1],
                            method="highs", options=LP_OPTIONS)
            if found.status != 0:
                raise ArithmeticError("linear programme: " + found.message)
            ends.append(sign * found.fun)
        result.append(bool(ends[1] - ends[0] < SETTLED_MM))
    return result


def lexicographic_minimax(problem, start):
    """(x, worst value of every string, is each crest settled by the joint optimum, is all that strings share)."""
    x = np.array(start, float)
    residuals, _ = problem.evaluate(x)
    held = np.full(len(residuals), np.nan)
    determined = None
    while np.isnan(held).any():
        x, answer, owner, rows, right = minimax_stage(problem, x, held)
        weight = np.abs(answer.ineqlin.marginals)
        if determined is None:
            forms = problem.crest_forms(x), problem.shared_forms(x)
            determined, shared = (settled(answer, owner, rows, right, held, form) for form in forms)
        binding = {int(i) for i in np.unique(owner[weight > 1e-7]) if i >= 0 and np.isnan(held[i])}
        residuals, _ = problem.evaluate(x)
        if not binding:
            raise ArithmeticError("no string binds")
        for i in binding:
            held[i] = np.abs(residuals[i]).max()
    return x, held, determined, all(shared)


def narrowest_strip(points):
    """(point on the line, unit direction, half width) of the line nearest to all points in the largest distance."""
    points = np.asarray(points, float)
    centre = points.mean(axis=0)
    along = points[0] - points[-1]
    along = along / np.hypot(*along)
    for _ in range(60):
        across = np.array([along[1], -along[0]])
        local = points - centre
        t, u = local @ along, local @ across
        # u = offset + slope t + miss, |miss| <= width.
        ones = np.ones_like(t)
        answer = linprog([0.0, 0.0, 1.0],
                         A_ub=np.vstack([np.column_stack([-ones, -t, -ones]), np.column_stack([ones, t, -ones])]),
                         b_ub=np.concatenate([-u, u]), bounds=[(None, None), (None, None), (0.0, None)],
                         method="highs", options=LP_OPTIONS)
        if answer.status != 0:
            raise ArithmeticError("linear programme: " + answer.message)
        offset, slope, width = answer.x
        centre = centre + offset * across
        turned = along + slope * across
        along = turned / np.hypot(*turned)
        if abs(slope) < 1e-13 or abs(slope) * np.ptp(t) < 1e-11:
            return centre, along, width
    raise ArithmeticError("the strip did not settle")
