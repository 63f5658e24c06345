"""Matrix and right-hand side as exact rows in the order of the model's names."""

from __future__ import annotations

from dataclasses import dataclass

from polywalk.errors import ModelError
from polywalk.exact import Row
from polywalk.reading.assembly import number
from polywalk.reading.axis import Axis
from polywalk.reading.grid import Column, Grid


@dataclass(frozen=True)
class Ordered:
    """Names on one side and the values that belong to them."""

    names: tuple[str, ...]
    values: tuple[object, ...]


def vector(values: Column, along: Axis) -> Ordered:
    """The values in the axis' order."""
    order = along.order(values.where, values.labels)
    return Ordered(along.names, tuple(values.values[place] for place in order))


def exact_vector(values: Column, along: Axis) -> Row:
    """The values in the axis' order, exact; an entry that is no number is refused by name."""
    ordered = vector(values, along)
    return tuple(
        number(value, f"{values.where}, {along.kind} {name!r}")
        for name, value in zip(ordered.names, ordered.values, strict=True)
    )


def exact_rows(matrix: Grid, rows: Axis, variables: Axis) -> list[Row]:
    """The rows in the order of both axes, exact; a cell that is no number is refused by row and column."""
    down = rows.order(matrix.where, matrix.row_labels)
    across = variables.order(matrix.where, matrix.column_labels)
    return [
        tuple(
            number(matrix.cells[i][j], f"{matrix.where}, row {rows.names[row]!r}, column {variables.names[place]!r}")
            for place, j in enumerate(across)
        )
        for row, i in enumerate(down)
    ]


def integers(integrality: Column | None, variables: Axis, where: str) -> tuple[str, ...]:
    """The variables that scipy's integrality marks with 1; 2 and 3 mark no linear region and are refused."""
    if integrality is None:
        return ()
    marks = exact_vector(integrality, variables)
    for name, mark in zip(variables.names, marks, strict=True):
        if mark not in (0, 1):
            raise ModelError(
                f"{where}: expected 0 (continuous) or 1 (integer) for {name!r}, got {mark}; semi-continuous "
                "variables have no linear region.",
                name,
            )
    return tuple(name for name, mark in zip(variables.names, marks, strict=True) if mark)
