"""A float shadow's combinatorics made right: facets that differ by rounding are one, points between vertices are none.

What the hull holds after rounding has facets in several pieces and vertices that are none. A facet keeps the points
that lie on it within the tolerance; one whose points all lie on another is dropped; a point stays a vertex where no
other point lies on all its facets and more.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from fractions import Fraction

import numpy as np

from polywalk.exact import Row, integer_row
from polywalk.narrowing.hull import Integers, plane_through, smallest
from polywalk.narrowing.outline import Edge, Outline


@dataclass(frozen=True)
class Merged:
    """The facets that remain, and at how many corners rounding keeps them from meeting in one point.

    Parameters
    ----------
    edges : tuple of Edge
    corners : int
        How many corners there are.
    split : int
        At so many of them more facets meet than would do, and with rounded numbers not exactly in one point: a region
        made of these facets has several corners there.
    """

    edges: tuple[Edge, ...]
    corners: int
    split: int


def merged(found: Outline) -> Merged:
    """The facets that remain, each through its vertices where these lie exactly on one plane."""
    on = [frozenset(np.flatnonzero(column).tolist()) for column in found.near.incidence().T]
    largest = [
        k
        for k, points in enumerate(on)
        if not any(points < other or (points == other and j < k) for j, other in enumerate(on))
    ]
    corners = _corners([on[k] for k in largest], found.generators)
    refitted = (
        _refitted(found.edges[k], [found.generators[p] for p in sorted(on[k] & corners)], found) for k in largest
    )
    edges = tuple(_cleaned(edge, found) for edge in refitted)
    points = [p for p in corners if found.generators[p][0]]
    meeting = ([edge for edge, k in zip(edges, largest, strict=True) if p in on[k]] for p in points)
    return Merged(edges, len(points), sum(_is_split(through, found.chosen) for through in meeting))


def _is_split(edges: Sequence[Edge], chosen: Sequence[int]) -> bool:
    """Whether the facets through a corner do not meet in one point exactly."""
    if len(edges) < len(chosen):
        return False
    rows = ((edge.limit, *map(Fraction, edge.direction)) for edge in edges)
    return plane_through([integer_row([row[k] for k in chosen])[0] for row in rows], len(chosen)) is None


def _cleaned(edge: Edge, found: Outline) -> Edge:
    """The facet without coefficients that make no difference over the whole width of the shadow."""
    widths = [Fraction(float(width)) for width in found.near.widths()]
    shares = [abs(value) * width for value, width in zip(edge.direction, widths, strict=True)]
    least = max(shares) * Fraction(found.touch)
    if all(share == 0 or share > least for share in shares):
        return edge
    middle = found.near.middle()
    row = [
        Fraction(value) if share > least else Fraction(0) for value, share in zip(edge.direction, shares, strict=True)
    ]
    moved = sum(
        (v * Fraction(float(m)) for v, r, m in zip(edge.direction, row, middle, strict=True) if not r), Fraction(0)
    )
    return _turned(edge, tuple(row), edge.limit - moved)


def _corners(on: Sequence[frozenset[int]], generators: Sequence[Integers]) -> set[int]:
    """The generators that lie on more facets than any other that shares them."""
    of = [frozenset(j for j, points in enumerate(on) if k in points) for k in range(len(generators))]
    kinds = [bool(generator[0]) for generator in generators]
    return {
        k
        for k, mine in enumerate(of)
        if not any(kinds[j] == kinds[k] and (mine < other or (mine == other and j < k)) for j, other in enumerate(of))
    }


def _refitted(edge: Edge, corners: list[Integers], found: Outline) -> Edge:
    """The same facet through its vertices, if one plane in the columns of the hull holds them all exactly."""
    plane = plane_through([tuple([corner[k] for k in found.chosen]) for corner in corners], len(found.chosen))
    if plane is None:
        return edge
    row = [Fraction(0)] * (found.size + 1)
    for k, value in zip(found.chosen, plane, strict=True):
        row[k] = Fraction(value)
    scale = _matching(row[1:], edge.direction)
    if scale is None:
        return edge
    return _turned(edge, tuple(value * scale for value in row[1:]), -row[0] * scale)


def _matching(row: Sequence[Fraction], direction: Integers) -> Fraction | None:
    """What to multiply the row with so that it points the way of the direction; None where it is a constant."""
    length = sum([a * b for a, b in zip(row, direction, strict=True)], Fraction(0))
    return None if not length else Fraction(sum(v * v for v in direction)) / length


def _turned(edge: Edge, row: Row, limit: Fraction) -> Edge:
    """The facet with other coefficients, in the smallest integers; its multipliers scaled along."""
    whole, _ = integer_row((limit, *row))
    small = smallest(whole)
    factor = next(a / b for a, b in zip(small[1:], row, strict=True) if b)
    proof = edge.proof and edge.proof.times(factor)
    return replace(edge, direction=small[1:], limit=Fraction(small[0]), proof=proof)
