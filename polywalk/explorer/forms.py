"""Buttons, choosers and headings as the panels use them: every one with its label, none wider than its column."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from html import escape
from typing import Any

import ipywidgets as widgets
from ipywidgets.widgets.widget_description import DescriptionStyle
from ipywidgets.widgets.widget_string import HTMLStyle, TextStyle

from polywalk.explorer.message import Message
from polywalk.explorer.state import State

WRAP = {"flex_flow": "row wrap", "align_items": "center"}
"""The layout of a row that breaks where the page is narrow."""


def button(message: Message, text: str, act: Any, tip: str = "") -> widgets.Button:
    """A button that acts; its error is shown as a message."""
    layout, style = message.look(widgets.Layout, width="auto"), message.look(widgets.ButtonStyle)
    made = widgets.Button(description=text, tooltip=tip or text, layout=layout, style=style)
    made.on_click(message.guard(lambda _: act()))
    return made


def chooser(
    message: Message, label: str, options: Sequence[Any], basis: str = "180px", **more: Any
) -> widgets.Dropdown:
    """A labelled dropdown."""
    style = message.look(DescriptionStyle, description_width="auto")
    return widgets.Dropdown(options=options, description=label, layout=_wide(message, basis), style=style, **more)


def text_box(message: Message, label: str, basis: str = "220px", **more: Any) -> widgets.Text:
    """A labelled line of text that counts when it is finished."""
    style = message.look(TextStyle, description_width="auto")
    layout = _wide(message, basis)
    return widgets.Text(description=label, continuous_update=False, layout=layout, style=style, **more)


def _wide(message: Message, basis: str) -> widgets.Layout:
    return message.look(widgets.Layout, width="auto", flex=f"1 1 {basis}", max_width="460px")


def words(message: Message, value: str = "") -> widgets.HTML:
    """A place for ready HTML."""
    return widgets.HTML(value, layout=message.look(widgets.Layout), style=message.look(HTMLStyle))


def heading(message: Message, text: str) -> widgets.HTML:
    """A heading."""
    return words(message, f"<h3>{escape(text)}</h3>")


def row(message: Message, *items: widgets.Widget) -> widgets.HBox:
    """Controls side by side."""
    return widgets.HBox(list(items), layout=message.look(widgets.Layout, **WRAP))


def column(message: Message, *items: widgets.Widget) -> widgets.VBox:
    """Parts one below the other."""
    return widgets.VBox(list(items), layout=message.look(widgets.Layout))


class Panel:
    """A part of the explorer: ``box`` is shown, ``show`` follows the state.

    Parameters
    ----------
    state : State
    message : Message
        Where the errors of its callbacks go.
    """

    box: widgets.Widget

    def __init__(self, state: State, message: Message) -> None:
        self.state, self.message = state, message
        self._showing = False
        self.build()
        self._follow = message.watch(lambda _: self.follow())
        state.observe(self._follow, "version")
        self.follow()

    def build(self) -> None:
        """Make the widgets."""
        raise NotImplementedError

    def show(self) -> None:
        """Show the state as it is now."""
        raise NotImplementedError

    def follow(self) -> None:
        """Show the state; what that sets in the widgets is no input."""
        with self.quietly():
            self.show()

    @contextmanager
    def quietly(self) -> Iterator[None]:
        """While the widgets follow the state, they do not set it."""
        before, self._showing = self._showing, True
        try:
            yield
        finally:
            self._showing = before

    def on_input(self, widget: widgets.Widget, act: Any) -> None:
        """Let ``act(new value)`` follow the user's input in a widget, not the program's."""

        def heard(change: Any) -> None:
            if not self._showing:
                self.message.guard(act)(change["new"])

        widget.observe(heard, "value")

    def close(self) -> None:
        """Stop following the state."""
        self.state.unobserve(self._follow, "version")
