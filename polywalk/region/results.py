"""The region of a model. Everything is exact; what is costly and often unread is computed on first use."""

from __future__ import annotations

from dataclasses import dataclass, field
from fractions import Fraction
from functools import cached_property
from math import sqrt
from typing import Literal

from polywalk.exact import Row, dot
from polywalk.model import Model
from polywalk.region import faces, measure, telling
from polywalk.region.parts import Edge, Face, Facet, Ray, Vertex
from polywalk.region.spans import rank
from polywalk.table import Shown, Table

Status = Literal["empty", "bounded", "unbounded"]
Outcome = Literal["optimal", "unbounded", "empty", "no objective"]


@dataclass(frozen=True, repr=False)
class Region(Shown):
    """The set of all plans a model allows.

    Parameters
    ----------
    model : Model
    status : {"empty", "bounded", "unbounded"}
    vertices : tuple of Vertex
        Sorted by point; none where the region has a line.
    rays : tuple of Ray
        Sorted by direction.
    lines : tuple of (n,) tuple of Fraction
        Directions that are free both ways, linearly independent, in the smallest integers.
    base : tuple of (n,) tuple of Fraction
        One point of each smallest face: the vertices' points, unless the region has a line.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.model import Constraint, Model
    >>> from polywalk.region import region
    >>> one, zero = Fraction(1), Fraction(0)
    >>> rows = (Constraint("x lower", (one, zero), ">=", zero), Constraint("y lower", (zero, one), ">=", zero),
    ...         Constraint("labour", (one, one), "<=", Fraction(4)))
    >>> print(region(Model(("x", "y"), rows)))
    bounded region of dimension 2: 3 vertices, 3 edges, 3 facets
    vertex  x  y  active            degenerate
    V0      0  0  x lower, y lower  no
    V1      0  4  x lower, labour   no
    V2      4  0  y lower, labour   no

    References
    ----------
    Ziegler, Lectures on Polytopes, 1995, lecture 2 (faces); Büeler, Enge & Fukuda, Exact volume computation for
    polytopes: a practical study, DMV Seminar 29, 2000 (volume).
    """

    model: Model
    status: Status
    vertices: tuple[Vertex, ...]
    rays: tuple[Ray, ...]
    lines: tuple[Row, ...]
    base: tuple[Row, ...]
    _active: tuple[tuple[int, ...], ...] = field(repr=False)

    @cached_property
    def _patterns(self) -> dict[int, int]:
        return faces.masks(self._active)

    @cached_property
    def _pairs(self) -> list[tuple[int, int]]:
        if self.lines:
            return []
        return faces.pairs(self._active, self._patterns, len(self.base), self.model.n)

    @cached_property
    def edges(self) -> tuple[Edge, ...]:
        """The edges, sorted; none where the region has a line."""
        count, names = len(self.base), [row.name for row in self.model.constraints]
        sets = [frozenset(places) for places in self._active]
        found = []
        for start, other in self._pairs:
            active = tuple([names[place] for place in self._active[start] if place in sets[other]])
            end, ray = (other, None) if other < count else (None, other - count)
            found.append(Edge(start, end, ray, active))
        return tuple(found)

    @cached_property
    def _neighbours(self) -> list[list[int]]:
        return faces.neighbours(self._pairs, len(self.base))

    @cached_property
    def equalities(self) -> tuple[str, ...]:
        """The constraints that hold with equality all over the region, stated as such or not."""
        whole = (1 << len(self._active)) - 1
        return tuple(self.model.constraints[place].name for place, found in self._patterns.items() if found == whole)

    @cached_property
    def dimension(self) -> int:
        """The region's dimension; -1 where it is empty."""
        if self.status == "empty":
            return -1
        return self.model.n - rank([self.model.constraint(name).coefficients for name in self.equalities])

    @cached_property
    def _facets(self) -> dict[int, list[int]]:
        return faces.facets(self._patterns, len(self.base), len(self._active))

    @cached_property
    def facets(self) -> tuple[Facet, ...]:
        """The facets, in the order of the first constraint that defines each."""
        return tuple(self._facet(pattern, places) for pattern, places in self._facets.items())

    def _facet(self, pattern: int, places: list[int]) -> Facet:
        count = len(self.base)
        corners = tuple(k for k in faces.members(pattern) if k < count)
        if self.dimension == 3 and not self.lines:
            corners = faces.around(pattern, self._neighbours)
        names = tuple(self.model.constraints[place].name for place in places)
        return Facet(names, corners, tuple(k - count for k in faces.members(pattern) if k >= count))

    @cached_property
    def outline(self) -> tuple[int, ...]:
        """The vertices of a two-dimensional region in the order met walking round it; empty for any other region.

        An unbounded one runs from the vertex of one ray to the vertex of the other.
        """
        if self.dimension != 2 or self.lines:
            return ()
        return faces.around((1 << len(self._active)) - 1, self._neighbours)

    @cached_property
    def ranges(self) -> dict[str, tuple[Fraction | None, Fraction | None]]:
        """The least and the greatest value of every variable, None where there is none; no entry where it is empty."""
        if self.status == "empty":
            return {}
        return {name: self._range(j) for j, name in enumerate(self.model.variables)}

    def _range(self, j: int) -> tuple[Fraction | None, Fraction | None]:
        values = [point[j] for point in self.base]
        slopes = [ray.direction[j] for ray in self.rays] + [sign * line[j] for line in self.lines for sign in (-1, 1)]
        lower = None if any(slope < 0 for slope in slopes) else min(values)
        return lower, None if any(slope > 0 for slope in slopes) else max(values)

    @cached_property
    def centroid(self) -> Row | None:
        """The mean of the vertices; None where there is none."""
        if not self.vertices:
            return None
        columns = zip(*(vertex.point for vertex in self.vertices), strict=True)
        return tuple(sum(column, Fraction(0)) / len(self.vertices) for column in columns)

    @cached_property
    def volume(self) -> Fraction | None:
        """The exact n-dimensional volume: 0 for an empty or flat region, None for an unbounded one."""
        if self.status == "unbounded":
            return None
        if self.dimension < self.model.n:
            return Fraction(0)
        return measure.volume(self.base, tuple(self._facets))

    @cached_property
    def measure_squared(self) -> Fraction | None:
        """The exact square of the measure in the region's own dimension: length, area, volume, ... (1 for a point).

        0 where the region is empty, None where it is unbounded.
        """
        if self.status == "unbounded":
            return None
        if self.dimension == self.model.n and self.volume is not None:
            return self.volume**2
        return measure.measure_squared(self.base, tuple(self._facets)) if self.base else Fraction(0)

    @cached_property
    def measure(self) -> float | None:
        """The measure in the region's own dimension, rounded."""
        return None if self.measure_squared is None else sqrt(self.measure_squared)

    @cached_property
    def outcome(self) -> Outcome:
        """What optimizing over the region ends with."""
        goal = self.model.objective
        if self.status == "empty":
            return "empty"
        if goal is None:
            return "no objective"
        climbs = any(dot(goal.upward, ray.direction) > 0 for ray in self.rays)
        slides = any(dot(goal.upward, line) for line in self.lines)
        return "unbounded" if climbs or slides else "optimal"

    @cached_property
    def value(self) -> Fraction | None:
        """The optimal value of the objective; None where there is none."""
        goal = self.model.objective
        if goal is None or self.outcome != "optimal":
            return None
        return (min if goal.goal == "min" else max)(goal.at(point) for point in self.base)

    @cached_property
    def optimal(self) -> Face | None:
        """The face on which the objective is optimal; None where there is none."""
        goal = self.model.objective
        if goal is None or self.outcome != "optimal":
            return None
        corners = tuple(k for k, point in enumerate(self.base) if goal.at(point) == self.value)
        level = tuple(k for k, ray in enumerate(self.rays) if ray.change == 0)
        return Face(corners, level, tuple(range(len(self.lines))))

    def table(self) -> Table:
        """Every vertex as a row; notes tell rays, lines and the optimum."""
        return telling.table(self)
