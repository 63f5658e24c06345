"""Shadow prices, reduced costs and their ranges, as they were when the input rested last."""

from __future__ import annotations

from polywalk.explorer.forms import Panel, column, words
from polywalk.explorer.settling import Settled

UNSETTLED = "Prices follow when the input rests; what is shown is of the model before."


class PricePanel(Panel):
    """The tables of ``sensitivity``."""

    def build(self) -> None:
        self.status, self.tables = words(self.message), words(self.message)
        self._shown: Settled | None = None
        self.box = column(self.message, self.status, self.tables)

    def show(self) -> None:
        settled = self.state.settled
        fresh = settled is not None and not self.state.stale
        self.status.value = (
            "" if fresh else f'<p class="polywalk-stale">{UNSETTLED if settled else "Not worked out yet."}</p>'
        )
        if settled is not None and settled is not self._shown:
            self._shown = settled
            tables = "".join(table._repr_html_() for table in settled.prices)
            self.tables.value = f'<div class="polywalk-wide">{tables}</div>'
