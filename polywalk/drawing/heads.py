"""Arrow heads in space: small cones of triangles, round on paper whatever the scale of the axes."""

from __future__ import annotations

from math import cos, pi, sin
from typing import Any

from polywalk.drawing.scene import Point
from polywalk.drawing.space import cross, inner

LENGTH, WIDTH, STANDOFF = 0.034, 0.011, 0.018
"""Length, radius and distance from the tip, as shares of the drawn box's longest side."""

SIDES = 8


def cones(parts: tuple[tuple[Point, ...], ...], scale: Point) -> dict[str, Any]:
    """Corners and triangles of one cone at the end of each part."""
    corners: list[Point] = []
    triangles: list[tuple[int, int, int]] = []
    for part in parts:
        base = len(corners)
        corners += [_back(point, scale) for point in _cone(_drawn(part[-2], scale), _drawn(part[-1], scale))]
        triangles += [(base, base + 1 + k, base + 1 + (k + 1) % SIDES) for k in range(SIDES)]
    columns = {name: [corner[k] for corner in corners] for k, name in enumerate("xyz")}
    return columns | {name: [triangle[k] for triangle in triangles] for k, name in enumerate("ijk")}


def _drawn(point: Point, scale: Point) -> Point:
    return tuple(x * unit for x, unit in zip(point, scale, strict=True))


def _back(point: Point, scale: Point) -> Point:
    return tuple(x / unit for x, unit in zip(point, scale, strict=True))


def _cone(start: Point, end: Point) -> list[Point]:
    """Tip, then the rim."""
    along = tuple(b - a for a, b in zip(start, end, strict=True))
    length = inner(along, along) ** 0.5 or 1.0
    way = tuple(value / length for value in along)
    other = (0.0, 0.0, 1.0) if abs(way[2]) < 0.9 else (1.0, 0.0, 0.0)
    first = _unit(cross(way, other))
    second = cross(way, first)
    tip = _along(end, way, -STANDOFF)
    rim = _along(tip, way, -LENGTH)
    turns = [2 * pi * k / SIDES for k in range(SIDES)]
    return [tip] + [_along(_along(rim, first, WIDTH * cos(turn)), second, WIDTH * sin(turn)) for turn in turns]


def _unit(vector: Point) -> Point:
    length = inner(vector, vector) ** 0.5
    return tuple(value / length for value in vector)


def _along(point: Point, way: Point, distance: float) -> Point:
    return tuple(x + distance * step for x, step in zip(point, way, strict=True))
