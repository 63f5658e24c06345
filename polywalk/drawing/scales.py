"""Numbers along an axis: very large and very small ones in powers of a thousand, which the axis's title states."""

from __future__ import annotations

from math import floor, log10

HIGH, LOW = 1e5, 1e-3
"""From such numbers on they are written as multiples of a power; between, as they are."""

RAISED = str.maketrans("-0123456789", "⁻⁰¹²³⁴⁵⁶⁷⁸⁹")


def power_of(low: float, high: float) -> int:
    """The power of ten that an axis's numbers are multiples of: 0, or a multiple of 3.

    Examples
    --------
    >>> from polywalk.drawing.scales import power_of
    >>> [power_of(0, size) for size in (50_000, 4_000_000, 0.5, 0.000004)]
    [0, 6, 0, -6]
    """
    size = max(abs(low), abs(high))
    return 0 if not size or LOW <= size < HIGH else 3 * floor(log10(size) / 3)


def written(value: float, power: int) -> str:
    """A number of an axis, as a multiple of its power."""
    text = f"{value / 10.0**power:.12g}".replace("-", "−")
    return "0" if text == "−0" else text


def stated(title: str, power: int) -> str:
    """The title of an axis, with the power of its numbers.

    Examples
    --------
    >>> from polywalk.drawing.scales import stated
    >>> stated("pump [MW]", 6), stated("pump [MW]", 0)
    ('pump [MW], numbers × 10⁶', 'pump [MW]')
    """
    return f"{title}, numbers × 10{str(power).translate(RAISED)}" if power and title else title
