"""The explorer's sentences as HTML; every name is escaped, every number was computed elsewhere."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from html import escape

from polywalk.exact import full, short
from polywalk.model import Model
from polywalk.region import Region, Vertex, vertex_name
from polywalk.table import Table, cell

OUTCOME = {
    "unbounded": "no optimum: the objective improves without end",
    "empty": "no plan satisfies every constraint",
    "no objective": "no objective",
}


def number(value: Fraction, unit: str = "") -> str:
    """The number as it fits, exact on hover, with its unit."""
    text = escape(short(value))
    shown = text if full(value) == short(value) else f'<span title="{escape(full(value))}">{text}</span>'
    return f"{shown} {escape(unit)}".rstrip()


def count(number_of: int, word: str, plural: str = "") -> str:
    """ "1 ray", "2 rays"."""
    return f"{number_of} {word if number_of == 1 else plural or word + 's'}"


def verdict(region: Region) -> str:
    """Status, optimum and the number of vertices in one line."""
    model = region.model
    name = f"<b>{escape(model.name)}</b>: " if model.name else ""
    parts = (
        ["empty region"] if region.status == "empty" else [f"{region.status} region of dimension {region.dimension}"]
    )
    if region.outcome == "optimal" and region.value is not None and region.optimal is not None:
        names = [vertex_name(index) for index in region.optimal.vertices if region.vertices]
        place = f" at {', '.join(names)}" if names else ""
        parts.append(f"optimum {number(region.value)}{place}")
    else:
        parts.append(OUTCOME[region.outcome])
    if region.status != "empty":
        parts.append(count(len(region.vertices), "vertex", "vertices"))
        crowded = sum(vertex.degenerate for vertex in region.vertices)
        parts += [f"{crowded} of them degenerate"] if crowded else []
        parts += [count(len(region.rays), "ray")] if region.rays else []
    return f'<p class="polywalk-verdict">{name}{"; ".join(parts)}.</p>'


def vertices(region: Region) -> Table:
    """One row a vertex: its number, point, objective and marks."""
    best = region.optimal.vertices if region.optimal else ()
    rows = []
    for index, vertex in enumerate(region.vertices):
        marks = ["optimal"] * (index in best) + ["degenerate"] * vertex.degenerate
        value = () if vertex.objective is None else (vertex.objective,)
        rows.append((vertex_name(index), *vertex.point, *value, ", ".join(marks)))
    objective = () if region.model.objective is None else ("objective",)
    return Table("vertices", ("vertex", *region.model.variables, *objective, "marks"), tuple(rows))


def card(region: Region, index: int | None) -> str:
    """Everything about one vertex."""
    if not region.vertices:
        return "<p>The region has no vertex.</p>"
    if index is None:
        return "<h3>Selected vertex</h3><p>None yet: click one in the picture or pick a row of the list.</p>"
    vertex, model = region.vertices[index], region.model
    values = [f"{escape(name)} = {number(value, model.unit(name))}" for name, value in _pairs(model, vertex)]
    parts = [f"<h3>Vertex {vertex_name(index)}</h3><p>{', '.join(values)}</p>"]
    if vertex.objective is not None:
        best = region.optimal is not None and index in region.optimal.vertices
        parts.append(f"<p>objective {number(vertex.objective)}{', the optimum' if best else ''}</p>")
    if vertex.degenerate:
        parts.append(f"<p>degenerate: {len(vertex.active)} constraints meet where {model.n} would do</p>")
    parts.append(_constraints(model, vertex))
    return "".join(parts)


def _pairs(model: Model, vertex: Vertex) -> list[tuple[str, Fraction]]:
    return list(zip(model.variables, vertex.point, strict=True))


def _constraints(model: Model, vertex: Vertex) -> str:
    """Every constraint with its slack here, active ones first."""
    rows = sorted(model.constraints, key=lambda row: row.name not in vertex.active)
    lines = [(escape(row.name), escape(row.text(model.variables)), _slack(row.name, vertex, model)) for row in rows]
    return grid(("constraint", "rule", "slack"), lines, numbers={2})


def _slack(name: str, vertex: Vertex, model: Model) -> str:
    return "active" if name in vertex.active else number(vertex.slacks[name], model.unit(name))


def grid(columns: tuple[str, ...], lines: Sequence[tuple[str, ...]], numbers: set[int]) -> str:
    """A small table of ready HTML cells."""

    def row(tag: str, cells: tuple[str, ...]) -> str:
        marks = ['class="number"' if k in numbers else "" for k in range(len(cells))]
        return "".join(f"<{tag} {mark}>{text}</{tag}>" for mark, text in zip(marks, cells, strict=True))

    body = "".join(f"<tr>{row('td', line)}</tr>" for line in lines)
    return f"<table><thead><tr>{row('th', columns)}</tr></thead><tbody>{body}</tbody></table>"


def point(values: tuple[Fraction, ...]) -> str:
    """A point in parentheses."""
    return escape(cell(values))
