"""Numbers: read exactly, kept as fractions, shown to people short or in full.

Decimals mean decimals: a float stands for the shortest decimal that prints as it, so 0.1 is 1/10.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from decimal import Decimal
from fractions import Fraction
from math import gcd, isfinite, lcm
from numbers import Integral, Rational

import numpy as np

from polywalk.errors import NumberError

Number = int | float | str | Decimal | Fraction | np.number
Row = tuple[Fraction, ...]

LARGEST_EXPONENT = 400
"""Text such as 1e999999999 would fill the memory; floats end at 1e308, so 400 leaves room for text."""

_INFINITIES = {sign + word for sign in ("", "+", "-") for word in ("inf", "infinity")}

DIGITS = 6
"""Significant digits of a rounded number."""


def exact(value: object) -> Fraction:
    """The value as an exact fraction.

    Parameters
    ----------
    value : int, float, str, Decimal, Fraction or numpy scalar
        Text may be a fraction ("1/3") or a decimal ("0.25", "2e-3"). A float means the shortest decimal that
        prints as it.

    Returns
    -------
    Fraction

    Raises
    ------
    NumberError
        For NaN, infinity, True and False, text that is no number, and any other type.

    Examples
    --------
    >>> from polywalk import exact
    >>> exact(0.1), exact("1/3"), exact("2e-3")
    (Fraction(1, 10), Fraction(1, 3), Fraction(1, 500))

    References
    ----------
    Steele & White, How to print floating-point numbers accurately, PLDI 1990 (the shortest decimal).
    """
    if isinstance(value, bool | np.bool_):
        raise NumberError(f"expected a number, got {value!r}; write 1 or 0 if that is meant.", culprit=value)
    if isinstance(value, Fraction):
        return value
    if isinstance(value, Integral | Rational):
        return Fraction(int(value)) if isinstance(value, Integral) else Fraction(value)
    if isinstance(value, float | np.floating | Decimal):
        if not _is_finite(value):
            raise NumberError(f"expected a finite number, got {value}; only a bound may be infinite.", culprit=value)
        return _from_text(str(value), value)
    if isinstance(value, str):
        return _from_text(value, value)
    if isinstance(value, np.ndarray) and value.ndim == 0:
        return exact(value[()])
    raise NumberError(f"expected a number, got {value!r} of type {type(value).__name__}.", culprit=value)


def _is_finite(value: float | np.floating | Decimal) -> bool:
    """Asked of a Decimal in its own terms: as a float 1e999 would be infinite, and a signalling NaN an error."""
    return value.is_finite() if isinstance(value, Decimal) else isfinite(value)


def _from_text(text: str, value: object) -> Fraction:
    exponent = text.lower().partition("e")[2].strip().lstrip("+-")
    if exponent.isdigit() and int(exponent[:9]) > LARGEST_EXPONENT:
        raise NumberError(f"{text!r} is beyond 1e±{LARGEST_EXPONENT}; scale the unit it is given in.", culprit=value)
    try:
        return Fraction(text)
    except ZeroDivisionError:
        raise NumberError(f"{text!r} divides by zero.", culprit=value) from None
    except ValueError:
        raise NumberError(f"expected a number such as 3, 0.25, 2e-3 or 1/3, got {text!r}.", culprit=value) from None


def bound(value: object, sign: int) -> Fraction | None:
    """A bound as an exact fraction, or None where there is none (None, or infinity on the open side).

    ``sign`` is -1 for a lower bound and +1 for an upper one: minus infinity is a lower bound that is not there,
    plus infinity an upper one; the wrong infinity allows nothing and is refused.
    """
    if value is None:
        return None
    if isinstance(value, str):
        infinite = value.strip().lower() in _INFINITIES
    else:
        infinite = isinstance(value, float | np.floating | Decimal) and str(value).lower() in _INFINITIES
    if not infinite:
        return exact(value)
    if (str(value).strip().startswith("-")) != (sign < 0):
        side, other = ("lower", "upper") if sign < 0 else ("upper", "lower")
        raise NumberError(
            f"{value} as {side} bound allows no value at all; were the {side} and {other} bound swapped?", culprit=value
        )
    return None


def integer_row(values: Sequence[Fraction]) -> tuple[tuple[int, ...], int]:
    """The row times its least common denominator, and that denominator."""
    scale = lcm(*[value.denominator for value in values])
    if scale == 1:
        return tuple([value.numerator for value in values]), 1
    return tuple([value.numerator * (scale // value.denominator) for value in values]), scale


def primitive(values: Sequence[Fraction]) -> Row:
    """The same direction in the smallest integers."""
    whole, _ = integer_row(values)
    divisor = gcd(*whole) or 1
    return tuple(Fraction(value // divisor) for value in whole)


def dot(left: Iterable[Fraction], right: Iterable[Fraction]) -> Fraction:
    """The exact inner product of two rows of equal length.

    Raises ValueError where the lengths differ.
    """
    return sum((a * b for a, b in zip(left, right, strict=True) if a and b), Fraction(0))


def full(value: Fraction) -> str:
    """The number in full: an integer, a finite decimal of up to six digits, else a fraction."""
    if value.denominator == 1:
        return str(value.numerator)
    decimal = _finite_decimal(value)
    return decimal if decimal is not None else f"{value.numerator}/{value.denominator}"


def short(value: Fraction) -> str:
    """The number as it fits on screen: in full where that is short, else ≈ and six significant digits."""
    text = full(value)
    if len(text) <= DIGITS + 3:
        return text
    return text if value.denominator == 1 and len(text) <= 12 else "≈" + rounded(value)


def rounded(value: Fraction) -> str:
    """Six significant digits, without trailing zeros."""
    try:
        return f"{float(value):.{DIGITS}g}"
    except OverflowError:
        return f"{Decimal(value.numerator) / Decimal(value.denominator):.{DIGITS - 1}E}"


def _finite_decimal(value: Fraction) -> str | None:
    """The decimal if it ends within six significant digits, else None."""
    rest = value.denominator
    for prime in (2, 5):
        while rest % prime == 0:
            rest //= prime
    if rest != 1 or value.denominator > 10**DIGITS:
        return None
    text = f"{Decimal(value.numerator) / Decimal(value.denominator):f}"
    return text if len(text.replace("-", "").replace(".", "").lstrip("0")) <= DIGITS else None


def linear(coefficients: Sequence[Fraction], names: Sequence[str], constant: Fraction = Fraction(0)) -> str:
    """Coefficients and names as people write them: "32 pump + 1/3 chips - tank + 5"; "0" when nothing is there."""
    terms = [(value, name) for value, name in zip(coefficients, names, strict=True) if value]
    if constant:
        terms.append((constant, ""))
    text = ""
    for value, name in terms:
        sign = ("-" if value < 0 else "") if not text else (" - " if value < 0 else " + ")
        size = short(abs(value))
        text += sign + (name if name and size == "1" else f"{size} {name}".rstrip())
    return text or "0"
