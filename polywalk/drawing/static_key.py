"""The head and the key of a static picture: where every line of them stands, and the key's samples."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from polywalk.drawing.formats import BOTTOM, MARGIN, Format
from polywalk.drawing.letters import lines_of
from polywalk.drawing.scene import KeyPart, KeyRow, Scene
from polywalk.drawing.static_samples import sample
from polywalk.drawing.strokes import points
from polywalk.drawing.theme import Theme

ROW, INDENT = 14.0, 36.0
"""Height of a line of the key, and the room for its samples, in pixels."""

LETTER, HEADING = 10.5, 11.5
"""Size of the key's letters and of those of its headings."""

STEP = {"heading": 1.15, "row": 1.0, "gap": 0.6}
"""Height of the key's kinds of line, in rows."""


@dataclass(frozen=True)
class HeadLine:
    """One line above the drawing: its words, and how many pixels below the picture's upper border it starts."""

    words: str
    top: float
    size: float
    bold: bool


@dataclass(frozen=True)
class KeyLine:
    """One line of the key: its kind, the row whose sample it shows (on a row's first line), its words."""

    kind: str
    row: KeyRow | None
    words: str


@dataclass(frozen=True)
class Plan:
    """Where the head, the drawing and the key of a picture stand; in pixels.

    ``bottom`` is below the drawing, ``key_top`` above the key.
    """

    height: float
    paper: tuple[float, float]
    bottom: float
    head: tuple[HeadLine, ...]
    key: tuple[KeyLine, ...]
    key_top: float


def planned(drawn: Scene, form: Format) -> Plan:
    """The plan of a scene's picture."""
    paper = (float(drawn.paper[0]), float(drawn.paper[1]))
    below = BOTTOM if drawn.axes[0].title else 8.0  # room for the numbers of an axis, where there is one
    if form.key == "none":
        return Plan(paper[1] + below + 8, paper, below, (), (), 0.0)
    if form.height is not None:
        return _fixed(drawn, form, form.height)
    head = tuple(_head(drawn, form.width - 2 * MARGIN, most=40))
    top = max(head[-1].top + 30, 84.0 if form.key == "beside" else 0.0)
    key_top = top - 4 if form.key == "beside" else top + paper[1] + below
    lines = key_lines(drawn.key, form.key_width)
    height = max(top + paper[1] + below, key_top + ROW * (sum(STEP[item.kind] for item in lines) + 1))
    return Plan(height, paper, height - top - paper[1], head, tuple(lines), key_top)


def _fixed(drawn: Scene, form: Format, height: float) -> Plan:
    """The plan of a picture of one height: the key beside head and drawing, what may be left out of it last."""
    head = tuple(_head(drawn, form.key_left - 2 * MARGIN, most=3))
    top = max(head[-1].top + 30, 84.0)
    paper = (float(drawn.paper[0]), min(float(drawn.paper[1]), height - top - BOTTOM))
    parts = sorted(drawn.key, key=lambda part: part.heading.startswith("Vertices"))
    lines = _cut(key_lines(tuple(parts), form.key_width), height - 2 * MARGIN)
    return Plan(height, paper, height - top - paper[1], head, lines, MARGIN + 4)


def _head(drawn: Scene, room: float, most: int) -> list[HeadLine]:
    """Title and subtitle, broken into lines; past the most lines a paragraph may have, it ends in an ellipsis."""
    found, top = list[HeadLine](), 12.0
    for k, words in enumerate((drawn.title, *drawn.subtitle.split("\n"))):
        size, bold, step = (17.0, True, 24.0) if k == 0 else (12.5, False, 18.0)
        lines = lines_of(words, size, room, bold)
        if len(lines) > most:
            lines = [*lines[: most - 1], f"{lines[most - 1][:-2]}…"]
        for text in lines:
            found.append(HeadLine(text, top, size, bold))
            top += step
    return found


def key_lines(parts: tuple[KeyPart, ...], room: float) -> list[KeyLine]:
    """The key broken into lines."""
    lines: list[KeyLine] = []
    for part in parts:
        lines += [KeyLine("heading", None, text) for text in lines_of(part.heading, HEADING, room, bold=True)]
        for row in part.rows:
            words = lines_of(row.text, LETTER, room - INDENT)
            lines += [KeyLine("row", row if k == 0 else None, text) for k, text in enumerate(words)]
        lines.append(KeyLine("gap", None, ""))
    return lines


def _cut(lines: list[KeyLine], room: float) -> tuple[KeyLine, ...]:
    """As many lines as there is room for; the last one tells how many rows are left out, and where they are."""
    if ROW * sum(STEP[item.kind] for item in lines) <= room:
        return tuple(lines)
    kept, used = list[KeyLine](), 2.0
    for item in lines:
        used += STEP[item.kind]
        if ROW * used > room:
            break
        kept.append(item)
    left = sum(item.row is not None for item in lines[len(kept) :])
    return (*kept, KeyLine("row", None, f'and {left} more rows, which size="page" has room for'))


def paint_key(figure: Any, plan: Plan, theme: Theme, form: Format) -> None:
    """Write the key's lines with their samples."""
    axes = figure.add_axes((form.key_left / form.width, 0, form.key_width / form.width, 1))
    axes.set_xlim(0, form.key_width)
    axes.set_ylim(0, plan.height)
    axes.axis("off")
    top = plan.height - plan.key_top
    for item in plan.key:
        words: Any = {"color": theme.text, "va": "center", "parse_math": False}
        if item.kind == "heading":
            axes.text(0, top, item.words, fontsize=points(HEADING), fontweight="bold", **words)
        elif item.kind == "row":
            sample(axes, item.row, theme, top)
            axes.text(INDENT, top, item.words, fontsize=points(LETTER), **words)
        top -= ROW * STEP[item.kind]
