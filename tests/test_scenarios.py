"""Harbour Row and its variants, and the published models: what their docstrings promise, checked exactly."""

from collections import Counter
from fractions import Fraction
from itertools import combinations, pairwise

import pytest
from oracle import truth

import polywalk as pw
from polywalk import scenarios
from polywalk.errors import ModelError, UnknownName
from polywalk.scenarios import harbour_row

VARIANTS = tuple(scenarios.VARIANTS)


def vertices(variant):
    return {tuple(map(int, vertex.point)): vertex for vertex in pw.region(harbour_row(variant)).vertices}


def changed(variant):
    """Names of the rows that the variant adds, loses or alters, and whether its objective differs."""
    base, other = harbour_row(), harbour_row(variant)
    rows = set(base.constraints) ^ set(other.constraints)
    return {row.name for row in rows}, base.objective != other.objective


def test_the_base_is_small_bounded_and_has_one_degenerate_vertex_that_is_not_best():
    model = harbour_row()
    assert model.variables == ("pump", "chips", "tank")
    assert 8 <= len(model.constraints) <= 12
    found = pw.region(model)
    assert (found.status, found.dimension, len(found.vertices), len(found.facets)) == ("bounded", 3, 13, 9)
    assert [vertex.point for vertex in found.vertices if vertex.degenerate] == [(5, 1, 3)]
    assert found.optimal.vertices == (list(vertices("base")).index((4, 4, 4)),)
    assert found.value == 292


def test_the_base_agrees_with_brute_force():
    """Computed, no source: every subset of three rows, in fractions."""
    known = truth(harbour_row())
    assert {vertex.point for vertex in pw.region(harbour_row()).vertices} == set(known.vertices)
    assert (known.outcome, known.value) == ("optimal", 292)


def test_every_row_matters():
    touching = Counter(name for vertex in vertices("base").values() for name in vertex.active)
    assert set(touching) == {row.name for row in harbour_row().constraints}
    assert min(touching.values()) >= 3


def test_the_picture_has_no_clumps():
    """Vertices are apart by more than 8 % of the diagonal, in MW and in the box of the ranges."""
    points = [tuple(map(float, point)) for point in vertices("base")]
    extents = [max(axis) - min(axis) for axis in zip(*points, strict=True)]
    for scale in (extents, (1.0, 1.0, 1.0)):
        diagonal = sum((extent / size) ** 2 for extent, size in zip(extents, scale, strict=True)) ** 0.5
        gaps = [
            sum(((a - b) / size) ** 2 for a, b, size in zip(p, q, scale, strict=True)) ** 0.5
            for p, q in combinations(points, 2)
        ]
        assert min(gaps) > 0.08 * diagonal


def test_the_two_rules_walk_differently():
    dantzig, bland = (pw.walk(harbour_row(), rule=rule) for rule in ("dantzig", "bland"))
    assert (len(dantzig.pivots), len(bland.pivots)) == (4, 6)
    assert [walk.end for walk in (dantzig, bland)] == ["optimal"] * 2
    assert dantzig.point == bland.point == (4, 4, 4)
    assert dantzig.points[0] == (0, 0, 0)
    assert [pivot.kind for pivot in bland.pivots].count("degenerate") == 1
    assert all(pivot.kind == "step" for pivot in dantzig.pivots)
    assert all(a != b for a, b in pairwise(dantzig.points))


def test_infeasible():
    assert changed("infeasible") == ({"town contract"}, False)
    assert pw.region(harbour_row("infeasible")).status == "empty"
    assert pw.walk(harbour_row("infeasible")).end == "infeasible"


def test_unbounded():
    assert changed("unbounded") == ({"harbour main"}, False)
    found = pw.region(harbour_row("unbounded"))
    assert (found.status, found.outcome) == ("unbounded", "unbounded")
    assert [ray.direction for ray in found.rays] == [(0, 1, 0)]
    assert found.rays[0].change == 18
    assert pw.walk(harbour_row("unbounded")).end == "unbounded"


def test_flat():
    assert changed("flat") == ({"harbour main"}, False)
    found = pw.region(harbour_row("flat"))
    assert (found.status, found.dimension, found.value) == ("bounded", 2, 292)


def test_tied():
    assert changed("tied") == (set(), True)
    found = pw.region(harbour_row("tied"))
    assert {found.vertices[place].point for place in found.optimal.vertices} == {(4, 4, 4), (0, 8, 4)}


def test_degenerate_at_the_optimum():
    assert changed("degenerate") == ({"circulation pump"}, False)
    model, found = harbour_row("degenerate"), pw.region(harbour_row("degenerate"))
    (best,) = (found.vertices[place] for place in found.optimal.vertices)
    assert (best.point, best.degeneracy, found.value) == ((4, 4, 4), 1, 292)
    tight, loose = (pw.region(model.with_rhs("circulation pump", rhs)).value for rhs in (7, 9))
    assert found.value - tight != loose - found.value  # two shadow prices, one a side


def test_two_decisions():
    """The flat picture is the base with the tank at 2 MW: same plans, same earnings."""
    flat, cut = pw.region(harbour_row("two decisions")), pw.region(harbour_row().fix("tank", 2))
    assert [v.point for v in flat.vertices] == [v.point for v in cut.vertices]
    assert [v.objective for v in flat.vertices] == [v.objective for v in cut.vertices]
    assert (flat.dimension, len(flat.vertices)) == (2, 5)


@pytest.mark.parametrize("variant", VARIANTS)
def test_names_and_units(variant):
    model = harbour_row(variant)
    assert model.name.startswith("Harbour Row")
    assert (variant in model.name) == (variant != "base")
    assert {model.unit(name) for name in model.variables} == {"MW"}


def test_every_variant_is_told():
    assert all(f'"{variant}"' in harbour_row.__doc__ for variant in VARIANTS)
    with pytest.raises(UnknownName, match="Harbour Row has no variant 'flta'; did you mean 'flat'"):
        harbour_row("flta")


PUBLISHED = [
    # Beale 1955 (m), Chvatal 1983 ch. 3, Kuhn in Balinski & Tucker 1969 (m), three decisions (c): CHECKS part B
    (scenarios.beale(), Fraction(-1, 20)),
    (scenarios.chvatal(), Fraction(1)),
    (scenarios.kuhn(), Fraction(-2)),
    (scenarios.circling(), Fraction(2)),
]


@pytest.mark.parametrize(("model", "value"), PUBLISHED, ids=lambda item: getattr(item, "name", ""))
def test_published_optimum(model, value):
    best = pw.optimum(model)
    assert (best.outcome, best.value) == ("optimal", value)


@pytest.mark.parametrize(("model", "value"), [PUBLISHED[0], PUBLISHED[1], PUBLISHED[3]])
def test_published_cycles_of_six(model, value):
    circled = pw.walk(model, rule="dantzig")
    assert (circled.end, len(circled.cycle)) == ("cycling", 6)
    ended = pw.walk(model, rule="bland")
    assert (ended.end, ended.value) == ("optimal", value)


def test_circling_solid():
    """CHECKS part B (c): five vertices, five facets, the cycle at the origin."""
    found = pw.region(scenarios.circling())
    assert (len(found.vertices), len(found.facets)) == (5, 5)
    assert pw.walk(scenarios.circling(), rule="dantzig").point == (0, 0, 0)
    assert len(pw.walk(scenarios.circling(), rule="bland").pivots) == 7


@pytest.mark.parametrize("form", ["2/5", "10/100", "unit"])
@pytest.mark.parametrize("n", [1, 2, 3, 4])
def test_klee_minty_is_a_cube(n, form):
    """Klee & Minty 1972: 2^n vertices, 2n facets; the optimum is 5^n, 100^(n-1), or 1."""
    found = pw.region(scenarios.klee_minty(n, form))
    assert (len(found.vertices), len(found.facets)) == (2**n, 2 * n)
    assert found.value == {"2/5": 5**n, "10/100": 100 ** (n - 1), "unit": 1}[form]
    assert not any(vertex.degenerate for vertex in found.vertices)


@pytest.mark.parametrize("n", range(2, 9))
def test_klee_minty_walks(n):
    """CHECKS part C: Dantzig 2^n - 1 in both forms (Klee & Minty 1972), Bland as in Avis & Chvatal 1978."""
    bland = {2: 3, 3: 5, 4: 9, 5: 15, 6: 25, 7: 41, 8: 67}
    assert len(pw.walk(scenarios.klee_minty(n), rule="dantzig").pivots) == 2**n - 1
    assert len(pw.walk(scenarios.klee_minty(n, "10/100"), rule="dantzig").pivots) == 2**n - 1
    assert len(pw.walk(scenarios.klee_minty(n), rule="bland").pivots) == bland[n]


def test_klee_minty_unit_form_is_no_stress_for_dantzig():
    """CHECKS part C: with epsilon and max x_n, one pivot."""
    assert len(pw.walk(scenarios.klee_minty(4, "unit"), rule="dantzig").pivots) == 1


def test_plain_solids():
    """Ziegler 1995: the cube has 2^n vertices and 2n facets, the cross-polytope 2n and 2^n."""
    for n in (1, 2, 3, 4):
        solid, dual = pw.region(scenarios.cube(n)), pw.region(scenarios.cross_polytope(n))
        assert (len(solid.vertices), len(solid.facets)) == (len(dual.facets), len(dual.vertices)) == (2**n, 2 * n)
        assert (solid.value, dual.value) == (n, 1)


@pytest.mark.parametrize(
    ("call", "error", "message"),
    [
        (lambda: scenarios.klee_minty(0), ModelError, "from 1 to 12, got 0"),
        (lambda: scenarios.klee_minty(13), ModelError, "from 1 to 12, got 13"),
        (lambda: scenarios.klee_minty("3"), ModelError, "got '3'"),
        (lambda: scenarios.klee_minty(3, "2/6"), UnknownName, "Klee-Minty has no form '2/6'; did you mean '2/5'"),
        (lambda: scenarios.klee_minty(3, "unit", "1/2"), ModelError, "above 0 and below 1/2, got 1/2"),
        (lambda: scenarios.cube(True), ModelError, "got True"),
        (lambda: scenarios.cross_polytope(9), ModelError, "from 1 to 8, got 9"),
    ],
)
def test_refusals(call, error, message):
    with pytest.raises(error, match=message):
        call()
