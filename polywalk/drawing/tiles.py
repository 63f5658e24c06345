"""Rectangles that texts cover on paper, turned with their text: whether they meet, are crossed, fit the paper."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from math import cos, hypot, radians, sin

from polywalk.drawing.letters import width
from polywalk.drawing.scene import Point

SIZES = {"part": 12.0, "note": 10.0, "step": 10.0, "tick": 10.0}
"""Size of the letters of a role in pixels, where it is not USUAL."""

USUAL = 11.0

PADS = {"part": 3.4, "tag": 3.4, "back tag": 3.4, "stay": 3.4, "step": 4.0, "culprit": 1.8}
"""Pixels between the letters of a framed text and its frame, the frame's own line included."""

BOLD = {"step", "point", "target", "culprit"}
"""Roles written in bold letters."""

TALL, EDGE = 0.66, 1.5
"""Half the height of a line of text as a share of its size, and pixels kept free at the paper's border."""


@dataclass(frozen=True)
class Tile:
    """A rectangle: centre, half its width and height in pixels, its turn in degrees."""

    centre: Point
    half: tuple[float, float]
    angle: float = 0.0

    @cached_property
    def ways(self) -> tuple[Point, Point]:
        """The unit directions of its width and of its height."""
        turn = radians(self.angle)
        return (cos(turn), sin(turn)), (-sin(turn), cos(turn))

    @cached_property
    def reach(self) -> tuple[float, float]:
        """Half the extent of the upright rectangle around it."""
        (a, b), _ = self.ways
        wide, high = self.half
        return abs(a) * wide + abs(b) * high, abs(b) * wide + abs(a) * high

    def meets(self, other: Tile) -> bool:
        """Whether it shares some area with another (separating axes)."""
        arm = (other.centre[0] - self.centre[0], other.centre[1] - self.centre[1])
        if abs(arm[0]) >= self.reach[0] + other.reach[0] or abs(arm[1]) >= self.reach[1] + other.reach[1]:
            return False
        return not any(_apart(self, other, arm, way) for way in (*self.ways, *other.ways))

    def crossed(self, start: Point, end: Point) -> bool:
        """Whether a segment passes through it (clipped after Liang & Barsky, 1984)."""
        x, y = self.centre
        right, up = self.reach
        if max(start[0], end[0]) <= x - right or min(start[0], end[0]) >= x + right:
            return False
        if max(start[1], end[1]) <= y - up or min(start[1], end[1]) >= y + up:
            return False
        enter, leave = 0.0, 1.0
        for way, half in zip(self.ways, self.half, strict=True):
            first = (start[0] - x) * way[0] + (start[1] - y) * way[1]
            step = (end[0] - start[0]) * way[0] + (end[1] - start[1]) * way[1]
            if step == 0:
                if abs(first) >= half:
                    return False
                continue
            low, high = sorted(((-half - first) / step, (half - first) / step))
            enter, leave = max(enter, low), min(leave, high)
        return enter < leave

    def within(self, paper: Sequence[float]) -> bool:
        """Whether the paper holds it whole."""
        return all(
            reach + EDGE <= x <= size - reach - EDGE
            for x, reach, size in zip(self.centre, self.reach, paper, strict=True)
        )

    def holds(self, point: Point) -> bool:
        """Whether a point lies in it."""
        arm = (point[0] - self.centre[0], point[1] - self.centre[1])
        return all(
            abs(arm[0] * way[0] + arm[1] * way[1]) <= half for way, half in zip(self.ways, self.half, strict=True)
        )

    def border(self, toward: Point) -> Point:
        """Where the straight line from its centre to a point leaves it."""
        arm = (toward[0] - self.centre[0], toward[1] - self.centre[1])
        shares = [
            half / abs(along)
            for way, half in zip(self.ways, self.half, strict=True)
            if (along := arm[0] * way[0] + arm[1] * way[1])
        ]
        share = min([1.0, *shares])
        return (self.centre[0] + share * arm[0], self.centre[1] + share * arm[1])


def _apart(one: Tile, other: Tile, arm: Point, way: Point) -> bool:
    room = abs(arm[0] * way[0] + arm[1] * way[1])
    reach = sum(
        half * abs(side[0] * way[0] + side[1] * way[1])
        for tile in (one, other)
        for side, half in zip(tile.ways, tile.half, strict=True)
    )
    return room >= reach


def halves(text: str, role: str) -> tuple[float, float]:
    """Half the width and height of a text in its role, its frame included."""
    size, pad = SIZES.get(role, USUAL), PADS.get(role, 0.0)
    wide, high = width(text, size, role in BOLD) / 2 + 1.5 + pad, TALL * size + pad
    if role == "step":  # a circle around its text
        wide = high = max(wide, hypot(wide - pad, high - pad) / 1.2 + pad / 2)
    return wide, high


def around(point: Sequence[float], radius: float) -> Tile:
    """The square around a mark."""
    return Tile((point[0], point[1]), (radius, radius))
