"""What no rule can beat: the shortest ways to an end along the edges of the region."""

from __future__ import annotations

from collections import deque
from collections.abc import Mapping
from dataclasses import dataclass

from polywalk.model import Objective
from polywalk.region import Region


@dataclass(frozen=True)
class Yardsticks:
    """The fewest moves from each vertex of a region to an end of a walk.

    An end is a vertex of the optimal face; where the objective has no optimum, a vertex from which it improves along
    a ray (the ray itself is not counted). Without an objective every vertex is an end.

    Parameters
    ----------
    shortest : tuple of int
        Over all edges, one number a vertex of the region.
    improving : tuple of int
        Over edges that strictly improve the objective. An edge along which it stays the same is left out: no simplex
        rule takes one, since only slacks that improve the objective may enter. A walk's moves in Phase II are such
        edges, so that its pivots are never fewer than this.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.walks.yardsticks import yardsticks
    >>> square = pw.from_algebra(maximize="x - y", bounds={"x": (0, 1), "y": (0, 1)})
    >>> [vertex.objective for vertex in pw.region(square).vertices] == [0, -1, 1, 0]
    True
    >>> yardsticks(pw.region(square))
    Yardsticks(shortest=(1, 2, 0, 1), improving=(1, 2, 0, 1))
    """

    shortest: tuple[int, ...]
    improving: tuple[int, ...]


def yardsticks(region: Region) -> Yardsticks:
    """Breadth first, back from the ends.

    Parameters
    ----------
    region : Region
        With vertices, or none (then nothing is measured).

    References
    ----------
    Moore, The shortest path through a maze, Proc. Int. Symp. on the Theory of Switching, 1959.
    """
    goal, ends = region.model.objective, _ends(region)
    near: dict[int, list[int]] = {k: [] for k in range(len(region.vertices))}
    uphill: dict[int, list[int]] = {k: [] for k in near}
    heights = [None if goal is None else goal.at(vertex.point) for vertex in region.vertices]
    for edge in region.edges:
        if edge.end is None:
            continue
        for start, end in ((edge.start, edge.end), (edge.end, edge.start)):
            near[end].append(start)
            before, after = heights[start], heights[end]
            if goal is not None and before is not None and after is not None and goal.better(after, before):
                uphill[end].append(start)
    return Yardsticks(_moves(ends, near), _moves(ends, uphill))


def _ends(region: Region) -> list[int]:
    if region.outcome == "optimal" and region.optimal is not None:
        return list(region.optimal.vertices)
    goal = region.model.objective
    if goal is None:
        return list(range(len(region.vertices)))
    return sorted({edge.start for edge in region.edges if edge.ray is not None and _climbs(region, goal, edge.ray)})


def _climbs(region: Region, goal: Objective, ray: int) -> bool:
    change = region.rays[ray].change
    return change is not None and goal.better(change, 0 * change)


def _moves(ends: list[int], before: Mapping[int, list[int]]) -> tuple[int, ...]:
    """The distance of every vertex, where ``before`` names those one move before each."""
    found = dict.fromkeys(ends, 0)
    queue = deque(ends)
    while queue:
        here = queue.popleft()
        for other in before[here]:
            if other not in found:
                found[other] = found[here] + 1
                queue.append(other)
    return tuple(found[k] for k in range(len(before)))
