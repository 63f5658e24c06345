"""What waits until the input rests."""

from __future__ import annotations

import asyncio
from collections.abc import Callable
from typing import Any

SECONDS = 0.6
"""A pause that long ends an input: slider events come every 16 to 100 ms, a person stops to look for longer."""


class Rest:
    """Acts once, when nobody called `wait` for a while; at once where no event loop runs.

    Parameters
    ----------
    act : callable
    seconds : float, optional
    """

    def __init__(self, act: Callable[[], Any], seconds: float = SECONDS) -> None:
        self._act, self._seconds = act, seconds
        self._waiting: asyncio.TimerHandle | None = None

    def wait(self) -> None:
        """Begin to wait, anew."""
        self.cancel()
        loop = running_loop()
        if loop is None:
            self._act()
        else:
            self._waiting = loop.call_later(self._seconds, self._now)

    def _now(self) -> None:
        self._waiting = None
        self._act()

    def cancel(self) -> None:
        """Do not act any more."""
        if self._waiting is not None:
            self._waiting.cancel()
        self._waiting = None


def running_loop() -> asyncio.AbstractEventLoop | None:
    """The event loop this runs in, if it runs in one: a notebook's kernel does."""
    try:
        return asyncio.get_running_loop()
    except RuntimeError:
        return None
