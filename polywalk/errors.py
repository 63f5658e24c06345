"""Every error polywalk raises on purpose: one base, a few kinds, each carrying its culprit.

A message says what was expected, what came, where, and what to do about it. Infeasible, unbounded and
degenerate models are answers, not errors.
"""

from __future__ import annotations

from collections.abc import Iterable
from difflib import get_close_matches


class PolywalkError(Exception):
    """Base of all errors raised on purpose.

    Parameters
    ----------
    message : str
        What was expected, what came, where, and the remedy.
    culprit : object, optional
        The name, value or text that caused it, for programs that want to act on it.

    Examples
    --------
    >>> import polywalk as pw
    >>> try:
    ...     pw.exact("three")
    ... except pw.PolywalkError as error:
    ...     print(error.culprit)
    three
    """

    def __init__(self, message: str, culprit: object = None) -> None:
        super().__init__(message)
        self.culprit = culprit

    def __str__(self) -> str:  # KeyError would print its message in quotes
        return str(self.args[0])


class NumberError(PolywalkError, ValueError):
    """A value that is no finite number; ``culprit`` is the value."""


class UnknownName(PolywalkError, KeyError):
    """A name that is not in the model; ``culprit`` is the name."""


class DuplicateName(PolywalkError, ValueError):
    """A name given twice; ``culprit`` is the name."""


class ModelError(PolywalkError, ValueError):
    """Parts that do not make a model (wrong lengths, no variable, a bound above its partner)."""


class LargeModelError(ModelError, AttributeError):
    """A large sparse model where the exact small one is needed; ``culprit`` is what was asked of it."""


class AlgebraError(PolywalkError, ValueError):
    """Text that is not linear algebra; ``culprit`` is the text, ``place`` the column it went wrong (from 0)."""

    def __init__(self, message: str, culprit: object = None, place: int | None = None) -> None:
        super().__init__(message, culprit)
        self.place = place


class WalkError(PolywalkError, ValueError):
    """A walk that cannot start as asked (unknown rule, a start that is no vertex or basis, a region with a line)."""


class DrawingError(PolywalkError, ValueError):
    """A picture that cannot be made as asked (too many axes, an unknown file ending)."""


class ExpectationError(PolywalkError, AssertionError):
    """A stated expectation of a model that its review does not bear out; ``culprit`` holds the expectations' names."""


class SolverError(PolywalkError, RuntimeError):
    """HiGHS is missing, refused a model, or stopped without an answer."""


class FileError(PolywalkError, ValueError):
    """A file that cannot be read or written; ``culprit`` is its path, ``line`` where it went wrong (from 1)."""

    def __init__(self, message: str, culprit: object = None, line: int | None = None) -> None:
        super().__init__(message, culprit)
        self.line = line


class BudgetError(PolywalkError, RuntimeError):
    """Work that was ended because it passed its budget of seconds or memory."""


def unknown(kind: str, name: object, known: Iterable[str], where: str = "the model") -> UnknownName:
    """The error for a name that is not there, with the nearest known names as the remedy."""
    names = list(known)
    near = get_close_matches(str(name), names, n=3, cutoff=0.5)
    shown = near or names[:8]
    more = "" if near or len(names) <= 8 else f" and {len(names) - 8} more"
    hint = f"did you mean {_listed(near)}?" if near else f"it has {_listed(shown)}{more}." if shown else "it has none."
    return UnknownName(f"{where} has no {kind} {name!r}; {hint}", culprit=name)


def _listed(names: list[str]) -> str:
    return ", ".join(repr(name) for name in names)
