"""First mode of a stiff string under tension between rotational springs.

The beam equation EI y'''' - T y'' = mu w^2 y on 0..L is written with the length L, the tension T and the
unit mass mu as units. Then e = sqrt(EI/(T L^2)) is the only property of the string, w is the angular
frequency, and y is a sum of cos(b x), sin(b x), exp(-a x) and exp(-a (1 - x)) with
a^2 - b^2 = 1/e^2 and a b = w/e. The four end conditions (no deflection; bending moment equal to that of
the spring) give a 4 x 4 determinant that vanishes at a mode. No characteristic equation is derived from
it by hand: the determinant itself is evaluated, and its root found.

The end fixity k, 0 pinned to 1 clamped, stands for the spring K = k/(1 - k) sqrt(T EI).
"""

import numpy as np
from scipy.optimize import brentq

ROOT_TOLERANCE = 1e-13


def determinant(e, w, k_left, k_right):
    """Boundary determinants for arrays of e (stiffness), w (angular frequency) and the two fixities."""
    e, w, k_left, k_right = np.broadcast_arrays(*(np.asarray(v, float) for v in (e, w, k_left, k_right)))
    b_squared = 2.0 * w * w / (1.0 + np.sqrt(1.0 + 4.0 * (e * w) ** 2))
    b = np.sqrt(b_squared)
    a = np.sqrt(b_squared + 1.0 / (e * e))
    far = np.exp(-a)
    eb, ea = e * b, e * a
    cos, sin = np.cos(b), np.sin(b)
    rows = np.empty(e.shape + (4, 4))
    one, zero = np.ones_like(e), np.zeros_like(e)
    # Deflection at the left and at the right end.
    rows[..., 0, :] = np.stack([one, zero, one, far], axis=-1)
    rows[..., 1, :] = np.stack([cos, sin, far, one], axis=-1)
    # Left: (1 - k) e^2 y'' - k e y' = 0; right: (1 - k) e^2 y'' + k e y' = 0.
    loose, tight = 1.0 - k_left, k_left
    rows[..., 2, :] = np.stack(
        [-loose * eb**2, -tight * eb, loose * ea**2 + tight * ea, (loose * ea**2 - tight * ea) * far], axis=-1)
    loose, tight = 1.0 - k_right, k_right
    rows[..., 3, :] = np.stack(
        [-loose * eb**2 * cos - tight * eb * sin, -loose * eb**2 * sin + tight * eb * cos,
         (loose * ea**2 - tight * ea) * far, loose * ea**2 + tight * ea], axis=-1)
    return np.linalg.det(rows)


def quotient(e, k_left, k_right):
    """First mode over that of the flexible string (one value), by bracketing the determinant's root."""
    def miss(q):
        return float(determinant(e, np.pi * q, k_left, k_right))
    return brentq(miss, 0.999, 1.5, xtol=ROOT_TOLERANCE, rtol=ROOT_TOLERANCE, maxiter=200)


def tension(unit_mass, bending, length, frequency, k_left, k_right):
    """Tension (N) at which the first mode is exactly `frequency`; SI units, one value."""
    flexible = unit_mass * (2.0 * length * frequency) ** 2

    def miss(share):
        pull = share * flexible
        e = np.sqrt(bending / pull) / length
        return float(determinant(e, 2.0 * np.pi * frequency * length * np.sqrt(unit_mass / pull), k_left, k_right))
    share = brentq(miss, 0.45, 1.001, xtol=ROOT_TOLERANCE, rtol=ROOT_TOLERANCE, maxiter=200)
    return share * flexible


def _secant(miss, first, second, rounds=40):
    """Roots of a vector function by the secant rule, element by element; stops when nothing moves."""
    x0, x1 = first, second
    f0, f1 = miss(x0), miss(x1)
    for _ in range(rounds):
        slope = f1 - f0
        step = np.where(slope != 0.0, -f1 * (x1 - x0) / np.where(slope != 0.0, slope, 1.0), 0.0)
        step = np.clip(step, -0.1, 0.1)
        x0, f0 = x1, f1
        x1 = x1 + step
        if np.all(np.abs(step) <= 4e-16 * np.abs(x1)):
            return x1
        f1 = miss(x1)
        # The noise floor: a further step would only follow rounding.
        if np.all(np.abs(step) <= ROOT_TOLERANCE * np.abs(x1)):
            return x1
    raise ArithmeticError("the determinant's root was not reached")


def _confirm(miss, root):
    """Raises unless each root is enclosed by a change of sign within 1e-12 of itself."""
    low, high = miss(root * (1.0 - 1e-12)), miss(root * (1.0 + 1e-12))
    if not np.all(low * high < 0.0):
        raise ArithmeticError("a root is not enclosed")


def quotients(e, k_left, k_right, confirm=False):
    """As `quotient`, for arrays."""
    e = np.asarray(e, float)
    if np.any(e <= 0.0) or np.any(e > 0.06):
        raise ArithmeticError("stiffness outside the range that the bracket was made for")

    def miss(q):
        return determinant(e, np.pi * q, k_left, k_right)
    root = _secant(miss, np.full(e.shape, 1.0), np.full(e.shape, 1.05))
    if np.any(root < 0.999) or np.any(root > 1.5):
        raise ArithmeticError("not the first mode")
    if confirm:
        _confirm(miss, root)
    return root


def tensions(unit_mass, bending, length, frequency, k_left, k_right, confirm=False):
    """As `tension`, for arrays."""
    flexible = unit_mass * (2.0 * length * frequency) ** 2

    def miss(share):
        pull = share * flexible
        e = np.sqrt(bending / pull) / length
        return determinant(e, 2.0 * np.pi * frequency * length * np.sqrt(unit_mass / pull), k_left, k_right)
    root = _secant(miss, np.full(np.shape(length), 1.0), np.full(np.shape(length), 0.96))
    if np.any(root < 0.45) or np.any(root > 1.001):
        raise ArithmeticError("not the first mode")
    if confirm:
        _confirm(miss, root)
    return root * flexible
