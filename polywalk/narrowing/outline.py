"""The outline of a shadow: an inner hull grown by support points until every facet of it is proved.

Each facet of the hull so far is asked: how far does the model reach in the direction of your normal? Either no further,
which proves the facet, or to a new point (or along a ray), which joins the hull. Flat shadows are found first: what
reaches equally far both ways is an equality.

References
----------
Lassez & Lassez, Quantifier elimination for conjunctions of linear constraints via a convex hull algorithm, in
Symbolic and Numerical Computation for Artificial Intelligence, 1992.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from fractions import Fraction
from typing import Protocol

from polywalk.exact import Row
from polywalk.narrowing.hull import Hull, Integers, members, product, smallest, whole
from polywalk.narrowing.support import Multipliers, Reach, value_of
from polywalk.region.spans import echelon


class Asks(Protocol):
    """Whoever answers how far the model reaches."""

    def ask(self, direction: Integers) -> Reach:
        """The answer in this direction."""


@dataclass(frozen=True)
class Edge:
    """One proved inequality of the shadow, direction . x <= limit, or both ways an equality.

    Parameters
    ----------
    direction : (k,) tuple of int
    limit : Fraction
    multipliers : tuple of (str, Fraction)
        That prove it.
    backward : tuple of (str, Fraction) or None
        For an equality: that prove -direction . x <= -limit.
    """

    direction: Integers
    limit: Fraction
    multipliers: Multipliers
    backward: Multipliers | None = None


@dataclass
class Outline:
    """The state of the search; usable at any time, also when it was interrupted.

    Parameters
    ----------
    asks : Asks
    size : int
        How many columns are looked at.
    touch : float
        The gap, relative to the shadow's size, at which a facet counts as proved; 0 where all is exact.
    """

    asks: Asks
    size: int
    touch: float = 0.0
    generators: list[Integers] = field(default_factory=list)
    equalities: list[Edge] = field(default_factory=list)
    edges: list[Edge] = field(default_factory=list)
    hull: Hull | None = None
    chosen: list[int] = field(default_factory=list)
    is_complete: bool = False
    _limits: dict[Integers, Edge] = field(default_factory=dict)

    def search(self) -> None:
        """Go on until every facet is proved."""
        self._begin()
        self._span()
        self.wrap()
        assert self.hull is not None
        settled: set[Integers] = set()
        while open_ones := [facet for facet in self.hull.facets if facet not in settled]:
            for facet in open_ones:
                if facet in self.hull.facets and self._settle(facet):
                    settled.add(facet)
        self.is_complete = True

    def wrap(self) -> None:
        """The hull of the generators so far, anew."""
        _, self.chosen = echelon([tuple(map(Fraction, row)) for row in self.generators])
        first = _independent(self.generators)
        self.hull = Hull([self._short(self.generators[k]) for k in first])
        rest = [k for k in range(len(self.generators)) if k not in first]
        self.generators = [self.generators[k] for k in (*first, *rest)]
        for k in range(len(first), len(self.generators)):
            self.hull.add(self._short(self.generators[k]))

    def faces(self) -> list[tuple[Integers, Fraction, bool]]:
        """The hull so far as rows: direction, limit, and whether it is flat there."""
        assert self.hull is not None
        rows = [(self._long(facet), False) for facet in self.hull.facets]
        rows += [(row, True) for row in _all_orthogonal(self.generators, self.size + 1)]
        found = []
        for row, is_flat in rows:
            direction = _direction(row, -1)
            if any(direction):
                place = next(k for k, value in enumerate(direction) if value)
                found.append((direction, Fraction(row[0] * direction[place], -row[place + 1]), is_flat))
        return found

    def _begin(self) -> None:
        """A first point, and the ray met on the way to it."""
        found = self._ask((1,) + (0,) * (self.size - 1))
        if not found.generator[0]:
            self.generators.append(self._ask((0,) * self.size).generator)
        self.generators.append(found.generator)

    def _span(self) -> None:
        """Independent generators, and the equalities that keep the shadow from having more."""
        while True:
            row = _orthogonal([*self.generators, *((0, *edge.direction) for edge in self.equalities)], self.size + 1)
            if row is None:
                return
            direction = _direction(row, 1)
            for way in (direction, tuple(-value for value in direction)):
                found = self._ask(way)
                if abs(product(row, found.generator)) > self._room(row, found.generator):
                    self.generators.append(found.generator)
                    break
            else:
                self._equal(direction)

    def _equal(self, direction: Integers) -> None:
        back = tuple(-value for value in direction)
        forth, other = self._limits[direction], self._limits[back]
        self.equalities.append(Edge(direction, forth.limit, forth.multipliers, other.multipliers))

    def _ask(self, direction: Integers) -> Reach:
        found = self.asks.ask(direction)
        if found.limit is not None:
            self._limits[direction] = Edge(direction, found.limit, found.multipliers)
        return found

    def _settle(self, facet: Integers) -> bool:
        """Prove the facet, or let the hull grow beyond it; whether it is proved."""
        assert self.hull is not None
        row = self._long(facet)
        direction = _direction(row, -1)
        if not any(direction):
            return True  # the far side of an unbounded shadow
        if direction in self._limits:  # its furthest point is in the hull already
            self.edges.append(self._limits[direction])
            return True
        if self.touch and self._accounted(facet):
            return True
        generator = self._ask(direction).generator
        edge = self._limits.get(direction)
        if edge is not None and (product(row, generator) >= 0 or self._gap(row, edge) <= self.touch):
            self.edges.append(edge)
            return True
        self.generators.append(generator)
        self.hull.add(self._short(generator))
        return False

    def _gap(self, row: Integers, edge: Edge) -> float:
        """How far the model reaches beyond a facet of the hull, relative to the shadow's size; 0 only if no further."""
        place = next(k for k, value in enumerate(edge.direction) if value)
        held = Fraction(row[0] * edge.direction[place], -row[place + 1])
        return max(float((edge.limit - held) / self._scale(edge.direction)), 5e-324 if edge.limit > held else 0.0)

    def _scale(self, direction: Integers) -> Fraction:
        spans = self.spans()
        return max(abs(value) * span for value, span in zip(direction, spans, strict=True) if value)

    def spans(self) -> Row:
        """How wide the hull is in every column; 1 where it is flat."""
        points = [generator for generator in self.generators if generator[0]]
        columns = list(zip(*[[Fraction(v, point[0]) for v in point[1:]] for point in points], strict=True))
        return tuple((max(column) - min(column)) or Fraction(1) for column in columns)

    def _room(self, row: Integers, generator: Integers) -> Fraction:
        if not self.touch:
            return Fraction(0)
        sizes = [abs(a * b) for a, b in zip(row, generator, strict=True)]
        return Fraction(self.touch) * max(*sizes, 1)

    def _accounted(self, facet: Integers) -> bool:
        """Whether all generators of the facet lie on a facet already proved, within the tolerance."""
        assert self.hull is not None
        on = [self.generators[k] for k in members(self.hull.facets[facet])]
        return any(all(self.lies_on(edge, generator) for generator in on) for edge in self.edges)

    def lies_on(self, edge: Edge, generator: Integers) -> bool:
        """Whether a generator lies on a facet, within the tolerance."""
        value = value_of(edge.direction, generator)
        target = edge.limit if generator[0] else Fraction(0)
        scale = self._scale(edge.direction) if generator[0] else Fraction(max(map(abs, edge.direction)))
        return abs(value - target) <= Fraction(self.touch) * scale

    def _short(self, generator: Integers) -> Integers:
        return tuple(generator[k] for k in self.chosen)

    def _long(self, facet: Integers) -> Integers:
        row = [0] * (self.size + 1)
        for k, value in zip(self.chosen, facet, strict=True):
            row[k] = value
        return tuple(row)


def _independent(rows: Sequence[Integers]) -> list[int]:
    """The first independent ones, by place."""
    columns = [tuple(Fraction(row[j]) for row in rows) for j in range(len(rows[0]))]
    return echelon(columns)[1]


def _direction(row: Integers, sign: int) -> Integers:
    """The normal of a row (b, a), or its opposite, in the smallest integers."""
    return smallest([sign * value for value in row[1:]])


def _orthogonal(rows: Sequence[Integers], size: int) -> Integers | None:
    """A row orthogonal to all given ones, None where only zero is."""
    return next(iter(_all_orthogonal(rows, size)), None)


def _all_orthogonal(rows: Sequence[Integers], size: int) -> list[Integers]:
    """Independent rows that are orthogonal to all given ones, as many as there are."""
    basis, pivots = echelon([tuple(map(Fraction, row)) for row in rows])
    made = []
    for free in [k for k in range(size) if k not in pivots]:
        found = [Fraction(0)] * size
        found[free] = Fraction(1)
        for lead, pivot in zip(basis, pivots, strict=True):
            found[pivot] = -lead[free]
        made.append(whole(found))
    return made
