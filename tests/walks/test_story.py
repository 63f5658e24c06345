"""A pivot told in plain sentences: each case once, against the numbers it tells."""

from __future__ import annotations

import pytest
from small import le, typed

from polywalk.errors import WalkError
from polywalk.walks import dual_walk, walk


def test_a_step_names_what_rises_what_runs_out_and_what_it_earns():
    model = le("max", [3, 2], [[2, 1], [1, 3]], [4, 6])
    walked = walk(model)
    assert walked.explain(1) == (
        "x1 rises from 0 to 2: each unit raises the objective by 3. Of x1 (3) and x2 (2) it has the "
        "largest reduced cost. r1 runs out first, at step 2, and leaves. The objective goes from 0 to 6."
    )
    assert walked.pivots[1].story() == walked.explain(2)
    with pytest.raises(WalkError, match="1 to 2"):
        walked.explain(3)


def test_a_stay_says_that_nothing_moves_and_who_was_tied():
    model = le("max", [1, 0], [[1, -1], [1, -2], [1, 1]], [0, 0, 4])
    assert walk(model).explain(1) == (
        "x1 enters, still at 0: each unit would raise the objective by 1. No other slack improves. "
        "r1 and r2 both run out at step 0; r1 has the lowest index and leaves. "
        "So nothing moves: the objective stays at 0."
    )


def test_a_ray_never_runs_out():
    told = walk(typed("min", [-1, 0], [([1, -1], ">=", -2)], lower=0)).explain(1)
    assert told == (
        "x1 rises from 0: each unit lowers the objective by 1. No other slack improves. Nothing ever runs out. "
        "The objective falls from 0 for ever."
    )


def test_a_fall_from_an_upper_bound_and_a_constraint_let_go():
    model = typed("min", [1], [], upper=(5,), names=["x"]).with_constraint("floor", {"x": 2}, ">=", -4)
    assert walk(model).explain(1).startswith("x falls from 5 to -2: each unit lowers the objective by 1. No other")
    freed = walk(typed("min", [1, 1], [([1, 1], "<=", 4)], lower=0), start=(4, 0)).explain(1)
    assert freed.startswith("The slack of r1 grows from 0 to 4: each unit lowers the objective by 1. No other")


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


TWO = le("max", [3, 2], [[2, 1], [1, 3]], [4, 6])
TIED = le("max", [3, 3], [[1, -1], [2, -1], [1, 1]], [0, 0, 4])


@pytest.mark.parametrize(
    ("rule", "reason"),
    [
        ("dantzig", "Of x1 (3) and x2 (2) it has the largest reduced cost."),
        ("bland", "Of x1 and x2 it has the lowest index."),
        ("greatest-improvement", "Of x1 (6) and x2 (4) it improves the most over its whole step."),
        ("steepest-edge", "Of x1 (1.5) and x2 (4/11) it has the largest squared slope over all slacks."),
        ("steepest-edge-decisions", "Of x1 (9) and x2 (4) it has the largest squared slope over the decisions."),
        ("random-edge", "Of x1 and x2 it was drawn by lot."),
        ("shadow-vertex", "Of x1 and x2 it is the first to improve as the objective turns from the start objective"),
    ],
)
def test_every_entering_rule_says_why(rule, reason):
    assert reason in walk(TWO, rule=rule).explain(1)


@pytest.mark.parametrize(
    ("leaving", "reason"),
    [
        ("lowest-index", "r1 and r2 both run out at step 0; r1 has the lowest index and leaves."),
        ("lexicographic", "r1 and r2 both run out at step 0; r2 has the lexicographically smallest ratios and leaves."),
        ("first-row", "r1 and r2 both run out at step 0; r1 stands in the first of their rows and leaves."),
        ("largest-pivot", "r1 (1) and r2 (2) both run out at step 0; r2 falls the fastest and leaves."),
        ("random", "was drawn by lot and leaves."),
    ],
)
def test_every_leaving_rule_says_why(leaving, reason):
    assert reason in walk(TIED, leaving=leaving).explain(1)


def test_of_equals_the_lowest_index_is_said():
    assert "Of x1 (3) and x2 (3) it has the largest reduced cost, of equals the lowest index." in walk(TIED).explain(1)
    even = le("max", [1, 0], [[1, -1], [1, -2]], [0, 0])
    assert "r1 falls the fastest, of equals the lowest index, and leaves" in walk(
        even, leaving="largest-pivot"
    ).explain(1)


def test_a_rule_of_ones_own_is_named():
    def last(dictionary, columns):
        return columns[-1]

    def lowest(dictionary, column, rows):
        return rows[-1]

    told = walk(TIED, rule=last, leaving=lowest)
    assert "last chose it among x1 and x2." in told.explain(1)
    assert "lowest chose r2 to leave" in walk(TIED, leaving=lowest).explain(1)


def test_a_step_that_nothing_stops_improves_without_end():
    open_cone = le("max", [3, 1], [[1, -1]], [2])
    told = walk(open_cone, rule="greatest-improvement").explain(1)
    assert "Of x1 (6) and x2 (without end) it improves the most over its whole step. Nothing ever runs out." in told


def test_dual_pivots_are_told_in_dual_terms():
    model = typed("min", [3, 2], [([1, 1], ">=", 3), ([1, -1], ">=", -1)], lower=0)
    walked = dual_walk(model)
    assert walked.explain(1) == (
        "r1 is short by 3, the only one that is, and leaves: it goes up to 0. Of x1 (3) and x2 (2) x2 costs the "
        "objective the least per unit of it, and enters, growing to 3. The objective goes from 0 to 6. "
        "Other slacks are still short: the point is outside the region."
    )
    assert walked.explain(2) == (
        "r2 is short by 2, the only one that is, and leaves: it goes up to 0. Only x1 can help it, and enters, growing "
        "to 1. The objective goes from 6 to 7. No slack is short any more: the point is inside the region."
    )
    assert str(walked.pivots[0]).splitlines() == [
        "pivot 1: r1, short by 3, leaves; x2 enters",
        "held at 0  reduced cost  rate of r1  dual ratio  dual ratio test",
        "x1         3             1           3",
        "x2         2             1           2           enters",
    ]
