"""The chart of a value function: what is drawn where, in both painters, and for models without an optimum."""

from __future__ import annotations

from fractions import Fraction

import pytest

import polywalk as pw
from polywalk.drawing import scene

HARBOUR = pw.scenarios.harbour_row


def test_the_curve_passes_every_breakpoint_and_the_model_as_it_is():
    found = pw.value_function(HARBOUR(), rhs="harbour main")
    drawn = scene(found)
    (curve,) = [line for line in drawn.lines if line.role == "curve"]
    assert curve.parts == (tuple((float(t), float(value)) for t, value in found.corners),)
    marks = {mark.role: [item.point for item in drawn.marks if item.role == mark.role] for mark in drawn.marks}
    assert marks["breakpoint"] == list(curve.parts[0])
    assert marks["now"] == [(12.0, 292.0)]
    texts = {label.text for label in drawn.labels}
    assert {f"({t}, {value})" for t, value in found.corners} <= texts
    assert {"(12, 292)", "slope 18", "slope 32", "infeasible"} <= texts


def test_arrows_where_the_curve_goes_on_and_grey_where_it_does_not():
    drawn = scene(pw.value_function(HARBOUR(), cost="pump"))
    assert [line.arrow for line in drawn.lines if line.role == "onward"] == ["end", "end"]
    assert drawn.polygons == ()
    stopped = scene(pw.value_function(HARBOUR("infeasible"), rhs="town contract"))
    (grey,) = stopped.polygons
    assert min(point[0] for point in grey.points) == 12
    assert not [mark for mark in stopped.marks if mark.role == "now"]
    assert "now 14: infeasible" in stopped.subtitle


def test_a_single_piece_without_ends_goes_both_ways_from_its_middle():
    model = pw.from_algebra(maximize="2*x", constraints={"cap": "x <= 3"})
    drawn = scene(pw.value_function(model, rhs="cap"))
    starts = {line.parts[0][0] for line in drawn.lines if line.role == "onward"}
    assert len(starts) == 1
    assert [mark.role for mark in drawn.marks] == ["now"]


@pytest.mark.parametrize(
    ("variant", "parameter"),
    [
        ("base", {"rhs": "quay pipe"}),
        ("degenerate", {"rhs": "circulation pump"}),
        ("unbounded", {"cost": "chips"}),
        ("infeasible", {"rhs": "quay pipe"}),
    ],
)
@pytest.mark.parametrize("mode", ["light", "dark", "grey"])
def test_both_painters_paint_it(variant, parameter, mode):
    found = pw.value_function(HARBOUR(variant), **parameter)
    figure = pw.draw(found, mode=mode)
    assert "Optimal value by" in figure.layout.title.text
    greys = [trace for trace in figure.data if trace.fill == "toself"]
    assert len(greys) == len(scene(found).polygons)
    assert pw.picture(found, mode=mode).data[:5] == b"<?xml"


def test_a_bounded_function_is_grey_on_both_sides():
    model = pw.from_algebra(maximize="x", constraints={"mix": "x + y == 4"}, bounds={"x": (0, 3), "y": (0, 2)})
    found = pw.value_function(model, rhs="mix")
    assert (found.low, found.high) == (0, Fraction(5))
    assert len([trace for trace in pw.draw(found).data if trace.fill == "toself"]) == 2


def test_very_many_breakpoints_are_listed_and_not_lettered():
    rows = {f"tangent {k}": f"t >= {2 * k + 1}*x - {k * (k + 1)}" for k in range(-9, 10)}
    model = pw.from_algebra(minimize="t", constraints=rows | {"place": "x == 1/2"})
    found = pw.value_function(model, rhs="place")
    assert [t for t, _ in found.corners] == list(range(-8, 10))
    drawn = scene(found)
    assert len([label for label in drawn.labels if label.role == "point"]) == 1
    assert len(drawn.key[-1].rows) == len(found.corners)
