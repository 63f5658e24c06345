"""Edits of the model: numbers, on and off, undo, redo, reset; what settles when the input rests."""

from __future__ import annotations

import asyncio
from fractions import Fraction

import pytest

import polywalk as pw
from polywalk.explorer.resting import Rest
from polywalk.explorer.state import State

HARBOUR = pw.scenarios.harbour_row()


def test_numbers_change_and_come_back() -> None:
    state = State(HARBOUR)
    state.set_number("7/3", "right-hand side", "harbour main")
    state.set_number("2.5", "cost", "pump")
    assert state.model.constraint("harbour main").rhs == Fraction(7, 3)
    assert state.model.objective.coefficients[0] == Fraction(5, 2)
    assert state.region == pw.region(state.model)
    state.undo()
    assert state.model == HARBOUR.with_rhs("harbour main", "7/3")
    state.undo()
    assert state.model == HARBOUR
    assert not state.history.can_undo
    state.undo()
    assert state.model == HARBOUR
    state.redo()
    state.redo()
    assert state.model.objective.coefficients[0] == Fraction(5, 2)
    state.reset()
    assert state.model == HARBOUR
    state.undo()
    assert state.model.objective.coefficients[0] == Fraction(5, 2)


def test_one_drag_is_one_edit_and_the_next_one_is_another() -> None:
    state = State(HARBOUR, number=("right-hand side", "harbour main"))
    for value in (11, 10, 9):
        state.set_number(value, drag=True)
    state.history.rest()
    for value in (8, 7):
        state.set_number(value, drag=True)
    assert len(state.history.drafts) == 3
    state.undo()
    assert state.model.constraint("harbour main").rhs == 9
    state.undo()
    assert state.model == HARBOUR


def test_an_edit_after_an_undo_forgets_what_was_undone() -> None:
    state = State(HARBOUR)
    state.set_number(9, "right-hand side", "harbour main")
    state.undo()
    state.set_number(10, "right-hand side", "harbour main")
    assert not state.history.can_redo


def test_a_constraint_is_switched_off_and_on_and_its_number_changed_meanwhile() -> None:
    state = State(HARBOUR)
    state.switch("harbour main", False)
    assert state.off == ("harbour main",)
    assert state.model == HARBOUR.without("harbour main")
    assert state.whole == HARBOUR
    state.set_number(9, "right-hand side", "harbour main")
    assert state.model == HARBOUR.without("harbour main")
    state.switch("harbour main", True)
    assert state.model == HARBOUR.with_rhs("harbour main", 9)
    state.undo()
    state.undo()
    state.undo()
    assert (state.model, state.off) == (HARBOUR, ())


def test_every_constraint_may_be_off() -> None:
    state = State(HARBOUR)
    state.off = tuple(row.name for row in HARBOUR.constraints)
    assert state.model.constraints == ()
    assert state.region.lines
    assert state.refusal
    state.reset()
    assert state.walks


@pytest.mark.parametrize("bad", ["seven", "1/0", "nan", "", None])
def test_a_bad_number_raises_and_changes_nothing(bad: object) -> None:
    state = State(HARBOUR, vertex=2)
    before = {name: getattr(state, name) for name in state.trait_names()}
    with pytest.raises(pw.PolywalkError):
        state.set_number(bad, "right-hand side", "harbour main")
    with pytest.raises(pw.PolywalkError):
        state.set_number(1, "right-hand side", "coal")
    assert {name: getattr(state, name) for name in before} == before
    assert not state.history.can_undo


def test_one_change_is_told_once_when_all_has_settled() -> None:
    state = State(HARBOUR)
    told: list[bool] = []
    state.observe(lambda _: told.append(state.region.model == state.model == state.walks[0].model), "version")
    state.set_number(11, "right-hand side", "harbour main")
    state.switch("quay pipe", False)
    state.undo()
    state.model = HARBOUR
    assert told == [True] * 4


def test_findings_are_stale_until_the_model_is_reviewed_again() -> None:
    state = State(HARBOUR)
    assert state.review is None
    state.settle()
    assert (state.stale, state.review.model) == (False, HARBOUR)
    state.finding = 0
    assert state.view.findings == (state.review.findings[0],)
    state.set_number(11, "right-hand side", "harbour main")
    assert (state.stale, state.finding, state.view.findings) == (True, None, ())
    assert state.review.model == HARBOUR
    state.settle()
    assert state.review.model == state.model
    state.set_number(12, "right-hand side", "harbour main")
    state.settle()
    assert state.review.findings == pw.review(HARBOUR).findings


def test_the_selected_finding_is_selected_again_where_it_still_holds() -> None:
    state = State(HARBOUR)
    state.settle()
    state.finding = [item.code for item in state.review.findings].index("degenerate-vertex")
    state.set_number(51, "cost", "pump")
    state.settle()
    assert state.review.findings[state.finding].code == "degenerate-vertex"


def test_the_last_of_a_burst_wins_and_is_acted_on_once() -> None:
    acted: list[int] = []

    async def burst() -> None:
        state = State(HARBOUR, number=("right-hand side", "harbour main"))
        rest = Rest(lambda: acted.append(int(state.model.constraint("harbour main").rhs)), seconds=0.05)
        for value in range(20, 10, -1):
            state.set_number(value, drag=True)
            rest.wait()
            await asyncio.sleep(0.001)
        assert acted == []
        await asyncio.sleep(0.2)

    asyncio.run(burst())
    assert acted == [11]


def test_a_rest_that_is_cancelled_does_not_act() -> None:
    acted: list[int] = []

    async def begin() -> None:
        rest = Rest(lambda: acted.append(1), seconds=0.01)
        rest.wait()
        rest.cancel()
        await asyncio.sleep(0.05)

    asyncio.run(begin())
    assert acted == []
