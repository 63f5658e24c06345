"""The exact measure of a bounded region: length, area, volume and so on, of its own dimension.

Cohen and Hickey's triangulation: a face is cut into the pyramids from its first vertex over those of its own facets
that miss this vertex, and so on down to single vertices. A flat region is measured in as many coordinates as it has
dimensions; the square of the factor back to its own plane is a Gram determinant, hence rational.

References
----------
Cohen & Hickey, Two algorithms for determining volumes of convex polyhedra, J. ACM 26, 1979.
Büeler, Enge & Fukuda, Exact volume computation for polytopes: a practical study, DMV Seminar 29, 2000.
"""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from functools import cache
from math import factorial

from polywalk.exact import Row, dot
from polywalk.region.faces import is_largest
from polywalk.region.spans import echelon


def measure_squared(points: Sequence[Row], facets: Sequence[int]) -> Fraction:
    """The square of the measure, exact; a single point has measure 1 (it is counted)."""
    basis, pivots = echelon([_difference(point, points[0]) for point in points[1:]])
    flat = [tuple(point[j] for j in pivots) for point in points]
    gram = [tuple(dot(left, right) for right in basis) for left in basis]
    return volume(flat, facets) ** 2 * determinant(gram)


def volume(points: Sequence[Row], facets: Sequence[int]) -> Fraction:
    """The volume of the full-dimensional polytope with these vertices and facets (patterns over the vertices)."""
    dimension = len(points[0])

    @cache
    def sides(face: int) -> tuple[int, ...]:
        cuts = {face & facet for facet in facets if face & facet != face} - {0}
        return tuple(cut for cut in sorted(cuts) if is_largest(cut, cuts))

    def pyramids(face: int, basis: tuple[tuple[int, Row], ...], product: Fraction) -> Fraction:
        """The determinants of all simplices over this face; the elimination so far is shared among them."""
        apex = _first(face)
        pivot, row = _next_pivot(_difference(points[apex], points[0]), basis)
        basis, product = (*basis, (pivot, row)), product * row[pivot]
        if len(basis) == dimension:
            return abs(product)
        return sum((pyramids(side, basis, product) for side in sides(face) if not side >> apex & 1), Fraction(0))

    if dimension == 0:
        return Fraction(1)
    opposite = [side for side in sides((1 << len(points)) - 1) if not side & 1]
    return sum((pyramids(side, (), Fraction(1)) for side in opposite), Fraction(0)) / factorial(dimension)


def determinant(rows: Sequence[Row]) -> Fraction:
    """The determinant of a square matrix (1 for the empty one)."""
    product, left = Fraction(1), [list(row) for row in rows]
    while left:
        chosen = next((k for k, row in enumerate(left) if row[0]), None)
        if chosen is None:
            return Fraction(0)
        lead = left.pop(chosen)
        product *= lead[0] * (-1) ** chosen
        left = [[b - row[0] / lead[0] * a for a, b in zip(lead[1:], row[1:], strict=True)] for row in left]
    return product


def _next_pivot(row: Row, basis: Sequence[tuple[int, Row]]) -> tuple[int, Row]:
    """The row after elimination by the rows before it, and its first column that is not zero."""
    for pivot, lead in basis:
        if row[pivot]:
            factor = row[pivot] / lead[pivot]
            row = tuple(b - factor * a for a, b in zip(lead, row, strict=True))
    return next(j for j, value in enumerate(row) if value), row


def _difference(left: Row, right: Row) -> Row:
    return tuple(a - b for a, b in zip(left, right, strict=True))


def _first(pattern: int) -> int:
    return (pattern & -pattern).bit_length() - 1
