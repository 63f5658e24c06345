"""Headings of which one is open: the panels of the explorer."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import anywidget
import ipywidgets as widgets
import traitlets


class Tabs(anywidget.AnyWidget):
    """A row of headings; ``shown`` is the number of the one whose panel is shown."""

    _esm = (Path(__file__).parent / "tabs.js").read_text(encoding="utf-8")
    label = traitlets.Unicode("").tag(sync=True)
    titles = traitlets.List(traitlets.Unicode()).tag(sync=True)
    shown = traitlets.Int(0).tag(sync=True)

    @traitlets.validate("shown")
    def _there(self, proposal: Any) -> int:
        place: int = proposal["value"]
        if not 0 <= place < len(self.titles):
            raise traitlets.TraitError(f"expected a panel from 0 to {len(self.titles) - 1}, got {place}.")
        return place


def tabbed(label: str, panels: dict[str, widgets.Widget], layout: widgets.Layout) -> tuple[Tabs, widgets.VBox]:
    """The headings, and them above the open panel."""
    heads = Tabs(label=label, titles=list(panels), layout=layout)
    stack = widgets.Stack(list(panels.values()), selected_index=0, layout=layout)
    traitlets.dlink((heads, "shown"), (stack, "selected_index"))
    return heads, widgets.VBox([heads, stack], layout=layout)
