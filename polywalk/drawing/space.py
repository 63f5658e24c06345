"""Geometry of the drawn box: where planes meet it, how far a ray stays in it."""

from __future__ import annotations

from itertools import product
from math import atan2, inf

from polywalk.drawing.scene import Point
from polywalk.drawing.window import Window


def slice_of(coefficients: Point, rhs: float, window: Window) -> tuple[Point, ...]:
    """The polygon in which a plane a.x = b cuts a three-dimensional window, in cyclic order; () where it misses."""
    corners = list(product(*zip(window.low, window.high, strict=True)))
    found: list[Point] = []
    for start in corners:
        for axis in range(3):
            end = tuple(window.high[k] if k == axis else value for k, value in enumerate(start))
            if start[axis] == window.low[axis]:
                found += _meet(coefficients, rhs, start, end)
    unique = sorted({tuple(round(value, 12) for value in point) for point in found})
    return around_centre(unique, coefficients, window) if len(unique) > 2 else ()


def _meet(coefficients: Point, rhs: float, start: Point, end: Point) -> list[Point]:
    low, high = (sum(a * x for a, x in zip(coefficients, point, strict=True)) - rhs for point in (start, end))
    if low * high > 0 or low == high:
        return []
    share = low / (low - high)
    return [tuple(a + share * (b - a) for a, b in zip(start, end, strict=True))]


def around_centre(points: list[Point], normal: Point, window: Window) -> tuple[Point, ...]:
    """Corners of a flat convex polygon sorted by angle about its centre."""
    scaled = [tuple(x / size for x, size in zip(point, window.extent, strict=True)) for point in points]
    centre = tuple(sum(values) / len(scaled) for values in zip(*scaled, strict=True))
    facing = tuple(a * size for a, size in zip(normal, window.extent, strict=True))
    first = tuple(a - c for a, c in zip(scaled[0], centre, strict=True))
    second = cross(facing, first)

    def angle(k: int) -> float:
        arm = tuple(a - c for a, c in zip(scaled[k], centre, strict=True))
        return atan2(inner(arm, second) / (inner(second, second) or 1), inner(arm, first) / (inner(first, first) or 1))

    return tuple(points[k] for k in sorted(range(len(points)), key=angle))


def cross(left: Point, right: Point) -> Point:
    """The vector product in space."""
    a, b = left, right
    return (a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0])


def inner(left: Point, right: Point) -> float:
    """The inner product of two drawn vectors."""
    return sum(a * b for a, b in zip(left, right, strict=True))


def exit_point(start: Point, direction: Point, window: Window) -> Point:
    """Where a ray from inside leaves the window; the start itself where it does not move on these axes."""
    share = inf
    for x, step, low, high in zip(start, direction, window.low, window.high, strict=True):
        if step:
            share = min(share, ((high if step > 0 else low) - x) / step)
    return start if share == inf else tuple(x + max(share, 0.0) * d for x, d in zip(start, direction, strict=True))


def uphill(coefficients: Point, window: Window) -> Point:
    """The direction of steepest ascent as it looks on paper, of length one there, in the units of the axes."""
    drawn = [a / unit for a, unit in zip(coefficients, window.scale, strict=True)]
    length = sum(value * value for value in drawn) ** 0.5
    return tuple(value / length / unit for value, unit in zip(drawn, window.scale, strict=True))
