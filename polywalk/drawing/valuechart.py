"""The optimal value against one right-hand side or cost: its pieces, breakpoints, ends, and where the model stands."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from itertools import pairwise

from polywalk.drawing.numbers import brief
from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import PAPER, Axis, KeyPart, KeyRow, Label, Line, Mark, Point, Polygon, Scene
from polywalk.drawing.window import Window
from polywalk.reviewing import ValueFunction
from polywalk.reviewing.extended import told
from polywalk.reviewing.pieces import Piece

EDGE = (40.0, 46.0)
"""Free pixels beside and above the curve, where its labels stand."""

OPEN = 0.35
"""How far a piece without end is followed, as a share of what is drawn of the rest."""

MOST_LABELS = 12
"""Past this many breakpoints their labels would cover each other; the key lists them all."""


def value_chart(found: ValueFunction) -> Scene:
    """The chart of a value function as plain data.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.drawing.valuechart import value_chart
    >>> drawn = value_chart(pw.value_function(pw.scenarios.harbour_row(), rhs="quay pipe"))
    >>> [mark.hover for mark in drawn.marks if mark.role == "now"]
    ['now 8: optimal value 292']
    """
    window = _window(found)
    sheet = Sheet(window)
    lines = tuple(_curve(found, window))
    for line in lines:
        sheet.lines += [(sheet.pixel(a), sheet.pixel(b)) for part in line.parts for a, b in pairwise(part)]
    marks = tuple(_marks(found))
    for mark in marks:
        sheet.keep_clear(mark.point, 9.0)
    polygons, words = _beyond(found, sheet)
    title = f"Optimal value by {found.kind}{f': {found.model.name}' if found.model.name else ''}"
    unit = found.model.unit(found.name)
    measure = (f" (per {unit})" if found.kind == "cost" else f" ({unit})") if unit else ""
    across = f"{found.kind} of {found.name}{measure}"
    upward = "optimal value" if found.corners else ""
    return Scene(
        axes=(Axis(across, window.low[0], window.high[0]), Axis(upward, window.low[1], window.high[1])),
        scale=window.scale,
        title=title,
        subtitle=_subtitle(found),
        polygons=polygons,
        lines=lines,
        marks=marks,
        labels=(*words, *_labels(found, marks, sheet), *_slopes(found, sheet)),
        key=_key(found),
    )


def _spots(found: ValueFunction) -> list[tuple[Fraction, Fraction]]:
    """Every corner, and where the model stands if it has an optimum."""
    spots = set(found.corners)
    now = found.at(found.current)
    if now is not None:
        spots.add((found.current, now))
    return sorted(spots)


def _window(found: ValueFunction) -> Window:
    """All corners and the present value, room for open pieces, and room for labels."""
    places = [t for t, _ in _spots(found)] + [found.current]
    low, high = float(min(places)), float(max(places))
    size = (high - low) or abs(high) or 1.0
    if not isinstance(found.low, Fraction):
        low -= OPEN * size
    if not isinstance(found.high, Fraction):
        high += OPEN * size
    ends = [(low, found.pieces[0]), (high, found.pieces[-1])] if found.pieces else []
    heights = [float(value) for _, value in _spots(found)]
    heights += [float(piece.intercept) + float(piece.slope) * t for t, piece in ends if _on(piece, t)]
    bottom, top = min(heights, default=0.0), max(heights, default=0.0)
    tall = (top - bottom) or abs(top) or 1.0
    wide = high - low or size
    across, up = (room / (pixels - 2 * room) for room, pixels in zip(EDGE, PAPER, strict=True))
    return Window((low - across * wide, bottom - up * tall), (high + across * wide, top + up * tall))


def _on(piece: Piece, t: float) -> bool:
    return float(piece.low) <= t <= float(piece.high)


def _height(piece: Piece, t: float) -> float:
    return float(piece.intercept) + float(piece.slope) * t


def _span(piece: Piece, window: Window) -> tuple[float, float]:
    """Where a piece begins and ends in the picture; an open one stops a little before the frame."""
    short_of = 0.02 * window.extent[0]
    left = float(piece.low) if isinstance(piece.low, Fraction) else window.low[0] + short_of
    right = float(piece.high) if isinstance(piece.high, Fraction) else window.high[0] - short_of
    return left, right


def _curve(found: ValueFunction, window: Window) -> Iterator[Line]:
    """The curve, arrows where it goes on for ever, and a thin line up to where the model stands."""
    spots: list[Point] = [(float(t), float(value)) for t, value in found.corners]
    arrows = []
    for piece in found.pieces:
        left, right = ((t, _height(piece, t)) for t in _span(piece, window))
        middle = ((left[0] + right[0]) / 2, (left[1] + right[1]) / 2)
        if not isinstance(piece.low, Fraction):
            arrows.append((right if isinstance(piece.high, Fraction) else middle, left))
        if not isinstance(piece.high, Fraction):
            arrows.append((left if isinstance(piece.low, Fraction) else middle, right))
    if found.pieces:
        yield Line((tuple(spots),) if len(spots) > 1 else (), "curve", name="optimal value")
    for arrow in arrows:
        yield Line((arrow,), "onward", arrow="end")
    now, value = float(found.current), found.at(found.current)
    top = window.high[1] if value is None else float(value)
    yield Line((((now, window.low[1]), (now, top)),), "level line", name=f"now {brief(found.current)}")


def _marks(found: ValueFunction) -> Iterator[Mark]:
    now = found.at(found.current)
    for t, value in found.corners:
        yield Mark((float(t), float(value)), "breakpoint", hover=f"at {brief(t)} the optimal value is {brief(value)}")
    if now is not None:
        place = (float(found.current), float(now))
        yield Mark(place, "now", hover=f"now {brief(found.current)}: optimal value {brief(now)}")


def _labels(found: ValueFunction, marks: tuple[Mark, ...], sheet: Sheet) -> Iterator[Label]:
    """(parameter, value) at the breakpoints, and at the present value."""
    spots = (
        _spots(found)
        if len(found.corners) <= MOST_LABELS
        else [spot for spot in _spots(found) if spot[0] == found.current]
    )
    for t, value in spots:
        text = f"({brief(t)}, {brief(value)})"
        x, y = sheet.pixel((float(t), float(value)))
        half = 3.6 * len(text)
        ring = [(x, y + 18), (x, y - 18), (x - half - 14, y), (x + half + 14, y)]
        ring += [(x + side * (half + 6), y + up * 16) for side in (-1, 1) for up in (-1, 1)]
        yield sheet.place(text, ring, "point")


def _slopes(found: ValueFunction, sheet: Sheet) -> Iterator[Label]:
    """The slope beside each piece that is long enough on paper to carry it."""
    for piece in found.pieces:
        left, right = _span(piece, sheet.window)
        (x, y), (u, v) = sheet.pixel((left, _height(piece, left))), sheet.pixel((right, _height(piece, right)))
        text = f"slope {brief(piece.slope)}"
        if ((u - x) ** 2 + (v - y) ** 2) ** 0.5 < 6.5 * len(text) or len(found.pieces) > MOST_LABELS:
            continue
        middle = [(x + share * (u - x), y + share * (v - y)) for share in (0.5, 0.35, 0.65)]
        away = 3.6 * len(text) + 8
        places = [
            (a + dx, b + dy) for a, b in middle for dx, dy in ((0, 16), (0, -16), (away, -8), (-away, 8), (away, 8))
        ]
        yield sheet.place(text, places, "note")


def _beyond(found: ValueFunction, sheet: Sheet) -> tuple[tuple[Polygon, ...], tuple[Label, ...]]:
    """Grey where there is no optimum, with the reason upright in it."""
    (left, bottom), (right, top) = sheet.window.low, sheet.window.high
    sides = []
    if found.outcome != "optimal":
        sides.append((left, right))
    if isinstance(found.low, Fraction):
        sides.append((left, float(found.low)))
    if isinstance(found.high, Fraction):
        sides.append((float(found.high), right))
    polygons, labels = [], []
    for start, end in sides:
        corners = ((start, bottom), (end, bottom), (end, top), (start, top))
        polygons.append(Polygon(corners, "beyond", name=_word(found)))
        share = 0.5 if found.outcome == "optimal" else 0.25  # clear of the line where the model stands
        middle = sheet.pixel((start + share * (end - start), (bottom + top) / 2))
        labels.append(Label(_word(found), sheet.unpixel(middle), "note", angle=90.0))
    return tuple(polygons), tuple(labels)


def _word(found: ValueFunction) -> str:
    return found.beyond if found.outcome == "optimal" else found.outcome


def _subtitle(found: ValueFunction) -> str:
    goal = found.model.objective
    aim = goal.text(found.model.variables) if goal else "no objective"
    if found.outcome != "optimal":
        return f"{aim}\n{found.table().title}"
    now, slopes = found.at(found.current), found.slopes(found.current)
    if now is None or slopes is None:
        return f"{aim}\nnow {brief(found.current)}: {found.beyond}"
    left, right = (told(slope) for slope in slopes)
    slope = f"slope {left}" if left == right else f"slope {left} to the left, {right} to the right"
    return f"{aim}\nnow {brief(found.current)}: optimal value {brief(now)}, {slope}"


def _key(found: ValueFunction) -> tuple[KeyPart, ...]:
    meaning = (
        "the shadow price of the constraint" if found.kind == "right-hand side" else f"the best value of {found.name}"
    )
    rows = [KeyRow("curve", f"optimal value; its slope is {meaning}")] if found.pieces else []
    if found.at(found.current) is not None:
        rows.append(KeyRow("now", f"the model as it is: {found.kind} {brief(found.current)}"))
    if found.corners:
        rows.append(KeyRow("breakpoint", "where the slope changes, or the curve ends"))
    if any(isinstance(end, Fraction) for end in (found.low, found.high)) or found.outcome != "optimal":
        rows.append(KeyRow("beyond", f"no optimum: the model is {_word(found)}"))
    table = found.table()
    pieces = [
        KeyRow("none", f"from {told(piece.low)} to {told(piece.high)}: slope {brief(piece.slope)}")
        for piece in found.pieces
    ]
    corners = [KeyRow("none", f"({brief(t)}, {brief(value)})") for t, value in found.corners]
    parts = (
        KeyPart("What the marks say", tuple(rows)),
        KeyPart("Pieces", tuple(pieces)),
        KeyPart("Breakpoints and ends", tuple(corners)),
    )
    return tuple(part for part in parts if part.rows) or (KeyPart(table.title, ()),)
