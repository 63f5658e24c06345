"""The explorer's state: what fits is kept, what does not fit raises and changes nothing."""

from __future__ import annotations

import pytest
from traitlets import TraitError

import polywalk as pw
from polywalk.explorer.state import State


def square() -> pw.Model:
    return pw.from_algebra(maximize="x + 2*y", bounds={"x": (0, 1), "y": (0, 1)})


def strip() -> pw.Model:
    return pw.from_algebra(maximize="x", constraints={"wide": "x <= 1"}, bounds={"y": (None, None)})


def test_stepping_on_and_back_moves_the_selection_along_the_walk() -> None:
    state = State(square())
    points = state.walks[0].points
    state.go(+1)
    assert (state.step, state.region.vertices[state.vertex].point) == (1, points[1])
    state.go(+1)
    assert (state.step, state.region.vertices[state.vertex].point) == (2, points[2])
    state.go(+1)
    assert state.step == 2
    state.go(-1)
    assert (state.step, state.region.vertices[state.vertex].point) == (1, points[1])


def test_from_the_whole_walk_back_goes_to_the_last_but_one() -> None:
    state = State(square())
    state.go(-1)
    assert state.step == len(state.walks[0].pivots) - 1


def test_the_view_holds_what_was_chosen() -> None:
    state = State(square(), rules=("bland", "dantzig"), vertex=2, step=1)
    assert [walk.rule for walk in state.view.walks] == ["bland", "dantzig"]
    assert (state.view.step, state.view.vertex, state.view.mode) == (1, state.vertex, "light")
    state.dark = True
    assert state.view.mode == "dark"


@pytest.mark.parametrize(
    ("name", "bad"),
    [
        ("vertex", 4),
        ("vertex", -1),
        ("rules", ()),
        ("rules", ("nearest",)),
        ("step", 3),
        ("axes", ("x", "x")),
        ("axes", ("x", "z")),
        ("axes", ()),
        ("model", "a model"),
        ("start", (5, 5)),
        ("leaving", "nearest"),
        ("number", ("right-hand side", "coal")),
        ("number", ("price", "x")),
        ("number", ("cost",)),
        ("off", ("coal",)),
        ("finding", 99),
        ("finding", -1),
        ("camera", "above"),
        ("dark", "maybe"),
    ],
)
def test_a_bad_value_raises_and_changes_nothing(name: str, bad: object) -> None:
    state = State(square(), vertex=1, step=1)
    before = {key: getattr(state, key) for key in state.trait_names()}
    with pytest.raises((pw.PolywalkError, TraitError)):
        setattr(state, name, bad)
    assert {key: getattr(state, key) for key in before} == before


def test_another_model_keeps_the_vertex_that_is_still_there_and_walks_anew() -> None:
    state = State(square(), vertex=1)
    point = state.region.vertices[1].point
    state.model = state.model.with_rhs("x upper", "7/3")
    assert state.region.vertices[state.vertex].point == point
    assert state.walks[0].value == pw.exact("13/3")
    assert state.view.walks == state.walks
    state.model = state.model.with_rhs("y upper", "1/2")
    assert state.region.vertices[state.vertex].point == (0, pw.exact("1/2"))  # moved along with its constraints
    state.model = state.model.without("y upper")
    assert state.vertex is None


def test_a_region_with_a_line_has_no_walk_and_says_why() -> None:
    state = State(strip())
    assert state.walks == ()
    assert "line" in state.refusal
    state.model = square()
    assert state.refusal == ""
    assert state.walks


def test_more_than_three_variables_are_drawn_on_the_first_three() -> None:
    box = pw.from_algebra(maximize="a + b + c + d", bounds=dict.fromkeys("abcd", (0, 1)))
    state = State(box)
    assert state.axes == ("a", "b", "c")
    state.axes = ("d", "b")
    assert state.view.axes == ("d", "b")
    for index, vertex in enumerate(state.region.vertices):
        state.vertex = index
        shown = pw.project(state.region, state.axes).vertices[state.view.vertex]
        assert shown.point == (vertex.point[3], vertex.point[1])


def test_a_vertex_inside_the_projection_is_selected_but_not_drawn() -> None:
    tip = pw.from_algebra(
        maximize="d",
        constraints={"tip": "d <= 1 - a - b", "back": "d <= 1 + a + b"},
        bounds={"a": (-1, 1), "b": (-1, 1), "c": (0, 1), "d": (0, None)},
    )
    state = State(tip, axes=("a", "c"))
    drawn = []
    for index in range(len(state.region.vertices)):
        state.vertex = index
        drawn.append(state.view.vertex)
    assert None in drawn
    assert set(drawn) - {None} == set(range(4))


def test_a_start_is_a_vertex_and_the_walk_begins_there() -> None:
    state = State(square())
    state.start = state.region.vertices[3].point
    assert state.walks[0].start == state.region.vertices[3].point
    assert not state.walks[0].pivots


def test_start_values_may_come_in_any_order() -> None:
    state = State(square(), vertex=0, step=2, rules=("bland",))
    assert (state.vertex, state.step, state.rules) == (0, 2, ("bland",))
    with pytest.raises(pw.PolywalkError, match="did you mean 'vertex'"):
        State(square(), vertx=0)


def test_one_change_draws_once() -> None:
    state = State(square())
    drawn: list[object] = []
    state.observe(lambda change: drawn.append(change["new"]), "picture")
    state.go(+1)
    assert len(drawn) == 1
    state.rules = ("bland",)
    assert len(drawn) == 2
    state.model = state.model.with_rhs("x upper", 2)
    assert len(drawn) == 3
    assert drawn[-1] == (state.region, state.view)
    assert state.view.walks[0].model == state.region.model == state.model
