"""Where a walk may start, which basis of a degenerate vertex it takes, and what it refuses."""

from __future__ import annotations

from fractions import Fraction
from types import SimpleNamespace

import numpy as np
import pytest
from small import klee_minty, typed

from polywalk.errors import DuplicateName, ModelError, PolywalkError, UnknownName, WalkError
from polywalk.linear import optimum
from polywalk.walks import walk

SQUARE = typed("max", [1, 2], [([1, 1], "<=", 3)], lower=0, upper=(2, 2), names="xy")


def test_a_vertex_may_be_named_in_any_way():
    starts = [(2, 1), {"x": "2", "y": 1.0}, np.array([2, 1]), SimpleNamespace(point=(Fraction(2), Fraction(1)))]
    for start in [*starts, ("r1", "x upper"), ["x upper", "r1"]]:
        walked = walk(SQUARE, start=start)
        assert walked.start == (2, 1)
        assert {walked.first.slacks.names[k] for k in walked.first.nonbasic} == {"r1", "x upper"}
        assert (walked.end, walked.value) == ("optimal", 5)


def test_a_vertex_may_be_given_by_its_number():
    from polywalk.region import region

    for number, vertex in enumerate(region(SQUARE).vertices):
        assert walk(SQUARE, start=number).start == walk(SQUARE, start=vertex).start == vertex.point
    with pytest.raises(WalkError, match="5 vertices"):
        walk(SQUARE, start=5)
    with pytest.raises(WalkError):
        walk(SQUARE, start=-1)


def test_every_vertex_of_the_cube_leads_to_the_optimum():
    from polywalk.region import region

    cube = klee_minty(3)
    ends = [walk(cube, rule=rule, start=v) for v in region(cube).vertices for rule in ("bland", "dantzig")]
    assert {(ended.end, ended.value) for ended in ends} == {("optimal", 125)}


def test_of_a_degenerate_vertex_the_lowest_indices_are_held():
    """(2, 1) lies on r1, on x upper and, given here, on its double."""
    model = SQUARE.with_constraint("touch", {"x": 1}, "<=", 2)
    held = walk(model, start=(2, 1)).first
    assert {held.slacks.names[k] for k in held.nonbasic} == {"r1", "x upper"}
    order = ["touch", "r1", "x upper", "y upper", "x", "y"]
    held = walk(model, start=(2, 1), order=order).first
    assert {held.slacks.names[k] for k in held.nonbasic} == {"touch", "r1"}
    order = ["touch", "x upper", "r1", "y upper", "x", "y"]
    held = walk(model, start=(2, 1), order=order).first
    assert {held.slacks.names[k] for k in held.nonbasic} == {"touch", "r1"}


def test_a_start_works_beside_equalities_and_free_decisions():
    model = typed("max", [1, 1, 1], [([1, 1, 1], "==", 6), ([0, 0, 1], "<=", 4), ([0, 0, -2], "<=", 4)], lower=(0, 0))
    walked = walk(model, start=(2, 0, 4))
    assert (walked.start, walked.value) == ((2, 0, 4), 6)
    assert walk(model, start=("r1", "r2", "x1 lower")).start == (0, 2, 4)
    redundant = model.with_constraint("again", {"x1": 2, "x2": 2, "x3": 2}, "==", 12)
    assert walk(redundant, start=(2, 0, 4)).start == (2, 0, 4)


def test_what_is_held_already_is_not_pivoted_away_on_the_way_to_a_start():
    model = typed("max", [1, 2], [([1, 1], "<=", 3)], lower=0, names="xy")
    assert walk(model, start=("r1", "x lower")).crash == (("y", "r1"),)


@pytest.mark.parametrize(
    ("start", "culprit", "words"),
    [
        ((3, 1), "r1", "violated by 1"),
        ((1, 1), (1, 1), "only 0 independent"),
        ((2, Fraction(1, 2)), (2, Fraction(1, 2)), "only 1 independent"),
        (("r1", "x uper"), "x uper", "did you mean 'x upper'"),
        (("r1",), ("r1",), "holds 2 different constraints"),
        (("r1", "r1"), ("r1", "r1"), "holds 2 different constraints"),
        (("r1", "x lower", "y lower"), ("r1", "x lower", "y lower"), "got 3"),
        (("x lower", "x upper"), "x upper", "follows from the others"),
        (("r1", "x lower"), "y upper", "not feasible"),
        ("origin", "origin", "expected as start"),
        (True, True, "expected as start"),
        (2.5, 2.5, "expected as start"),
    ],
)
def test_other_starts_are_refused(start, culprit, words):
    with pytest.raises(WalkError, match=words) as caught:
        walk(SQUARE, start=start)
    assert caught.value.culprit == culprit


def test_a_point_of_the_wrong_length_is_refused():
    with pytest.raises(ModelError):
        walk(SQUARE, start=(1, 2, 3))
    with pytest.raises(UnknownName):
        walk(SQUARE, start={"x": 1, "z": 2})


def test_a_region_with_a_line_has_no_start_but_an_optimum():
    strip = typed("max", [1, 1], [([1, 1], "<=", 2)], names="xy")
    with pytest.raises(WalkError, match=r"'y'.*line"):
        walk(strip)
    assert optimum(strip).value == 2
    empty = strip.with_constraint("r2", {"x": 1, "y": 1}, ">=", 3)
    assert walk(empty).end == "infeasible"


def test_an_order_names_every_slack_once():
    assert walk(SQUARE).order == ("x", "y", "r1", "x upper", "y upper")
    assert walk(SQUARE, order="slacks first").order == ("r1", "x upper", "y upper", "x", "y")
    assert walk(SQUARE, order="interleaved").order == ("x", "r1", "y", "x upper", "y upper")
    reverse = ["y upper", "x upper", "r1", "y", "x"]
    assert walk(SQUARE, rule="bland", order=reverse).pivots[0].entering == "y"
    for order, kind, culprit in [
        (["x", "y", "r1", "x upper"], WalkError, "y upper"),
        (["x", "y", "r1", "x upper", "y uper"], UnknownName, "y uper"),
        (["x", "y", "r1", "x upper", "y upper", "x"], DuplicateName, "x"),
        ("slack first", WalkError, "slack first"),
    ]:
        with pytest.raises(kind) as caught:
            walk(SQUARE, order=order)
        assert isinstance(caught.value, PolywalkError)
        assert caught.value.culprit == culprit


def test_equalities_and_free_decisions_may_be_left_out_of_an_order():
    model = typed("max", [1, 1], [([1, 1], "==", 2), ([0, 2], "<=", 2), ([0, -2], "<=", 1)], lower=(0,), names="xy")
    short = walk(model, order=["r3", "x", "r2"])
    assert short.order[:3] == ("r3", "x", "r2")
    assert set(short.order) == {"r3", "x", "r2", "y", "r1"}
