"""Dictionaries that are pivoted once, however many walks pass through them."""

from __future__ import annotations

from dataclasses import dataclass, field, fields

from polywalk.linear import Dictionary
from polywalk.linear.slacks import Integers

Place = tuple[Integers, Integers, Integers]
"""Basic, nonbasic and relaxed slacks, in order: what tells the dictionaries of one model apart."""


@dataclass(frozen=True, repr=False)
class Shared(Dictionary):
    """A dictionary that keeps its neighbours and what it was asked.

    All that come from one another share ``met``: a basis reached again with the same arrangement of rows and columns
    is the same object, so that walks that meet share their work from there on. The entries of a dictionary follow from
    its basis and arrangement alone, therefore a shared walk is the walk it would have been.

    Parameters
    ----------
    met : dict
        Every dictionary so far, by its place.
    """

    met: dict[Place, Shared] = field(default_factory=dict, compare=False)
    _turns: dict[tuple[int, int], Shared] = field(default_factory=dict, init=False, compare=False)
    _ties: dict[int, list[int]] = field(default_factory=dict, init=False, compare=False)

    def pivot(self, row: int, column: int) -> Shared:
        """The dictionary after the pivot, made once."""
        if (row, column) not in self._turns:
            self._turns[row, column] = shared(super().pivot(row, column), self.met)
        return self._turns[row, column]

    def first_to_run_out(self, column: int) -> list[int]:
        """The ratio test, made once."""
        if column not in self._ties:
            self._ties[column] = super().first_to_run_out(column)
        return self._ties[column]


PLAIN = tuple(part.name for part in fields(Dictionary))


def shared(now: Dictionary, met: dict[Place, Shared] | None = None) -> Shared:
    """The dictionary as one of those met; itself, from now on, if it was not met before."""
    known = {} if met is None else met
    place = (now.basic, now.nonbasic, now.relaxed_slacks)
    if place not in known:
        known[place] = Shared(**{name: getattr(now, name) for name in PLAIN}, met=known)
    return known[place]
