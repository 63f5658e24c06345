"""Work that C code would not let anyone interrupt, done in a child process with a budget.

The child is ended within a second when the budget is spent or the user presses Ctrl-C; the kernel lives.
"""

from __future__ import annotations

import pickle
import subprocess
import sys
from collections.abc import Callable
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
    request = pickle.dumps((budget.megabytes, function.__module__, function.__qualname__, arguments))
    command = [sys.executable, "-c", "from polywalk.budget import serve; serve()"]
    with subprocess.Popen(command, stdin=subprocess.PIPE, stdout=subprocess.PIPE, stderr=subprocess.PIPE) as child:
        try:
            answer, trouble = child.communicate(request, timeout=budget.seconds)
        except subprocess.TimeoutExpired:
            child.kill()
            raise BudgetError(
                f"{task} passed its budget of {budget.seconds:g} seconds; {remedy}", culprit=budget
            ) from None
        except BaseException:
            child.kill()
            raise
    if child.returncode != 0:
        last = trouble.decode(errors="replace").strip().splitlines()[-1:]
        reason = f"memory of {budget.megabytes} MB" if _out_of_memory(last, child.returncode) else "child process"
        said = f" ({last[0]})" if last else ""
        raise BudgetError(f"{task} ended early: its {reason} gave out{said}; {remedy}", culprit=budget)
    return pickle.loads(answer)


def _out_of_memory(last: list[str], code: int) -> bool:
    return any("MemoryError" in line or "alloc" in line.lower() for line in last) or code == -6


def serve() -> None:
    """The child: read one request, do the work, write the result."""
    import importlib

    megabytes, module, name, arguments = pickle.load(sys.stdin.buffer)
    try:
        import resource

        resource.setrlimit(resource.RLIMIT_AS, (megabytes * 2**20, megabytes * 2**20))
    except (ImportError, ValueError, OSError):
        pass  # no such limit on this system: the time budget still holds
    result = getattr(importlib.import_module(module), name)(*arguments)
    sys.stdout.buffer.write(pickle.dumps(result))
