"""Slow work in a child process behind a button, with another button that ends it."""

from __future__ import annotations

from collections.abc import Callable
from threading import Thread
from typing import Any

import ipywidgets as widgets

from polywalk.budget import Budget, Job
from polywalk.explorer.forms import WRAP, button, words
from polywalk.explorer.message import Message
from polywalk.explorer.resting import running_loop

Order = tuple[Callable[..., Any], tuple[Any, ...]]


class Errand:
    """One kind of slow work.

    Parameters
    ----------
    message : Message
    text : str
        What its button says.
    order : callable
        Gives the function and its arguments, when the button is pressed.
    take : callable
        Gets the result.
    budget : Budget
    task, remedy : str
        For the message when it ends early.
    """

    def __init__(
        self, message: Message, text: str, order: Callable[[], Order], take: Callable[[Any], None], **said: Any
    ) -> None:
        self.message, self._order, self._take, self._said = message, order, message.guard(take), said
        self.job: Job | None = None
        self._thread: Thread | None = None
        self.start = button(message, text, self.begin)
        self.stop = button(message, "Stop", self.end, "Stop this work")
        self.told = words(message)
        self.stop.disabled = True
        self.box = widgets.HBox([self.start, self.stop, self.told], layout=WRAP)  # a layout of its own: it may hide

    def begin(self) -> None:
        """Start the child process; its result is taken when it comes."""
        function, arguments = self._order()
        self.job = job = Job(function, *arguments, **self._said)
        self.start.disabled, self.stop.disabled = True, False
        self.told.value = '<span role="status">Working…</span>'
        loop = running_loop()

        def finish(act: Callable[[], None]) -> None:
            if loop is None:
                act()
            else:
                loop.call_soon_threadsafe(act)

        def wait() -> None:
            try:
                result = job.result()
            except Exception as error:
                failed = error
                finish(lambda: self._ended(job, failed=failed))
            else:
                finish(lambda: self._ended(job, result))

        self._thread = Thread(target=wait, daemon=True)
        self._thread.start()

    def _ended(self, job: Job, result: Any = None, failed: Exception | None = None) -> None:
        if job is not self.job:
            return
        self.job = None
        self.start.disabled, self.stop.disabled = False, True
        self.told.value = ""
        if failed is None:
            self._take(result)
        else:
            self.message.guard(_raising(failed))()

    def end(self) -> None:
        """End the child process."""
        if self.job is not None:
            self.job.stop()

    def drop(self) -> None:
        """End the child process, and take no more notice of it."""
        job, self.job = self.job, None
        if job is not None:
            job.stop()
        self.start.disabled, self.stop.disabled = False, True
        self.told.value = ""

    def wait(self) -> None:
        """Until the result is taken; where no event loop runs."""
        if self._thread is not None:
            self._thread.join()


def _raising(error: Exception) -> Callable[[], None]:
    def again() -> None:
        raise error

    return again


SOME_MINUTES = Budget(seconds=300.0)
