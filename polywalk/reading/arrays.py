"""Models given as the arguments of scipy.optimize.linprog."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from polywalk.errors import ModelError, NumberError
from polywalk.model import Constraint, Model, Objective, Sense
from polywalk.reading.assembly import limit, number
from polywalk.reading.axis import Axis, Source, axis
from polywalk.reading.grid import Column, Grid, column, grid, spread
from polywalk.reading.limits import Pairs, between, bounded
from polywalk.reading.matrix import exact_rows, exact_vector, integers, vector

_Half = tuple[Grid, Column]


def from_arrays(  # noqa: PLR0917 - linprog's arguments in linprog's order
    c: Any,
    A_ub: Any = None,  # noqa: N803
    b_ub: Any = None,
    A_eq: Any = None,  # noqa: N803
    b_eq: Any = None,
    bounds: Any = None,
    method: Any = None,
    callback: Any = None,
    options: Any = None,
    x0: Any = None,
    integrality: Any = None,
    *,
    variables: Sequence[str] | None = None,
    rows: Sequence[str] | None = None,
    equalities: Sequence[str] | None = None,
    name: str = "",
) -> Model:
    """A model from the arguments of scipy.optimize.linprog, as they are: minimize c.x.

    Lists, numpy arrays, scipy sparse arrays and pandas objects are read. Fractions, Decimals and text such as "1/3"
    stay exact; floats mean the decimals that print as them. Labels of pandas objects become the names, and labelled
    objects are aligned by label, whatever their order; a numbering 0, 1, 2 ... counts as no labels.

    Parameters
    ----------
    c : (n,) array_like
        Objective, minimized.
    A_ub : (m, n) array_like, optional
        Rows with A_ub x <= b_ub. One dimension alone is one row.
    b_ub : (m,) array_like, optional
        Plus infinity turns its row off: the row is left out of the model.
    A_eq : (k, n) array_like, optional
        Rows with A_eq x == b_eq.
    b_eq : (k,) array_like, optional
    bounds : None, pair, (n, 2) array_like, pandas.DataFrame or scipy.optimize.Bounds, optional
        None means what it means to linprog: every variable is at least 0; these constraints have the origin
        "linprog's default". One pair is for all variables. ``[(0, 1), (0, 2)]`` are two (lower, upper) pairs here,
        while milp reads it as lower and upper vectors: for milp's meaning use `from_scipy`.
    method, callback, options, x0 : optional
        Accepted since linprog has them; they do not change the model.
    integrality : (n,) array_like, optional
        1 marks an integer variable.
    variables, rows, equalities : sequence of str, optional
        Names for the columns, the rows of A_ub and the rows of A_eq. Default: the labels, else "x1", "row 1",
        "equality 1" and so on.
    name : str, optional
        Shown in titles.

    Returns
    -------
    Model

    Raises
    ------
    ModelError
        Shapes or labels that do not fit together, half of a pair missing, a lower bound above its upper one.
    NumberError
        An entry that is no finite number, by row and column; minus infinity in b_ub, which allows nothing.
    DuplicateName
        A label given twice.

    Examples
    --------
    >>> import polywalk as pw
    >>> print(pw.from_arrays([-3, -2], [[1, 1], [1, 0]], [4, "5/2"], variables=["x", "y"]))
    minimize -3 x - 2 y
    constraint  rule       origin
    row 1       x + y ≤ 4
    row 2       x ≤ 2.5
    x lower     x ≥ 0      linprog's default
    y lower     y ≥ 0      linprog's default

    References
    ----------
    The scipy.optimize.linprog reference page describes the arguments.
    """
    costs = column(c, "c")
    upper, equal = _half(A_ub, b_ub, "A_ub", "b_ub"), _half(A_eq, b_eq, "A_eq", "b_eq")
    marks = None if integrality is None else spread(column(integrality, "integrality"), len(costs.values))
    limits = _limits(bounds)
    halves = [half[0] for half in (upper, equal) if half]
    columns: list[Source] = [("c", len(costs.values), costs.labels)]
    columns += [(half.where, half.width, half.column_labels) for half in halves]
    if isinstance(limits, Grid) and limits.row_labels is not None:
        columns += [("bounds", len(limits.cells), limits.row_labels)]
    columns += [("integrality", len(marks.values), marks.labels)] if marks else []
    across = axis("variable", "x", columns, variables)
    origin = "linprog's default" if limits is None else "bounds"
    return Model(
        across.names,
        (
            *_rows(upper, "<=", across, "row ", rows),
            *_rows(equal, "==", across, "equality ", equalities),
            *bounded(across, _pairs(limits, across), origin),
        ),
        Objective("min", exact_vector(costs, across)),
        integers=integers(marks, across, "integrality"),
        name=name,
    )


def _half(matrix: Any, side: Any, matrix_name: str, side_name: str) -> _Half | None:
    if matrix is None and side is None:
        return None
    if matrix is None or side is None:
        here, gone = (matrix_name, side_name) if side is None else (side_name, matrix_name)
        raise ModelError(f"expected {matrix_name} and {side_name} together, got {here} without {gone}.", gone)
    read, right = grid(matrix, matrix_name), column(side, side_name)
    return (read, right) if read.cells or right.values else None


def _rows(
    half: _Half | None, sense: Sense, variables: Axis, prefix: str, given: Sequence[str] | None
) -> list[Constraint]:
    if half is None:
        return []
    matrix, side = half
    sources = [(matrix.where, len(matrix.cells), matrix.row_labels), (side.where, len(side.values), side.labels)]
    down = axis("row", prefix, sources, given)
    lines = exact_rows(matrix, down, variables)
    found = []
    for name, line, value in zip(down.names, lines, vector(side, down).values, strict=True):
        where = f"{side.where}, row {name!r}"
        if value is None:
            raise NumberError(f"{where}: expected a number, got None.", None)
        rhs = limit(value, +1, where) if sense == "<=" else number(value, where)
        if rhs is not None:
            found.append(Constraint(name, line, sense, rhs))
    return found


def _limits(bounds: Any) -> Any:
    """The bounds as linprog would see them: None where it falls back on its default."""
    if bounds is None or (hasattr(bounds, "lb") and hasattr(bounds, "ub")):
        return bounds
    read = grid(bounds, "bounds")
    return read if read.width else None


def _pairs(bounds: Any, variables: Axis) -> Pairs:
    """linprog's own reading, in its order: n pairs first, then one pair for all."""
    n = len(variables.names)
    if bounds is None:
        return [(0, None)] * n
    if not isinstance(bounds, Grid):
        return between(bounds.lb, bounds.ub, variables)
    cells, shape = bounds.cells, (len(bounds.cells), bounds.width)
    if shape == (n, 2):
        return [(cells[i][0], cells[i][1]) for i in variables.order("bounds", bounds.row_labels)]
    if shape in {(1, 2), (2, 1)}:
        lower, upper = (value for row in cells for value in row)
        return [(lower, upper)] * n
    if shape == (2, n):
        raise ModelError(
            f"bounds: expected {n} (lower, upper) pairs, got 2 vectors of {n}; pass list(zip(lower, upper)).", shape
        )
    raise ModelError(f"bounds: expected one (lower, upper) pair or {n} of them, got an array of shape {shape}.", shape)
