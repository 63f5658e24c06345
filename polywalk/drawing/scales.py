"""Numbers along an axis: in full, in powers of a thousand, or counted from a round number; its title says which."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from math import ceil, floor, log10

from polywalk.drawing.letters import clipped, width

HIGH, LOW = 1e5, 1e-3
"""From such numbers on they are written as multiples of a power; between, as they are."""

LITTLE = 0.02
"""Where an axis spans a smaller share of its largest number, a multiple of a power would need too many digits."""

LONGEST = 11
"""Digits, point and all: longer numbers are counted from a round one."""

GROUPED = 1e4
"""From here on digits stand in groups of three."""

TICK = 10.0
"""Size of the letters of an axis's numbers, in pixels."""

BEYOND = 10.0
"""How many pixels a number may stand out past the end of its axis."""

RAISED = str.maketrans("-0123456789", "⁻⁰¹²³⁴⁵⁶⁷⁸⁹")


@dataclass(frozen=True)
class Scale:
    """How an axis's numbers are written: as multiples of a power of ten, counted from ``start``.

    Examples
    --------
    >>> from polywalk.drawing.scales import scale
    >>> scale(0, 4_000_000).titled("cost"), scale(1_443_700, 1_443_900).titled("cost")
    ('cost, numbers × 10⁶', 'cost')
    >>> scale(1_443_700, 1_443_900).written(1_443_750)
    '1,443,750'
    >>> far = scale(1e12 - 100, 1e12 + 100)
    >>> far.titled("cost"), far.written(1e12 + 50)
    ('cost = 1,000,000,000,000 + number', '+50')
    """

    power: int = 0
    start: float = 0.0

    def written(self, value: float) -> str:
        """A number of the axis."""
        size = (value - self.start) / 10.0**self.power
        text = plain(size)
        return f"+{text}" if self.start and size > 0 and text != "0" else text

    def titled(self, title: str, room: float = float("inf"), size: float = 12.0) -> str:
        """The title of the axis with what its numbers mean; a title without room is cut, its meaning is not."""
        if not title:
            return ""
        raised = f" × 10{str(self.power).translate(RAISED)}" if self.power else ""
        said = f", numbers{raised}" if raised else ""
        if self.start:
            start = plain(self.start)
            if width(f"{title} = {start} + number{raised}", size) > room:
                start = _powered(self.start)
            said = f" = {start} + number{raised}"
        return clipped(title, size, room - width(said, size)) + said


def plain(value: float) -> str:
    """A number in full, from 10,000 on in groups of three digits; beyond a double's digits with its power of ten."""
    text = f"{value:.12g}"
    if "e" in text and abs(value) < 1e15:
        text = f"{value:.0f}" if abs(value) >= 1 else text
    if "e" in text:
        text = _powered(value)
    elif abs(value) >= GROUPED:
        whole, point, rest = text.partition(".")
        text = f"{int(whole):,}{point}{rest}"
    return "0" if text == "-0" else text.replace("-", "−")


def _powered(value: float) -> str:
    """A number as a multiple of a power of ten."""
    digits, power = f"{value:.11e}".split("e")
    digits = digits.rstrip("0").rstrip(".").replace("-", "−")
    return f"{digits}×10{str(int(power)).translate(RAISED)}"


def scale(low: float, high: float) -> Scale:
    """How the numbers of an axis from ``low`` to ``high`` are written."""
    size, span = max(abs(low), abs(high)), high - low
    if not size or span <= 0:
        return Scale()
    power = _power(size)
    if not power and size < HIGH and _longest(Scale(), low, high) <= LONGEST:
        return Scale()
    if power and span >= LITTLE * size:
        return Scale(power)
    if size >= 1 and _longest(Scale(), low, high) <= LONGEST:
        return Scale()
    if size < 1 and _longest(Scale(power), low, high) <= LONGEST - 4:
        return Scale(power)
    return Scale(_power(span), _roundest(low, high))


def _power(size: float) -> int:
    """0, or a multiple of 3."""
    return 0 if LOW <= size < HIGH else 3 * floor(log10(size) / 3)


def _roundest(low: float, high: float) -> float:
    """The number between two that ends in the most zeros."""
    largest, smallest = (floor(log10(size)) for size in (max(abs(low), abs(high)), high - low))
    sizes = (10.0**power for power in range(largest, smallest - 2, -1))
    return next((ceil(low / size) * size for size in sizes if ceil(low / size) * size <= high), low)


def _longest(how: Scale, low: float, high: float) -> int:
    return max(len(how.written(value)) for value in ticks(low, high))


def step_of(length: float, most: float) -> float:
    """The round step (1, 2 or 5 times a power of ten) that fits at most so often into a length."""
    rough = length / most
    power = 10.0 ** floor(log10(rough))
    return next(size * power for size in (1, 2, 5, 10) if size * power >= rough * (1 - 1e-9))


def ticks(low: float, high: float, most: float = 6, spacing: float = 0.0) -> list[float]:
    """Round numbers within an interval, at most so many steps apart or at a given spacing."""
    step = spacing or step_of(high - low, most)
    return [k * step for k in range(-floor(-low / step), floor(high / step) + 1)]


def placed(
    low: float, high: float, length: float, *, across: bool, spacing: float = 0.0
) -> Iterator[tuple[float, str]]:
    """Numbers along an axis of so many pixels, and their texts: none on the next, none past the ends of the axis.

    ``across`` is an axis whose numbers stand side by side; up an axis a line of text apart is enough.
    """
    how, unit = scale(low, high), length / (high - low)
    for most in range(8, 0, -1):
        found = [(value, how.written(value)) for value in ticks(low, high, most, spacing)]
        widest = max((width(text, TICK) for _, text in found), default=0.0) if across else TICK
        gap = unit * (found[1][0] - found[0][0]) if len(found) > 1 else length
        if spacing or gap >= widest + 12:
            break
    for value, text in found:
        half = width(text, TICK) / 2 if across else 0.0
        if unit * (value - low) - half >= -BEYOND and unit * (value - low) + half <= length + BEYOND:
            yield value, text
