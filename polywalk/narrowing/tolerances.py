"""The only tolerances and sizes of the room, each with its reason."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from math import floor


@dataclass(frozen=True)
class Tolerances:
    """How far floats may be off, and up to which size everything is exact.

    Parameters
    ----------
    nonzeros : int
        Up to so many nonzeros a shadow is rebuilt in rational arithmetic. A basis of a model of this size took 10 to
        60 milliseconds to solve exactly, a hundred vertices a few seconds: what people wait for.
    cells : int
        Variables times constraints up to which the dense exact simplex mends what HiGHS got wrong within its
        tolerance; it keeps every zero and pivots in Python, about a second at this size.
    touch : float
        A facet of a float shadow counts as proved where the model reaches no further beyond it than this share of the
        shadow's size: a little more than ``solver``, since a point is off by a few of these.
    meet : float
        How far, as a share of the shadow's size, facets of a float shadow may be moved to meet in one corner: a few
        ``touch``, since a corner of four facets is off by what all four are.
    solver : float
        HiGHS's ``primal_feasibility_tolerance`` and ``dual_feasibility_tolerance``. Its default of 1e-7 hides corners
        that stand out by less (Goldfarb's cube of 7 variables has such); it accepts nothing below 1e-10.
    snap : float
        How far, relative to its size (absolute below 1), a solver's number may be moved to a simple fraction: as far
        as HiGHS may be off itself.
    simple : int
        The largest denominator of a simple fraction.
    lucky : float
        How rarely a number may look like a simple fraction by chance.
    digits : int
        Significant decimal digits of a number that is near no simple fraction: a double has nearly 16, and facets
        that meet at a small angle make much of the last ones.
    violation : Fraction
        A constraint violated by no more than this, relative to the size of its right-hand side, is "within solver
        tolerance": ten times HiGHS's 1e-7, since HiGHS tests the model it has scaled.
    zero : float
        A multiplier below this share of the largest one is rounding, not an answer.
    """

    nonzeros: int = 8_000
    cells: int = 40_000
    touch: float = 2e-9
    meet: float = 1e-8
    solver: float = 1e-9
    snap: float = 1e-9
    simple: int = 100_000
    lucky: float = 1e-3
    digits: int = 14
    violation: Fraction = Fraction(1, 10**6)
    zero: float = 1e-7


TOLERANCES = Tolerances()
"""Those that are used."""


def snapped(value: float) -> Fraction:
    """The simple fraction a solver's number stands for; a decimal of few digits where there is none near.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.narrowing.tolerances import snapped
    >>> snapped(0.333333333341), snapped(3.1415926535897931) == Fraction("3.1415926535898")
    (Fraction(1, 3), True)
    """
    near = simple(value)
    return Fraction(f"{value:.{TOLERANCES.digits - 1}e}") if near is None else near


def simple(value: float) -> Fraction | None:
    """The simple fraction that a number is nearly equal to, None where there is none.

    A fraction p/q counts as meant where it is closer than chance: numbers come within ``lucky``/q^2 of a fraction of
    denominator q about that rarely (continued fractions).
    """
    room, rest = TOLERANCES.snap * max(1.0, abs(value)), value
    top, above, now, before = 1, 0, 0, 1
    while now <= TOLERANCES.simple:
        part = floor(rest)
        top, above, now, before = part * top + above, top, part * now + before, now
        error = abs(value - top / now)
        if error <= room and error * now * now <= TOLERANCES.lucky:
            return Fraction(top, now) if now <= TOLERANCES.simple else None
        if rest == part:
            return None
        rest = 1 / (rest - part)
    return None
