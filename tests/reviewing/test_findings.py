"""A review as an object: order, expectations, acceptances, words in print, notebook and frame, bad input."""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction

import pytest
from zoo import boxed, build

import polywalk as pw
from polywalk.errors import ExpectationError, NumberError, PolywalkError, UnknownName
from polywalk.reviewing import CHECKS, CODES, EXPECTATIONS, Limits, review
from polywalk.reviewing.codes import SEVERITIES
from polywalk.scenarios import harbour_row

SQUARE = build("x y", boxed("x y"), ("max", [1, 2]))
SPARE = build("x y", [*boxed("x y"), ("far", [1, 1], "<=", 3), ("touch", [1, 2], "<=", 3)], ("max", [1, 2]))


def test_a_clean_model_gets_a_short_positive_answer_that_lists_what_was_checked():
    told = review(SQUARE)
    assert told.findings == ()
    assert told.clean
    assert len(told.checked) == len(CHECKS) == 15
    assert all("does not hold" not in line for line in told.checked)
    text = str(told).splitlines()
    assert text[0] == f"Review: nothing to report; all {len(CHECKS)} checks passed"
    assert "holds, 3 at x = 1, y = 1" in str(told)
    assert len(text) < 20


def test_harbour_row_has_one_degenerate_vertex_and_nothing_else():
    told = review(harbour_row())
    assert [(f.code, f.severity) for f in told.findings] == [("degenerate-vertex", "note")]
    assert told.findings[0].points == ((5, 1, 3),)
    assert told.clean


@pytest.mark.parametrize(
    ("variant", "code"),
    [
        ("infeasible", "no-plan"),
        ("unbounded", "unbounded-objective"),
        ("flat", "flat-region"),
        ("tied", "tied-optimum"),
        ("degenerate", "degenerate-vertex"),
    ],
)
def test_the_variants_of_harbour_row_lead_with_their_mistake(variant, code):
    assert review(harbour_row(variant)).findings[0].code == code


def test_the_worst_comes_first():
    told = review(harbour_row("infeasible"))
    places = [SEVERITIES.index(finding.severity) for finding in told.findings]
    assert places == sorted(places)
    assert told.findings[0].code == "no-plan"


def test_every_code_is_kebab_case_with_a_meaning_and_in_no_two_severities():
    order = [SEVERITIES.index(code.severity) for code in CODES.values()]
    assert all(name == name.lower() and " " not in name and code.meaning for name, code in CODES.items())
    assert set(order) == {0, 1, 2}
    against = {code for expectation in EXPECTATIONS.values() for code in expectation.codes}
    assert against <= set(CODES) | set(SEVERITIES)


EXPECTED = {  # expectation: a model for which it holds, one for which it does not
    "feasible": (SQUARE, harbour_row("infeasible")),
    "infeasible": (harbour_row("infeasible"), SQUARE),
    "bounded": (SQUARE, harbour_row("unbounded")),
    "bounded-region": (SQUARE, build("x", [("low", [1], ">=", 0)], ("min", [1]))),
    "no-line": (SQUARE, build("x y", [("low", [1, 0], ">=", 0)], ("min", [1, 0]))),
    "full-dimensional": (SQUARE, harbour_row("flat")),
    "no-fixed-variable": (SQUARE, build("x y", [*boxed("x y"), ("s", [1, 1], "<=", 0)], ("max", [1, 2]))),
    "unique-optimum": (SQUARE, harbour_row("tied")),
    "clear-optimum": (SQUARE, build("x y", boxed("x y"), ("max", [200, 1]))),
    "no-redundant": (SQUARE, SPARE),
    "nondegenerate": (SQUARE, harbour_row()),
    "good-numbers": (SQUARE, build("x y", [*boxed("x y"), ("w", [1, 10**7], "<=", 10**7)], ("max", [1, 2]))),
    "units-agree": (SQUARE, None),
    "no-errors": (SQUARE, harbour_row("unbounded")),
    "no-warnings": (harbour_row(), harbour_row("tied")),
}


def test_every_expectation_is_tried():
    assert set(EXPECTED) == set(EXPECTATIONS)


@pytest.mark.parametrize("name", EXPECTED)
def test_expectations_hold_or_raise_with_the_table(name):
    good, bad = EXPECTED[name]
    told = review(good)
    assert told.require(name) is told
    if bad is None:
        bad = pw.from_algebra(maximize="x + y", constraints={"s": "x + y <= 1"}, units={"x": "MW", "y": "kW"})
    with pytest.raises(ExpectationError, match=f"expected '{name}'") as caught:
        review(bad).require("feasible", name) if name not in {"feasible", "infeasible"} else review(bad).require(name)
    assert caught.value.culprit == (name,)


def test_a_failed_expectation_shows_what_speaks_against_it():
    with pytest.raises(AssertionError, match="harbour main and town contract contradict each other"):
        review(harbour_row("infeasible")).require("feasible")
    with pytest.raises(ExpectationError, match="the model is infeasible"):
        review(harbour_row("infeasible")).require("unique-optimum")


def test_expectations_that_do_not_exist():
    with pytest.raises(UnknownName, match="did you mean 'unique-optimum'"):
        review(SQUARE).require("unique-optimun")
    with pytest.raises(PolywalkError, match="at least one expectation"):
        review(SQUARE).require()


def test_accepted_findings_stay_visible_and_no_longer_count():
    told = review(SPARE)
    calm = told.accept("redundant", constraint="far", because="the fire brigade wants it written down")
    assert [finding.code for finding in calm.findings] == ["redundant-touching", "degenerate-vertex"]
    assert told.of("redundant")  # the first review is as it was
    calm = calm.accept("redundant-touching", because="it binds next year")
    assert calm.require("no-redundant") is calm
    for shown in (str(calm), calm._repr_html_(), str(calm.table())):
        assert "the fire brigade wants it written down" in shown
        assert "far never binds" in shown


def test_what_cannot_be_accepted():
    told = review(SPARE)
    with pytest.raises(UnknownName, match="'redundent'"):
        told.accept("redundent", because="so")
    with pytest.raises(UnknownName, match="no finding 'tied-optimum'"):
        told.accept("tied-optimum", because="so")
    with pytest.raises(UnknownName, match="no finding on constraint 'touch'"):
        told.accept("redundant", constraint="touch", because="so")
    with pytest.raises(UnknownName, match="no constraint 'fare'"):
        told.accept("redundant", constraint="fare", because="so")
    with pytest.raises(PolywalkError, match="a reason"):
        told.accept("redundant", because=" ")


def test_a_review_as_a_frame_and_in_a_notebook():
    frame = review(SPARE).frame()
    assert list(frame.columns) == ["severity", "code", "finding", "constraints"]
    assert frame["code"].tolist() == ["redundant", "redundant-touching", "degenerate-vertex"]
    evidence = review(SPARE).findings[0].frame()
    assert ("multiplier", "x upper") in set(zip(evidence["evidence"], evidence["of"], strict=True))


def test_names_are_escaped_in_a_notebook():
    model = build("x y", [*boxed("x y"), ("<b>far</b>", [1, 1], "<=", 3)], ("max", [1, 2]))
    assert "<b>far" not in review(model)._repr_html_()
    assert "&lt;b&gt;far" in review(model)._repr_html_()


def test_print_is_short_where_there_are_many_findings_of_a_kind():
    rows = [(f"far {k}", [1, k], "<=", 100 + k) for k in range(1, 31)]
    told = review(build("x y", [*boxed("x y", 9), *rows], ("max", [1, 2])), limits=Limits(loose=Fraction(10**6)))
    many = sum(finding.code == "redundant" for finding in told.findings)
    assert many > 12
    assert f"{many - 12} more redundant" in str(told)
    assert len(told.frame()) == len(told.findings)


def test_amounts_of_a_finding_by_name():
    finding = review(SPARE).of("redundant")[0]
    assert finding.amount("slack") == 1
    with pytest.raises(UnknownName, match="has no amount 'slak'"):
        finding.amount("slak")


@pytest.mark.parametrize(
    ("given", "error", "words"),
    [
        ({"weights": {"fare": 1}}, UnknownName, "no constraint 'fare'"),
        ({"weights": {"far": 0}}, NumberError, "above 0"),
        ({"weights": {"far": "many"}}, NumberError, "expected a number"),
        ({"coefficient_units": {("fare", "x"): "h"}}, UnknownName, "'fare'"),
        ({"coefficient_units": {("far", "z"): "h"}}, UnknownName, "'z'"),
    ],
)
def test_bad_input(given, error, words):
    with pytest.raises(error, match=words):
        review(SPARE, **given)


@pytest.mark.parametrize("unit", ["MW (thermal)", "€/MWh", "m³", "<img src=x onerror=alert(1)>", "h^^2"])
def test_a_unit_of_any_form_is_a_symbol_never_an_error(unit):
    model = build("x y", [("row", [1, 1], "<=", 3), *boxed("x y", 2)], ("max", [1, 2]))
    alike = replace(model, units=(("x", unit), ("y", unit), ("row", unit)))
    assert not review(alike).of("unit-mismatch")
    assert review(replace(model, units=(("x", unit), ("y", "h"), ("row", unit)))).of("unit-mismatch")


def test_a_review_can_be_interrupted():
    """All loops but the enumeration are Python's, and that one moves to a child process past a size."""
    import signal

    rows = [(f"row {k}", [(k * 7) % 19 + 1, (k * 5) % 17 + 1, (k * 3) % 13 + 1], "<=", 50 + k % 9) for k in range(400)]
    model = build("x y z", [*boxed("x y z", 9), *rows], ("max", [1, 2, 3]))

    def stop(*_):
        raise KeyboardInterrupt

    before = signal.signal(signal.SIGALRM, stop)
    signal.setitimer(signal.ITIMER_REAL, 0.05)
    try:
        with pytest.raises(KeyboardInterrupt):
            review(model)
    finally:
        signal.setitimer(signal.ITIMER_REAL, 0)
        signal.signal(signal.SIGALRM, before)
