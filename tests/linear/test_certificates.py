"""Published infeasible and unbounded models, with the proofs checked; and the checker itself, which must say no."""

from __future__ import annotations

import json
from fractions import Fraction
from math import inf
from pathlib import Path

import pytest
from checker import proves_empty, proves_optimal, proves_unbounded
from small import plain, typed

from polywalk.linear import farkas, improving_ray, optimum

DATA = Path(__file__).parents[2].parent / "shared" / "data" / "textbook.json"


def textbook(kind: str) -> list[dict]:
    """CHECKS part F: the textbook models of a kind, each with its source; none where the data are absent."""
    if not DATA.exists():
        return []
    return [entry for entry in json.loads(DATA.read_text()) if kind in (entry["exact"].get("status") or "")]


def model_of(entry: dict):
    """A textbook entry as a model."""
    senses = {"=": "==", "<=": "<=", ">=": ">="}
    rows = [(a, senses[op], b) for a, op, b in zip(entry["A"], entry["ops"], entry["b"], strict=True)]
    lower = [None if abs(float(value)) == inf else value for value in entry["lo"]]
    upper = [None if abs(float(value)) == inf else value for value in entry["hi"]]
    return typed(entry["sense"], entry["c"], rows, lower, upper)


@pytest.mark.needs_shared_data
@pytest.mark.skipif(not DATA.exists(), reason="shared/data/textbook.json is not here")
def test_published_infeasible_models_are_proven_empty():
    entries = textbook("infeasible")
    assert len(entries) >= 6
    for entry in entries:
        model = model_of(entry)
        assert proves_empty(plain(model), farkas(model).weights), entry["name"]


@pytest.mark.needs_shared_data
@pytest.mark.skipif(not DATA.exists(), reason="shared/data/textbook.json is not here")
def test_published_unbounded_models_are_proven_unbounded():
    entries = textbook("unbounded")
    assert len(entries) >= 3
    for entry in entries:
        model, goal = model_of(entry), model_of(entry).objective
        ray = improving_ray(model)
        assert proves_unbounded(goal.goal, goal.coefficients, plain(model), ray.point, ray.direction), entry["name"]


@pytest.mark.needs_shared_data
@pytest.mark.skipif(not DATA.exists(), reason="shared/data/textbook.json is not here")
def test_published_optima():
    entries = textbook("optimal")
    assert len(entries) >= 15
    for entry in entries:
        assert optimum(model_of(entry)).value == Fraction(entry["exact"]["obj"]), entry["name"]


def test_a_model_can_have_both_proofs_of_emptiness_and_a_ray_without_a_start():
    """Primal and dual infeasible: emptiness decides (CHECKS part A: cddlib's status alone would not tell)."""
    model = typed("max", [2, -1], [([1, -1], "<=", 1), ([-1, 1], "<=", -2)], lower=0)
    assert optimum(model).outcome == "infeasible"
    assert proves_empty(plain(model), farkas(model).weights)
    assert improving_ray(model) is None


def test_checker_refuses_wrong_proofs():
    rows = [([1, 1], ">=", 3), ([1, 0], "<=", 1), ([0, 1], "<=", 1)]
    assert proves_empty(rows, [-1, 1, 1])
    assert not proves_empty(rows, [1, -1, -1])
    assert not proves_empty(rows, [0, 0, 0])
    assert not proves_empty(rows, [-1, 1, 2])
    open_rows = [([1, -1], "<=", 1)]
    assert proves_unbounded("max", [1, 0], open_rows, [0, 0], [1, 1])
    assert not proves_unbounded("min", [1, 0], open_rows, [0, 0], [1, 1])
    assert not proves_unbounded("max", [1, 0], open_rows, [2, 0], [1, 1])
    assert not proves_unbounded("max", [1, 0], open_rows, [0, 0], [1, 0])
    assert proves_optimal(("max", [1], 0), [([1], "<=", 2)], [2], [1], 2)
    assert not proves_optimal(("max", [1], 0), [([1], "<=", 2)], [1], [1], 1)
    assert not proves_optimal(("max", [1], 0), [([1], "<=", 2)], [2], [0], 2)
    assert not proves_optimal(("min", [1], 0), [([1], "<=", 2)], [2], [1], 2)


def test_proofs_show_themselves():
    model = typed("max", [1, 1], [([1, 1], ">=", 3)], lower=0, upper=(1, 1))
    told = str(farkas(model))
    assert told.startswith("these constraints, multiplied and added, say 0 ≤ -1")
    assert "x1 upper" in told
    assert "x1 lower" not in told
    assert "infeasible" in str(optimum(model))
    assert "r1" in optimum(model).frame()["constraint"].tolist()
