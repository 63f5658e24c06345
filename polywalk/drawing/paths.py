"""Walks in a picture: numbered steps with arrow heads, stays counted at their vertex, Phase I dotted.

In the plane several walks along one edge run side by side; in space each further walk is moved a little away from
the middle of the region, so that none hides another.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from polywalk.drawing.placing import BESIDE, Sheet, aside, number_spot
from polywalk.drawing.scene import Label, Layer, Line, Mark, Point, Spot
from polywalk.drawing.settling import led
from polywalk.drawing.space import exit_point
from polywalk.drawing.subject import Subject, planar
from polywalk.drawing.window import Window
from polywalk.walks import Pivot, Walk

APART = 7.0
"""Pixels between walks that share an edge."""

OUTWARD = 0.012
"""In space, how far each further walk is moved from the middle, as a share of its distance from there."""

MOST_NUMBERS = 60
"""Past this many pivots step numbers would cover the picture; every tenth is written."""


@dataclass(frozen=True)
class Leg:
    """One pivot as it is drawn: from, to, and whether anything moves along the axes."""

    pivot: Pivot
    start: Point
    end: Point

    @property
    def moves(self) -> bool:
        """Whether it is seen to move."""
        return self.start != self.end


@dataclass(frozen=True)
class Frame:
    """What all walks of a picture share: where it is drawn, how many there are, the middle they avoid."""

    subject: Subject
    window: Window
    sheet: Sheet | None
    middle: Point
    count: int


def layer(subject: Subject, window: Window, sheet: Sheet | None, middle: Point) -> Layer:
    """All walks of the view."""
    frame = Frame(subject, window, sheet, middle, len(subject.view.walks))
    lines: list[Line] = []
    marks: list[Mark] = []
    labels: list[Label] = []
    for index, walk in enumerate(subject.view.walks):
        legs = _legs(frame, walk)
        lines += _lines(frame, index, legs)
        labels += _numbers(frame, index, legs) + _stays(frame, index, legs)
        if index == 0:
            marks += _marks(frame, walk, legs)
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
            frame.sheet.lines.append((frame.sheet.pixel(start), frame.sheet.pixel(end)))
    name = walk_text(frame.subject.view.walks[index])
    parts = parts or {"walk": []}  # a walk that never moves still has its place in the legend
    return [Line(tuple(found), role, index, name, arrow="end") for role, found in parts.items()]


def _numbers(frame: Frame, index: int, legs: list[Leg]) -> list[Label]:
    labels = []
    for leg in legs:
        if not leg.moves or (len(legs) > MOST_NUMBERS and leg.pivot.number % 10):
            continue
        start, end = _shifted(frame, index, leg)
        spot = tuple((a + b) / 2 for a, b in zip(start, end, strict=True))
        spots: tuple[Spot, ...] = ()
        if frame.sheet is not None:
            spots = tuple(number_spots(frame.sheet.pixel(start), frame.sheet.pixel(end), index, frame.count))
        said = f"step {leg.pivot.number} of {frame.subject.view.walks[index].rule}"
        number = str(leg.pivot.number)
        labels.append(Label(number, spot, "step", index, along=(start, end), longer=said, spots=spots))
    return labels


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


def stays(legs: list[Leg]) -> dict[Point, dict[str, list[int]]]:
    """The numbers of the pivots that move nothing on the paper, by the point where that is and by the reason."""
    found: dict[Point, dict[str, list[int]]] = {}
    for leg in legs:
        if not leg.moves:
            found.setdefault(leg.start, {}).setdefault(_reason(leg.pivot), []).append(leg.pivot.number)
    return found


def _reason(pivot: Pivot) -> str:
    if pivot.kind == "degenerate":
        return "no move"
    if pivot.point_before == pivot.point_after and pivot.kind == "step":
        return "only the Phase I auxiliary"
    return "unseen on these axes"


def _stays(frame: Frame, index: int, legs: list[Leg]) -> list[Label]:
    labels = []
    for point, numbers in stays(legs).items():
        rule = f"{frame.subject.view.walks[index].rule} " if frame.count > 1 else ""
        text = rule + "; ".join(f"{_spans(found)}: {words}" for words, found in numbers.items())
        if frame.sheet is None:
            labels.append(Label(text, point, "stay", index, target=point))
        else:
            spots = led(frame.sheet.pixel(point), text, "stay", 12.0, frame.sheet.pixel(frame.middle))
            labels.append(Label(text, point, "stay", index, target=point, spots=tuple(spots)))
    return labels


def _spans(numbers: list[int]) -> str:
    """Runs of numbers, short: 2, 4-6."""
    runs: list[list[int]] = []
    for number in numbers:
        if runs and number == runs[-1][1] + 1:
            runs[-1][1] = number
        else:
            runs.append([number, number])
    return ", ".join(str(a) if a == b else f"{a}–{b}" for a, b in runs)


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
