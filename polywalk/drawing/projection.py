"""A solid scene laid flat on paper: what faces the eye in front, the rest behind and dashed.

The drawn solid is convex, so no depth buffer is needed: a face is in front exactly when its outward side faces the
eye, an edge or corner exactly when it belongs to a face in front.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from itertools import pairwise
from math import floor, hypot, log10

from polywalk.drawing.camera import Camera
from polywalk.drawing.placing import Sheet, about
from polywalk.drawing.scene import Axis, Label, Line, Point, Polygon, Scene
from polywalk.drawing.space import cross, inner
from polywalk.drawing.window import PAPER, Window

BODY = {"facet", "rest", "region"}
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
    seen = [camera.see(corner) for corner in _box(scene)]
    low = [min(values) for values in zip(*seen, strict=True)][:2]
    high = [max(values) for values in zip(*seen, strict=True)][:2]
    room = [(size - 2 * MARGIN) / (b - a) for size, a, b in zip(PAPER, low, high, strict=True)]
    unit = min(room)
    shift = tuple((size - unit * (a + b)) / 2 for size, a, b in zip(PAPER, low, high, strict=True))
    return Paper(camera, unit, shift)


def _box(scene: Scene) -> Iterator[Point]:
    (x, y, z) = scene.axes
    for a in (x.low, x.high):
        for b in (y.low, y.high):
            for c in (z.low, z.high):
                yield (a, b, c)


def laid_flat(scene: Scene) -> Scene:
    """The same picture in the plane, in pixels; roles tell front from back."""
    on = paper(scene)
    front = _front(scene, on.camera)
    visible = {corner for polygon in front for corner in polygon.points}
    polygons = tuple(_polygon(on, item, item in front) for item in scene.polygons)
    lines = [part for item in scene.lines for part in _lines(on, item, front)]
    labels = _labels(scene, on, front, lines)
    marks = tuple(
        replace(item, point=on.at(item.point), index=0 if item.point in visible or item.key is None else 1)
        for item in scene.marks
    )
    frame_lines, frame_labels = _frame(scene, on)
    axes = tuple(Axis("", 0.0, size) for size in PAPER)
    return replace(
        scene,
        axes=axes,
        scale=(1.0, 1.0),
        polygons=polygons,
        lines=(*frame_lines, *lines),
        labels=(*frame_labels, *labels),
        marks=marks,
    )


def _all(on: Paper, points: tuple[Point, ...]) -> tuple[Point, ...]:
    return tuple(on.at(point) for point in points)


def _polygon(on: Paper, item: Polygon, seen: bool) -> Polygon:
    """The polygon on paper; faces are lit from the upper left of the eye, so that neighbours differ."""
    if item.role not in BODY:
        return replace(item, points=_all(on, item.points))
    normal = _normal(item, on.camera)
    right, up, toward = on.camera.frame
    light = tuple(0.75 * t + 0.45 * u - 0.5 * r for t, u, r in zip(toward, up, right, strict=True))
    bright = abs(inner(normal, light)) / ((inner(normal, normal) * inner(light, light)) ** 0.5 or 1.0)
    return replace(item, points=_all(on, item.points), role=item.role if seen else "back", shade=1 - min(bright, 1.0))


def _front(scene: Scene, camera: Camera) -> tuple[Polygon, ...]:
    body = [item for item in scene.polygons if item.role in BODY]
    if len(body) <= 1:
        return tuple(body)
    corners = [corner for item in body for corner in item.points]
    middle = tuple(sum(values) / len(corners) for values in zip(*corners, strict=True))
    return tuple(item for item in body if _faces_eye(item, middle, camera))


def _faces_eye(item: Polygon, middle: Point, camera: Camera) -> bool:
    """Whether the outward normal of a face, in drawn lengths, points to the eye."""
    normal = _normal(item, camera)
    outward = inner(normal, _minus(camera.scaled(item.points[0]), camera.scaled(middle)))
    return inner(normal, camera.toward) * outward > 0


def _normal(item: Polygon, camera: Camera) -> Point:
    """A vector square to a polygon, in drawn lengths."""
    first, *rest = (camera.scaled(point) for point in item.points)
    arms = [_minus(point, first) for point in rest]
    return max((cross(a, b) for a, b in pairwise(arms)), key=lambda vector: inner(vector, vector))


def _minus(left: Point, right: Point) -> Point:
    return tuple(a - b for a, b in zip(left, right, strict=True))


def _lines(on: Paper, item: Line, front: tuple[Polygon, ...]) -> list[Line]:
    """The line on paper; edges split into visible and hidden ones."""
    parts = {True: [], False: []}  # type: dict[bool, list[tuple[Point, ...]]]
    for part in item.parts:
        seen = item.role not in {"edge", "open edge"} or any(set(part) <= set(face.points) for face in front)
        parts[seen or not front].append(_all(on, part))
    hidden = "hidden edge" if item.role == "edge" else item.role
    kept = [replace(item, parts=tuple(parts[True]))] if parts[True] else []
    return kept + ([replace(item, parts=tuple(parts[False]), role=hidden)] if parts[False] else [])


def _labels(scene: Scene, on: Paper, front: tuple[Polygon, ...], lines: list[Line]) -> tuple[Label, ...]:
    """Labels on paper: tags and step numbers where they belong, words where they cover least."""
    sheet = Sheet(Window((0.0, 0.0), PAPER))
    sheet.lines = [(a, b) for line in lines for part in line.parts for a, b in pairwise(part)]
    for mark in scene.marks:
        sheet.keep_clear(on.at(mark.point), 8.0)
    behind = {_centre(face) for face in scene.polygons if face.role in BODY and face not in front}
    placed: list[Label] = []
    for item in sorted(scene.labels, key=lambda label: label.role not in {"tag", "step"}):
        spot = on.at(item.point)
        if item.role in {"tag", "step"}:
            back = item.role == "tag" and _rounded(item.point) in behind
            placed.append(replace(item, point=spot, role="back tag" if back else item.role))
            sheet.keep_clear(spot, 8.0)
        else:
            gap = 30.0 if item.target else 14.0
            found = sheet.place(item.text, about(spot, item.text, gap), item.role, item.index)
            placed.append(replace(found, target=spot if item.target else None))
    middle = (PAPER[0] / 2, PAPER[1] / 2)
    vertices = [mark for mark in scene.marks if mark.key is not None]
    placed += [sheet.place(mark.text, about(on.at(mark.point), mark.text, 15.0, middle), "point") for mark in vertices]
    return tuple(placed)


def _centre(face: Polygon) -> Point:
    return _rounded(tuple(sum(values) / len(face.points) for values in zip(*face.points, strict=True)))


def _rounded(point: Point) -> Point:
    return tuple(round(value, 9) for value in point)


def ticks(low: float, high: float, most: int = 6) -> list[float]:
    """Round numbers within an interval: steps of 1, 2 or 5 times a power of ten."""
    rough = (high - low) / most
    power = 10.0 ** floor(log10(rough))
    step = next(size * power for size in (1, 2, 5, 10) if size * power >= rough)
    first = -floor(-low / step)
    return [k * step for k in range(first, floor(high / step) + 1)]


def _frame(scene: Scene, on: Paper) -> tuple[list[Line], list[Label]]:
    """The box's floor and the three edges that carry the axes, with their numbers and titles."""
    lines: list[Line] = []
    labels: list[Label] = []
    low = tuple(axis.low for axis in scene.axes)
    high = tuple(axis.high for axis in scene.axes)
    middle = on.at(tuple((a + b) / 2 for a, b in zip(low, high, strict=True)))
    for k, axis in enumerate(scene.axes):
        start = _edge(scene, on, k)
        end = tuple(axis.high if j == k else value for j, value in enumerate(start))
        lines.append(Line((_all(on, (start, end)),), "axis"))
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
    ends = [corner for corner in _box(scene) if corner[k] == scene.axes[k].low]
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
