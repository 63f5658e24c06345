"""Each check: a model that triggers it, one that nearly does, one that must not. Facts worked out by hand."""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction

import pytest
from zoo import PYRAMID, ZOO, boxed, build, nonnegative

from polywalk.model import Constraint
from polywalk.reviewing import CODES, Limits, review

BOX, XY = boxed("x y"), nonnegative("x y")
TINY = Fraction(1, 10**6)


def square(*rows, goal=("max", [1, 2])):
    """The unit square with some more rows."""
    return build("x y", [*BOX, *rows], goal)


def corner(*rows, goal=("min", [1, 2])):
    """The nonnegative quarter with some more rows."""
    return build("x y", [*XY, *rows], goal)


def switch(size, beyond=0):
    """x up to 12, and only where the yes-or-no variable y lets it."""
    rows = [*XY, ("x upper", [1, 0], "<=", 12), ("y upper", [0, 1], "<=", 1), ("link", [1, -size], "<=", beyond)]
    return replace(build("x y", rows, ("max", [1, -1])), integers=("y",))


def units(**named):
    """The square with a sum, in these units ("sum" for the row)."""
    return replace(square(("sum", [1, 1], "<=", 1)), units=tuple(named.items()))


TRIPLES = {
    "no-plan": (square(("s", [1, 1], ">=", "2.0000001")), square(("s", [1, 1], ">=", 2)), square()),
    "false-row": (square(("f", [0, 0], "<=", -1)), square(("f", [0, 0], "<=", 0)), square()),
    "conflict": (square(("s", [1, 1], ">=", "2.0000001")), square(("s", [1, 1], ">=", 2)), square()),
    "unbounded-objective": (
        corner(("gap", [1, -1], "<=", 1), goal=("max", [1, 0])),
        corner(("gap", [1, -1], "<=", 1), goal=("max", [1, -1])),
        square(),
    ),
    "line": (
        build("x y", [("low", [1, 1], ">=", 0), ("high", [1, 1], "<=", 2)]),
        build("x y", [("low", [1, 1], ">=", 0), ("high", [1, 1], "<=", 2), ("stop", [1, 0], ">=", 0)]),
        square(),
    ),
    "single-point": (
        square(("s", [1, 1], ">=", 2)),
        square(("s", [1, 1], ">=", 2 - TINY)),
        square(("s", [1, 1], "==", 1)),
    ),
    "implied-equality": (
        square(("s", [1, 1], ">=", 2)),
        square(("s", [1, 1], ">=", 2 - TINY)),
        square(("s", [1, 1], "==", 1)),
    ),
    "fixed-variable": (
        corner(("s", [1, 1], "<=", 0)),
        corner(("s", [1, 1], "<=", TINY)),
        square(("set", [2, 0], "==", 1)),  # stated, hence meant
    ),
    "tied-optimum": (
        corner(("s", [1, 1], "<=", 2), goal=("max", [3, 3])),
        corner(("s", [1, 1], "<=", 2), goal=("max", [3, 3 + TINY])),
        square(),
    ),
    "duplicate": (
        corner(("s", [1, 1], "<=", 1), ("t", [-3, -3], ">=", -3)),
        corner(("s", [1, 1], "<=", 1), ("t", [-3, -3], ">=", "-3.0001")),
        corner(("s", [1, 1], "<=", 1), ("t", [1, 2], "<=", 1)),
    ),
    "true-row": (square(("t", [0, 0], "<=", 0)), square(("t", [0, 0], "<=", -TINY)), square()),
    "loose-constant": (
        square(("s", [1, 1], "<=", 1000)),
        square(("s", [1, 1], "<=", 19)),
        square(("s", [1, 1], "<=", 1)),
    ),
    "loose-switch": (switch(1000), switch(119), switch(12)),
    "sliver": (
        build("x y", [*BOX, ("low", [1, -1], "<=", 0), ("high", [-1, 1], "<=", "1/5000")]),
        build("x y", [*BOX, ("low", [1, -1], "<=", 0), ("high", [-1, 1], "<=", "1/500")]),
        square(),
    ),
    "nearly-parallel": (
        square(("a", [1000, 1000], "<=", 1500), ("b", [1000, 1001], "<=", 1400)),
        square(("a", [100, 100], "<=", 150), ("b", [100, 101], "<=", 140)),
        square(("a", [1, 1], "<=", 1), ("b", [2, 2], ">=", 1)),  # exactly parallel
    ),
    "wide-row": (
        square(("w", ["0.001", 1001], "<=", 500)),
        square(("w", ["0.001", 1000], "<=", 500)),
        square(),
    ),
    "wide-model": (
        square(("a", ["0.001", 0], "<=", "0.0005"), ("b", [0, 1001], "<=", 500)),
        square(("a", ["0.001", 0], "<=", "0.0005"), ("b", [0, 1000], "<=", 500)),
        square(),
    ),
    "unit-mismatch": (units(x="MW", y="kW"), units(x="MW", y="MW", sum="MW"), units()),
    "single-repair": (
        square(("s", [1, 1], ">=", 3)),
        square(("a", [1, 0], ">=", 2), ("b", [0, 1], ">=", 2)),
        square(),
    ),
    "no-single-repair": (
        square(("a", [1, 0], ">=", 2), ("b", [0, 1], ">=", 2)),
        square(("s", [1, 1], ">=", 3)),
        square(),
    ),
    "least-repair": (square(("s", [1, 1], ">=", 3)), square(("s", [1, 1], ">=", 2)), square()),
    "open-region": (corner(), corner(goal=("max", [1, 1])), square()),
    "flat-region": (
        square(("s", [1, 1], "==", 1)),
        square(("s", [1, 1], "<=", 1), ("t", [1, 1], ">=", 1 - TINY)),
        square(),
    ),
    "split-equality": (
        square(("s", [1, 1], "<=", 1), ("t", [2, 2], ">=", 2)),
        square(("s", [1, 1], "<=", 1), ("t", [2, 2], ">=", "1.999")),
        square(("s", [1, 1], "==", 1)),
    ),
    "parallel": (
        square(("s", [1, 1], "<=", 1), ("t", [2, 2], "<=", 3)),
        square(("s", [1, 1], "<=", 1), ("t", [-2, -2], "<=", -1)),
        square(),
    ),
    "redundant": (square(("s", [1, 1], "<=", 3)), square(("s", [1, 1], "<=", 2)), square(("s", [1, 1], "<=", 1))),
    "redundant-touching": (
        square(("s", [1, 1], "<=", 2)),
        square(("s", [1, 1], "<=", "1.999")),
        square(("s", [1, 1], "<=", "2.001")),
    ),
    "jointly-redundant": (
        build("x y", [("a", [1, 0], "==", 2), ("b", [0, 1], "==", 3), ("c", [1, 1], "==", 5)]),
        build("x y", [("a", [1, 0], "==", 2), ("b", [0, 1], "==", 3), ("c", [1, 1], "<=", 5)]),
        build("x y", [("a", [1, 0], "==", 2), ("b", [0, 1], "==", 3)]),
    ),
    "degenerate-vertex": (build("x y z", PYRAMID), ZOO["bevelled corner"][0], square()),
    "near-tie": (
        square(goal=("max", [200, 1])),
        square(goal=("max", [50, 1])),
        square(goal=("max", [1, 0])),  # tied, not nearly
    ),
    "no-objective": (build("x y", BOX), build("x y", BOX, ("max", [0, TINY])), square()),
    "unit-slip": (
        corner(("a", [2, 3], "<=", 7), ("b", [120, 180], "<=", 7)),
        corner(("a", [2, 3], "<=", 7), ("b", [122, 183], "<=", 7)),
        corner(("a", [2, 3], "<=", 7), ("b", [120, 180], "<=", 420)),  # the same in all numbers
    ),
}


def codes(model, **given):
    return {finding.code for finding in review(model, **given).findings}


def test_every_code_has_its_three_models():
    assert set(TRIPLES) == set(CODES)


@pytest.mark.parametrize("code", TRIPLES)
def test_a_check_speaks_up_and_keeps_quiet(code):
    triggers, nearly, never = TRIPLES[code]
    assert code in codes(triggers)
    assert code not in codes(nearly)
    assert code not in codes(never)


def only(model, code, **given):
    """The one finding of that code."""
    (found,) = review(model, **given).of(code)
    return found


def test_unbounded_names_the_ray_what_it_slides_along_and_what_would_stop_it():
    found = only(TRIPLES["unbounded-objective"][0], "unbounded-objective")
    assert found.rays == ((1, 1),)
    assert found.constraints == ("gap",)
    assert "upper bound on x or upper bound on y" in found.explanation


def test_an_objective_that_no_single_bound_stops():
    """max x + y over the quarter: x alone bounded, y still grows."""
    assert "No single bound would stop it" in only(corner(goal=("max", [1, 1])), "unbounded-objective").explanation


def test_implied_equalities_name_what_forces_them():
    told = review(TRIPLES["implied-equality"][0])
    forced = {finding.constraints[0]: set(finding.constraints[1:]) for finding in told.of("implied-equality")}
    assert forced == {"s": {"x upper", "y upper"}, "x upper": {"s", "y upper"}, "y upper": {"s", "x upper"}}
    assert {finding.variables for finding in told.of("fixed-variable")} == {("x",), ("y",)}


def test_the_tighter_of_two_parallel_rows_is_named():
    found = only(TRIPLES["parallel"][0], "parallel")
    assert found.constraints == ("t", "s")
    assert found.amount("slack") == 1  # 2x + 2y <= 3 where it reaches 2
    assert found.multipliers == {"s": 2}


def test_redundant_rows_say_how_close_they_come_and_where():
    found = only(TRIPLES["redundant"][0], "redundant")
    assert found.amount("slack") == 1
    assert found.points == ((1, 1),)
    assert found.multipliers == {"x upper": 1, "y upper": 1}


def test_a_jointly_redundant_group_is_told_whole_and_one_is_kept():
    found = only(TRIPLES["jointly-redundant"][0], "jointly-redundant")
    assert set(found.constraints) == {"a", "b", "c"}


def test_the_smallest_loose_constant():
    assert only(TRIPLES["loose-constant"][0], "loose-constant").amount("smallest constant that changes nothing") == 2


def test_the_smallest_switch():
    assert only(switch(1000), "loose-switch").amount("smallest coefficient that changes nothing") == 12
    assert only(switch(1000, beyond=2), "loose-switch").amount("smallest coefficient that changes nothing") == 10


def test_which_constraint_could_go_from_a_degenerate_vertex():
    apex = only(TRIPLES["degenerate-vertex"][0], "degenerate-vertex")
    assert apex.amount("degree") == 1
    assert "none of them could go" in apex.explanation
    touched = only(square(("s", [1, 1], "<=", 2)), "degenerate-vertex")
    assert touched.points == ((1, 1),)
    assert "s could go" in touched.explanation


def test_a_tie_tells_the_whole_face():
    found = only(TRIPLES["tied-optimum"][0], "tied-optimum")
    assert found.points == ((0, 2), (2, 0))
    open_face = only(corner(("cap", [0, 1], "<=", 2), goal=("max", [0, 1])), "tied-optimum")
    assert (open_face.points, open_face.rays) == (((0, 2),), ((1, 0),))
    strip = build("x y", [("low", [1, 1], ">=", 0), ("high", [1, 1], "<=", 2)], ("max", [1, 1]))
    assert only(strip, "tied-optimum").rays in (((1, -1),), ((-1, 1),))


def test_what_counts_as_near_is_the_callers_choice():
    model = square(goal=("max", [50, 1]))
    assert "near-tie" in codes(model, limits=Limits(near_tie=Fraction(1, 20)))
    assert only(model, "near-tie", limits=Limits(near_tie_amount=Fraction(1))).amount("difference") == 1
    assert "near-tie" not in codes(square(goal=("max", [200, 1])), limits=Limits(near_tie_amount=Fraction(1, 2)))


@pytest.mark.parametrize("factor", ["60", "100", "1000", "3.6", "8760", "0.2778", "0.001"])
def test_common_factors_between_units(factor):
    ratio = Fraction(factor)
    found = only(corner(("a", [2, 3], "<=", 7), ("b", [2, 3 * ratio], "<=", 7)), "unit-slip")
    assert found.title.startswith("hint:")
    assert found.variables == ("y",)
    assert found.amount("factor") == ratio


def test_units_of_coefficients():
    model = replace(square(("heat", [3, 2], "<=", 4)), units=(("x", "h"), ("y", "h"), ("heat", "MWh")))
    given = {("heat", "x"): "MW", ("heat", "y"): "MWh/h"}
    assert "unit-mismatch" not in codes(model)  # nothing is known of 3 and 2
    told = only(model, "unit-mismatch", coefficient_units=given)
    assert "x in MW*h" in told.explanation
    assert "unit-mismatch" not in codes(model, coefficient_units={("heat", "y"): "MWh/h"})


def test_units_of_the_objective():
    model = replace(square(), units=(("x", "MWh"), ("y", "t")))
    given = {("objective", "x"): "EUR/MWh", ("objective", "y"): "EUR/t"}
    assert "unit-mismatch" not in codes(model, coefficient_units=given)
    assert "unit-mismatch" in codes(model, coefficient_units=given | {("objective", "y"): "kEUR/t"})


def test_numbers_beyond_floats_are_no_trouble():
    big = Constraint("big", (Fraction(10) ** 400, Fraction(1)), "<=", Fraction(10) ** 400)
    model = square()
    assert "wide-row" in codes(replace(model, constraints=(*model.constraints, big)))
