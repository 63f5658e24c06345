"""The region of every model of the zoo, and what a region says of itself."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import pytest
from zoo import CUBE, SQUARE, XY, ZOO, build, nonnegative

import polywalk as pw
from polywalk.exact import exact
from polywalk.region import Edge, Region, region


def points(found: list[Any]) -> list[tuple[Fraction, ...]]:
    return [tuple(map(exact, point)) for point in found]


SAYS = {
    "status": lambda found: found.status,
    "dimension": lambda found: found.dimension,
    "points": lambda found: list(found.base),
    "rays": lambda found: [ray.direction for ray in found.rays],
    "lines": lambda found: len(found.lines),
    "edges": lambda found: len(found.edges),
    "facets": lambda found: len(found.facets),
    "outcome": lambda found: found.outcome,
    "value": lambda found: found.value,
    "volume": lambda found: found.volume,
    "squared": lambda found: found.measure_squared,
    "equalities": lambda found: found.equalities,
    "outline": lambda found: len(found.outline),
    "optimal": lambda found: (found.optimal.vertices, found.optimal.rays, found.optimal.lines),
    "degenerate": lambda found: [vertex.point for vertex in found.vertices if vertex.degenerate],
}
NUMBERS = {"value", "volume", "squared"}


@pytest.mark.parametrize("name", ZOO)
def test_zoo(name: str) -> None:
    model, facts = ZOO[name]
    found = region(model)
    for fact, expected in facts.items():
        if fact in {"points", "rays", "degenerate"}:
            expected = points(expected)  # noqa: PLW2901
        elif fact in NUMBERS and expected is not None:
            expected = exact(expected)  # noqa: PLW2901
        assert SAYS[fact](found) == expected, fact


@pytest.mark.parametrize("name", ZOO)
def test_every_region_is_consistent(name: str) -> None:
    check_consistency(region(ZOO[name][0]))


def check_consistency(found: Region) -> None:
    """What must hold of any region: active means zero slack, and the parts name each other rightly."""
    model = found.model
    moving = [row for row in model.constraints if not row.is_constant]
    assert [vertex.point for vertex in found.vertices] == ([] if found.lines else sorted(found.base))
    for vertex in found.vertices:
        assert list(vertex.slacks) == [row.name for row in model.constraints]
        assert all(row.holds(vertex.point) for row in model.constraints)
        assert vertex.active == tuple(row.name for row in moving if vertex.slacks[row.name] == 0)
        assert vertex.degeneracy == len(vertex.active) - model.n >= 0
    for ray in found.rays:
        assert ray.active == tuple(row.name for row in moving if row.slack(ray.direction) == row.rhs * sign(row.sense))
    for edge in found.edges:
        assert (edge.end is None) != (edge.ray is None)
        other = found.vertices[edge.end].active if edge.end is not None else found.rays[edge.ray].active  # type: ignore[index]
        assert edge.active == tuple(name for name in found.vertices[edge.start].active if name in other)
    for facet in found.facets:
        for name in facet.constraints:
            row = model.constraint(name)
            assert {k for k, point in enumerate(found.base) if row.slack(point) == 0} == set(facet.vertices)
            assert {k for k, ray in enumerate(found.rays) if name in ray.active} == set(facet.rays)
    for name, (lower, upper) in found.ranges.items():
        j = model.index(name)
        assert lower is None or lower == min(point[j] for point in found.base)
        assert upper is None or upper == max(point[j] for point in found.base)
    assert found == region(model)
    assert found.model.variables[0] in str(found) or not found.vertices


def sign(sense: str) -> int:
    return -1 if sense == ">=" else 1


def test_a_ring_of_neighbours_is_a_facet_in_order() -> None:
    found = region(build("x y z", [*CUBE, ("bevel", [1, 1, 1], "<=", "5/2")]))
    joined = {frozenset((edge.start, edge.end)) for edge in found.edges}
    assert sorted(len(facet.vertices) for facet in found.facets) == [3, 4, 4, 4, 5, 5, 5]
    for facet in found.facets:
        ring = facet.vertices
        assert all(frozenset((ring[k - 1], ring[k])) in joined for k in range(len(ring)))
        assert ring[0] == min(ring)
        assert ring[1] < ring[-1]


def test_an_open_outline_runs_from_ray_to_ray() -> None:
    rows = [*XY, ("a", [1, 2], ">=", 4), ("b", [2, 1], ">=", 4)]
    found = region(build("x y", rows))
    path = found.outline
    assert [found.vertices[k].point for k in path] in (
        points([(0, 4), ("4/3", "4/3"), (4, 0)]),
        points([(4, 0), ("4/3", "4/3"), (0, 4)]),
    )
    with_ray = {edge.start for edge in found.edges if edge.ray is not None}
    assert with_ray == {path[0], path[-1]}


def test_the_edges_of_a_square() -> None:
    found = region(build("x y", SQUARE))
    assert found.edges == (
        Edge(0, 1, None, ("x lower",)),
        Edge(0, 2, None, ("y lower",)),
        Edge(1, 3, None, ("y upper",)),
        Edge(2, 3, None, ("x upper",)),
    )


def test_duplicates_make_one_facet() -> None:
    found = region(ZOO["duplicate rows"][0])
    assert [facet.constraints for facet in found.facets] == [("x lower",), ("y lower",), ("cap", "third", "again")]


def test_an_equality_is_active_everywhere_and_no_facet() -> None:
    found = region(ZOO["flat in space"][0])
    assert all("sum" in vertex.active for vertex in found.vertices)
    assert [facet.constraints for facet in found.facets] == [("x lower",), ("y lower",), ("z lower",)]


def test_objective_values_carry_the_constant() -> None:
    model = build("x y", SQUARE).with_objective({"x": 2}, "max", 10)
    found = region(model)
    assert [vertex.objective for vertex in found.vertices] == [10, 10, 12, 12]
    assert found.value == 12
    assert region(build("x y", XY, ("max", [1, -2]))).rays[0].change == -2
    assert region(build("x y", XY)).rays[0].change is None


def test_ranges_and_centroid() -> None:
    found = region(build("x y", [*XY, ("cap", [1, 0], "<=", 3)]))
    assert found.ranges == {"x": (0, 3), "y": (0, None)}
    assert found.centroid == (Fraction(3, 2), 0)
    strip = region(ZOO["strip with a line"][0])
    assert strip.ranges == {"x": (None, None), "y": (None, None)}
    assert strip.centroid is None
    assert region(ZOO["empty"][0]).ranges == {}


def test_decimals_mean_decimals() -> None:
    """CHECKS-like trap: four lines meet in (1, 1) as typed; read as binary doubles they do not (elementary)."""
    a = [["0.1", "0.2"], ["0.2", "0.1"], ["0.3", "0.3"], ["0.7", "0.1"]]
    rows = [(f"r{k}", row, "<=", rhs) for k, (row, rhs) in enumerate(zip(a, ["0.3", "0.3", "0.6", "0.8"], strict=True))]
    found = region(build("x y", [*nonnegative("x y"), *rows]))
    assert len(found.vertices) == 4
    assert [len(vertex.active) for vertex in found.vertices if vertex.point == (1, 1)] == [4]
    binary = [(name, [Fraction(float(v)) for v in row], sense, Fraction(float(rhs))) for name, row, sense, rhs in rows]
    assert len(region(build("x y", [*nonnegative("x y"), *binary])).vertices) == 5


def test_the_table_tells_it_all() -> None:
    text = str(region(ZOO["cone at the origin with loose rows"][0]))
    assert text.splitlines()[0] == "unbounded region of dimension 2: 1 vertex, 2 edges, 2 facets, 2 rays"
    assert "ray 0: (0, 1), objective changes by 1, sliding along x lower" in text
    assert "the objective is unbounded" in text
    assert "no point satisfies" in str(region(ZOO["empty"][0]))
    strip = str(region(ZOO["strip with a line"][0]))
    assert "no vertex" in strip
    assert "optimum 2 at base point 1" in strip
    bevel = region(ZOO["bevelled corner"][0])
    assert str(bevel).startswith("bounded region of dimension 3: 10 vertices, 15 edges, 7 facets\n")
    assert bevel.frame().shape == (10, 7)


def test_names_are_escaped_in_a_notebook() -> None:
    found = region(build("x", [("<b>cap</b>", [1], "<=", 1)]))
    assert "<b>" not in found._repr_html_()


def test_integer_marks_are_said_to_be_ignored() -> None:
    model = pw.Model(("x",), build("x", [("cap", [2], "<=", 3)]).constraints, integers=("x",))
    found = region(model)
    assert found.vertices[0].point == (Fraction(3, 2),)
    assert "integer marks are not applied here: x" in str(found)


def test_the_public_function_is_a_function() -> None:
    """The sub-module carries the same name; the package must hand out the function."""
    assert pw.region is region
