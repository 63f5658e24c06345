"""A table with selectable rows: by click, by arrow keys, and from Python."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from pathlib import Path
from typing import Any

import anywidget
import traitlets

from polywalk.table import Table, cell


class Rows(anywidget.AnyWidget):
    """Text in rows and columns, of which one row may be selected.

    Parameters
    ----------
    label : str
        What a screen reader calls it.
    columns : list of str
    rows : list of list of str
    numbers : list of int
        The columns to align right.
    selected : int or None
        The row.
    on_select : callable, optional
        Called with the row's number when the user, or a program, selects one; not while the table is filled.

    Examples
    --------
    >>> from polywalk.explorer.rows import Rows
    >>> from polywalk.table import Table
    >>> rows = Rows(label="plans")
    >>> rows.fill(Table("", ("plan", "cost"), (("a", 4), ("b", 5))), selected=1)
    >>> rows.rows, rows.numbers, rows.selected
    ([['a', '4'], ['b', '5']], [1], 1)
    """

    _esm = (Path(__file__).parent / "rows.js").read_text(encoding="utf-8")
    label = traitlets.Unicode("").tag(sync=True)
    columns = traitlets.List(traitlets.Unicode()).tag(sync=True)
    rows = traitlets.List(traitlets.List(traitlets.Unicode())).tag(sync=True)
    numbers = traitlets.List(traitlets.Int()).tag(sync=True)
    selected = traitlets.Int(None, allow_none=True).tag(sync=True)

    def __init__(self, on_select: Callable[[int | None], None] | None = None, **traits: Any) -> None:
        self._filling = False
        self.on_select = on_select
        super().__init__(**traits)

    @traitlets.observe("selected")
    def _selected(self, change: Any) -> None:
        if self.on_select and not self._filling:
            self.on_select(change["new"])

    @traitlets.validate("selected")
    def _inside(self, proposal: Any) -> int | None:
        place: int | None = proposal["value"]
        if place is not None and not 0 <= place < len(self.rows):
            raise traitlets.TraitError(f"expected a row from 0 to {len(self.rows) - 1}, got {place}.")
        return place

    def fill(self, table: Table, selected: int | None) -> None:
        """Show another table; nothing is reported as selected on the way."""
        rows = [[cell(value) for value in row] for row in table.rows]
        self._filling = True
        try:
            with self.hold_sync():
                if rows != self.rows:
                    self.selected = None
                self.columns, self.rows = list(table.columns), rows
                self.numbers = [k for k in range(len(table.columns)) if _numeric([row[k] for row in table.rows])]
                self.selected = selected
        finally:
            self._filling = False


def _numeric(values: Sequence[object]) -> bool:
    return bool(values) and not any(isinstance(value, str | tuple) for value in values)
