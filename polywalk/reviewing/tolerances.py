"""The only tolerances of the room, each with its reason; nothing else is ever compared with rounding."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction


@dataclass(frozen=True)
class Tolerances:
    """How far a solver's rounded number may lie from the exact one and still be called the same.

    Every tolerance is relative to the size of what it is compared with, and absolute below size 1.

    Parameters
    ----------
    feasibility : Fraction
        Of a constraint, relative to its right-hand side. HiGHS stops at 1e-7 on the model it has scaled (its option
        ``primal_feasibility_tolerance``); back in the user's units, and printed with seven digits, ten times as much.
    objective : Fraction
        Of the objective, relative to the optimal value: what feasibility leaves open, and seven printed digits.
    price : Fraction
        Of a shadow price or reduced cost, relative to the price. HiGHS stops at 1e-7 here too
        (``dual_feasibility_tolerance``); ten times as much for the same reasons.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.reviewing.tolerances import TOLERANCES, within
    >>> within(Fraction(1, 10**7), Fraction(12), TOLERANCES.feasibility)
    True

    References
    ----------
    Huangfu & Hall, Parallelizing the dual revised simplex method, Math. Prog. Comp. 10, 2018 (HiGHS).
    """

    feasibility: Fraction = Fraction(1, 10**6)
    objective: Fraction = Fraction(1, 10**6)
    price: Fraction = Fraction(1, 10**6)


TOLERANCES = Tolerances()
"""Those that are used."""


STATED = (
    f"solver tolerance: {float(TOLERANCES.feasibility):g} of a right-hand side, {float(TOLERANCES.objective):g} of the "
    f"optimal value, {float(TOLERANCES.price):g} of a price (below size 1, as of 1)"
)
"""The same in words."""


def within(off: Fraction, size: Fraction, tolerance: Fraction) -> bool:
    """Whether a number is off by no more than the tolerance allows at this size."""
    return abs(off) <= tolerance * max(Fraction(1), abs(size))
