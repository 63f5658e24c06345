"""What people get wrong with a big model: told where and what to do; and what is no error but an answer."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from typing import Any

import pytest
from checker import proves_empty

import polywalk as pw
from polywalk.bigmodel import BigModel
from polywalk.errors import DuplicateName, ModelError, NumberError, PolywalkError, UnknownName

HARBOUR = BigModel.from_model(pw.scenarios.harbour_row())
EMPTY = BigModel.from_model(pw.scenarios.harbour_row("infeasible"))
ENDLESS = BigModel.from_model(pw.scenarios.harbour_row("unbounded"))
KEEP = ("pump", "chips")


@pytest.mark.parametrize("ask", [pw.conflict, pw.escape, pw.suggest_axes, lambda big: pw.shadow(big, ["pump"])])
@pytest.mark.parametrize("big", [None, "plant.mps", pw.region(pw.scenarios.harbour_row())])
def test_what_is_no_model(ask: Callable[[Any], object], big: object) -> None:
    with pytest.raises(ModelError, match=r"expected a BigModel or a Model, got \w+; from_mps"):
        ask(big)


@pytest.mark.parametrize(
    ("onto", "kind", "words"),
    [
        ("pump", ModelError, "one to three variables to keep, as a list, got 'pump'"),
        (None, ModelError, "got None"),
        ([], ModelError, r"got \[\]"),
        (["pump", "chips", "tank", "objective"], ModelError, "one to three"),
        (["pmp"], UnknownName, "did you mean 'pump'"),
        (["pump", "pump"], DuplicateName, "'pump' is given twice"),
    ],
)
def test_axes_that_cannot_be(onto: Any, kind: type[PolywalkError], words: str) -> None:
    with pytest.raises(kind, match=words):
        pw.shadow(HARBOUR, onto)


@pytest.mark.parametrize("within", ["5%%", "%", "near", float("nan"), [5], -1, "-5%"])
def test_distances_that_are_none(within: object) -> None:
    with pytest.raises(NumberError, match=r"^within: expected a"):
        pw.shadow(HARBOUR, KEEP, within=within)


@pytest.mark.parametrize(
    ("at", "words"),
    [
        (None, "names and values, or a list"),
        (5, "names and values, or a list"),
        ([1, 2], "expected 3 values"),
        ("optimal", 'values or "optimum"'),
        ({}, "'tank' has none"),
        ({"tank": 9}, "violates its bound 'tank upper' by 5"),
        ({"tank": "full"}, "'full'"),
        ({"tnk": 1}, "did you mean 'tank'"),
    ],
)
def test_values_that_are_no_place_to_cut_at(at: Any, words: str) -> None:
    with pytest.raises(PolywalkError, match=words):
        pw.section(HARBOUR, KEEP, at=at)


def test_variables_to_rank_and_time() -> None:
    for among, words in (([], "variables to rank"), ("pump", "variables to rank"), (["pmp"], "did you mean")):
        with pytest.raises(PolywalkError, match=words):
            pw.suggest_axes(HARBOUR, among=among)
    for seconds in ("soon", float("nan")):
        with pytest.raises(NumberError, match="seconds"):
            pw.suggest_axes(HARBOUR, seconds=seconds)  # type: ignore[arg-type]
    assert pw.suggest_axes(HARBOUR, among=["pump", "pump"]).names == ("pump",)


def test_a_model_without_a_plan_or_an_end_is_told_with_the_way_on() -> None:
    assert pw.shadow(ENDLESS, KEEP).region.status == "unbounded"
    for big, ask, words in [
        (EMPTY, pw.suggest_axes, r"infeasible.*conflict\(big\)"),
        (ENDLESS, pw.suggest_axes, r"unbounded.*escape\(big\)"),
        (EMPTY, lambda big: pw.section(big, KEEP), r"infeasible.*conflict\(big\)"),
        (ENDLESS, lambda big: pw.section(big, KEEP), r"unbounded.*escape\(big\)"),
        (ENDLESS, lambda big: pw.shadow(big, KEEP, within="5%"), r"unbounded.*escape\(big\)"),
    ]:
        with pytest.raises(ModelError, match=words):
            ask(big)


@pytest.mark.parametrize("within", [None, "1%"])
@pytest.mark.parametrize("hours", [24, 400])
def test_the_shadow_of_a_model_without_a_plan_is_proved_empty(hours: int, within: str | None) -> None:
    """Also past the size of the exact simplex method: by a small conflict, whose multipliers add up to 0 <= -1."""
    big = pw.scenarios.harbour_year(hours).with_rhs("demand[7]", 40)
    found = pw.shadow(big, ("pump[7]", "tank[7]"), within=within)
    assert found.region.status == "empty"
    assert found.tolerance is None
    facet = found.facet("empty region")
    assert facet.is_proved
    model = big.to_model() if hours == 24 else pw.conflict(big)
    assert model is not None
    named = [(model.constraint(name), weight) for name, weight in facet.multipliers]
    assert proves_empty([(row.coefficients, row.sense, row.rhs) for row, _ in named], [weight for _, weight in named])
    assert sum(weight * row.rhs for row, weight in named) == -1
    assert "no plan at all; conflict(big)" in str(found)


def test_integer_marks_are_relaxed_and_said_so() -> None:
    big = replace(HARBOUR, integers=("pump", "tank"))
    assert "integer marks are relaxed: pump and 1 other variable\n" in f"{pw.shadow(big, KEEP)}\n"
    assert "integer marks are relaxed" in str(pw.suggest_axes(big))
    assert "integer marks are relaxed: the optimum is the relaxation's" in str(pw.section(big, KEEP))
