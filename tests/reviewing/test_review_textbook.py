"""Textbook models (CHECKS E and F, each with its source there): redundancy, degenerate vertices, ties and rays."""

from __future__ import annotations

import json
from fractions import Fraction
from pathlib import Path

import pytest
from checker import proves_unbounded
from small import plain, typed

from polywalk.reviewing import review

DATA = Path(__file__).parents[2].parent / "shared" / "data" / "textbook.json"
pytestmark = [
    pytest.mark.needs_shared_data,
    pytest.mark.skipif(not DATA.exists(), reason="shared/data/textbook.json is not here"),
]
ENTRIES = json.loads(DATA.read_text()) if DATA.exists() else []


def model_of(entry):
    rows = [(a, "==" if op == "=" else op, b) for a, op, b in zip(entry["A"], entry["ops"], entry["b"], strict=True)]
    lower = [None if value == "-inf" else value for value in entry["lo"]]
    upper = [None if value == "inf" else value for value in entry["hi"]]
    return typed(entry["sense"], entry["c"], rows, lower, upper)


def our_name(entry, name):
    """Theirs "lumber<=", "desklo", "deskhi"; ours "r1", "x1 lower", "x1 upper"."""
    if name.rstrip("<>=") in entry["rown"]:
        return f"r{entry['rown'].index(name.rstrip('<>=')) + 1}"
    side = {"lo": "lower", "hi": "upper"}[name[-2:]]
    return f"x{entry['coln'].index(name[:-2]) + 1} {side}"


def bounded():
    return [entry for entry in ENTRIES if entry["exact"]["status"] == "optimal" and len(entry["c"]) <= 6]


def test_redundant_rows():
    """What never binds is told in full; of rows that touch, one of each group that needs it stays."""
    met = 0
    for entry in bounded():
        told = review(model_of(entry))
        listed = {our_name(entry, name): kind for name, kind in entry["exact"]["individually_redundant"] or []}
        strict = {name for name, kind in listed.items() if kind == "strict"}
        met += len(strict)
        loose = told.of("redundant", "loose-constant", "parallel")
        assert {finding.constraints[0] for finding in loose} >= strict, entry["name"]
        spare = told.of(
            "redundant", "loose-constant", "parallel", "redundant-touching", "duplicate", "jointly-redundant"
        )
        assert {finding.constraints[0] for finding in spare} <= set(listed), entry["name"]
    assert met >= 8


def test_degenerate_vertices_and_ties():
    tied = bent = 0
    for entry in bounded():
        told, exact = review(model_of(entry)), entry["exact"]
        points = {tuple(map(Fraction, point)) for point in exact["degenerate_vertices"]}
        assert {finding.points[0] for finding in told.of("degenerate-vertex")} == points, entry["name"]
        assert bool(told.of("tied-optimum")) is exact["alternate"], entry["name"]
        tied, bent = tied + exact["alternate"], bent + len(points)
    assert tied >= 4
    assert bent >= 5


def test_unbounded_models():
    entries = [entry for entry in ENTRIES if entry["exact"]["status"] == "unbounded"]
    assert len(entries) >= 3
    for entry in entries:
        model = model_of(entry)
        (found,) = review(model).of("unbounded-objective")
        goal = model.objective
        assert proves_unbounded(goal.goal, goal.coefficients, plain(model), found.points[0], found.rays[0]), entry[
            "name"
        ]
