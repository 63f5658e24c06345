"""Facets moved a little, so that those which meet in one corner do so exactly: a corner of four is split by rounding.

Corners and facets of a solid, joined where one lies on the other, are a planar graph with two kinds of nodes, and in
each such graph some node has three neighbours or fewer. So nodes can be taken away, those first, until none is left;
put back in the opposite order each has to agree with at most three that stand already, and it can: three planes meet
in a point, three points span a plane. What is still free is taken from floats that agree as far as floats can.

References
----------
Steinitz & Rademacher, Vorlesungen über die Theorie der Polyeder, 1934 (every incidence of a solid can be had in
rational numbers); Grünbaum, Convex Polytopes, 2nd ed., 2003, chapter 13.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction

import numpy as np

from polywalk.exact import Row
from polywalk.narrowing.agreeing import Floats, agreed

SOLID = 3
"""The dimension in which facets and corners can disagree; in the plane each facet has two corners."""

BITS = 32
"""Binary digits of a number that may be chosen, where the solid is about as large as 1: a little beyond what a solver's
floats tell (`TOLERANCES.touch`), and few, since what depends on three such numbers three times over has many more.
"""

NARROW = 1e-6
"""A pivot smaller than this share makes too much of rounding."""


@dataclass(frozen=True)
class Incidence:
    """Points and planes of a solid, both with four entries, and the numbers of the points on each plane.

    Parameters
    ----------
    points : sequence of (4,) tuple of Fraction
        (1, p).
    planes : sequence of (4,) tuple of Fraction
        (b, a), zero at the points on it.
    on : sequence of frozenset of int
        For each plane.
    fixed : frozenset of int
        Planes that must stay as they are.
    """

    points: Sequence[Row]
    planes: Sequence[Row]
    on: Sequence[frozenset[int]]
    fixed: frozenset[int]


Node = tuple[bool, int]
"""A plane (True) or a point, and its number."""


def met(given: Incidence) -> tuple[list[Row], float] | None:
    """The planes, moved so that all that meet in a point meet exactly; and how far, as a share of the solid's size.

    None where they cannot be made to.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.narrowing.meeting import Incidence, met
    >>> tip = [(1, 1, 0, -1), (1, -1, 0, -1), (1, 0, 1, -1), (Fraction(10**9 + 1, 10**9), 0, -1, -1), (0, 0, 0, 1)]
    >>> corners = [(1, 0, 0, 1), (1, -1, -1, 0), (1, -1, 1, 0), (1, 1, -1, 0), (1, 1, 1, 0)]
    >>> on = [{0, 1, 2}, {0, 3, 4}, {0, 1, 3}, {0, 2, 4}, {1, 2, 3, 4}]
    >>> rows, moved = met(Incidence(corners, tip, [frozenset(part) for part in on], frozenset({0, 1, 2, 4})))
    >>> any(sum(a * p for a, p in zip(row, (1, 0, 0, 1))) for row in rows[:4]), moved < 1e-8
    (False, True)
    """
    crowded = {p for p in range(len(given.points)) if sum(p in part for part in given.on) > SOLID}
    if not crowded:
        return list(given.planes), 0.0
    links = [part & crowded for part in given.on]
    order = _order(crowded, links, given.fixed)
    if order is None:
        return None
    frame = _Frame(given.points)
    planes = [frame.inward(plane) for plane in given.planes]
    guess = agreed([frame.point(given.points[p]) for p in sorted(crowded)], planes, _renumbered(links), given.fixed)
    placed = _placed(order, links, guess, sorted(crowded), {k: planes[k] for k in given.fixed})
    if placed is None:
        return None
    rows = [placed.get((True, k), tuple(plane)) for k, plane in enumerate(planes)]
    corners = [frame.point(point) for point in given.points]
    moved = max(_gap(row, corners[p]) for row, part in zip(rows, given.on, strict=True) for p in part)
    return [frame.outward(row) for row in rows], moved


def _renumbered(links: Sequence[frozenset[int]]) -> list[list[int]]:
    """The links with the points they name numbered without gaps."""
    number = {p: k for k, p in enumerate(sorted(frozenset().union(*links)))}
    return [sorted(number[p] for p in part) for part in links]


def _gap(row: Row, point: Row) -> float:
    size = max(map(abs, row[1:]))
    return abs(float(sum([a * b for a, b in zip(row, point, strict=True)], Fraction(0)) / size))


class _Frame:
    """Coordinates in which the solid lies about the origin and is about as large as 1: powers of two, so few digits."""

    def __init__(self, points: Sequence[Row]) -> None:
        array = np.array([[float(value) for value in point[1:]] for point in points])
        low, high = array.min(axis=0), array.max(axis=0)
        self.scales = [Fraction(2) ** int(np.ceil(np.log2(width))) for width in high - low]
        middles = ((low + high) / 2).tolist()
        self.middles = [
            round(Fraction(middle) / scale * 64) * scale / 64
            for middle, scale in zip(middles, self.scales, strict=True)
        ]

    def point(self, point: Row) -> Row:
        """A point (1, p) in these coordinates."""
        parts = zip(point[1:], self.middles, self.scales, strict=True)
        return (Fraction(1), *((value - middle) / scale for value, middle, scale in parts))

    def inward(self, row: Row) -> Row:
        """A plane (b, a) in these coordinates."""
        moved = sum([a * middle for a, middle in zip(row[1:], self.middles, strict=True)], Fraction(row[0]))
        return (moved, *(a * scale for a, scale in zip(row[1:], self.scales, strict=True)))

    def outward(self, row: Row) -> Row:
        """The same plane in the model's."""
        slopes = [a / scale for a, scale in zip(row[1:], self.scales, strict=True)]
        return (row[0] - sum([a * m for a, m in zip(slopes, self.middles, strict=True)], Fraction(0)), *slopes)


def _order(crowded: set[int], links: Sequence[frozenset[int]], fixed: frozenset[int]) -> list[Node] | None:
    """The order in which to place nodes: each is linked to at most three before it; None where there is none."""
    left: dict[Node, set[Node]] = {
        (False, p): {(True, k) for k, part in enumerate(links) if p in part} for p in crowded
    }
    left |= {(True, k): {(False, p) for p in part} for k, part in enumerate(links) if k not in fixed}
    taken: list[Node] = []
    turn, idle = False, 0
    while left and idle < 2:
        ready = [node for node, others in left.items() if node[0] is turn and len(others) <= SOLID]
        for node in ready:
            for other in left.pop(node):
                if other in left:
                    left[other].discard(node)
        taken += ready
        turn, idle = not turn, 0 if ready else idle + 1
    return None if left else taken[::-1]


def _placed(
    order: Sequence[Node],
    links: Sequence[frozenset[int]],
    guess: tuple[Floats, Floats],
    points: Sequence[int],
    fixed: dict[int, Row],
) -> dict[Node, Row] | None:
    """Every node in turn, exactly where those it is linked to want it, for the rest as the floats say."""
    found: dict[Node, Row] = {(True, k): row for k, row in fixed.items()}
    number = {p: k for k, p in enumerate(points)}
    for is_plane, k in order:
        if is_plane:
            near, others = guess[1][k].tolist(), [(False, p) for p in links[k]]
            held = max(range(1, len(near)), key=lambda j: abs(near[j]))
        else:
            near, others = guess[0][number[k]].tolist(), [(True, j) for j, part in enumerate(links) if k in part]
            held = 0
        place = _orthogonal([found[other] for other in others if other in found], near, held)
        if place is None:
            return None
        found[is_plane, k] = place
    return found


def _orthogonal(rows: Sequence[Row], near: Sequence[float], held: int) -> Row | None:
    """The row orthogonal to the given ones that is near the floats, and has their entry where it is held."""
    left, solved = list(rows), dict[int, Row]()
    while left := [row for row in left if any(row)]:
        share, k, row = max(
            (abs(row[k]) / max(map(abs, row)), k, row)
            for row in left
            for k in range(len(near))
            if k not in {held, *solved}
        )
        if share < NARROW:
            return None
        lead = tuple([value / row[k] for value in row])
        left = [_without(lead, k, other) for other in left if other is not row]
        solved = {j: _without(lead, k, other) for j, other in solved.items()} | {k: lead}
    free = {k: Fraction(round(near[k] * 2**BITS), 2**BITS) for k in range(len(near)) if k not in solved}
    bound = {k: -sum([lead[j] * value for j, value in free.items()], Fraction(0)) for k, lead in solved.items()}
    return tuple((free | bound)[k] for k in range(len(near)))


def _without(lead: Row, k: int, row: Row) -> Row:
    return tuple([a - row[k] * b for a, b in zip(row, lead, strict=True)])
