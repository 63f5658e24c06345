"""Labels of a solid scene on paper: tags and numbers where they belong, words where they cover least."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from itertools import pairwise

from polywalk.drawing.paper import Paper
from polywalk.drawing.placing import NEAR, Sheet, about, aside, box, contains, number_spot, overlap
from polywalk.drawing.scene import Label, Line, Point, Polygon, Scene
from polywalk.drawing.window import PAPER, Window

APART = 6.0
"""Pixels between walks that share an edge."""

CROWDED = 1000.0
"""The cost of covering a number or a mark: from there on a tag gives way."""

Faces = tuple[tuple[Polygon, bool], ...]


def beside_itself(on: Paper, part: Sequence[Point], index: int, count: int) -> tuple[Point, ...]:
    """A walk's segment on paper, moved aside where several walks are drawn."""
    flat = tuple(on.at(point) for point in part)
    move = aside(flat[0], flat[-1], APART * (index - (count - 1) / 2))
    return tuple((x + move[0], y + move[1]) for x, y in flat)


def labels(scene: Scene, on: Paper, faces: Faces, lines: list[Line], frame: Sequence[Label]) -> tuple[Label, ...]:
    """All labels on paper.

    ``faces`` are the polygons of the body, each with whether it faces the eye; ``lines`` and ``frame`` are already on
    paper and are kept clear.
    """
    sheet = Sheet(Window((0.0, 0.0), PAPER))
    sheet.lines = [(a, b) for line in lines for part in line.parts for a, b in pairwise(part)]
    sheet.boxes += [box(label.text, label.point) for label in frame]
    for mark in scene.marks:
        sheet.keep_clear(on.at(mark.point), 8.0)
    count = 1 + max((label.index for label in scene.labels if label.role == "step"), default=0)
    numbers = [_number(sheet, on, item, count) for item in scene.labels if item.role == "step"]
    tags = [_tag(sheet, on, item, faces) for item in scene.labels if item.role == "tag"]
    middle = (PAPER[0] / 2, PAPER[1] / 2)
    names = [
        sheet.place(mark.text, about(on.at(mark.point), mark.text, 15.0, middle, NEAR), "point")
        for mark in scene.marks
        if mark.key is not None
    ]
    words = [_word(sheet, on, item) for item in scene.labels if item.role not in {"step", "tag"}]
    return (*(_widened(sheet, on, tag, faces) for tag in tags), *numbers, *names, *words)


def _number(sheet: Sheet, on: Paper, item: Label, count: int) -> Label:
    start, end = beside_itself(on, item.along or (item.point, item.point), item.index, count)
    spot = number_spot(start, end, item.index, count)
    sheet.keep_clear(spot, 9.0)
    return replace(item, point=spot)


def _tag(sheet: Sheet, on: Paper, item: Label, faces: Faces) -> Label:
    """The letter of a side at its middle; where that is taken (an edge may carry a number), a little beside."""
    spot = on.at(item.point)
    behind = any(not seen and _same(item.point, face) for face, seen in faces)
    if sheet.cost(box(item.text, spot)) >= CROWDED:
        spot = min(about(spot, item.text), key=lambda place: sheet.cost(box(item.text, place)))
    sheet.keep_clear(spot, 8.0)
    return replace(item, point=spot, role="back tag" if behind else "tag")


def _widened(sheet: Sheet, on: Paper, tag: Label, faces: Faces) -> Label:
    """The tag with its constraint's name, where the face it stands on has room for it."""
    area = box(tag.longer, tag.point)
    own = box(tag.text, tag.point)
    corners = [(area[k], area[m]) for k in (0, 2) for m in (1, 3)]
    roomy = any(seen and _holds(on, face, corners) for face, seen in faces)
    free = sum(overlap(area, other) for other in sheet.boxes if overlap(own, other) == 0) == 0
    if tag.role != "tag" or not tag.longer or not roomy or not free:
        return tag
    sheet.boxes.append(area)
    return replace(tag, text=tag.longer)


def _holds(on: Paper, face: Polygon, corners: Sequence[Point]) -> bool:
    flat = tuple(on.at(point) for point in face.points)
    return all(contains(flat, corner) for corner in corners)


def _word(sheet: Sheet, on: Paper, item: Label) -> Label:
    spot = on.at(item.point)
    found = sheet.place(item.text, about(spot, item.text, 30.0 if item.target else 14.0), item.role, item.index)
    return replace(found, target=spot if item.target else None)


def _same(point: Point, face: Polygon) -> bool:
    """Whether a point is the middle of a face, but for rounding."""
    centre = [sum(values) / len(face.points) for values in zip(*face.points, strict=True)]
    return all(abs(x - y) <= 1e-9 * (1 + abs(y)) for x, y in zip(point, centre, strict=True))
