"""The figure as a widget: one trait of plain dicts, drawn in the page by plotly.js; what happens there comes back.

plotly.js is not part of the widget. The first view on a page asks for it, and this side answers with the file of the
installed plotly package, gzipped; every later view on that page finds it there.
"""

from __future__ import annotations

import gzip
from collections.abc import Callable
from functools import cache
from importlib.resources import files
from pathlib import Path
from typing import Any

import anywidget
import traitlets

HERE = Path(__file__).parent
BELOW = {"orientation": "h", "x": 0, "xanchor": "left", "yref": "container", "y": 0, "yanchor": "bottom"}
"""The legend below the figure: the page's width belongs to the region."""

Handler = Callable[[dict[str, Any]], None]


@cache
def library() -> bytes:
    """plotly.js of the installed plotly package, gzipped (about 1.5 MB)."""
    return gzip.compress(files("plotly").joinpath("package_data", "plotly.min.js").read_bytes(), mtime=0)


class FigureView(anywidget.AnyWidget):
    """A plotly figure that keeps its camera and reports what the user does.

    Parameters
    ----------
    figure : dict
        ``{"data": [...], "layout": {...}}``, plain. Vertices that can be picked are the points of a trace named
        "vertices" whose ``customdata`` holds their indices.
    label : str
        What a screen reader calls it.
    handlers : dict of str to callable
        Called with the message: "pick" (``vertex``), "key" (``key``), "camera" (``camera``), "theme" (``dark``).

    Examples
    --------
    >>> from polywalk.explorer.view import FigureView
    >>> heard = []
    >>> view = FigureView(label="a region", handlers={"pick": heard.append})
    >>> view.receive({"kind": "pick", "vertex": 2})
    >>> heard
    [{'kind': 'pick', 'vertex': 2}]
    """

    _esm = (HERE / "view.js").read_text(encoding="utf-8")  # a path would be watched, and keep every widget alive
    _css = (HERE / "view.css").read_text(encoding="utf-8")
    figure = traitlets.Dict().tag(sync=True)
    label = traitlets.Unicode("").tag(sync=True)

    def __init__(self, handlers: dict[str, Handler] | None = None, **traits: Any) -> None:
        super().__init__(**traits)
        self.handlers = handlers or {}
        self.libraries_sent = 0
        self._revision, self._room = "", 0
        self.on_msg(lambda _, content, __: self.receive(content))

    def receive(self, message: dict[str, Any]) -> None:
        """Act on a message of the page; unknown kinds are left alone."""
        kind = message.get("kind")
        if kind == "library":
            self.libraries_sent += 1
            self.send({"kind": "library"}, buffers=[library()])
        elif kind in self.handlers:
            self.handlers[kind](message)

    def show(self, figure: dict[str, Any], revision: str, camera: dict[str, Any] | None = None) -> None:
        """Draw another figure; the user's camera and zoom stay as long as the revision does.

        ``camera`` is where a page that opens later starts.
        """
        layout = {**figure["layout"], "title": {"text": ""}, "autosize": True, "uirevision": revision}
        layout["modebar"] = {**layout.get("modebar", {}), "remove": ["sendChartToCloud", "lasso2d", "select2d"]}
        solid = "scene" in layout
        if revision != self._revision:
            self._revision, self._room = revision, _legend_room(figure["data"])
        room = self._room
        layout["legend"] = {**layout.get("legend", {}), **BELOW, "maxheight": room}
        sides = {"l": 8 if solid else 56, "r": 8, "t": 30, "b": room + (0 if solid else 44)}
        layout["margin"] = {**sides, "autoexpand": False}
        for fixed in ("width", "height"):
            layout.pop(fixed, None)
        if camera and solid:
            layout["scene"] = {**layout["scene"], "camera": camera}
        self.figure = {"data": rounded(figure["data"]), "layout": layout}

    def say(self, text: str, dark: bool) -> None:
        """Show words where there is no picture."""
        ink, paper = ("#F2F2F0", "#16181D") if dark else ("#16181D", "#FFFFFF")
        note = {"text": text, "showarrow": False, "xref": "paper", "yref": "paper", "x": 0.5, "y": 0.5}
        layout = {"annotations": [note], "font": {"color": ink}, "paper_bgcolor": paper, "plot_bgcolor": paper}
        self.show({"data": [], "layout": layout | {"xaxis": {"visible": False}, "yaxis": {"visible": False}}}, text)

    def aim(self, camera: dict[str, Any]) -> None:
        """Turn the scene on every page that shows it; ``camera`` as in plotly's ``layout.scene.camera``."""
        self.send({"kind": "aim", "camera": camera})


def rounded(data: Any) -> Any:
    """The traces with nine significant digits, finer than any screen: half the bytes of a message are such numbers."""
    if isinstance(data, float):
        return float(f"{data:.9g}")
    if isinstance(data, dict):
        return {key: rounded(value) if isinstance(value, list | dict | float) else value for key, value in data.items()}
    if isinstance(data, list):
        return [rounded(value) if isinstance(value, float | list | dict) else value for value in data]
    return data


def _legend_room(data: list[dict[str, Any]]) -> int:
    """Pixels kept for the legend and a row more, so that the picture stays where it is when entries come and go."""
    letters = sum(len(trace.get("name", "")) + 9 for trace in data if trace.get("showlegend", True))
    return 20 * min(6, 2 + letters // 80) + 12
