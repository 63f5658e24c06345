"""Pivot rules, each as its textbook states it. An entering rule picks a column, a leaving rule a row.

Both are plain functions of the dictionary and of what may be chosen, in index order, so that the first choice is the
lowest index. A rule returns one of its choices and changes nothing.

    entering(dictionary, columns) -> column
    leaving(dictionary, column, rows) -> row

``columns`` are those whose slack improves the objective as it grows (in Phase I: lowers the auxiliary), never empty;
``rows`` those that the ratio test ties, never empty. ``Dictionary`` tells what a rule may ask.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from polywalk.errors import WalkError, unknown
from polywalk.linear import Dictionary

Entering = Callable[[Dictionary, Sequence[int]], int]
Leaving = Callable[[Dictionary, int, Sequence[int]], int]


def dantzig(dictionary: Dictionary, columns: Sequence[int]) -> int:
    """The column with the largest reduced cost, in the slacks as typed; ties: the lowest index.

    Multiplying a constraint by a number changes its slack's reduced cost, and so may change the walk. With
    lowest-index leaving it may cycle at a degenerate vertex (Beale 1955); without degeneracy it is finite.

    References
    ----------
    Dantzig, Maximization of a linear function of variables subject to linear inequalities, 1951;
    Linear Programming and Extensions, 1963.
    """
    return max(columns, key=dictionary.gain)  # of equal gains max keeps the first


def bland(dictionary: Dictionary, columns: Sequence[int]) -> int:
    """The column with the lowest index. With lowest-index leaving it never cycles.

    References
    ----------
    Bland, New finite pivoting rules for the simplex method, Math. Oper. Res. 2, 1977.
    """
    return columns[0]


def lowest_index(dictionary: Dictionary, column: int, rows: Sequence[int]) -> int:
    """Of the tied rows the one with the lowest index; finite together with Bland's entering rule.

    References
    ----------
    Bland, New finite pivoting rules for the simplex method, Math. Oper. Res. 2, 1977.
    """
    return rows[0]


@dataclass(frozen=True)
class EnteringRule:
    """An entering rule under the name people ask for it."""

    name: str
    choose: Entering


@dataclass(frozen=True)
class LeavingRule:
    """A leaving rule under the name people ask for it."""

    name: str
    choose: Leaving


ENTERING = (EnteringRule("dantzig", dantzig), EnteringRule("bland", bland))
LEAVING = (LeavingRule("lowest-index", lowest_index),)


def entering_rule(name: str) -> EnteringRule:
    """The entering rule of that name; raises WalkError."""
    for rule in ENTERING:
        if rule.name == name:
            return rule
    raise _unknown("entering rule", name, [rule.name for rule in ENTERING])


def leaving_rule(name: str) -> LeavingRule:
    """The leaving rule of that name; raises WalkError."""
    for rule in LEAVING:
        if rule.name == name:
            return rule
    raise _unknown("leaving rule", name, [rule.name for rule in LEAVING])


def _unknown(kind: str, name: object, known: list[str]) -> WalkError:
    return WalkError(str(unknown(kind, name, known, "polywalk")), culprit=name)
