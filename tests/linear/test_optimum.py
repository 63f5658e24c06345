"""The exact optimum beside brute force and HiGHS, and the kinds of model it must end with an answer."""

from __future__ import annotations

from collections import Counter
from fractions import Fraction
from random import Random

import numpy as np
import pytest
from boxed import brute
from checker import proves_empty, proves_optimal, proves_unbounded
from scipy.optimize import linprog
from small import plain, random_model, typed

from polywalk.linear import farkas, improving_ray, optimum
from polywalk.model import Constraint, Model, Objective

HIGHS = {0: "optimal", 2: "infeasible", 3: "unbounded"}


def assert_proven(model: Model) -> str:
    """Solve, check the proof of whatever end came out, and return the end."""
    found, rows = optimum(model), plain(model)
    goal = model.objective or Objective("max", (Fraction(0),) * model.n)
    if found.outcome == "infeasible":
        assert proves_empty(rows, found.infeasibility.weights)
        assert (found.value, found.point, found.weights, found.ray, found.face) == (None,) * 5
    elif found.outcome == "unbounded":
        assert proves_unbounded(goal.goal, goal.coefficients, rows, found.ray.point, found.ray.direction)
        assert (found.value, found.weights, found.infeasibility, found.face) == (None,) * 4
    else:
        objective = (goal.goal, goal.coefficients, goal.constant)
        assert proves_optimal(objective, rows, found.point, found.weights, found.value)
        assert (found.infeasibility, found.ray) == (None, None)
    return found.outcome


def test_agrees_with_brute_force_on_awkward_random_models():
    met: Counter[str] = Counter()
    draw = Random(7)
    for _ in range(900):
        model = random_model(draw)
        goal = model.objective
        outcome, value, points = brute(goal.goal, goal.coefficients, goal.constant, plain(model))
        found = optimum(model)
        assert (found.outcome, found.value) == (outcome, value), model
        assert assert_proven(model) == outcome
        met[outcome] += 1
        met["free"] += bool(model.free)
        met["equality"] += any(row.sense == "==" for row in model.constraints)
        met["tied"] += len(points) > 1
        active = [row for row in model.constraints if not row.is_constant and points and row.slack(points[0]) == 0]
        met["degenerate"] += len(active) > model.n
        met["line"] += outcome == "optimal" and not points
    least = {"infeasible": 60, "unbounded": 60, "tied": 60, "degenerate": 60, "free": 60, "equality": 60, "line": 20}
    assert not {name: met[name] for name, count in least.items() if met[name] < count}, met


def test_agrees_with_highs_on_well_conditioned_random_models():
    """HiGHS (Huangfu & Hall 2018) through scipy.optimize.linprog; small integers, so floats are no excuse."""
    draw, met = Random(11), Counter()
    for _ in range(200):
        n, m = draw.randint(2, 5), draw.randint(3, 8)
        rows = [([draw.randint(-9, 9) for _ in range(n)], "<=", draw.randint(-4, 20)) for _ in range(m)]
        cost = [draw.randint(-9, 9) for _ in range(n)]
        upper = [draw.choice([None, 10]) for _ in range(n)]
        found = optimum(typed("min", cost, rows, lower=0, upper=upper))
        bounds = [(0, end) for end in upper]
        peer = linprog(cost, A_ub=np.array([row for row, _, _ in rows]), b_ub=[end for *_, end in rows], bounds=bounds)
        if peer.status == 4:  # HiGHS leaves open whether infeasible or unbounded
            assert found.outcome != "optimal"
            continue
        assert found.outcome == HIGHS[peer.status]
        if found.outcome == "optimal":
            assert float(found.value) == pytest.approx(peer.fun, abs=1e-7)
        met[found.outcome] += 1
    assert met["optimal"] >= 100, met
    assert met["infeasible"] >= 10, met
    assert met["unbounded"] >= 5, met


def test_multipliers_are_the_change_of_the_optimum_per_unit_of_right_hand_side():
    """Hillier & Lieberman's Wyndor (from memory): 36 at (2, 6), prices 0, 3/2, 1."""
    model = typed("max", [3, 5], [([1, 0], "<=", 4), ([0, 2], "<=", 12), ([3, 2], "<=", 18)], lower=0)
    found = optimum(model)
    assert (found.value, found.point) == (36, (2, 6))
    prices = found.multipliers
    assert [prices[name] for name in ("r1", "r2", "r3")] == [0, Fraction(3, 2), 1]
    for name in ("r2", "r3"):
        moved = optimum(model.with_rhs(name, model.constraint(name).rhs + Fraction(1, 10)))
        assert moved.value - found.value == prices[name] / 10


def test_multipliers_of_a_minimum_have_the_sign_of_the_change():
    model = typed("min", [2, 3], [([1, 1], ">=", 4), ([1, 0], "<=", 3)], lower=0, constant=1)
    found = optimum(model)
    assert (found.value, found.point) == (10, (3, 1))
    assert found.multipliers == {"r1": 3, "r2": -1, "x1 lower": 0, "x2 lower": 0}


def test_optimal_face_holds_exactly_the_optimal_points():
    model = typed("max", [1, 1], [([1, 1], "<=", 4)], lower=0, constant=5)
    face = optimum(model).face
    holds = [
        all(row.holds((Fraction(x), Fraction(y))) for row in face.constraints) for x, y in ((4, 0), (1, 3), (1, 2))
    ]
    assert holds == [True, True, False]
    assert optimum(face).value == optimum(model).value == 9


def test_optimal_face_finds_a_name_of_its_own():
    row = Constraint("optimal objective", (Fraction(1),), "<=", Fraction(2))
    model = Model(("x",), (row,), Objective("max", (Fraction(3),)))
    assert [row.name for row in optimum(model).face.constraints] == ["optimal objective", "optimal objective value"]


def test_without_objective_any_feasible_point_is_optimal():
    model = typed(None, [0, 0], [([1, 1], ">=", 3)], lower=0)
    found = optimum(model)
    assert (found.outcome, found.value, found.face) == ("optimal", 0, model)
    assert all(row.holds(found.point) for row in model.constraints)


@pytest.mark.parametrize(
    ("cost", "rows", "outcome"),
    [
        ([1, 1], [([1, 1], "<=", 2)], "optimal"),
        ([1, 2], [([1, 1], "<=", 2)], "unbounded"),
        ([0, 0], [], "optimal"),
        ([1, 0], [], "unbounded"),
        ([1, 2], [([1, 1], "<=", 2), ([1, 1], ">=", 3)], "infeasible"),
        ([1, 1], [([1, 1], "==", 2), ([2, 2], "==", 4)], "optimal"),
        ([1, 1], [([1, 1], "==", 2), ([2, 2], "==", 5)], "infeasible"),
    ],
)
def test_regions_with_a_line_are_answered(cost, rows, outcome):
    model = typed("max", cost, rows)
    assert assert_proven(model) == outcome


@pytest.mark.parametrize(
    ("rows", "outcome"),
    [
        ([([0], "<=", -1)], "infeasible"),
        ([([0], ">=", 1)], "infeasible"),
        ([([0], "==", 1)], "infeasible"),
        ([([0], "==", -1)], "infeasible"),
        ([([0], "<=", 0), ([0], ">=", 0), ([0], "==", 0), ([0], "<=", 5)], "optimal"),
    ],
)
def test_rows_without_variables(rows, outcome):
    assert assert_proven(typed("max", [-1], rows, lower=0)) == outcome


def test_emptiness_below_float_tolerance_is_seen():
    """CHECKS part F (computed, no source): HiGHS calls this one optimal."""
    beyond = typed("max", [1, 1], [([1, 1], ">=", 2 + Fraction(1, 10**7))], lower=0, upper=(1, 1))
    touching = typed("max", [1, 1], [([1, 1], ">=", 2)], lower=0, upper=(1, 1))
    assert assert_proven(beyond) == "infeasible"
    assert assert_proven(touching) == "optimal"


def test_proofs_are_none_where_there_is_nothing_to_prove():
    model = typed("max", [1], [([1], "<=", 2)], lower=0)
    assert farkas(model) is None
    assert improving_ray(model) is None
    assert farkas(typed("max", [1], [([1], "<=", -1)], lower=0)).total < 0
    assert improving_ray(typed("min", [-2], [], lower=0)).change == -2
