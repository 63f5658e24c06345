"""A slider over given stops, with a label, marks and what it stands at in words."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import Any

import anywidget
import traitlets


class Dial(anywidget.AnyWidget):
    """A slider whose places have texts; the page sends where it is dragged to, and when it is let go.

    Parameters
    ----------
    label : str
    stops : list of str
        What it stands at, place by place.
    marks : list of int
        Places with a mark.
    place : int
    on_move, on_release : callable, optional
        Called with the place while the user drags; called when the drag is over.

    Examples
    --------
    >>> from polywalk.explorer.dial import Dial
    >>> heard = []
    >>> dial = Dial(on_move=heard.append, on_release=lambda: heard.append("released"))
    >>> dial.turn_to(["0", "1/2", "1"], [1], 0)
    >>> dial.place = 2
    >>> dial.receive({"kind": "released", "place": 1})
    >>> heard
    [2, 1, 'released']
    """

    _esm = (Path(__file__).parent / "dial.js").read_text(encoding="utf-8")
    label = traitlets.Unicode("").tag(sync=True)
    stops = traitlets.List(traitlets.Unicode()).tag(sync=True)
    marks = traitlets.List(traitlets.Int()).tag(sync=True)
    place = traitlets.Int(0).tag(sync=True)

    def __init__(
        self, on_move: Callable[[int], Any] | None = None, on_release: Callable[[], Any] | None = None, **traits: Any
    ) -> None:
        self._turning = False
        self.on_move, self.on_release = on_move, on_release
        super().__init__(**traits)
        self.on_msg(lambda _, content, __: self.receive(content))

    def receive(self, message: dict[str, Any]) -> None:
        """Act on a message of the page; it may overtake the last place of a drag, so it brings that along."""
        if message.get("kind") != "released":
            return
        last = message.get("place", self.place)
        if isinstance(last, int) and 0 <= last < len(self.stops):
            self.place = last
        if self.on_release:
            self.on_release()

    @traitlets.validate("place")
    def _inside(self, proposal: Any) -> int:
        place: int = proposal["value"]
        if self.stops and not 0 <= place < len(self.stops):
            raise traitlets.TraitError(f"expected a place from 0 to {len(self.stops) - 1}, got {place}.")
        return place

    @traitlets.observe("place")
    def _moved(self, change: Any) -> None:
        if self.on_move and not self._turning:
            self.on_move(change["new"])

    def turn_to(self, stops: list[str], marks: list[int], place: int) -> None:
        """Show other stops; nothing is reported as moved."""
        self._turning = True
        try:
            if stops != self.stops or marks != self.marks:
                with self.hold_sync():
                    self.place, self.stops, self.marks, self.place = 0, stops, marks, place
            else:
                self.place = place
        finally:
            self._turning = False
