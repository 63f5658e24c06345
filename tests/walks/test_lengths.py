"""Walk lengths on cubes (CHECKS part C) and through all vertices of a shadow (part D), each beside its source."""

from __future__ import annotations

from fractions import Fraction

import pytest
from small import klee_minty, typed

from polywalk.errors import ModelError
from polywalk.reading import from_algebra
from polywalk.region import project, region
from polywalk.scenarios import goldfarb
from polywalk.walks import walk


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


@pytest.mark.parametrize("n", range(2, 9))
@pytest.mark.parametrize(("base", "growth"), [(2, 5), (10, 100)], ids=["2/5", "10/100"])
def test_rules_that_look_further_need_few_pivots_on_the_klee_minty_cube(n, base, growth):
    """CHECKS part C, last rows (computed, no source)."""
    model = klee_minty(n, base, growth)
    rules = ("steepest-edge-decisions", "steepest-edge", "greatest-improvement")
    assert [len(walk(model, rule).pivots) for rule in rules] == [2 * n - 1, 1, 1]


def test_steepest_edge_over_the_decisions_visits_all_vertices_of_a_cube():
    """CHECKS part C (computed, no source): from the worst vertex, 7 pivots."""
    rows = {"low y": "x <= y", "high y": "y <= 4 - x", "low z": "-3*y <= z", "high z": "z <= 4 + 3*y"}
    model = from_algebra(maximize="x - 3*y - 2*z", constraints=rows, bounds={"x": (0, 1)})
    corners = region(model).vertices
    worst = min(corners, key=lambda vertex: vertex.objective)
    assert worst.point == (0, 4, 16)
    walked = walk(model, "steepest-edge-decisions", start=worst)
    assert len(walked.pivots) == 7
    assert set(walked.points) == {vertex.point for vertex in corners}
    assert len(walk(model, "steepest-edge", start=worst).pivots) < 7


def values(n: int, last: int, before: int = 0) -> dict[str, int]:
    """A number for each variable of Goldfarb's cube: 0, and these for the last two."""
    return dict.fromkeys((f"x{j}" for j in range(1, n + 1)), 0) | {f"x{n}": last, f"x{n - 1}": before}


@pytest.mark.parametrize("n", range(2, 7))
def test_the_shadow_vertex_rule_passes_all_vertices_of_the_goldfarb_cube(n):
    """Goldfarb 1994; Amenta & Ziegler 1999; beta = 2, gamma = 1/4, delta = 5 (CHECKS part D)."""
    model = goldfarb(n)
    corners = region(model).vertices
    shadow = project(region(model), (f"x{n - 1}", f"x{n}"))
    assert len(corners) == len(shadow.vertices) == 2**n
    walked = walk(model, "shadow-vertex", start=values(n, 0), start_objective=values(n, -1, before=1))
    assert (walked.end, len(walked.pivots)) == ("optimal", 2**n - 1)
    assert set(walked.points) == {vertex.point for vertex in corners}


def test_every_vertex_the_shadow_rule_passes_is_optimal_for_a_mixture_of_both_objectives():
    """Gass & Saaty 1955: as the mixture turns, its optimum never jumps; here on the cube that is hard for Dantzig."""
    model = klee_minty(4)
    walked = walk(model, "shadow-vertex", start_objective=(-1, -1, -1, -1))
    share = Fraction(0)
    for pivot in walked.pivots:
        now = pivot.before
        own = {name: now.reduced_cost(j) for j, name in enumerate(pivot.active_before)}
        start = {name: -sum(now.direction(j), Fraction(0)) for j, name in enumerate(pivot.active_before)}
        turns = {name: start[name] / (start[name] - own[name]) for name in own if own[name] > 0}
        assert min(turns.values()) == turns[pivot.entering] >= share
        share = turns[pivot.entering]
        assert all((1 - share) * start[name] + share * own[name] <= 0 for name in own)
    assert walked.value == 625


def test_goldfarb_needs_two_variables():
    with pytest.raises(ModelError, match="from 2 to 12, got 1"):
        goldfarb(1)
