"""A float shadow's combinatorics made right: facets that differ by rounding are one, points between vertices are none.

What the hull holds after rounding has facets in several pieces and vertices that are none. A facet keeps the points
that lie on it within the tolerance; one whose points all lie on another is dropped; a point stays a vertex where no
other point lies on all its facets and more. Facets that meet in one point are moved so that they do so exactly.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from fractions import Fraction

import numpy as np

from polywalk.exact import Row, integer_row
from polywalk.narrowing.hull import Integers, plane_through, smallest
from polywalk.narrowing.meeting import SOLID, Incidence, met
from polywalk.narrowing.outline import Edge, Outline
from polywalk.narrowing.tolerances import TOLERANCES, snapped


@dataclass(frozen=True)
class Merged:
    """The facets that remain, and at how many corners rounding keeps them from meeting in one point.

    Parameters
    ----------
    edges : tuple of Edge
    corners : int
        How many corners there are.
    split : int
        At so many of them more facets meet than would do, and not exactly in one point: a region made of these facets
        has several corners there.
    met : int
        At so many of them more facets meet than would do, and were moved to meet exactly.
    moved : float
        How far facets were moved for that, as a share of the shadow's size.
    """

    edges: tuple[Edge, ...]
    corners: int
    split: int
    met: int = 0
    moved: float = 0.0


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
    in_plane = len(found.chosen) == SOLID  # each facet has two corners there: through both, unless it is rounded
    edges = tuple(replace(_cleaned(edge, found), is_met=in_plane) for edge in refitted)
    points = [p for p in sorted(corners) if found.generators[p][0]]
    through = [frozenset(j for j, k in enumerate(largest) if p in on[k]) for p in points]
    split = sum(_is_split([edges[j] for j in part], found.chosen) for part in through)
    whole = Merged(edges, len(points), split)
    return (_met(whole, found, points, through) if split else None) or whole


def from_zero(found: Outline, axis: int) -> None:
    """Let an axis that measures from an optimum begin at 0: the optimum was known no better than its smallest value."""
    points = [generator for generator in found.generators if generator[0]]
    least = min(Fraction(point[axis + 1], point[0]) for point in points)
    width = float(found.near.widths()[axis])
    if not 0 < abs(least) <= TOLERANCES.meet * width:
        return
    moved = []
    for generator in found.generators:
        row = [Fraction(value, generator[0] or 1) for value in generator]
        row[axis + 1] = snapped(float(row[axis + 1] - least)) if generator[0] else row[axis + 1]
        moved.append(smallest(integer_row(row)[0]))
    found.generators = moved
    found.edges = [replace(edge, limit=_moved(edge, axis, least)) for edge in found.edges]


def _moved(edge: Edge, axis: int, least: Fraction) -> Fraction:
    size = max(map(abs, edge.direction))
    limit = edge.limit - edge.direction[axis] * least
    return snapped(float(limit / size)) * size if edge.direction[axis] else edge.limit


def _met(whole: Merged, found: Outline, points: Sequence[int], through: Sequence[frozenset[int]]) -> Merged | None:
    """The facets moved so that none of the corners is split; None where that moves them too far, or cannot be done."""
    if len(found.chosen) != SOLID + 1:
        return None
    solid = Incidence(
        points=[tuple(Fraction(found.generators[p][k], found.generators[p][0]) for k in found.chosen) for p in points],
        planes=[_chosen(edge, found.chosen) for edge in whole.edges],
        on=[frozenset(i for i, part in enumerate(through) if j in part) for j in range(len(whole.edges))],
        fixed=frozenset(j for j, edge in enumerate(whole.edges) if edge.is_plain),
    )
    moved = met(solid)
    if moved is None or moved[1] > TOLERANCES.meet:
        return None
    edges = []
    for edge, row in zip(whole.edges, moved[0], strict=True):
        full = [Fraction(0)] * (found.size + 1)
        for k, value in zip(found.chosen, row, strict=True):
            full[k] = value
        scale = _matching(full[1:], edge.direction)
        if scale is None:
            return None
        turned = _turned(edge, tuple(value * scale for value in full[1:]), -full[0] * scale)
        edges.append(edge if edge.is_plain else replace(turned, is_met=True))
    crowded = sum(len(part) > SOLID for part in through)
    return replace(whole, edges=tuple(edges), split=0, met=crowded, moved=moved[1])


def _chosen(edge: Edge, chosen: Sequence[int]) -> Row:
    row = (-edge.limit, *map(Fraction, edge.direction))
    return tuple(row[k] for k in chosen)


def _is_split(edges: Sequence[Edge], chosen: Sequence[int]) -> bool:
    """Whether the facets through a corner do not meet in one point exactly."""
    if len(edges) < len(chosen):
        return False
    return plane_through([integer_row(_chosen(edge, chosen))[0] for edge in edges], len(chosen)) is None


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
