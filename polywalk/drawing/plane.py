"""The layers of a picture in the plane: constraints with their forbidden side, the region, its vertices."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import hypot

from polywalk.drawing.placing import Sheet, upright
from polywalk.drawing.scene import Label, Layer, Line, Mark, Point, Polygon, Spot
from polywalk.drawing.segments import Segment, cross, distance, nearest
from polywalk.drawing.settling import beside_line, ring
from polywalk.drawing.shape import Shape
from polywalk.drawing.subject import Subject, floats, planar
from polywalk.drawing.window import Window
from polywalk.model import SIGN, Constraint
from polywalk.region import vertex_name

RADII = {"vertex": 6.0, "optimum": 8.0, "degenerate": 11.5, "selected": 12.0, "start": 8.0, "evidence": 16.0}
RADII |= {"lost": 7.0, "gained": 7.0, "old optimum": 11.0}
"""Pixels around a mark that texts keep clear of, by its role."""

HATCH_GAP, HATCH = 15.0, 7.0
"""Pixels between the short strokes on a constraint's forbidden side, and their length."""

ALONE, NEARER = 12.0, 4.0
"""So many pixels from all others a stretch of a line is alone; what is nearer is ranked in such steps."""

BEYOND = 0.6
"""How far lines go on past the window, as a share of it: an interactive figure may be wider, and can be moved."""


def chord(row: Constraint, window: Window) -> tuple[Point, Point] | None:
    """The part of a constraint's border inside the window, or None where it does not pass."""
    a, b = planar(floats(row.coefficients)), float(row.rhs)
    (low_x, low_y), (high_x, high_y) = window.low, window.high
    found: list[Point] = []
    if a[1]:
        found += [(x, (b - a[0] * x) / a[1]) for x in (low_x, high_x)]
    if a[0]:
        found += [((b - a[1] * y) / a[0], y) for y in (low_y, high_y)]
    ends = sorted({point for point in found if window.inside(point)})
    return (ends[0], ends[-1]) if len(ends) > 1 else None


def forbidden(row: Constraint, sheet: Sheet) -> Point:
    """The unit direction on paper in which a constraint is violated."""
    _, inward = row.inward
    x, y = (-value / unit for value, unit in zip(planar(floats(inward)), sheet.window.scale, strict=True))
    length = hypot(x, y)
    return (x / length, y / length)


def hatching(start: Point, end: Point, out: Point) -> Iterator[tuple[Point, Point]]:
    """Short strokes along a border, to the side it forbids (pixels)."""
    length = hypot(end[0] - start[0], end[1] - start[1])
    along = ((end[0] - start[0]) / length, (end[1] - start[1]) / length)
    stroke = tuple(HATCH * (0.8 * o + 0.6 * s) for o, s in zip(out, along, strict=True))
    for k in range(1, int(length / HATCH_GAP)):
        foot = (start[0] + k * HATCH_GAP * along[0], start[1] + k * HATCH_GAP * along[1])
        yield foot, (foot[0] + stroke[0], foot[1] + stroke[1])


def constraints(subject: Subject, sheet: Sheet, conflict: tuple[str, ...] = ()) -> tuple[Layer, tuple[str, ...]]:
    """Every border that passes through the window, with its name and hatching; and the names that do not pass."""
    lines: list[Line] = []
    wanted: list[tuple[int, Constraint, Point, Point]] = []
    absent: list[str] = []
    for index, row in enumerate(subject.seen.model.constraints):
        ends = None if row.is_constant else chord(row, sheet.window)
        if ends is None:
            absent.append(row.name)
            continue
        start, end = (sheet.pixel(point) for point in ends)
        sheet.lines.append((start, end))
        wanted.append((index, row, start, end))
        hover = f"{row.name}\n{row.text(subject.axes)}"
        role = "conflict line" if row.name in conflict else "constraint"
        ends = chord(row, sheet.window.grown(BEYOND)) or ends
        start, end = (sheet.pixel(point) for point in ends)
        lines.append(Line((ends,), role, index, row.name, hover))
        if row.sense != "==":
            strokes = tuple(
                (sheet.unpixel(a), sheet.unpixel(b)) for a, b in hatching(start, end, forbidden(row, sheet))
            )
            lines.append(Line(strokes, "hatch", index, row.name))
            sheet.lines += [(sheet.pixel(a), sheet.pixel(b)) for a, b in strokes]
    wanted.sort(key=lambda item: hypot(item[2][0] - item[3][0], item[2][1] - item[3][1]))
    said = {
        row.name: ("culprit" if row.name in conflict else "name", subject.letters[row.name]) for _, row, *_ in wanted
    }
    borders = [(start, end) for *_, start, end in wanted]
    labels = tuple(_name(sheet, index, row, (ends, borders), said[row.name]) for index, row, *ends in wanted)
    return Layer(lines=tuple(lines), labels=labels), tuple(absent)


def _name(
    sheet: Sheet, index: int, row: Constraint, lines: tuple[Sequence[Point], list[Segment]], said: tuple[str, str]
) -> Label:
    """The name of a border, in its role, with its letter for where there is no room for the name.

    ``lines`` are the border and all borders: the name stands, or its leader ends, where it is alone if it can.
    """
    out, (start, end), (role, letter) = forbidden(row, sheet), lines[0], said
    others = [line for line in lines[1] if line != (start, end)]
    text = f"{row.name} ({SIGN['==']})" if row.sense == "==" else row.name
    spots = beside_line(start, end, out, (text, role), upright(start, end))

    def rank(spot: Spot) -> tuple[bool, float]:
        foot = spot.foot or nearest(spot.centre, (start, end))
        near = min((distance(foot, line) for line in others), default=ALONE)
        crossed = sum(cross((spot.centre, foot), line) for line in others)
        return sheet.covered(spot.centre), crossed - min(near, ALONE) // NEARER

    chosen = tuple(sorted(spots, key=rank))
    return Label(text, sheet.unpixel(start), role, index, spots=chosen, shorter=letter, longer=row.name)


def region(shape: Shape, role: str = "region") -> Layer:
    """Fill and edges of the drawn region; unbounded edges end in dashed arrows."""
    polygons = tuple(Polygon(face.corners, role, name="region") for face in shape.faces)
    border = "rest edge" if role == "rest" else "edge"
    lines = [Line(shape.edges, border, name="edges")] if shape.edges else []
    if shape.open_edges:
        lines.append(Line(shape.open_edges, "open edge", name="unbounded this way", arrow="end"))
    return Layer(polygons, tuple(lines))


def vertices(subject: Subject, sheet: Sheet | None) -> Layer:
    """One mark a vertex, a ring where it is degenerate, the optimum and the selection emphasised, numbers beside."""
    marks: list[Mark] = []
    labels: list[Label] = []
    seen = subject.seen
    points = [planar(floats(vertex.point)) for vertex in seen.vertices]
    for k, (vertex, point) in enumerate(zip(seen.vertices, points, strict=True)):
        if vertex.degenerate:
            marks.append(Mark(point, "degenerate"))
        marks.append(Mark(point, "vertex", text=vertex_name(k), hover=subject.hover(k), key=k))
    marks += [Mark(points[k], "optimum", text=vertex_name(k), hover=subject.hover(k)) for k in subject.best]
    inside = [planar(floats(point)) for point in subject.optimal]
    marks += [Mark(point, "optimum", hover="shadow of an optimal vertex") for point in inside if point not in points]
    if subject.view.vertex is not None:
        marks.append(Mark(points[subject.view.vertex], "selected"))
    if sheet is not None:
        middle = sheet.pixel(sheet.window.middle)
        radii = dict.fromkeys(points, 0.0)
        for mark in marks:
            radii[mark.point] = max(radii.get(mark.point, 0.0), RADII[mark.role])
        for point, radius in radii.items():
            sheet.keep_clear(point, radius)
        for k, point in enumerate(points):
            spots = ring(sheet.pixel(point), vertex_name(k), "point", radii[point], middle)
            labels.append(Label(vertex_name(k), point, "point", spots=tuple(spots)))
    return Layer(marks=tuple(marks), labels=tuple(labels))
