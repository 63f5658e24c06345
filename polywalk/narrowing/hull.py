"""The hull of points and rays, kept up to date while they come in one by one. Exact, in integers.

A point p is the generator (1, p), a ray r is (0, r), each times a positive number; a facet (b, a) says b + a.x >= 0.
The facets are the extreme rays of the cone of all rows that no generator violates, and the double description
method keeps exactly those.

References
----------
Motzkin, Raiffa, Thompson & Thrall, The double description method, Contributions to the Theory of Games II, 1953.
Fukuda & Prodon, Double description method revisited, LNCS 1120, 1996.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from fractions import Fraction
from math import gcd
from operator import mul

from polywalk.exact import integer_row
from polywalk.region.spans import echelon

Integers = tuple[int, ...]


class Hull:
    """The facets of what generators span.

    Parameters
    ----------
    generators : sequence of (d,) tuple of int
        d independent ones to begin with.

    Examples
    --------
    >>> from polywalk.narrowing.hull import Hull
    >>> triangle = Hull([(1, 0, 0), (1, 1, 0), (1, 0, 1)])
    >>> sorted(triangle.add((1, 1, 1)))
    [(1, -1, 0), (1, 0, -1)]
    >>> sorted(triangle.facets)
    [(0, 0, 1), (0, 1, 0), (1, -1, 0), (1, 0, -1)]
    """

    def __init__(self, generators: Sequence[Integers]) -> None:
        self.generators = list(generators)
        self.size = len(generators)
        whole = (1 << self.size) - 1
        self.facets: dict[Integers, int] = {
            facet: whole ^ (1 << k) for k, facet in enumerate(_opposite(self.generators))
        }
        """Each facet with the generators on it, as a bit mask."""

    def add(self, generator: Integers) -> list[Integers]:
        """Take one more generator in; facets that it lies beyond give way to new ones, which are returned."""
        bit = 1 << len(self.generators)
        self.generators.append(generator)
        values = {facet: product(facet, generator) for facet in self.facets}
        beyond = [facet for facet, value in values.items() if value < 0]
        inside = [(facet, self.facets[facet]) for facet, value in values.items() if value > 0]
        made = {
            _between(low, values[low], high, values[high]): (mask & other) | bit
            for low, mask in ((facet, self.facets[facet]) for facet in beyond)
            for high, other in inside
            if (mask & other).bit_count() >= self.size - 2 and self._meet(low, high)
        }
        for facet in beyond:
            del self.facets[facet]
        for facet in self.facets:
            if values[facet] == 0:
                self.facets[facet] |= bit
        self.facets.update(made)
        return list(made)

    def _meet(self, low: Integers, high: Integers) -> bool:
        """Whether two facets that share enough generators share a ridge: no third one has all of these."""
        shared = self.facets[low] & self.facets[high]
        return not any(
            mask & shared == shared for facet, mask in self.facets.items() if facet is not low and facet is not high
        )


def members(mask: int) -> list[int]:
    """The places of the bits of a mask."""
    return [k for k in range(mask.bit_length()) if mask >> k & 1]


def product(left: Iterable[int], right: Iterable[int]) -> int:
    """The inner product of two rows of integers."""
    return sum(map(mul, left, right))


def whole(values: Sequence[Fraction]) -> Integers:
    """The same direction in the smallest integers."""
    return smallest(integer_row(values)[0])


def smallest(values: Sequence[int]) -> Integers:
    """Integers without their common divisor."""
    divisor = gcd(*values) or 1
    return tuple([value // divisor for value in values])


def independent(rows: Sequence[Integers]) -> list[int]:
    """The first independent ones, by place."""
    return echelon([tuple(Fraction(row[j]) for row in rows) for j in range(len(rows[0]))])[1]


def orthogonal(rows: Sequence[Integers], size: int) -> list[Integers]:
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


def plane_through(rows: Iterable[Integers], size: int) -> Integers | None:
    """The row orthogonal to all given ones, where there is just one; its sign is not determined.

    Examples
    --------
    >>> from polywalk.narrowing.hull import plane_through
    >>> plane_through([(1, 2, 0), (1, 0, 2), (1, 1, 1)], 3)
    (2, -1, -1)
    >>> plane_through([(1, 2, 0), (1, 0, 2), (1, 1, 3)], 3) is None
    True
    """
    left = [tuple(int(i == k) for k in range(size)) for i in range(size)]
    for row in rows:
        values = [product(one, row) for one in left]
        lead = next((k for k, value in enumerate(values) if value), None)
        if lead is None:
            continue
        if len(left) == 1:
            return None
        top, pivot = left.pop(lead), values.pop(lead)
        left = [
            smallest([pivot * a - value * b for a, b in zip(one, top, strict=True)])
            for one, value in zip(left, values, strict=True)
        ]
    return left[0] if len(left) == 1 else None


def _between(low: Integers, under: int, high: Integers, over: int) -> Integers:
    return smallest([over * a - under * b for a, b in zip(low, high, strict=True)])


def _opposite(generators: list[Integers]) -> list[Integers]:
    """For each of d independent generators the facet through all others."""
    d = len(generators)
    table = [(*map(Fraction, row), *(Fraction(int(i == k)) for k in range(d))) for i, row in enumerate(generators)]
    basis, pivots = echelon(table)
    if pivots[:d] != list(range(d)):
        raise ValueError("expected independent generators to begin with")
    return [whole([basis[j][d + k] for j in range(d)]) for k in range(d)]
