"""What must not change, or change in step, when a model is moved, stretched, shuffled or given a needless row."""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction

from hypothesis import assume, given, settings
from hypothesis import strategies as st
from test_region import check_consistency
from zoo import build, unit

from polywalk.exact import dot
from polywalk.model import Constraint, Model
from polywalk.region import Region, region

small = st.integers(-3, 3)
fractions = st.fractions(min_value=-3, max_value=3, max_denominator=4)
positive = st.fractions(min_value=Fraction(1, 4), max_value=4, max_denominator=4)


@st.composite
def models(draw: st.DrawFn) -> Model:
    """One to three variables, up to six rows of any sense, most of them satisfied at a drawn point."""
    n = draw(st.integers(1, 3))
    at = draw(st.lists(small, min_size=n, max_size=n))
    rows = []
    for k in range(draw(st.integers(n, 6))):
        row = draw(st.lists(small, min_size=n, max_size=n)) if draw(st.booleans()) else unit(n, k % n)
        sense = draw(st.sampled_from(["<=", ">=", "<=", ">=", "<=", ">=", "=="]))
        room = 0 if sense == "==" else draw(st.integers(-1, 4)) * (1 if sense == "<=" else -1)
        rows.append((f"r{k}", row, sense, sum(a * b for a, b in zip(row, at, strict=True)) + room))
    return build(" ".join("xyz"[:n]), rows, ("max", draw(st.lists(small, min_size=n, max_size=n))))


def shape(found: Region) -> tuple[object, ...]:
    """Everything that does not tell where the region lies."""
    edges = [(edge.start, edge.end, edge.ray) for edge in found.edges]
    facets = sorted((facet.vertices, facet.rays) for facet in found.facets)
    return found.status, found.dimension, len(found.base), found.lines, edges, facets, found.outcome


@given(models())
def test_any_region_is_consistent(model: Model) -> None:
    check_consistency(region(model))


@given(models(), st.data())
def test_a_moved_region(model: Model, data: st.DataObject) -> None:
    by = tuple(data.draw(st.lists(fractions, min_size=model.n, max_size=model.n)))
    rows = tuple(replace(row, rhs=row.rhs + dot(row.coefficients, by)) for row in model.constraints)
    found, moved = region(model), region(replace(model, constraints=rows))
    assert shape(moved) == shape(found)
    assert [vertex.active for vertex in moved.vertices] == [vertex.active for vertex in found.vertices]
    shifted = [tuple(a + b for a, b in zip(vertex.point, by, strict=True)) for vertex in found.vertices]
    assert [vertex.point for vertex in moved.vertices] == shifted
    assert moved.rays == found.rays or [ray.direction for ray in moved.rays] == [ray.direction for ray in found.rays]
    assert (moved.volume, moved.measure_squared) == (found.volume, found.measure_squared)


@given(models(), positive)
def test_a_stretched_region(model: Model, by: Fraction) -> None:
    rows = tuple(replace(row, rhs=row.rhs * by) for row in model.constraints)
    found, larger = region(model), region(replace(model, constraints=rows))
    assert shape(larger) == shape(found)
    assert [v.point for v in larger.vertices] == [tuple(a * by for a in v.point) for v in found.vertices]
    if found.status == "bounded":
        assert larger.volume == found.volume * by**model.n
        assert larger.measure_squared == found.measure_squared * by ** (2 * found.dimension)


@given(models(), st.data())
def test_rows_written_otherwise(model: Model, data: st.DataObject) -> None:
    """Each row times a positive number, or turned round, in another order: the same vertices and active sets."""
    rows = [_turned(row, data.draw(positive), data.draw(st.booleans())) for row in model.constraints]
    found, other = region(model), region(replace(model, constraints=tuple(data.draw(st.permutations(rows)))))
    assert other.base == found.base
    assert [frozenset(v.active) for v in other.vertices] == [frozenset(v.active) for v in found.vertices]
    assert [ray.direction for ray in other.rays] == [ray.direction for ray in found.rays]
    assert shape(other) == shape(found)


def _turned(row: Constraint, by: Fraction, turn: bool) -> Constraint:
    factor = -by if turn else by
    sense = {"<=": ">=", ">=": "<=", "==": "=="}[row.sense] if turn else row.sense
    scaled = tuple(value * factor for value in row.coefficients)
    return replace(row, coefficients=scaled, rhs=row.rhs * factor, sense=sense)


@given(models(), st.data())
def test_a_needless_row_that_touches_changes_active_sets_only(model: Model, data: st.DataObject) -> None:
    found = region(model)
    assume(found.vertices)
    vertex = data.draw(st.sampled_from(found.vertices))
    rows = [model.constraint(name).inward for name in vertex.active]
    total = [sum(column) for column in zip(*(row for _, row in rows), strict=True)]
    assume(any(total))
    touching = dict(zip(model.variables, total, strict=True))
    wider = region(model.with_constraint("touch", touching, ">=", -sum(b for b, _ in rows)))
    assert shape(wider) == shape(found)
    for old, new in zip(found.vertices, wider.vertices, strict=True):
        touches = dot(tuple(total), old.point) == -sum(b for b, _ in rows)
        assert new.active == old.active + (("touch",) if touches else ())
        assert touches or old.point != vertex.point


@settings(max_examples=50)
@given(models(), st.data())
def test_variables_in_another_order(model: Model, data: st.DataObject) -> None:
    order = data.draw(st.permutations(range(model.n)))

    def turned(row: tuple[Fraction, ...]) -> tuple[Fraction, ...]:
        return tuple(row[j] for j in order)

    rows = tuple(replace(row, coefficients=turned(row.coefficients)) for row in model.constraints)
    goal = model.objective
    assert goal is not None
    other = Model(turned(model.variables), rows, replace(goal, coefficients=turned(goal.coefficients)))  # type: ignore[arg-type]
    found, swapped = region(model), region(other)
    assert sorted(turned(vertex.point) for vertex in found.vertices) == [vertex.point for vertex in swapped.vertices]
    assert sorted(turned(ray.direction) for ray in found.rays) == [ray.direction for ray in swapped.rays] or found.lines
    assert (found.volume, found.measure_squared) == (swapped.volume, swapped.measure_squared)
    assert (found.outcome, found.value) == (swapped.outcome, swapped.value)
    assert {facet.constraints for facet in found.facets} == {facet.constraints for facet in swapped.facets}
