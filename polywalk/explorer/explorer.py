"""The widget: the picture beside its vertices and walks, wired to one state."""

from __future__ import annotations

from base64 import b64encode
from dataclasses import replace
from html import escape
from typing import Any

import ipywidgets as widgets

from polywalk.drawing import figure, scene
from polywalk.drawing.static import rendered
from polywalk.drawing.theme import THEMES
from polywalk.explorer import texts
from polywalk.explorer.panels import Message, VertexPanel, WalkPanel
from polywalk.explorer.state import State
from polywalk.explorer.view import FigureView
from polywalk.model import Model

STEPS = {"ArrowLeft": -1, "ArrowRight": +1}
NEIGHBOURS = {"ArrowUp": -1, "ArrowDown": +1}
HELP = (
    "Click a vertex to select it, drag to turn or move the picture. Once you clicked into it, the wheel zooms, the "
    "arrow keys left and right step through the walk, up and down select vertices."
)


class Explorer(widgets.VBox):  # type: ignore[misc]
    """The explorer of one model; ``state`` holds what it shows, readable and settable.

    Parameters
    ----------
    model : Model
    **state : optional
        Start values of the state: ``rules``, ``start``, ``vertex``, ``step``, ``axes``.

    See Also
    --------
    explore
    """

    def __init__(self, model: Model, **state: Any) -> None:
        self.state = State(model, **state)
        self.message = Message()
        self.verdict = widgets.HTML()
        guard = self.message.guard
        handlers = {"pick": self._picked, "key": self._pressed, "camera": self._turned, "theme": self._lit}
        self.picture = FigureView(handlers={kind: guard(handler) for kind, handler in handlers.items()})
        self.vertices = VertexPanel(self.state, self.message)
        self.walk = WalkPanel(self.state, self.message)
        super().__init__(self._arranged())
        self.add_class("polywalk")
        self.state.observe(self.message.watch(lambda _: self.show()), "picture")
        self.state.observe(self.message.watch(lambda change: self._aim(change["new"])), "camera")
        self.show()

    def _arranged(self) -> list[widgets.Widget]:
        help_line = widgets.HTML(f"<p>{escape(HELP)}</p>")
        seen = _side_by_side([self.picture, help_line], [self.walk.box])
        chosen = _side_by_side([self.vertices.list], [self.vertices.card])
        return [self.verdict, self.message, seen, chosen]

    def show(self) -> None:
        """Draw the state: the verdict and the picture."""
        state = self.state
        self.verdict.value = texts.verdict(state.region)
        self.picture.label = f"{state.model.name or 'feasible region'}. {HELP}"
        axes = state.view.axes or state.model.variables
        self.picture.show(figure(state.region, state.view), revision=" | ".join(axes), camera=state.camera)

    def _picked(self, message: dict[str, Any]) -> None:
        self.state.vertex = message["vertex"]

    def _pressed(self, message: dict[str, Any]) -> None:
        key = message["key"]
        if key in STEPS:
            self.state.go(STEPS[key])
        elif key in NEIGHBOURS:
            self.state.choose(NEIGHBOURS[key])
        else:
            self.state.step = 0 if key == "Home" else None

    def _turned(self, message: dict[str, Any]) -> None:
        self._reported = message["camera"]
        self.state.camera = message["camera"]

    def _lit(self, message: dict[str, Any]) -> None:
        self.state.dark = message["dark"]

    def _aim(self, camera: dict[str, Any] | None) -> None:
        if camera is not None and camera != getattr(self, "_reported", None):
            self.picture.aim(camera)

    def _repr_mimebundle_(self, **kwargs: Any) -> dict[str, Any]:
        """The widget, and for readers without widgets the static picture with the vertices."""
        shown = super()._repr_mimebundle_(**kwargs)
        bundle: dict[str, Any] = shown[0] if isinstance(shown, tuple) else shown
        return {**bundle, "text/plain": str(self), "text/html": self._still()}

    def __str__(self) -> str:
        return f"Explorer\n{self.state.model}\n{self.state.region}"

    def _still(self) -> str:
        state = self.state
        return f"{texts.verdict(state.region)}{still(state)}{state.region._repr_html_()}"


def still(state: State) -> str:
    """The static picture, always light, as an image element that needs no other file."""
    drawn = rendered(scene(state.region, replace(state.view, mode="light")), THEMES["light"], "svg", outlines=False)
    source = f"data:image/svg+xml;base64,{b64encode(drawn).decode()}"
    return f'<img alt="picture of the region" style="max-width: 100%" src="{source}">'


def explore(model: Model, **state: Any) -> Explorer:
    """Explore a model in a notebook: its region, its vertices, and the walks of pivot rules.

    Parameters
    ----------
    model : Model
    **state : optional
        ``rules`` (tuple of str; the first is stepped through), ``start``, ``vertex``, ``step``, ``axes``.

    Returns
    -------
    Explorer
        A widget; ``explorer.state`` holds what it shows.

    Raises
    ------
    UnknownName, WalkError, DrawingError
        A rule, vertex, step or axis that is not there.

    Examples
    --------
    >>> import polywalk as pw
    >>> square = pw.from_algebra(maximize="x + 2*y", bounds={"x": (0, 1), "y": (0, 1)})
    >>> explorer = pw.explore(square, rules=("bland", "dantzig"))
    >>> explorer.state.vertex = 3
    >>> explorer.vertices.rows.selected
    3
    """
    return Explorer(model, **state)


def _side_by_side(left: list[widgets.Widget], right: list[widgets.Widget]) -> widgets.Box:
    """Two columns, one below the other where the page is narrow."""
    columns = [
        widgets.VBox(items, layout=widgets.Layout(flex=f"{grow} 1 {basis}", min_width="0", padding="0 6px"))
        for items, grow, basis in ((left, 5, "min(100%, 460px)"), (right, 4, "min(100%, 340px)"))
    ]
    return widgets.Box(columns, layout=widgets.Layout(display="flex", flex_flow="row wrap", width="100%"))
