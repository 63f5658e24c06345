"""Stops of a slider: round, from the range that matters, with every breakpoint and the present value among them."""

from __future__ import annotations

from fractions import Fraction

import pytest

import polywalk as pw
from polywalk.reviewing.crowding import crowding
from polywalk.reviewing.stops import number_of, stops, with_number

HARBOUR = pw.scenarios.harbour_row()
NUMBERS = [("right-hand side", row.name) for row in HARBOUR.constraints] + [("cost", x) for x in HARBOUR.variables]


@pytest.mark.parametrize(("kind", "name"), NUMBERS)
def test_breakpoints_ends_and_the_present_value_are_stops(kind: str, name: str) -> None:
    found = stops(HARBOUR, kind, name)
    function = pw.value_function(HARBOUR, **{"rhs" if kind == "right-hand side" else "cost": name})
    wanted = {*function.breakpoints, number_of(HARBOUR, kind, name)}
    assert wanted <= set(found.values)
    assert set(function.breakpoints) <= set(found.marks)
    assert list(found.values) == sorted(set(found.values))
    assert 40 <= len(found.values) <= 200
    assert found.values[0] < min(wanted)
    assert max(wanted) < found.values[-1]


def test_the_range_reaches_what_the_region_reaches_without_the_row() -> None:
    seen = pw.region(HARBOUR.without("quay pipe"))
    row = HARBOUR.constraint("quay pipe")
    reached = [sum(a * x for a, x in zip(row.coefficients, v.point, strict=True)) for v in seen.vertices]
    found = stops(HARBOUR, "right-hand side", "quay pipe", breakpoints=False)
    assert found.values[0] < min(reached) <= max(reached) < found.values[-1]
    assert found.marks == ()
    assert found.function is None


@pytest.mark.parametrize("variant", ["infeasible", "unbounded", "flat"])
def test_models_without_an_optimum_have_stops_too(variant: str) -> None:
    model = pw.scenarios.harbour_row(variant)
    for row in model.constraints:
        found = stops(model, "right-hand side", row.name)
        assert row.rhs in found.values
        assert len(found.values) > 20


def test_a_number_is_read_and_set() -> None:
    for kind, name in NUMBERS:
        changed = with_number(HARBOUR, kind, name, Fraction(7, 3))
        assert number_of(changed, kind, name) == Fraction(7, 3)
        assert with_number(changed, kind, name, number_of(HARBOUR, kind, name)) == HARBOUR
    with pytest.raises(pw.PolywalkError):
        with_number(HARBOUR, "cost", "coal", Fraction(1))


def test_crowding_names_what_could_go_without_moving_the_vertex() -> None:
    found = crowding(pw.region(pw.scenarios.harbour_row("degenerate")))
    seen = pw.region(pw.scenarios.harbour_row("degenerate"))
    assert found
    for name, numbers in found.items():
        rest = pw.region(seen.model.without(name))
        points = [vertex.point for vertex in rest.vertices]
        assert all(seen.vertices[k].point in points for k in numbers)
    assert crowding(pw.region(pw.from_algebra(maximize="x", bounds={"x": (0, 1)}))) == {}
