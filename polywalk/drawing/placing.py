"""Where text goes in the plane: each label takes the candidate that covers least of what is already there."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field, replace
from math import atan2, cos, degrees, hypot, radians, sin

from polywalk.drawing.letters import width
from polywalk.drawing.scene import Label, Point
from polywalk.drawing.settling import Desk, settled
from polywalk.drawing.tiles import Tile
from polywalk.drawing.window import Window

GLYPH = 0.56
"""Mean width of a letter, as a share of the text's size (DejaVu Sans, measured on the names of the scenarios)."""

SIZE = 11.0
"""Size of names in pixels."""

REACH, NEAR = (1.0, 1.7, 2.6), (1.0, 1.35)
"""How far a text may be put from its mark, in gaps; the name of a vertex stays near."""

SHORT, BESIDE = 52.0, 13.0
"""A segment shorter than this (pixels) has no room for a number and an arrow head; then the number stands beside it."""

Box = tuple[float, float, float, float]  # left, bottom, right, top in pixels


def box(text: str, centre: Point, size: float = SIZE) -> Box:
    """The rectangle that centred text covers, in pixels."""
    half, tall = width(text, size) / 2 + 2, size * 0.66
    return centre[0] - half, centre[1] - tall, centre[0] + half, centre[1] + tall


def boxes(text: str, centre: Point, angle: float, size: float = SIZE) -> list[Box]:
    """Boxes that together cover a text turned by an angle: one if it lies flat, else a row of squares."""
    if abs(angle) < 3:
        return [box(text, centre, size)]
    half, tall = width(text, size) / 2, size * 0.66
    count = max(int(half / tall), 1)
    way = (cos(radians(angle)), sin(radians(angle)))
    spots = [(2 * k / count - 1) * (half - tall / 2) for k in range(count + 1)]
    return [
        (x - tall, y - tall, x + tall, y + tall)
        for x, y in ((centre[0] + spot * way[0], centre[1] + spot * way[1]) for spot in spots)
    ]


def upright(start: Point, end: Point) -> float:
    """The angle of a segment in degrees, turned so that text along it is not upside down."""
    turn = degrees(atan2(end[1] - start[1], end[0] - start[0]))
    return turn - 180 if turn > 90 else turn + 180 if turn <= -90 else turn


def overlap(left: Box, right: Box) -> float:
    """The area two boxes share."""
    wide = min(left[2], right[2]) - max(left[0], right[0])
    high = min(left[3], right[3]) - max(left[1], right[1])
    return max(wide, 0.0) * max(high, 0.0)


def crosses(area: Box, start: Point, end: Point) -> bool:
    """Whether a segment passes through a box (clipped after Liang & Barsky, 1984)."""
    enter, leave = 0.0, 1.0
    for axis in (0, 1):
        step = end[axis] - start[axis]
        for side, sign in ((area[axis], -1), (area[axis + 2], 1)):
            room, rate = sign * (side - start[axis]), sign * step
            if rate == 0 and room < 0:
                return False
            if rate > 0:
                leave = min(leave, room / rate)
            elif rate < 0:
                enter = max(enter, room / rate)
    return enter <= leave


@dataclass
class Sheet:
    """The paper while labels are being placed: what is taken, in pixels from the lower left corner."""

    window: Window
    boxes: list[Box] = field(default_factory=list)
    lines: list[tuple[Point, Point]] = field(default_factory=list)
    paths: list[tuple[Point, Point]] = field(default_factory=list)
    fills: list[tuple[Point, ...]] = field(default_factory=list)

    def pixel(self, point: Sequence[float]) -> Point:
        """The place of a point of the plane on the paper."""
        return tuple((x - a) * unit for x, a, unit in zip(point, self.window.low, self.window.scale, strict=True))

    def unpixel(self, pixel: Sequence[float]) -> Point:
        """The point of the plane at a place on the paper."""
        return tuple(a + x / unit for x, a, unit in zip(pixel, self.window.low, self.window.scale, strict=True))

    def keep_clear(self, point: Sequence[float], radius: float) -> None:
        """Keep text away from a mark."""
        x, y = self.pixel(point)
        self.boxes.append((x - radius, y - radius, x + radius, y + radius))

    def cost(self, area: Box) -> float:
        """How much a box would cover: frame, text and marks weigh most, then lines, then the region's fill."""
        out = sum(
            max(value, 0.0)
            for value in (-area[0], -area[1], area[2] - self.window.paper[0], area[3] - self.window.paper[1])
        )
        taken = sum(overlap(area, other) for other in self.boxes)
        crossed = sum(crosses(area, start, end) for start, end in self.lines)
        covered = sum(contains(fill, ((area[0] + area[2]) / 2, (area[1] + area[3]) / 2)) for fill in self.fills)
        return 400 * out + 20 * taken + 60 * crossed + 90 * covered

    def covered(self, pixel: Point) -> bool:
        """Whether a place lies on a fill that is to be kept clear."""
        return any(contains(fill, pixel) for fill in self.fills)

    def settle(self, labels: Iterable[Label]) -> tuple[tuple[Label, ...], tuple[Label, ...]]:
        """The labels where they stand, and those that found no place."""
        tiles = [Tile(((a + c) / 2, (b + d) / 2), ((c - a) / 2, (d - b) / 2)) for a, b, c, d in self.boxes]
        desk = Desk(self.window.paper, tiles, list(self.lines), list(self.paths))
        placed, left = settled(desk, [replace(label, point=self.pixel(label.point)) for label in labels])
        back = [
            replace(label, point=self.unpixel(label.point), target=label.target and self.unpixel(label.target))
            for label in placed
        ]
        return tuple(back), left

    def place(self, text: str, centres: Iterable[Point], role: str, index: int = 0, angle: float = 0.0) -> Label:
        """The label at the best of the given places (pixels); earlier candidates win ties."""
        options = []
        for rank, centre in enumerate(centres):
            costs = [self.cost(area) for area in boxes(text, centre, angle)]
            options.append((sum(costs) / len(costs) + 0.5 * rank, centre))
        centre = min(options)[1]
        self.boxes += boxes(text, centre, angle)
        return Label(text, self.unpixel(centre), role, index, angle=angle)


def contains(corners: tuple[Point, ...], point: Point) -> bool:
    """Whether a pixel lies in a convex polygon."""
    turns = [
        (b[0] - a[0]) * (point[1] - a[1]) - (b[1] - a[1]) * (point[0] - a[0])
        for a, b in zip(corners, (*corners[1:], corners[0]), strict=True)
    ]
    return all(turn >= 0 for turn in turns) or all(turn <= 0 for turn in turns)


def beside(start: Point, end: Point, normal: Point, distance: float = 14.0) -> list[Point]:
    """Candidate centres along a segment (pixels), first on the side of the normal, then on the other."""
    steps = (0.14, 0.86, 0.5, 0.28, 0.72, 0.09, 0.91, 0.4, 0.6, 0.22, 0.78)
    return [
        tuple(a + t * (b - a) + side * distance * n for a, b, n in zip(start, end, normal, strict=True))
        for side in (1.0, -1.0)
        for t in steps
    ]


def aside(start: Point, end: Point, distance: float) -> Point:
    """The move (pixels) that puts a segment beside itself, on the same side whichever way it runs."""
    first, last = sorted((start, end))
    length = hypot(last[0] - first[0], last[1] - first[1]) or 1.0
    return (-(last[1] - first[1]) * distance / length, (last[0] - first[0]) * distance / length)


def number_spot(start: Point, end: Point, index: int, count: int) -> Point:
    """Where a step's number stands: on its segment, or beside it where it would cover the arrow (pixels)."""
    share = (index + 1) / (count + 1) if count > 1 else 0.45
    spot = (start[0] + share * (end[0] - start[0]), start[1] + share * (end[1] - start[1]))
    if hypot(end[0] - start[0], end[1] - start[1]) >= SHORT:
        return spot
    move = aside(start, end, BESIDE if index >= count / 2 else -BESIDE)
    return (spot[0] + move[0], spot[1] + move[1])


def about(
    centre: Point, text: str, gap: float = 14.0, away: Point | None = None, reach: tuple[float, ...] = REACH
) -> list[Point]:
    """Candidate centres for a text around a mark (pixels); those pointing away from ``away`` come first."""
    half = max(GLYPH * SIZE * len(text) / 2 - gap / 2, 0.0)
    ring = [(1, 0), (-1, 0), (0, 1), (0, -1), (0.75, 0.75), (-0.75, 0.75), (0.75, -0.75), (-0.75, -0.75)]
    if away is not None:
        out = (centre[0] - away[0], centre[1] - away[1])
        ring.sort(key=lambda way: -(way[0] * out[0] + way[1] * out[1]))
    return [(centre[0] + x * (spread * gap + half), centre[1] + y * spread * gap) for spread in reach for x, y in ring]
