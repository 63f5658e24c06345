"""The sheet a solid scene is laid on: the projection that fits it, and the box with its axes."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from math import floor, hypot, log10

from polywalk.drawing.camera import Camera
from polywalk.drawing.scene import Label, Line, Point, Scene
from polywalk.drawing.window import PAPER

MARGIN = 52.0
"""Pixels kept free around the box for the names of its axes."""


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
    """The projection that fits the scene's box onto the paper."""
    camera = Camera(scene.camera, scene.scale)
    seen = [camera.see(corner) for corner in box(scene)]
    low = [min(values) for values in zip(*seen, strict=True)][:2]
    high = [max(values) for values in zip(*seen, strict=True)][:2]
    room = [(size - 2 * MARGIN) / (b - a) for size, a, b in zip(PAPER, low, high, strict=True)]
    unit = min(room)
    shift = tuple((size - unit * (a + b)) / 2 for size, a, b in zip(PAPER, low, high, strict=True))
    return Paper(camera, unit, shift)


def box(scene: Scene) -> Iterator[Point]:
    """The eight corners of the drawn box."""
    (x, y, z) = scene.axes
    for a in (x.low, x.high):
        for b in (y.low, y.high):
            for c in (z.low, z.high):
                yield (a, b, c)


def ticks(low: float, high: float, most: int = 6) -> list[float]:
    """Round numbers within an interval: steps of 1, 2 or 5 times a power of ten."""
    rough = (high - low) / most
    power = 10.0 ** floor(log10(rough))
    step = next(size * power for size in (1, 2, 5, 10) if size * power >= rough)
    first = -floor(-low / step)
    return [k * step for k in range(first, floor(high / step) + 1)]


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
        lines.append(Line(((on.at(start), on.at(end)),), "axis"))
        out = _outward(on.at(start), on.at(end), middle)
        for value in ticks(axis.low, axis.high):
            point = tuple(value if j == k else x for j, x in enumerate(start))
            foot = on.at(point)
            text = f"{value:.6g}".replace("-", "−")
            labels.append(Label(text, (foot[0] + 14 * out[0], foot[1] + 11 * out[1]), "note"))
            lines.append(Line(((foot, (foot[0] + 4 * out[0], foot[1] + 4 * out[1])),), "axis"))
            if k < 2:
                other = tuple(low[j] + high[j] - x if j == 1 - k else x for j, x in enumerate(point))
                lines.append(Line(((foot, on.at(other)),), "grid"))
        half = tuple((a + b) / 2 for a, b in zip(on.at(start), on.at(end), strict=True))
        away = 28.0 + 3.5 * len(axis.title) * abs(out[0])
        labels.append(Label(axis.title, (half[0] + away * out[0], half[1] + 34 * out[1]), "name"))
    return lines, labels


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
