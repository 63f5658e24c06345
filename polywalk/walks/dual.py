"""The dual simplex walk: from a dual feasible basis outside the region to the optimum, or to a proof that it is empty.

As long as a slack is negative, one of them leaves and goes up to 0; the dual ratio test lets enter what costs the
objective the least for it, so that no slack ever improves the objective. Where nothing can help a negative slack, the
region is empty.

References
----------
Lemke, The dual method of solving the linear programming problem, Naval Res. Logist. Quart. 1, 1954.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import replace
from fractions import Fraction
from typing import Literal, NamedTuple

from polywalk.errors import WalkError, unknown
from polywalk.linear import Dictionary, dictionary_of
from polywalk.linear.phase_one import most_violated
from polywalk.linear.solve import bland
from polywalk.model import Model
from polywalk.walks.dual_pivots import DualGoal, DualPivot
from polywalk.walks.order import ranks
from polywalk.walks.pivots import Pivot
from polywalk.walks.results import End, Walk
from polywalk.walks.setting import check_numbers
from polywalk.walks.start import first_dictionary


def largest_violation(dictionary: Dictionary, rows: Sequence[int]) -> int:
    """The slack that is short by the most, as typed; ties: the lowest index. It may cycle (Beale 1955).

    References
    ----------
    Lemke 1954; Beale, Cycling in the dual simplex algorithm, Naval Res. Logist. Quart. 2, 1955.
    """
    worst = most_violated(dictionary)
    return next(row for row in rows if row in worst)


def lowest_index(dictionary: Dictionary, rows: Sequence[int]) -> int:
    """The negative slack with the lowest index; never cycles.

    References
    ----------
    Bland, New finite pivoting rules for the simplex method, Math. Oper. Res. 2, 1977 (his rule, in the dual).
    """
    return rows[0]


class DualRule(NamedTuple):
    """A rule that chooses which negative slack leaves, under the name people ask for it."""

    name: str
    choose: Callable[[Dictionary, Sequence[int]], int]


DUAL_LEAVING = (DualRule("largest-violation", largest_violation), DualRule("lowest-index", lowest_index))


def dual_walk(
    model: Model,
    leaving: str = "largest-violation",
    order: str | Sequence[str] | None = None,
    start: object = None,
    limit: int = 10_000,
) -> Walk:
    """Walk by the dual simplex method, through basic points outside the region.

    Parameters
    ----------
    model : Model
    leaving : {"largest-violation", "lowest-index"}, optional
        Which negative slack leaves. What enters is decided by the dual ratio test, ties by the lowest index.
        "lowest-index" is finite.
    order : str or sequence of str, optional
        The index order, as for ``walk``.
    start : optional
        The names of n constraints held active (a basis, inside the region or outside) where no slack improves the
        objective; by default rest, as for ``walk``.
    limit : int, optional
        The most pivots to make.

    Returns
    -------
    Walk
        Its rule is called "dual", its pivots are ``DualPivot``; it ends "optimal", "infeasible" (the proof is
        ``Walk.infeasibility``), "cycling" or "stopped".

    Raises
    ------
    WalkError
        A start that is no basis or not dual feasible (the message names one that is), an unknown rule, a region with
        a line.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(minimize="3*x + 2*y", constraints={"need": "x + y >= 3", "mix": "x >= y - 1"},
    ...                         bounds={"x": (0, None), "y": (0, None)})
    >>> print(pw.dual_walk(model))
    dual from (0, 0): optimal at (1, 2) after 2 pivots (0 of them degenerate)
    pivot  phase  entering  leaving  step  kind  objective  point
    1      dual   y         need     3     step  6          (0, 3)
    2      dual   x         mix      1     step  7          (1, 2)

    References
    ----------
    Lemke, The dual method of solving the linear programming problem, Naval Res. Logist. Quart. 1, 1954; Bland, New
    finite pivoting rules for the simplex method, Math. Oper. Res. 2, 1977 ("lowest-index", in the dual).
    """
    check_numbers(0, limit)
    opened, rule = dictionary_of(model), _dual_rule(leaving)
    rank = ranks(opened.slacks, order)
    begun = first_dictionary(opened, start, rank, inside=False)
    first, way = begun.dictionary, Way(rule, rank, limit)
    if begun.contradiction is not None:
        end: End = "infeasible"
        pivots, cycle = list[Pivot](), tuple[Pivot, ...]()
    else:
        _check_dual_feasible(first)
        pivots, reached, cycle = follow_dual(first, way, DualGoal())
        end = "optimal" if reached == "inside" else reached
    indices = sorted(range(first.slacks.auxiliary), key=rank.__getitem__)
    named = tuple(first.slacks.names[k] for k in indices)
    return Walk(model, "dual", rule.name, named, begun.swaps, first, tuple(pivots), end, cycle)


def _dual_rule(name: object) -> DualRule:
    for rule in DUAL_LEAVING:
        if rule.name == name:
            return rule
    known = [rule.name for rule in DUAL_LEAVING]
    raise WalkError(str(unknown("dual leaving rule", name, known, "polywalk")), culprit=name)


def _check_dual_feasible(first: Dictionary) -> None:
    """Raises WalkError, with a dual feasible basis as the remedy where there is one."""
    improving = first.improving()
    if not improving:
        return
    name, names = first.slacks.names[first.nonbasic[improving[0]]], _dual_feasible(first)
    remedy = f"start at a basis that is, such as start={names!r}" if names else "no basis is; use walk(model) instead"
    raise WalkError(f"the start is not dual feasible: {name!r} would improve the objective; {remedy}.", culprit=name)


def _dual_feasible(first: Dictionary) -> tuple[str, ...]:
    """The constraints of a dual feasible basis; empty where there is none.

    It is an optimal one of the same model with right-hand sides that make the first dictionary feasible: what is dual
    feasible does not depend on them.
    """
    last, column = bland(replace(first, rows=tuple((abs(line[0]), *line[1:]) for line in first.rows)))
    model, items = first.slacks.model, first.slacks.items
    places = sorted(place for k in last.nonbasic if (place := items[k].constraint) is not None)
    return tuple(model.constraints[place].name for place in places) if column is None and len(places) == model.n else ()


# the walk itself


class Way(NamedTuple):
    """How a dual walk goes: what leaves, the index order, how far at most, and whether it is a Phase I."""

    rule: DualRule
    rank: Sequence[int]
    limit: int
    stage: int = 2


Reached = Literal["inside", "infeasible", "cycling", "stopped"]


def follow_dual(now: Dictionary, way: Way, goal: DualGoal) -> tuple[list[Pivot], Reached, tuple[Pivot, ...]]:
    """Pivot until no slack is negative, one cannot be helped, a basis comes back, or the limit is reached."""
    pivots, met = list[Pivot](), {frozenset(now.basic): 0}
    while short := [i for i, line in now.blocking_rows() if line[0] < 0]:
        row = way.rule.choose(now, sorted(short, key=lambda i: way.rank[now.basic[i]]))
        gains = goal.row(now)
        column = _cheapest(now, row, gains, way.rank)
        if column is None:
            return pivots, "infeasible", ()
        if len(pivots) == way.limit:
            return pivots, "stopped", ()
        after = now.pivot(row, column)
        number = len(pivots) + 1
        pivots.append(DualPivot(number, now, after, column, row, None, goal, way.rule.name, way.stage))
        now = after
        if gains[column + 1]:
            met.clear()  # the objective in use has changed for good
        basis = frozenset(now.basic)
        if basis in met:
            return pivots, "cycling", tuple(pivots[met[basis] :])
        met[basis] = len(pivots)
    return pivots, "inside", ()


def _cheapest(now: Dictionary, row: int, gains: Sequence[int], rank: Sequence[int]) -> int | None:
    """The dual ratio test: of the columns that raise the row, the one that costs least (ties: the lowest index)."""
    line, may = now.rows[row], now.slacks.pivots
    able = [j for j, k in enumerate(now.nonbasic) if line[j + 1] > 0 and may[k]]
    return min(able, key=lambda j: (Fraction(-gains[j + 1], line[j + 1]), rank[now.nonbasic[j]]), default=None)
