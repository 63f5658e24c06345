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
    dictionary, column = bland(_eased(start.dictionary))
    if dictionary.phase == 1:
        return Solved("infeasible", dictionary, dictionary.basic.index(dictionary.slacks.auxiliary))
    if column is None:
        column = _sloping_line(dictionary, start.lines)
    return Solved("optimal" if column is None else "unbounded", dictionary, column)


def bland(dictionary: Dictionary) -> tuple[Dictionary, int | None]:
    """Bland's rule to the end, through Phase I where the auxiliary is basic: lowest index enters, lowest index leaves.

    Returns
    -------
    dictionary : Dictionary
        The last one; still with the auxiliary where it cannot be driven to zero.
    column : int or None
        The column of a ray, None where nothing improves.
    """
    while columns := dictionary.improving():
        column = min(columns, key=dictionary.nonbasic.__getitem__)
        rows = dictionary.first_to_run_out(column)
        if not rows:
            return dictionary, column
        dictionary = step(dictionary, min(rows, key=dictionary.basic.__getitem__), column)
    return dictionary, None


def _eased(dictionary: Dictionary) -> Dictionary:
    """Feasible as it is, or made so by the auxiliary variable."""
    if dictionary.feasible:
        return dictionary
    row = min(most_violated(dictionary), key=dictionary.basic.__getitem__)
    eased = relaxed(dictionary)
    return eased.pivot(row, len(eased.nonbasic) - 1)


def _sloping_line(dictionary: Dictionary, lines: tuple[int, ...]) -> int | None:
    """The column of a line along which the objective changes."""
    columns = (dictionary.nonbasic.index(index) for index in lines)
    return next((column for column in columns if dictionary.cost[column + 1]), None)
