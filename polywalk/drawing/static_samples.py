"""The samples in the key of a static picture: the look of each role, in small."""

from __future__ import annotations

from typing import Any

from polywalk.drawing.scene import KeyRow, Line, Mark, Polygon
from polywalk.drawing.strokes import DASH, line, mark, points, polygon
from polywalk.drawing.theme import Theme

MARKS = {"optimum", "vertex", "moved", "stayed", "breakpoint", "now", "lost", "gained"}
"""Roles shown as they are."""

SMALLER = {"basis": 0.34, "optimal basis": 0.34, "first basis": 0.24, "start": 0.75}
SMALLER |= {"degenerate": 0.6, "old optimum": 0.75}
"""Roles shown smaller, by how much."""

ARROWS = {"objective", "open edge", "pivot", "faint pivot", "exit", "faint exit", "other exit"}

LINES = {"constraint", "conflict line", "level line", "hidden edge", "short", "exchange", "phase 1"}
LINES |= {"old edge", "new edge", "old border", "walk", "curve"}  # a walk without a head, so that its dash is seen

AREAS = {"region", "facet", "cut off", "added", "rest", "beyond"}


def sample(axes: Any, row: KeyRow | None, theme: Theme, top: float) -> None:
    """The look of a role, in small, at the start of its line of the key."""
    if row is None:
        return
    if row.tag:
        _tagged(axes, row, theme, top)
    elif row.role in MARKS:
        mark(axes, Mark((14.0, top), row.role), theme)
    elif row.role in SMALLER:
        mark(axes, Mark((14.0, top), row.role), theme, shrink=SMALLER[row.role])
    elif row.role in ARROWS:
        line(axes, Line((((0.0, top), (30.0, top)),), row.role, row.index, arrow="end"), theme)
    elif row.role in AREAS:
        _area(axes, row, theme, top)
    elif row.role == "hatch":
        for k in range(4):
            axes.plot((4 + 6 * k, 8 + 6 * k), (top + 1, top - 4), color=theme.text, linewidth=0.7)
        axes.plot((2, 28), (top + 1, top + 1), color=theme.text, linewidth=1.2)
    elif row.role in LINES:
        ends = (0.0, 33.0) if row.role in {"walk", "curve"} else (2.0, 26.0)
        line(axes, Line((((ends[0], top), (ends[1], top)),), row.role, row.index), theme)


def _tagged(axes: Any, row: KeyRow, theme: Theme, top: float) -> None:
    style = theme.style(row.role, row.index)
    axes.text(26, top, row.tag, fontsize=points(10.5), fontweight="bold", color=theme.text, ha="right", va="center")
    if row.role in {"constraint", "conflict line", "old border"}:
        axes.plot((0, 10), (top, top), color=style.colour, linewidth=points(3), linestyle=DASH[style.dash])


def _area(axes: Any, row: KeyRow, theme: Theme, top: float) -> None:
    style = theme.style(row.role, row.index)
    if row.role in {"rest", "beyond"}:
        corners = (4, 26, 26, 4), (top - 5, top - 5, top + 5, top + 5)
        alpha = 1.0 if row.role == "rest" else style.opacity
        axes.fill(*corners, facecolor=style.fill, edgecolor=style.colour, alpha=alpha)
    else:
        border = ((4.0, top - 5), (26.0, top - 5), (26.0, top + 5), (4.0, top + 5))
        polygon(axes, Polygon(border, row.role, row.index), theme)
