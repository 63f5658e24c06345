"""A solver's answer judged: places, prices, bases, and two runs side by side."""

from __future__ import annotations

from fractions import Fraction
from random import Random

import numpy as np
import pytest
from scipy.optimize import linprog
from small import le, random_degenerate, random_model, typed

import polywalk as pw
from polywalk.errors import ModelError, NumberError, UnknownName
from polywalk.exact import dot
from polywalk.reviewing.tolerances import TOLERANCES, Tolerances

HARBOUR = pw.scenarios.harbour_row


def wyndor(third=18):
    """Hillier & Lieberman, Wyndor Glass (from memory): 36 at (2, 6)."""
    return le("max", [3, 5], [[1, 0], [0, 2], [3, 2]], [4, 12, third])


@pytest.mark.parametrize(
    ("x", "words", "feasible", "optimal"),
    [
        ([2, 6], "V2", "exact", "exact"),
        ([2 + 1e-9, 6], "V2", "within solver tolerance", "within solver tolerance"),
        ([1.9999999, 6], "V2", "exact", "within solver tolerance"),
        ([2.01, 6], "outside: it violates r3", "wrong", "wrong"),
        ([4, 3], "V4", "exact", "wrong"),
        ([1, 1], "inside the region", "exact", "wrong"),
        ([1, 6], "on the edge between V1 and V2, where r2 is active", "exact", "wrong"),
    ],
)
def test_where_a_point_is(x, words, feasible, optimal):
    place = pw.explain(wyndor(), x=x).point
    assert (place.words, place.feasible.word, place.optimal.word) == (words, feasible, optimal)
    assert place.right == ("wrong" not in {feasible, optimal})


def test_how_far_a_point_is_off():
    place = pw.explain(wyndor(), x={"x1": 3, "x2": 6}).point
    assert place.violated == (("r3", 3),)
    assert (place.feasible.off, place.optimal.off, place.objective) == (3, 3, 39)
    assert "r3 by 3" in str(pw.explain(wyndor(), x=[3, 6]))


def test_faces_of_a_solid_and_along_a_ray():
    found = pw.explain(HARBOUR(), x=[1, 1, 0]).point
    assert found.words.startswith("on the side of V")
    assert found.words.endswith("where tank lower is active")
    endless = typed("min", [1, 1], [([1, -1], "<=", 1)], lower=0)
    assert pw.explain(endless, x=[3, 2]).point.words == "on the edge from V1 along ray 1, where r1 is active"
    line = typed("max", [0, 1], [([0, 1], "<=", 2)])
    assert pw.explain(line, x=[5, 2]).point.words == "on the face where r1 is active"
    flat = typed("max", [1, 2], [([1, 1], "==", 2)], lower=0)
    assert pw.explain(flat, x=[1, 1]).point.words == "inside the region, where r1 is active all over"


def test_near_vertices_are_not_taken_for_vertices():
    """Rows that meet within tolerance just outside: the point is told as what it is."""
    model = typed("max", [1, 0], [([1, 0], "<=", 1), ([0, 1], "<=", 1), ([1, 1], "<=", Fraction(19999999, 10**7))])
    words = pw.explain(model, x=[1, 1]).point.words
    assert "near the region and no vertex of it" in words


@pytest.mark.parametrize(
    ("prices", "word", "convention"),
    [
        ([0, 1.5, 1], "exact", ""),
        ({"r2": "3/2", "r3": 1}, "exact", ""),
        ([0, 1.5000001, 1, 0, 0], "within solver tolerance", ""),
        (np.array([0, -1.5, -1]), "wrong", "with all signs turned round"),
        ([0, 1.5, 0.9], "wrong", ""),
        ([1, 1.5, 1], "wrong", ""),
    ],
)
def test_which_prices(prices, word, convention):
    found = pw.explain(wyndor(), prices=prices).prices
    assert (found.verdict.word, found.convention) == (word, convention)
    assert found.nearest == (0, Fraction(3, 2), 1, 0, 0)


def test_a_mix_of_extreme_prices_is_named():
    found = pw.explain(wyndor(24), prices=[1, "11/6", "2/3"])
    assert found.prices.verdict.word == "exact"
    assert found.prices.mix == ((0, Fraction(2, 3)), (1, Fraction(1, 3)))
    assert "a mix of extreme duals (2/3 of D0 and 1/3 of D1)" in str(found)
    assert "extreme dual D1: r1 3, r2 2.5" in str(pw.explain(wyndor(24), prices=[3, 2.5, 0]))


def test_prices_of_bounds_follow_or_are_checked():
    """Winston's Dakota (from memory): the reduced cost of tables is -5, the price of its lower bound."""
    rows = [[8, 6, 1], [4, 2, Fraction(3, 2)], [2, Fraction(3, 2), Fraction(1, 2)]]
    model = le("max", [60, 30, 20], rows, [48, 20, 8])
    left_out = pw.explain(model, prices=[0, 10, 10]).prices
    assert (left_out.verdict.word, left_out.derived, left_out.prices[4]) == ("exact", ("x2 lower",), -5)
    assert pw.explain(model, prices=[0, 10, 10, 0, -5, 0]).prices.verdict.word == "exact"
    wrong = pw.explain(model, prices={"r2": 10, "r3": 10, "x2 lower": 5}).prices
    assert (wrong.verdict.word, wrong.verdict.off, wrong.wrong_signs) == ("wrong", 10, ("x2 lower",))
    assert "by their sizes" in wrong.convention


def test_marginals_of_highs_are_right_as_they_come():
    """HiGHS (Huangfu & Hall 2018) through scipy: the same sign convention for a minimum with <= rows, x >= 0."""
    draw, met = Random(2), 0
    while met < 25:
        n, m = draw.randint(2, 4), draw.randint(2, 6)
        rows = [[draw.randint(-5, 9) for _ in range(n)] for _ in range(m)]
        cost, rhs = [draw.randint(-9, 4) for _ in range(n)], [draw.randint(0, 20) for _ in range(m)]
        peer = linprog(cost, A_ub=rows, b_ub=rhs)
        if peer.status != 0:
            continue
        model = le("min", cost, rows, rhs)
        found = pw.explain(model, x=peer.x, prices=[*peer.ineqlin.marginals, *peer.lower.marginals])
        assert found.point.right, (model, peer.x)
        assert found.prices.right, (model, peer.ineqlin.marginals)
        assert found.answer.right
        met += 1


def test_random_mixes_are_right_and_moved_ones_are_not():
    draw, mixed = Random(6), 0
    while mixed < 40:
        model = draw.choice([random_model, random_degenerate])(draw)
        duals = pw.sensitivity(model).duals
        if duals is None or len(duals.corners) < 2:
            continue
        shares = [Fraction(draw.randint(1, 9)) for _ in duals.corners]
        prices = [dot(shares, column) / sum(shares) for column in zip(*duals.corners, strict=True)]
        found = pw.explain(model, prices=prices).prices
        assert found.verdict.word == "exact"
        assert sum(share for _, share in found.mix) == 1
        again = [sum(share * duals.corners[k][i] for k, share in found.mix) for i in range(len(prices))]
        assert duals.directions or again == prices
        place = draw.choice([i for i in range(len(prices)) if i not in duals.tight] or [0])
        if place not in duals.tight:
            moved = [price + (i == place) for i, price in enumerate(prices)]
            assert pw.explain(model, prices=moved).prices.verdict.word == "wrong"
        mixed += 1


@pytest.mark.parametrize("names", [["r2", "r3"], ["x1", "x2", "r1"]])
def test_a_basis_by_what_it_holds_or_by_what_is_basic(names):
    basis = pw.explain(wyndor(), basis=names).basis
    assert (basis.held, basis.point, basis.optimal) == (("r2", "r3"), (2, 6), True)


def test_bases_that_are_not_optimal():
    assert "infeasible" in str(pw.explain(wyndor(), basis=["r1", "r2"]))
    assert "not optimal, its prices have wrong signs" in str(pw.explain(wyndor(), basis=["r1", "r3"]))


def test_the_basis_a_walk_ends_with():
    model = HARBOUR("degenerate")
    walked = pw.walk(model)
    assert pw.explain(model, basis=walked.pivots[-1].basis_after).basis.optimal


def test_two_points_of_a_tied_optimum():
    found = pw.explain(HARBOUR("tied"), x=[4, 4, 4], versus={"x": [0, 8, 4]})
    (reason,) = found.why
    assert "both points are right: the optimum is tied, every mix of V3 and V8" in reason
    assert found.answer.right
    assert found.versus.right
    assert found.table().columns == ("question", "first", "second")


def test_two_lists_of_prices_at_a_degenerate_vertex():
    model = HARBOUR("degenerate")
    one, two = pw.sensitivity(model).duals.corners
    found = pw.explain(model, prices=one, versus={"prices": two})
    (reason,) = found.why
    assert "both lists of prices are right" in reason
    assert "at V8 4 constraints meet" in reason


def test_two_bases_of_a_degenerate_vertex():
    model = HARBOUR("degenerate")
    one, two = pw.sensitivity(model).bases
    (reason,) = pw.explain(model, basis=one.held, versus={"basis": two.held}).why
    assert "both bases are optimal and meet in the same point" in reason


@pytest.mark.parametrize(
    ("first", "second", "said"),
    [
        ({"x": [2, 6]}, {"x": [2, 6]}, "both give the same point"),
        ({"x": [2, 6]}, {"x": [2, 6.0000001]}, "but for rounding"),
        ({"x": [2, 6]}, {"x": [4, 3]}, "only the first point is an optimum"),
        ({"x": [0, 0]}, {"x": [4, 3]}, "neither point is an optimum"),
        ({"prices": [0, 1.5, 1]}, {"prices": [0, 1.5, 1]}, "both give the same prices"),
        ({"prices": [0, -1.5, -1]}, {"prices": [0, 1.5, 1]}, "the other list is right with all signs turned round"),
        ({"prices": [0, 0, 1]}, {"prices": [0, 2, 1]}, "neither list of prices is right"),
        ({"basis": ["r2", "r3"]}, {"basis": ["r1", "r3"]}, "only the first basis is optimal"),
        ({"basis": ["r2", "r3"]}, {"basis": ["r3", "r2"]}, "both end with the same basis"),
        ({"x": [2, 6]}, {"basis": ["r3", "r2"]}, "nothing in common"),
    ],
)
def test_why_two_answers_differ(first, second, said):
    assert said in " ".join(pw.explain(wyndor(), **first, versus=second).why)


def test_models_without_an_optimum_get_an_answer():
    for variant in ("infeasible", "unbounded"):
        found = pw.explain(HARBOUR(variant), x=[4, 4, 4], prices=[1, 2, 3])
        assert f"the model is {variant}" in str(found)
        assert (found.point.optimal, found.prices) == (None, None)
        assert not found.answer.right
    aimless = pw.explain(HARBOUR().without_objective(), x=[4, 4, 4])
    assert "has no objective" in str(aimless)
    assert aimless.point.feasible.word == "exact"


def test_tolerances_are_one_frozen_place():
    assert Tolerances() == TOLERANCES
    with pytest.raises(AttributeError):
        TOLERANCES.price = 1


@pytest.mark.parametrize(
    ("given", "error", "said"),
    [
        ({}, ModelError, "give x=, prices= or basis="),
        ({"x": [1]}, ModelError, r"expected 2 values \(x1, x2\), got 1"),
        ({"x": [1, "two"]}, NumberError, "'two'"),
        ({"x": [1, None]}, NumberError, "None"),
        ({"x": {"x1": 1, "z": 2}}, UnknownName, "variable 'z'"),
        ({"x": {"x1": 1}}, ModelError, "'x2' has none"),
        ({"x": 3}, ModelError, "expected x as a mapping"),
        ({"prices": [1, 2]}, ModelError, r"expected 5 prices, one a constraint .*, or 3 without the bounds"),
        ({"prices": [1, 2, 3, 4]}, ModelError, r"expected 5 prices"),
        ({"prices": {"r9": 1}}, UnknownName, "constraint 'r9'"),
        ({"prices": {"r1": float("nan")}}, NumberError, "nan"),
        ({"prices": 4}, ModelError, "expected prices as a mapping"),
        ({"prices": "free"}, ModelError, "expected prices as a mapping"),
        ({"basis": "r1"}, ModelError, "sequence of names"),
        ({"basis": ["r9", "r1"]}, UnknownName, "constraint or slack 'r9'"),
        ({"basis": ["r1"]}, ModelError, "the 2 constraints held active, or as the 3 basic slacks"),
        ({"basis": ["x1", "x1", "r1"]}, ModelError, "basic slacks"),
        ({"x": [2, 6], "versus": {"duals": [1]}}, UnknownName, "part 'duals'"),
    ],
)
def test_bad_answers_are_told(given, error, said):
    with pytest.raises(error, match=said):
        pw.explain(wyndor(), **given)


def test_a_free_variable_must_be_basic():
    model = typed("max", [1, 1], [([1, 1], "<=", 2), ([1, -1], "<=", 0)])
    with pytest.raises(ModelError, match="'x1' is free"):
        pw.explain(model, basis=["r1", "x2"])


def test_an_optimum_with_very_many_extreme_prices():
    """Thirty rows through one vertex in three variables: the prices are judged without listing all extreme ones."""
    draw = Random(3)
    rows = [([draw.randint(1, 9) for _ in range(3)], "<=", 0) for _ in range(30)]
    model = typed("max", [5, 5, 5], [(row, sense, sum(row)) for row, sense, _ in rows])
    best = pw.sensitivity(model)
    found = pw.explain(model, x=[1, 1, 1], prices=best.duals.weights)
    assert (found.point.words, found.prices.verdict.word, found.prices.mix) == ("V0", "exact", ())
    assert "one of very many optimal lists" in str(found)
    assert not best.all_bases


def test_a_model_without_constraints_and_one_that_is_marked_integer():
    assert pw.explain(typed("max", [0, 0], []), x=[1, 2], prices=[]).answer.right
    marked = pw.Model(("x",), (pw.Constraint("cap", (Fraction(1),), "<=", Fraction(3, 2)),), None, integers=("x",))
    model = marked.with_objective({"x": 1}, "max")
    assert "integer marks are not applied" in str(pw.sensitivity(model))


def test_what_linprog_returns_goes_in_as_it_is():
    """scipy's own names: marginals of A_ub, then of A_eq; its bounds are left out and follow."""
    arrays = {"c": [-1, 4], "A_ub": [[-3, 1], [1, 2]], "b_ub": [6, 4], "A_eq": [[1, -1]], "b_eq": [11]}
    bounds = [(None, None), (-3, None)]
    peer = linprog(**arrays, bounds=bounds)
    found = pw.explain(
        pw.from_arrays(*arrays.values(), bounds=bounds),
        x=peer.x,
        prices=[*peer.ineqlin.marginals, *peer.eqlin.marginals],
    )
    assert found.answer.right
    assert found.prices.derived == ("x2 lower",)


def test_tolerances_are_stated_where_they_were_used():
    assert "1e-06 of a right-hand side" in str(pw.explain(wyndor(), x=[2, 6.0000001]))
    assert "1e-06" not in str(pw.explain(wyndor(), x=[2, 6]))
    assert "object at 0x" not in repr(pw.explain(wyndor(), x=[2, 6], prices=[0, 1.5, 1]).answer)
