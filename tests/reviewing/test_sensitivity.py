"""Prices, ranges and bases beside textbooks, brute force and HiGHS; and every kind of model there is."""

from __future__ import annotations

from collections import Counter
from fractions import Fraction
from math import inf
from random import Random

import numpy as np
import pytest
from boxed import brute
from checker import proves_optimal
from scipy.optimize import linprog
from small import le, plain, random_degenerate, random_model, typed
from zoo import ZOO

import polywalk as pw
from polywalk.errors import ModelError, UnknownName
from polywalk.reviewing.ranges import basis_ranges

HALF = Fraction(1, 2)


def dakota():
    """Winston, Operations Research, Dakota Furniture (from memory): 280 at (2, 0, 8)."""
    rows = [[8, 6, 1], [4, 2, Fraction(3, 2)], [2, Fraction(3, 2), HALF]]
    return le("max", [60, 30, 20], rows, [48, 20, 8])


def wyndor(third=18):
    """Hillier & Lieberman, Introduction to Operations Research, Wyndor Glass (from memory): 36 at (2, 6)."""
    return le("max", [3, 5], [[1, 0], [0, 2], [3, 2]], [4, 12, third])


def taha():
    """Taha, Operations Research, degeneracy (from memory): 18 at (0, 2)."""
    return le("max", [3, 9], [[1, 4], [1, 2]], [8, 4])


def ends(found, *names):
    return [(found.price(name).low, found.price(name).high) for name in names]


def sides(found, *names):
    return [(found.price(name).left, found.price(name).right) for name in names]


def test_dakota():
    """Winston (from memory): prices 0, 10, 10; reduced cost of tables -5; the ranges he prints."""
    found = pw.sensitivity(dakota())
    assert (found.value, [corner.point for corner in found.best]) == (280, [(2, 0, 8)])
    assert sides(found, "r1", "r2", "r3") == [(0, 0), (10, 10), (10, 10)]
    assert ends(found, "r1", "r2", "r3") == [(24, inf), (16, 24), (Fraction(20, 3), 10)]
    assert [(item.low, item.high) for item in found.reduced_costs] == [(0, 0), (-5, -5), (0, 0)]
    ((*ranges,),) = found.cost_ranges.values()
    assert [(item.low, item.high) for item in ranges] == [(56, 80), (-inf, 35), (15, Fraction(45, 2))]
    assert found.why == ()


def test_wyndor():
    """Hillier & Lieberman (from memory): prices 0, 3/2, 1; plant 1 holds from 2 on."""
    found = pw.sensitivity(wyndor())
    assert sides(found, "r1", "r2", "r3") == [(0, 0), (Fraction(3, 2),) * 2, (1, 1)]
    assert ends(found, "r1", "r2", "r3") == [(2, inf), (6, 18), (12, 24)]
    ((*ranges,),) = found.cost_ranges.values()
    assert [(item.low, item.high) for item in ranges] == [(0, Fraction(15, 2)), (2, inf)]


def test_wyndor_with_three_lines_through_the_optimum():
    """Constructed from Wyndor, right-hand side 24 (computed, no source): prices are not unique."""
    found = pw.sensitivity(wyndor(24))
    assert found.value == 42
    assert sides(found, "r1", "r2", "r3") == [(3, 0), (Fraction(5, 2), Fraction(3, 2)), (1, 0)]
    assert not found.unique_prices
    assert [corner[:3] for corner in found.duals.corners] == [(0, Fraction(3, 2), 1), (3, Fraction(5, 2), 0)]
    (reason,) = found.why
    assert "not unique" in reason
    assert "3 constraints meet (r1, r2 and r3) where 2 would do" in reason


def test_taha_degenerate():
    """Taha (from memory): 18 at (0, 2); left and right prices 3/2 | 0 and 9/2 | 3/2 (CHECKS part E)."""
    found = pw.sensitivity(taha())
    assert (found.value, found.best[0].point) == (18, (0, 2))
    assert sides(found, "r1", "r2") == [(Fraction(3, 2), 0), (Fraction(9, 2), Fraction(3, 2))]
    assert [basis.held for basis in found.bases] == [("r1", "r2"), ("r2", "x1 lower")]
    assert found.all_bases


def test_a_minimum_with_a_constant_turns_no_sign():
    """By hand: min 2x + 3y + 1, x + y >= 4, x <= 3: raising the demand costs 3, raising the cap saves 1."""
    found = pw.sensitivity(typed("min", [2, 3], [([1, 1], ">=", 4), ([1, 0], "<=", 3)], lower=0, constant=1))
    assert (found.value, sides(found, "r1", "r2")) == (10, [(3, 3), (-1, -1)])
    assert ends(found, "r1", "r2") == [(3, inf), (0, 4)]


def test_infinite_where_a_step_leaves_no_plan():
    """By hand: x = 2 by an equality and twice that; either step of either row empties the model."""
    found = pw.sensitivity(typed("max", [1], [([1], "==", 2), ([2], "==", 4)]))
    assert sides(found, "r1", "r2") == [(inf, -inf)] * 2
    assert ends(found, "r1", "r2") == [(2, 2), (4, 4)]
    least = pw.sensitivity(typed("min", [1, 1], [([1, 1], ">=", 2), ([1, 1], "<=", 2)], lower=0))
    assert sides(least, "r1", "r2") == [(1, inf), (-inf, 0)]
    assert "leaves no feasible plan" in str(least)


def test_one_variable_and_a_row_without_variables():
    found = pw.sensitivity(typed("max", [3], [([1], "<=", 5), ([0], "<=", 0), ([0], "<=", 1)], lower=0))
    assert sides(found, "r1", "r2", "r3") == [(3, 3), (inf, 0), (0, 0)]
    assert ends(found, "r1", "r2", "r3") == [(0, inf), (0, inf), (0, inf)]


def test_an_optimal_face_without_end_and_one_with_a_line():
    """By hand: y <= 2 is all that counts; with x free the region has a line, and a base point stands for it."""
    ray = pw.sensitivity(typed("max", [0, 1], [([0, 1], "<=", 2)], lower=0))
    assert (ray.tied, ray.directions) == (True, ((1, 0),))
    assert "more points beyond" in ray.why[0]
    line = pw.sensitivity(typed("max", [0, 1], [([0, 1], "<=", 2)], lower=(None, 0)))
    assert sorted(line.directions) == [(-1, 0), (1, 0)]
    assert sides(line, "r1", "x2 lower") == [(1, 1), (0, 0)]
    ((*ranges,),) = line.cost_ranges.values()
    assert [(item.low, item.high) for item in ranges] == [(0, 0), (0, inf)]
    assert line.bases == ()


@pytest.mark.parametrize("name", sorted(ZOO))
def test_every_awkward_model_gets_an_answer(name):
    model, _ = ZOO[name]
    found = pw.sensitivity(model)
    outcome = pw.optimum(model).outcome
    assert found.outcome == ("no objective" if model.objective is None and outcome == "optimal" else outcome)
    assert len(found.prices) == (len(model.constraints) if found.outcome == "optimal" else 0)
    assert str(found)
    assert found._repr_html_()


def moved(model, name, amount):
    """The optimal value, by brute force, with one right-hand side moved; None where there is none."""
    other = model.with_rhs(name, model.constraint(name).rhs + amount)
    goal = other.objective
    return brute(goal.goal, goal.coefficients, goal.constant, plain(other))[1]


def step(end, rhs):
    """Half way to an end, or a long way where there is none."""
    return (end - rhs) / 2 if isinstance(end, Fraction) else Fraction(1000 if end > 0 else -1000)


@pytest.mark.parametrize("make", [random_model, random_degenerate])
def test_prices_are_the_slopes_that_brute_force_finds(make):
    """Half way along each piece the value is on its line; past an end it is not; infinite means empty (by brute)."""
    draw, met = Random(21), Counter()
    while met["optimal"] < (25 if make is random_degenerate else 50):
        model = make(draw)
        found = pw.sensitivity(model)
        if found.outcome != "optimal":
            continue
        met["optimal"] += 1
        met["several"] += not found.unique_prices
        met["tied"] += found.tied
        for price in draw.sample(found.prices, min(2, len(found.prices))):
            for slope, end, way in ((price.left, price.low, -1), (price.right, price.high, 1)):
                if not isinstance(slope, Fraction):
                    assert moved(model, price.constraint, Fraction(way, 1000)) is None
                    met["infinite"] += 1
                    continue
                there = step(end, price.rhs)
                assert moved(model, price.constraint, there) == found.value + slope * there
                if isinstance(end, Fraction):
                    past = end - price.rhs + Fraction(way, 1000)
                    assert moved(model, price.constraint, past) != found.value + slope * past
                    met["ended"] += 1
                met["pieces"] += 1
    assert met["several"] >= 8, met
    assert met["ended"] >= 20, met
    assert met["infinite"] >= 8, met
    assert make is random_degenerate or met["tied"] >= 8, met


def test_every_extreme_dual_is_proven():
    draw, count = Random(5), 0
    while count < 150:
        model = draw.choice([random_model, random_degenerate])(draw)
        found = pw.sensitivity(model)
        if found.outcome != "optimal":
            continue
        goal = model.objective
        for corner in found.duals.corners:
            objective = (goal.goal, goal.coefficients, goal.constant)
            assert proves_optimal(objective, plain(model), found.best[0].point, corner, found.value)
            count += 1
        for row, i in zip(model.constraints, range(len(model.constraints)), strict=True):
            low, high = found.duals.extremes(row.name)
            values = [corner[i] for corner in found.duals.corners]
            assert low <= min(values)
            assert high >= max(values)
            if not found.duals.directions:
                assert (low, high) == (min(values), max(values))


def test_marginals_of_highs_on_binding_rows_of_nondegenerate_models():
    """HiGHS (Huangfu & Hall 2018) through scipy: compared where the row binds and the optimal dual is unique."""
    draw, met = Random(3), Counter()
    while met["models"] < 40:
        n, m = draw.randint(2, 4), draw.randint(3, 7)
        rows = [
            ([draw.randint(-9, 9) for _ in range(n)], draw.choice(["<=", "<=", ">="]), draw.randint(-4, 20))
            for _ in range(m)
        ]
        cost = [draw.randint(-9, 9) for _ in range(n)]
        model = typed("min", cost, rows, lower=0, upper=[10] * n)
        found = pw.sensitivity(model)
        if found.outcome != "optimal" or found.tied or found.best[0].degenerate:
            continue
        turned = np.array(
            [[(1 if sense == "<=" else -1) * value for value in row] for row, sense, _ in rows], dtype=float
        )
        limit = np.array([(1 if sense == "<=" else -1) * end for _, sense, end in rows], dtype=float)
        peer = linprog(cost, A_ub=turned, b_ub=limit, bounds=[(0, 10)] * n)
        for i, (_, sense, _) in enumerate(rows):
            price = found.price(f"r{i + 1}")
            if model.constraint(f"r{i + 1}").slack(found.best[0].point) == 0:
                sign = 1 if sense == "<=" else -1
                assert price.left == price.right
                assert float(price.left) == pytest.approx(sign * peer.ineqlin.marginals[i], abs=1e-7)
                met["rows"] += 1
        met["models"] += 1
    assert met["rows"] >= 40, met


def test_every_basis_stays_optimal_to_its_ends_and_no_further():
    draw, met = Random(9), Counter()
    while met["bases"] < 40:
        model = draw.choice([random_model, random_degenerate])(draw)
        for basis in pw.sensitivity(model).bases[:4]:
            met["bases"] += 1
            for row, span in zip(model.constraints, basis.rhs, strict=True):
                for end, way in zip(span, (-1, 1), strict=True):
                    if isinstance(end, Fraction):
                        assert basis_ranges(model.with_rhs(row.name, end), basis.held).feasible
                        assert not basis_ranges(model.with_rhs(row.name, end + Fraction(way, 999)), basis.held).feasible
                        met["rhs"] += 1
            for j, span in enumerate(basis.costs):
                for end, way in zip(span, (-1, 1), strict=True):
                    if isinstance(end, Fraction):
                        assert basis_ranges(recosted(model, j, end), basis.held).dual_feasible
                        assert not basis_ranges(recosted(model, j, end + Fraction(way, 999)), basis.held).dual_feasible
                        met["costs"] += 1
    assert min(met.values()) >= 40, met


def recosted(model, j, cost):
    goal = model.objective
    costs = dict(zip(model.variables, goal.coefficients, strict=True)) | {model.variables[j]: cost}
    return model.with_objective(costs, goal.goal, goal.constant)


def test_at_a_degenerate_vertex_the_bases_hold_the_left_and_the_right_prices():
    found = pw.sensitivity(pw.scenarios.harbour_row("degenerate"))
    assert len(found.bases) == 2
    for price in found.prices:
        place = [row.name for row in found.model.constraints].index(price.constraint)
        printed = {basis.prices[place] for basis in found.bases}
        assert printed == {price.left, price.right}


def test_a_large_model_names_its_optimal_vertices_by_number():
    """Nine variables with twenty rows: the region is not listed, the optimal face is."""
    draw = Random(1)
    rows = [([draw.randint(0, 9) for _ in range(9)], "<=", 100) for _ in range(20)]
    found = pw.sensitivity(typed("max", [1] * 8 + [0], rows, lower=0))
    assert found.outcome == "optimal"
    assert found.best[0].name == "optimal vertex 1"
    assert found.best[0].active


def test_bad_names_are_told():
    with pytest.raises(UnknownName, match="labor"):
        pw.sensitivity(taha()).price("labor")
    with pytest.raises(ModelError, match=r"expected 2 different constraints held active, .* got 1: r1"):
        basis_ranges(taha(), ["r1"])
    with pytest.raises(ModelError, match="do not meet in one point"):
        basis_ranges(typed("max", [1, 0], [([1, 1], "<=", 1), ([2, 2], "<=", 2)]), ["r1", "r2"])
