"""The ways out of a vertex: its edges, what each lets go, how far it leads, and what that does to the objective."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from polywalk.exact import dot
from polywalk.region.parts import Edge, vertex_name
from polywalk.region.results import Region


@dataclass(frozen=True)
class Way:
    """One edge, seen from the vertex it leaves.

    Parameters
    ----------
    vertex, ray : int or None
        Where it leads: the number of a vertex or of a ray.
    released : tuple of str
        The constraints that are active at the vertex and not along the edge; one where the vertex is simple.
    steps : tuple of Fraction or None
        How much slack each of them has at the other end, in the constraint's own unit: for a simple vertex the step
        length of the pivot. None along a ray.
    change : Fraction or None
        How much the objective changes up to the other end; along a ray, for one such direction. None without one.
    """

    vertex: int | None
    ray: int | None
    released: tuple[str, ...]
    steps: tuple[Fraction, ...] | None
    change: Fraction | None

    @property
    def target(self) -> str:
        """Where it leads: "V3", or "ray 0"."""
        return f"ray {self.ray}" if self.vertex is None else vertex_name(self.vertex)


def ways(region: Region, vertex: int) -> tuple[Way, ...]:
    """The edges that leave a vertex, those to vertices first.

    Parameters
    ----------
    region : Region
    vertex : int
        Its number in ``region.vertices``.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.region import ways
    >>> square = pw.from_algebra(maximize="x + 2*y", bounds={"x": (0, 1), "y": (0, 3)})
    >>> [(way.target, way.released, str(way.steps[0]), str(way.change)) for way in ways(pw.region(square), 0)]
    [('V1', ('y lower',), '3', '6'), ('V2', ('x lower',), '1', '1')]
    """
    found = [_way(region, vertex, edge) for edge in region.edges if vertex in (edge.start, edge.end)]
    return tuple(sorted(found, key=lambda way: (way.vertex is None, way.vertex if way.ray is None else way.ray)))


def _way(region: Region, vertex: int, edge: Edge) -> Way:
    here = region.vertices[vertex]
    released = tuple(name for name in here.active if name not in edge.active)
    if edge.ray is not None:
        return Way(None, edge.ray, released, None, region.rays[edge.ray].change)
    end = edge.end if edge.start == vertex else edge.start
    assert end is not None
    there = region.vertices[end]
    steps = tuple(region.model.constraint(name).slack(there.point) for name in released)
    goal = region.model.objective
    moved = [b - a for a, b in zip(here.point, there.point, strict=True)]
    return Way(end, None, released, steps, None if goal is None else dot(goal.coefficients, moved))
