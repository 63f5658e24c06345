"""Which variables are drawn, for models with more than three."""

from __future__ import annotations

import ipywidgets as widgets

from polywalk.explorer.checking import LARGEST_PICTURE
from polywalk.explorer.forms import WRAP, Panel, chooser

NONE = "none"
NAMES = ("First axis", "Second axis", "Third axis")


class AxesBar(Panel):
    """Three choosers; the last two may be none. Not shown where every variable is drawn."""

    def build(self) -> None:
        self.choosers = [chooser(self.message, name, [NONE], "140px") for name in NAMES]
        for one in self.choosers:
            self.on_input(one, lambda _: self._chosen())
        self.box = widgets.HBox(self.choosers, layout=WRAP)  # a layout of its own: it hides

    def _chosen(self) -> None:
        names = tuple(one.value for one in self.choosers if one.value != NONE)
        self.state.axes = names

    def show(self) -> None:
        variables, axes = self.state.model.variables, self.state.axes
        self.box.layout.display = None if len(variables) > LARGEST_PICTURE else "none"
        drawn = variables if axes is None else axes
        for place, one in enumerate(self.choosers):
            offered = variables if place == 0 else (NONE, *variables)
            if tuple(one.options) != offered:
                one.options = offered
            one.value = drawn[place] if place < len(drawn) else NONE
