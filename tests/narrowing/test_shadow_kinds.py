"""Shadows of every kind, the objective in them, what is refused, and Ctrl-C."""

from __future__ import annotations

import builtins
import re
from dataclasses import replace
from fractions import Fraction

import numpy as np
import pytest
from proved import every_facet_is_proved
from zoo import build

from polywalk.bigmodel import BigModel
from polywalk.errors import DuplicateName, ModelError, NumberError, SolverError, UnknownName
from polywalk.model import Model
from polywalk.narrowing import shadow
from polywalk.narrowing.support import ExactReach, FloatReach
from polywalk.region import project, region
from polywalk.scenarios import harbour_day, harbour_row, harbour_year
from polywalk.walks import walk

ROW = BigModel.from_model(harbour_row())


def test_the_objective_as_an_axis_is_the_objective_of_the_shadow() -> None:
    found = shadow(ROW, ("pump", "objective"))
    assert found.model.objective is not None
    assert found.region.value == region(harbour_row()).value == 292
    assert found.region.vertices[found.region.optimal.vertices[0]].point[1] == 292  # type: ignore[union-attr]
    assert every_facet_is_proved(found)
    assert walk(found.model).value == 292


@pytest.mark.parametrize("variant", ["base", "degenerate", "tied", "two decisions"])
@pytest.mark.parametrize("goal", ["max", "min"])
def test_suboptimality_is_the_distance_from_the_optimum(variant: str, goal: str) -> None:
    model = harbour_row(variant)
    model = replace(model, objective=replace(model.objective, goal=goal, constant=Fraction(7, 2)))  # type: ignore[type-var, arg-type]
    big = BigModel.from_model(model)
    value, distance = (shadow(big, ("pump", axis)) for axis in ("objective", "suboptimality"))
    best = region(model).value
    assert best is not None
    moved = sorted((x, abs(y - best)) for x, y in (vertex.point for vertex in value.region.vertices))
    assert sorted(vertex.point for vertex in distance.region.vertices) == moved
    assert (distance.region.value, distance.model.objective.goal) == (0, "min")  # type: ignore[union-attr]
    assert every_facet_is_proved(distance)


def test_slopes_of_an_objective_axis_are_prices() -> None:
    found = shadow(harbour_day(), ("tank[7]", "suboptimality"), within="2%")
    sloped = [row for row in found.model.constraints if row.coefficients[1]]
    assert len(sloped) > 6
    assert {abs(row.coefficients[1]) for row in sloped} == {1}
    assert every_facet_is_proved(found)
    named = {row.name: -row.coefficients[0] / row.coefficients[1] for row in sloped if row.name.startswith("slope ")}
    assert len(named) > 6
    assert all(float(name.split()[1]) == pytest.approx(float(slope), rel=1e-3) for name, slope in named.items())
    assert shadow(harbour_day(), ("suboptimality",), within=3).region.vertices[-1].point == (3,)
    empty = shadow(BigModel.from_model(harbour_row("infeasible")), ("pump", "suboptimality"))
    assert empty.region.status == "empty"


def test_near_optimal_plans_by_share_and_by_distance() -> None:
    held = harbour_row().with_constraint("near", {"pump": 23, "chips": 18, "tank": 32}, ">=", Fraction(95, 100) * 292)
    expected = project(region(held), ["pump", "tank"])
    for within in ("5%", Fraction(292, 20), "14.6"):
        found = shadow(ROW, ("pump", "tank"), within=within)
        assert [vertex.point for vertex in found.region.vertices] == [vertex.point for vertex in expected.vertices]
        assert every_facet_is_proved(found)
        assert "of the optimum 292" in str(found)


def test_within_0_is_the_optimal_face() -> None:
    tied = BigModel.from_model(harbour_row("tied"))
    found = shadow(tied, ("pump", "chips"), within=0)
    assert [vertex.point for vertex in found.region.vertices] == [(0, 8), (4, 4)]
    assert found.region.dimension == 1
    assert every_facet_is_proved(found)
    float_one = shadow(tied, ("pump", "chips"), within=0, exact=False)
    assert [vertex.point for vertex in float_one.region.vertices] == [(0, 8), (4, 4)]


def test_an_objective_of_other_variables_is_left_out() -> None:
    assert shadow(ROW, ("pump", "chips")).model.objective is None
    assert shadow(ROW, ("pump", "chips", "tank")).model.objective is not None


@pytest.mark.parametrize("exact", [True, False])
@pytest.mark.parametrize("variant", ["base", "infeasible", "unbounded", "flat", "tied", "degenerate"])
def test_harbour_row_onto_all_three_is_harbour_row(variant: str, exact: bool) -> None:
    model = harbour_row(variant)
    found, expected = shadow(BigModel.from_model(model), model.variables, exact=exact), region(model)
    assert found.region.status == expected.status
    assert [vertex.point for vertex in found.region.vertices] == [vertex.point for vertex in expected.vertices]
    assert [ray.direction for ray in found.region.rays] == [ray.direction for ray in expected.rays]
    assert not exact or every_facet_is_proved(found)
    if exact and variant == "infeasible":
        assert "conflict(big)" in str(found)


def test_emptiness_by_less_than_solver_tolerance_is_seen() -> None:
    """x + y >= 2 + 1e-7 in the unit square is empty, and HiGHS calls it optimal (CHECKS F)."""
    rows = [("sum", [1, 1], ">=", "2.0000001"), ("x lower", [1, 0], ">=", 0), ("x upper", [1, 0], "<=", 1)]
    rows += [("y lower", [0, 1], ">=", 0), ("y upper", [0, 1], "<=", 1)]
    found = shadow(BigModel.from_model(build("x y", rows)), ("x", "y"))
    assert found.region.status == "empty"
    assert every_facet_is_proved(found)


def test_integer_marks_are_relaxed_and_told() -> None:
    model = harbour_row()
    marked = Model(model.variables, model.constraints, model.objective, integers=("pump", "tank"))
    found = shadow(BigModel.from_model(marked), ("pump", "chips"))
    assert found.model.integers == ("pump",)
    assert "integer marks are relaxed: pump and 1 other" in str(found)


def test_a_facet_says_which_constraints_stop_it_largest_first() -> None:
    found = shadow(ROW, ("chips", "tank")).facet("harbour main & pump lower")
    assert found.multipliers == (("harbour main", 1), ("pump lower", -1))
    sizes = [abs(value) for facet in shadow(ROW, ("pump", "objective")).facets for _, value in facet.multipliers]
    assert len(sizes) > 8
    for facet in shadow(ROW, ("pump", "objective")).facets:
        sizes = [abs(value) for _, value in facet.multipliers]
        assert sizes == sorted(sizes, reverse=True)
    with pytest.raises(UnknownName, match="harbour main"):
        shadow(ROW, ("chips", "tank")).facet("harbour mian & pump lower")


def test_what_cannot_be_asked_is_refused() -> None:
    with pytest.raises(UnknownName, match="did you mean 'pump'"):
        shadow(ROW, ("pmp", "chips"))
    with pytest.raises(DuplicateName, match="'pump' is given twice"):
        shadow(ROW, ("pump", "pump"))
    with pytest.raises(ModelError, match="one to three"):
        shadow(ROW, ())
    with pytest.raises(ModelError, match="one to three"):
        shadow(ROW, "pump")
    with pytest.raises(NumberError, match="at least 0"):
        shadow(ROW, ("pump",), within=-1)
    with pytest.raises(ModelError, match="unbounded"):
        shadow(BigModel.from_model(harbour_row("unbounded")), ("pump",), within="1%")
    with pytest.raises(ModelError, match="objective"):
        shadow(ROW.without_objective(), ("pump", "objective"))
    with pytest.raises(ModelError, match="suboptimality"):
        shadow(ROW.without_objective(), ("pump", "suboptimality"))
    with pytest.raises(ModelError, match="unbounded"):
        shadow(BigModel.from_model(harbour_row("unbounded")), ("pump", "suboptimality"))


def test_without_highspy_the_remedy_is_told(monkeypatch: pytest.MonkeyPatch) -> None:
    real = builtins.__import__

    def missing(name: str, *rest: object, **more: object) -> object:
        if name == "highspy":
            raise ImportError(name)
        return real(name, *rest, **more)  # type: ignore[arg-type]

    monkeypatch.setattr(builtins, "__import__", missing)
    with pytest.raises(SolverError, match="pip install highspy"):
        shadow(ROW, ("pump",))


@pytest.mark.parametrize(("exact", "kind"), [(True, ExactReach), (False, FloatReach)])
@pytest.mark.parametrize("after", [1, 3, 6, 9])
def test_an_interrupt_returns_the_inner_outline(
    exact: bool, kind: type, after: int, monkeypatch: pytest.MonkeyPatch
) -> None:
    asked, real = [], kind.ask

    def ask(self: object, direction: tuple[int, ...], *facet: object) -> object:
        asked.append(direction)
        if len(asked) > after:
            raise KeyboardInterrupt
        return real(self, direction, *facet)

    monkeypatch.setattr(kind, "ask", ask)
    found = shadow(ROW, ("pump", "chips", "tank"), exact=exact)
    assert found.is_partial
    assert "partial" in str(found)
    assert all(all(row.holds(vertex.point) for row in harbour_row().constraints) for vertex in found.region.vertices)
    assert found.region.vertices
    assert not any(facet.is_proved and not facet.multipliers for facet in found.facets)


def test_an_interrupt_before_any_point_goes_on_as_one(monkeypatch: pytest.MonkeyPatch) -> None:
    def ask(self: object, direction: tuple[int, ...], *facet: object) -> object:
        raise KeyboardInterrupt

    monkeypatch.setattr(ExactReach, "ask", ask)
    with pytest.raises(KeyboardInterrupt):
        shadow(ROW, ("pump",))


@pytest.mark.parametrize("onto", [("pump[7]", "tank[7]"), ("chips[3]", "level[4]"), ("pump[7]", "objective")])
def test_a_day_exact_and_in_floats_is_the_same(onto: tuple[str, str]) -> None:
    exact, rounded = (shadow(harbour_day(), onto, within="2%", exact=flag) for flag in (True, False))
    assert exact.tolerance is None
    assert rounded.tolerance is not None
    assert len(exact.region.vertices) == len(rounded.region.vertices) == len(exact.facets) == len(rounded.facets)
    pairs = zip(exact.region.vertices, rounded.region.vertices, strict=True)
    assert all(np.allclose(np.array(a.point, float), np.array(b.point, float), rtol=1e-7, atol=1e-6) for a, b in pairs)


def test_a_stated_size_is_exact() -> None:
    """At least 5,000 nonzeros are rebuilt in fractions; a year is past it, and says so."""
    big = harbour_year(400)
    assert big.nonzeros > 5000
    found = shadow(big, ("pump[7]", "tank[7]"))
    assert found.tolerance is None
    assert all(facet.is_proved for facet in found.facets)
    later = shadow(harbour_year(800), ("pump[7]", "tank[7]"))
    assert later.tolerance is not None
    assert "not claimed" in str(later)
    assert [vertex.point for vertex in found.region.vertices] == [vertex.point for vertex in later.region.vertices]


def test_corners_that_cannot_be_put_together_are_counted(monkeypatch: pytest.MonkeyPatch) -> None:
    """Then a corner of four facets stays two vertices of the model; the true number is told."""
    onto = ("level[5]", "level[15]", "objective")
    exact = shadow(harbour_day(), onto, within="0.5%")
    monkeypatch.setattr("polywalk.narrowing.merging.met", lambda _: None)
    rough = shadow(harbour_day(), onto, within="0.5%", exact=False)
    corners = exact.region.vertices
    crowded = sum(len(corner.active) > 3 for corner in corners)
    assert crowded >= 20
    assert len(rough.region.vertices) > len(corners)
    told = re.search(r"(\d+) corners; at (\d+) of them more facets meet than would do", str(rough))
    assert told is not None
    assert int(told[1]) == len(corners)
    assert 20 <= int(told[2]) <= crowded, "some happen to meet in one point all the same"
    assert "more facets meet" not in str(exact)
    assert "more facets meet" not in str(shadow(harbour_day(), onto[:2], exact=False))


def test_suboptimality_begins_at_zero_in_floats_too() -> None:
    for hour in (7, 15):
        found = shadow(harbour_year(400), (f"tank[{hour}]", "suboptimality"), within=25, exact=False)
        assert found.tolerance is not None
        assert found.region.value == 0
        assert {vertex.point[1] for vertex in found.region.vertices} >= {0, 25}
