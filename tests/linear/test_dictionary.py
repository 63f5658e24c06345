"""The dictionary: every entry against the constraints themselves, under random pivots; naming; the crash phase."""

from __future__ import annotations

from fractions import Fraction
from random import Random

import pytest
from small import le, random_model, typed

from polywalk.linear import Dictionary, Swap, crash, dictionary_of, slacks_of
from polywalk.linear.phase_one import relaxed
from polywalk.model import Constraint, Model


def assert_true_everywhere(now: Dictionary, draw: Random) -> None:
    """Every row and the objective hold as identities: at random points, feasible or not, with the auxiliary at will."""
    model, items = now.slacks.model, now.slacks
    for _ in range(3):
        point = tuple(Fraction(draw.randint(-9, 9), draw.randint(1, 4)) for _ in range(model.n))
        auxiliary = Fraction(draw.randint(0, 5)) if now.phase == 1 else Fraction(0)
        slack = {items.names[items.auxiliary]: auxiliary}
        for k, item in enumerate(items.items[: items.auxiliary]):
            true = point[k] if item.constraint is None else model.constraints[item.constraint].slack(point)
            slack[item.name] = true + (auxiliary if k in now.relaxed_slacks else 0)
        nonbasic = [slack[items.names[k]] for k in now.nonbasic]
        for i, k in enumerate(now.basic):
            rates = sum(now.rate(i, j) * value for j, value in enumerate(nonbasic))
            assert slack[items.names[k]] == now.values[items.names[k]] + rates
        costs = sum(now.reduced_cost(j) * value for j, value in enumerate(nonbasic))
        assert (model.objective.at(point) if model.objective else 0) == now.objective + costs
        moves = [now.direction(j) for j in range(len(nonbasic))]
        moved = [sum(way[v] * value for way, value in zip(moves, nonbasic, strict=True)) for v in range(model.n)]
        assert point == tuple(start + change for start, change in zip(now.point, moved, strict=True))


def test_every_entry_is_true_under_random_pivots():
    draw, pivots, eased = Random(3), 0, 0
    for _ in range(150):
        now = crash(dictionary_of(random_model(draw))).dictionary
        if draw.random() < 0.5:
            now, eased = relaxed(now), eased + 1
        assert_true_everywhere(now, draw)
        for _ in range(4):
            places = [(i, j) for i, line in enumerate(now.rows) for j in range(len(now.nonbasic)) if line[j + 1]]
            if not places:
                break
            now, pivots = now.pivot(*draw.choice(places)), pivots + 1
            assert now.denominator > 0
            assert_true_everywhere(now, draw)
    assert (pivots > 300, eased > 50) == (True, True)


def test_a_pivot_undone_gives_the_same_dictionary_and_leaves_the_old_one_alone():
    first = dictionary_of(le("max", [3, 2], [[2, 1], [1, 3]], [4, 5]))
    again = first.pivot(1, 0).pivot(1, 0)
    assert (again, again is first) == (first, False)


def test_integers_stay_minors_and_never_need_a_common_divisor():
    """Edmonds 1967, Bareiss 1968: after two pivots the denominator is the determinant of the two columns."""
    first = dictionary_of(le("max", [1, 1], [[3, 5], [2, 7]], [1, 1]))
    assert first.pivot(0, 0).pivot(1, 1).denominator == 3 * 7 - 5 * 2


def test_a_row_that_does_not_depend_on_the_column_is_refused():
    with pytest.raises(ZeroDivisionError):
        dictionary_of(le("max", [1, 1], [[1, 0]], [1])).pivot(0, 1)


def test_slacks_are_scaled_one_by_one_and_told_as_typed():
    model = le("max", [1], [["1/3"], [6]], [1, 12])
    first = dictionary_of(model)
    assert [item.scale for item in first.slacks.items] == [1, 3, 1, 1]
    assert first.values == {"x1": 0, "r1": 1, "r2": 12}
    assert [first.rate(0, 0), first.rate(1, 0)] == [Fraction(-1, 3), -6]


def test_home_is_the_first_lower_bound_else_the_first_upper():
    model = typed("max", [1, 1, 1], [], lower=(2, None, None), upper=(5, 4, None), names="abc")
    items = slacks_of(model)
    assert [(item.name, item.kind) for item in items.items] == [
        ("a", "slack"),
        ("b", "slack"),
        ("c", "free"),
        ("a upper", "slack"),
        ("auxiliary", "auxiliary"),
    ]
    assert (items.rests, items.sides) == ((2, 4, 0), (1, -1, 1))
    assert dictionary_of(model).point == (2, 4, 0)


def test_names_that_meet_are_told_apart():
    row = Constraint("x", (Fraction(1), Fraction(2)), "<=", Fraction(4))
    taken = Constraint("x slack", (Fraction(1), Fraction(1)), "<=", Fraction(4))
    names = slacks_of(Model(("x", "auxiliary"), (row, taken))).names
    assert len(set(names)) == len(names) == 5
    assert names[2:] == ("x slack slack", "x slack", "auxiliary variable")


def test_crash_takes_free_decisions_to_the_nearest_constraint():
    model = typed("max", [1], [([1], "<=", 9), ([2], "<=", 6), ([-2], "<=", 8)])
    done = crash(dictionary_of(model.without("r1").with_constraint("r1", {"x1": 3}, "<=", 27)))
    assert done.swaps == (Swap("x1", "r2"),)
    assert (done.dictionary.point, done.dictionary.feasible) == ((3,), True)


def test_crash_keeps_a_feasible_rest_feasible():
    draw, met = Random(5), 0
    for _ in range(300):
        first = dictionary_of(random_model(draw))
        if first.feasible and any(item.kind == "free" for item in first.slacks.items):
            no_equality = all(item.kind != "equality" for item in first.slacks.items)
            met += no_equality
            assert crash(first).dictionary.feasible or not no_equality
    assert met >= 30


def test_crash_drops_a_redundant_equality_and_finds_a_contradiction():
    redundant = typed("max", [1, 1], [([1, 1], "==", 2), ([2, 2], "==", 4)], lower=0)
    done = crash(dictionary_of(redundant))
    assert (len(done.dictionary.rows), done.contradiction, len(done.swaps)) == (1, None, 1)
    contradictory = redundant.with_rhs("r2", 5)
    done = crash(dictionary_of(contradictory))
    assert done.dictionary.slacks.names[done.dictionary.basic[done.contradiction]] == "r2"


def test_crash_finds_lines():
    done = crash(dictionary_of(typed("max", [1, 1], [([1, 1], "<=", 2)])))
    assert [done.dictionary.slacks.names[index] for index in done.lines] == ["x2"]
