"""Where an error inside a callback is shown, so that none is lost in a log."""

from __future__ import annotations

from collections.abc import Callable
from functools import wraps
from html import escape
from typing import Any

import ipywidgets as widgets

from polywalk.errors import PolywalkError


class Message(widgets.HTML):  # type: ignore[misc]
    """The errors of callbacks, and notes of what was done, each until something else happens."""

    def __init__(self) -> None:
        super().__init__()
        self._errors: dict[object, Exception] = {}
        self._looks: dict[tuple[Any, ...], widgets.Widget] = {}

    def look(self, kind: type[widgets.Widget], **traits: Any) -> widgets.Widget:
        """A layout or style that all widgets of the explorer with the same look share: each costs a kilobyte."""
        key = (kind, *sorted(traits.items()))
        if key not in self._looks:
            self._looks[key] = kind(**traits)
        return self._looks[key]

    def guard(self, callback: Callable[..., Any]) -> Callable[..., None]:
        """A callback of the user's input: its error is shown until some input succeeds."""
        return self._guarded(callback, "input")

    def watch(self, callback: Callable[..., Any]) -> Callable[..., None]:
        """A callback that shows the state: its error is shown until the same callback succeeds."""
        return self._guarded(callback, callback)

    def note(self, text: str) -> None:
        """Say that something was done; the next input takes it away."""
        self.value = f'<div class="polywalk-message" role="status">{escape(text)}</div>'

    def _guarded(self, callback: Callable[..., Any], key: object) -> Callable[..., None]:
        @wraps(callback)
        def guarded(*args: Any) -> None:
            before = self.value
            try:
                callback(*args)
            except Exception as error:
                self._errors[key] = error
            else:
                self._errors.pop(key, None)
            told = "".join(map(_told, self._errors.values()))
            if told or (key == "input" and self.value == before) or "alert" in before:
                self.value = told

        return guarded


def _told(error: Exception) -> str:
    """An error for the page; an unexpected one with its type, for a report."""
    kind = "" if isinstance(error, PolywalkError) else f"{type(error).__name__}: "
    text = escape(f"{kind}{error}")
    return f'<div class="polywalk-message" role="alert"><b>That did not work.</b> {text}</div>'
