"""A plain progress bar for work that takes longer than a second: one line in a terminal, one cell in a notebook.

Elsewhere (a file, a test, a pipe) nothing is shown, and short work shows nothing anywhere.
"""

from __future__ import annotations

import sys
import time
from collections.abc import Iterable, Iterator
from typing import Any, Protocol, TextIO, TypeVar

Item = TypeVar("Item")

PATIENCE = 1.0
"""Seconds of work before a bar appears: shorter waits need no explanation."""

PAUSE = 0.1
"""Seconds between two drawings of the bar; drawing it more often only costs time."""

WIDTH = 30
"""Letters of a bar."""


class Screen(Protocol):
    """Where one line can be shown, and shown anew in its place."""

    def show(self, line: str) -> None:
        """Replace the line; empty text takes it away."""


def progress(
    items: Iterable[Item],
    total: int,
    what: str,
    screen: Screen | None = None,
) -> Iterator[Item]:
    """Hand the items on, and show how many have been worked on once that takes longer than a second.

    The bar is taken away at the end, and when the loop is left early (an error, Ctrl-C).

    Parameters
    ----------
    items : iterable
    total : int
        How many items there are.
    what : str
        What is counted, in the plural: "walks".
    screen : Screen, optional
        By default the notebook or the terminal the work runs in, if it runs in one.

    Examples
    --------
    >>> from polywalk.progress import progress
    >>> [walk for walk in progress(["a", "b"], 2, "walks")]
    ['a', 'b']
    """
    shown = _screen() if screen is None else screen
    begun = drawn = time.monotonic()
    visible = False
    try:
        for done, item in enumerate(items):
            now = time.monotonic()
            if shown is not None and now - begun >= PATIENCE and (now - drawn >= PAUSE or not visible):
                shown.show(bar(done, total, what, now - begun))
                drawn, visible = now, True
            yield item
    finally:
        if shown is not None and visible:
            shown.show("")


def bar(done: int, total: int, what: str, seconds: float) -> str:
    """The bar as one line of text.

    Examples
    --------
    >>> from polywalk.progress import bar
    >>> bar(5, 20, "walks", 2.0)
    '[#######.......................] 5 of 20 walks, about 6 s to go'
    """
    filled = WIDTH * done // total if total else 0
    rest = f", about {seconds * (total - done) / done:.0f} s to go" if done else ""
    return f"[{'#' * filled}{'.' * (WIDTH - filled)}] {done} of {total} {what}{rest}"


def _screen() -> Screen | None:
    """The notebook or the terminal this runs in; None where neither is there to be looked at."""
    shell = sys.modules["IPython"].get_ipython() if "IPython" in sys.modules else None
    if shell is not None and hasattr(shell, "kernel"):
        return Notebook()
    return Terminal(sys.stderr) if sys.stderr is not None and sys.stderr.isatty() else None


class Terminal:
    """One line of a terminal, rewritten in place.

    Parameters
    ----------
    stream : text stream
    """

    def __init__(self, stream: TextIO) -> None:
        self._stream, self._length = stream, 0

    def show(self, line: str) -> None:
        """Replace the line; empty text takes it away."""
        self._stream.write(f"\r{line.ljust(self._length)}" + ("" if line else "\r"))
        self._stream.flush()
        self._length = len(line)


class Notebook:
    """One output of a notebook cell, rewritten in place."""

    def __init__(self) -> None:
        self._handle: Any = None

    def show(self, line: str) -> None:
        """Replace the line; empty text takes it away."""
        data = {"text/plain": line}
        if self._handle is not None:
            self._handle.update(data, raw=True)
            return
        from IPython.display import display

        self._handle = display(data, raw=True, display_id=True)  # type: ignore[no-untyped-call]
