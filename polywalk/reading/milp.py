"""Models given as the arguments of scipy.optimize.milp."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from polywalk.errors import ModelError
from polywalk.model import Constraint, Model, Objective
from polywalk.reading.assembly import limit
from polywalk.reading.axis import Axis, Source, axis
from polywalk.reading.grid import Column, Grid, column, grid, spread
from polywalk.reading.limits import Pairs, between, bounded
from polywalk.reading.matrix import exact_rows, exact_vector, integers, vector
from polywalk.sides import sided_rows


@dataclass(frozen=True)
class _Block:
    """One LinearConstraint: lower <= matrix x <= upper."""

    matrix: Grid
    lower: Column
    upper: Column


def from_scipy(
    c: Any,
    *,
    integrality: Any = None,
    bounds: Any = None,
    constraints: Any = None,
    options: Any = None,
    variables: Sequence[str] | None = None,
    rows: Sequence[str] | None = None,
    name: str = "",
) -> Model:
    """A model from the arguments of scipy.optimize.milp, as they are: minimize c.x.

    Arrays are read as in `from_arrays`: exact, with pandas labels as names. A scipy LinearConstraint or Bounds has
    turned its numbers into floats already; they mean the decimals that print as them.

    Parameters
    ----------
    c : (n,) array_like
        Objective, minimized.
    integrality : (n,) array_like or int, optional
        1 marks an integer variable.
    bounds : scipy.optimize.Bounds or (lower, upper), optional
        Two vectors or numbers: ``[(0, 1), (0, 2)]`` is a lower vector (0, 1) and an upper vector (0, 2) here, while
        linprog reads two pairs. None means what it means to milp: every variable is at least 0; these constraints
        have the origin "milp's default".
    constraints : LinearConstraint, (A, lower, upper), or a sequence of either, optional
        A row with two different sides becomes "row 1 lower" and "row 1 upper", one with equal sides an equality;
        an infinite side is left out, and so is a row with two of them.
    options : optional
        Accepted since milp has it; it does not change the model.
    variables, rows : sequence of str, optional
        Names for the columns, and for the rows of all constraints in order. Default: the labels, else "x1", "row 1"
        and so on.
    name : str, optional
        Shown in titles.

    Returns
    -------
    Model

    Raises
    ------
    ModelError, NumberError, DuplicateName
        As for `from_arrays`.

    Examples
    --------
    >>> import polywalk as pw
    >>> from scipy.optimize import Bounds, LinearConstraint
    >>> print(pw.from_scipy([1, 2], bounds=Bounds([0, 0], [1, 2]),
    ...                     constraints=LinearConstraint([[1, 1]], 0.5, 2.5)))
    minimize x1 + 2 x2
    constraint   rule           origin
    row 1 lower  x1 + x2 ≥ 0.5
    row 1 upper  x1 + x2 ≤ 2.5
    x1 lower     x1 ≥ 0         bounds
    x1 upper     x1 ≤ 1         bounds
    x2 lower     x2 ≥ 0         bounds
    x2 upper     x2 ≤ 2         bounds

    References
    ----------
    The scipy.optimize.milp reference page describes the arguments.
    """
    costs = column(c, "c")
    n = len(costs.values)
    blocks = _blocks(constraints, n)
    marks = None if integrality is None else spread(column(integrality, "integrality"), n)
    columns: list[Source] = [("c", n, costs.labels)]
    columns += [(block.matrix.where, block.matrix.width, block.matrix.column_labels) for block in blocks]
    columns += [("integrality", len(marks.values), marks.labels)] if marks else []
    across = axis("variable", "x", columns, variables)
    origin = "milp's default" if bounds is None else "bounds"
    return Model(
        across.names,
        (*_rows(blocks, across, rows), *bounded(across, _pairs(bounds, across), origin)),
        Objective("min", exact_vector(costs, across)),
        integers=integers(marks, across, "integrality"),
        name=name,
    )


def _blocks(constraints: Any, n: int) -> list[_Block]:
    """milp's own reading: a triple is one constraint where it can be, else a sequence of constraints."""
    if constraints is None or (hasattr(constraints, "__len__") and len(constraints) == 0):
        return []
    if _is_constraint(constraints):
        return [_block(constraints, "constraints", n)]
    listed = list(constraints)
    if len(listed) == 3 and not any(_is_constraint(part) for part in listed):
        try:
            return [_block(listed, "constraints", n)]
        except ModelError:
            if not all(isinstance(part, Sequence) and not isinstance(part, str) for part in listed):
                raise
    return [_block(part, f"constraints[{place}]", n) for place, part in enumerate(listed)]


def _is_constraint(part: Any) -> bool:
    return all(hasattr(part, name) for name in ("A", "lb", "ub"))


def _block(part: Any, where: str, n: int) -> _Block:
    if _is_constraint(part):
        parts = [part.A, part.lb, part.ub]
    elif isinstance(part, Sequence) and not isinstance(part, str) and 1 <= len(part) <= 4:
        parts = [*part[:3], *(None, None)][:3] if len(part) < 3 else list(part[:3])
    else:
        raise ModelError(f"{where}: expected a LinearConstraint or (A, lower, upper), got {part!r}.", part)
    matrix = grid(parts[0], f"{where}.A")
    m = len(matrix.cells)
    if matrix.width != n:
        raise ModelError(
            f"{where}.A has {matrix.width} columns but c has {n} entries; both need one a variable.", where
        )
    lower, upper = (_side(side, f"{where}.{end}", m) for side, end in zip(parts[1:], ("lb", "ub"), strict=True))
    return _Block(matrix, lower, upper)


def _side(side: Any, where: str, m: int) -> Column:
    values = spread(column(side, where), m)
    if np.ndim(side) > 1:  # milp refuses it too, and a list of three constraints depends on that
        raise ModelError(f"{where}: expected a number or {m} of them, got {np.ndim(side)} dimensions.", where)
    if len(values.values) != m:
        raise ModelError(f"{where}: expected a number or {m} of them, one a row, got {len(values.values)}.", where)
    return values


def _rows(blocks: list[_Block], variables: Axis, given: Sequence[str] | None) -> list[Constraint]:
    found: list[Constraint] = []
    before = 0
    total = sum(len(block.matrix.cells) for block in blocks)
    if given is not None and len(given) != total:
        raise ModelError(f"expected {total} names of rows, got {len(given)}.", given)
    for block in blocks:
        m = len(block.matrix.cells)
        names = tuple(given[before : before + m]) if given is not None else None
        found += _block_rows(block, variables, before, names)
        before += m
    return found


def _block_rows(block: _Block, variables: Axis, before: int, given: tuple[str, ...] | None) -> list[Constraint]:
    matrix, lower, upper = block.matrix, block.lower, block.upper
    m = len(matrix.cells)
    sources = [(matrix.where, m, matrix.row_labels), (lower.where, m, lower.labels), (upper.where, m, upper.labels)]
    down = axis("row", "row ", sources, given)
    if not down.named:
        down = Axis("row", tuple(f"row {before + number}" for number in range(1, m + 1)), named=False)
    found: list[Constraint] = []
    lines = exact_rows(matrix, down, variables)
    sides = zip(vector(lower, down).values, vector(upper, down).values, strict=True)
    for name, line, (low, high) in zip(down.names, lines, sides, strict=True):
        ends = limit(low, -1, f"{lower.where}, row {name!r}"), limit(high, +1, f"{upper.where}, row {name!r}")
        found += sided_rows(name, line, *ends)
    return found


def _pairs(bounds: Any, variables: Axis) -> Pairs:
    if bounds is None:
        return [(0, None)] * len(variables.names)
    if hasattr(bounds, "lb") and hasattr(bounds, "ub"):
        return between(bounds.lb, bounds.ub, variables)
    parts = list(bounds)
    if not 1 <= len(parts) <= 3:
        raise ModelError(
            f"bounds: expected Bounds or two vectors (lower, upper), got {len(parts)} parts; pairs are linprog's "
            "form, see from_arrays.",
            bounds,
        )
    return between(parts[0], parts[1] if len(parts) > 1 else None, variables)
