"""The walk itself: find entering, ratio test, pivot, and keep every step."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import Any

from polywalk.errors import WalkError, unknown
from polywalk.exact import Row
from polywalk.linear import Dictionary, dictionary_of
from polywalk.linear.phase_one import most_violated, relaxed, step
from polywalk.model import Model
from polywalk.walks.dual import DUAL_LEAVING, Way, follow_dual
from polywalk.walks.dual_pivots import DualGoal
from polywalk.walks.order import ranks
from polywalk.walks.pivots import Pivot
from polywalk.walks.results import End, Walk
from polywalk.walks.rules import PHASES_ONE, PhaseOne, Rule, Rules, entering_rule, leaving_rule
from polywalk.walks.setting import check_numbers, least_of_those_held
from polywalk.walks.start import first_dictionary


def walk(  # noqa: PLR0917 (the order is the published one)
    model: Model,
    rule: str | Callable[..., int] = "dantzig",
    leaving: str | Callable[..., int] = "lowest-index",
    order: str | Sequence[str] | None = None,
    start: object = None,
    seed: int = 0,
    limit: int = 10_000,
    *,
    start_objective: Sequence[object] | Mapping[str, object] | None = None,
    phase_one: PhaseOne = "auxiliary",
) -> Walk:
    """Follow a pivot rule from a start to its end.

    Free decisions and equalities are first pivoted out of the way (the crash phase; its pivots are listed apart, as
    ``Walk.crash``, and not counted). Without a start the walk begins at rest, where every bounded decision is at its
    lower bound, or at its upper one if it has no lower; where that is not feasible, Phase I comes first and is part of
    the walk. An integer-marked model is walked as its relaxation.

    Parameters
    ----------
    model : Model
    rule : optional
        The entering rule: "dantzig", "bland", "greatest-improvement", "steepest-edge", "steepest-edge-decisions",
        "random-edge", "shadow-vertex", or a function ``(dictionary, columns) -> column`` (see
        ``polywalk.walks.rules``).
    leaving : optional
        The leaving rule, for ties of the ratio test: "lowest-index", "lexicographic", "first-row", "largest-pivot",
        "random", or a function ``(dictionary, column, rows) -> row``. Any two rules go together.
    order : str or sequence of str, optional
        The index order: "decisions first" (default), "slacks first", "interleaved", or all slack names, lowest first.
        A decision's own slack has the decision's name, any other slack its constraint's name.
    start : optional
        A vertex of the region (its number in ``region(model).vertices``, or the vertex), a point that is a vertex (n
        numbers, or a mapping), or the names of n constraints held active (a basis). Of the bases of a degenerate vertex
        the one with the lowest indices held active is taken.
    seed : int, optional
        For rules that draw lots: the same seed gives the same walk.
    limit : int, optional
        The most pivots to make.
    start_objective : (n,) sequence or mapping, optional
        For the shadow-vertex rule: the coefficients of an objective, of the model's own sense, for which the start is
        optimal; decisions left out of a mapping count 0.
    phase_one : {"auxiliary", "dual"}, optional
        How a start outside the region is brought inside: by an auxiliary variable that is driven to 0, or by the dual
        simplex method (``DualPivot``), lowest index first, with the objective if rest is dual feasible for it, else
        with minus the sum of the slacks at rest in its place; the rule then goes on from there.

    Returns
    -------
    Walk

    Raises
    ------
    WalkError
        An unknown rule, a rule that chooses what it may not, a start that is no vertex or basis or not optimal for the
        start objective, a region with a line, a seed or limit that is no whole number.
    BudgetError
        A start by its vertex, of which there are too many to list.

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

    References
    ----------
    Dantzig, Linear Programming and Extensions, 1963; Chvátal, Linear Programming, 1983, chapters 2 and 3 (dictionaries;
    Phase I by an auxiliary variable); Vanderbei, Linear Programming: Foundations and Extensions, chapter 5 (Phase I by
    the dual method; from memory). Each rule names its own source in ``polywalk.walks.entering`` and
    ``polywalk.walks.leaving``.
    """
    check_numbers(seed, limit)
    opened = dictionary_of(model)
    entering, tie = entering_rule(rule), leaving_rule(leaving)
    toward = _toward(model, entering, start_objective)
    if phase_one not in PHASES_ONE:
        raise WalkError(str(unknown("Phase I", phase_one, PHASES_ONE, "polywalk")), culprit=phase_one)
    rules = Rules(entering, tie, ranks(opened.slacks, order), seed, toward, phase_one)
    begun = first_dictionary(opened, start, rules.rank)
    first = begun.dictionary
    pivots, end, cycle = ([], "infeasible", ()) if begun.contradiction is not None else follow(first, rules, limit)
    indices = sorted(range(first.slacks.auxiliary), key=rules.rank.__getitem__)
    named = tuple(first.slacks.names[k] for k in indices)
    names = rules.entering.name, rules.leaving.name
    return Walk(model, *names, named, begun.swaps, first, tuple(pivots), end, cycle)


def _toward(model: Model, entering: Rule, start_objective: Any) -> Row | None:
    if start_objective is None:
        return None
    if entering.name != "shadow-vertex":
        raise WalkError(
            f"a start objective is for the shadow-vertex rule only, got it for {entering.name!r}; leave it out.",
            culprit=start_objective,
        )
    if isinstance(start_objective, Mapping):
        return model.point(dict.fromkeys(model.variables, 0) | dict(start_objective))
    if isinstance(start_objective, str) or not hasattr(start_objective, "__iter__"):
        raise WalkError(
            f"expected as start objective the coefficients of the decisions, got {start_objective!r}; give a number "
            f"for each of {', '.join(model.variables)}, or a mapping of some of them.",
            culprit=start_objective,
        )
    return model.point(start_objective)


def follow(now: Dictionary, rules: Rules, limit: int) -> tuple[list[Pivot], End, tuple[Pivot, ...]]:
    """Pivot until the rule has nothing to choose, nothing runs out, a state comes back, or the limit is reached.

    Between two steps the walk cycles exactly if a state that the pair of rules depends on comes back.
    """
    pivots, lots = list[Pivot](), rules.lots()
    if not now.feasible and rules.phase_one == "dual":
        pivots, reached, cycle = follow_dual(now, Way(DUAL_LEAVING[1], rules.rank, limit, stage=1), _dual_goal(now))
        if reached != "inside":
            return pivots, reached, cycle
        now = pivots[-1].after
    elif not now.feasible:
        if limit == 0:
            return pivots, "stopped", ()
        pivots.append(_auxiliary_enters(now, rules))
        now = pivots[0].after
    choose = rules.begin(now, lots)
    met = {rules.state(now): len(pivots)}
    while (pivot := _next(now, len(pivots) + 1, rules, choose)) is not None:
        if len(pivots) == limit:
            return pivots, "stopped", ()
        pivots.append(pivot)
        if pivot.row is None:
            return pivots, "unbounded", ()
        if len(pivot.after.nonbasic) < len(now.nonbasic):  # the auxiliary's column is gone: Phase II begins
            choose = rules.begin(pivot.after, lots)
        if now.rows[pivot.row][0]:
            met.clear()  # nothing met before a step comes back: the objective has changed for good
        now = pivot.after
        state = rules.state(now)
        if state is not None and state in met:
            return pivots, "cycling", tuple(pivots[met[state] :])
        met[state] = len(pivots)
    return pivots, "optimal" if now.phase == 2 else "infeasible", ()


def _dual_goal(now: Dictionary) -> DualGoal:
    """The model's own objective where it is dual feasible, else minus the sum of the slacks held at 0.

    References
    ----------
    Vanderbei, Linear Programming: Foundations and Extensions, chapter 5 (another objective for Phase I; from memory).
    """
    return DualGoal(*least_of_those_held(now)) if now.improving() else DualGoal()


Choices = tuple[Callable[..., int], Callable[..., int]]


def _next(now: Dictionary, number: int, rules: Rules, choose: Choices) -> Pivot | None:
    """The pivot the rules choose; None where no slack improves the objective."""
    enter, leave = choose
    rank = rules.rank
    columns = now.improving()
    if not columns:
        return None
    columns.sort(key=lambda j: rank[now.nonbasic[j]])
    column = enter(now, columns)
    rows = now.first_to_run_out(column)
    if not rows:
        return Pivot(number, now, now, column, None, rules)
    row = rows[0]
    if len(rows) > 1:
        row = leave(now, column, sorted(rows, key=lambda i: rank[now.basic[i]]))
    return Pivot(number, now, step(now, row, column), column, row, rules)


def _auxiliary_enters(now: Dictionary, rules: Rules) -> Pivot:
    """Phase I begins: the auxiliary enters for the slack that is short by the most (ties: the lowest index)."""
    row = min(most_violated(now), key=lambda i: rules.rank[now.basic[i]])
    eased = relaxed(now)
    column = len(eased.nonbasic) - 1
    return Pivot(1, eased, step(eased, row, column), column, row, rules)
