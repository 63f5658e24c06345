"""Many rows at many points: floats decide what is clear, integers the rest, so that every answer is exact.

A slack computed in floats is off by no more than a known part of its own terms' sizes; where it is larger than that,
its sign is certain. What is not certain, above all every zero, is computed again in integers.

References
----------
Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed., 2002, section 3.1 (the bound on a dot product).
Shewchuk, Adaptive precision floating-point arithmetic and fast robust geometric predicates, 1997 (the filter).
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from fractions import Fraction
from functools import cached_property
from operator import mul

import numpy as np

from polywalk.region.listing import Floats, Rows

SAFE_BITS = 300
"""Values between 2^-300 and 2^300: their products and sums neither overflow nor lose digits at the small end."""

AT_ONCE = 30_000
"""Slacks computed at a time: arrays of 240 kB stay in the processor's cache, four times as fast as one large one."""

MANY = 1_000
"""Slacks from which floats pay: below, integers alone are quicker."""

Row = Sequence[int]


class Sieve:
    """Rows (b, a) of integers, asked for their slacks b h + a.v at heads (h, v) of integers.

    Examples
    --------
    >>> from polywalk.region.sieve import Sieve
    >>> corner = Sieve([(0, 1, 0), (0, 0, 1), (4, -1, -1)])
    >>> corner.zeros([(1, 0, 0), (1, 0, 4)]), corner.broken([(1, 3, 2), (1, 1, 1)])
    ([(0, 1), (0, 2)], {2})
    """

    def __init__(self, rows: Rows) -> None:
        self.rows = rows

    @cached_property
    def floats(self) -> Floats:
        """The nearest floats of each row, up to a positive factor; NaN throughout where floats cannot hold it."""
        return nearest(self.rows)

    def zeros(self, heads: Rows) -> list[tuple[int, ...]]:
        """For each head the numbers of the rows that are zero there."""
        if len(self.rows) * len(heads) < MANY:
            return [tuple([k for k, row in enumerate(self.rows) if not sum(map(mul, row, head))]) for head in heads]
        return [tuple([k for k, slack in unclear if not slack]) for _, unclear in self._slacks(heads)]

    def broken(self, heads: Rows) -> set[int]:
        """For each head at which a row is negative, the number of one that is most so for its size."""
        found = set()
        for clear, unclear in self._slacks(heads):
            worst = int(clear.argmin())
            if clear[worst] < 0:
                found.add(worst)
            elif any(slack < 0 for _, slack in unclear):
                found.add(min(unclear, key=self._depth)[0])
        return found

    def _depth(self, unclear: tuple[int, int]) -> Fraction:
        place, slack = unclear
        return Fraction(slack, max(map(abs, self.rows[place][1:])))

    @cached_property
    def _sizes(self) -> Floats:
        sizes: Floats = np.abs(self.floats[:, 1:]).max(axis=1)
        return sizes

    def _slacks(self, heads: Rows) -> Iterator[tuple[Floats, list[tuple[int, int]]]]:
        """For each head the slacks for their rows' sizes, 0 where not clear; and what is not clear, in integers."""
        for part in blocks(len(heads), len(self.rows)):
            some = heads[part]
            for head, clear, unclear in zip(some, *self._told(some), strict=True):
                yield clear, [(k, sum(map(mul, self.rows[k], head))) for k in unclear]

    @np.errstate(all="ignore")
    def _told(self, heads: Rows) -> tuple[Floats, list[list[int]]]:
        rows, points = self.floats.T, nearest(heads)
        slacks = points @ rows
        # (n + 3) units of rounding are certain: n + 1 terms, one rounding of each factor. Twice that and more is taken.
        doubt = (len(rows) + 4) * np.finfo(float).eps * (np.abs(points) @ np.abs(rows))
        clear = np.abs(slacks) > doubt
        return np.where(clear, slacks / self._sizes, 0.0), [np.flatnonzero(line).tolist() for line in ~clear]


def blocks(heads: int, rows: int) -> Iterator[slice]:
    """Few heads at a time, so that their slacks in all rows fit the cache."""
    step = max(1, AT_ONCE // rows)
    return (slice(start, start + step) for start in range(0, heads, step))


def nearest(rows: Rows) -> Floats:
    """The nearest floats of rows of integers, up to a positive factor each; NaN where floats cannot hold a row."""
    try:
        found = np.array(rows, dtype=float)
    except OverflowError:
        return np.array([_scaled(row) for row in rows])
    for place in np.flatnonzero((np.abs(found) > 2.0**SAFE_BITS).any(axis=1)).tolist():
        found[place] = _scaled(rows[place])
    return found


def _scaled(row: Row) -> list[float]:
    """The row with its largest value at 2^300; NaN throughout if its smallest is then below 2^-300."""
    excess = max(0, max(value.bit_length() for value in row) - SAFE_BITS)
    scaled = [value / (1 << excess) for value in row]
    if any(value and abs(small) < 2.0**-SAFE_BITS for value, small in zip(row, scaled, strict=True)):
        return [float("nan")] * len(row)
    return scaled
