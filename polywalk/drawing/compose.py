"""One scene from a region and a view: windows, layers, words. Pure data in, pure data out."""

from __future__ import annotations

from collections.abc import Sequence

from polywalk.drawing import conflict as conflicts
from polywalk.drawing import evidence, goal, paths, plane, solid
from polywalk.drawing.assembling import assembled, settled
from polywalk.drawing.bases import bases_scene
from polywalk.drawing.chart import chart
from polywalk.drawing.difference import change_scene
from polywalk.drawing.emptiness import empty_scene
from polywalk.drawing.key import key
from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import Layer, Line, Scene
from polywalk.drawing.shape import Shape, shape
from polywalk.drawing.status import status
from polywalk.drawing.subject import Subject, floats, planar, subject
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
        return empty_scene(looked)
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
    drawn = shape(seen, frame if len(frame.low) != 2 else square(frame, looked.units))
    if len(frame.low) == 1:
        return lifted(frame), drawn.lifted
    return (square(frame, looked.units) if len(frame.low) == 2 else frame), drawn


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
    return settled(looked, sheet, layers, absent=absent, found=None, said=status(looked))


def _solid(looked: Subject, frame: Window, drawn: Shape) -> Scene:
    middle = tuple(sum(values) / len(drawn.corners) for values in zip(*drawn.corners, strict=True))
    tags, tagged = solid.tags(looked, drawn)
    layers = (
        solid.faces(looked, drawn),
        goal.layer(looked, frame, None),
        _optimal_face(looked),
        paths.layer(looked, frame, None, middle),
        plane.vertices(looked, None),
        evidence.layer(looked, frame, None, drawn),
        tagged,
    )
    return assembled(looked, frame, layers, rows=key(looked, tags, (), None), said=status(looked), drawn=drawn)


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
