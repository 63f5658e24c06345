"""Pivot rules compared: every pair of rules from every start, beside what no rule can beat."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import groupby
from math import dist
from typing import Any

from polywalk.errors import WalkError
from polywalk.linear import Crash, Dictionary, dictionary_of
from polywalk.model import Model
from polywalk.progress import progress
from polywalk.region import Region, region
from polywalk.walks.comparison import Comparison
from polywalk.walks.order import ranks
from polywalk.walks.pivots import Pivot
from polywalk.walks.results import Walk
from polywalk.walks.rules import ENTERING, Rule, Rules, entering_rule, leaving_rule
from polywalk.walks.setting import check_numbers
from polywalk.walks.shared import looks_at_order, remembered, shared
from polywalk.walks.standings import Pair, Tally
from polywalk.walks.starts import Start, Starts, opened_at
from polywalk.walks.trace import follow
from polywalk.walks.yardsticks import Yardsticks, yardsticks

Asked = Any
"""An entering rule as ``walk`` takes it, or a pair (entering, leaving)."""


def compare(  # noqa: PLR0917 (the order of walk, as far as it goes)
    model: Model,
    rules: Sequence[Asked] | Asked | None = None,
    starts: Starts = None,
    leaving: str = "lowest-index",
    order: str | Sequence[str] | None = None,
    seed: int = 0,
    limit: int = 10_000,
) -> Comparison:
    """Walk with every rule from every start, and say which rule to trust.

    Longer work shows a progress bar in a notebook or a terminal. Ctrl-C keeps the walks that are finished: the
    comparison is returned with ``complete`` False and says so.

    Parameters
    ----------
    model : Model
        An integer-marked model is walked as its relaxation.
    rules : optional
        Entering rules as ``walk`` takes them, or pairs of an entering and a leaving rule; by default every entering
        rule there is.
    starts : None, "vertices", "bases" or sequence, optional
        None: at rest, as ``walk`` starts by default. "vertices": every vertex of the region, at the basis that
        holds the lowest indices active. "bases": every basis of every vertex. Else a list of starts as ``walk`` takes
        them.
    leaving : str, optional
        The leaving rule of those entering rules that are not given in a pair.
    order, seed, limit : optional
        As in ``walk``; every walk draws its lots from the same seed.

    Returns
    -------
    Comparison

    Raises
    ------
    WalkError
        An unknown rule, a start that is no vertex or basis, a region with a line, no start at all.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> print(pw.compare(pw.scenarios.klee_minty(3), rules=["dantzig", "bland"]).recommendation)
    recommendation: bland needs 5 pivots from rest (V0), fewer than any other. It holds for this model and these \
starts, and proves nothing for others.

    References
    ----------
    Moore, The shortest path through a maze, Proc. Int. Symp. on the Theory of Switching, 1959 (the shortest paths).
    Each rule names its own source (see `walk`); the ranking has no published source.
    """
    check_numbers(seed, limit)
    pairs = _pairs(rules, leaving)
    first = dictionary_of(model)
    rank, seen = ranks(first.slacks, order), region(model)
    jobs, started = _jobs(first, seen, starts, rank, pairs)
    rules_of = {pair: _rules(pair, rank, seed) for pair in pairs}
    tallies, complete, measured = list[Tally](), True, yardsticks(seen)
    try:
        for pair, start, opened in progress(jobs, len(jobs), "walks"):
            tallies.append(_tally(pair, start, _walked(model, opened, rules_of[pair], limit), measured))
    except KeyboardInterrupt:
        if not tallies:
            raise
        complete = False
    named = tuple(first.slacks.names[k] for k in sorted(range(first.slacks.auxiliary), key=rank.__getitem__))
    return Comparison(model, tuple(tallies), started, pairs, named, seed, limit, complete)


Job = tuple[Pair, Start, Crash]


def _jobs(
    first: Dictionary, seen: Region, starts: Starts, rank: Sequence[int], pairs: Sequence[Pair]
) -> tuple[list[Job], tuple[Start, ...]]:
    """Every pair from every start; pairs that look at the order of rows share dictionaries only with one another."""
    arranged = [any(looks_at_order(rule) for rule in _pair_of_rules(pair)) for pair in pairs]
    begun = {kind: opened_at(shared(first, kind), seen, starts, rank) for kind in sorted(set(arranged))}
    count = len(begun[arranged[0]])
    jobs = [(pair, *begun[kind][k]) for k in range(count) for pair, kind in zip(pairs, arranged, strict=True)]
    return jobs, tuple(start for start, _ in begun[arranged[0]])


def _pairs(rules: Sequence[Asked] | Asked | None, leaving: str) -> tuple[Pair, ...]:
    if rules is None:
        listed: list[Asked] = [rule.name for rule in ENTERING]
    else:
        listed = [rules] if isinstance(rules, str) or not isinstance(rules, Sequence) else list(rules)
    if not listed:
        raise WalkError("the list of rules is empty; leave rules out to compare all.", culprit=rules)
    given = [rule if isinstance(rule, tuple) else (rule, leaving) for rule in listed]
    return tuple(Pair(entering_rule(one).name, leaving_rule(other).name, (one, other)) for one, other in given)


def _pair_of_rules(pair: Pair) -> tuple[Rule, Rule]:
    return entering_rule(pair.given[0]), leaving_rule(pair.given[1])


def _rules(pair: Pair, rank: Sequence[int], seed: int) -> Rules:
    entering, leaving = _pair_of_rules(pair)
    return Rules(remembered(entering), remembered(leaving), rank, seed)


def _walked(model: Model, opened: Crash, rules: Rules, limit: int) -> Walk:
    begun = (model, rules.entering.name, rules.leaving.name, (), opened.swaps, opened.dictionary)
    if opened.contradiction is not None:
        return Walk(*begun, (), "infeasible")
    pivots, end, cycle = follow(opened.dictionary, rules, limit)
    return Walk(*begun, tuple(pivots), end, cycle)


def _tally(pair: Pair, start: Start, walked: Walk, measured: Yardsticks) -> Tally:
    kinds = [pivot.kind for pivot in walked.pivots]
    moved = [pivot for pivot, kind in zip(walked.pivots, kinds, strict=True) if kind == "step" and _moves(pivot)]
    here = start.vertex
    return Tally(
        pair,
        start,
        pivots=len(kinds) - kinds.count("ray"),
        moves=len(moved),
        stays=kinds.count("degenerate"),
        stall=max((len(list(run)) for kind, run in groupby(kinds) if kind == "degenerate"), default=0),
        length=sum(dist(pivot.point_before, pivot.point_after) for pivot in moved),
        end=walked.end,
        value=walked.value,
        shortest=None if here is None else measured.shortest[here],
        improving=None if here is None else measured.improving[here],
    )


def _moves(pivot: Pivot) -> bool:
    """Whether a pivot of some length changes the point; in Phase I it may change the auxiliary alone."""
    return pivot.phase == 2 or pivot.point_before != pivot.point_after
