"""Labels of a solid scene on paper: tags and numbers where they belong, words where there is room."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from itertools import pairwise

from polywalk.drawing.paper import Paper
from polywalk.drawing.paths import number_spots
from polywalk.drawing.placing import aside, contains
from polywalk.drawing.plane import RADII
from polywalk.drawing.scene import KeyPart, Label, Line, Mark, Point, Polygon, Scene, Spot
from polywalk.drawing.settling import Desk, led, ring, settled, unplaced
from polywalk.drawing.tiles import Tile, halves

APART = 6.0
"""Pixels between walks that share an edge."""

WALKS = {"walk", "phase 1", "walk rest"}
"""Roles of lines that are the path of a walk."""

Faces = tuple[tuple[Polygon, bool], ...]


def beside_itself(on: Paper, part: Sequence[Point], index: int, count: int) -> tuple[Point, ...]:
    """A walk's segment on paper, moved aside where several walks are drawn."""
    flat = tuple(on.at(point) for point in part)
    move = aside(flat[0], flat[-1], APART * (index - (count - 1) / 2))
    return tuple((x + move[0], y + move[1]) for x, y in flat)


def labels(
    scene: Scene, on: Paper, faces: Faces, lines: list[Line], frame: Sequence[Label]
) -> tuple[tuple[Label, ...], tuple[KeyPart, ...]]:
    """All labels on paper, and the part of the key for those that found no room.

    ``faces`` are the polygons of the body, each with whether it faces the eye; ``lines`` and ``frame`` are already on
    paper and are kept clear.
    """
    desk = Desk(scene.paper)
    for line in (one for one in lines if one.role != "grid"):
        kept = desk.paths if line.role in WALKS else desk.lines
        kept += [(a, b) for part in line.parts for a, b in pairwise(part)]
    for mark in scene.marks:
        desk.keep_clear(on.at(mark.point), RADII.get(mark.role, 8.0))
    count = 1 + max((label.index for label in scene.labels if label.role == "step"), default=0)
    asked = [*frame]
    asked += [
        _culprit(scene, on, item) if item.role == "culprit" else _asked(on, item, faces, count) for item in scene.labels
    ]
    placed, left = settled(desk, [*asked, *_names(scene, on)])
    return tuple(_widened(desk, on, label, faces) for label in placed), unplaced([one for one in left if one.hover])


def _names(scene: Scene, on: Paper) -> list[Label]:
    """The names of the vertices beside their marks."""
    radii: dict[Point, float] = {}
    for mark in scene.marks:
        radii[mark.point] = max(radii.get(mark.point, 0.0), RADII.get(mark.role, 8.0))
    middle = (scene.paper[0] / 2, scene.paper[1] / 2)
    return [_name(on.at(mark.point), mark, radii[mark.point], middle) for mark in scene.marks if mark.key is not None]


def _name(spot: Point, mark: Mark, radius: float, middle: Point) -> Label:
    spots = tuple(ring(spot, mark.text, "point", radius, middle))
    return Label(mark.text, spot, "point", hover=mark.text, spots=spots)


def _asked(on: Paper, item: Label, faces: Faces, count: int) -> Label:
    """A label of the scene with its places on paper."""
    spot = on.at(item.point)
    said = item.longer or item.text
    if item.role == "step":
        start, end = beside_itself(on, item.along or (item.point, item.point), item.index, count)
        return replace(item, hover=said, spots=tuple(number_spots(start, end, item.index, count)))
    if item.role == "tag":
        behind = any(not seen and _same(item.point, face) for face, seen in faces)
        spots = (Spot(spot), *ring(spot, item.shorter or item.text, "tag", 2.0))
        if item.shorter:  # a whole name stays on its face
            spots = tuple(one for one in spots if one.foot is None)
        return replace(item, hover=said, role="back tag" if behind else "tag", spots=spots)
    places = led(spot, item.text, item.role, 12.0) if item.target else ring(spot, item.text, item.role, 6.0)
    return replace(item, hover=said, target=None, spots=tuple(places))


def _culprit(scene: Scene, on: Paper, item: Label) -> Label:
    """The name of a border that nothing left reaches, at one of the border's corners."""
    corners = [
        on.at(corner)
        for border in scene.polygons
        if border.role == "conflict" and item.point in border.points
        for corner in border.points
    ]
    middle = tuple(sum(values) / len(corners) for values in zip(*corners, strict=True))
    places = [spot for corner in corners for spot in ring(corner, item.text, item.role, 4.0, middle)]
    near_first = sorted(places, key=lambda spot: spot.foot is not None)
    return replace(item, hover=item.longer or item.text, spots=tuple(near_first))


def _widened(desk: Desk, on: Paper, tag: Label, faces: Faces) -> Label:
    """The tag with its constraint's name, where the face it stands on has room for it."""
    if tag.role != "tag" or tag.text == tag.longer or tag.target:
        return tag
    area, own = Tile(tag.point, halves(tag.longer, "tag")), Tile(tag.point, halves(tag.text, "tag"))
    corners = [(tag.point[0] + x * area.half[0], tag.point[1] + y * area.half[1]) for x in (-1, 1) for y in (-1, 1)]
    roomy = any(seen and _holds(on, face, corners) for face, seen in faces)
    others = Desk(desk.paper, [tile for tile in desk.tiles if tile != own], desk.lines, desk.paths)
    if not roomy or not others.free(area):
        return tag
    desk.tiles.append(area)
    return replace(tag, text=tag.longer)


def _holds(on: Paper, face: Polygon, corners: Sequence[Point]) -> bool:
    flat = tuple(on.at(point) for point in face.points)
    return all(contains(flat, corner) for corner in corners)


def _same(point: Point, face: Polygon) -> bool:
    """Whether a point is the middle of a face, but for rounding."""
    centre = [sum(values) / len(face.points) for values in zip(*face.points, strict=True)]
    return all(abs(x - y) <= 1e-9 * (1 + abs(y)) for x, y in zip(point, centre, strict=True))
