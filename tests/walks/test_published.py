"""Published models that cycle (CHECKS part B), each beside its source."""

from __future__ import annotations

import json
from fractions import Fraction
from itertools import product
from math import cos, pi, sin
from pathlib import Path

import pytest
from small import le, typed

from polywalk.linear import optimum
from polywalk.scenarios import kuhn
from polywalk.walks import ENTERING, walk
from polywalk.walks.rules import Rules, entering_rule, leaving_rule

DATA = Path(__file__).parents[2].parent / "shared" / "data" / "cycling.json"
TIES = {"lowest-index": "low", "first-row": "first_row", "largest-pivot": "big_pivot"}

BEALE = le(  # Beale 1955, Naval Res. Logist. Quart. 2 (coefficients from memory)
    "min",
    ["-3/4", 150, "-1/50", 6],
    [["1/4", -60, "-1/25", 9], ["1/2", -90, "-1/50", 3], [0, 0, 1, 0]],
    [0, 0, 1],
)
CHVATAL = le(  # Chvátal 1983, Linear Programming, chapter 3
    "max",
    [10, -57, -9, -24],
    [["1/2", "-11/2", "-5/2", 9], ["1/2", "-3/2", "-1/2", 1], [1, 0, 0, 0]],
    [0, 0, 1],
)
THREE = le(  # three decisions, for pictures (computed, no source)
    "max", [1, 0, -2], [[1, -5, 4], [1, -4, 2], ["1/2", -1, "1/3"], [0, 1, 0]], [0, 0, 0, 1]
)


@pytest.mark.parametrize(
    ("model", "length", "value"), [(BEALE, 6, Fraction(-1, 20)), (CHVATAL, 6, 1), (THREE, 6, 2)], ids=["B", "C", "3"]
)
def test_dantzig_cycles_and_bland_ends(model, length, value):
    stalled = walk(model, rule="dantzig")
    assert (stalled.end, len(stalled.cycle), len(stalled.pivots)) == ("cycling", length, length)
    assert {pivot.kind for pivot in stalled.cycle} == {"degenerate"}
    assert set(stalled.cycle[0].basis_before) == set(stalled.cycle[-1].basis_after)
    ended = walk(model, rule="bland")
    assert (ended.end, ended.value, ended.cycle) == ("optimal", value, ())
    assert optimum(model).value == value


def test_three_decisions_take_the_computed_routes():
    """CHECKS part B, last row (computed, no source)."""
    pairs = [(pivot.entering, pivot.leaving) for pivot in walk(THREE).cycle]
    assert pairs == [("x1", "r1"), ("x2", "r2"), ("x3", "r3"), ("r1", "x1"), ("r2", "x2"), ("r3", "x3")]
    ended = walk(THREE, rule="bland")
    assert (len(ended.pivots), ended.stays, ended.point) == (7, 6, (2, 1, 0))


@pytest.mark.parametrize("model", [BEALE, CHVATAL, THREE], ids=["B", "C", "3"])
@pytest.mark.parametrize("rule", [rule.name for rule in ENTERING])
def test_lexicographic_leaving_ends_whatever_enters(model, rule):
    """CHECKS part B; Dantzig, Orden & Wolfe 1955."""
    assert walk(model, rule, "lexicographic").value == optimum(model).value
    assert len(walk(THREE, rule, "lexicographic").pivots) <= 3
    assert len(walk(THREE, "dantzig", "lexicographic").pivots) == 2


def test_kuhn_cycles_when_ties_go_to_the_first_row_or_the_largest_pivot():
    """Balinski & Tucker 1969, who credit Kuhn (coefficients from memory)."""
    model = kuhn()
    for leaving in ("first-row", "largest-pivot"):
        stalled = walk(model, leaving=leaving)
        assert (stalled.end, len(stalled.pivots), len(stalled.cycle)) == ("cycling", 6, 6)
    assert [walk(model, leaving=leaving).value for leaving in ("lowest-index", "lexicographic")] == [-2, -2]


def circle(k: int = 5) -> tuple:
    """Columns turned by 2 pi / k, every other one on a smaller circle, rounded; and the basis it starts from.

    After Hoffman 1953 and Lee 1997 (computed, no source): min c x, A x = 0, x >= 0; even columns are a tenth of
    (cos, sin), odd ones half of (-sin, cos), entries rounded to denominators of at most 10, c = 1 - (1, 2) A.
    """
    columns, costs = [], []
    for j in range(k):
        turn = 2 * pi * j / k
        for size, (a, b) in ((Fraction(1, 10), (cos(turn), sin(turn))), (1, (-sin(turn) / 2, cos(turn) / 2))):
            x, y = Fraction(a).limit_denominator(10), Fraction(b).limit_denominator(10)
            columns.append((size * x, size * y))
            costs.append(size * (1 - x - 2 * y))
    rows = [([column[i] for column in columns], "==", 0) for i in range(2)]
    return typed("min", costs, rows, lower=0), ("r1", "r2", *(f"x{j} lower" for j in range(3, 2 * k + 1)))


def test_the_circle_construction_goes_round_by_two_columns_at_a_time():
    model, start = circle()
    stalled = walk(model, start=start)
    assert (stalled.end, len(stalled.pivots), len(stalled.cycle)) == ("cycling", 10, 10)
    names = [f"x{j}" for j in range(1, 11)]
    pairs = [(pivot.entering, pivot.leaving) for pivot in stalled.cycle]
    assert pairs == [(names[(j + 2) % 10], names[j]) for j in range(10)]
    assert walk(model, "bland", start=start).value == walk(model, leaving="lexicographic", start=start).value == 0


def test_a_cycle_is_reported_with_its_length_bases_and_vertex():
    stalled = walk(THREE)
    assert stalled.point == (0, 0, 0)
    assert stalled.cycle_bases[:2] == (("x1", "x2", "x3"), ("r1", "x2", "x3"))
    assert len(set(map(frozenset, stalled.cycle_bases))) == 6
    assert "6 bases at (0, 0, 0), which hold x1, x2, x3; r1, x2, x3; r1, r2, x3; " in stalled.table().notes[-1]
    assert walk(THREE, rule="bland").cycle_bases == ()


def test_the_order_of_the_rows_is_part_of_the_state_for_first_row_only():
    first = walk(THREE, limit=0).first
    one, other = first.pivot(0, 0).pivot(1, 1), first.pivot(0, 1).pivot(1, 0)
    assert set(one.basic) == set(other.basic)
    assert one.basic != other.basic

    def states(leaving):
        rules = Rules(entering_rule("dantzig"), leaving_rule(leaving), range(9))
        return rules.state(one), rules.state(other)

    for leaving in ("lowest-index", "largest-pivot", "lexicographic"):
        assert len(set(states(leaving))) == 1
    assert len(set(states("first-row"))) == 2
    assert states("random") == (None, None)


def test_the_scale_of_a_row_as_typed_decides_whether_it_cycles():
    """CHECKS part B: multiplying one row by 6 can destroy a cycle; Bland's rule does not look at sizes."""
    ends, bland = set(), set()
    for place in range(3):
        rows = list(THREE.constraints)
        scaled = tuple(6 * value for value in rows[place].coefficients)
        rows[place] = type(rows[place])(rows[place].name, scaled, "<=", 6 * rows[place].rhs)
        model = type(THREE)(THREE.variables, tuple(rows), THREE.objective)
        ends.add(walk(model).end)
        bland.add(tuple((pivot.entering, pivot.leaving) for pivot in walk(model, rule="bland").pivots))
    assert "optimal" in ends
    assert len(bland) == 1


def test_a_cycle_is_found_behind_pivots_that_do_not_belong_to_it():
    """Beale's model with one more decision that Dantzig's rule takes first, far from the cycle."""
    rows = [(*([*row.coefficients, 0],), "<=", row.rhs) for row in BEALE.constraints[:3]]
    model = typed("min", [*BEALE.objective.coefficients, -9], [*rows, ([0, 0, 0, 0, 1], "<=", 2)], lower=0)
    stalled = walk(model)
    assert (stalled.end, len(stalled.pivots), len(stalled.cycle)) == ("cycling", 7, 6)
    assert (stalled.cycle[0].number, stalled.value) == (2, -18)


@pytest.mark.needs_shared_data
@pytest.mark.skipif(not DATA.exists(), reason="shared/data/cycling.json is not here")
def test_collection_of_cycling_models():
    """Every model of the collection: who cycles, and Bland's exact number of pivots."""
    entries = json.loads(DATA.read_text())
    assert len(entries) >= 14
    irrational = 0
    for entry in entries:
        try:
            model, start = model_of(entry)
        except ValueError:  # Hoffman's original has square roots of 5; its rationalised form is another entry
            irrational += 1
            continue
        stalled, ended = walk(model, start=start), walk(model, rule="bland", start=start)
        if entry["form"] == "eq":
            assert_sequence(entry, model, stalled)
        elif "verified_cycles" in entry:
            assert_ties(entry, model)
        pivots = [pivot for pivot in ended.pivots if pivot.kind != "ray"]
        assert (ended.end, len(pivots)) == (entry["bland"]["status"], entry["bland"]["pivots"]), entry["name"]
        for rule in ENTERING:
            assert walk(model, rule.name, "lexicographic", start=start).end == entry["lex"]["status"]
        counted = [
            pivot for pivot in walk(model, "dantzig", "lexicographic", start=start).pivots if pivot.kind != "ray"
        ]
        assert len(counted) == entry["lex"]["pivots"], entry["name"]
        if entry["lp_exact"]["optimum"] is not None:
            assert ended.value == Fraction(entry["lp_exact"]["optimum"])
    assert irrational <= 1


def assert_ties(entry, model):
    """Who cycles under which ties of the ratio test, with the index order either way round."""
    for order, (leaving, told) in product(("decisions first", "slacks first"), TIES.items()):
        name = f"{order.replace(' ', '_')}|dantzig|enter_tie=low|leave_tie={told}"
        end = walk(model, "dantzig", leaving, order).end
        assert (end == "cycling") == (name in entry["verified_cycles"]), (entry["name"], name)


def model_of(entry):
    """An entry as a model, and the basis it starts from."""
    if entry.get("form") == "le":
        return le(entry["sense"], entry["c"], entry["A"], entry["b"]), None
    if "c" not in entry:
        raise ValueError(entry["name"])
    rows = [(row, "==", end) for row, end in zip(entry["A"], entry["b"], strict=True)]
    model = typed(entry["sense"], entry["c"], rows, lower=0)
    held = [f"{name} lower" for j, name in enumerate(model.variables) if j not in entry["basis"]]
    return model, (*(f"r{i + 1}" for i in range(len(rows))), *held)


def assert_sequence(entry, model, stalled):
    """The published cycle, pivot by pivot."""
    told = entry["dantzig_low_low"]
    names = [[model.variables[index] for index in pair] for pair in told["sequence_enter_leave"]]
    assert (stalled.end, len(stalled.cycle)) == ("cycling", told["cycle_length"]), entry["name"]
    assert [[pivot.entering, pivot.leaving] for pivot in stalled.cycle] == names, entry["name"]
