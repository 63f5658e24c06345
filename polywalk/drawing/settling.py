"""Where every text of a picture stands: none on another, none on a line, none on the frame.

Texts are settled one after the other, those with the fewest places first; each takes the first of its places that is
free. A text that finds none is written shorter, if it has a shorter form; else it is handed back, and the key says so.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field, replace
from math import cos, pi, sin

from polywalk.drawing.scene import KeyPart, KeyRow, Label, Point, Spot
from polywalk.drawing.segments import Segment, cross, distance
from polywalk.drawing.tiles import Tile, around, halves

ORDER = (
    "tick",
    "axis name",
    "culprit",
    "step",
    "target",
    "part",
    "point",
    "tag",
    "stay",
    "evidence name",
    "name",
    "note",
)
"""Roles in the order in which they are settled."""

NOTHING, LINES, PATHS = 0, 1, 2
"""What a text may cover: nothing, lines too, the paths of walks too."""

COVERS = {"step": (PATHS,), "tick": (PATHS,), "stay": (NOTHING, LINES), "culprit": (NOTHING, LINES)}
COVERS |= dict.fromkeys(("tag", "back tag", "part"), (NOTHING, LINES, PATHS))
"""What roles try to cover, one after the other: some stand on lines, framed ones do where there is no other place."""

NEAR, FAR = (2.0, 6.0, 11.0), (20.0, 32.0, 48.0, 68.0, 92.0, 120.0)
"""Pixels between a mark and its text, beside it and joined to it by a line."""

CLOSE = 8.0
"""Pixels that the foot of a line to a text keeps off other such lines where it can."""


@dataclass
class Desk:
    """The paper while texts are settled: its size, what is taken, the lines, the paths of walks, the lines to feet."""

    paper: tuple[float, ...]
    tiles: list[Tile] = field(default_factory=list)
    lines: list[tuple[Point, Point]] = field(default_factory=list)
    paths: list[tuple[Point, Point]] = field(default_factory=list)
    leaders: list[Segment] = field(default_factory=list)

    def keep_clear(self, point: Sequence[float], radius: float) -> None:
        """Keep texts away from a mark."""
        self.tiles.append(around(point, radius))

    def free(self, tile: Tile, covers: int = NOTHING) -> bool:
        """Whether a tile covers nothing more than it may."""
        if not tile.within(self.paper) or any(tile.meets(other) for other in self.tiles):
            return False
        kept = (*(self.lines if covers < LINES else ()), *(self.paths if covers < PATHS else ()))
        return not any(tile.crossed(*line) for line in kept)

    def reaches(self, tile: Tile, foot: Point) -> bool:
        """Whether the line from a text to its foot passes by every other text and mark."""
        start = tile.border(foot)
        return not any(other.crossed(start, foot) for other in self.tiles if not other.holds(foot))

    def clear(self, tile: Tile, foot: Point | None) -> bool:
        """Whether the line from a text to its foot keeps off the other ones, so that each leads to one thing."""
        if foot is None:
            return True
        own = (tile.border(foot), foot)
        others = [line for line in self.leaders if line[1] != foot]
        return not any(cross(own, line) or min(distance(foot, line), distance(line[1], own)) < CLOSE for line in others)


def settled(desk: Desk, labels: Iterable[Label]) -> tuple[tuple[Label, ...], tuple[Label, ...]]:
    """The labels at their places (pixels), and those that found none; labels without spots stand where they are."""
    asked = list(labels)
    fixed = [label for label in asked if not label.spots]
    for label in fixed:
        desk.tiles.append(Tile(label.point, halves(label.text, label.role), label.angle))
    found, left = list[Label](fixed), list[Label]()
    rank = {role: place for place, role in enumerate(ORDER)}
    for label in sorted(
        (one for one in asked if one.spots), key=lambda one: (rank.get(one.role, len(ORDER)), not one.shorter)
    ):
        placed = _placed(desk, label)
        (found if placed else left).append(placed or replace(label, spots=()))
    return tuple(found), tuple(left)


def _placed(desk: Desk, label: Label) -> Label | None:
    """The label at the first place that is free; shortened, or over lines, only where nothing else is."""
    short = replace(label, text=label.shorter, role="tag") if label.shorter else None
    for form in (label, short) if short else (label,):
        half = halves(form.text, form.role)
        ways = (NOTHING,) if short and form.role == "back tag" else COVERS.get(form.role, (NOTHING,))
        for covers in ways:
            second: tuple[Tile, Spot] | None = None
            for spot in label.spots:
                tile = Tile(spot.centre, half, spot.angle if form is label else 0.0)
                if desk.free(tile, covers) and _joins(desk, tile, spot.foot):
                    if desk.clear(tile, spot.foot):
                        return _at(desk, form, tile, spot)
                    second = second or (tile, spot)
            if second:
                return _at(desk, form, *second)
    return None


def _joins(desk: Desk, tile: Tile, foot: Point | None) -> bool:
    return foot is None or desk.reaches(tile, foot)


def _at(desk: Desk, label: Label, tile: Tile, spot: Spot) -> Label:
    desk.tiles.append(tile)
    if spot.foot is not None:
        desk.lines.append((tile.border(spot.foot), spot.foot))
        desk.leaders.append(desk.lines[-1])
    return replace(label, point=tile.centre, angle=tile.angle, target=spot.foot, spots=())


def ring(centre: Point, text: str, role: str, radius: float, away: Point | None = None) -> Iterator[Spot]:
    """Places beside a mark, then farther off and joined to it; those that point away from ``away`` first."""
    wide, high = halves(text, role)
    for distances, count, led in ((NEAR, 8, False), (FAR, 16, True)):
        ways = [(cos(2 * pi * k / count), sin(2 * pi * k / count)) for k in range(count)]
        if away is not None:
            out = (centre[0] - away[0], centre[1] - away[1])
            ways.sort(key=lambda way: -(way[0] * out[0] + way[1] * out[1]))
        for off in distances:
            for x, y in ways:
                gap = radius + off
                spot = (centre[0] + x * gap + _sign(x) * wide, centre[1] + y * gap + _sign(y) * high)
                yield Spot(spot, foot=centre if led else None)


def led(centre: Point, text: str, role: str, radius: float, away: Point | None = None) -> Iterator[Spot]:
    """Places off a mark, all joined to it."""
    for spot in ring(centre, text, role, radius, away):
        yield replace(spot, foot=centre)


def _sign(value: float) -> float:
    return 0.0 if abs(value) < 0.2 else 1.0 if value > 0 else -1.0


def beside_line(start: Point, end: Point, normal: Point, label: tuple[str, str], angle: float) -> Iterator[Spot]:
    """Places along a segment, first on the side of the normal; then upright and joined to it; label is (text, role)."""
    shares = (0.14, 0.86, 0.5, 0.28, 0.72, 0.09, 0.91, 0.4, 0.6, 0.22, 0.78, 0.05, 0.95, 0.34, 0.66)
    _, high = halves(*label)

    def at(share: float, distance: float) -> Point:
        return (
            start[0] + share * (end[0] - start[0]) + distance * normal[0],
            start[1] + share * (end[1] - start[1]) + distance * normal[1],
        )

    for side in (1.0, -1.0):
        for share in shares:
            yield Spot(at(share, side * (high + 7.0)), angle)
    for off in (26.0, 42.0, 62.0, 90.0):
        for side in (1.0, -1.0):
            for share in shares:
                yield Spot(at(share, side * off), 0.0, at(share, 0.0))


def unplaced(labels: Sequence[Label]) -> tuple[KeyPart, ...]:
    """The part of the key that names what found no place; notes stand in it with their marks anyway."""
    names = ", ".join(dict.fromkeys(label.longer or label.text for label in labels if label.role != "note"))
    if not names:
        return ()
    return (KeyPart("No room in the picture for", (KeyRow("none", names),)),)
