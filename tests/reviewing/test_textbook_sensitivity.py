"""CHECKS part E: every textbook model (shared data, each entry with its source) beside its published sensitivity."""

from __future__ import annotations

import json
from fractions import Fraction
from math import inf
from pathlib import Path

import pytest
from checker import proves_optimal
from small import plain, typed

import polywalk as pw

DATA = Path(__file__).parents[2].parent / "shared" / "data" / "textbook.json"
pytestmark = [
    pytest.mark.needs_shared_data,
    pytest.mark.skipif(not DATA.exists(), reason="shared/data/textbook.json is not here"),
]
ENTRIES = json.loads(DATA.read_text()) if DATA.exists() else []
OPTIMAL = [entry for entry in ENTRIES if entry["exact"]["status"] == "optimal"]


def number(text):
    return float(text) if text in {"inf", "-inf"} else Fraction(text)


def model_of(entry):
    senses = {"=": "==", "<=": "<=", ">=": ">="}
    rows = [(a, senses[op], b) for a, op, b in zip(entry["A"], entry["ops"], entry["b"], strict=True)]
    lower, upper = ([None if abs(float(value)) == inf else value for value in entry[side]] for side in ("lo", "hi"))
    return typed(entry["sense"], entry["c"], rows, lower, upper)


def each(entries):
    return pytest.mark.parametrize("entry", [pytest.param(entry, id=entry["name"]) for entry in entries])


def rows_of(entry):
    return [f"r{i + 1}" for i in range(len(entry["b"]))]


def test_nothing_is_missing():
    assert len(ENTRIES) >= 33
    assert len(OPTIMAL) >= 24
    assert sum(len(entry["exact"]["duals"]) > 1 for entry in OPTIMAL) >= 3
    assert sum(entry["exact"]["n_optimal_vertices"] > 1 for entry in OPTIMAL) >= 4


@each(OPTIMAL)
def test_optimal_vertices_and_directions(entry):
    found, known = pw.sensitivity(model_of(entry)), entry["exact"]
    assert found.value == Fraction(known["obj"])
    assert {corner.point for corner in found.best} == {
        tuple(map(Fraction, point)) for point in known["optimal_vertices"]
    }
    assert len(found.directions) == len(known["optimal_rays"])
    assert found.tied == known["alternate"]


@each(OPTIMAL)
def test_extreme_duals_and_their_proofs(entry):
    model, known = model_of(entry), entry["exact"]
    found, count = pw.sensitivity(model), len(entry["b"])
    assert {corner[:count] for corner in found.duals.corners} == {tuple(map(Fraction, dual)) for dual in known["duals"]}
    goal = model.objective
    objective = (goal.goal, goal.coefficients, goal.constant)
    for corner in found.duals.corners:
        for best in found.best:
            assert proves_optimal(objective, plain(model), best.point, corner, found.value)


@each(OPTIMAL)
def test_left_and_right_prices(entry):
    found = pw.sensitivity(model_of(entry))
    for name, known in zip(rows_of(entry), entry["exact"]["shadow_left_right"], strict=True):
        price = found.price(name)
        worse = inf if entry["sense"] == "min" else -inf  # the data say null where a step leaves no feasible plan
        assert price.left == (-worse if known["left"] is None else Fraction(known["left"])), name
        assert price.right == (worse if known["right"] is None else Fraction(known["right"])), name


@each(OPTIMAL)
def test_right_hand_side_ranges(entry):
    """The data give the range over which the first dual stays optimal: the piece of the value function of its slope."""
    found, known = pw.sensitivity(model_of(entry)), entry["exact"]
    first = [Fraction(value) for value in known["duals"][0]]
    checked = 0
    for name, slope, ends in zip(rows_of(entry), first, known["b_range_first_dual"], strict=True):
        price = found.price(name)
        low = price.low if slope == price.left else price.rhs
        high = price.high if slope == price.right else price.rhs
        assert [low, high] == [number(end) for end in ends], name
        checked += 1
    assert checked == len(entry["b"])


@each(OPTIMAL)
def test_cost_ranges_of_the_first_optimum(entry):
    found, known = pw.sensitivity(model_of(entry)), entry["exact"]
    point = tuple(map(Fraction, known["optimal_vertices"][0]))
    corner = next(corner for corner in found.best if corner.point == point)
    ranges = [[item.low, item.high] for item in found.cost_ranges[corner.name]]
    assert ranges == [[number(end) for end in ends] for ends in known["c_range_first_optimum"]]


@each([entry for entry in OPTIMAL if all(sum(value != "0" for value in row) > 1 for row in entry["A"])])
def test_reduced_costs(entry):
    """Where no typed row is a bound of a single variable, so that the bounds are the same here and there."""
    found, known = pw.sensitivity(model_of(entry)), entry["exact"]
    for item, value in zip(found.reduced_costs, known["reduced_costs_first_dual"], strict=True):
        assert item.low <= Fraction(value) <= item.high
        if found.unique_prices:
            assert item.low == item.high == Fraction(value)


@each([entry for entry in OPTIMAL if "b_range" in entry["claim"]])
def test_claims_as_published(entry):
    """The book's own figures (from memory), where the data hold them beside the recomputed ones."""
    claim, found = entry["claim"], pw.sensitivity(model_of(entry))
    assert found.value == claim["obj"]
    if "dual" in claim:
        assert list(found.duals.weights[: len(entry["b"])]) == [Fraction(str(value)) for value in claim["dual"]]
    for name, ends in zip(rows_of(entry), claim["b_range"], strict=True):
        printed = [pytest.approx(float(number(str(end))), rel=1e-6) for end in ends]  # books round
        assert [float(found.price(name).low), float(found.price(name).high)] == printed, name


@each([entry for entry in ENTRIES if entry["exact"]["status"] != "optimal"])
def test_a_model_without_optimum_says_so(entry):
    found = pw.sensitivity(model_of(entry))
    assert found.outcome == entry["exact"]["status"]
    assert (found.prices, found.reduced_costs, found.best, found.bases, found.why) == ((), (), (), (), ())
    assert f"the model is {found.outcome}" in str(found)
