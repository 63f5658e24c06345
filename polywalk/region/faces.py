"""Faces as bit patterns over the generators: facets, the order round a polygon, the region's own dimension.

A face of a region is the set of its generators, and a constraint's face is where the constraint is active; so
questions about faces are questions about sets. Bit k stands for generator k: points first, then rays.

References
----------
Fukuda & Prodon, Double description method revisited, LNCS 1120, 1996.
Ziegler, Lectures on Polytopes, 1995, section 2.2: every face is the intersection of the facets that contain it.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from functools import reduce
from operator import and_, or_

MANY = 100
"""Generators from which it pays to look for edges along the sides of a vertex only, instead of among all others."""

Pairs = Sequence[tuple[int, int]]


def masks(active: Sequence[tuple[int, ...]]) -> dict[int, int]:
    """For each constraint (by its place) that is active somewhere, the pattern of the generators it is active at."""
    found: dict[int, int] = {}
    for generator, places in enumerate(active):
        for place in places:
            found[place] = found.get(place, 0) | 1 << generator
    return dict(sorted(found.items()))


def pairs(active: Sequence[tuple[int, ...]], patterns: dict[int, int], points: int, n: int) -> list[tuple[int, int]]:
    """The edges of a region without lines, each as two generators, the first of them a point.

    Two generators are joined by an edge where no third is active at all the constraints they share (Fukuda & Prodon
    1996, proposition 7); they then share at least n - 1. Two rays would only meet at infinity.
    """
    sets = [sum([1 << place for place in places]) for places in active]
    everything = (1 << len(active)) - 1
    found: list[tuple[int, int]] = []
    for start in range(points):
        mine = sets[start]
        later: Iterable[int] = range(start + 1, len(active))
        if len(active) > MANY:
            later = _beside(start, [patterns[place] for place in active[start]], everything)
        for other in later:
            common = mine & sets[other]
            if common.bit_count() >= n - 1:
                shared = [patterns[place] for place in active[start] if common >> place & 1]
                if reduce(and_, shared, everything).bit_count() == 2:
                    found.append((start, other))
    return found


def _beside(start: int, here: list[int], everything: int) -> Iterable[int]:
    """The later generators on a side that this one is on: an edge lies on one, unless two generators are all."""
    near = reduce(or_, [pattern for pattern in here if pattern != everything])
    return members(near >> start + 1 << start + 1)


def facets(patterns: dict[int, int], points: int, generators: int) -> dict[int, list[int]]:
    """The facets: each pattern with the places of the constraints that define it.

    Facets are the largest faces that are not the whole region. A pattern without a point is a face at infinity.
    """
    whole, finite = (1 << generators) - 1, (1 << points) - 1
    by_pattern: dict[int, list[int]] = {}
    for place, pattern in patterns.items():
        if pattern != whole and pattern & finite:
            by_pattern.setdefault(pattern, []).append(place)
    through: dict[int, list[int]] = {}
    for face in by_pattern:
        for k in members(face):
            through.setdefault(k, []).append(face)
    return {face: places for face, places in by_pattern.items() if is_largest(face, through[lowest(face)])}


def is_largest(face: int, faces: Iterable[int]) -> bool:
    """Whether no other of the faces contains this one."""
    return not any(face & other == face and face != other for other in faces)


def members(pattern: int) -> tuple[int, ...]:
    """The numbers of the bits that are set."""
    found = []
    while pattern:
        found.append(lowest(pattern))
        pattern &= pattern - 1
    return tuple(found)


def lowest(pattern: int) -> int:
    """The number of the lowest bit that is set."""
    return (pattern & -pattern).bit_length() - 1


def neighbours(pairs: Pairs, points: int) -> list[list[int]]:
    """For each point the points that an edge joins it to, in order."""
    beside: list[list[int]] = [[] for _ in range(points)]
    for start, end in pairs:
        if end < points:
            beside[start].append(end)
            beside[end].append(start)
    return [sorted(found) for found in beside]


def around(pattern: int, neighbours: Sequence[Sequence[int]]) -> tuple[int, ...]:
    """The points of a two-dimensional face in the order one meets them walking round it.

    A bounded polygon starts at its lowest number and goes to the lower neighbour; an unbounded one runs from the
    point of one ray to the point of the other.
    """
    inside = {k for k in members(pattern) if k < len(neighbours)}
    beside = {k: [other for other in neighbours[k] if other in inside] for k in inside}
    path = [min(inside, key=lambda k: (len(beside[k]) > 1, k))]
    while len(path) < len(inside):
        path.append(next(k for k in beside[path[-1]] if k not in path[-2:]))
    return tuple(path)
