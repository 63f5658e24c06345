"""The static painter: a Scene as PNG, SVG or PDF through matplotlib, without a browser; same input, same bytes."""

from __future__ import annotations

import os
import tempfile
from pathlib import Path
from textwrap import wrap
from typing import Any

from polywalk.drawing.compose import scene
from polywalk.drawing.projection import laid_flat
from polywalk.drawing.scene import KeyPart, KeyRow, Label, Line, Mark, Polygon, Scene
from polywalk.drawing.theme import DEPTH, THEMES, Theme, mixed
from polywalk.drawing.view import View, viewed
from polywalk.drawing.window import PAPER
from polywalk.errors import DrawingError
from polywalk.model import Model
from polywalk.region import Region

KEY = 425.0
"""Width of the key in pixels."""

LEFT, BOTTOM, TOP = 64.0, 54.0, 84.0
"""Pixels around the picture for the axes' numbers and the title."""

LETTERS = 66
"""Letters a line of the key holds."""

ROW, PIXEL = 14.0, 1 / 96
"""Height of a line of the key in pixels; inches a pixel."""

ENDINGS = (".png", ".svg", ".pdf")
DASH = {"solid": "-", "dash": (0, (5, 3)), "dot": (0, (1.2, 2)), "dashdot": (0, (6, 2.5, 1.5, 2.5))}


def picture(source: Model | Region, path: str | os.PathLike[str], view: View | None = None, **changes: Any) -> Path:
    """Write a static picture of a region: PNG, SVG or PDF by the file's ending.

    Parameters
    ----------
    source : Model or Region
    path : str or path-like
        Ends in .png, .svg or .pdf; an existing file is replaced only when the picture is complete.
    view : View, optional
        Axes, walks, selection, camera, light, dark or grey.
    **changes
        Fields of View, for short: ``walks=[...]``, ``axes=("pump", "tank")``, ``mode="grey"``.

    Returns
    -------
    pathlib.Path
        The file that was written.

    Raises
    ------
    DrawingError
        Another ending, a folder that does not exist, or axes that do not fit the model.

    Examples
    --------
    >>> import tempfile, pathlib
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="x", constraints={"both": "x + y <= 3"}, bounds={"x": (0, 2), "y": (0, 2)})
    >>> with tempfile.TemporaryDirectory() as folder:
    ...     pw.picture(model, pathlib.Path(folder) / "region.svg").name
    'region.svg'
    """
    target = Path(path)
    if target.suffix.lower() not in ENDINGS:
        raise DrawingError(f"expected a file ending in {', '.join(ENDINGS)}, got {target.name!r}.", culprit=target)
    if not target.parent.is_dir():
        raise DrawingError(f"the folder {str(target.parent)!r} does not exist; create it first.", culprit=target)
    looked = viewed(view, changes)
    content = rendered(scene(source, looked), THEMES[looked.mode], target.suffix.lower()[1:])
    with tempfile.NamedTemporaryFile(dir=target.parent, suffix=target.suffix, delete=False) as file:
        file.write(content)
    os.chmod(file.name, 0o644)
    os.replace(file.name, target)
    return target


def rendered(drawn: Scene, theme: Theme, ending: str = "svg") -> bytes:
    """The bytes of a scene's picture; the same for the same scene."""
    from io import BytesIO

    import matplotlib as mpl
    from matplotlib.backends.backend_agg import FigureCanvasAgg
    from matplotlib.figure import Figure

    rows = _key_lines(drawn.key)
    height = max(PAPER[1] + BOTTOM + TOP, ROW * (len(rows) + 1) + TOP)
    width = LEFT + PAPER[0] + KEY + 34
    fixed: Any = {"svg.hashsalt": "polywalk", "svg.fonttype": "path", "pdf.fonttype": 42, "font.family": "DejaVu Sans"}
    with mpl.rc_context(fixed):
        figure = Figure(figsize=(width * PIXEL, height * PIXEL), facecolor=theme.paper)
        FigureCanvasAgg(figure)
        base = (height - TOP - PAPER[1]) / height
        axes = figure.add_axes((LEFT / width, base, PAPER[0] / width, PAPER[1] / height))
        _paint(axes, laid_flat(drawn) if drawn.solid else drawn, theme)
        _head(figure, drawn, theme, width, height)
        _key(figure, rows, theme, (LEFT + PAPER[0] + 28, width, height))
        out = BytesIO()
        stamp: dict[str, Any] = {"svg": {"Date": None}, "pdf": {"CreationDate": None}, "png": {"Software": None}}
        figure.savefig(out, format=ending, dpi=192, facecolor=theme.paper, metadata=stamp[ending])
    return out.getvalue()


def _points(pixels: float) -> float:
    return pixels * 0.75


def _head(figure: Any, drawn: Scene, theme: Theme, width: float, height: float) -> None:
    left = 18 / width
    text = {"ha": "left", "va": "top", "parse_math": False, "color": theme.text}
    figure.text(left, 1 - 12 / height, drawn.title, fontsize=_points(17), fontweight="bold", **text)
    for k, line in enumerate(drawn.subtitle.split("\n")):
        figure.text(left, 1 - (36 + 18 * k) / height, line, fontsize=_points(12.5), **text)


def _paint(axes: Any, drawn: Scene, theme: Theme) -> None:
    horizontal, vertical = drawn.axes
    axes.set_xlim(horizontal.low, horizontal.high)
    axes.set_ylim(vertical.low, vertical.high)
    axes.set_facecolor(theme.paper)
    _ticks(axes, drawn, theme)
    for polygon in drawn.polygons:
        _polygon(axes, polygon, theme)
    for line in drawn.lines:
        _line(axes, line, theme)
    for mark in drawn.marks:
        _mark(axes, mark, theme)
    for label in drawn.labels:
        _label(axes, label, theme)


def _ticks(axes: Any, drawn: Scene, theme: Theme) -> None:
    for side in axes.spines.values():
        side.set_color(theme.grid)
    axes.tick_params(colors=theme.quiet, labelsize=_points(10), length=3)
    for axis, data in ((axes.xaxis, drawn.axes[0]), (axes.yaxis, drawn.axes[1])):
        if not data.title:
            axis.set_visible(False)
        axis.set_label_text(data.title, fontsize=_points(12), color=theme.text, parse_math=False)
        axis.get_major_formatter().set_useOffset(False)
    if drawn.solid or not (drawn.axes[0].title or drawn.axes[1].title):
        axes.axis("off")


def _polygon(axes: Any, item: Polygon, theme: Theme) -> None:
    style = theme.style(item.role, item.index)
    axes.fill(
        [point[0] for point in item.points],
        [point[1] for point in item.points],
        facecolor=mixed(style.fill, theme.quiet, 0.24 * item.shade),
        alpha=style.opacity,
        edgecolor=style.colour if style.width else "none",
        linewidth=_points(style.width),
        linestyle=DASH[style.dash],
        zorder=DEPTH[item.role],
    )


def _line(axes: Any, item: Line, theme: Theme) -> None:
    style = theme.style(item.role, item.index)
    look = {"color": style.colour, "alpha": style.opacity, "zorder": DEPTH[item.role]}
    for part in item.parts:
        if not item.arrow:
            x, y = zip(*part, strict=True)
            width = _points(style.width)
            axes.plot(x, y, linestyle=DASH[style.dash], linewidth=width, solid_capstyle="butt", **look)
        else:
            arrow = {
                "arrowstyle": "-|>,head_width=0.26,head_length=0.55",
                "shrinkA": 0,
                "shrinkB": 5,
                "mutation_scale": 13,
            }
            arrow |= {"linewidth": _points(style.width), "linestyle": DASH[style.dash], **look}
            axes.annotate("", xy=part[-1], xytext=part[0], arrowprops=arrow, zorder=DEPTH[item.role])


SYMBOLS = {"circle": "o", "ring": "o", "diamond": "D", "square ring": "s"}


def _mark(axes: Any, item: Mark, theme: Theme) -> None:
    style = theme.style(item.role)
    hollow = not style.fill or (item.role == "vertex" and item.index == 1)
    axes.plot(
        item.point[0],
        item.point[1],
        SYMBOLS[style.symbol],
        markersize=_points(style.size * (0.8 if style.symbol == "diamond" else 1)),
        markerfacecolor=("none" if not style.fill else theme.paper) if hollow else style.fill,
        markeredgecolor=(style.fill or style.colour) if hollow else style.colour,
        markeredgewidth=_points(max(style.width, 1.2 if hollow else 1.0)),
        zorder=DEPTH[item.role],
    )


def _label(axes: Any, item: Label, theme: Theme) -> None:
    style = theme.style(item.role, item.index)
    if item.target:
        x, y = zip(item.point, item.target, strict=True)
        axes.plot(x, y, color=style.colour, linewidth=_points(0.9), zorder=DEPTH["note"])
    size = {"step": 10.0}.get(item.role, style.size)
    frame = None
    if item.role in {"step", "tag", "back tag", "stay"}:
        shape = "circle,pad=0.22" if item.role == "step" else "round,pad=0.22"
        frame = {
            "boxstyle": shape,
            "facecolor": theme.paper,
            "edgecolor": style.colour,
            "linewidth": 1.4 if item.role == "tag" else 0.8,
        }
        frame |= {"linestyle": "--" if item.role == "back tag" else "-", "alpha": 0.92}
    axes.text(
        item.point[0],
        item.point[1],
        item.text,
        fontsize=_points(size),
        color=theme.text if item.role == "tag" else style.colour,
        ha="center",
        va="center",
        rotation=item.angle,
        rotation_mode="anchor",
        bbox=frame,
        zorder=DEPTH[item.role],
        parse_math=False,
        fontweight="bold" if item.role in {"step", "point"} else "normal",
        clip_on=False,
    )


def _key_lines(parts: tuple[KeyPart, ...]) -> list[tuple[str, KeyRow | None, str]]:
    """The key broken into lines: (kind, row on its first line, text)."""
    lines: list[tuple[str, KeyRow | None, str]] = []
    for part in parts:
        lines.append(("heading", None, part.heading))
        for row in part.rows:
            words = wrap(row.text, LETTERS, subsequent_indent="") or [""]
            lines += [("row", row if k == 0 else None, text) for k, text in enumerate(words)]
        lines.append(("gap", None, ""))
    return lines


def _key(
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
            axes.text(0, top, text, fontsize=_points(11.5), fontweight="bold", color=theme.text, va="center")
        elif kind == "row":
            _sample(axes, row, theme, top)
            words = {"fontsize": _points(10.5), "color": theme.text, "va": "center", "parse_math": False}
            axes.text(36, top, text, **words)
        top -= ROW * (0.6 if kind == "gap" else 1.15 if kind == "heading" else 1.0)


def _sample(axes: Any, row: KeyRow | None, theme: Theme, top: float) -> None:
    """The look of a role, in small, at the start of its line of the key."""
    if row is None:
        return
    style = theme.style(row.role, row.index)
    if row.tag:
        axes.text(
            26, top, row.tag, fontsize=_points(10.5), fontweight="bold", color=theme.text, ha="right", va="center"
        )
        if row.role == "constraint":
            axes.plot((0, 10), (top, top), color=style.colour, linewidth=_points(3), linestyle=DASH[style.dash])
        return
    if row.role in {"optimum", "degenerate", "vertex"}:
        _mark(axes, Mark((14.0, top), row.role), theme)
    elif row.role in {"objective", "open edge", "walk"}:
        _line(axes, Line((((0.0, top), (30.0, top)),), row.role, row.index, arrow="end"), theme)
    elif row.role == "rest":
        axes.fill((4, 26, 26, 4), (top - 5, top - 5, top + 5, top + 5), facecolor=style.fill, edgecolor=style.colour)
    elif row.role == "hatch":
        for k in range(4):
            axes.plot((4 + 6 * k, 8 + 6 * k), (top + 1, top - 4), color=theme.text, linewidth=0.7)
        axes.plot((2, 28), (top + 1, top + 1), color=theme.text, linewidth=1.2)
    elif row.role in {"constraint", "level line"}:
        _line(axes, Line((((2.0, top), (26.0, top)),), row.role, row.index), theme)
