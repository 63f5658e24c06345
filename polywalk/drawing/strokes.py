"""What matplotlib draws for each thing of a scene; every look comes from the theme."""

from __future__ import annotations

from typing import Any

from polywalk.drawing.scene import Label, Line, Mark, Point, Polygon
from polywalk.drawing.theme import DEPTH, Style, Theme, mixed

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
    """Draw the parts of one line, with their heads."""
    style = theme.style(item.role, item.index)
    look = {"color": style.colour, "alpha": style.opacity, "zorder": DEPTH[item.role]}
    for part in filter(None, item.parts):
        if item.arrow and len(part) > 2:
            _bent(axes, part, style, look)
        elif not item.arrow:
            x, y = zip(*part, strict=True)
            width = points(style.width)
            axes.plot(x, y, linestyle=DASH[style.dash], linewidth=width, solid_capstyle="butt", **look)
        else:
            arrow = {
                "arrowstyle": "-|>,head_width=0.26,head_length=0.55",
                "shrinkA": 0,
                "shrinkB": 5,
                "mutation_scale": 13,
            }
            arrow |= {"linewidth": points(style.width), "linestyle": DASH[style.dash], **look}
            axes.annotate("", xy=part[-1], xytext=part[0], arrowprops=arrow, zorder=DEPTH[item.role])


def _bent(axes: Any, part: tuple[Point, ...], style: Style, look: dict[str, Any]) -> None:
    """An arrow along a bent line, its head as large as its stroke asks for."""
    x, y = zip(*part, strict=True)
    axes.plot(x[:-1], y[:-1], linestyle=DASH[style.dash], linewidth=points(style.width), **look)
    head: dict[str, Any] = {"arrowstyle": "-|>,head_width=0.26,head_length=0.55"}
    head |= {
        "mutation_scale": 13 if style.width > 2 else 9,
        "linewidth": points(style.width),
        "shrinkA": 0,
        "shrinkB": 0,
        **look,
    }
    axes.annotate("", xy=part[-1], xytext=part[-2], arrowprops=head, zorder=look["zorder"])


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
    elif item.target:  # the line to its point ends where the text begins
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
        fontweight="bold" if item.role in {"step", "point", "target"} else "normal",
        clip_on=False,
    )
