"""What one more constraint leaves of a region, from the region's points and rays alone: no enumeration per candidate.

A candidate changes one constraint, so its region is that of the other constraints, cut once. Everything asked of the
cut (is anything left, is there an optimum, which constraints still matter) is read off the signs of the new
constraint's slack at the points and along the rays; where two of them lie on different sides, the cut passes between.

References
----------
Motzkin, Raiffa, Thompson & Thrall, The double description method, Contributions to the Theory of Games II, 1953
(the step that adds one constraint).
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from itertools import combinations, product

from polywalk.exact import Row, dot
from polywalk.model import Constraint, Objective
from polywalk.region import Region

Heights = tuple[Fraction, ...]


@dataclass(frozen=True)
class Ground:
    """The region of the constraints that a candidate leaves alone."""

    region: Region

    @cached_property
    def ways(self) -> tuple[Row, ...]:
        """Its rays, and its lines both ways."""
        lines = self.region.lines
        return (
            *(ray.direction for ray in self.region.rays),
            *lines,
            *(tuple(-value for value in line) for line in lines),
        )

    @cached_property
    def edges(self) -> tuple[tuple[int, int], ...]:
        """Pairs of points whose connection may meet a cut first: the edges, or every pair where there is a line."""
        count = len(self.region.base)
        if self.region.lines:
            return tuple(combinations(range(count), 2))
        return tuple((edge.start, edge.end) for edge in self.region.edges if edge.end is not None)

    @cached_property
    def open_edges(self) -> tuple[tuple[int, int], ...]:
        """Pairs of a point and a ray, likewise."""
        if self.region.lines:
            return tuple(product(range(len(self.region.base)), range(len(self.ways))))
        return tuple((edge.start, edge.ray) for edge in self.region.edges if edge.ray is not None)

    @cached_property
    def faces(self) -> tuple[tuple[str, tuple[int, ...], tuple[int, ...]], ...]:
        """Each constraint that defines a facet, with the points and rays on it; lines lie on every facet."""
        count = len(self.region.rays)
        lines = tuple(range(count, len(self.ways)))
        return tuple((name, f.vertices, (*f.rays, *lines)) for f in self.region.facets for name in f.constraints)


@dataclass(frozen=True)
class Cut:
    """A region cut by one constraint, or left as it is (None)."""

    ground: Ground
    row: Constraint | None

    @cached_property
    def heights(self) -> tuple[Heights, Heights]:
        """The constraint's slack at every point, and its change along every ray."""
        if self.row is None:
            return (Fraction(0),) * len(self.ground.region.base), (Fraction(0),) * len(self.ground.ways)
        shift, slope = self.row.inward
        return (
            tuple(shift + dot(slope, point) for point in self.ground.region.base),
            tuple(dot(slope, way) for way in self.ground.ways),
        )

    @property
    def _equal(self) -> bool:
        return self.row is not None and self.row.sense == "=="

    @cached_property
    def empty(self) -> bool:
        """Whether nothing is left."""
        points, ways = self.heights
        above = any(h >= 0 for h in points) or (bool(points) and any(h > 0 for h in ways))
        below = any(h <= 0 for h in points) or (bool(points) and any(h < 0 for h in ways))
        return not (above and (below or not self._equal))

    @cached_property
    def binds(self) -> bool:
        """Whether the constraint takes anything away."""
        both = (*self.heights[0], *self.heights[1])
        return any(h < 0 for h in both) or (self._equal and any(both))

    @cached_property
    def flat(self) -> bool:
        """Whether an inequality leaves nothing but a face."""
        if self.row is None or self._equal:
            return False
        return not any(h > 0 for h in (*self.heights[0], *self.heights[1]))

    @cached_property
    def working(self) -> frozenset[str]:
        """The inequalities that define a facet of what is left."""
        kept = {name for name, points, ways in self.ground.faces if self._keeps(points, ways)}
        return (
            frozenset(kept | {self.row.name})
            if self.row is not None and self.binds and not self.flat
            else frozenset(kept)
        )

    def _keeps(self, points: Sequence[int], ways: Sequence[int]) -> bool:
        if self.row is None:
            return True
        heights = [*(self.heights[0][k] for k in points), *(self.heights[1][k] for k in ways)]
        if self._equal:
            return any(h >= 0 for h in heights) and any(h <= 0 for h in heights)
        return any(h > 0 for h in heights)

    def climbs(self, upward: Row) -> bool:
        """Whether the function grows without end over what is left."""
        gains = [(h, dot(upward, way)) for h, way in zip(self.heights[1], self.ground.ways, strict=True)]
        if any(gain > 0 for h, gain in gains if (h == 0 if self._equal else h >= 0)):
            return True
        up, down = [pair for pair in gains if pair[0] > 0], [pair for pair in gains if pair[0] < 0]
        return any(h * loss - g * gain > 0 for h, gain in up for g, loss in down)

    def best(self, upward: Row) -> tuple[Fraction, Row]:
        """The greatest value of the function over what is left, and a point that has it.

        Neither is defined where nothing is left, or where the function climbs.
        """
        values = [dot(upward, point) for point in self.ground.region.base]
        gains = [dot(upward, way) for way in self.ground.ways]
        points, ways = self.heights
        found: list[tuple[Fraction, int, int, Fraction]] = [
            (value, k, -1, Fraction(0))
            for k, (h, value) in enumerate(zip(points, values, strict=True))
            if (h == 0 if self._equal else h >= 0)
        ]
        for k, end in self.ground.edges:
            if points[k] * points[end] < 0:
                step = points[k] / (points[k] - points[end])
                found.append((values[k] + step * (values[end] - values[k]), k, end, step))
        for k, way in self.ground.open_edges:
            if points[k] * ways[way] < 0:
                step = -points[k] / ways[way]
                found.append((values[k] + step * gains[way], k, len(points) + way, step))
        value, k, end, step = max(found, key=lambda one: one[0])
        return value, self._between(k, end, step)

    def _between(self, start: int, end: int, step: Fraction) -> Row:
        base = self.ground.region.base
        if end < 0:
            return base[start]
        way = self.ground.ways[end - len(base)] if end >= len(base) else _minus(base[end], base[start])
        return tuple(p + step * d for p, d in zip(base[start], way, strict=True))

    def negative(self) -> int:
        """How many variables can be negative in what is left."""
        return sum(self._falls_below_zero(j) for j in range(self.ground.region.model.n))

    def _falls_below_zero(self, j: int) -> bool:
        base, ways = self.ground.region.base, self.ground.ways
        if all(point[j] >= 0 for point in base) and all(way[j] >= 0 for way in ways):
            return False
        if any(h >= 0 and point[j] < 0 for h, point in zip(self.heights[0], base, strict=True)) and not self._equal:
            return True
        down = tuple(Fraction(-int(i == j)) for i in range(self.ground.region.model.n))
        return self.climbs(down) or self.best(down)[0] > 0

    def outcome(self, goal: Objective | None) -> tuple[str, Fraction | None, Row | None]:
        """How optimizing ends: "empty", "unbounded" or "optimal" with value and point (no value without a goal)."""
        if self.empty:
            return "empty", None, None
        if goal is None:
            return "optimal", None, None
        if self.climbs(goal.upward):
            return "unbounded", None, None
        _, point = self.best(goal.upward)
        return "optimal", goal.at(point), point


def _minus(left: Row, right: Row) -> Row:
    return tuple(a - b for a, b in zip(left, right, strict=True))
