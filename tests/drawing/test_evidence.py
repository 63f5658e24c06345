"""Findings in a picture: what is marked is what the finding says, in the plane, in space, and where nothing is left."""

from __future__ import annotations

import pytest
from zoo import boxed, build

import polywalk as pw
from polywalk.drawing import View, scene
from polywalk.drawing.view import viewed
from polywalk.errors import DrawingError
from polywalk.scenarios import harbour_row

SPARE = build("x y", [*boxed("x y", 4), ("far", [1, 1], "<=", 9), ("touch", [1, 2], "<=", 12)], ("max", [2, 1]))


def drawn(model, **changes):
    return scene(model, viewed(None, {"findings": pw.review(model), **changes}))


def lines(picture, role):
    return [line for line in picture.lines if line.role == role]


def places(picture):
    return [mark.point for mark in picture.marks if mark.role == "evidence"]


def test_points_constraints_and_numbers_in_the_plane():
    picture = drawn(SPARE)
    assert places(picture) == [(4.0, 4.0)]
    assert [label.text for label in picture.labels if label.role == "evidence name"] == ["F1, F2, F3"]
    assert {line.name for line in lines(picture, "evidence line")} == {"far", "touch"}
    for line in lines(picture, "evidence line"):
        row = SPARE.constraint(line.name)
        for x, y in line.parts[0]:
            assert float(row.coefficients[0]) * x + float(row.coefficients[1]) * y == pytest.approx(float(row.rhs))
    assert [row.tag for row in picture.key[0].rows] == ["F1", "F2", "F3"]
    assert "far never binds" in picture.key[0].rows[0].text


def test_a_ray_starts_at_its_point_and_follows_its_direction():
    picture = drawn(harbour_row("unbounded"))
    (ray,) = lines(picture, "evidence ray")
    start, end = ray.parts[0]
    assert start == (4.0, 2.0, 4.0)
    assert end[0] == start[0]
    assert end[1] > start[1]
    assert end[2] == start[2]


def test_faces_of_a_constraint_in_space_are_outlined():
    model = harbour_row().with_constraint("twin", {"tank": 2}, "<=", 8)
    (band,) = lines(drawn(model), "evidence line")
    assert {point[2] for point in band.parts[0]} == {4.0}


def test_an_empty_model_shows_where_repairs_lead():
    picture = drawn(harbour_row("infeasible"))
    repairs = pw.review(harbour_row("infeasible")).of("single-repair", "least-repair")
    inside = {tuple(map(float, finding.points[0])) for finding in repairs}
    assert set(places(picture)) <= inside
    assert len(places(picture)) >= 2


def test_a_shadow_marks_the_points_on_its_axes():
    picture = drawn(harbour_row(), axes=("pump", "tank"))
    assert places(picture) == [(5.0, 3.0)]
    assert lines(picture, "evidence line") == []


def test_without_findings_nothing_changes():
    clean = build("x y", boxed("x y"), ("max", [1, 2]))
    assert drawn(clean) == scene(clean)
    assert View().findings == ()


def test_many_findings_are_counted_not_drawn():
    rows = [(f"far {k}", [1, k], "<=", 20 * k) for k in range(1, 13)]
    model = build("x y", [*boxed("x y", 4), *rows], ("max", [2, 1]))
    more = len(pw.review(model).findings) - 8
    assert more >= 4
    assert drawn(model).key[0].rows[-1].text == f"and {more} more findings, not marked"


def test_one_finding_may_stand_for_several_and_others_are_refused():
    finding = pw.review(SPARE).findings[0]
    assert viewed(None, {"findings": finding}).findings == (finding,)
    with pytest.raises(DrawingError, match="a review or findings"):
        viewed(None, {"findings": ["redundant"]})


@pytest.mark.parametrize(("model", "mode"), [(SPARE, "grey"), (harbour_row("unbounded"), "light")])
def test_both_painters_draw_it(model, mode):
    told = pw.review(model)
    assert len(pw.picture(model, findings=told, mode=mode).data) > 1000
    assert "findings" in [trace.name for trace in pw.draw(model, findings=told, mode=mode).data]
