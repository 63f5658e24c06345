"""The explorer's panels: widgets that show the state and set it. Words come from texts.py and steps.py."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from functools import wraps
from html import escape
from typing import Any

import ipywidgets as widgets

from polywalk.errors import PolywalkError
from polywalk.explorer import steps, texts
from polywalk.explorer.rows import Rows
from polywalk.explorer.state import RULES, State
from polywalk.region import vertex_name

NONE = "none"
USUAL = "origin, else Phase I"


class Message(widgets.HTML):  # type: ignore[misc]
    """Where an error inside a callback is shown, so that none is lost in a log."""

    def __init__(self) -> None:
        super().__init__()
        self._errors: dict[object, Exception] = {}

    def guard(self, callback: Callable[..., Any]) -> Callable[..., None]:
        """A callback of the user's input: its error is shown until some input succeeds."""
        return self._guarded(callback, "input")

    def watch(self, callback: Callable[..., Any]) -> Callable[..., None]:
        """A callback that shows the state: its error is shown until the same callback succeeds."""
        return self._guarded(callback, callback)

    def _guarded(self, callback: Callable[..., Any], key: object) -> Callable[..., None]:
        @wraps(callback)
        def guarded(*args: Any) -> None:
            try:
                callback(*args)
            except Exception as error:
                self._errors[key] = error
            else:
                self._errors.pop(key, None)
            self.value = "".join(map(_told, self._errors.values()))

        return guarded


def _told(error: Exception) -> str:
    """An error for the page; an unexpected one with its type, for a report."""
    kind = "" if isinstance(error, PolywalkError) else f"{type(error).__name__}: "
    text = escape(f"{kind}{error}")
    return f'<div class="polywalk-message" role="alert"><b>That did not work.</b> {text}</div>'


class VertexPanel:
    """The vertices as rows, and the card of the selected one."""

    def __init__(self, state: State, message: Message) -> None:
        self.state = state
        self.rows = Rows(label="vertices", on_select=message.guard(self._picked))
        self.card = widgets.HTML()
        self.list = widgets.VBox([widgets.HTML("<h3>Vertices</h3>"), self.rows])
        state.observe(message.watch(lambda _: self.show()), ["region", "vertex"])
        self.show()

    def _picked(self, place: int | None) -> None:
        self.state.vertex = place

    def show(self) -> None:
        """Show the state's region and vertex."""
        self.rows.fill(texts.vertices(self.state.region), self.state.vertex)
        self.card.value = texts.card(self.state.region, self.state.vertex)


class WalkPanel:
    """Rules and start, the pivots as rows, buttons to step, and the current pivot's ratio test."""

    def __init__(self, state: State, message: Message) -> None:
        self.state = state
        self.message = message
        self._showing = False
        names = {"style": {"description_width": "auto"}, "layout": widgets.Layout(width="auto", flex="1 1 150px")}
        self.rule = widgets.Dropdown(options=list(RULES), value=state.rules[0], description="Rule", **names)
        second = state.rules[1] if len(state.rules) > 1 else NONE
        self.other = widgets.Dropdown(options=[NONE, *RULES], value=second, description="Second rule", **names)
        self.start = widgets.Dropdown(options=[USUAL], description="Start", **names)
        self.back = self._button("Step back", -1)
        self.on = self._button("Step on", +1)
        self.whole = self._button("Whole walk", 0)
        self.summary, self.story = widgets.HTML(), widgets.HTML()
        self.rows = Rows(label="pivots", on_select=message.guard(self._picked))
        buttons = widgets.HBox([self.back, self.on, self.whole], layout=widgets.Layout(flex_flow="row wrap"))
        head = widgets.HTML("<h3>Walk</h3>")
        chosen = widgets.HBox([self.rule, self.other, self.start], layout=widgets.Layout(flex_flow="row wrap"))
        self.box = widgets.VBox([head, chosen, self.summary, buttons, self.rows, self.story])
        self.show_starts()
        for chooser in (self.rule, self.other):
            chooser.observe(message.guard(lambda _: self._ruled()), "value")
        self.start.observe(message.guard(lambda change: self._started(change["new"])), "value")
        state.observe(message.watch(lambda _: self.show_starts()), ["region", "start"])
        state.observe(message.watch(lambda _: self.show()), ["walks", "step", "refusal", "rules"])
        self.show()

    def _button(self, text: str, by: int) -> widgets.Button:
        button = widgets.Button(description=text, layout=widgets.Layout(width="auto"))
        button.on_click(self.message.guard(lambda _: self._go(by)))
        return button

    def _go(self, by: int) -> None:
        if by:
            self.state.go(by)
        else:
            self.state.step = None

    def _picked(self, place: int | None) -> None:
        self.state.step = place

    def _ruled(self) -> None:
        if self._showing:
            return
        other = () if self.other.value in (NONE, self.rule.value) else (self.other.value,)
        self.state.rules = (self.rule.value, *other)

    def _started(self, start: Any) -> None:
        if not self._showing:
            self.state.start = None if start is USUAL else start

    def show_starts(self) -> None:
        """Offer the region's vertices as starts."""
        start = USUAL if self.state.start is None else self.state.start
        offered: list[tuple[str, Any]] = [(USUAL, USUAL)]
        offered += [(f"vertex {vertex_name(k)}", vertex.point) for k, vertex in enumerate(self.state.region.vertices)]
        if start not in [value for _, value in offered]:
            offered.append(("as given", start))
        with self._quietly():
            self.start.options = offered
            self.start.value = start

    def show(self) -> None:
        """Show the state's walks and step."""
        state = self.state
        first = state.walks[0] if state.walks else None
        with self._quietly():
            self.rule.value = state.rules[0]
            self.other.value = state.rules[1] if len(state.rules) > 1 else NONE
        self.summary.value = steps.summary(state.walks, state.refusal)
        self.rows.fill(steps.pivots(first), state.step)
        self.story.value = steps.story(first, state.step)
        self.back.disabled = not state.last or state.step == 0
        self.on.disabled = not state.last or state.step == state.last
        self.whole.disabled = not state.last or state.step is None

    @contextmanager
    def _quietly(self) -> Iterator[None]:
        """While the choosers follow the state, they do not set it."""
        self._showing = True
        try:
            yield
        finally:
            self._showing = False
