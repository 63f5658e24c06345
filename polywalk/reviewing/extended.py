"""Exact numbers that may also be infinite, and intervals between them, as people read them."""

from __future__ import annotations

from fractions import Fraction
from math import inf

from polywalk.exact import short

Extended = Fraction | float
"""A Fraction, or plus or minus infinity (the only floats allowed here)."""

INFINITY = inf


def shown(value: Extended) -> Fraction | str:
    """The value for a table: a Fraction stays one, infinity becomes its sign."""
    if isinstance(value, Fraction):
        return value
    return "∞" if value > 0 else "-∞"


def told(value: Extended) -> str:
    """The value as text."""
    return short(value) if isinstance(value, Fraction) else str(shown(value))


def span(low: Extended, high: Extended) -> str:
    """An interval in words: "from 4 to 16/3", "up to 7", "any value"."""
    below, above = not isinstance(low, Fraction), not isinstance(high, Fraction)
    if below and above:
        return "any value"
    if below:
        return f"up to {told(high)}"
    if above:
        return f"{told(low)} and more"
    return f"only {told(low)}" if low == high else f"from {told(low)} to {told(high)}"
