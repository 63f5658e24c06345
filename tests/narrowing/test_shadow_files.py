"""Shadows of published models: beside a grid of feasibility solves, and of delicate regions beside exact counts."""

from __future__ import annotations

import json
from fractions import Fraction
from pathlib import Path
from typing import Any

import highspy
import numpy as np
import pytest
from zoo import plain

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError
from polywalk.exact import exact
from polywalk.narrowing import Shadow, shadow
from polywalk.narrowing.best import best
from polywalk.region import project, region

DATA = Path(__file__).parents[3] / "shared" / "data"

pytestmark = [
    pytest.mark.needs_shared_data,
    pytest.mark.skipif(not DATA.exists(), reason="the reference data ../shared/data is not here"),
]


def file(name: str) -> BigModel:
    from polywalk.reading import from_mps

    return from_mps(DATA / "mps" / f"{name}.mps")


def is_allowed(solver: highspy.Highs, places: list[int], point: list[float]) -> bool:
    """Whether HiGHS finds a plan with these values: the model's own bounds, and the values as rows."""
    solver.changeRowsBounds(len(places), np.array(places, dtype=np.int32), np.array(point), np.array(point))
    solver.run()
    return solver.getModelStatus() == highspy.HighsModelStatus.kOptimal


@pytest.mark.parametrize("within", [None, "10%"])
@pytest.mark.parametrize("is_exact", [True, False])
def test_afiro_beside_a_grid_of_feasibility_solves(is_exact: bool, within: str | None) -> None:
    """afiro (netlib): every point of a grid is inside the shadow exactly where HiGHS finds a plan with it."""
    big = file("afiro")
    onto = (big.variables[0], big.variables[16])
    found = shadow(big, onto, within=within, exact=is_exact)
    assert found.region.dimension == 2
    solver = highspy.Highs()
    solver.setOptionValue("output_flag", False)
    solver.readModel(str(DATA / "mps" / "afiro.mps"))
    if within:
        cost = np.flatnonzero(big.cost)
        solver.addRow(-np.inf, float(best(big).value) * 0.9, len(cost), cost.astype(np.int32), big.cost[cost])
    rows = [solver.getNumRow() + k for k in range(2)]
    for name in onto:
        solver.addRow(0, 0, 1, np.array([big.index(name)], dtype=np.int32), np.array([1.0]))
    solver.changeColsCost(big.n, np.arange(big.n, dtype=np.int32), np.zeros(big.n))
    met = [_judged(found, point, is_allowed(solver, rows, [float(v) for v in point])) for point in _grid(found)]
    assert min(met.count(True), met.count(False)) >= 20


def _grid(found: Shadow) -> list[tuple[Fraction, ...]]:
    """12 x 12 points over the shadow's box and a fifth beyond, none of them on a facet."""
    sides = []
    for low, high in found.region.ranges.values():
        assert low is not None
        width = 100 if high is None else high - low
        sides.append([low - width / 5 + width * Fraction(7 * k, 57) + width / 997 for k in range(12)])
    return [(a, b) for a in sides[0] for b in sides[1]]


def _judged(found: Shadow, point: tuple[Fraction, ...], allowed: bool) -> bool:
    assert all(row.holds(point) for row in found.model.constraints) == allowed, [float(v) for v in point]
    return allowed


@pytest.mark.parametrize("name", ["afiro", "sc50a", "sc50b", "adlittle", "kb2", "blend"])
def test_the_objective_axis_ends_at_the_published_optimum(name: str) -> None:
    """netlib lp/data readme; exact fractions by two independent engines (CHECKS G)."""
    known = json.loads((DATA / "mps" / "results.json").read_text())[name]
    big = file(name)
    found = shadow(big, (big.variables[1], "objective"), within="1%")
    assert found.tolerance is None
    assert found.region.value == Fraction(known["exact"])


def cases() -> list[dict[str, Any]]:
    path = DATA / "regions.json"
    return json.loads(path.read_text()) if path.exists() else []


@pytest.mark.parametrize("case", cases(), ids=lambda case: case["name"])
def test_shadows_of_delicate_regions(case: dict[str, Any]) -> None:
    """Vertices that differ in the tenth digit, near-parallel rows, emptiness by 1e-10, cones, lines: as `project`."""
    model = plain(case["A"], case["b"], case.get("eq", []))
    onto = model.variables[:2]
    if any(exact(float(value)) != value for row in model.constraints for value in (*row.coefficients, row.rhs)):
        with pytest.raises(ModelError, match="no decimal"):
            shadow(model, onto)
        return
    found, expected = shadow(model, onto).region, project(region(model), onto)
    assert (found.status, found.dimension) == (expected.status, expected.dimension)
    assert [vertex.point for vertex in found.vertices] == [vertex.point for vertex in expected.vertices]
    assert len(found.rays) == len(expected.rays)
    assert len(found.lines) == len(expected.lines)
