"""Segments on paper: the point of one nearest to another point, and how far off it is."""

from __future__ import annotations

from math import hypot

from polywalk.drawing.scene import Point

Segment = tuple[Point, Point]


def nearest(point: Point, line: Segment) -> Point:
    """The point of a segment nearest to a point."""
    (x, y), (u, v) = line
    step = (u - x, v - y)
    length = step[0] ** 2 + step[1] ** 2
    share = ((point[0] - x) * step[0] + (point[1] - y) * step[1]) / length if length else 0.0
    share = min(max(share, 0.0), 1.0)
    return (x + share * step[0], y + share * step[1])


def cross(one: Segment, other: Segment) -> bool:
    """Whether two segments cross; touching is no crossing."""
    return _apart(one, other) and _apart(other, one)


def _apart(line: Segment, other: Segment) -> bool:
    """Whether the ends of another segment lie on different sides of a segment's line."""
    (x, y), (u, v) = line
    first, second = ((u - x) * (b - y) - (v - y) * (a - x) for a, b in other)
    return first * second < 0


def distance(point: Point, line: Segment) -> float:
    """How far a point is from a segment."""
    foot = nearest(point, line)
    return hypot(point[0] - foot[0], point[1] - foot[1])
