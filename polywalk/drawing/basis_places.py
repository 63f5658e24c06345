"""Where the bases of a vertex stand on paper, and how the arrows between them run. Everything is in pixels.

Bases stand in bands from left to right, by the fewest degenerate pivots that lead out; where they leave for stands in a
column on the right. So a walk that makes headway runs to the right, and one that stalls does not. In a band bases are
ordered by the mean height of their neighbours, which keeps arrows short.

References
----------
Sugiyama, Tagawa & Toda, Methods for visual understanding of hierarchical system structures, IEEE Trans. Systems, Man,
and Cybernetics 11, 1981 (layers, ordered by barycentres).
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from math import hypot

from polywalk.drawing.scene import PAPER, Point

RADIUS = 17.0
"""Pixels from a basis's centre to its border."""

TALL = 8
"""Most bases straight above one another; a fuller band gets more columns."""

LEFT, RIGHT, TOP, BOTTOM = 30.0, 96.0, 44.0, 22.0
"""Pixels kept free around the bases: on the right for what they leave for, on top for the bands' headings."""

WIDEST = 120.0
"""Most pixels between two columns, so that few bases do not drift apart."""

BULGES = (0.06, -0.06, 0.12, -0.12, 0.2, -0.2, 0.3, -0.3, 0.42, -0.42)
"""How far an arrow may bend aside, as shares of its length; the first that passes by every other basis is taken."""

SWEEPS = 12
PIECES = 16


@dataclass(frozen=True)
class Band:
    """Bases that are equally far from leaving."""

    away: int
    members: tuple[int, ...]

    @property
    def columns(self) -> int:
        """How many columns it is spread over; two from three bases on, so that no arrow runs through a third."""
        return 1 if len(self.members) < 3 else max(2, -(-len(self.members) // TALL))


def bands(numbers: Iterable[int], away: Mapping[int, int], arrows: Sequence[tuple[int, int]]) -> tuple[Band, ...]:
    """The bases by how far they are from leaving, farthest first, each band in its order from top to bottom."""
    found: dict[int, list[int]] = {}
    for number in numbers:
        found.setdefault(away[number], []).append(number)
    near: dict[int, list[int]] = {}
    for start, end in arrows:
        near.setdefault(start, []).append(end)
        near.setdefault(end, []).append(start)
    height = {k: (i + 0.5) / len(members) for members in found.values() for i, k in enumerate(members)}
    for _ in range(SWEEPS):
        for members in found.values():
            wanted = {k: sum(height[j] for j in near.get(k, [k])) / len(near.get(k, [k])) for k in members}
            members.sort(key=lambda k: (round(wanted[k], 9), k))
            height |= {k: (i + 0.5) / len(members) for i, k in enumerate(members)}
    return tuple(Band(steps, tuple(found[steps])) for steps in sorted(found, reverse=True))


def places(found: Sequence[Band]) -> tuple[dict[int, Point], dict[int, float]]:
    """The centre of every basis, and the middle of every band by how far it is away."""
    gap = 0.5
    count = sum(band.columns for band in found) + gap * (len(found) - 1)
    pitch = min(WIDEST, (PAPER[0] - LEFT - RIGHT) / max(count - 0.4, 1))
    low, high = BOTTOM, PAPER[1] - TOP
    left = LEFT + (PAPER[0] - LEFT - RIGHT - pitch * (count - 1)) / 2
    centres: dict[int, Point] = {}
    middles: dict[int, float] = {}
    for band in found:
        for k, number in enumerate(band.members):
            x = left + pitch * (k % band.columns)
            centres[number] = (x, high - (k + 0.5) * (high - low) / len(band.members))
        middles[band.away] = left + pitch * (band.columns - 1) / 2
        left += pitch * (band.columns + gap)
    return centres, middles


def spread(wanted: Mapping[str, float]) -> dict[str, Point]:
    """The places of what is left for, in one column on the right, near the heights wanted."""
    order = sorted(wanted, key=lambda name: (-round(wanted[name], 6), name))
    low, high = BOTTOM, PAPER[1] - TOP
    room = (high - low) / max(len(order), 1)
    return {name: (PAPER[0] - 36.0, high - (k + 0.5) * room) for k, name in enumerate(order)}


def curve(start: Point, end: Point, bulge: float, aside: float = 0.0, rim: float = RADIUS) -> tuple[Point, ...]:
    """A bent arrow from border to border; ``aside`` moves it to its left by pixels."""
    across, up = end[0] - start[0], end[1] - start[1]
    length = hypot(across, up) or 1.0
    normal = (-up / length, across / length)
    bent = 2 * bulge * length
    middle = tuple((a + b) / 2 + bent * way for a, b, way in zip(start, end, normal, strict=True))
    points: list[Point] = []
    for k in range(PIECES + 1):
        t = k / PIECES
        weights = ((1 - t) ** 2, 2 * t * (1 - t), t * t)
        at = [sum(w * p[i] for w, p in zip(weights, (start, middle, end), strict=True)) for i in (0, 1)]
        points.append((at[0] + aside * normal[0], at[1] + aside * normal[1]))
    return _cut(points, start, RADIUS, end, rim)


def _cut(points: list[Point], start: Point, from_rim: float, end: Point, to_rim: float) -> tuple[Point, ...]:
    """The part outside both borders, ending exactly on them."""
    first = next((k for k, point in enumerate(points) if _far(point, start) > from_rim), 1)
    last = next((k for k in range(len(points) - 1, -1, -1) if _far(points[k], end) > to_rim), len(points) - 2)
    if first > last:
        return points[0], points[-1]
    head = _on_rim(points[first - 1], points[first], start, from_rim)
    tail = _on_rim(points[min(last + 1, len(points) - 1)], points[last], end, to_rim)
    return (head, *points[first : last + 1], tail)


def _on_rim(inside: Point, outside: Point, centre: Point, rim: float) -> Point:
    near, far = _far(inside, centre), _far(outside, centre)
    share = 0.0 if far <= near else min(max((rim - near) / (far - near), 0.0), 1.0)
    return tuple(a + share * (b - a) for a, b in zip(inside, outside, strict=True))


def _far(point: Point, other: Point) -> float:
    return hypot(point[0] - other[0], point[1] - other[1])


def best_bulge(start: Point, end: Point, others: Sequence[Point]) -> float:
    """The smallest bend on the paper and clear of all others; where there is none, the one that touches fewest."""
    fewest, best = len(others) + PIECES + 1, BULGES[0]
    for bulge in BULGES:
        line = curve(start, end, bulge)[1:-1]
        touched = sum(any(_far(point, other) < RADIUS + 3 for point in line) for other in others)
        touched += sum(not (4 < x < PAPER[0] - 4 and 4 < y < PAPER[1] - 24) for x, y in line)
        if touched < fewest:
            fewest, best = touched, bulge
        if touched == 0:
            break
    return best


def clearest(line: Sequence[Point], taken: Sequence[tuple[Point, float]], radius: float) -> Point:
    """The spot for an arrow's number: as near its middle as leaves room, beside it where the arrow is too short."""
    half = len(line) // 2
    order = sorted(range(1, len(line) - 1), key=lambda k: (abs(k - half), k)) or [half]
    across, up = line[-1][0] - line[0][0], line[-1][1] - line[0][1]
    length = hypot(across, up) or 1.0
    spots = [
        (line[k][0] - shift * up / length, line[k][1] + shift * across / length)
        for shift in (0, 13, -13)
        for k in order
    ]

    def room(spot: Point) -> float:
        return min((_far(spot, point) - size - radius for point, size in taken), default=0.0)

    return next((spot for spot in spots if room(spot) >= 0), max(spots, key=room))
