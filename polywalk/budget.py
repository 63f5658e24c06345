"""Work that C code would not let anyone interrupt, done in a child process with a budget.

The child is ended within a second when the budget is spent or the user presses Ctrl-C; the kernel lives.
"""

from __future__ import annotations

import os
import pickle
import signal
import subprocess
import sys
from collections.abc import Callable
from contextlib import suppress
from dataclasses import dataclass
from typing import Any

from polywalk.errors import BudgetError


@dataclass(frozen=True)
class Budget:
    """What a piece of work may use.

    Parameters
    ----------
    seconds : float, optional
        Wall-clock time; a minute is what people wait for in a notebook.
    megabytes : int, optional
        Address space of the child; where the system cannot limit it (Windows, macOS) only the time counts.

    Examples
    --------
    >>> from polywalk.budget import Budget
    >>> Budget(seconds=5).megabytes
    4096
    """

    seconds: float = 60.0
    megabytes: int = 4096


def in_child(function: Callable[..., Any], *arguments: Any, budget: Budget, task: str, remedy: str) -> Any:
    """The function's result, computed in a child process.

    Parameters
    ----------
    function : callable
        Importable by module and name; arguments and result are pickled.
    budget : Budget
    task, remedy : str
        The message of the error: what was being done, with its size, and what to do instead.

    Raises
    ------
    BudgetError
        Time or memory ran out, or the child died.
    """
    return Job(function, *arguments, budget=budget, task=task, remedy=remedy).result()


_serving = False
"""Whether this process is itself such a child: its own children then stay in its session, and end with it."""


class Job:
    """Work in a child process that goes on while this one does something else.

    Parameters are those of `in_child`.

    Examples
    --------
    >>> from math import factorial
    >>> from polywalk.budget import Budget, Job
    >>> job = Job(factorial, 5, budget=Budget(seconds=30), task="5!", remedy="count by hand.")
    >>> job.result()
    120
    """

    def __init__(self, function: Callable[..., Any], *arguments: Any, budget: Budget, task: str, remedy: str) -> None:
        self._request = pickle.dumps((budget.megabytes, function.__module__, function.__qualname__, arguments))
        self._budget, self._task, self._remedy = budget, task, remedy
        command = [sys.executable, "-c", "from polywalk.budget import serve; serve()"]
        pipes = dict.fromkeys(("stdin", "stdout", "stderr"), subprocess.PIPE)
        self._child = subprocess.Popen(command, **pipes, start_new_session=not _serving)  # type: ignore[call-overload]
        self.stopped = False

    def stop(self) -> None:
        """End the child and whatever it started itself; ``result`` then raises BudgetError."""
        self.stopped = True
        self._kill()

    def result(self) -> Any:
        """Wait for the function's result; raises BudgetError as `in_child` does."""
        budget, task, remedy = self._budget, self._task, self._remedy
        with self._child as child:
            try:
                answer, trouble = child.communicate(self._request, timeout=budget.seconds)
            except subprocess.TimeoutExpired:
                self._kill()
                raise BudgetError(
                    f"{task} passed its budget of {budget.seconds:g} seconds; {remedy}", culprit=budget
                ) from None
            except BaseException:
                self._kill()
                raise
        if self.stopped:
            raise BudgetError(f"{task} was stopped; {remedy}", culprit=budget)
        if child.returncode != 0:
            last = trouble.decode(errors="replace").strip().splitlines()[-1:]
            reason = f"memory of {budget.megabytes} MB" if _out_of_memory(last, child.returncode) else "child process"
            said = f" ({last[0]})" if last else ""
            raise BudgetError(f"{task} ended early: its {reason} gave out{said}; {remedy}", culprit=budget)
        return pickle.loads(answer)

    def _kill(self) -> None:
        """The child leads a session of its own, so that a child of the child ends with it."""
        if hasattr(os, "killpg"):
            with suppress(ProcessLookupError):
                os.killpg(self._child.pid, signal.SIGKILL)
        self._child.kill()


def _out_of_memory(last: list[str], code: int) -> bool:
    return any("MemoryError" in line or "alloc" in line.lower() for line in last) or code == -6


def serve() -> None:
    """The child: read one request, do the work, write the result."""
    import importlib

    global _serving  # noqa: PLW0603 (told once, at the start of a process)
    _serving = True
    megabytes, module, name, arguments = pickle.load(sys.stdin.buffer)
    try:
        import resource

        resource.setrlimit(resource.RLIMIT_AS, (megabytes * 2**20, megabytes * 2**20))
    except (ImportError, ValueError, OSError):
        pass  # no such limit on this system: the time budget still holds
    result = getattr(importlib.import_module(module), name)(*arguments)
    sys.stdout.buffer.write(pickle.dumps(result))
