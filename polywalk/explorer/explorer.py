"""The widget: the picture beside its panels, wired to one state."""

from __future__ import annotations

from collections.abc import Iterator
from html import escape
from typing import Any

import ipywidgets as widgets

from polywalk.drawing import scene
from polywalk.drawing.interactive import painted
from polywalk.drawing.theme import THEMES
from polywalk.explorer import texts
from polywalk.explorer.axesbar import AxesBar
from polywalk.explorer.constraintpanel import ConstraintPanel
from polywalk.explorer.constraintpanel import table as constraint_table
from polywalk.explorer.findingpanel import FindingPanel
from polywalk.explorer.forms import words
from polywalk.explorer.message import Message
from polywalk.explorer.modelbar import ModelBar
from polywalk.explorer.pricepanel import PricePanel
from polywalk.explorer.resting import Rest
from polywalk.explorer.settling import is_slow
from polywalk.explorer.shadows import in_region
from polywalk.explorer.state import State
from polywalk.explorer.stills import still
from polywalk.explorer.tabs import tabbed
from polywalk.explorer.vertexpanel import VertexPanel
from polywalk.explorer.view import FigureView
from polywalk.explorer.walkpanel import WalkPanel
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
        Start values of the state's traits: ``rules``, ``start``, ``vertex``, ``step``, ``axes``, ...

    See Also
    --------
    explore
    """

    def __init__(self, model: Model, **state: Any) -> None:
        self._open = False
        self.state = State(model, **state)
        self.message = Message()
        self.verdict = words(self.message)
        self.rest = Rest(self.message.watch(self._settled))
        guard = self.message.guard
        handlers = {"pick": self._picked, "key": self._pressed, "camera": self._turned, "theme": self._lit}
        self.picture = FigureView(
            layout=self.message.look(widgets.Layout),
            handlers={kind: guard(handler) for kind, handler in handlers.items()},
        )
        self._drawn: Any = None
        self._reported: Any = None
        self._begin(state)
        given = self.state, self.message
        self.bar, self.axes, self.vertices = ModelBar(*given), AxesBar(*given), VertexPanel(*given)
        self.constraints, self.findings = ConstraintPanel(*given), FindingPanel(*given)
        self.prices, self.walk = PricePanel(*given), WalkPanel(*given)
        super().__init__(self._arranged())
        self.add_class("polywalk")
        self._watching = {
            "version": self.message.watch(lambda _: self._changed()),
            "camera": self.message.watch(lambda change: self._aim(change["new"])),
        }
        for name, watch in self._watching.items():
            self.state.observe(watch, name)
        self._open = True
        self.show()

    def _begin(self, given: dict[str, Any]) -> None:
        """Select the optimum, unless something else was asked for, and review the model."""
        seen = self.state.region
        best = seen.optimal if seen is not None and seen.vertices else None
        if best is not None and not {"vertex", "step"} & set(given):
            self.state.vertex = best.vertices[0]
        self.state.settle()

    def _arranged(self) -> list[widgets.Widget]:
        help_line = words(self.message, f"<p>{escape(HELP)}</p>")
        names = ("Constraints", "Vertices", "Findings", "Prices", "Walk")
        panels = (self.constraints, self.vertices, self.findings, self.prices, self.walk)
        listed = {name: panel.box for name, panel in zip(names, panels, strict=True)}
        self.tabs, right = tabbed("panels", listed, self.message.look(widgets.Layout))
        left = [self.picture, self.axes.box, help_line, self.vertices.card]
        return [self.verdict, self.bar.box, self.message, _side_by_side(left, [right])]

    def show(self) -> None:
        """Draw the state: the verdict and the picture."""
        state = self.state
        self.verdict.value = texts.verdict(state)
        found = "" if state.review is None else f" ({len(state.review.findings)}{', stale' if state.stale else ''})"
        self.tabs.titles = ["Constraints", "Vertices", f"Findings{found}", "Prices", "Walk"]
        if state.picture != self._drawn:
            self._draw()

    def _draw(self) -> None:
        state = self.state
        self._drawn = state.picture
        self.picture.label = f"{state.model.name or 'feasible region'}. {HELP}"
        axes = state.view.axes or state.model.variables
        if state.region is None:
            self.picture.say("The vertices of this model are not listed yet: see Findings.", dark=state.dark)
            return
        drawn = scene(state.region, state.view)
        if drawn.solid and state.region.status != "empty":
            state.eye = drawn.camera  # or every step would look for the best one anew
        made = painted(drawn, THEMES[state.view.mode])
        self.picture.show(made, revision=" | ".join(axes), camera=state.camera)

    def _changed(self) -> None:
        self.show()
        state = self.state
        stops = state.settled.stops if state.settled else None
        other = stops is not None and (stops.kind, stops.name) != state.number
        if state.region is not None and not is_slow(state.model) and (state.stale or other):
            self.rest.wait()

    def _settled(self) -> None:
        self.state.settle()

    def _picked(self, message: dict[str, Any]) -> None:
        self.state.vertex = in_region(self.state, message["vertex"])

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
        if camera is not None and camera != self._reported:
            self.picture.aim(camera)

    def close(self) -> None:
        """Close every widget of the explorer and end whatever it has running."""
        if not self._open:  # ipywidgets closes once more when the object goes
            return
        self._open = False
        self.rest.cancel()
        for panel in (self.bar, self.axes, self.vertices, self.constraints, self.findings, self.prices, self.walk):
            panel.close()
        for name, watch in self._watching.items():
            self.state.unobserve(watch, name)
        for widget in list(_family(self)):
            if widget is not self:
                widget.close()
        super().close()

    def _repr_mimebundle_(self, **kwargs: Any) -> dict[str, Any]:
        """The widget, and for readers without widgets the static picture with the tables."""
        shown = super()._repr_mimebundle_(**kwargs)
        bundle: dict[str, Any] = shown[0] if isinstance(shown, tuple) else shown
        return {**bundle, "text/plain": str(self), "text/html": self._still()}

    def __str__(self) -> str:
        return f"Explorer\n{self.state.model}\n{self.state.region}"

    def _still(self) -> str:
        state = self.state
        parts = [texts.verdict(state), still(state), constraint_table(state)._repr_html_()]
        parts += [state.region._repr_html_()] if state.region else []
        return "".join([*parts, state.review._repr_html_() if state.review else ""])


def _family(widget: widgets.Widget) -> Iterator[widgets.Widget]:
    """A widget, its layout and style, and those of everything in it."""
    yield widget
    for part in ("layout", "style"):
        if isinstance(getattr(widget, part, None), widgets.Widget):
            yield getattr(widget, part)
    for child in getattr(widget, "children", ()):
        yield from _family(child)


def explore(model: Model, **state: Any) -> Explorer:
    """Explore a model in a notebook: region, constraints, findings, walks, and what changes when a number does.

    Parameters
    ----------
    model : Model
    **state : optional
        ``rules`` (tuple of str; the first is stepped through), ``leaving``, ``start``, ``vertex``, ``step``, ``axes``,
        ``off``, ``number``: the traits of `polywalk.explorer.traits.Traits`.

    Returns
    -------
    Explorer
        A widget; ``explorer.state`` holds what it shows, and ``explorer.state.model`` the edited model. ``close()``
        closes it with everything in it.

    Raises
    ------
    UnknownName, WalkError, DrawingError, ModelError
        A rule, vertex, step, axis or number that is not there.

    Examples
    --------
    >>> import polywalk as pw
    >>> square = pw.from_algebra(maximize="x + 2*y", bounds={"x": (0, 1), "y": (0, 1)})
    >>> explorer = pw.explore(square, rules=("bland", "dantzig"))
    >>> explorer.state.vertex = 3
    >>> explorer.vertices.rows.selected
    3
    >>> explorer.state.set_number("3/2", "right-hand side", "x upper")
    >>> explorer.state.region.value
    Fraction(7, 2)

    References
    ----------
    Own design; no published source.
    """
    return Explorer(model, **state)


def _side_by_side(left: list[widgets.Widget], right: list[widgets.Widget]) -> widgets.Box:
    """Two columns, one below the other where the page is narrow."""
    columns = [
        widgets.VBox(items, layout=widgets.Layout(flex=f"{grow} 1 {basis}", min_width="0", padding="0 6px"))
        for items, grow, basis in ((left, 1, "min(100%, 460px)"), (right, 1, "min(100%, 460px)"))
    ]
    return widgets.Box(columns, layout=widgets.Layout(display="flex", flex_flow="row wrap", width="100%"))
