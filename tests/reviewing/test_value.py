"""The optimal value as a function of one number, beside brute force at random values of it."""

from __future__ import annotations

from collections import Counter
from fractions import Fraction
from itertools import pairwise
from math import inf
from random import Random

import pytest
from boxed import brute
from small import le, plain, random_degenerate, random_model, typed

import polywalk as pw
from polywalk.errors import ModelError, NumberError, UnknownName


def solved(model, kind, name, t):
    """The end and the value of the model with its parameter at t, by brute force."""
    goal = model.objective
    if kind == "rhs":
        other = model.with_rhs(name, t)
    else:
        costs = dict(zip(model.variables, goal.coefficients, strict=True)) | {name: t}
        other = model.with_objective(costs, goal.goal, goal.constant)
    goal = other.objective
    return brute(goal.goal, goal.coefficients, goal.constant, plain(other))[:2]


@pytest.mark.parametrize("kind", ["rhs", "cost"])
@pytest.mark.parametrize("make", [random_model, random_degenerate])
def test_agrees_with_brute_force_everywhere(make, kind):
    draw, met = Random(17), Counter()
    for _ in range(60 if make is random_model else 24):
        model = make(draw)
        name = draw.choice(model.variables if kind == "cost" else [row.name for row in model.constraints] or [None])
        if name is None:
            continue
        found = pw.value_function(model, **{kind: name})
        met[found.outcome] += 1
        met["breakpoints"] += len(found.breakpoints)
        ends = [end for end in (found.low, found.high) if isinstance(end, Fraction)]
        met["ends"] += len(ends)
        spots = [t for t, _ in found.corners] + [end + way for end in ends for way in (-Fraction(1, 9), Fraction(1, 9))]
        for t in [*spots[:6], *(Fraction(draw.randint(-60, 60), 7) for _ in range(2))]:
            outcome, value = solved(model, kind, name, t)
            assert found.at(t) == value, (model, name, t)
            if value is None and found.outcome == "optimal":
                assert outcome == found.beyond
            met["compared"] += 1
    assert met["optimal"] >= 12, met
    assert met["breakpoints"] >= 5, met
    assert met["ends"] >= 2, met
    assert met["compared"] >= 50, met


def test_pieces_join_bend_one_way_and_are_as_long_as_they_can_be():
    draw, bends = Random(4), 0
    for _ in range(60):
        model = random_model(draw)
        parameters = [{"rhs": row.name} for row in model.constraints[:2]] + [{"cost": model.variables[0]}]
        for parameter in parameters:
            found = pw.value_function(model, **parameter)
            grows = (model.objective.goal == "max") == ("cost" in parameter)  # convex
            for left, right in pairwise(found.pieces):
                assert left.high == right.low
                assert left.at(left.high) == right.at(right.low)
                assert (left.slope < right.slope) == grows
                assert left.slope != right.slope
                bends += 1
            if found.pieces:
                assert (found.pieces[0].low, found.pieces[-1].high) == (found.low, found.high)
    assert bends >= 30


def test_slopes_are_the_prices_and_the_optimal_values_of_the_variable():
    """By hand from Wyndor (Hillier & Lieberman, from memory) with the third right-hand side 24."""
    model = le("max", [3, 5], [[1, 0], [0, 2], [3, 2]], [4, 12, 24])
    assert pw.value_function(model, rhs="r3").slopes(24) == (1, 0)
    assert pw.value_function(model, cost="x1").slopes(3) == (4, 4)
    assert pw.value_function(model, cost="x1").slopes(0) == (0, 4)
    price = pw.sensitivity(model).price("r2")
    assert pw.value_function(model, rhs="r2").slopes(12) == (price.left, price.right)


def test_the_slopes_at_the_ends_are_infinite_with_the_right_sign():
    most = le("max", [1], [[1]], [5])
    assert pw.value_function(most, rhs="r1").slopes(0) == (inf, 1)
    least = typed("min", [1], [([1], "<=", 5)], lower=0)
    assert pw.value_function(least, rhs="r1").slopes(0) == (-inf, 0)
    assert pw.value_function(typed("max", [1, -1], [([1, -1], "<=", 1)], lower=0), cost="x2").slopes(-1) == (0, inf)


def test_a_parameter_with_a_single_value():
    """By hand: x = 2 and x = t: only t = 2 leaves a plan."""
    model = typed("max", [3], [([1], "==", 2), ([1], "==", 2)], constant=1)
    found = pw.value_function(model, rhs="r2")
    assert (found.low, found.high, found.pieces, found.corners) == (2, 2, (), ((2, 7),))
    assert (found.at(2), found.at(3), found.slopes(2)) == (7, None, (inf, -inf))
    assert "at 2 the optimal value is 7" in str(found)


def test_an_infeasible_start_is_no_obstacle():
    """By hand: x >= 4 and x <= 3; the function of the second right-hand side starts at 4."""
    model = typed("min", [1], [([1], ">=", 4), ([1], "<=", 3)])
    found = pw.value_function(model, rhs="r2")
    assert (found.outcome, found.low, found.high, found.at(3), found.at(9)) == ("optimal", 4, inf, None, 4)
    assert "now 3: infeasible" in str(found)


def test_an_unbounded_start_is_no_obstacle_for_a_cost():
    """By hand: max x, x >= 1: the cost must be 0 or below."""
    found = pw.value_function(typed("max", [1], [([1], ">=", 1)]), cost="x1")
    assert (found.outcome, found.low, found.high, found.at(1), found.at(-2)) == ("optimal", -inf, 0, None, -2)
    assert "above 0 the model is unbounded" in str(found)


def test_models_without_any_optimum_say_so():
    empty = typed("max", [1], [([1], "<=", -1), ([1], ">=", 0), ([2], "<=", 9)])
    assert pw.value_function(empty, rhs="r3").outcome == "infeasible"
    assert pw.value_function(empty, cost="x1").outcome == "infeasible"
    endless = typed("max", [1, 1], [([1, 0], "<=", 3)], lower=0)
    assert pw.value_function(endless, rhs="r1").outcome == "unbounded"
    assert pw.value_function(endless, cost="x1").outcome == "unbounded"
    aimless = typed(None, [0], [([1], "<=", 3)])
    assert (
        pw.value_function(aimless, rhs="r1").outcome == pw.value_function(aimless, cost="x1").outcome == "no objective"
    )
    for found in (pw.value_function(empty, rhs="r3"), pw.value_function(aimless, rhs="r1")):
        assert (found.pieces, found.at(0), found.slopes(0)) == ((), None, None)
        assert str(found).startswith("the optimal value has no value")


def test_a_model_without_constraints():
    found = pw.value_function(typed("max", [0, 0], []), cost="x2")
    assert (found.low, found.high, found.corners) == (0, 0, ((0, 0),))


def test_a_region_will_do():
    model = le("max", [1], [[1]], [5])
    assert pw.value_function(pw.region(model), rhs="r1") == pw.value_function(model, rhs="r1")


def test_bad_parameters_are_told():
    model = le("max", [1], [[1]], [5])
    with pytest.raises(ModelError, match=r"expected rhs=.* or cost=.*, got neither"):
        pw.value_function(model)
    with pytest.raises(ModelError, match="got both"):
        pw.value_function(model, rhs="r1", cost="x1")
    with pytest.raises(UnknownName, match="constraint 'x1'"):
        pw.value_function(model, rhs="x1")
    with pytest.raises(UnknownName, match="variable 'r1'"):
        pw.value_function(model, cost="r1")
    with pytest.raises(NumberError, match="'much'"):
        pw.value_function(model, rhs="r1").at("much")
