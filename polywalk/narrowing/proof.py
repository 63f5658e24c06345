"""Multipliers that prove a limit: exact ones, or HiGHS's, which are named when someone reads them."""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property
from typing import Any

import numpy as np

from polywalk.narrowing.program import Program
from polywalk.narrowing.tolerances import TOLERANCES, snapped

ALIKE = 9
"""Decimal digits, of the largest multiplier, past which two are the same: HiGHS's tolerance here."""

Multipliers = tuple[tuple[str, Fraction], ...]


@dataclass(frozen=True)
class Exact:
    """Multipliers that add up exactly.

    Parameters
    ----------
    given : tuple of (str, Fraction)
        By constraint; those that are 0 are left out.
    factor : Fraction
        What they are to be multiplied with.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.narrowing.proof import Exact
    >>> Exact((("a", Fraction(1)), ("b", Fraction(-3)))).times(Fraction(2)).named()
    (('b', Fraction(-6, 1)), ('a', Fraction(2, 1)))
    """

    given: Multipliers
    factor: Fraction = Fraction(1)

    @property
    def count(self) -> int:
        """How many there are."""
        return len(self.given)

    def includes(self, name: str) -> bool:
        """Whether a row takes part."""
        return any(name == other for other, _ in self.given)

    def times(self, factor: Fraction) -> Exact:
        """The same, multiplied."""
        return replace(self, factor=self.factor * factor)

    def named(self, most: int | None = None) -> Multipliers:
        """The multipliers by constraint, the largest first; only so many of them."""
        ordered = sorted(self.given, key=lambda pair: -abs(pair[1]))[:most]
        return tuple((name, value * self.factor) for name, value in ordered)


@dataclass(frozen=True, eq=False)
class Rounded:
    """Multipliers as HiGHS gives them; near a simple fraction they are taken for it.

    Parameters
    ----------
    program : Program
    rows, columns : (m,) and (n,) arrays of float
        Of the rows, and of the bounds of the variables.
    factor : Fraction
    """

    program: Program
    rows: Any
    columns: Any
    factor: Fraction = Fraction(1)

    @cached_property
    def _ordered(self) -> tuple[Any, Any]:
        """Places (columns after rows) and values, the largest first, without what is only rounding.

        A multiplier counts by what it adds: times the largest coefficient of its row. Equal ones, rounding aside, stand
        in the model's order.
        """
        values = np.concatenate([self.rows, self.columns])
        shares = np.abs(np.concatenate([self.rows * self.program.row_sizes, self.columns]))
        used = np.flatnonzero(shares > max(TOLERANCES.zero, TOLERANCES.zero * shares.max(initial=0.0)))
        sizes = np.abs(values[used])
        order = used[np.argsort(-np.round(sizes / sizes.max(initial=1e-300), ALIKE), kind="stable")]
        return order, values[order]

    @property
    def count(self) -> int:
        """How many there are."""
        return len(self._ordered[0])

    def includes(self, name: str) -> bool:
        """Whether a row takes part."""
        place = self.program.big.row_places.get(name)
        return place is not None and place in self._ordered[0]

    def times(self, factor: Fraction) -> Rounded:
        """The same, multiplied."""
        return replace(self, factor=self.factor * factor)

    def named(self, most: int | None = None) -> Multipliers:
        """The multipliers by constraint, the largest first; only so many of them."""
        places, values = self._ordered
        pairs = zip(places[:most].tolist(), values[:most].tolist(), strict=True)
        return tuple((self._name(place, value), snapped(value) * self.factor) for place, value in pairs)

    def _name(self, place: int, value: float) -> str:
        count = len(self.rows)
        return self.program.row_name(place, value) if place < count else self.program.column_name(place - count, value)


Proof = Exact | Rounded
