"""Every rule by its definition, every pair against the optimum, lots by their seed, rules of one's own."""

from __future__ import annotations

from collections import Counter
from fractions import Fraction
from itertools import product
from random import Random

import numpy as np
import pytest
from small import klee_minty, le, random_degenerate, random_model, typed

from polywalk.errors import ModelError, UnknownName, WalkError
from polywalk.linear import crash, dictionary_of, optimum
from polywalk.walks import ENTERING, LEAVING, walk
from polywalk.walks.rules import Rules, entering_rule, leaving_rule

NAMES, TIES = [rule.name for rule in ENTERING], [rule.name for rule in LEAVING]
PAIRS = list(product(NAMES, TIES))
CERTAIN = {(rule, "lexicographic") for rule in NAMES} | {("bland", "lowest-index")}
LOTS = {pair for pair in PAIRS if "random-edge" in pair or "random" in pair}


def random_models(count: int):
    """Models whose region has a vertex, or is empty: of three kinds, degenerate ones more often than not."""
    draw, found = Random(29), 0
    while found < count:
        model = random_model(draw) if draw.random() < 0.6 else random_degenerate(draw)
        best = optimum(model)
        if best.outcome == "infeasible" or not crash(dictionary_of(model)).lines:
            found += 1
            yield model, best


def test_every_rule_ends_at_the_optimum_of_500_random_models():
    """Each model under every entering and every leaving rule, in pairs that change; stated minimums of each kind."""
    met, cycles = Counter(), Counter()
    for number, (model, best) in enumerate(random_models(500)):
        for k, rule in enumerate(NAMES):
            pair = (rule, TIES[(number + k) % len(TIES)])
            walked = walk(model, *pair, seed=number)
            if walked.end == "cycling":
                assert pair not in CERTAIN | LOTS
                cycles[pair] += 1
                continue
            assert walked.end == best.outcome, (number, pair)
            assert best.value is None or walked.value == best.value
            met[pair] += 1
            met["stays"] += walked.stays > 0
            met["ties"] += any(len(p.before.first_to_run_out(p.column)) > 1 for p in walked.pivots)
        met[best.outcome] += 1
    least = {"optimal": 150, "unbounded": 60, "infeasible": 60, "stays": 500, "ties": 500} | dict.fromkeys(PAIRS, 90)
    assert not {name: met[name] for name, count in least.items() if met[name] < count}, (met, cycles)


def norm(pivot, name: str, over: tuple[str, ...]) -> Fraction:
    """The squared length of a unit step of a slack, over the slacks named, from the dictionary's rates."""
    now = pivot.before
    column = pivot.active_before.index(name)
    rates = {other: now.rate(i, column) for i, other in enumerate(pivot.basis_before)} | {name: Fraction(1)}
    return sum((rates.get(other, Fraction(0)) ** 2 for other in over), Fraction(0))


@pytest.mark.parametrize("rule", ["greatest-improvement", "steepest-edge", "steepest-edge-decisions"])
def test_rules_that_measure_choose_the_largest_by_the_records(rule):
    """In Phase II, on models in x >= 0, where the slacks of the decisions are the decisions."""
    draw, seen = Random(31), 0
    for _ in range(150):
        rows = [([draw.randint(-2, 4) for _ in range(3)], "<=", draw.randint(0, 6)) for _ in range(4)]
        model = typed("max", [draw.randint(-1, 4) for _ in range(3)], rows, lower=0)
        walked = walk(model, rule, "lexicographic")
        for pivot in [pivot for pivot in walked.pivots if pivot.phase == 2]:
            gains = {name: cost for name, cost in pivot.reduced_costs.items() if cost > 0}
            slacks = walked.order  # the decisions' own first
            if rule == "steepest-edge":
                sizes = {name: gain**2 / norm(pivot, name, slacks) for name, gain in gains.items()}
            elif rule == "steepest-edge-decisions":
                sizes = {name: gain**2 / norm(pivot, name, slacks[:3]) for name, gain in gains.items()}
            else:
                sizes = {name: gain * length(pivot, name) for name, gain in gains.items()}
            best = max(sizes.values())
            assert pivot.entering == next(name for name in slacks if sizes.get(name) == best)
            seen += len(gains) > 1
    assert seen > 100


def length(pivot, name: str) -> Fraction:
    """The step length of a slack from the dictionary's values; a number too large for these models on a ray."""
    now, column = pivot.before, pivot.active_before.index(name)
    falls = [
        (now.values[other], now.rate(i, column))
        for i, other in enumerate(pivot.basis_before)
        if now.rate(i, column) < 0
    ]
    return min((-value / rate for value, rate in falls), default=Fraction(10**9) / pivot.reduced_costs[name])


def test_lots_follow_the_seed_and_are_never_called_a_cycle():
    cube = klee_minty(5)
    routes = {seed: [p.entering for p in walk(cube, "random-edge", seed=seed).pivots] for seed in range(12)}
    assert routes[3] == [p.entering for p in walk(cube, "random-edge", seed=3).pivots]
    assert len({tuple(route) for route in routes.values()}) > 3
    tied = le("max", [1], [[1], [1], [1]], [1, 1, 1])
    assert {walk(tied, leaving="random", seed=seed).pivots[0].leaving for seed in range(20)} == {"r1", "r2", "r3"}
    with pytest.raises(WalkError, match="whole number"):
        walk(cube, "random-edge", seed="x")


def test_what_a_pair_depends_on_is_the_larger_of_both():
    def own(dictionary, columns):
        return columns[0]

    def sees(rule, leaving):
        return Rules(entering_rule(rule), leaving_rule(leaving), ()).sees

    assert sees("dantzig", "lexicographic") == "basis"
    assert sees("bland", "first-row") == "rows"
    assert sees(own, "first-row") == "arrangement"
    assert sees(own, "random") == sees("random-edge", "first-row") == "lots"


def test_a_rule_of_ones_own_is_a_plain_function():
    def largest_index(dictionary, columns):
        return columns[-1]

    def last_of_all(dictionary, column, rows):
        return np.int64(rows[-1])

    walked = walk(klee_minty(4), rule=largest_index, leaving=last_of_all)
    assert (walked.rule, walked.leaving, walked.end, walked.value) == ("largest_index", "last_of_all", "optimal", 625)
    assert walk(klee_minty(3), rule=lambda dictionary, columns: columns[0]).rule == "own entering rule"
    mirrored = walk(klee_minty(4), rule="bland", order=["r4", "r3", "r2", "r1", "x4", "x3", "x2", "x1"])
    same = walk(klee_minty(4), rule=largest_index, order=["x1", "x2", "x3", "x4", "r1", "r2", "r3", "r4"])
    assert [p.entering for p in same.pivots] == [p.entering for p in mirrored.pivots]


@pytest.mark.parametrize("answer", [7, -1, None, True, "x1", 0.0, [0]])
def test_a_rule_that_returns_what_may_not_enter_is_refused(answer):
    def bad(dictionary, columns):
        return answer

    with pytest.raises(WalkError, match=r"'bad' returned .*no column that may enter.*0 \(x1\), 1 \(x2\)") as caught:
        walk(klee_minty(2), rule=bad)
    assert caught.value.culprit == answer


def test_a_column_that_does_not_improve_and_a_row_that_is_not_tied_are_refused():
    model = le("max", [1, -1], [[1, 0], [1, 0], [0, 1]], [1, 1, 1])

    def worse(dictionary, columns):
        return 1

    def other(dictionary, column, rows):
        return 2

    with pytest.raises(WalkError, match=r"return one of those it is given: 0 \(x1\)"):
        walk(model, rule=worse)
    with pytest.raises(WalkError, match=r"'other' returned 2, which is no row that may leave.*0 \(r1\), 1 \(r2\)"):
        walk(model, leaving=other)


def test_unknown_rules_list_the_known_ones():
    with pytest.raises(WalkError, match=r"no entering rule 'steepest'.*Known are: dantzig, bland, .*shadow-vertex"):
        walk(klee_minty(2), rule="steepest")
    with pytest.raises(WalkError, match=r"no leaving rule 3; it has .*'largest-pivot', 'random'"):
        walk(klee_minty(2), leaving=3)
    with pytest.raises(WalkError, match="no Phase I 'big'"):
        walk(klee_minty(2), phase_one="big")
    with pytest.raises(WalkError, match=r"no entering rule None; it has 'dantzig', .*'shadow-vertex'\.$"):
        walk(klee_minty(2), rule=None)


def test_a_start_objective_belongs_to_the_shadow_vertex_rule_and_fits_the_start():
    cube = klee_minty(2)
    with pytest.raises(WalkError, match="shadow-vertex rule only, got it for 'bland'"):
        walk(cube, "bland", start_objective=(1, 1))
    with pytest.raises(WalkError, match=r"start \(0, 0\) is not optimal for the start objective: 'x2' would improve"):
        walk(cube, "shadow-vertex", start_objective={"x1": -1, "x2": 1})
    with pytest.raises(ModelError):
        walk(cube, "shadow-vertex", start_objective=(1,))
    least = typed("min", [1, 1], [([1, 1], ">=", 1)], lower=0)
    with pytest.raises(WalkError, match="'r1' would improve"):
        walk(least, "shadow-vertex", start=(1, 0), start_objective=(-1, 2))
    with pytest.raises(WalkError, match="expected as start objective the coefficients of the decisions, got 5"):
        walk(cube, "shadow-vertex", start_objective=5)
    with pytest.raises(UnknownName):
        walk(cube, "shadow-vertex", start_objective={"x3": 1})
    assert walk(cube, "shadow-vertex", start_objective={"x1": -1}).value == 25  # the others count 0
    assert walk(least, "shadow-vertex", start=(1, 0), start_objective=(1, 2)).value == 1
    assert walk(least, "shadow-vertex").value == 1  # Phase I has a start objective of its own
