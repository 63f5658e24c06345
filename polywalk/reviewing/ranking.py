"""How much there is to doubt about a suspect: the fewer doubts, the earlier it is listed.

Doubts are like bits of surprise: one more, half as likely. Most come from the corrected model: in a model that people
build, constraints matter, amounts are not negative, the best plan does something, and the numbers look alike. The
weights were fitted to 720 planted mistakes (conditional logit; tests/planted.py, seeds 101 to 103) and rounded; how
often analysts really make each slip is not known (computed, no source).

References
----------
McFadden, Conditional logit analysis of qualitative choice behavior, Frontiers in Econometrics, 1974.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, fields
from fractions import Fraction
from math import log2, log10
from statistics import median

from polywalk.exact import Row, dot, full
from polywalk.model import Constraint, Model
from polywalk.reviewing.catalogue import OBJECTIVE, Slip
from polywalk.reviewing.cutting import Cut
from polywalk.reviewing.missing import Gap

RARE = {
    "constraint too many": 4.0,
    "forgotten constraint": 1.5,
    "forgotten bound": -1.0,
    "inequality for equality": -1.0,
}
"""Lifting a constraint cures any refusal, and so says little; a constraint of unknown coefficients is a guess. The last
two leave no trace in the numbers typed, by which the others win."""


@dataclass(frozen=True)
class Doubts:
    """Why a suspect is doubted; a relief counts below zero.

    Parameters
    ----------
    kind : float
        Half the logarithm (base 2) of how many slips of this kind there could be in the model, and ``RARE``.
    digits : float
        1.5 for each digit that the corrected number is longer than the one typed: people type short numbers.
    scale : float
        2 for each power of ten by which the corrected row is further out of scale with the other rows (where it meets
        the axes), and 1.5 for each by which its coefficients lie further apart.
    margin : float
        Up to 3 where the plans spoken of lie far from the corrected row: plans come up that lie on a limit.
    idle : float
        1 for each inequality that does not matter in the corrected model.
    nothing : float
        3 where the best plan would be to do nothing.
    negative : float
        4 for each variable that could be negative.
    place : float
        1 in the objective, and in a bound of 0: they are typed by habit.
    shape : float
        Up to 2.5 for the share of the vertices and rays of today's region that a forgotten row would cut off.
    known : float
        3.5 for a forgotten bound where there is one already, 3 for a forgotten row that holds one variable against
        another.

    Examples
    --------
    >>> from polywalk.reviewing.ranking import Doubts
    >>> Doubts(kind=2.0, idle=1.0).total
    3.0
    """

    kind: float = 0.0
    digits: float = 0.0
    scale: float = 0.0
    margin: float = 0.0
    idle: float = 0.0
    nothing: float = 0.0
    negative: float = 0.0
    place: float = 0.0
    shape: float = 0.0
    known: float = 0.0

    @property
    def total(self) -> float:
        """All of them."""
        return float(sum(getattr(self, field.name) for field in fields(self)))


class Ranking:
    """What the doubts of all suspects of a model have in common.

    Parameters
    ----------
    model : Model
        As typed.
    ways : mapping of str to int
        How many slips of each kind the catalogue has for the model.
    spoken : sequence of (n,) tuple of Fraction
        The plans that are said to be allowed, forbidden or optimal.
    """

    def __init__(self, model: Model, ways: Mapping[str, int], spoken: Sequence[Row]) -> None:
        self.model, self.ways, self.spoken = model, ways, spoken
        places = range(model.n)
        self._reaches = [{row.name: _reach(row, j) for row in model.constraints} for j in places]

    def of_slip(self, slip: Slip, cut: Cut, best: Row | None) -> Doubts:
        """The doubts about an undone slip; ``cut`` is the corrected model's region, ``best`` its best plan."""
        now = None if slip.place == OBJECTIVE else self.model.constraint(slip.place)
        routine = slip.kind != "max for min" if now is None else now.bounds() is not None and not now.rhs
        gone = slip.place if slip.row is None else ""
        return Doubts(
            kind=self._kind(slip.kind),
            digits=0.0 if slip.numbers is None else 1.5 * (_length(slip.numbers[1]) - _length(slip.numbers[0])),
            scale=self._out_of_scale(slip.row) - self._out_of_scale(now),
            margin=3.0 * _margin(slip.row, self.spoken),
            idle=1.0 * _idle([row for row in self.model.constraints if row.name != gone], cut),
            nothing=3.0 * (best is not None and not any(best)),
            negative=4.0 * cut.negative(),
            place=1.0 * routine,
        )

    def of_gap(self, gap: Gap, cut: Cut) -> Doubts:
        """The doubts about missing information; ``cut`` is today's region with one of the values that would do."""
        found = [j for j, value in enumerate(gap.direction) if value]
        side = "lower" if gap.turned else "upper"
        known = len(found) == 1 and any(row.bounds() == (found[0], side) for row in self.model.constraints)
        against = len({value > 0 for value in gap.direction if value}) > 1
        return Doubts(
            kind=self._kind(gap.kind),
            idle=1.0 * _idle(self.model.constraints, Cut(cut.ground, None)),
            negative=4.0 * cut.negative(),
            shape=2.5 * (1 - _survival(gap, cut)),
            known=3.5 * known + 3.0 * against,
        )

    def _kind(self, kind: str) -> float:
        return log2(self.ways[kind]) / 2 + RARE.get(kind, 0.0)

    def _out_of_scale(self, row: Constraint | None) -> float:
        if row is None:
            return 0.0
        sizes = [log10(abs(value)) for value in row.coefficients if value]
        apart = max(sizes, default=0.0) - min(sizes, default=0.0)
        return 2.0 * max(self._off(row, j) for j in range(self.model.n)) + 1.5 * apart

    def _off(self, row: Constraint, j: int) -> float:
        """Powers of ten between where the row meets an axis and where, in the middle, the others do."""
        mine = _reach(row, j)
        if mine is None:
            return 0.0
        others = [reach for name, reach in self._reaches[j].items() if reach is not None and name != row.name]
        return abs(mine - median(others)) if others else 0.0


def _idle(rows: Sequence[Constraint], cut: Cut) -> int:
    """How many inequalities define no facet of what is left."""
    working = cut.working
    return sum(row.name not in working for row in rows if row.sense != "==")


def _length(value: Fraction) -> int:
    """Digits that have to be typed, zeros at either end not counted; a ratio costs two more."""
    text = full(abs(value))
    return len(text.replace(".", "").replace("/", "").strip("0")) + (2 if "/" in text else 0)


def _reach(row: Constraint, j: int) -> float | None:
    if not row.rhs or not row.coefficients[j]:
        return None
    return log10(abs(row.rhs / row.coefficients[j]))


def _margin(row: Constraint | None, points: Sequence[Row]) -> float:
    """The least slack at a plan (or shortfall), as a share of the sizes of the terms that make it up."""
    if row is None:
        return 0.0
    return min((_share(row, point) for point in points), default=0.0)


def _share(row: Constraint, point: Row) -> float:
    size = abs(row.rhs) + sum(abs(a * x) for a, x in zip(row.coefficients, point, strict=True))
    return float(abs(row.slack(point)) / size) if size else 0.0


def _survival(gap: Gap, cut: Cut) -> float:
    """The share of the region's points and rays that the mildest of the values would keep."""
    high, points, ways = gap.values.high, cut.ground.region.base, cut.ground.ways
    kept = sum(high is None or dot(gap.direction, point) < high for point in points)
    kept += sum(dot(gap.direction, way) <= 0 for way in ways)
    return kept / (len(points) + len(ways))
