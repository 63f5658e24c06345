"""Bounds of all variables at once, as scipy's two solvers share them."""

from __future__ import annotations

from typing import Any

from polywalk.errors import ModelError
from polywalk.model import Constraint
from polywalk.reading.assembly import pair
from polywalk.reading.axis import Axis
from polywalk.reading.grid import column, spread
from polywalk.reading.matrix import vector
from polywalk.sides import bound_rows, unit_row

Pairs = list[tuple[Any, Any]]


def bounded(variables: Axis, pairs: Pairs, origin: str) -> list[Constraint]:
    """The constraints of one (lower, upper) pair a variable."""
    rows: list[Constraint] = []
    for place, (name, ends) in enumerate(zip(variables.names, pairs, strict=True)):
        lower, upper = pair(ends, f"bounds of {name!r}")
        rows += bound_rows(name, unit_row(place, len(variables.names)), lower, upper, origin)
    return rows


def between(lower: Any, upper: Any, variables: Axis) -> Pairs:
    """The pairs of two vectors, each as long as the variables or a single number."""
    ends = [spread(column(side, where), len(variables.names)) for side, where in ((lower, "lb"), (upper, "ub"))]
    for end in ends:
        if len(end.values) != len(variables.names):
            expected = f"expected {len(variables.names)} entries of {end.where}, one a variable"
            raise ModelError(f"bounds: {expected}, got {len(end.values)}.", end.where)
    low, high = (vector(end, variables).values for end in ends)
    return list(zip(low, high, strict=True))
