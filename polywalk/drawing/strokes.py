"""What matplotlib draws for each thing of a scene; every look comes from the theme."""

from __future__ import annotations

from math import hypot
from typing import Any

from polywalk.drawing.scene import Label, Line, Mark, Point, Polygon
from polywalk.drawing.theme import DEPTH, Theme, mixed
from polywalk.drawing.tiles import BOLD

DASH = {"solid": "-", "dash": (0, (5, 3)), "dot": (0, (1.2, 2)), "dashdot": (0, (6, 2.5, 1.5, 2.5))}
DASH |= {"longdash": (0, (8, 2)), "longdashdot": (0, (8, 2, 1.5, 2))}


SYMBOLS = {
    "circle": "o",
    "ring": "o",
    "diamond": "D",
    "diamond ring": "D",
    "square ring": "s",
    "square": "s",
    "cross": "x",
}

FILLS = {"cut off": "////", "added": ".."}
"""Patterns of areas that are not told by their colour."""


STANDOFF, HEAD = 5.0, 0.45
"""Printer's points between a straight arrow's tip and its target; the length of a head that its shaft stops short of,
as a share of the head's scale."""


DOT = 5.0
"""Pixels of the dot, in the colour of a line, at which the leader of its name ends."""


def points(pixels: float) -> float:
    """Pixels as the printer's points that matplotlib counts in."""
    return pixels * 0.75


def polygon(axes: Any, item: Polygon, theme: Theme) -> None:
    """Fill one polygon."""
    style = theme.style(item.role, item.index)
    axes.fill(
        [point[0] for point in item.points],
        [point[1] for point in item.points],
        facecolor=mixed(style.fill, theme.quiet, 0.24 * item.shade),
        alpha=style.opacity,
        edgecolor=style.colour if style.width else "none",
        linewidth=points(style.width),
        linestyle=DASH[style.dash],
        zorder=DEPTH[item.role],
    )
    if item.role in FILLS:
        look = {"facecolor": "none", "edgecolor": style.colour, "hatch": FILLS[item.role], "linewidth": 0.0}
        x, y = zip(*item.points, strict=True)
        axes.fill(x, y, alpha=0.6, zorder=DEPTH[item.role], **look)


def line(axes: Any, item: Line, theme: Theme) -> None:
    """Draw the parts of one line, with their heads; a head is whole where its shaft is dashed."""
    style = theme.style(item.role, item.index)
    look: dict[str, Any] = {"color": style.colour, "alpha": style.opacity, "zorder": DEPTH[item.role]}
    stroke = {"linestyle": DASH[style.dash], "linewidth": points(style.width), "solid_capstyle": "butt", **look}
    for part in filter(None, item.parts):
        ends = part if not item.arrow else (*part[:-1], _short_of(axes, part, STANDOFF if len(part) == 2 else 0.0))
        if item.arrow:
            size = 13 if style.width > 2 or len(part) == 2 else 9 if style.opacity > 0.5 else 6
            _head(axes, ends, size, {"linewidth": points(style.width), **look})
            ends = (*ends[:-1], _short_of(axes, ends, HEAD * size))
        axes.plot(*zip(*ends, strict=True), **stroke)


def _short_of(axes: Any, part: tuple[Point, ...], gap: float) -> Point:
    """The point so many of the printer's points before a line's end; its start where it is shorter."""
    (a, b), (c, d) = axes.transData.transform(part[-2:])
    length = hypot(c - a, d - b)
    share = min(gap * axes.figure.dpi / 72 / length, 1.0) if length else 0.0
    x, y = axes.transData.inverted().transform((c - share * (c - a), d - share * (d - b)))
    return (float(x), float(y))


def _head(axes: Any, part: tuple[Point, ...], size: float, look: dict[str, Any]) -> None:
    """An arrow's head alone, at the end of a line."""
    arrow = {"arrowstyle": "-|>,head_width=0.26,head_length=0.55", "mutation_scale": size, "shrinkA": 0, "shrinkB": 0}
    foot = _short_of(axes, part, 1.0)
    axes.annotate("", xy=part[-1], xytext=foot, arrowprops={**arrow, **look}, zorder=look["zorder"])


def mark(axes: Any, item: Mark, theme: Theme, shrink: float = 1.0) -> None:
    """Draw one mark, in the key a smaller one; a vertex at the back is hollow."""
    style = theme.style(item.role, item.index)
    hollow = not style.fill or (item.role == "vertex" and item.index == 1)
    axes.plot(
        item.point[0],
        item.point[1],
        SYMBOLS[style.symbol],
        markersize=points(style.size * shrink * (0.8 if style.symbol.startswith("diamond") else 1)),
        markerfacecolor=("none" if not style.fill else theme.paper) if hollow else style.fill,
        markeredgecolor=style.colour if not style.fill or not hollow else style.fill,
        markeredgewidth=points(max(style.width, 1.2 if hollow else 1.0)),
        zorder=DEPTH[item.role],
    )


def label(axes: Any, item: Label, theme: Theme) -> None:
    """Write one label, framed and joined to its point where its role asks for it."""
    style = theme.style(item.role, item.index)
    if item.target:
        x, y = zip(item.point, item.target, strict=True)
        axes.plot(x, y, color=style.colour, linewidth=points(0.9), zorder=DEPTH["note"])
        if item.names_border:
            colour = theme.style("constraint", item.index).colour
            axes.plot(*item.target, "o", color=colour, markersize=points(DOT), zorder=DEPTH["note"])
    size = {"step": 10.0}.get(item.role, style.size)
    frame = None
    if item.role in {"step", "tag", "back tag", "stay", "end", "ends", "target", "part"}:
        shape = "circle,pad=0.22" if item.role == "step" else "round,pad=0.22"
        frame = {
            "boxstyle": shape,
            "facecolor": theme.paper,
            "edgecolor": style.colour,
            "linewidth": 1.4 if item.role == "tag" else 0.8,
        }
        frame |= {"linestyle": "--" if item.role == "back tag" else "-", "alpha": 0.92}
    elif item.target or item.role == "culprit":  # a line to its point ends where the text begins; others pass below
        frame = {"boxstyle": "square,pad=0.15", "facecolor": theme.paper, "edgecolor": "none"}
    axes.text(
        item.point[0],
        item.point[1],
        item.text,
        fontsize=points(size),
        color=theme.text if item.role == "tag" else style.colour,
        ha="center",
        va="center",
        rotation=item.angle,
        rotation_mode="anchor",
        bbox=frame,
        zorder=DEPTH[item.role],
        parse_math=False,
        fontweight="bold" if item.role in BOLD else "normal",
        clip_on=False,
    )
