"""The vertices as a table, and the card of the selected one: point, objective, active constraints, bases, ways out."""

from __future__ import annotations

from fractions import Fraction
from html import escape

from polywalk.exact import full, rounded
from polywalk.explorer.state import State
from polywalk.explorer.texts import count, grid, number
from polywalk.region import Region, Way, vertex_name, ways
from polywalk.table import Table
from polywalk.walks import bases

MOST_ROWS = 200
"""So many vertices are listed; more would only slow the page down."""

MOST_BASES = 200
"""So many bases of a vertex are counted."""


def vertices(region: Region | None) -> Table:
    """One row a vertex: its number, point, objective and marks."""
    if region is None:
        return Table("vertices", ("vertex",), ())
    best = region.optimal.vertices if region.optimal else ()
    rows = []
    for index, vertex in enumerate(region.vertices[:MOST_ROWS]):
        marks = ["optimal"] * (index in best) + ["degenerate"] * vertex.degenerate
        value = () if vertex.objective is None else (vertex.objective,)
        rows.append((vertex_name(index), *vertex.point, *value, ", ".join(marks)))
    objective = () if region.model.objective is None else ("objective",)
    return Table("vertices", ("vertex", *region.model.variables, *objective, "marks"), tuple(rows))


def unlisted(region: Region | None) -> str:
    """What the table of vertices leaves out."""
    if region is None:
        return "<p>The vertices of this model are not listed yet: see Findings.</p>"
    more = len(region.vertices) - MOST_ROWS
    return f"<p>And {more} more.</p>" if more > 0 else ""


def card(state: State) -> str:
    """Everything about the selected vertex."""
    region, index = state.region, state.vertex
    if region is None or not region.vertices:
        return "<h3>Selected vertex</h3><p>None: the region has no vertex, or they are not listed yet.</p>"
    if index is None:
        return "<h3>Selected vertex</h3><p>None yet: click one in the picture, or pick a row under Vertices.</p>"
    vertex, model = region.vertices[index], region.model
    values = [
        f"{escape(name)} = {_both(value, model.unit(name))}"
        for name, value in zip(model.variables, vertex.point, strict=True)
    ]
    parts = [f"<h3>Selected vertex: {vertex_name(index)}</h3><p>{', '.join(values)}</p>"]
    if vertex.objective is not None:
        best = region.optimal is not None and index in region.optimal.vertices
        parts.append(f"<p>objective {_both(vertex.objective)}{', the optimum' if best else ''}</p>")
    parts.append(f"<p>active: {escape(', '.join(vertex.active))}</p>")
    if vertex.degenerate:
        parts.append(f"<p>degenerate: {len(vertex.active)} constraints meet where {model.n} would do</p>")
    parts.append(f"<p>{_bases(state)}</p>")
    return "".join([*parts, _ways(region, index)])


def _both(value: Fraction, unit: str = "") -> str:
    """Exact, with the rounded number beside a fraction."""
    text = full(value)
    return escape(f"{text} (≈ {rounded(value)}) {unit}" if "/" in text else f"{text} {unit}").rstrip()


def _bases(state: State) -> str:
    """How many bases it has, counted when the input rests where that is work."""
    region, index = state.region, state.vertex
    assert region is not None
    assert index is not None
    if not region.vertices[index].degenerate:
        return "one basis"
    if state.stale:
        return "its bases are counted when the input rests"
    found = bases(region.model, index, limit=MOST_BASES)
    told = count(len(found.members), "basis", "bases") + ("" if found.complete else " and more")
    listed = "".join(f"<li>{basis.name} holds {escape(', '.join(basis.held))}</li>" for basis in found.members[:12])
    optimal = f", {len(found.optimal)} of them optimal" if found.optimal else ""
    return f"<details><summary>{told}{optimal}</summary><ul>{listed}</ul></details>"


def _ways(region: Region, index: int) -> str:
    """The edges that leave, with what each changes."""
    lines = [_way(way) for way in ways(region, index)]
    columns = ("edge to", "lets go of", "step length", "objective")
    return grid(columns, lines, numbers={2, 3}, caption="Edges leaving it") if lines else "<p>no edge leaves it</p>"


def _way(way: Way) -> tuple[str, ...]:
    change = "" if way.change is None else ("+" if way.change > 0 else "") + number(way.change)
    steps = "without end" if way.steps is None else ", ".join(map(number, way.steps))
    per = " a unit" if way.steps is None and change else ""
    return way.target, escape(", ".join(way.released)), steps, change + per
