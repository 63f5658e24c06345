"""The sheet a solid scene is laid on: the projection that fits it, and the box with its axes."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from math import hypot

from polywalk.drawing.camera import Camera
from polywalk.drawing.placing import upright
from polywalk.drawing.scales import scale, ticks
from polywalk.drawing.scene import Label, Line, Point, Scene, Spot
from polywalk.drawing.tiles import USUAL, halves

MARGIN = 52.0
"""Pixels kept free around the box for the names of its axes, on paper that is wide enough; else SHARE of its width."""

SHARE = 0.13

UPRIGHT = 60.0
"""From so many degrees on the name of an axis is written along it."""

SHORTEST, APART = 36.0, 24.0
"""An axis shorter than this (pixels) is seen from its end and not written; its numbers are at least so far apart."""


@dataclass(frozen=True)
class Paper:
    """From the axes of a solid scene to pixels."""

    camera: Camera
    unit: float
    shift: Point

    def at(self, point: Point) -> Point:
        """The pixel of a point, from the lower left corner."""
        right, up, _ = self.camera.see(point)
        return (right * self.unit + self.shift[0], up * self.unit + self.shift[1])


def paper(scene: Scene) -> Paper:
    """The projection that fits the scene's box and all its lines onto the paper."""
    camera = Camera(scene.camera, scene.scale)
    points = [*box(scene), *(point for line in scene.lines for part in line.parts for point in part)]
    seen = [camera.see(point) for point in points]
    low = [min(values) for values in zip(*seen, strict=True)][:2]
    high = [max(values) for values in zip(*seen, strict=True)][:2]
    margin = min(MARGIN, SHARE * scene.paper[0])
    room = [(size - 2 * margin) / (b - a) for size, a, b in zip(scene.paper, low, high, strict=True)]
    unit = min(room)
    shift = tuple((size - unit * (a + b)) / 2 for size, a, b in zip(scene.paper, low, high, strict=True))
    return Paper(camera, unit, shift)


def box(scene: Scene) -> Iterator[Point]:
    """The eight corners of the drawn box."""
    (x, y, z) = scene.axes
    for a in (x.low, x.high):
        for b in (y.low, y.high):
            for c in (z.low, z.high):
                yield (a, b, c)


def frame(scene: Scene, on: Paper) -> tuple[list[Line], list[Label]]:
    """The box's floor and the three edges that carry the axes, with their numbers and titles."""
    lines: list[Line] = []
    labels: list[Label] = []
    low = tuple(axis.low for axis in scene.axes)
    high = tuple(axis.high for axis in scene.axes)
    middle = on.at(tuple((a + b) / 2 for a, b in zip(low, high, strict=True)))
    for k, axis in enumerate(scene.axes):
        start = _edge(scene, on, k)
        end = tuple(axis.high if j == k else value for j, value in enumerate(start))
        length = hypot(on.at(end)[0] - on.at(start)[0], on.at(end)[1] - on.at(start)[1])
        if length < SHORTEST:
            continue
        lines.append(Line(((on.at(start), on.at(end)),), "axis"))
        out, how = _outward(on.at(start), on.at(end), middle), scale(axis.low, axis.high)
        for value in ticks(axis.low, axis.high, max(1, min(6, int(length / APART)))):
            point = tuple(value if j == k else x for j, x in enumerate(start))
            foot = on.at(point)
            text = how.written(value)
            labels.append(Label(text, foot, "tick", spots=(_tick(foot, out, text),)))
            lines.append(Line(((foot, (foot[0] + 4 * out[0], foot[1] + 4 * out[1])),), "axis"))
            if k < 2:
                other = tuple(low[j] + high[j] - x if j == 1 - k else x for j, x in enumerate(point))
                lines.append(Line(((foot, on.at(other)),), "grid"))
        shown = how.titled(axis.title, 0.42 * scene.paper[0], USUAL)
        named = Label(shown, start, "axis name", hover=how.titled(axis.title))
        labels.append(_title(named, on.at(start), on.at(end), out, scene.paper))
    return lines, labels


def _tick(foot: Point, out: Point, text: str) -> Spot:
    """Where the number of a scale stands: off its foot by half its own size."""
    wide, high = halves(text, "tick")
    return Spot((foot[0] + (5 + wide) * out[0], foot[1] + (5 + high) * out[1]))


def _title(name: Label, start: Point, end: Point, out: Point, page: Point) -> Label:
    """The name of an axis beside its middle, or as near as there is room; a name too long is cut."""
    wide, high = halves(name.text, "name")
    spots = []
    turn = upright(start, end)
    if abs(turn) > UPRIGHT:
        x, y = (start[0] + end[0]) / 2, (start[1] + end[1]) / 2
        spots = [Spot((x + out[0] * away, y + out[1] * away), turn) for away in (34.0, 40.0, 28.0, 46.0, 22.0)]
        spots.append(Spot((min(max(end[0], wide + 3), page[0] - wide - 3), end[1] + 4 + high)))
    for distance in (24.0, 30.0, 38.0, 48.0, 14.0):
        for share in (0.5, 0.6, 0.4, 0.75, 0.25, 0.9, 0.1, 1.0, 0.0):
            x, y = (a + share * (b - a) for a, b in zip(start, end, strict=True))
            centre = (x + out[0] * (distance + wide), y + out[1] * (distance + high))
            edge = min(max(centre[0], wide + 3), page[0] - wide - 3), min(max(centre[1], high + 3), page[1] - high - 3)
            spots.append(Spot(edge))
    return replace(name, spots=tuple(spots))


def _edge(scene: Scene, on: Paper, k: int) -> Point:
    """Where the edge that carries axis k starts: on the floor, nearest the eye; or upright, farthest left."""
    ends = [corner for corner in box(scene) if corner[k] == scene.axes[k].low]
    if k == 2:
        return min(ends, key=lambda corner: on.at(corner)[0])
    floor_ends = [corner for corner in ends if corner[2] == scene.axes[2].low]
    return max(floor_ends, key=lambda corner: on.camera.see(corner)[2])


def _outward(start: Point, end: Point, middle: Point) -> Point:
    along = (end[0] - start[0], end[1] - start[1])
    length = hypot(*along) or 1.0
    normal = (-along[1] / length, along[0] / length)
    half = ((start[0] + end[0]) / 2 - middle[0], (start[1] + end[1]) / 2 - middle[1])
    return normal if normal[0] * half[0] + normal[1] * half[1] > 0 else (-normal[0], -normal[1])
