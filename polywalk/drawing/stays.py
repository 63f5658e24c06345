"""The pivots of walks that move nothing on the paper: counted at their vertex, with the reason."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import Label, Point
from polywalk.drawing.settling import led
from polywalk.drawing.subject import Subject
from polywalk.drawing.window import Window
from polywalk.walks import Pivot


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


def stays(frame: Frame, walks: Sequence[Sequence[Leg]]) -> list[Label]:
    """One label for each point and each set of pivots that stay there; walks that agree share it."""
    found: dict[tuple[Point, str], list[int]] = {}
    for index, legs in enumerate(walks):
        for point, numbers in _counted(legs).items():
            text = "; ".join(f"{_spans(ones)}: {words}" for words, ones in numbers.items())
            found.setdefault((point, text), []).append(index)
    return [_label(frame, point, f"{_who(frame, which)}{text}", which[0]) for (point, text), which in found.items()]


def _counted(legs: Sequence[Leg]) -> dict[Point, dict[str, list[int]]]:
    """The numbers of the pivots that move nothing, by the point where that is and by the reason."""
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


def _who(frame: Frame, which: Sequence[int]) -> str:
    """Which walks stay, where there are several."""
    if frame.count == 1:
        return ""
    if len(which) == frame.count:
        return "both walks " if frame.count == 2 else "all walks "
    return f"{', '.join(frame.subject.view.walks[index].rule for index in which)} "


def _label(frame: Frame, point: Point, text: str, index: int) -> Label:
    if frame.sheet is None:
        return Label(text, point, "stay", index, target=point)
    spots = led(frame.sheet.pixel(point), text, "stay", 12.0, frame.sheet.pixel(frame.middle))
    return Label(text, point, "stay", index, target=point, spots=tuple(spots))


def _spans(numbers: list[int]) -> str:
    """Runs of numbers, short: 2, 4–6."""
    runs: list[list[int]] = []
    for number in numbers:
        if runs and number == runs[-1][1] + 1:
            runs[-1][1] = number
        else:
            runs.append([number, number])
    return ", ".join(str(a) if a == b else f"{a}–{b}" for a, b in runs)
