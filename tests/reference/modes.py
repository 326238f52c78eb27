"""Writes `modes.csv`: modes of stiff strings in many digits, over the whole range of stiffness, fixity and mode number.

The determinant of the self-test is evaluated in as many digits as its hyperbolic functions lose, and its roots are
counted: mode n is the n-th change of sign from below. `python3 modes.py`.
"""

import csv
import itertools
import pathlib

import mpmath

from selftest import many_digits

STIFFNESS = ("0.0004", "0.003", "0.0105", "0.0195", "0.0235", "0.06", "0.4", "3", "150")
FIXITIES = (("0", "0"), ("0", "1"), ("0.3", "0.5"), ("0.5", "0.5"), ("0.85", "0.1"), ("1", "0.6"), ("1", "1"))
MODES = (1, 2, 3, 7)
# Shares of a mode's spacing at which the sign is looked at: neighbouring modes lie nearly a spacing apart.
STEPS = 24


def roots(stiffness, left, right, count):
    """The first `count` modes over the first of the flexible string, each divided by its number."""
    def miss(place):
        # The determinant's argument is the frequency; even steps of the wave number keep the modes evenly apart.
        wave = place * mpmath.pi
        return many_digits(stiffness, place * mpmath.sqrt(1 + (stiffness * wave) ** 2), left, right)

    found, low = [], mpmath.mpf("0.02")
    below = miss(low)
    while len(found) < count:
        high = low + mpmath.mpf(1) / STEPS
        above = miss(high)
        if above == 0:
            high += mpmath.mpf(1) / (7 * STEPS)
            above = miss(high)
        if (above > 0) != (below > 0):
            place = mpmath.findroot(miss, (low, high), solver="anderson", tol=mpmath.mpf(10) ** -30, verify=False)
            number = len(found) + 1
            found.append(place * mpmath.sqrt(1 + (stiffness * place * mpmath.pi) ** 2) / number)
        low, below = high, above
    return found


def main():
    """Writes the table."""
    path = pathlib.Path(__file__).resolve().parent / "modes.csv"
    with path.open("w", encoding="utf-8", newline="") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(["mode", "epsilon", "fixity_first", "fixity_second", "ratio"])
        for text, (left, right) in itertools.product(STIFFNESS, FIXITIES):
            with mpmath.workdps(int(0.9 / float(text)) + 60):
                ratios = roots(mpmath.mpf(text), mpmath.mpf(left), mpmath.mpf(right), max(MODES))
                for number in MODES:
                    writer.writerow([number, text, left, right, mpmath.nstr(ratios[number - 1], 18)])


if __name__ == "__main__":
    main()
