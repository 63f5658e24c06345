"""Two versions of a model in one picture: what both allow, what the change cuts off, what it adds.

The three parts are told apart without colour: plain, struck through with strokes, dotted; lost vertices are crosses,
gained ones squares; the outline of the earlier version is dashed.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

from polywalk.drawing import plane
from polywalk.drawing.camera import USUAL, best_eye, named_eye
from polywalk.drawing.difference_key import ROLES, key
from polywalk.drawing.pair import Pair, changed, lift, outlines, seen
from polywalk.drawing.placing import Sheet, upright
from polywalk.drawing.scene import Axis, KeyPart, Label, Layer, Line, Mark, Point, Polygon, Scene
from polywalk.drawing.settling import beside_line, ring, unplaced
from polywalk.drawing.subject import coordinates, floats, planar, titles_of
from polywalk.drawing.tags import letters
from polywalk.drawing.view import View
from polywalk.region import vertex_name
from polywalk.reviewing import Difference


def change_scene(found: Difference, view: View) -> Scene:
    """The picture of a difference as plain data.

    Raises
    ------
    DrawingError
        The axes do not fit the model.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.drawing import View, scene
    >>> model = pw.scenarios.harbour_row("two decisions")
    >>> drawn = scene(pw.difference(model, model.with_rhs("harbour main", 9)), View())
    >>> sorted({polygon.role for polygon in drawn.polygons})
    ['cut off', 'region']
    """
    pair = seen(found, view)
    solid = len(pair.axes) == 3
    sheet = None if solid else Sheet(pair.window)
    body, parts = _common(pair), _parts(pair)
    lines = Layer(lines=tuple(outlines(pair)))
    marks = _marks(pair)
    borders = _borders(pair, sheet) if sheet else Layer()
    words = tuple(_words(pair, sheet))
    names = tuple(_names(pair, sheet)) if sheet else ()
    layers = (body, parts, lines, borders, marks, Layer(labels=(*names, *words)))
    labels: tuple[Label, ...] = tuple(label for layer in layers for label in layer.labels)
    left: tuple[Label, ...] = ()
    if sheet is not None:
        for line in (line for layer in (lines, body) for line in layer.lines):
            sheet.lines += [(sheet.pixel(a), sheet.pixel(b)) for part in line.parts for a, b in pairwise(part)]
        labels, left = sheet.settle(labels)
    return _assembled(pair, layers, labels, unplaced(left) + key(pair, labels))


def _common(pair: Pair) -> Layer:
    """What both versions allow."""
    drawn = pair.shape(pair.found.common)
    role = "facet" if drawn.dimension == 3 else "region"
    polygons = tuple(Polygon(lift(face.corners), role, name="allowed in both") for face in drawn.faces)
    edges = tuple(lift(edge) for edge in drawn.edges)
    return Layer(polygons, (Line(edges, "edge", name="edges of what both allow"),) if edges else ())


def _parts(pair: Pair) -> Layer:
    """The parts that one version allows alone."""
    polygons = []
    for role, part in (("cut off", pair.found.cut_off), ("added", pair.found.added)):
        for piece in part.pieces:
            faces = pair.shape(piece).faces
            polygons += [Polygon(lift(face.corners), role, name=role) for face in faces]
    return Layer(tuple(polygons))


def _marks(pair: Pair) -> Layer:
    """Every vertex, by what happens to it; the optima of both versions."""
    marks = []
    for corner in pair.found.corners:
        point = planar(floats(corner.point))
        name = vertex_name(corner.after) if corner.after is not None else f"old {vertex_name(corner.before or 0)}"
        hover = f"{name} {coordinates(corner.point)}: {corner.change}"
        marks.append(Mark(point, ROLES[corner.change], text=name, hover=hover, key=corner.after or corner.before or 0))
    for role, region in (("old optimum", pair.found.before), ("optimum", pair.found.after)):
        if region.optimal is not None and not region.lines:
            words = "optimum before" if role == "old optimum" else "optimum after"
            points = [region.base[k] for k in region.optimal.vertices]
            marks += [
                Mark(planar(floats(point)), role, text=words, hover=f"{words} {coordinates(point)}") for point in points
            ]
    return Layer(marks=tuple(marks))


def _names(pair: Pair, sheet: Sheet) -> Iterator[Label]:
    """The vertices' names beside them."""
    middle, marks = sheet.pixel(sheet.window.middle), _marks(pair).marks
    radii: dict[Point, float] = {}
    for mark in marks:
        radii[mark.point] = max(radii.get(mark.point, 0.0), plane.RADII.get(mark.role, 8.0))
    for point, radius in radii.items():
        sheet.keep_clear(point, radius)
    for mark in marks:
        if mark.key is not None:
            spots = ring(sheet.pixel(mark.point), mark.text, "point", radii[mark.point], middle)
            yield Label(mark.text, mark.point, "point", spots=tuple(spots))


def _words(pair: Pair, sheet: Sheet | None) -> Iterator[Label]:
    """The words "cut off" and "added" at the largest piece of each part."""
    for word, part in (("cut off", pair.found.cut_off), ("added", pair.found.added)):
        pieces = [piece for piece in part.pieces if piece.dimension == part.dimension]
        shapes = [drawn for piece in pieces if (drawn := pair.shape(piece)).corners]
        if not shapes:
            continue
        middles = [_middle(lift(drawn.corners)) for drawn in shapes]
        extents = [
            sum(abs(x - y) for corner in drawn.corners for x, y in zip(corner, middle, strict=False))
            for drawn, middle in zip(shapes, middles, strict=True)
        ]
        place = middles[extents.index(max(extents))]
        spots = tuple(ring(sheet.pixel(place), word, "part", 0.0)) if sheet else ()
        yield Label(word, place, "part", target=None if sheet else place, spots=spots)


def _middle(corners: tuple[Point, ...]) -> Point:
    return tuple(sum(values) / len(corners) for values in zip(*corners, strict=True))


def _borders(pair: Pair, sheet: Sheet) -> Layer:
    """The borders that changed: new ones with their hatching, old ones thin and dashed."""
    lines, labels, known = list[Line](), list[Label](), letters(_rows(pair))
    for index, row, old in changed(pair):
        ends = None if row.is_constant else plane.chord(row, sheet.window)
        if ends is None:
            continue
        start, end = (sheet.pixel(point) for point in ends)
        sheet.lines.append((start, end))
        out = plane.forbidden(row, sheet)
        name = f"before: {row.name}" if old else row.name
        lines.append(Line((ends,), "old border" if old else "constraint", index, name))
        if row.sense != "==" and not old:
            strokes = tuple((sheet.unpixel(a), sheet.unpixel(b)) for a, b in plane.hatching(start, end, out))
            lines.append(Line(strokes, "hatch", index, row.name))
            sheet.lines += [(sheet.pixel(a), sheet.pixel(b)) for a, b in strokes]
        spots = tuple(beside_line(start, end, out, (name, "name"), upright(start, end)))
        short = known[name]
        labels.append(Label(name, ends[0], "name", index, spots=spots, shorter=short, longer=name))
    return Layer(lines=tuple(lines), labels=tuple(labels))


def _rows(pair: Pair) -> Iterator[str]:
    """All rows of the later version, which keep their letters, then what changed of the earlier."""
    yield from (row.name for row in pair.found.after.model.constraints)
    yield from (f"before: {row.name}" for _, row, old in changed(pair) if old)


def _assembled(pair: Pair, layers: tuple[Layer, ...], labels: tuple[Label, ...], rows: tuple[KeyPart, ...]) -> Scene:
    found, model, frame = pair.found, pair.found.after.model, pair.window
    name = f"{model.name}: " if model.name else ""
    onto = f", projected onto {', '.join(pair.axes)}" if pair.projected else ""
    drawn = pair.shape(found.common if found.common.base else found.before if found.before.base else found.after)
    eye = best_eye(drawn, [], frame.scale) if drawn.corners else USUAL
    return Scene(
        axes=tuple(Axis(*parts) for parts in zip(titles_of(model, pair.axes), frame.low, frame.high, strict=True)),
        scale=frame.scale,
        title=f"{name}before and after{onto}",
        subtitle="\n".join(found.summary[:3:2]),
        polygons=tuple(item for layer in layers for item in layer.polygons),
        lines=tuple(item for layer in layers for item in layer.lines),
        marks=tuple(item for layer in layers for item in layer.marks),
        labels=labels,
        key=rows,
        camera=named_eye(pair.view.camera, pair.axes) or eye,
        paper=frame.paper,
    )
