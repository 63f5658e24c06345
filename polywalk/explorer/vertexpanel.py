"""The vertices as rows, and the card of the selected one."""

from __future__ import annotations

import ipywidgets as widgets

from polywalk.explorer import cards
from polywalk.explorer.forms import Panel, column, words
from polywalk.explorer.rows import Rows


class VertexPanel(Panel):
    """``box`` lists the vertices; ``card`` tells about the selected one and stands elsewhere."""

    def build(self) -> None:
        self.rows = Rows(
            label="vertices", layout=self.message.look(widgets.Layout), on_select=self.message.guard(self._picked)
        )
        self.more, self.card = words(self.message), words(self.message)
        self.box = column(self.message, self.rows, self.more)

    def _picked(self, place: int | None) -> None:
        if not self._showing:
            self.state.vertex = place

    def show(self) -> None:
        state = self.state
        listed = state.vertex is not None and state.vertex < cards.MOST_ROWS
        self.rows.fill(cards.vertices(state.region), state.vertex if listed else None)
        self.more.value = cards.unlisted(state.region)
        self.card.value = cards.card(state)
