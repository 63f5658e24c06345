"""A solid scene laid flat on paper: what faces the eye in front, the rest behind and dashed.

The drawn solid is convex, so no depth buffer is needed: a face is in front exactly when its outward side faces the
eye, an edge or corner exactly when it belongs to a face in front.
"""

from __future__ import annotations

from dataclasses import replace
from itertools import pairwise

from polywalk.drawing.camera import Camera
from polywalk.drawing.lettering import WALKS, beside_itself, labels
from polywalk.drawing.paper import Paper, frame, paper
from polywalk.drawing.scene import Axis, Label, Line, Mark, Point, Polygon, Scene
from polywalk.drawing.space import cross, inner
from polywalk.drawing.tiles import halves

EDGE = 14.0
"""Pixels kept free below the lowest and above the highest thing drawn."""

BODY = {"facet", "rest", "region"}


def laid_flat(scene: Scene) -> Scene:
    """The same picture in the plane, in pixels; roles tell front from back."""
    on = paper(scene)
    front = _front(scene, on.camera)
    visible = {corner for polygon in front for corner in polygon.points}
    polygons = tuple(_polygon(on, item, item in front) for item in scene.polygons)
    count = 1 + max((line.index for line in scene.lines if line.role in WALKS), default=0)
    lines = [part for item in scene.lines for part in _lines(on, item, front, count)]
    frame_lines, frame_labels = frame(scene, on)
    faces = tuple((item, item in front) for item in scene.polygons if item.role in BODY)
    words, left = labels(scene, on, faces, [*frame_lines, *lines], frame_labels)
    marks = tuple(
        replace(item, point=on.at(item.point), index=0 if item.point in visible or item.key is None else 1)
        for item in scene.marks
    )
    low, high = _heights((*frame_lines, *lines), words, marks)
    return replace(
        scene,
        axes=(Axis("", 0.0, scene.paper[0]), Axis("", low, high)),
        paper=(scene.paper[0], high - low),
        scale=(1.0, 1.0),
        polygons=polygons,
        lines=(*frame_lines, *lines),
        labels=words,
        marks=marks,
        key=left + scene.key,
    )


def _heights(lines: tuple[Line, ...], labels: tuple[Label, ...], marks: tuple[Mark, ...]) -> tuple[float, float]:
    """The part of the paper's height that anything is drawn on."""
    found = [point[1] for line in lines for part in line.parts for point in part]
    found += [label.point[1] + side * halves(label.text, label.role)[1] for label in labels for side in (-1, 1)]
    found += [mark.point[1] + side * EDGE for mark in marks for side in (-1, 1)]
    return min(found) - EDGE, max(found) + EDGE


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


def _lines(on: Paper, item: Line, front: tuple[Polygon, ...], count: int) -> list[Line]:
    """The line on paper; edges split into visible and hidden ones, walks side by side."""
    if item.role in WALKS:
        return [replace(item, parts=tuple(beside_itself(on, part, item.index, count) for part in item.parts))]
    parts = {True: [], False: []}  # type: dict[bool, list[tuple[Point, ...]]]
    for part in item.parts:
        seen = item.role not in {"edge", "open edge"} or any(set(part) <= set(face.points) for face in front)
        parts[seen or not front].append(_all(on, part))
    hidden = "hidden edge" if item.role == "edge" else item.role
    kept = [replace(item, parts=tuple(parts[True]))] if parts[True] else []
    return kept + ([replace(item, parts=tuple(parts[False]), role=hidden)] if parts[False] else [])
