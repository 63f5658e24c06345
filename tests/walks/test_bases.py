"""The bases of a vertex against brute force over all n-subsets of its active constraints, from the rows alone."""

from __future__ import annotations

from fractions import Fraction
from itertools import combinations
from random import Random

import pytest
from oracle import eliminate, value
from small import random_degenerate
from zoo import ZOO

import polywalk as pw
from polywalk.errors import PolywalkError, WalkError
from polywalk.model import Model
from polywalk.region import Vertex
from polywalk.scenarios import VARIANTS, beale, chvatal, circling, cube, harbour_row
from polywalk.walks import Basis, Route

MODELS = {name: model for name, (model, _) in ZOO.items()}
MODELS |= {f"Harbour Row {name}": harbour_row(name) for name in VARIANTS}
MODELS |= {"beale": beale(), "chvatal": chvatal(), "circling": circling(), "cube": cube(3)}
MODELS |= {f"random {seed}": random_degenerate(Random(seed)) for seed in range(40)}
CORNERS = [
    (name, k)
    for name, model in MODELS.items()
    for k, vertex in enumerate(pw.region(model).vertices)
    if vertex.degenerate or k == 0
]


def independent(model: Model, names: tuple[str, ...]) -> bool:
    rows = [model.constraint(name).coefficients for name in names]
    return len(eliminate(rows, model.n)[1]) == len(rows)


def kept_equalities(model: Model) -> tuple[str, ...]:
    """The first independent ones: those that no basis lets go."""
    kept: tuple[str, ...] = ()
    for row in model.constraints:
        if row.sense == "==" and independent(model, (*kept, row.name)):
            kept += (row.name,)
    return kept


def all_bases(model: Model, vertex: Vertex) -> list[tuple[str, ...]]:
    """Every n-subset of the active constraints that is independent and lets no equality go."""
    must = set(kept_equalities(model))
    chosen = (names for names in combinations(vertex.active, model.n) if must <= set(names))
    return [names for names in chosen if independent(model, names)]


def direction(model: Model, held: tuple[str, ...], entering: str) -> tuple[Fraction, ...]:
    """Where the decisions go when the slack of one constraint held grows and the others stay at 0."""
    rows = [(*model.constraint(name).inward[1], Fraction(name == entering)) for name in held]
    return tuple(row[-1] for row in eliminate(rows, model.n)[0])


def rate(model: Model, name: str, way: tuple[Fraction, ...]) -> Fraction:
    return value(model.constraint(name).inward[1], way)


def gain(model: Model, way: tuple[Fraction, ...]) -> Fraction:
    goal = model.objective
    return Fraction(0) if goal is None else value(goal.coefficients, way) * (1 if goal.goal == "max" else -1)


def may_enter(model: Model, basis: Basis) -> list[str]:
    return [name for name in basis.held if model.constraint(name).sense != "=="]


def test_enough_of_the_vertices_are_awkward() -> None:
    counts = [len(pw.bases(MODELS[name], k).members) for name, k in CORNERS]
    assert len(CORNERS) >= 60
    assert sum(count > 1 for count in counts) >= 40
    assert sum(count > 8 for count in counts) >= 5


@pytest.mark.parametrize(("name", "number"), CORNERS)
def test_bases_are_all_there_are(name: str, number: int) -> None:
    model = MODELS[name]
    found = pw.bases(model, number)
    assert found.complete
    assert [basis.held for basis in found.members] == all_bases(model, found.vertex)
    for k, basis in enumerate(found.members):
        assert (basis.number, basis.dictionary.point) == (k, found.vertex.point)
        assert basis.dictionary.feasible


@pytest.mark.parametrize(("name", "number"), CORNERS)
def test_pivots_are_the_exchanges_and_point_where_they_improve(name: str, number: int) -> None:
    model = MODELS[name]
    found = pw.bases(model, number)
    held = [set(basis.held) for basis in found.members]
    apart = {pair for pair in combinations(range(len(held)), 2) if len(held[pair[0]] & held[pair[1]]) == model.n - 1}
    assert sorted(tuple(sorted((p.start, p.end))) for p in found.pivots) == sorted(apart)
    for pivot in found.pivots:
        improving = []
        for start, end in ((pivot.start, pivot.end), (pivot.end, pivot.start)):
            (entering,), (leaving,) = held[start] - held[end], held[end] - held[start]
            way = direction(model, found.members[start].held, entering)
            improving.append(gain(model, way) > 0 and rate(model, leaving, way) < 0)
        assert improving in ([pivot.improves, False],)


@pytest.mark.parametrize(("name", "number"), CORNERS)
def test_optimal_bases_are_dual_feasible_and_exits_are_the_edges(name: str, number: int) -> None:
    model = MODELS[name]
    found = pw.bases(model, number)
    seen, edges = found.region, set()
    for basis in found.members:
        ways = {entering: direction(model, basis.held, entering) for entering in may_enter(model, basis)}
        assert basis.optimal == all(gain(model, way) <= 0 for way in ways.values())
        assert basis.reduced_costs.keys() == set(basis.held)
        for entering, way in ways.items():
            sign = 1 if model.objective is None or model.objective.goal == "max" else -1
            assert basis.reduced_costs[entering] * sign == gain(model, way)
        open_ways = [way for way in ways.values() if all(rate(model, row, way) >= 0 for row in found.vertex.active)]
        exits = [exit for exit in found.exits if exit.basis == basis.number]
        assert len(exits) == len(open_ways)
        for way, exit in zip(open_ways, sorted(exits, key=lambda e: _place(model, basis, e.entering)), strict=True):
            assert exit.improves == (gain(model, way) > 0)
            if exit.vertex is not None:
                ahead = tuple(x + exit.step * d for x, d in zip(found.vertex.point, way, strict=True))
                assert seen.vertices[exit.vertex].point == ahead
                edges.add(("vertex", exit.vertex))
            else:
                scale = next(b / a for a, b in zip(way, seen.rays[exit.ray].direction, strict=True) if a)
                assert tuple(scale * x for x in way) == seen.rays[exit.ray].direction
                assert scale > 0
                edges.add(("ray", exit.ray))
    assert edges == {
        ("ray", edge.ray) if edge.end is None else ("vertex", edge.end if edge.start == number else edge.start)
        for edge in seen.edges
        if number in {edge.start, edge.end}
    }


def _place(model: Model, basis: Basis, entering: str) -> int:
    """The place of the slack's constraint among those held."""
    slacks = basis.dictionary.slacks
    of = {slacks.names[index]: name for name, index in slacks.of_constraint.items()}
    return basis.held.index(of[entering])


def assert_route_is_true(found: pw.walks.Bases, route: Route) -> None:
    taken = {(pivot.start, pivot.end): pivot for pivot in found.pivots if pivot.improves}
    assert len(route.stays) == len(route.places) - 1
    for pivot, start, end in zip(route.stays, route.places[:-1], route.places[1:], strict=True):
        assert pivot.kind == "degenerate"
        assert (pivot.entering, pivot.leaving) == (taken[start, end].entering, taken[start, end].leaving)
    if route.end == "leaves":
        ways = {(exit.basis, exit.entering): exit.target for exit in found.exits if exit.improves}
        assert ways[route.places[-1], route.departure.entering] == route.target
    if route.end == "optimal":
        assert found.members[route.places[-1]].optimal


@pytest.mark.parametrize("rule", ["dantzig", "bland"])
@pytest.mark.parametrize(("name", "number"), [corner for corner in CORNERS if MODELS[corner[0]].objective])
def test_routes_from_every_basis_run_along_the_pivots(name: str, number: int, rule: str) -> None:
    model = MODELS[name]
    found = pw.bases(model, number)
    for basis in found.members[:12]:
        route = found.route(found.walk(basis.number, rule))
        assert route.places[0] == basis.number
        assert route.arrival is None
        assert_route_is_true(found, route)
        if route.end != "cycling":
            assert len(route.stays) >= found.fewest[basis.number]
        assert rule == "dantzig" or route.end in {"leaves", "optimal"}
        assert set(found.reachable(basis.number, rule)) == set(route.places)
        assert set(route.places) <= set(found.reachable(basis.number))


def test_circling_goes_round_six_of_twenty_bases_and_bland_leaves() -> None:
    """The cycle is that of the walk itself; the model is computed, no source."""
    model = circling()
    found = pw.bases(model, (0, 0, 0))
    dantzig, bland = found.route(pw.walk(model)), found.route(pw.walk(model, rule="bland"))
    assert len(found.members) == 20
    assert (dantzig.end, len(dantzig.stays), dantzig.places[0], len(set(dantzig.places))) == (
        "cycling",
        6,
        dantzig.places[-1],
        6,
    )
    assert (bland.end, bland.target, bland.departure.number) == ("leaves", "V4", len(bland.stays) + 1)
    assert max(found.fewest) == 2
    assert str(dantzig).splitlines()[0].endswith("for ever")
    assert "then pivot 7 leaves for V4" in bland.story


@pytest.mark.parametrize("model", [beale(), chvatal()], ids=["beale", "chvatal"])
def test_published_cycles_stay_among_the_bases_of_the_origin(model: Model) -> None:
    """Six bases each: Beale 1955; Chvatal 1983, chapter 3 (both from memory)."""
    route = pw.bases(model, (0, 0, 0, 0)).route(pw.walk(model))
    assert (route.end, len(set(route.places))) == ("cycling", 6)


def test_a_walk_that_arrives_stays_and_leaves() -> None:
    model = harbour_row()
    found = pw.bases(model, 10)
    route = found.route(pw.walk(model, rule="bland"))
    assert (route.arrival.number, [p.number for p in route.stays], route.departure.number) == (3, [4], 5)
    assert_route_is_true(found, route)
    elsewhere = found.route(pw.walk(model))
    assert (elsewhere.end, elsewhere.places, elsewhere.target) == ("elsewhere", (), "")
    assert "does not come to V10" in str(elsewhere)


def test_phase_one_ends_at_a_basis() -> None:
    """Rest is outside; Phase I leads to (0, 2), where "cap", "least" and "x lower" meet."""
    model = pw.from_algebra(
        maximize="2*x + y",
        constraints={"least": "x + y >= 2", "cap": "y <= 2 + x", "far": "x <= 9"},
        bounds={"x": (0, None), "y": (0, None)},
    )
    walked = pw.walk(model, rule="bland", order=["y", "x", "least", "cap", "far"])
    route = pw.bases(model, (0, 2)).route(walked)
    assert walked.pivots[0].phase == 1
    assert walked.pivots[route.arrival.number - 1].point_after == (0, 2)
    assert route.places
    assert all(pivot.phase == 2 for pivot in route.stays)


def test_an_optimal_vertex_may_have_bases_that_do_not_show_it() -> None:
    model = harbour_row("degenerate")
    found = pw.bases(model, (4, 4, 4))
    assert (len(found.members), len(found.optimal)) == (4, 2)
    assert "only 2 of the 4 bases show it" in str(found)
    assert not [exit for exit in found.exits if exit.improves]
    assert list(found.frame().columns) == ["basis", "held active", "optimal", "may pivot to", "may leave for"]
    assert str(found.members[found.optimal[0]]).startswith("B0: optimal")


def test_a_search_that_stops_says_so() -> None:
    model = circling()
    found = pw.bases(model, (0, 0, 0), limit=5)
    assert (len(found.members), found.complete) == (5, False)
    assert "5 bases found, and there are more" in str(found)
    assert len(found.fewest) == 5
    with pytest.raises(WalkError, match="raise limit"):
        found.route(pw.walk(model))


def test_vertex_number_point_and_vertex_are_the_same() -> None:
    model = harbour_row()
    corner = pw.region(model).vertices[10]
    assert pw.bases(model, 10) == pw.bases(model, corner) == pw.bases(model, (5, 1, 3))
    assert pw.bases(model, {"pump": 5, "chips": 1, "tank": 3}).number == 10


@pytest.mark.parametrize(
    ("vertex", "words"),
    [
        (None, "expected a vertex"),
        (True, "expected a vertex"),
        ("V10", "expected a vertex"),
        (99, "one of the 13 vertices"),
        (-1, "one of the 13 vertices"),
        ((1, 1, 1), "is none of the 13 vertices"),
        ((1, 1), "3"),
        ({"pump": 5, "chip": 1, "tank": 3}, "chip"),
    ],
)
def test_what_is_no_vertex_is_refused(vertex: object, words: str) -> None:
    with pytest.raises(PolywalkError, match=words):
        pw.bases(harbour_row(), vertex)


def test_other_refusals() -> None:
    found = pw.bases(harbour_row(), 10)
    with pytest.raises(WalkError, match="another model"):
        found.route(pw.walk(circling()))
    with pytest.raises(WalkError, match="one of the 4 bases of V10"):
        found.walk(4)
    with pytest.raises(WalkError, match="one of the 4 bases of V10"):
        found.reachable(-1)
    with pytest.raises(WalkError, match="1 or more"):
        pw.bases(harbour_row(), 10, limit=0)
    with pytest.raises(WalkError, match="contains a line"):
        pw.bases(ZOO["strip with a line"][0], (0, 0))
    with pytest.raises(WalkError, match="it is empty"):
        pw.bases(ZOO["empty"][0], 0)
