"""A pivot told in plain sentences: each case once, against the numbers it tells."""

from __future__ import annotations

import pytest
from small import le, typed

from polywalk.errors import WalkError
from polywalk.walks import walk


def test_a_step_names_what_rises_what_runs_out_and_what_it_earns():
    model = le("max", [3, 2], [[2, 1], [1, 3]], [4, 6])
    walked = walk(model)
    assert walked.explain(1) == (
        "x1 rises from 0 to 2: each unit raises the objective by 3. r1 runs out first, at step 2, and leaves. "
        "The objective goes from 0 to 6."
    )
    assert walked.pivots[1].story() == walked.explain(2)
    with pytest.raises(WalkError, match="1 to 2"):
        walked.explain(3)


def test_a_stay_says_that_nothing_moves_and_who_was_tied():
    model = le("max", [1, 0], [[1, -1], [1, -2], [1, 1]], [0, 0, 4])
    assert walk(model).explain(1) == (
        "x1 enters, still at 0: each unit would raise the objective by 1. r1 and r2 both run out at step 0; r1 leaves. "
        "So nothing moves: the objective stays at 0."
    )


def test_a_ray_never_runs_out():
    told = walk(typed("min", [-1, 0], [([1, -1], ">=", -2)], lower=0)).explain(1)
    assert told == (
        "x1 rises from 0: each unit lowers the objective by 1. Nothing ever runs out. "
        "The objective falls from 0 for ever."
    )


def test_a_fall_from_an_upper_bound_and_a_constraint_let_go():
    model = typed("min", [1], [], upper=(5,), names=["x"]).with_constraint("floor", {"x": 2}, ">=", -4)
    assert walk(model).explain(1).startswith("x falls from 5 to -2: each unit lowers the objective by 1. floor runs")
    freed = walk(typed("min", [1, 1], [([1, 1], "<=", 4)], lower=0), start=(4, 0)).explain(1)
    assert freed.startswith("The slack of r1 grows from 0 to 4: each unit lowers the objective by 1. x1 runs out")


def test_phase_one_is_told():
    walked = walk(typed("min", [3, 2], [([1, 2], ">=", 2), ([1, 1], ">=", 1)], lower=0))
    assert "Phase I starts" in walked.explain(1)
    assert "rises to 2, what r1 is short by" in walked.explain(1)
    assert "lowers the auxiliary by 2" in walked.explain(2)
    assert "the point is feasible, and Phase I is over" in walked.explain(2)


def test_units_follow_the_number():
    model = le("max", [1], [[2]], [4])
    model = type(model)(model.variables, model.constraints, model.objective, units=(("x1", "MW"),))
    assert walk(model).explain(1).startswith("x1 rises from 0 to 2 MW:")


def test_ratio_test_is_a_table():
    pivot = walk(le("max", [3, 2], [[2, 1], [0, 3]], [4, 6])).pivots[0]
    assert str(pivot).splitlines() == [
        "pivot 1: x1 enters, r1 leaves at step 2",
        "slack  now  rate  runs out at step  ratio test",
        "r1     4    -2    2                 leaves",
        "r2     6    0",
    ]
