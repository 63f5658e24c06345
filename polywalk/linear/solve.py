"""From a model to its last dictionary: crash, Phase I, Phase II, all by Bland's rule and without records.

References
----------
Bland, New finite pivoting rules for the simplex method, Math. Oper. Res. 2, 1977.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from polywalk.linear.crash import crash
from polywalk.linear.dictionary import Dictionary, dictionary_of
from polywalk.linear.phase_one import most_violated, relaxed, step
from polywalk.model import Model

Outcome = Literal["optimal", "unbounded", "infeasible"]


@dataclass(frozen=True)
class Solved:
    """The last dictionary and what it proves.

    Parameters
    ----------
    outcome : {"optimal", "unbounded", "infeasible"}
    dictionary : Dictionary
    place : int or None
        Unbounded: the column whose slack grows for ever. Infeasible: the row that cannot be met (the auxiliary's,
        or a contradictory equality's).
    """

    outcome: Outcome
    dictionary: Dictionary
    place: int | None = None


def solve(model: Model) -> Solved:
    """The last dictionary of a model of any kind; a region with a line is fine."""
    start = crash(dictionary_of(model))
    if start.contradiction is not None:
        return Solved("infeasible", start.dictionary, start.contradiction)
    dictionary = start.dictionary
    if not dictionary.feasible:
        dictionary = _phase_one(dictionary)
        if dictionary.phase == 1:
            return Solved("infeasible", dictionary, dictionary.basic.index(dictionary.slacks.auxiliary))
    slope = _sloping_line(dictionary, start.lines)
    if slope is not None:
        return Solved("unbounded", dictionary, slope)
    dictionary, column = bland(dictionary)
    return Solved("optimal" if column is None else "unbounded", dictionary, column)


def bland(dictionary: Dictionary) -> tuple[Dictionary, int | None]:
    """Bland's rule to the end of the phase: the lowest index enters, the lowest index leaves.

    Returns
    -------
    dictionary : Dictionary
        The last one; Phase I ends as soon as the auxiliary leaves, and its column is dropped.
    column : int or None
        The column of a ray, None at an optimum.
    """
    phase = dictionary.phase
    while dictionary.phase == phase and (columns := dictionary.improving()):
        column = min(columns, key=dictionary.nonbasic.__getitem__)
        rows = dictionary.first_to_run_out(column)
        if not rows:
            return dictionary, column
        dictionary = step(dictionary, min(rows, key=dictionary.basic.__getitem__), column)
    return dictionary, None


def _phase_one(dictionary: Dictionary) -> Dictionary:
    """Feasible and without the auxiliary, or with the auxiliary at its least value above 0."""
    row = min(most_violated(dictionary), key=dictionary.basic.__getitem__)
    eased = relaxed(dictionary)
    return bland(eased.pivot(row, len(eased.nonbasic) - 1))[0]


def _sloping_line(dictionary: Dictionary, lines: tuple[int, ...]) -> int | None:
    """The column of a line along which the objective changes."""
    columns = (dictionary.nonbasic.index(index) for index in lines)
    return next((column for column in columns if dictionary.cost[column + 1]), None)
