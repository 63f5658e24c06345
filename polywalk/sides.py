"""How a two-sided row and the bounds of a variable become named constraints: one convention for every source."""

from __future__ import annotations

from fractions import Fraction

from polywalk.exact import Row
from polywalk.model import Constraint


def unit_row(place: int, n: int) -> Row:
    """The coefficients of one variable alone."""
    return tuple(Fraction(int(j == place)) for j in range(n))


def bound_rows(
    name: str, row: Row, lower: Fraction | None, upper: Fraction | None, origin: str = ""
) -> list[Constraint]:
    """The bounds of a variable: "x lower" and "x upper", or "x fixed" where both are the same number."""
    if lower is not None and lower == upper:
        return [Constraint(f"{name} fixed", row, "==", lower, origin)]
    return _sides((f"{name} lower", f"{name} upper"), row, lower, upper, origin)


def sided_rows(
    name: str, row: Row, lower: Fraction | None, upper: Fraction | None, origin: str = ""
) -> list[Constraint]:
    """A row between two sides: "row lower" and "row upper", or one constraint of the row's own name."""
    if lower is not None and lower == upper:
        return [Constraint(name, row, "==", lower, origin)]
    if lower is None or upper is None:
        return _sides((name, name), row, lower, upper, origin)
    return _sides((f"{name} lower", f"{name} upper"), row, lower, upper, origin)


def _sides(
    names: tuple[str, str], row: Row, lower: Fraction | None, upper: Fraction | None, origin: str
) -> list[Constraint]:
    rows = []
    if lower is not None:
        rows.append(Constraint(names[0], row, ">=", lower, origin))
    if upper is not None:
        rows.append(Constraint(names[1], row, "<=", upper, origin))
    return rows
