"""What every reader does in the same way: bounds and two-sided rows become named constraints."""

from __future__ import annotations

from collections.abc import Iterable
from fractions import Fraction

from polywalk.errors import ModelError, NumberError
from polywalk.exact import Row, bound, exact, full
from polywalk.model import Constraint


def number(value: object, where: str) -> Fraction:
    """The exact value; a refusal says where it stood."""
    try:
        return exact(value)
    except NumberError as error:
        raise NumberError(f"{where}: {error}", culprit=value) from None


def limit(value: object, sign: int, where: str) -> Fraction | None:
    """The exact bound or None; ``sign`` is -1 for a lower and +1 for an upper one."""
    try:
        return bound(value, sign)
    except NumberError as error:
        raise NumberError(f"{where}: {error}", culprit=value) from None


def pair(value: object, where: str) -> tuple[Fraction | None, Fraction | None]:
    """A (lower, upper) pair, exact; a lower bound above its partner is refused."""
    ends = list(value) if isinstance(value, Iterable) and not isinstance(value, str) else [value]
    if len(ends) != 2:
        raise ModelError(f"{where}: expected a pair (lower, upper) with None for no bound, got {value!r}.", value)
    lower, upper = limit(ends[0], -1, where), limit(ends[1], +1, where)
    if lower is not None and upper is not None and lower > upper:
        raise ModelError(
            f"{where}: the lower bound {full(lower)} is above the upper bound {full(upper)}; swap or correct them.",
            where,
        )
    return lower, upper


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
