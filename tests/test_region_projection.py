"""Shadows of regions: names, flat and unbounded ones, and the same answer as projecting every generator."""

from __future__ import annotations

from fractions import Fraction

import families as known
import pytest
from zoo import CUBE, PYRAMID, XYZ, ZOO, build

from polywalk.errors import DuplicateName, ModelError, UnknownName
from polywalk.model import Model
from polywalk.region import project, region


def rows(model: Model) -> list[str]:
    return [f"{row.name}: {row.text(model.variables)}" for row in model.constraints]


def test_facets_are_named_after_what_is_active_above_them() -> None:
    found = project(region(build("x y z", PYRAMID)), ["x", "z"])
    assert rows(found.model) == ["floor: z ≥ 0", "east: x + z ≤ 1", "west: x - z ≥ -1"]
    tetrahedron = region(build("x y z", [*XYZ, ("sum", [1, 1, 1], "<=", 1)]))
    assert rows(project(tetrahedron, ["x", "y"]).model) == [
        "x lower: x ≥ 0",
        "y lower: y ≥ 0",
        "z lower & sum: x + y ≤ 1",
    ]


def test_a_flat_shadow_keeps_its_equality_and_its_name() -> None:
    model = build("x y z", [*XYZ, ("gap", [1, -1, 0], "==", 0), ("sum", [0, 1, 1], "<=", 3)])
    found = project(region(model), ["x", "y"])
    assert found.dimension == 1
    assert [row.name for row in found.model.constraints] == ["x lower & y lower", "z lower & sum", "gap"]
    assert rows(found.model)[-1] == "gap: x - y = 0"
    assert [vertex.point for vertex in found.vertices] == [(0, 0), (3, 3)]


def test_an_equality_of_a_shadow_can_need_several() -> None:
    model = build("x y z", [("a", [1, 0, 1], "==", 4), ("b", [0, 1, 1], "==", 1), ("c", [0, 0, 1], ">=", 0)])
    found = project(region(model), ["y", "x"])
    assert rows(found.model)[0] == "a & b: y - x = -3"
    assert [row.text(found.model.variables) for row in found.model.constraints[1:]] in (["y ≤ 1"], ["x ≤ 4"])


def test_an_implied_equality_lends_its_name() -> None:
    model = build("x y", [("most", [1, 1], "<=", 2), ("least", [1, 1], ">=", 2), ("y fixed", [0, 1], "==", 1)])
    found = project(region(model), ["x"])
    assert found.vertices[0].point == (1,)
    assert found.model.constraints[0].sense == "=="
    assert "y fixed" in found.model.constraints[0].name


def test_open_shadows() -> None:
    cone = region(ZOO["square cone in space"][0])
    down = project(cone, ["x", "y"])
    assert (down.status, len(down.lines), down.model.constraints) == ("unbounded", 2, ())
    side = project(cone, ["x", "z"])
    assert [ray.direction for ray in side.rays] == [(-1, 1), (1, 1)]
    strip = project(region(ZOO["strip with a line"][0]), ["y"])
    assert len(strip.lines) == 1
    wedge = project(region(ZOO["wedge with a line"][0]), ["x", "y"])
    assert [vertex.point for vertex in wedge.vertices] == [(0, 1)]
    assert len(wedge.rays) == 2


def test_an_empty_region_casts_an_empty_shadow() -> None:
    found = project(region(ZOO["empty"][0]), ["y"])
    assert found.status == "empty"
    assert found.model.variables == ("y",)


def test_order_units_marks_and_objective() -> None:
    cube = build("x y z", CUBE, ("max", [2, 0, 1]))
    marked = Model(cube.variables, cube.constraints, cube.objective, (("x", "MW"), ("y", "t")), ("y", "z"), "demo")
    kept = project(region(marked), ["z", "x"])
    assert kept.model.variables == ("z", "x")
    assert kept.model.units == (("x", "MW"),)
    assert kept.model.integers == ("z",)
    assert kept.model.name == "demo"
    assert kept.model.objective is not None
    assert kept.model.objective.coefficients == (1, 2)
    assert kept.value == 3
    assert project(region(marked), ["x", "y"]).model.objective is None


def test_a_shadow_on_all_variables_is_the_region_without_what_is_redundant() -> None:
    model, _ = ZOO["touching redundant row"]
    found = project(region(model), model.variables)
    assert [row.name for row in found.model.constraints] == ["x lower", "y lower", "x upper", "y upper"]
    assert [vertex.point for vertex in found.vertices] == [vertex.point for vertex in region(model).vertices]


@pytest.mark.parametrize("name", ZOO)
def test_every_shadow_is_the_hull_of_projected_generators(name: str) -> None:
    """By support functions: in many directions the shadow reaches exactly as far as the region itself."""
    whole = region(ZOO[name][0])
    if whole.model.n == 1:
        return
    shadow = project(whole, whole.model.variables[:2])
    assert (shadow.status == "empty") == (whole.status == "empty")
    for direction in [(a, b) for a in range(-3, 4) for b in range(-3, 4) if whole.base and (a or b)]:
        way = dict(zip(whole.model.variables, direction, strict=False))
        far = [region(found.model.with_objective(way, "max")) for found in (whole, shadow)]
        assert far[0].outcome == far[1].outcome
        assert far[0].value == far[1].value


def test_names_stay_unique() -> None:
    found = project(region(known.cell24()), ["x1", "x2", "x3"])
    names = [row.name for row in found.model.constraints]
    assert len(set(names)) == len(names) == 14
    assert "side 0 1" in names
    assert "(1, 1, 1, 1) & (1, 1, 1, -1)" in names


def test_what_cannot_be_projected_is_refused() -> None:
    found = region(known.cube(3))
    with pytest.raises(UnknownName, match="did you mean 'x1'"):
        project(found, ["x1", "x11"])
    with pytest.raises(DuplicateName, match="'x2' is given twice"):
        project(found, ["x2", "x2"])
    with pytest.raises(ModelError, match="names of the variables to keep"):
        project(found, [])
    with pytest.raises(ModelError, match="as a list, got 'x1'"):
        project(found, "x1")


def test_numbers_stay_exact() -> None:
    rows_ = [("third", [3, 1], "<=", 1), ("x lower", [1, 0], ">=", 0), ("y lower", [0, 1], ">=", "1/7")]
    found = project(region(build("x y", rows_)), ["x"])
    assert found.ranges == {"x": (0, Fraction(2, 7))}
