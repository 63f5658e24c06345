"""Differences: volumes against one another and on a grid, vertices, constraints, findings; flat and endless ones."""

from fractions import Fraction
from itertools import product
from math import sqrt

import pytest
from zoo import ZOO, build

import polywalk as pw
from polywalk.reviewing.parts import missing
from polywalk.scenarios import VARIANTS, harbour_row

PLANE = [name for name, (model, _) in ZOO.items() if model.n == 2]


def inside(model: pw.Model, point: tuple[Fraction, ...]) -> bool:
    return all(row.holds(point) for row in model.constraints)


def test_a_triangle_cut_from_a_square() -> None:
    square = pw.from_algebra(maximize="x + y", bounds={"x": (0, 2), "y": (0, 2)})
    cut = square.with_constraint("corner", {"x": 1, "y": 1}, "<=", 3)
    found = pw.difference(square, cut)  # worked out by hand: a triangle with legs of 1
    assert (found.cut_off.volume, found.added.volume, found.gain) == (Fraction(1, 2), 0, -1)
    assert [corner.point for corner in found.vertices("lost")] == [(2, 2)]
    assert [corner.point for corner in found.vertices("gained")] == [(1, 2), (2, 1)]
    assert len(found.vertices("kept")) == 3
    rows = {row.name: row for row in found.rows}
    assert (rows["corner"].change, rows["corner"].became_active) == ("added", True)
    assert rows["x upper"].became_idle
    assert [item.code for item in found.appeared] == ["tied-optimum"]


@pytest.mark.parametrize("variant", VARIANTS)
def test_volumes_add_up(variant: str) -> None:
    """before - cut off = common = after - added, where all are bounded."""
    model = harbour_row(variant)
    for other in (harbour_row(), harbour_row("degenerate"), harbour_row("infeasible")):
        if set(other.variables) != set(model.variables):
            continue
        found = pw.difference(other, model)
        if found.before.volume is not None:
            assert found.before.volume - found.cut_off.volume == found.common.volume
        if found.after.volume is not None:
            assert found.after.volume - found.added.volume == found.common.volume


@pytest.mark.parametrize("one", PLANE)
def test_pieces_hold_what_the_other_forbids_and_nothing_else(one: str) -> None:
    """On a grid: a point is in the open part exactly where one model allows it and the other does not."""
    before = ZOO[one][0]
    after = build("x y", [("cap", [1, 2], "<=", 3), ("low", [1, -1], ">=", -1)])
    part = missing(pw.region(pw.Model(("x", "y"), before.constraints)), after)
    for point in product([Fraction(k, 3) for k in range(-6, 16)], repeat=2):
        gone = inside(before, point) and not inside(after, point)
        held = sum(inside(piece.model, point) for piece in part.pieces)
        assert held >= gone
        assert not held or inside(before, point)


def test_an_unbounded_region_loses_a_bounded_part() -> None:
    quadrant = pw.from_algebra(minimize="x + y", bounds={"x": (0, None), "y": (0, None)})
    found = pw.difference(quadrant, quadrant.with_constraint("demand", {"x": 1, "y": 1}, ">=", 1))
    assert (found.cut_off.volume, found.added.volume, found.before.volume) == (Fraction(1, 2), 0, None)
    turned = pw.difference(found.after, found.before)
    assert (turned.added.volume, turned.gain) == (Fraction(1, 2), -1)
    assert pw.difference(quadrant, quadrant.with_constraint("cap", {"x": 1}, "<=", 1)).cut_off.volume is None


def test_flat_regions_are_measured_in_their_own_dimension() -> None:
    segment = build("x y", [("x lower", [1, 0], ">=", 0), ("y lower", [0, 1], ">=", 0), ("sum", [1, 1], "==", 2)])
    found = pw.difference(segment, segment.with_constraint("half", {"x": 1}, "<=", 1))
    assert (found.cut_off.volume, found.cut_off.dimension) == (0, 1)
    assert found.cut_off.measure == pytest.approx(sqrt(2))
    assert "without area (dimension 1), length about 1.41421" in found.summary[0]
    equal = pw.difference(harbour_row(), harbour_row("flat"))
    assert equal.cut_off.volume == equal.before.volume


@pytest.mark.parametrize("name", [name for name, (model, _) in ZOO.items() if model.n <= 3])
def test_every_kind_of_model_differs_from_itself_by_nothing(name: str) -> None:
    model = ZOO[name][0]
    found = pw.difference(model, model)
    assert (found.cut_off.pieces, found.added.pieces, found.appeared, found.gone) == ((), (), (), ())
    assert found.summary[0] == "Both versions allow exactly the same plans."
    assert all(row.change == "same" for row in found.rows)
    if model.n <= 3:
        pw.draw(found)
        pw.picture(found)


def test_a_change_to_and_from_an_empty_model() -> None:
    found = pw.difference(harbour_row(), harbour_row("infeasible"))
    assert found.cut_off.volume == found.before.volume == Fraction(827, 6)
    assert "cuts off every plan" in found.summary[0]
    assert "no-plan" in [item.code for item in found.appeared]
    back = pw.difference(harbour_row("infeasible"), harbour_row())
    assert back.added.volume == Fraction(827, 6)
    for change in (found, back):
        pw.picture(change)


def test_the_order_of_variables_may_differ_and_their_names_may_not() -> None:
    one = pw.from_algebra(maximize="x + 2*y", bounds={"x": (0, 1), "y": (0, 3)})
    other = pw.from_algebra(maximize="2*y + x", bounds={"y": (0, 3), "x": (0, 1)})
    assert other.variables != one.variables
    assert not pw.difference(one, other).cut_off.pieces
    with pytest.raises(pw.PolywalkError, match="only one has 'z'"):
        pw.difference(one, pw.from_algebra(maximize="x + y + z", bounds={"x": (0, 1)}))


def test_redundant_constraints_are_told() -> None:
    model = harbour_row("two decisions")
    found = pw.difference(model, model.with_rhs("grid connection", 3))
    moved = {row.name for row in found.rows if row.became_needed}
    assert moved == {"quay pipe"}
    assert {row.name for row in pw.difference(found.after, found.before).rows if row.became_redundant} == {"quay pipe"}


def test_versions_are_a_table() -> None:
    model = harbour_row()
    found = pw.versions([model, model.with_rhs("harbour main", 10), harbour_row("unbounded")], ["a", "b|c", "d"])
    table = found.table()
    assert [row[0] for row in table.rows] == ["a", "b|c", "d"]
    assert table.rows[1][table.columns.index("cut off")] == 39
    assert table.rows[2][table.columns.index("added")] == "infinite"
    assert "b&#124;c" in found.markdown()
    for wrong in ([], ([model], ["a", "b"])):
        with pytest.raises(pw.PolywalkError, match="expected"):
            pw.versions(*wrong) if isinstance(wrong, tuple) else pw.versions(wrong)


@pytest.mark.parametrize("mode", ["light", "dark", "grey"])
def test_parts_are_told_apart_without_colour(mode: str) -> None:
    model = harbour_row("two decisions")
    found = pw.difference(model, model.with_rhs("harbour main", 9).without("return temperature"))
    drawn = pw.drawing.scene(found)
    assert {"cut off", "added"} <= {label.text for label in drawn.labels}
    assert {"lost", "gained", "vertex"} <= {mark.role for mark in drawn.marks}
    svg = pw.picture(found, mode=mode).data.decode()
    assert svg.count("<pattern") >= 2  # strokes and dots
    shapes = {trace.fillpattern.shape for trace in pw.draw(found).data if trace.type == "scatter"} - {None}
    assert shapes == {"/", "."}
