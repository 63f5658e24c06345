"""Numbers in a picture: exact where that reads well, else decimals with digits enough to tell those of a list apart."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from decimal import Decimal
from fractions import Fraction
from functools import partial

from polywalk.exact import DIGITS, full
from polywalk.model import SIGN, Constraint

MOST_DIGITS = 12
"""Numbers that agree in so many significant digits are written alike."""

LARGEST_DENOMINATOR = 100
"""A fraction with a larger one, such as 8744/2975, reads better as a decimal."""

LONGEST, LONGEST_INTEGER = 9, 15
"""Characters of a number in full, and of an integer."""

PLAIN = (Fraction(1, 10**5), Fraction(10**15))
"""Sizes that are written without a power of ten."""

Written = Callable[[Fraction], str]


def brief(value: Fraction, digits: int = DIGITS) -> str:
    """A number of a picture; what is rounded starts with ≈.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.drawing.numbers import brief
    >>> brief(Fraction(1, 3)), brief(Fraction(8744, 2975)), brief(Fraction(14437523, 10)), brief(Fraction(5, 4))
    ('1/3', '≈2.93916', '≈1443750', '1.25')
    """
    text = full(value)
    longest = LONGEST_INTEGER if value.denominator == 1 else LONGEST
    odd = "/" in text and value.denominator > LARGEST_DENOMINATOR
    if not odd and len(text) <= longest:
        return text
    decimal = _decimal(value, digits)
    return decimal if Fraction(decimal) == value else f"≈{decimal}"


def _decimal(value: Fraction, digits: int) -> str:
    try:
        text = f"{float(value):.{digits}g}"
    except OverflowError:
        return f"{Decimal(value.numerator) / Decimal(value.denominator):.{digits - 1}E}"
    return f"{Decimal(text):f}" if "e" in text and PLAIN[0] <= abs(value) < PLAIN[1] else text


def apart(values: Iterable[Fraction]) -> Written:
    """How to write the numbers of one list: with six digits, or as many more as tell its numbers apart.

    Examples
    --------
    >>> from polywalk import exact
    >>> from polywalk.drawing.numbers import apart
    >>> costs = [exact("1443752.31234"), exact("1443752.34"), exact(1443800)]
    >>> [apart(costs)(cost) for cost in costs]
    ['≈1443752.31', '1443752.34', '1443800']
    """
    known = set(values)
    for digits in range(DIGITS, MOST_DIGITS):
        if len({brief(value, digits) for value in known}) == len(known):
            return partial(brief, digits=digits)
    return partial(brief, digits=MOST_DIGITS)


def row_text(row: Constraint, variables: Sequence[str], rhs: Written = brief) -> str:
    """A constraint as people write it, in the numbers of a picture."""
    text = ""
    for value, name in ((value, name) for value, name in zip(row.coefficients, variables, strict=True) if value):
        sign = ("-" if value < 0 else "") if not text else (" - " if value < 0 else " + ")
        text += f"{sign}{name}" if abs(value) == 1 else f"{sign}{brief(abs(value))} {name}"
    return f"{text or '0'} {SIGN[row.sense]} {rhs(row.rhs)}"
