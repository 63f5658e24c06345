"""What every reader does in the same way: numbers and pairs of bounds, exact, and refused by the place they stood."""

from __future__ import annotations

from collections.abc import Iterable
from fractions import Fraction

from polywalk.errors import ModelError, NumberError
from polywalk.exact import bound, exact, full


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
