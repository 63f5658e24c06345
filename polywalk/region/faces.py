"""Faces as bit patterns over the generators: facets, the order round a polygon, the region's own dimension.

A face of a region is the set of its generators, and a constraint's face is where the constraint is active; so
questions about faces are questions about sets. Bit k stands for generator k: points first, then rays.

References
----------
Fukuda & Prodon, Double description method revisited, LNCS 1120, 1996.
Ziegler, Lectures on Polytopes, 1995, section 2.2: every face is the intersection of the facets that contain it.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable, Sequence
from functools import reduce
from operator import and_

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
    found: list[tuple[int, int]] = []
    everything = (1 << len(active)) - 1
    for start in range(points):
        times = Counter([patterns[place] for place in active[start]])
        later = everything >> start + 1 << start + 1
        for other in members(_often(times, n - 1, later)):
            shared = [pattern for pattern in times if pattern >> other & 1]
            if reduce(and_, shared, everything).bit_count() == 2:
                found.append((start, other))
    return found


def _often(times: dict[int, int], least: int, among: int) -> int:
    """The bits, of those among which is asked, that at least so many of the patterns have."""
    reached = [among, *[0] * least]
    for pattern, count in times.items():
        for _ in range(min(count, least)):
            for k in range(least, 0, -1):
                reached[k] |= reached[k - 1] & pattern
    return reached[least]


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
