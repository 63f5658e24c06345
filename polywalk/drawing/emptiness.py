"""The picture of a model that allows nothing: its conflict, and what would be left without one constraint of it."""

from __future__ import annotations

from polywalk.drawing import conflict as conflicts
from polywalk.drawing import evidence, plane, solid
from polywalk.drawing.assembling import assembled, settled
from polywalk.drawing.conflict import Conflict
from polywalk.drawing.key import key
from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import Layer, Scene
from polywalk.drawing.shape import Shape, shape
from polywalk.drawing.subject import Subject
from polywalk.drawing.window import Window, lifted, square


def empty_scene(looked: Subject) -> Scene:
    """The scene of a subject that holds no point."""
    model, found = looked.seen.model, conflicts.conflict(looked.model)
    if looked.projected:
        count = max(len(looked.axes), 2)
        nothing = Window((0.0,) * count, (1.0,) * count, looked.view.paper)
        return assembled(looked, nothing, (), rows=key(looked, {}, (), found), said=conflicts.sentence(found))
    frame = conflicts.window(model, found, looked.view.paper)
    frame = square(frame, looked.units) if model.n == 2 else frame
    rest = shape(found.rest, frame) if found.rest is not None else None
    if model.n == 3:
        return _in_space(looked, found, frame, rest)
    if model.n == 1:
        frame, rest = lifted(frame), rest.lifted if rest else None
    return _in_plane(looked, found, frame, rest)


def _in_space(looked: Subject, found: Conflict, frame: Window, rest: Shape | None) -> Scene:
    model = looked.seen.model
    tags, tagged = solid.tags(looked, rest, found.names) if rest else ({}, Layer())
    tags |= {name: looked.letters[name] for name in found.names}
    layers = (
        plane.region(rest, "rest") if rest else Layer(),
        conflicts.faces(model, found, rest),
        conflicts.borders(model, found, frame),
        conflicts.shortfall(model, found, None),
        evidence.layer(looked, frame, None, rest),
        tagged,
    )
    rows = key(looked, tags, (), found)
    return assembled(looked, frame, layers, rows=rows, said=conflicts.sentence(found), drawn=rest)


def _in_plane(looked: Subject, found: Conflict, frame: Window, rest: Shape | None) -> Scene:
    sheet = Sheet(frame)
    body = plane.region(rest, "rest") if rest else Layer()
    conflicts.keep_names_clear(body, sheet)
    gap = conflicts.shortfall(looked.seen.model, found, sheet)
    lines, absent = plane.constraints(looked, sheet, found.names)
    layers = (body, lines, gap, evidence.layer(looked, frame, sheet))
    return settled(looked, sheet, layers, absent=absent, found=found, said=conflicts.sentence(found))
