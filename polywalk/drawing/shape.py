"""The faces and edges of a region as they are drawn: cut to the window, open ends told apart."""

from __future__ import annotations

from dataclasses import dataclass

from polywalk.drawing.scene import Point
from polywalk.drawing.subject import floats, planar
from polywalk.drawing.window import CUT, Window, cut
from polywalk.region import Region


@dataclass(frozen=True)
class Side:
    """One facet inside the window: the constraints that make it and its corners."""

    constraints: tuple[str, ...]
    corners: tuple[Point, ...]

    @property
    def centre(self) -> Point:
        """The mean of its corners."""
        return tuple(sum(values) / len(self.corners) for values in zip(*self.corners, strict=True))


@dataclass(frozen=True)
class Shape:
    """What is drawn of a region inside the window.

    ``faces`` are the flat pieces to fill (all facets of a solid, the polygon itself of a flat region), ``sides`` its
    facets of any dimension, ``edges`` run between vertices, ``open_edges`` leave the window (at their last point;
    a line leaves at both).
    """

    dimension: int
    corners: tuple[Point, ...]
    faces: tuple[Side, ...]
    sides: tuple[Side, ...]
    edges: tuple[tuple[Point, Point], ...]
    open_edges: tuple[tuple[Point, Point], ...]

    @property
    def lifted(self) -> Shape:
        """The pieces on a line as pieces of the plane, at height 0; a piece of a line has nothing to fill."""

        def pairs(found: tuple[tuple[Point, Point], ...]) -> tuple[tuple[Point, Point], ...]:
            return tuple((planar(a), planar(b)) for a, b in found)

        sides = tuple(Side(side.constraints, tuple(map(planar, side.corners))) for side in self.sides)
        corners = tuple(map(planar, self.corners))
        return Shape(self.dimension, corners, (), sides, pairs(self.edges), pairs(self.open_edges))


def shape(source: Region, window: Window) -> Shape:
    """The drawn pieces of a region; an empty region has none."""
    inside = cut(source, window)
    corners = tuple(floats(vertex.point) for vertex in inside.vertices)
    opened = tuple(any(name.startswith(CUT) for name in vertex.active) for vertex in inside.vertices)
    sides = tuple(
        Side(facet.constraints, tuple(corners[k] for k in facet.vertices))
        for facet in inside.facets
        if not any(name.startswith(CUT) for name in facet.constraints)
    )
    faces = sides if inside.dimension == 3 else ()
    if inside.dimension == 2:
        faces = (Side(inside.equalities, tuple(corners[k] for k in inside.outline)),)
    closed: list[tuple[Point, Point]] = []
    leaving: list[tuple[Point, Point]] = []
    for edge in inside.edges:
        if edge.end is None or any(name.startswith(CUT) for name in edge.active):
            continue
        ends = sorted((edge.start, edge.end), key=lambda k: opened[k])
        pair = (corners[ends[0]], corners[ends[1]])
        (leaving if opened[ends[1]] else closed).append(pair)
        if opened[ends[0]]:
            leaving.append((pair[1], pair[0]))
    return Shape(inside.dimension, corners, faces, sides, tuple(closed), tuple(leaving))
