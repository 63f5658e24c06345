"""One scene from a region and a view: windows, layers, words. Pure data in, pure data out."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from itertools import count, pairwise
from string import ascii_lowercase

from polywalk.drawing import conflict as conflicts
from polywalk.drawing import evidence, goal, paths, plane
from polywalk.drawing.bases import bases_scene
from polywalk.drawing.camera import USUAL, best_eye, named_eye
from polywalk.drawing.chart import chart
from polywalk.drawing.conflict import Conflict
from polywalk.drawing.difference import change_scene
from polywalk.drawing.key import key
from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import Axis, KeyPart, Label, Layer, Line, Point, Polygon, Scene
from polywalk.drawing.settling import unplaced
from polywalk.drawing.shape import Shape, Side, shape
from polywalk.drawing.status import status
from polywalk.drawing.subject import Subject, floats, planar, subject, titles_of
from polywalk.drawing.valuechart import value_chart
from polywalk.drawing.view import View
from polywalk.drawing.window import Window, around, lifted, square
from polywalk.model import Model
from polywalk.region import Region
from polywalk.reviewing import Difference, ValueFunction
from polywalk.walks import Bases, Comparison, Walk

Source = Model | Region | Bases | Comparison | Walk | Sequence[Walk] | ValueFunction | Difference
"""What can be drawn: a region, the bases of a vertex, walks as a chart of the objective by pivot, a value function, the
difference of two versions."""


UNTOLD = {"edge", "open edge", "rest edge", "evidence ray"}
"""Roles of lines in the plane that no layer has told the sheet of, for texts to keep clear of."""


def scene(source: Source, view: View | None = None) -> Scene:
    """The picture of a model or a region as plain data.

    Parameters
    ----------
    source : Model, Region, Bases, Comparison, Walk or sequence of Walk, ValueFunction, Difference
        A Region saves enumerating again. Bases give the picture of one vertex's bases. Walks give the chart of the
        objective by pivot, a comparison that of its walks from the first start.
    view : View, optional

    Returns
    -------
    Scene

    Raises
    ------
    DrawingError
        The axes do not fit the model.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.drawing import scene
    >>> model = pw.from_algebra(maximize="x + y", constraints={"both": "x + y <= 3"}, bounds={"x": (0, 2), "y": (0, 2)})
    >>> [mark.text for mark in scene(model).marks if mark.role == "optimum"]
    ['V2', 'V4']
    """
    if isinstance(source, Bases):
        return bases_scene(source, view or View())
    if isinstance(source, Difference):
        return change_scene(source, view or View())
    if isinstance(source, ValueFunction):
        return value_chart(source)
    if isinstance(source, Walk | Comparison | Sequence):
        return chart(source)
    looked = subject(source, view or View())
    if looked.seen.status == "empty":
        return _empty(looked)
    frame, drawn = _framed(looked)
    return _solid(looked, frame, drawn) if len(frame.low) == 3 else _flat(looked, frame, drawn)


def _framed(looked: Subject) -> tuple[Window, Shape]:
    """The window of a region and its pieces inside; a single decision gets a second, hidden axis."""
    seen = looked.seen
    points = [floats(point) for point in seen.base]
    for walk in looked.view.walks:
        points += [looked.along(point) for point in walk.points]
    frame = around(
        points, [floats(ray.direction) for ray in seen.rays], [floats(line) for line in seen.lines], looked.view.paper
    )
    drawn = shape(seen, frame if len(frame.low) != 2 else square(frame))
    if len(frame.low) == 1:
        return lifted(frame), _lifted_shape(drawn)
    return (square(frame) if len(frame.low) == 2 else frame), drawn


def _lifted_shape(drawn: Shape) -> Shape:
    def lift(points: tuple[Point, ...]) -> tuple[Point, ...]:
        return tuple(planar(point) for point in points)

    return Shape(
        drawn.dimension,
        lift(drawn.corners),
        (),
        tuple(Side(side.constraints, lift(side.corners)) for side in drawn.sides),
        tuple((a, b) for a, b in (lift(edge) for edge in drawn.edges)),
        tuple((a, b) for a, b in (lift(edge) for edge in drawn.open_edges)),
    )


def _flat(looked: Subject, frame: Window, drawn: Shape) -> Scene:
    sheet = Sheet(frame)
    body = plane.region(drawn)
    conflicts.keep_names_clear(body, sheet)
    walks = paths.layer(looked, frame, sheet, frame.middle)
    points = plane.vertices(looked, sheet)
    aim = goal.layer(looked, frame, sheet)
    borders, absent = plane.constraints(looked, sheet)
    proofs = evidence.layer(looked, frame, sheet)
    layers = (body, borders, aim, _optimal_face(looked), walks, points, proofs)
    return _settled(looked, sheet, layers, absent=absent, found=None, said=status(looked))


def _settled(
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
    return _assembled(looked, sheet.window, (*bare, Layer(labels=labels)), rows=rows, said=said)


def _solid(looked: Subject, frame: Window, drawn: Shape) -> Scene:
    middle = tuple(sum(values) / len(drawn.corners) for values in zip(*drawn.corners, strict=True))
    tags, tagged = _tags(looked, drawn)
    layers = (
        _faces(looked, drawn),
        goal.layer(looked, frame, None),
        _optimal_face(looked),
        paths.layer(looked, frame, None, middle),
        plane.vertices(looked, None),
        evidence.layer(looked, frame, None, drawn),
        tagged,
    )
    return _assembled(looked, frame, layers, rows=key(looked, tags, (), None), said=status(looked), drawn=drawn)


def _faces(looked: Subject, drawn: Shape) -> Layer:
    """Facets that know their constraints, and the edges."""
    rows = [row.name for row in looked.seen.model.constraints]
    polygons = []
    for face in drawn.faces:
        words = [f"{name}\n{looked.seen.model.constraint(name).text(looked.axes)}" for name in face.constraints]
        index = rows.index(face.constraints[0]) if face.constraints else 0
        polygons.append(Polygon(face.corners, "facet", index, " & ".join(face.constraints), "\n".join(words)))
    return Layer(tuple(polygons), plane.region(drawn).lines)


def _tags(looked: Subject, drawn: Shape) -> tuple[dict[str, str], Layer]:
    """A letter for each constraint that makes a side, at the middle of that side."""
    letters = (name for size in count(1) for name in (letter * size for letter in ascii_lowercase))
    order = [row.name for row in looked.seen.model.constraints]
    tags: dict[str, str] = {}
    labels = []
    for side in sorted(drawn.sides, key=lambda side: order.index(side.constraints[0])):
        letter = next(letters)
        tags.update(dict.fromkeys(side.constraints, letter))
        words = [looked.seen.model.constraint(name) for name in side.constraints]
        longer = f"{letter} {' & '.join(side.constraints)}"
        hover = "\n".join(f"{row.name}: {row.text(looked.axes)}" for row in words)
        labels.append(Label(letter, side.centre, "tag", order.index(side.constraints[0]), hover=hover, longer=longer))
    return tags, Layer(labels=tuple(labels))


def _optimal_face(looked: Subject) -> Layer:
    """A thick line along edges all of whose points are optimal."""
    best = set(looked.best)
    points = [planar(floats(vertex.point)) for vertex in looked.seen.vertices]
    parts = tuple(
        (points[edge.start], points[edge.end])
        for edge in looked.seen.edges
        if edge.end is not None and {edge.start, edge.end} <= best
    )
    return Layer(lines=(Line(parts, "optimal face", name="tied optimum"),)) if parts else Layer()


def _empty(looked: Subject) -> Scene:
    model, found = looked.seen.model, conflicts.conflict(looked.model)
    words = conflicts.sentence(found)
    if looked.projected:
        count = max(len(looked.axes), 2)
        nothing = Window((0.0,) * count, (1.0,) * count, looked.view.paper)
        return _assembled(looked, nothing, (), rows=key(looked, {}, (), found), said=words)
    frame = conflicts.window(model, found, looked.view.paper)
    if model.n == 2:
        frame = square(frame)
    rest = shape(found.rest, frame) if found.rest is not None else None
    if model.n == 3:
        tags, tagged = _tags(looked, rest) if rest else ({}, Layer())
        body = plane.region(rest, "rest") if rest else Layer()
        planes = (conflicts.faces(model, found, rest), conflicts.borders(model, found, frame))
        proofs = evidence.layer(looked, frame, None, rest)
        layers = (body, *planes, conflicts.shortfall(found, None), proofs, tagged)
        return _assembled(looked, frame, layers, rows=key(looked, tags, (), found), said=words, drawn=rest)
    if model.n == 1:
        frame, rest = lifted(frame), _lifted_shape(rest) if rest else None
    sheet = Sheet(frame)
    body = plane.region(rest, "rest") if rest else Layer()
    conflicts.keep_names_clear(body, sheet)
    gap = conflicts.shortfall(found, sheet)
    lines, absent = plane.constraints(looked, sheet, found.names)
    flat = (body, lines, gap, evidence.layer(looked, frame, sheet))
    return _settled(looked, sheet, flat, absent=absent, found=found, said=words)


def _assembled(
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
        camera=named_eye(looked.view.camera, looked.axes) or (best_eye(drawn, away, frame.scale) if drawn else USUAL),
        paper=frame.paper,
    )
