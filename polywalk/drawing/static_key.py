"""The key of a static picture: samples and words in a column beside it."""

from __future__ import annotations

from textwrap import wrap
from typing import Any

from polywalk.drawing.scene import KeyPart, KeyRow, Line, Mark
from polywalk.drawing.strokes import DASH, line, mark, points
from polywalk.drawing.theme import Theme

KEY = 425.0
"""Width of the key in pixels."""

LETTERS = 66
"""Letters a line of the key holds."""

ROW, TOP = 14.0, 84.0
"""Height of a line of the key, and of the title above it, in pixels."""


def key_lines(parts: tuple[KeyPart, ...]) -> list[tuple[str, KeyRow | None, str]]:
    """The key broken into lines: (kind, row on its first line, text)."""
    lines: list[tuple[str, KeyRow | None, str]] = []
    for part in parts:
        lines.append(("heading", None, part.heading))
        for row in part.rows:
            words = wrap(row.text, LETTERS, subsequent_indent="") or [""]
            lines += [("row", row if k == 0 else None, text) for k, text in enumerate(words)]
        lines.append(("gap", None, ""))
    return lines


def paint_key(
    figure: Any, rows: list[tuple[str, KeyRow | None, str]], theme: Theme, place: tuple[float, float, float]
) -> None:
    left, width, height = place
    axes = figure.add_axes((left / width, 0, KEY / width, 1))
    axes.set_xlim(0, KEY)
    axes.set_ylim(0, height)
    axes.axis("off")
    top = height - TOP + 4
    for kind, row, text in rows:
        if kind == "heading":
            axes.text(0, top, text, fontsize=points(11.5), fontweight="bold", color=theme.text, va="center")
        elif kind == "row":
            _sample(axes, row, theme, top)
            words = {"fontsize": points(10.5), "color": theme.text, "va": "center", "parse_math": False}
            axes.text(36, top, text, **words)
        top -= ROW * (0.6 if kind == "gap" else 1.15 if kind == "heading" else 1.0)


def _sample(axes: Any, row: KeyRow | None, theme: Theme, top: float) -> None:
    """The look of a role, in small, at the start of its line of the key."""
    if row is None:
        return
    style = theme.style(row.role, row.index)
    if row.tag:
        axes.text(26, top, row.tag, fontsize=points(10.5), fontweight="bold", color=theme.text, ha="right", va="center")
        if row.role in {"constraint", "conflict line"}:
            axes.plot((0, 10), (top, top), color=style.colour, linewidth=points(3), linestyle=DASH[style.dash])
        return
    if row.role in {"optimum", "degenerate", "vertex", "moved", "stayed", "breakpoint", "now"}:
        mark(axes, Mark((14.0, top), row.role), theme)
    elif row.role in {"basis", "optimal basis", "first basis"}:
        mark(axes, Mark((14.0, top), row.role), theme, shrink=0.24 if row.role == "first basis" else 0.34)
    elif row.role in {"objective", "open edge", "pivot", "faint pivot", "exit", "faint exit", "other exit"}:
        line(axes, Line((((0.0, top), (30.0, top)),), row.role, row.index, arrow="end"), theme)
    elif row.role in {"rest", "beyond"}:
        corners = (4, 26, 26, 4), (top - 5, top - 5, top + 5, top + 5)
        alpha = 1.0 if row.role == "rest" else style.opacity
        axes.fill(*corners, facecolor=style.fill, edgecolor=style.colour, alpha=alpha)
    elif row.role == "hatch":
        for k in range(4):
            axes.plot((4 + 6 * k, 8 + 6 * k), (top + 1, top - 4), color=theme.text, linewidth=0.7)
        axes.plot((2, 28), (top + 1, top + 1), color=theme.text, linewidth=1.2)
    elif row.role == "start":
        mark(axes, Mark((14.0, top), row.role), theme, shrink=0.75)
    elif row.role in {"walk", "curve"}:  # without a head, so that its dash is seen
        line(axes, Line((((0.0, top), (33.0, top)),), row.role, row.index), theme)
    elif row.role in {"constraint", "conflict line", "level line", "hidden edge", "short", "exchange", "phase 1"}:
        line(axes, Line((((2.0, top), (26.0, top)),), row.role, row.index), theme)
