"""Published walks: cycling examples (CHECKS part B) and pivot counts on cubes (part C), each beside its source."""

from __future__ import annotations

import json
from fractions import Fraction
from pathlib import Path

import pytest
from small import klee_minty, le, typed

from polywalk.linear import optimum
from polywalk.walks import walk

DATA = Path(__file__).parents[2].parent / "shared" / "data" / "cycling.json"
LOWEST = "decisions_first|dantzig|enter_tie=low|leave_tie=low"

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
            assert (stalled.end == "cycling") == (LOWEST in entry["verified_cycles"]), entry["name"]
        pivots = [pivot for pivot in ended.pivots if pivot.kind != "ray"]
        assert (ended.end, len(pivots)) == (entry["bland"]["status"], entry["bland"]["pivots"]), entry["name"]
        if entry["lp_exact"]["optimum"] is not None:
            assert ended.value == Fraction(entry["lp_exact"]["optimum"])
    assert irrational <= 1


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


@pytest.mark.parametrize("n", range(2, 9))
@pytest.mark.parametrize(("base", "growth"), [(2, 5), (10, 100)], ids=["2/5", "10/100"])
def test_klee_minty_counts(n, base, growth):
    """Klee & Minty 1972; Bland with decisions first: Avis & Chvátal 1978; other orders: computed, no source."""
    model = klee_minty(n, base, growth)

    def pivots(rule, order):
        ended = walk(model, rule=rule, order=order)
        assert (ended.end, ended.value) == ("optimal", 5**n if growth == 5 else 100 ** (n - 1))
        return len(ended.pivots)

    orders = ("decisions first", "slacks first", "interleaved")
    assert [pivots("dantzig", order) for order in orders] == [2**n - 1] * 3
    assert [pivots("bland", order) for order in orders] == [avis_chvatal(n), 2 * n - 1, 2**n - 1]


def avis_chvatal(n: int) -> int:
    """3, 5, 9, 15, 25, 41, 67 for n = 2..8: a_n = a_(n-1) + a_(n-2) + 1."""
    return {1: 1, 2: 3}.get(n) or avis_chvatal(n - 1) + avis_chvatal(n - 2) + 1


@pytest.mark.parametrize("n", range(2, 9))
def test_unit_cube_form_is_no_stress_for_dantzig(n):
    """CHECKS part C: max x_n on the cube squashed by epsilon takes Dantzig's rule one pivot."""
    epsilon = Fraction(1, 3)
    rows = []
    for j in range(1, n):
        rows.append(([*[0] * (j - 1), epsilon, -1, *[0] * (n - j - 1)], "<=", 0))
        rows.append(([*[0] * (j - 1), epsilon, 1, *[0] * (n - j - 1)], "<=", 1))
    model = typed("max", [*[0] * (n - 1), 1], rows, lower=[0] + [None] * (n - 1), upper=[1])
    model = model.with_constraint("x lower", {f"x{n}": 1}, ">=", 0)
    cube = typed("max", [*[0] * (n - 1), 1], rows, lower=0, upper=[1])
    assert (walk(cube).end, walk(cube).value, len(walk(cube).pivots)) == ("optimal", 1, 1)
    assert walk(model).value == 1


@pytest.mark.parametrize("n", range(2, 6))
def test_dantzig_visits_every_vertex_of_the_klee_minty_cube(n):
    found = walk(klee_minty(n))
    assert len(set(found.points)) == len(found.points) == 2**n
