"""A region as a table: a row a vertex, and notes for what no row can tell."""

from __future__ import annotations

from collections.abc import Iterable
from fractions import Fraction
from typing import TYPE_CHECKING

from polywalk.exact import Row, short
from polywalk.region.parts import vertex_name
from polywalk.table import Table

if TYPE_CHECKING:
    from polywalk.region.results import Region


def table(region: Region) -> Table:
    """Every vertex as a row; rays, lines, implied equalities and the optimum as notes."""
    model, valued = region.model, region.model.objective is not None
    columns = ("vertex", *model.variables, *(("objective",) if valued else ()), "active", "degenerate")
    rows = tuple(
        (
            vertex_name(k),
            *vertex.point,
            *((vertex.objective,) if valued else ()),
            ", ".join(vertex.active),
            vertex.degenerate,
        )
        for k, vertex in enumerate(region.vertices)
    )
    return Table(_title(region), columns if rows else (), rows, tuple(_notes(region)))


def _title(region: Region) -> str:
    name = f"{region.model.name}: " if region.model.name else ""
    if region.status == "empty":
        return f"{name}empty region: no point satisfies every constraint"
    counts = [(len(region.vertices), "vertex", "vertices"), (len(region.edges), "edge", "edges")]
    counts += [(len(region.facets), "facet", "facets")]
    for found, one, many in ((region.rays, "ray", "rays"), (region.lines, "line", "lines")):
        counts += [(len(found), one, many)] if found else []
    listed = ", ".join(f"{count} {one if count == 1 else many}" for count, one, many in counts)
    return f"{name}{region.status} region of dimension {region.dimension}: {listed}"


def _notes(region: Region) -> Iterable[str]:
    for k, ray in enumerate(region.rays):
        along = f", sliding along {', '.join(ray.active)}" if ray.active else ""
        yield f"ray {k}: {_place(ray.direction)}{_change(ray.change)}{along}"
    for k, line in enumerate(region.lines):
        yield f"line {k}: {_place(line)}, both ways"
    if region.lines:
        yield f"a region with a line has no vertex; it passes through {', '.join(_place(p) for p in region.base)}"
    if region.equalities and region.status != "empty":
        yield f"active at every point: {', '.join(region.equalities)}"
    if region.outcome == "optimal" and region.value is not None and region.optimal is not None:
        kind = "base point " if region.lines else ""
        where = ", ".join(str(k) if region.lines else vertex_name(k) for k in region.optimal.vertices)
        beyond = "".join(f", along ray {k}" for k in region.optimal.rays)
        yield f"optimum {short(region.value)} at {kind}{where}{beyond}"
    elif region.outcome == "unbounded":
        yield "the objective is unbounded: it improves for ever"
    if region.model.integers:
        yield f"integer marks are not applied here: {', '.join(region.model.integers)} may take any value between"


def _place(row: Row) -> str:
    return f"({', '.join(short(value) for value in row)})"


def _change(change: Fraction | None) -> str:
    return "" if change is None else f", objective changes by {short(change)}"
