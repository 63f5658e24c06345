"""The static painter: a Scene as PNG, SVG or PDF through matplotlib, without a browser; same input, same bytes."""

from __future__ import annotations

import os
import tempfile
import warnings
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from polywalk.drawing.compose import Source, scene
from polywalk.drawing.projection import laid_flat
from polywalk.drawing.scene import Scene
from polywalk.drawing.static_key import KEY, ROW, TOP, key_lines, paint_key
from polywalk.drawing.strokes import label, line, mark, points, polygon
from polywalk.drawing.theme import THEMES, Theme
from polywalk.drawing.view import View, viewed
from polywalk.drawing.window import PAPER
from polywalk.errors import DrawingError

LEFT, BOTTOM = 64.0, 54.0
"""Pixels beside and below the picture for the axes' numbers."""

PIXEL = 1 / 96
"""Inches a pixel."""

ENDINGS = (".png", ".svg", ".pdf")


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
        Axes, walks, selection, camera, light, dark or grey.
    **changes
        Fields of View, for short: ``walks=[...]``, ``axes=("pump", "tank")``, ``mode="grey"``.

    Returns
    -------
    Picture
        The same bytes for the same input.

    Raises
    ------
    DrawingError
        Another ending, a folder that does not exist or may not be written, or axes that do not fit the model.

    Examples
    --------
    >>> import tempfile, pathlib
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="x", constraints={"both": "x + y <= 3"}, bounds={"x": (0, 2), "y": (0, 2)})
    >>> with tempfile.TemporaryDirectory() as folder:
    ...     pw.picture(model, pathlib.Path(folder) / "region.pdf")
    picture of a region (pdf, region.pdf)
    """
    target = None if path is None else target_of(Path(path))
    ending = target.suffix.lower()[1:] if target else "svg"
    looked = viewed(view, changes)
    data = rendered(scene(source, looked), THEMES[looked.mode], ending, outlines=target is not None)
    if target is not None:
        write(target, data)
    return Picture(data, ending, target)


def target_of(path: Path) -> Path:
    """The path, if a picture can be written there; raises DrawingError."""
    if path.suffix.lower() not in ENDINGS:
        raise DrawingError(f"expected a file ending in {', '.join(ENDINGS)}, got {path.name!r}.", culprit=path)
    if not path.parent.is_dir():
        raise DrawingError(f"the folder {str(path.parent)!r} does not exist; create it first.", culprit=path)
    return path


def write(target: Path, data: bytes) -> None:
    """Replace a file in one step, so that it is never half-written."""
    try:
        with tempfile.NamedTemporaryFile(dir=target.parent, suffix=target.suffix, delete=False) as file:
            file.write(data)
        os.chmod(file.name, 0o644)
        os.replace(file.name, target)
    except OSError as error:
        raise DrawingError(f"{str(target)!r} could not be written ({error.strerror}).", culprit=target) from error


def rendered(drawn: Scene, theme: Theme, ending: str = "svg", *, outlines: bool = True) -> bytes:
    """The bytes of a scene's picture; the same for the same scene.

    An SVG holds its letters as outlines, so that it looks alike everywhere; without them it is a third as large, and
    takes the reader's sans-serif font where DejaVu Sans is missing.
    """
    from io import BytesIO

    import matplotlib as mpl
    from matplotlib.backends.backend_agg import FigureCanvasAgg
    from matplotlib.figure import Figure

    rows = key_lines(drawn.key)
    height = max(PAPER[1] + BOTTOM + TOP, ROW * (len(rows) + 1) + TOP)
    width = LEFT + PAPER[0] + KEY + 34
    fixed: Any = {
        "svg.hashsalt": "polywalk",
        "svg.fonttype": "path" if outlines else "none",
        "pdf.fonttype": 42,
        "font.family": "DejaVu Sans",
    }
    with mpl.rc_context(fixed), warnings.catch_warnings():
        warnings.filterwarnings("ignore", "Glyph .* missing")  # an emoji in a name becomes a box, nothing worse
        figure = Figure(figsize=(width * PIXEL, height * PIXEL), facecolor=theme.paper)
        FigureCanvasAgg(figure)
        base = (height - TOP - PAPER[1]) / height
        axes = figure.add_axes((LEFT / width, base, PAPER[0] / width, PAPER[1] / height))
        _paint(axes, laid_flat(drawn) if drawn.solid else drawn, theme)
        _head(figure, drawn, theme, width, height)
        paint_key(figure, rows, theme, (LEFT + PAPER[0] + 28, width, height))
        out = BytesIO()
        stamp: dict[str, Any] = {"svg": {"Date": None}, "pdf": {"CreationDate": None}, "png": {"Software": None}}
        figure.savefig(out, format=ending, dpi=192, facecolor=theme.paper, metadata=stamp[ending])
    return out.getvalue()


def _head(figure: Any, drawn: Scene, theme: Theme, width: float, height: float) -> None:
    left = 18 / width
    text = {"ha": "left", "va": "top", "parse_math": False, "color": theme.text}
    figure.text(left, 1 - 12 / height, drawn.title, fontsize=points(17), fontweight="bold", **text)
    for k, words in enumerate(drawn.subtitle.split("\n")):
        figure.text(left, 1 - (36 + 18 * k) / height, words, fontsize=points(12.5), **text)


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
    from matplotlib.ticker import MultipleLocator

    for side in axes.spines.values():
        side.set_color(theme.grid)
    axes.tick_params(colors=theme.quiet, labelsize=points(10), length=3)
    for axis, data in ((axes.xaxis, drawn.axes[0]), (axes.yaxis, drawn.axes[1])):
        if not data.title:
            axis.set_visible(False)
        axis.set_label_text(data.title, fontsize=points(12), color=theme.text, parse_math=False)
        axis.get_major_formatter().set_useOffset(False)
        if data.spacing:
            axis.set_major_locator(MultipleLocator(data.spacing))
    if drawn.solid or not (drawn.axes[0].title or drawn.axes[1].title):
        axes.axis("off")
