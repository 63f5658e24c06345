"""The objective against the pivot number, one line a walk; stays are flat, Phase I is dotted."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise

from polywalk.drawing.course import Course, courses_of, key, reading
from polywalk.drawing.numbers import brief
from polywalk.drawing.placing import GLYPH, SIZE, Sheet
from polywalk.drawing.scene import PAPER, Axis, Label, Line, Mark, Point, Scene
from polywalk.drawing.subject import coordinates
from polywalk.drawing.window import Window
from polywalk.walks import Comparison, Pivot, Walk

APART = 1.6
"""Pixels right and down between walks that pass the same point of the chart (left and down where it falls)."""

ARROW = 38.0
"""Pixels of the arrow that shows a walk going on without end."""

ROW = 15.0
"""Height in pixels of a line of text in a label."""

ROOM = (18.0, 170.0, 46.0)
"""Free pixels to the left of pivot 0, to the right of the last pivot (for the names), and above and below."""

MOST_MARKS = 64
"""Past this many pivots the marks of single pivots would merge into a band; lines alone are drawn."""

MOST_TICKS = 12
"""Past this many numbers along the pivots every second, fifth, tenth, ... is written."""


def chart(source: Walk | Comparison | Sequence[Walk]) -> Scene:
    """The chart of some walks as plain data.

    Parameters
    ----------
    source : Walk, Comparison or sequence of Walk
        Walks of one model; of a comparison those from its first start.

    Raises
    ------
    DrawingError
        No walk, something else than a walk, or walks of different models.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.drawing.chart import chart
    >>> cube = pw.scenarios.klee_minty(3)
    >>> [line.name for line in chart([pw.walk(cube, rule) for rule in ("dantzig", "bland")]).lines if line.name]
    ['optimum 125', 'dantzig: 7 pivots', 'bland: 5 pivots']
    """
    walks = source.walks() if isinstance(source, Comparison) else (source,) if isinstance(source, Walk) else source
    courses = courses_of(list(walks))
    model, window = courses[0].walk.model, _window(courses)
    sheet, drawn = Sheet(window), [_drawn(courses, Sheet(window), course) for course in courses]
    level = _level(courses, window)
    lines = [line for course, spots in zip(courses, drawn, strict=True) for line in _lines(course, spots, window)]
    for line in (*level, *lines):
        sheet.lines += [(sheet.pixel(a), sheet.pixel(b)) for part in line.parts for a, b in pairwise(part)]
    marks = tuple(mark for course, spots in zip(courses, drawn, strict=True) for mark in _marks(course, spots))
    for mark in marks:
        sheet.keep_clear(mark.point, 5.0)
    aim = model.objective.text(model.variables) if model.objective else "no objective"
    most = max(len(course.pivots) for course in courses)
    return Scene(
        axes=(
            Axis("pivot", window.low[0], window.high[0], _spacing(most)),
            Axis("objective", window.low[1], window.high[1]),
        ),
        scale=window.scale,
        title=f"Objective by pivot{f': {model.name}' if model.name else ''}",
        subtitle=f"{aim}\n{reading(courses)}",
        lines=(*level, *lines),
        marks=marks,
        labels=(*_names_at_ends(courses, drawn, sheet), *(_level_name(line, sheet) for line in level)),
        key=key(courses),
    )


def _window(courses: list[Course]) -> Window:
    """All spots, with room for the names at the right, and for arrows where a walk has no end."""
    heights = [spot[1] for course in courses for spot in course.spots]
    most = max(len(course.pivots) for course in courses) or 1
    low, high = min(heights), max(heights)
    size = (high - low) or abs(high) or 1.0
    if any(course.walk.end == "unbounded" for course in courses):
        low, high = (low, high + size / 2) if courses[0].rises else (low - size / 2, high)
        size *= 1.5
    left, right, edge = ROOM
    unit = most / (PAPER[0] - left - right)
    more = size * edge / (PAPER[1] - 2 * edge)
    return Window((-left * unit, low - more), (most + right * unit, high + more))


def _drawn(courses: list[Course], sheet: Sheet, course: Course) -> tuple[Point, ...]:
    """The spots of a walk, moved a little across the way walks go where others pass the same spot."""
    moved, slant = [], 1 if course.rises else -1
    for spot in course.spots:
        here = [other.index for other in courses if spot in other.spots]
        across = APART * (here.index(course.index) - (len(here) - 1) / 2)
        x, y = sheet.pixel(spot)
        moved.append(sheet.unpixel((x + slant * across, y - across)))
    return tuple(moved)


def _lines(course: Course, spots: tuple[Point, ...], window: Window) -> list[Line]:
    """The part outside the region dotted, the rest in the walk's own dash, and an arrow where it never ends."""
    first, index = course.outside, course.index
    found = [Line((spots[: first + 1],), "phase 1", index)] if first else []
    rest = (spots[first:],) if len(spots) > first + 1 else ()  # without any it still has its place in the legend
    found.append(Line(rest, "walk", index, course.text))
    onward = _onward(course, spots[-1], window)
    return [*found, Line((onward,), "onward", index, arrow="end")] if onward else found


def _onward(course: Course, spot: Point, window: Window) -> tuple[Point, Point] | None:
    """Flat on where the walk cycles, up or down where the objective improves without end."""
    right, up = (ARROW / unit for unit in window.scale)
    if course.walk.end == "cycling":
        return spot, (spot[0] + right, spot[1])
    if course.walk.end == "unbounded":
        return spot, (spot[0] + right / 2, spot[1] + (up if course.rises else -up))
    return None


def _marks(course: Course, spots: tuple[Point, ...]) -> list[Mark]:
    """A dot after each pivot that moves, a hollow one after each that stays."""
    if len(course.pivots) > MOST_MARKS:
        return []
    start = Mark(spots[0], "moved", course.index, hover=f"{course.name}: start at {coordinates(course.walk.start)}")
    return [start, *(_mark(course, pivot, spot) for pivot, spot in zip(course.pivots, spots[1:], strict=True))]


def _mark(course: Course, pivot: Pivot, spot: Point) -> Mark:
    step = f", step {brief(pivot.step)}" if pivot.step is not None else ""
    what = f"{course.name}, pivot {pivot.number}: {pivot.entering} enters, {pivot.leaving} leaves{step}"
    there = f"objective {brief(pivot.objective_after)} at {coordinates(pivot.point_after)}"
    role = "stayed" if pivot.kind == "degenerate" else "moved"
    return Mark(spot, role, course.index, hover=f"{what}\n{there}")


def _names_at_ends(courses: list[Course], drawn: list[tuple[Point, ...]], sheet: Sheet) -> list[Label]:
    """The walks' names at their ends; walks that end alike at one spot share a label, in the order of their lines."""
    groups: dict[tuple[Point, str], list[Course]] = {}
    for course in courses:
        groups.setdefault((course.spots[-1], course.walk.end), []).append(course)
    labels = []
    for alike in groups.values():
        last = alike[-1]
        spot = drawn[last.index][-1]
        onward = _onward(last, spot, sheet.window)
        text = "\n".join([*(course.name for course in alike[:-1]), last.text])
        role, index = ("end", last.index) if len(alike) == 1 else ("ends", 0)
        labels.append(_placed(text, onward[1] if onward else spot, sheet, role, index))
    return labels


def _placed(text: str, end: Point, sheet: Sheet, role: str, index: int) -> Label:
    """A text of one line or more where it covers least, joined to its point."""
    rows = text.split("\n")
    wide, high = GLYPH * SIZE * max(map(len, rows)) / 2 + 6, ROW * len(rows) / 2 + 4
    x, y = sheet.pixel(end)
    options = []
    for gap in (10.0, 22.0, 40.0, 64.0):
        for across, up in ((1, 0), (0.6, 1), (0.6, -1), (0, 1), (0, -1), (-0.6, 1), (-0.6, -1), (-1, 0)):
            centre = (x + across * (wide + gap), y + up * (high + gap))
            box = (centre[0] - wide, centre[1] - high, centre[0] + wide, centre[1] + high)
            options.append((sheet.cost(box) + gap, centre, box))
    _, centre, box = min(options)
    sheet.boxes.append(box)
    return Label(text, sheet.unpixel(centre), role, index, target=end)


def _level(courses: list[Course], window: Window) -> list[Line]:
    """The optimum, where a walk found one."""
    values = [course.walk.value for course in courses if course.walk.end == "optimal"]
    if not values or values[0] is None:
        return []
    height = float(values[0])
    part = ((window.low[0], height), (window.high[0], height))
    return [Line((part,), "level line", name=f"optimum {brief(values[0])}")]


def _level_name(line: Line, sheet: Sheet) -> Label:
    (left, height), (right, _) = (sheet.pixel(point) for point in line.parts[0])
    shares = (0.92, 0.8, 0.06, 0.5, 0.3)
    places = [(left + share * (right - left), height + side) for side in (10.0, -10.0) for share in shares]
    return sheet.place(line.name, places, "note")


def _spacing(most: int) -> float:
    """The distance of the numbers along the pivots."""
    size = 1
    while True:
        for step in (size, 2 * size, 5 * size):
            if most <= MOST_TICKS * step:
                return float(step)
        size *= 10
