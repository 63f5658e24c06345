"""The sizes at which a check speaks up. None of them decides what is true; each says from where on it is told."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction


@dataclass(frozen=True)
class Limits:
    """From where on a check speaks up. The defaults are common practice, no source.

    Parameters
    ----------
    near_tie : Fraction
        A second-best vertex is near when it is worse by at most this share of the optimal value.
    near_tie_amount : Fraction or None
        The same as an amount of the objective; where given, it replaces the share.
    spread : Fraction
        Largest over smallest absolute coefficient: beyond 1e6 a solver with feasibility tolerance 1e-6 cannot see
        the smallest term of a row.
    angle : Fraction
        Sine of the angle between two constraints below which they count as nearly parallel: 1/1000 is 0.06 degrees.
    sliver : Fraction
        Width over length of a region below which it counts as a sliver.
    loose : Fraction
        How many times larger than what the region can reach a constant must be to count as loose.
    conflicts : int
        The most constraints for which all irreducible conflicts are listed; beyond, one is. Of 20 random rows in 2
        to 5 variables there are up to 1840, listed in two seconds.
    solver : Fraction
        The feasibility tolerance of common solvers, 1e-6: a smaller contradiction may go unnoticed.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.reviewing import Limits
    >>> Limits(near_tie=Fraction(1, 20)).angle
    Fraction(1, 1000)
    """

    near_tie: Fraction = Fraction(1, 100)
    near_tie_amount: Fraction | None = None
    spread: Fraction = Fraction(10**6)
    angle: Fraction = Fraction(1, 1000)
    sliver: Fraction = Fraction(1, 1000)
    loose: Fraction = Fraction(10)
    conflicts: int = 20
    solver: Fraction = Fraction(1, 10**6)
