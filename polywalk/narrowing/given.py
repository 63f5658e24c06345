"""What people hand over beside a big model: names of variables, and values by name or in the model's order."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from fractions import Fraction
from typing import Any

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError, NumberError
from polywalk.exact import exact

Values = Mapping[str, object] | Iterable[object]


def names_of(given: Iterable[str], what: str, most: int | None = None) -> tuple[str, ...]:
    """The names, at least one and at most so many.

    Raises
    ------
    ModelError
        No names, too many, or no list of names.

    Examples
    --------
    >>> from polywalk.narrowing.given import names_of
    >>> names_of(["pump", "tank"], "the variables to keep")
    ('pump', 'tank')
    """
    found = () if isinstance(given, str) or not isinstance(given, Iterable) else tuple(given)
    if not found or (most is not None and len(found) > most):
        raise ModelError(f"expected the names of {what}, as a list, got {given!r}.", given)
    return found


def values_of(big: BigModel, given: Values | Any) -> dict[str, object]:
    """The values by name: from names and values (a dict, a pandas.Series), or a list in the order of the variables.

    Raises
    ------
    ModelError
        Neither, or a list of another length.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing.given import values_of
    >>> values_of(BigModel(("x", "y"), (), [0], [], [], [], [], [0, 0], [9, 9]), [3, 4])
    {'x': 3, 'y': 4}
    """
    if hasattr(given, "items"):
        pairs = list(given.items())
    elif isinstance(given, str) or not isinstance(given, Iterable):
        raise ModelError(f"expected names and values, or a list of values, got {given!r}.", given)
    else:
        listed = list(given)
        if len(listed) != big.n:
            raise ModelError(f"expected {big.n} values, one a variable of the big model, got {len(listed)}.", listed)
        pairs = list(zip(big.variables, listed, strict=True))
    return {name: value.item() if hasattr(value, "item") else value for name, value in pairs}


def named_number(name: str, value: object) -> Fraction:
    """The value of a variable, exactly; an error names the variable.

    Raises
    ------
    NumberError
        It is no number.

    Examples
    --------
    >>> from polywalk.narrowing.given import named_number
    >>> named_number("pump", "1/3")
    Fraction(1, 3)
    """
    try:
        return exact(value)
    except NumberError as error:
        raise NumberError(f"{name!r}: {error}", error.culprit) from None
