"""The objective in a picture: the direction that improves it, and its level through the optimum."""

from __future__ import annotations

from dataclasses import replace

from polywalk.drawing.placing import Sheet, upright
from polywalk.drawing.plane import BEYOND, chord
from polywalk.drawing.scene import Label, Layer, Line, Polygon
from polywalk.drawing.settling import beside_line, ring
from polywalk.drawing.space import slice_of, uphill
from polywalk.drawing.subject import Subject, floats, planar
from polywalk.drawing.window import Window
from polywalk.model import Constraint, Objective

ARROW = {2: 46.0, 3: 0.2}
"""Length of the direction arrow: pixels in the plane, a share of the longest side in space."""

PATCH = 0.16
"""How far a solid's level is drawn beyond the optimum, as a share of the window."""

TREND = {"min": "objective falls", "max": "objective rises"}


def layer(subject: Subject, window: Window, sheet: Sheet | None) -> Layer:
    """Direction and level; nothing where the objective is constant, or not told by the axes alone."""
    goal = subject.seen.model.objective
    if goal is None or not any(goal.coefficients) or subject.seen.status == "empty":
        return Layer()
    return _join(_direction(subject, goal, window, sheet), _level(subject, goal, window, sheet))


def _join(first: Layer, second: Layer) -> Layer:
    return Layer(
        first.polygons + second.polygons,
        first.lines + second.lines,
        first.marks + second.marks,
        first.labels + second.labels,
    )


def _direction(subject: Subject, goal: Objective, window: Window, sheet: Sheet | None) -> Layer:
    seen, size = subject.seen, len(window.low)
    points = [floats(seen.vertices[k].point) for k in subject.best] or [floats(point) for point in seen.base]
    foot = planar(tuple(sum(values) / len(points) for values in zip(*points, strict=True)))
    step = uphill(planar(floats(goal.upward)), window)
    head = tuple(x + ARROW[size] * move for x, move in zip(foot, step, strict=True))
    line = Line(((foot, head),), "objective", name=TREND[goal.goal], arrow="end")
    if sheet is None:
        return Layer(lines=(line,), labels=(Label(TREND[goal.goal], head, "note", shift=(0, 10)),))
    end = sheet.pixel(head)
    sheet.lines.append((sheet.pixel(foot), end))
    middle = tuple((a + b) / 2 for a, b in zip(end, sheet.pixel(foot), strict=True))
    spots = tuple(
        replace(spot, foot=spot.foot and middle) for spot in ring(end, TREND[goal.goal], "note", 4.0, sheet.pixel(foot))
    )
    return Layer(lines=(line,), labels=(Label(TREND[goal.goal], head, "note", spots=spots),))


def _near(subject: Subject, window: Window) -> Window:
    """The part of a solid's window around its optimum: a patch of the level shows where it touches."""
    points = [floats(subject.seen.vertices[k].point) for k in subject.best] or [window.middle]
    low = [min(values) for values in zip(*points, strict=True)]
    high = [max(values) for values in zip(*points, strict=True)]
    return Window(
        tuple(a - PATCH * length for a, length in zip(low, window.extent, strict=True)),
        tuple(b + PATCH * length for b, length in zip(high, window.extent, strict=True)),
        window.paper,
    )


def _level(subject: Subject, goal: Objective, window: Window, sheet: Sheet | None) -> Layer:
    value = subject.region.value
    if value is None:
        return Layer()
    text = f"objective = {subject.worth(value)}"
    row = Constraint("level", goal.coefficients, "==", value - goal.constant)
    if sheet is None:
        corners = slice_of(floats(row.coefficients), float(row.rhs), _near(subject, window))
        if not corners:
            return Layer()
        border = Line((corners + corners[:1],), "level line", name=text)
        return Layer((Polygon(corners, "level", name=text),), (border,))
    ends = chord(row, window)
    if ends is None:
        return Layer()
    start, end = (sheet.pixel(point) for point in ends)
    normal = sheet.pixel(
        tuple(x + move for x, move in zip(window.low, uphill(planar(floats(goal.upward)), window), strict=True))
    )
    sheet.lines.append((start, end))
    spots = tuple(beside_line(start, end, normal, (text, "note"), upright(start, end)))
    label = Label(text, ends[0], "note", spots=spots)
    long = chord(row, window.grown(BEYOND)) or ends
    return Layer(lines=(Line((long,), "level line", name=text),), labels=(label,))
