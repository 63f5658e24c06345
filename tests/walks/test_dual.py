"""The dual simplex walk and the dual Phase I: every pivot from the constraints, every end with its proof."""

from __future__ import annotations

from collections import Counter
from fractions import Fraction
from random import Random

import pytest
from checker import proves_empty
from small import plain, random_degenerate, random_model, typed

from polywalk.errors import WalkError
from polywalk.linear import crash, dictionary_of, optimum
from polywalk.scenarios import beale
from polywalk.walks import DUAL_LEAVING, DualPivot, dual_walk, walk

DIET = typed("min", [3, 2], [([1, 1], ">=", 3), ([1, -1], ">=", -1)], lower=0)


def assert_dual_pivot_is_true(pivot: DualPivot) -> None:
    """The leaving slack was negative, what enters is the cheapest that helps, and no slack improves afterwards."""
    model = pivot.before.slacks.model
    goal = model.objective
    assert (pivot.dual, pivot.outside, pivot.kind, pivot.ratios) == (True, True, "step", ())
    assert pivot.before.values[pivot.leaving] == -pivot.short < 0
    assert any(not row.holds(pivot.point_before) for row in model.constraints)
    assert pivot.objective_after == goal.at(pivot.point_after)
    tested = {ratio.name: ratio for ratio in pivot.dual_ratios}
    finite = [ratio.ratio for ratio in tested.values() if ratio.ratio is not None]
    assert pivot.dual_step == tested[pivot.entering].ratio == min(finite)
    assert all((ratio.rate > 0) == (ratio.ratio is not None) for ratio in tested.values())
    assert all(ratio.enters == (name == pivot.entering) for name, ratio in tested.items())
    moved = tuple(x + pivot.step * d for x, d in zip(pivot.point_before, pivot.direction, strict=True))
    assert pivot.point_after == moved != pivot.point_before
    assert pivot.after.values[pivot.leaving] == 0
    if pivot.goal.weights is None:
        assert not pivot.after.improving()
        worse = pivot.dual_step * pivot.short
        assert pivot.objective_after - pivot.objective_before == (worse if goal.goal == "min" else -worse)
    else:
        assert all(ratio.reduced_cost <= 0 for ratio in pivot.dual_ratios)


def models(count: int):
    draw = Random(17)
    for number in range(count):
        model = random_model(draw) if number % 3 else random_degenerate(draw)
        best = optimum(model)
        if best.outcome == "infeasible" or not crash(dictionary_of(model)).lines:
            yield model, best


@pytest.mark.parametrize("leaving", [rule.name for rule in DUAL_LEAVING])
def test_dual_walks_end_at_the_optimum_or_with_a_proof(leaving):
    met = Counter()
    for model, best in models(500):
        try:
            walked = dual_walk(model, leaving)
        except WalkError as error:
            names = str(error).partition("start=")[2].rstrip(".")
            if not names:
                assert best.outcome != "optimal"
                met["no dual feasible basis"] += 1
                continue
            met["remedy"] += 1
            walked = dual_walk(model, leaving, start=eval(names))  # as it stands
        assert (walked.rule, walked.leaving, walked.end) == ("dual", leaving, best.outcome)
        assert best.value is None or walked.value == best.value
        for pivot in walked.pivots:
            assert_dual_pivot_is_true(pivot)
            assert pivot.phase == 2
        if walked.end == "infeasible":
            assert proves_empty(plain(model), walked.infeasibility.weights)
        met[walked.end] += 1
        met["pivots"] += len(walked.pivots)
        met["dual degenerate"] += sum(pivot.dual_step == 0 for pivot in walked.pivots)
    least = {"optimal": 200, "infeasible": 60, "remedy": 100, "no dual feasible basis": 40, "pivots": 60}
    assert not {name: met[name] for name, n in (least | {"dual degenerate": 5}).items() if met[name] < n}, met


def test_dual_phase_one_comes_first_and_the_rule_goes_on_from_there():
    met = Counter()
    for model, best in models(500):
        walked = walk(model, "dantzig", "lexicographic", phase_one="dual")
        assert walked.end == best.outcome
        assert best.value is None or walked.value == best.value
        kinds = [pivot.dual for pivot in walked.pivots]
        assert kinds == sorted(kinds, reverse=True)
        assert [pivot.phase == 1 for pivot in walked.pivots] == kinds
        for pivot in walked.pivots:
            if pivot.dual:
                assert_dual_pivot_is_true(pivot)
                met["another objective" if pivot.goal.weights else "its own objective"] += 1
        met["then primal"] += any(kinds) and not all(kinds)
        if walked.end == "infeasible":
            assert proves_empty(plain(model), walked.infeasibility.weights)
            met["infeasible"] += 1
    least = {"another objective": 40, "its own objective": 20, "then primal": 20, "infeasible": 60}
    assert not {name: met[name] for name, count in least.items() if met[name] < count}, met


def test_phase_one_by_the_auxiliary_has_its_proof_too():
    for model, best in models(150):
        if best.outcome == "infeasible":
            assert proves_empty(plain(model), walk(model).infeasibility.weights)
        else:
            assert walk(model).infeasibility is None


def test_the_dual_walk_passes_outside_and_is_told_apart():
    walked = dual_walk(DIET)
    assert walked.points == ((0, 0), (0, 3), (1, 2))
    assert [row[:4] for row in walked.table().rows] == [(1, "dual", "x2", "r1"), (2, "dual", "x1", "r2")]
    assert [row[1] for row in walk(DIET, phase_one="dual").table().rows] == ["1, dual", "1, dual"]
    assert [(pivot.phase, pivot.outside) for pivot in walk(DIET).pivots] == [(1, True), (1, True), (2, False)]
    assert dual_walk(DIET, start=("r1", "x1 lower")).pivots[0].leaving == "r2"
    assert dual_walk(DIET, limit=1).end == "stopped"


def test_a_start_must_be_dual_feasible():
    model = typed("max", [1, 2], [([1, 1], "<=", 3)], lower=0, upper=(2, 2), names="xy")
    with pytest.raises(WalkError, match="'x' would improve the objective; start at a basis that is, such as start="):
        dual_walk(model)
    with pytest.raises(WalkError, match=r"no basis is; use walk\(model\) instead"):
        dual_walk(typed("max", [1, 1], [([1, -1], "<=", 3)], lower=0))
    with pytest.raises(WalkError, match="did you mean 'lowest-index'"):
        dual_walk(DIET, leaving="lowest index")
    with pytest.raises(WalkError, match="a number of pivots, 0 or more, got -1"):
        dual_walk(DIET, limit=-1)
    with pytest.raises(WalkError, match="follows from the others"):
        dual_walk(model, start=("x lower", "x upper"))


def test_the_dual_of_beale_cycles_by_the_largest_violation_and_not_by_the_lowest_index():
    """Beale's model turned over: min b.y with y A >= c, y >= 0, so that its dual walk makes the primal's pivots."""
    primal = beale()
    rows = [row for row in primal.constraints if row.sense == "<="]
    cost = [-value for value in primal.objective.coefficients]
    turned = typed(
        "min",
        [row.rhs for row in rows],
        [([row.coefficients[j] for row in rows], ">=", cost[j]) for j in range(primal.n)],
        lower=0,
    )
    order = [*(f"r{j + 1}" for j in range(primal.n)), *turned.variables]
    stalled = dual_walk(turned, order=order)
    assert (stalled.end, len(stalled.cycle)) == ("cycling", len(walk(primal).cycle))
    pairs = [(pivot.leaving, pivot.entering) for pivot in stalled.cycle]
    names = {f"x{j + 1}": f"r{j + 1}" for j in range(primal.n)} | {f"row {i + 1}": f"x{i + 1}" for i in range(3)}
    assert pairs == [(names[pivot.entering], names[pivot.leaving]) for pivot in walk(primal).cycle]
    ended = dual_walk(turned, "lowest-index", order=order)
    assert (ended.end, ended.value) == ("optimal", Fraction(1, 20))
