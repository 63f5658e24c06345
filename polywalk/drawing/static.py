"""The static painter: a Scene as PNG, SVG or PDF through matplotlib, without a browser; same input, same bytes."""

from __future__ import annotations

import os
import re
import warnings
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from polywalk.drawing.compose import Source, scene
from polywalk.drawing.formats import FORMATS, MARGIN, Format, Size
from polywalk.drawing.letters import width
from polywalk.drawing.projection import laid_flat
from polywalk.drawing.scales import TICK, placed, scale
from polywalk.drawing.scene import Axis, Scene
from polywalk.drawing.static_key import paint_key, planned
from polywalk.drawing.strokes import label, line, mark, points, polygon
from polywalk.drawing.theme import THEMES, Theme
from polywalk.drawing.view import View, viewed
from polywalk.drawing.writing import target_of, write

PIXEL = 1 / 96
"""Inches a pixel."""

TITLE, AROUND = 12.0, 36.0
"""Size of an axis's title, and the pixels beside the drawing that the title and the gaps around it take."""


@dataclass(frozen=True, repr=False)
class Picture:
    """A finished static picture: it shows itself in a notebook, and is a file where a path was given.

    Parameters
    ----------
    data : bytes
        The PNG, SVG or PDF.
    ending : {"png", "svg", "pdf"}
    path : pathlib.Path or None
        The file it was written to.

    Examples
    --------
    >>> import polywalk as pw
    >>> pw.picture(pw.scenarios.harbour_row("two decisions")).data[:5]
    b'<?xml'
    """

    data: bytes
    ending: str
    path: Path | None = None

    def __repr__(self) -> str:
        return f"picture of a region ({self.ending}{f', {self.path.name}' if self.path else ''})"

    def _repr_svg_(self) -> str | None:
        return self.data.decode() if self.ending == "svg" else None

    def _repr_png_(self) -> bytes | None:
        return self.data if self.ending == "png" else None


def picture(
    source: Source, path: str | os.PathLike[str] | None = None, view: View | None = None, **changes: Any
) -> Picture:
    """Paint a static picture of a region with its key: SVG, PNG or PDF, without a browser.

    Parameters
    ----------
    source : Model, Region, Bases, Comparison, Walk or sequence of Walk, ValueFunction
    path : str or path-like, optional
        Ends in .png, .svg or .pdf; an existing file is replaced only when the picture is complete. Without a path
        the picture is an SVG that only shows itself, with its letters as text, which keeps notebooks small.
    view : View, optional
        Axes, walks, selection, camera, light, dark or grey, and the size: "page", "slide", "column" or "bare".
    **changes
        Fields of View, for short: ``walks=[...]``, ``axes=("pump", "tank")``, ``mode="grey"``, ``size="slide"``.

    Returns
    -------
    Picture
        The same bytes for the same input.

    Raises
    ------
    DrawingError
        Another ending, a folder that does not exist or may not be written, or a view as for `draw`.
    UnknownName, DuplicateName
        An axis that is no variable, or given twice.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import tempfile, pathlib
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="x", constraints={"both": "x + y <= 3"}, bounds={"x": (0, 2), "y": (0, 2)})
    >>> with tempfile.TemporaryDirectory() as folder:
    ...     pw.picture(model, pathlib.Path(folder) / "region.pdf")
    picture of a region (pdf, region.pdf)

    References
    ----------
    Okabe & Ito, Color Universal Design, 2008 (the colours; the drawing is our own).
    """
    target = None if path is None else target_of(Path(path))
    ending = target.suffix.lower()[1:] if target else "svg"
    looked = viewed(view, changes)
    data = rendered(scene(source, looked), THEMES[looked.mode], ending, outlines=target is not None, size=looked.size)
    if target is not None:
        write(target, data)
    return Picture(data, ending, target)


def rendered(drawn: Scene, theme: Theme, ending: str = "svg", *, outlines: bool = True, size: Size = "page") -> bytes:
    """The bytes of a scene's picture; the same for the same scene.

    An SVG holds its letters as outlines, so that it looks alike everywhere; without them it is a third as large, and
    takes the reader's sans-serif font where DejaVu Sans is missing.
    """
    from io import BytesIO

    import matplotlib as mpl

    fixed: Any = {
        "svg.hashsalt": "polywalk",
        "svg.fonttype": "path" if outlines else "none",
        "pdf.fonttype": 42,
        "font.family": "DejaVu Sans",
    }
    with mpl.rc_context(fixed), warnings.catch_warnings():
        warnings.filterwarnings("ignore", "Glyph .* missing")  # an emoji in a name becomes a box, nothing worse
        figure, form = painted_figure(drawn, theme, size)
        out = BytesIO()
        stamp: dict[str, Any] = {"svg": {"Date": None}, "pdf": {"CreationDate": None}, "png": {"Software": None}}
        figure.savefig(out, format=ending, dpi=192 * form.zoom, facecolor=theme.paper, metadata=stamp[ending])
    return _resized(out.getvalue(), form.zoom) if ending == "svg" and form.zoom != 1 else out.getvalue()


def painted_figure(drawn: Scene, theme: Theme, size: Size) -> tuple[Any, Format]:
    """A scene with its head and its key as a matplotlib figure, and the format that has room for its numbers."""
    from matplotlib.backends.backend_agg import FigureCanvasAgg
    from matplotlib.figure import Figure

    flat = laid_flat(drawn) if drawn.solid else drawn
    form = FORMATS[size].fitted(_beside(flat))
    plan = planned(flat, form)
    figure = Figure(figsize=(form.width * PIXEL, plan.height * PIXEL), facecolor=theme.paper)
    FigureCanvasAgg(figure)
    left, bottom = form.left / form.width, plan.bottom / plan.height
    axes = figure.add_axes((left, bottom, plan.paper[0] / form.width, plan.paper[1] / plan.height))
    _paint(axes, flat, theme)
    for text in plan.head:
        look: Any = {"fontsize": points(text.size), "fontweight": "bold" if text.bold else "normal"}
        look |= {"ha": "left", "va": "top", "parse_math": False, "color": theme.text}
        figure.text(MARGIN / form.width, 1 - text.top / plan.height, text.words, **look)
    if plan.key:
        paint_key(figure, plan, theme, form)
    return figure, form


def _resized(data: bytes, zoom: float) -> bytes:
    """An SVG whose stated width and height are another; what is drawn scales with them."""

    def larger(found: re.Match[bytes]) -> bytes:
        return b'%b="%.6gpx"' % (found[1], float(found[2]) / 0.75 * zoom)

    return re.sub(rb'(width|height)="([0-9.]+)pt"', larger, data, count=2)


def _paint(axes: Any, drawn: Scene, theme: Theme) -> None:
    horizontal, vertical = drawn.axes
    axes.set_xlim(horizontal.low, horizontal.high)
    axes.set_ylim(vertical.low, vertical.high)
    axes.set_facecolor(theme.paper)
    _ticks(axes, drawn, theme)
    for area in drawn.polygons:
        polygon(axes, area, theme)
    for stroke in drawn.lines:
        line(axes, stroke, theme)
    for place in drawn.marks:
        mark(axes, place, theme)
    for text in drawn.labels:
        label(axes, text, theme)


def _ticks(axes: Any, drawn: Scene, theme: Theme) -> None:
    for side in axes.spines.values():
        side.set_color(theme.grid)
    axes.tick_params(colors=theme.quiet, labelsize=points(TICK), length=3)
    for axis, data, length in zip((axes.xaxis, axes.yaxis), drawn.axes, drawn.paper, strict=False):
        if not data.title:
            axis.set_visible(False)
            continue
        said = scale(data.low, data.high).titled(data.title, length, TITLE)
        axis.set_label_text(said, fontsize=points(TITLE), color=theme.text, parse_math=False)
        found = _numbers(data, length, across=axis is axes.xaxis)
        axis.set_ticks([value for value, _ in found], labels=[text for _, text in found])
    if drawn.solid or not (drawn.axes[0].title or drawn.axes[1].title):
        axes.axis("off")


def _numbers(axis: Axis, length: float, *, across: bool) -> list[tuple[float, str]]:
    return list(placed(axis.low, axis.high, length, across=across, spacing=axis.spacing))


def _beside(drawn: Scene) -> float:
    """Pixels that the numbers and the title of the upright axis take up beside the drawing."""
    axis = drawn.axes[1]
    if not axis.title:
        return 0.0
    return AROUND + max((width(text, TICK) for _, text in _numbers(axis, drawn.paper[1], across=False)), default=0.0)
