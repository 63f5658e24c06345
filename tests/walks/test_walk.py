"""Every record of every pivot against the constraints themselves, and the end of every walk against the optimum."""

from __future__ import annotations

from collections import Counter
from fractions import Fraction
from random import Random

import pytest
from checker import proves_unbounded
from small import klee_minty, le, plain, random_degenerate, random_model, typed

from polywalk.errors import WalkError
from polywalk.linear import crash, dictionary_of, optimum
from polywalk.walks import Pivot, Walk, walk


def slacks_at(pivot: Pivot, point: tuple[Fraction, ...]) -> dict[str, Fraction]:
    """The slack of every constraint at a point, and the free decisions, computed from the model."""
    items = pivot.before.slacks
    rows = items.model.constraints
    named = list(enumerate(items.items[: items.auxiliary]))
    return {item.name: point[k] if item.constraint is None else rows[item.constraint].slack(point) for k, item in named}


def assert_pivot_is_true(pivot: Pivot, walked: Walk) -> None:
    """A pivot of Phase II from the constraints alone."""
    before, after = slacks_at(pivot, pivot.point_before), slacks_at(pivot, pivot.point_after)
    one_step = tuple(x + d for x, d in zip(pivot.point_before, pivot.direction, strict=True))
    ahead = slacks_at(pivot, one_step)
    assert pivot.rates == {name: ahead[name] - before[name] for name in pivot.rates}
    assert pivot.before.values == {name: before[name] for name in pivot.before.values}
    assert pivot.after.values == {name: after[name] for name in pivot.after.values}
    assert all(before[name] == 0 for name in pivot.active_before)
    goal = walked.model.objective
    slope = goal.at(one_step) - goal.at(pivot.point_before)
    assert pivot.reduced_costs[pivot.entering] == slope
    assert (slope > 0) == (goal.goal == "max")
    assert slope != 0
    assert (pivot.objective_before, pivot.objective_after) == (goal.at(pivot.point_before), goal.at(pivot.point_after))
    tested = {ratio.name: ratio for ratio in pivot.ratios}
    for name, ratio in tested.items():
        assert (ratio.slack, ratio.rate) == (before[name], pivot.rates[name])
        assert ratio.ratio == (-ratio.slack / ratio.rate if ratio.rate < 0 else None)
        assert ratio.leaves == (name == pivot.leaving)
    finite = [ratio.ratio for ratio in pivot.ratios if ratio.ratio is not None]
    if pivot.kind == "ray":
        assert (finite, pivot.leaving, pivot.step, pivot.before) == ([], None, None, pivot.after)
        return
    assert pivot.step == min(finite) == tested[pivot.leaving].ratio
    assert (pivot.step == 0) == (pivot.kind == "degenerate")
    moved = tuple(x + pivot.step * d for x, d in zip(pivot.point_before, pivot.direction, strict=True))
    assert pivot.point_after == moved
    assert set(pivot.active_after) == set(pivot.active_before) - {pivot.entering} | {pivot.leaving}
    assert set(pivot.basis_after) == set(pivot.basis_before) - {pivot.leaving} | {pivot.entering}


def assert_rule_was_followed(pivot: Pivot, walked: Walk) -> None:
    """The entering and the leaving slack are the ones the rule names, by the records."""
    better = 1 if walked.model.objective.goal == "max" and pivot.phase == 2 else -1
    items = {item.name: item for item in pivot.before.slacks.items}
    gains = {name: better * rate for name, rate in pivot.reduced_costs.items() if items[name].kind == "slack"}
    able = sorted((name for name, gain in gains.items() if gain > 0), key=walked.order.index)
    best = max(gains[name] for name in able)
    lowest = able[0] if walked.rule == "bland" else next(name for name in able if gains[name] == best)
    assert pivot.entering == lowest
    ties = [ratio.name for ratio in pivot.ratios if ratio.rate < 0 and ratio.ratio == pivot.step]
    if ties and "auxiliary" not in ties:
        assert pivot.leaving == min(ties, key=walked.order.index)


@pytest.mark.parametrize("rule", ["dantzig", "bland"])
@pytest.mark.parametrize("order", ["decisions first", "slacks first"])
def test_every_record_is_true_and_every_end_agrees_with_the_optimum(rule, order):
    draw, met = Random(13), Counter()
    for number in range(400):
        model = random_model(draw) if number % 4 else random_degenerate(draw)
        best = optimum(model)
        if best.outcome != "infeasible" and crash(dictionary_of(model)).lines:
            met["line"] += 1
            with pytest.raises(WalkError, match="line"):
                walk(model, rule=rule)
            continue
        walked = walk(model, rule=rule, order=order)
        assert (walked.end, walked.value) == (best.outcome, walked.value if best.value is None else best.value)
        for pivot in walked.pivots:
            if pivot.phase == 2:
                assert_pivot_is_true(pivot, walked)
            if pivot.entering != "auxiliary":
                assert_rule_was_followed(pivot, walked)
            met[f"{pivot.kind} {pivot.phase}"] += 1
        assert_phases_and_joints(walked)
        if walked.end == "unbounded":
            goal = model.objective
            assert proves_unbounded(goal.goal, goal.coefficients, plain(model), walked.point, walked.ray)
        met[walked.end] += 1
    least = {
        "optimal": 60,
        "unbounded": 30,
        "infeasible": 60,
        "line": 20,
        "degenerate 2": 30,
        "step 1": 60,
        "ray 2": 30,
    }
    assert not {name: met[name] for name, count in least.items() if met[name] < count}, met


def assert_phases_and_joints(walked: Walk) -> None:
    """Pivots are numbered from 1, joined end to end, Phase I first; the auxiliary enters once and leaves once."""
    assert [pivot.number for pivot in walked.pivots] == list(range(1, len(walked.pivots) + 1))
    for one, two in zip(walked.pivots, walked.pivots[1:], strict=False):
        assert one.after is two.before
        assert one.phase <= two.phase
    assert len(walked.points) == len(walked.pivots) + 1
    names = [(pivot.entering == "auxiliary", pivot.leaving == "auxiliary") for pivot in walked.pivots]
    entered, left = sum(enters for enters, _ in names), sum(leaves for _, leaves in names)
    in_phase_one = [pivot for pivot in walked.pivots if pivot.phase == 1]
    assert entered == bool(in_phase_one)
    assert left == (bool(in_phase_one) and walked.end != "infeasible")
    rows = walked.model.constraints
    for pivot in walked.pivots:
        if pivot.phase == 2:
            assert all(row.holds(pivot.point_before) for row in rows)


def test_phase_one_starts_with_the_largest_violation_and_ends_when_it_is_gone():
    model = typed("min", [3, 2], [([2, 1], "<=", 8), ([1, 1], ">=", 1), ([1, 2], ">=", 2)], lower=0)
    walked = walk(model)
    first, second = walked.pivots
    assert (first.phase, first.entering, first.leaving, first.step) == (1, "auxiliary", "r3", 2)
    assert (first.point_after, first.direction) == ((0, 0), (0, 0))
    assert [(ratio.name, ratio.ratio, ratio.leaves) for ratio in first.ratios] == [
        ("r1", None, False),
        ("r2", 1, False),
        ("r3", 2, True),
    ]
    assert (second.entering, second.leaving, second.phase) == ("x2", "auxiliary", 1)
    assert second.reduced_costs == {"x1": -1, "x2": -2, "r3": 1}
    assert (walked.end, walked.point, walked.value) == ("optimal", (0, 1), 2)


def test_violation_is_measured_on_the_rows_as_typed():
    model = typed("max", [0, 0], [(["1/3", 0], ">=", 1), ([0, 2], ">=", 2)], lower=0)
    assert walk(model).pivots[0].leaving == "r2"
    model = typed("max", [0, 0], [([3, 0], ">=", 9), ([0, 2], ">=", 2)], lower=0)
    assert walk(model).pivots[0].leaving == "r1"


def test_of_equal_violations_the_lowest_index_makes_room():
    model = typed("max", [0, 0], [([2, 1], ">=", 2), ([1, 2], ">=", 2)], lower=0, names="xy")
    assert walk(model).pivots[0].leaving == "r1"
    assert walk(model, order=["r2", "r1", "x", "y"]).pivots[0].leaving == "r2"


def test_infeasible_walk_has_no_point_and_contradictory_equalities_need_no_pivot():
    walked = walk(typed("max", [1], [([1], "<=", -1)], lower=0))
    assert (walked.end, walked.point, walked.value, walked.ray) == ("infeasible", None, None, None)
    assert "infeasible after" in str(walked)
    walked = walk(typed("max", [1], [([1], "==", 1), ([2], "==", 3)], lower=0))
    assert (walked.end, walked.pivots) == ("infeasible", ())


def test_equalities_and_free_decisions_are_crashed_and_not_counted():
    model = typed("max", [1, 2, 0], [([1, 1, 1], "==", 4), ([0, 1, -1], "<=", 1)], lower=(0, 0, None), upper=(3,))
    walked = walk(model)
    assert walked.crash == (("x3", "r1"),)
    assert (walked.end, walked.value) == ("optimal", optimum(model).value)
    assert all("r1" not in (pivot.entering, pivot.leaving) for pivot in walked.pivots)
    assert all("r1" in pivot.active_before for pivot in walked.pivots)
    assert "not counted: x3 for r1" in str(walked)


def test_upper_bounded_decisions_walk_from_their_bound():
    model = typed("min", [1], [([1], ">=", -2)], lower=(None,), upper=(5,), names=["x"]).without("r1")
    model = model.with_constraint("floor", {"x": 2}, ">=", -4)
    walked = walk(model)
    (pivot,) = walked.pivots
    assert (pivot.entering, pivot.direction, pivot.step) == ("x", (-1,), 7)
    assert (walked.points, walked.value) == (((5,), (-2,)), -2)
    assert pivot.reduced_costs == {"x": -1}


def test_limit_stops_the_walk():
    walked = walk(klee_minty(4), limit=3)
    assert (walked.end, len(walked.pivots)) == ("stopped", 3)
    assert walked.value == walked.pivots[-1].objective_after
    assert walk(klee_minty(4), limit=15).end == "optimal"
    assert walk(klee_minty(4), limit=0).pivots == ()
    with pytest.raises(WalkError, match="limit"):
        walk(klee_minty(2), limit=-1)


def test_unknown_rules_are_refused_with_near_names():
    with pytest.raises(WalkError, match="did you mean 'dantzig'"):
        walk(klee_minty(2), rule="danzig")
    with pytest.raises(WalkError, match="lowest-index"):
        walk(klee_minty(2), leaving="lowest index")


def test_walk_shows_itself():
    walked = walk(klee_minty(3))
    assert walked.constraint_of == {f"x{k}": f"x{k} lower" for k in (1, 2, 3)} | {f"r{k}": f"r{k}" for k in (1, 2, 3)}
    assert str(walked).splitlines()[0] == (
        "dantzig from (0, 0, 0): optimal at (0, 0, 125) after 7 pivots (0 of them degenerate)"
    )
    assert len(walked.frame()) == 7
    assert "<table>" in walked._repr_html_()
    assert "object at" not in repr(walked.pivots[0])
    integer = le("max", [1], [[2]], [3])
    integer = type(integer)(integer.variables, integer.constraints, integer.objective, integers=("x1",))
    assert "relaxation" in str(walk(integer))


def test_a_model_without_objective_walks_to_a_feasible_point():
    walked = walk(typed(None, [0, 0], [([1, 1], ">=", 3)], lower=0))
    assert (walked.end, walked.value) == ("optimal", 0)
