"""The walk itself: find entering, ratio test, pivot, and keep every step."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from polywalk.errors import WalkError
from polywalk.linear import Dictionary, dictionary_of
from polywalk.linear.phase_one import most_violated, relaxed, step
from polywalk.model import Model
from polywalk.walks.order import ranks
from polywalk.walks.pivots import Pivot
from polywalk.walks.results import End, Walk
from polywalk.walks.rules import Entering, Leaving, entering_rule, leaving_rule
from polywalk.walks.start import first_dictionary


def walk(  # noqa: PLR0917 (the order is the published one)
    model: Model,
    rule: str = "dantzig",
    leaving: str = "lowest-index",
    order: str | Sequence[str] | None = None,
    start: object = None,
    seed: int = 0,
    limit: int = 10_000,
) -> Walk:
    """Follow a pivot rule from a start to its end.

    Free decisions and equalities are first pivoted out of the way (the crash phase; its pivots are listed apart, as
    ``Walk.crash``, and not counted). Without a start the walk begins at rest, where every bounded decision is at its
    lower bound, or at its upper one if it has no lower; where that is not feasible, Phase I comes first and is part of
    the walk. An integer-marked model is walked as its relaxation.

    Parameters
    ----------
    model : Model
    rule : {"dantzig", "bland"}, optional
        The entering rule.
    leaving : {"lowest-index"}, optional
        The leaving rule, for ties of the ratio test.
    order : str or sequence of str, optional
        The index order: "decisions first" (default), "slacks first", "interleaved", or all slack names, lowest first.
        A decision's own slack has the decision's name, any other slack its constraint's name.
    start : optional
        A vertex of the region (its number in ``region(model).vertices``, or the vertex), a point that is a vertex (n
        numbers, or a mapping), or the names of n constraints held active (a basis). Of the bases of a degenerate vertex
        the one with the lowest indices held active is taken.
    seed : int, optional
        For rules that draw lots; the present ones do not.
    limit : int, optional
        The most pivots to make.

    Returns
    -------
    Walk

    Raises
    ------
    WalkError
        An unknown rule, a start that is no vertex or basis, a region with a line.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "2*x + y <= 4"},
    ...                         bounds={"x": (0, None), "y": (0, 3)})
    >>> print(pw.walk(model))
    dantzig from (0, 0): optimal at (0.5, 3) after 2 pivots (0 of them degenerate)
    pivot  phase  entering  leaving  step  kind  objective  point
    1      2      x         labour   2     step  6          (2, 0)
    2      2      y         y upper  3     step  7.5        (0.5, 3)
    """
    opened = dictionary_of(model)
    rules = _Rules(entering_rule(rule).choose, leaving_rule(leaving).choose, ranks(opened.slacks, order))
    if isinstance(limit, bool) or not isinstance(limit, int) or limit < 0:
        raise WalkError(f"expected as limit a number of pivots, 0 or more, got {limit!r}.", culprit=limit)
    begun = first_dictionary(opened, start, rules.rank)
    first = begun.dictionary
    pivots, end, cycle = ([], "infeasible", ()) if begun.contradiction is not None else _follow(first, rules, limit)
    indices = sorted(range(first.slacks.auxiliary), key=rules.rank.__getitem__)
    named = tuple(first.slacks.names[k] for k in indices)
    return Walk(model, rule, leaving, named, begun.swaps, first, tuple(pivots), end, cycle)


class _Rules(NamedTuple):
    entering: Entering
    leaving: Leaving
    rank: Sequence[int]


def _follow(now: Dictionary, rules: _Rules, limit: int) -> tuple[list[Pivot], End, tuple[Pivot, ...]]:
    """Pivot until the rule has nothing to choose, nothing runs out, a basis comes back, or the limit is reached.

    The rules depend on the basis alone, so that the walk cycles exactly if a basis comes back.
    """
    pivots: list[Pivot] = []
    met = {frozenset(now.basic): 0}
    while (pivot := _next(now, len(pivots) + 1, rules)) is not None:
        if len(pivots) == limit:
            return pivots, "stopped", ()
        pivots.append(pivot)
        now = pivot.after
        if pivot.kind == "ray":
            return pivots, "unbounded", ()
        if pivot.kind == "step":
            met.clear()  # no basis met before a step comes back: the objective has changed for good
        basis = frozenset(now.basic)
        if basis in met:
            return pivots, "cycling", tuple(pivots[met[basis] :])
        met[basis] = len(pivots)
    return pivots, "optimal" if now.phase == 2 else "infeasible", ()


def _next(now: Dictionary, number: int, rules: _Rules) -> Pivot | None:
    """The pivot the rules choose; None where no slack improves the objective."""
    if number == 1 and not now.feasible:
        return _auxiliary_enters(now, rules)
    columns = sorted(now.improving(), key=lambda j: rules.rank[now.nonbasic[j]])
    if not columns:
        return None
    column = rules.entering(now, columns)
    rows = now.first_to_run_out(column)
    if not rows:
        return Pivot(number, now, now, column, None)
    row = rules.leaving(now, column, sorted(rows, key=lambda i: rules.rank[now.basic[i]]))
    return Pivot(number, now, step(now, row, column), column, row)


def _auxiliary_enters(now: Dictionary, rules: _Rules) -> Pivot:
    """Phase I begins: the auxiliary enters for the slack that is short by the most (ties: the lowest index)."""
    row = min(most_violated(now), key=lambda i: rules.rank[now.basic[i]])
    eased = relaxed(now)
    column = len(eased.nonbasic) - 1
    return Pivot(1, eased, step(eased, row, column), column, row)
