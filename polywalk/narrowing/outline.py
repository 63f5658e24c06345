"""The outline of a shadow: an inner hull grown by support points until every facet of it is proved.

Each facet of the hull so far is asked: how far does the model reach in the direction of your normal? Either no further,
which proves the facet, or to a new point (or along a ray), which joins the hull. Flat shadows are found first: what
reaches equally far both ways is an equality. The newest facets are asked first, for the last point lies on them; an
older one is asked from the basis of a point of its own, so that each linear program starts near its end.

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

from polywalk.narrowing.hull import Hull, Integers, independent, members, orthogonal, product, smallest
from polywalk.narrowing.nearness import Nearness
from polywalk.narrowing.proof import Proof
from polywalk.narrowing.support import Reach

PLAIN = 10**6
"""Integers up to this size are coefficients someone could have typed; larger ones are scaled."""


class Asks(Protocol):
    """Whoever answers how far the model reaches."""

    def ask(self, direction: Integers, facet: Sequence[Integers] = ()) -> Reach:
        """The answer in this direction, near these points of a facet."""


@dataclass(frozen=True, eq=False)
class Edge:
    """One proved inequality of the shadow, direction . x <= limit, or both ways an equality.

    Parameters
    ----------
    direction : (k,) tuple of int
    limit : Fraction
    proof : Proof or None
        The multipliers that add up to it; None where it is not proved.
    backward : Proof or None
        For an equality: those that add up to -direction . x <= -limit.
    is_equality : bool
    is_met : bool
        Whether it was moved to meet others exactly: then its numbers must not be rounded.
    """

    direction: Integers
    limit: Fraction
    proof: Proof | None = None
    backward: Proof | None = None
    is_equality: bool = False
    is_met: bool = False

    @property
    def is_plain(self) -> bool:
        """Whether its numbers, as the smallest integers, are so short that someone could have typed them."""
        return max(map(abs, self.direction)) * self.limit.denominator <= PLAIN


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
        hull = self.wrap()
        waiting = list(hull.facets)
        while waiting:
            facet = waiting.pop()
            if facet in hull.facets:
                waiting += self._settle(hull, facet)
        self.is_complete = True

    def wrap(self) -> Hull:
        """The hull of the generators so far, anew; the independent ones come first."""
        first = independent(self.generators)
        rest = [k for k in range(len(self.generators)) if k not in first]
        self.generators = [self.generators[k] for k in (*first, *rest)]
        columns = [tuple(generator[j] for generator in self.generators) for j in range(self.size + 1)]
        self.chosen = independent(columns)
        self.hull = Hull([self._short(generator) for generator in self.generators[: len(first)]])
        for generator in self.generators[len(first) :]:
            self.hull.add(self._short(generator))
        self.near = Nearness(self.size, self.touch)
        for generator in self.generators:
            self.near.see(generator)
        return self.hull

    def faces(self) -> list[Edge]:
        """The hull so far, its facets and what it is flat in, without proofs."""
        assert self.hull is not None
        found = [self._edge(self._long(facet), False) for facet in self.hull.facets if any(facet[1:])]
        return found + [self._edge(row, True) for row in orthogonal(self.generators, self.size + 1)]

    def _edge(self, row: Integers, is_equality: bool) -> Edge:
        direction = _direction(row, -1)
        place = next(k for k, value in enumerate(direction) if value)
        return Edge(direction, Fraction(row[0] * direction[place], -row[place + 1]), is_equality=is_equality)

    def _begin(self) -> None:
        """A first point, and the ray met on the way to it."""
        found = self._ask((1,) + (0,) * (self.size - 1))
        if not found.generator[0]:
            self.generators.append(self._ask((0,) * self.size).generator)
        self.generators.append(found.generator)

    def _span(self) -> None:
        """Independent generators, and the equalities that keep the shadow from having more."""
        while True:
            known = [*self.generators, *((0, *edge.direction) for edge in self.equalities)]
            row = next(iter(orthogonal(known, self.size + 1)), None)
            if row is None:
                return
            direction = _direction(row, 1)
            for way in (direction, tuple(-value for value in direction)):
                found = self._ask(way)
                if self._leaves(row, found.generator):
                    self.generators.append(found.generator)
                    break
            else:
                self._equal(direction)

    def _leaves(self, row: Integers, generator: Integers) -> bool:
        """Whether a generator lies off what the others span; in floats, by more than the tolerance."""
        terms = [abs(a * b) for a, b in zip(row, generator, strict=True)]
        room = Fraction(self.touch) * max(terms) if self.touch else 0
        return abs(product(row, generator)) > room

    def _equal(self, direction: Integers) -> None:
        forth, back = self._limits[direction], self._limits[tuple(-value for value in direction)]
        self.equalities.append(Edge(direction, forth.limit, forth.proof, back.proof, True))

    def _ask(self, direction: Integers, facet: Sequence[Integers] = ()) -> Reach:
        found = self.asks.ask(direction, facet)
        if found.limit is not None:
            self._limits[direction] = Edge(direction, found.limit, found.proof)
        return found

    def _settle(self, hull: Hull, facet: Integers) -> list[Integers]:
        """Prove the facet, or let the hull grow beyond it; the facets that are new."""
        row = self._long(facet)
        direction = _direction(row, -1)
        if not any(direction):
            return []  # the far side of an unbounded shadow
        if direction in self._limits:  # its furthest point is in the hull already
            return self._prove(self._limits[direction])
        corners = members(hull.facets[facet])
        if self.touch and self.near.on_one_facet(corners):
            return []
        generator = self._ask(direction, [self.generators[k] for k in corners]).generator
        edge = self._limits.get(direction)
        if edge is not None and (product(row, generator) >= 0 or self._gap(row, edge) <= self.touch):
            return self._prove(edge)
        self.generators.append(generator)
        self.near.see(generator)
        return hull.add(self._short(generator))

    def _prove(self, edge: Edge) -> list[Integers]:
        self.edges.append(edge)
        self.near.hold(edge.direction, edge.limit)
        return []

    def _gap(self, row: Integers, edge: Edge) -> float:
        """How far the model reaches beyond a facet of the hull, relative to the shadow's size; 0 only if no further."""
        return self.near.share(edge.direction, edge.limit - self._edge(row, False).limit)

    def _short(self, generator: Integers) -> Integers:
        return tuple(generator[k] for k in self.chosen)

    def _long(self, facet: Integers) -> Integers:
        row = [0] * (self.size + 1)
        for k, value in zip(self.chosen, facet, strict=True):
            row[k] = value
        return tuple(row)


def _direction(row: Integers, sign: int) -> Integers:
    """The normal of a row (b, a), or its opposite, in the smallest integers."""
    return smallest([sign * value for value in row[1:]])
