"""Missing information: a forgotten bound or constraint cannot be undone, only placed.

For a direction g (one variable up or down, a total, or one variable against another) a row g.x <= b is looked for:
which values of b cure the symptom? The answer is an interval, read off the region's points and rays.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from fractions import Fraction
from itertools import combinations, permutations

from polywalk.exact import Row, dot, linear, short
from polywalk.model import Constraint, Model
from polywalk.reviewing.cutting import Cut, Ground

End = Fraction | None


@dataclass(frozen=True)
class Interval:
    """Values from ``low`` to ``high``; None where there is no end. The upper end counts only where ``closed``."""

    low: End
    high: End
    closed: bool = False

    @property
    def empty(self) -> bool:
        """Whether no value is left."""
        if self.low is None or self.high is None:
            return False
        return self.low > self.high if self.closed else self.low >= self.high

    def holds(self, value: Fraction) -> bool:
        """Whether the value is in it."""
        if self.low is not None and value < self.low:
            return False
        return self.high is None or value < self.high or (self.closed and value == self.high)

    def example(self) -> Fraction:
        """A value well inside."""
        if self.low is not None and self.high is not None:
            return (self.low + self.high) / 2
        if self.high is not None:
            return self.high if self.closed else self.high - 1
        return Fraction(0) if self.low is None else self.low + 1

    def mirrored(self) -> tuple[str, str]:
        """The ends of the negated values, as text with brackets: for a row turned from <= into >=."""
        left = ("[" if self.closed else "(") + ("-∞" if self.high is None else short(-self.high))
        return left, "∞)" if self.low is None else short(-self.low) + "]"

    def text(self, turned: bool = False) -> str:
        """As people write an interval."""
        if self.closed and self.low == self.high and self.low is not None:
            return short(-self.low if turned else self.low)
        if turned:
            return ", ".join(self.mirrored())
        left = "(-∞" if self.low is None else f"[{short(self.low)}"
        right = "∞)" if self.high is None else short(self.high) + ("]" if self.closed else ")")
        return f"{left}, {right}"


@dataclass(frozen=True)
class Gap:
    """A place where a constraint may be missing: ``direction . x <= b`` for some b of ``values``."""

    kind: str
    direction: Row
    values: Interval

    @property
    def turned(self) -> bool:
        """Whether people would write it with >=: no coefficient is positive."""
        return not any(value > 0 for value in self.direction)

    def text(self, model: Model) -> str:
        """The row, with its right-hand side left open."""
        row = tuple(-value for value in self.direction) if self.turned else self.direction
        start = f"{linear(row, model.variables)} {'≥' if self.turned else '≤'}"
        one = self.values.closed and self.values.low == self.values.high
        values = self.values.text(self.turned)
        return f"{start} {values}" if one else f"{start} b for one b in {values}"

    def row(self, model: Model, value: Fraction) -> Constraint:
        """The constraint with one of the values, under a name that is not taken."""
        name = f"forgotten {self.kind.rsplit(' ', maxsplit=1)[-1]}"
        while any(row.name == name for row in model.constraints):
            name += " again"
        turned = tuple(-number for number in self.direction)
        return Constraint(
            name,
            turned if self.turned else self.direction,
            ">=" if self.turned else "<=",
            -value if self.turned else value,
        )


def directions(n: int) -> Iterator[tuple[str, Row]]:
    """Where to look: each variable up and down, totals up and down (all of them, every pair), one against another."""
    for j in range(n):
        yield from (("forgotten bound", _row(n, {j: sign})) for sign in (1, -1))
    totals = [(*range(n),)] if n > 2 else []
    for chosen in [*totals, *combinations(range(n), 2)]:
        yield from (("forgotten constraint", _row(n, dict.fromkeys(chosen, sign))) for sign in (1, -1))
    for i, j in permutations(range(n), 2):
        yield "forgotten constraint", _row(n, {i: 1, j: -1})


def _row(n: int, entries: dict[int, int]) -> Row:
    return tuple(Fraction(entries.get(j, 0)) for j in range(n))


def lowest(ground: Ground, direction: Row) -> End:
    """The least value of a function over the region; None where it falls without end."""
    if any(dot(direction, way) < 0 for way in ground.ways):
        return None
    return min(dot(direction, point) for point in ground.region.base)


def stops(ground: Ground, direction: Row, upward: Row) -> bool:
    """Whether a row g.x <= b, whatever b, ends the climb of the objective."""
    return not Cut(ground, Constraint("gap", direction, "<=", Fraction(0))).climbs(upward)
