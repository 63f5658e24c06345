"""What would have to give: the asked values nearest to a plan, and how far each constraint of a conflict must move."""

from __future__ import annotations

from fractions import Fraction

from polywalk.bigmodel import BigModel
from polywalk.linear import farkas
from polywalk.model import Model
from polywalk.narrowing.adding import changed, with_row, with_variable
from polywalk.narrowing.best import best
from polywalk.narrowing.tolerances import TOLERANCES

Named = tuple[tuple[str, Fraction], ...]


def nearby(big: BigModel, asked: Named) -> tuple[Named, bool]:
    """Values for what was asked that some plan has and that differ least, in total; () where there is no plan at all.

    One linear program: every value may be missed upward and downward at a price of 1 a unit, each in its own unit.

    Returns
    -------
    (tuple of (str, Fraction), bool)
        The values, and whether they are proved in fractions.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing.nearby import nearby
    >>> big = BigModel(("x", "y"), ("sum",), [0, 2], [0, 1], [1, 1], [0], [4], [0, 0], [3, 9])
    >>> nearby(big, (("x", Fraction(5)), ("y", Fraction(1))))
    ((('x', Fraction(3, 1)), ('y', Fraction(1, 1))), True)
    """
    wide, prices = changed(big, goal=None, cost=big.cost[:0], constant=0.0), dict[str, object]()
    for name, value in asked:
        place = wide.index(name)
        for end in ("less", "more"):
            wide = with_variable(wide, f"{name} {end}", 0.0)
            prices[wide.variables[-1]] = 1
        entries = [place, wide.n - 2, wide.n - 1], [1.0, 1.0, -1.0]
        wide = with_row(wide, f"{name} missed", entries, float(value), float(value))
    found = best(wide.with_objective(prices, "min"))
    if found.point is None:
        return (), False
    room = Fraction(0) if found.is_exact else Fraction(TOLERANCES.snap)
    near = []
    for name, value in asked:
        met = found.point[big.index(name)]
        near.append((name, value if abs(met - value) <= room * max(Fraction(1), abs(value)) else met))
    return tuple(near), found.is_exact


def ends(conflict: Model) -> Named:
    """The right-hand side at which each constraint of an irreducible conflict would end it, the others unchanged.

    The multipliers of such a conflict are unique: they add up to 0 <= total, a negative number, and a right-hand side
    that moves by -total / multiplier makes that 0 <= 0.

    Examples
    --------
    >>> from polywalk.narrowing import conflict
    >>> from polywalk.narrowing.nearby import ends
    >>> from polywalk.scenarios import harbour_row
    >>> [(name, int(rhs)) for name, rhs in ends(conflict(harbour_row("infeasible")))]
    [('harbour main', 14), ('town contract', 12)]
    """
    proof = farkas(conflict)
    if proof is None:
        return ()
    return tuple((name, conflict.constraint(name).rhs - proof.total / w) for name, w in proof.multipliers.items())
