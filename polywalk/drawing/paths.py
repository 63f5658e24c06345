"""Walks in a picture: numbered steps with arrow heads, stays counted at their vertex, Phase I dotted.

In the plane several walks along one edge run side by side; in space each further walk is moved a little away from
the middle of the region, so that none hides another.
"""

from __future__ import annotations

from collections.abc import Iterator, Set
from math import hypot

from polywalk.drawing.placing import BESIDE, SHORT, Sheet, aside, number_spot
from polywalk.drawing.scene import Label, Layer, Line, Mark, Point, Spot
from polywalk.drawing.space import exit_point
from polywalk.drawing.stays import Frame, Leg, stays
from polywalk.drawing.subject import Subject, planar
from polywalk.drawing.window import Window
from polywalk.walks import Walk

APART = 7.0
"""Pixels between walks that share an edge."""

OUTWARD = 0.012
"""In space, how far each further walk is moved from the middle, as a share of its distance from there."""

MOST_NUMBERS = 60
"""Past this many pivots step numbers would cover the picture; every tenth is written."""


def layer(subject: Subject, window: Window, sheet: Sheet | None, middle: Point) -> Layer:
    """All walks of the view."""
    frame = Frame(subject, window, sheet, middle, len(subject.view.walks))
    lines: list[Line] = []
    marks: list[Mark] = []
    labels: list[Label] = []
    all_legs = [_legs(frame, walk) for walk in subject.view.walks]
    for index, legs in enumerate(all_legs):
        lines += _lines(frame, index, legs)
        earlier = {(leg.pivot.number, leg.start, leg.end) for other in all_legs[:index] for leg in other}
        labels += _numbers(frame, index, legs, earlier)
        if index == 0:
            marks += _marks(frame, subject.view.walks[0], legs)
    labels += stays(frame, all_legs)
    return Layer(lines=tuple(lines), marks=tuple(marks), labels=tuple(labels))


def _legs(frame: Frame, walk: Walk) -> list[Leg]:
    legs = []
    for pivot in walk.pivots:
        start, end = (planar(frame.subject.along(point)) for point in (pivot.point_before, pivot.point_after))
        if pivot.kind == "ray":
            end = exit_point(start, planar(frame.subject.along(pivot.direction)), frame.window)
        legs.append(Leg(pivot, start, end))
    return legs


def _shifted(frame: Frame, index: int, leg: Leg) -> tuple[Point, Point]:
    """Start and end of a leg, moved aside so that walks on one edge do not hide one another."""
    if frame.sheet is None:
        grow = 1 + OUTWARD * index
        start, end = (
            tuple(m + grow * (x - m) for x, m in zip(point, frame.middle, strict=True))
            for point in (leg.start, leg.end)
        )
        return start, end
    a, b = frame.sheet.pixel(leg.start), frame.sheet.pixel(leg.end)
    move = aside(a, b, APART * (index - (frame.count - 1) / 2))
    return frame.sheet.unpixel((a[0] + move[0], a[1] + move[1])), frame.sheet.unpixel((b[0] + move[0], b[1] + move[1]))


def _lines(frame: Frame, index: int, legs: list[Leg]) -> list[Line]:
    limit = frame.subject.view.step
    parts: dict[str, list[tuple[Point, Point]]] = {}
    for leg in legs:
        if not leg.moves:
            continue
        role = "phase 1" if leg.pivot.outside else "walk"
        if index == 0 and limit is not None and leg.pivot.number > limit:
            role = "walk rest"
        parts.setdefault(role, []).append(_shifted(frame, index, leg))
        if frame.sheet is not None:
            start, end = _shifted(frame, index, leg)
            frame.sheet.paths.append((frame.sheet.pixel(start), frame.sheet.pixel(end)))
    name = walk_text(frame.subject.view.walks[index])
    parts = parts or {"walk": []}  # a walk that never moves still has its place in the legend
    named = "walk" if "walk" in parts else next(iter(parts))  # one entry of the legend a walk
    return [
        Line(tuple(found), role, index, name if role == named else "", arrow="end") for role, found in parts.items()
    ]


def _numbers(frame: Frame, index: int, legs: list[Leg], earlier: Set[tuple[int, Point, Point]]) -> list[Label]:
    """The steps' numbers; where walks share a step and its number, it is written once if there is little room."""
    labels = []
    for leg in legs:
        if not leg.moves or (len(legs) > MOST_NUMBERS and leg.pivot.number % 10):
            continue
        start, end = _shifted(frame, index, leg)
        if (leg.pivot.number, leg.start, leg.end) in earlier and _is_short(frame, leg):
            continue
        share = (index + 1) / (frame.count + 1)  # walks on one edge have their numbers one after the other
        spot = tuple(a + share * (b - a) for a, b in zip(start, end, strict=True))
        spots: tuple[Spot, ...] = ()
        if frame.sheet is not None:
            spots = tuple(number_spots(frame.sheet.pixel(start), frame.sheet.pixel(end), index, frame.count))
        said = f"step {leg.pivot.number} of {frame.subject.view.walks[index].rule}"
        number = str(leg.pivot.number)
        labels.append(Label(number, spot, "step", index, along=(start, end), longer=said, spots=spots))
    return labels


def _is_short(frame: Frame, leg: Leg) -> bool:
    """Whether a leg has no room for the numbers of several walks; in space it depends on the view, so none has."""
    if frame.sheet is None:
        return True
    (a, b), (c, d) = frame.sheet.pixel(leg.start), frame.sheet.pixel(leg.end)
    return hypot(c - a, d - b) < SHORT


def number_spots(start: Point, end: Point, index: int, count: int) -> Iterator[Spot]:
    """Where the number of a step may stand: on its segment, or beside it (pixels)."""
    yield Spot(number_spot(start, end, index, count))
    across = aside(start, end, BESIDE)
    shares = (0.5, 0.4, 0.6, 0.32, 0.68, 0.25, 0.75, 0.18, 0.82)
    for side in (0.0, 1.0, -1.0, 2.0, -2.0, 3.0, -3.0):
        for share in shares:
            yield Spot(
                (
                    start[0] + share * (end[0] - start[0]) + side * across[0],
                    start[1] + share * (end[1] - start[1]) + side * across[1],
                )
            )


def _marks(frame: Frame, walk: Walk, legs: list[Leg]) -> list[Mark]:
    if not legs:
        return []
    marks = [Mark(legs[0].start, "start", text="start")]
    step = frame.subject.view.step
    if step is not None:
        here = legs[0].start if step <= 0 else legs[min(step, len(legs)) - 1].end
        marks.append(Mark(here, "selected", text=f"after pivot {step}"))
    return marks


def walk_text(walk: Walk) -> str:
    """A walk in one line: rule, pivots, stays, end."""
    still = sum(pivot.kind == "degenerate" for pivot in walk.pivots)
    first = sum(pivot.phase == 1 for pivot in walk.pivots)
    beyond = sum(pivot.outside for pivot in walk.pivots) - first
    text = f"{walk.rule}: {_count(len(walk.pivots), 'pivot')}"
    text += f", {first} of them Phase I (dotted)" if first else ""
    text += f", {beyond} of them outside the region (dotted)" if beyond else ""
    text += f", {_count(still, 'stay')}" if still else ", no stay"
    return f"{text}, {walk.end}"


def _count(number: int, word: str) -> str:
    return f"{number} {word}" if number == 1 else f"{number} {word}s"
