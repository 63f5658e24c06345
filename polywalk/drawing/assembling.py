"""A scene from its layers: texts where there is room, the key, title and status."""

from __future__ import annotations

from dataclasses import replace
from itertools import pairwise

from polywalk.drawing import evidence
from polywalk.drawing.camera import USUAL, best_eye, named_eye
from polywalk.drawing.conflict import Conflict
from polywalk.drawing.key import key
from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import Axis, KeyPart, Layer, Scene
from polywalk.drawing.settling import unplaced
from polywalk.drawing.shape import Shape
from polywalk.drawing.subject import Subject, floats, titles_of
from polywalk.drawing.window import Window

UNTOLD = {"edge", "open edge", "rest edge", "evidence ray"}
"""Roles of lines in the plane that no layer has told the sheet of, for texts to keep clear of."""


def settled(
    looked: Subject,
    sheet: Sheet,
    layers: tuple[Layer, ...],
    *,
    absent: tuple[str, ...],
    found: Conflict | None,
    said: str,
) -> Scene:
    """The flat scene with its texts where there is room; a letter in place of a name is explained in the key."""
    for line in (line for layer in layers for line in layer.lines if line.role in UNTOLD):
        sheet.lines += [(sheet.pixel(a), sheet.pixel(b)) for part in line.parts for a, b in pairwise(part)]
    labels, left = sheet.settle(label for layer in layers for label in layer.labels)
    tags = {label.longer: label.text for label in labels if label.role == "tag"}
    bare = tuple(replace(layer, labels=()) for layer in layers)
    rows = unplaced(left) + key(looked, tags, absent, found)
    return assembled(looked, sheet.window, (*bare, Layer(labels=labels)), rows=rows, said=said)


def assembled(
    looked: Subject,
    frame: Window,
    layers: tuple[Layer, ...],
    *,
    rows: tuple[KeyPart, ...],
    said: str,
    drawn: Shape | None = None,
) -> Scene:
    model = looked.model
    away = [floats(ray.direction) for ray in looked.seen.rays]
    named = model.name or "Feasible region"
    if looked.projected:
        named = f"{named}: projection of {model.n} variables onto {', '.join(looked.axes)}"
    planes = [item.points for layer in layers for item in layer.polygons if item.role == "conflict"]
    eye = best_eye(drawn, away, frame.scale, planes) if drawn else USUAL
    aim = model.objective.text(model.variables) if model.objective else "no objective"
    return Scene(
        axes=tuple(Axis(*parts) for parts in zip(titles_of(model, looked.axes), frame.low, frame.high, strict=True)),
        scale=frame.scale,
        title=named,
        subtitle=f"{aim}\n{said}",
        polygons=tuple(item for layer in layers for item in layer.polygons),
        lines=tuple(item for layer in layers for item in layer.lines),
        marks=tuple(item for layer in layers for item in layer.marks),
        labels=tuple(item for layer in layers for item in layer.labels),
        key=evidence.part(looked) + rows,
        camera=named_eye(looked.view.camera, looked.axes) or eye,
        paper=frame.paper,
    )
