"""From the sparse model to the exact one and back."""

from __future__ import annotations

from collections.abc import Iterable
from fractions import Fraction
from math import isinf
from typing import TYPE_CHECKING

import numpy as np

from polywalk.bigmodel.naming import ENDS
from polywalk.errors import ModelError
from polywalk.exact import Row, exact
from polywalk.model import Constraint, Model, Objective
from polywalk.sides import bound_rows, sided_rows, unit_row

if TYPE_CHECKING:
    from polywalk.bigmodel.sparse import BigModel

Ends = tuple[float, float]
Line = tuple[Row, Ends]

LARGEST_DENSE = 4_000_000
"""Cells (variables times constraints) up to which the exact Model is made: it keeps every zero."""


def to_model(big: BigModel) -> Model:
    """The exact model of a sparse one."""
    if big.n * (big.m + big.n) > LARGEST_DENSE:
        raise ModelError(
            f"{big.n} variables and {big.m} rows are too many for the exact model, which keeps every zero "
            f"(at most {LARGEST_DENSE} cells); cut it down with section or shadow first.",
            big.name,
        )
    goal = None
    if big.goal is not None:
        goal = Objective(big.goal, tuple(map(_exact_float, big.cost)), _exact_float(big.constant))
    found = tuple(_constraints(big))
    named = {*big.variables, *(row.name for row in found)}
    units = tuple(pair for pair in big.units if pair[0] in named)
    return Model(big.variables, found, goal, units, big.integers, big.name)


def _exact_float(value: float) -> Fraction:
    return exact(float(value))


def _end(value: float) -> Fraction | None:
    return None if isinf(value) else _exact_float(value)


def _constraints(big: BigModel) -> Iterable[Constraint]:
    for place, name in enumerate(big.rows):
        row = [Fraction(0)] * big.n
        for k in range(big.indptr[place], big.indptr[place + 1]):
            row[big.indices[k]] = _exact_float(big.data[k])
        yield from sided_rows(name, tuple(row), _end(big.row_lower[place]), _end(big.row_upper[place]))
    for place, name in enumerate(big.variables):
        yield from bound_rows(name, unit_row(place, big.n), _end(big.lower[place]), _end(big.upper[place]))


def from_model(kind: type[BigModel], model: Model) -> BigModel:
    """The sparse model of an exact one."""
    bounds = [(-np.inf, np.inf) for _ in model.variables]
    lines: dict[str, Line] = {}
    names = {row.name for row in model.constraints}
    for row in model.constraints:
        lower, upper = _span(row)
        place = _bound_of(row, model)
        if place is not None:
            bounds[place] = (max(bounds[place][0], lower), min(bounds[place][1], upper))
            continue
        pair = _partners(row, model, names)
        if pair is None:
            lines[row.name] = (row.coefficients, (lower, upper))
        else:
            lines[row.name.rpartition(" ")[0]] = (row.coefficients, (_span(pair[0])[0], _span(pair[1])[1]))
    return _assembled(kind, model, bounds, lines)


def _partners(row: Constraint, model: Model, names: set[str]) -> tuple[Constraint, Constraint] | None:
    """The two sides this row is one of, where "row lower" and "row upper" share their coefficients."""
    stem, _, side = row.name.rpartition(" ")
    if side not in ENDS or stem in names or not {f"{stem} {end}" for end in ENDS} <= names:
        return None
    low, high = (model.constraint(f"{stem} {end}") for end in ENDS)
    fits = low.coefficients == high.coefficients and (low.sense, high.sense) == (">=", "<=")
    return (low, high) if fits else None


def _span(row: Constraint) -> tuple[float, float]:
    value = float(row.rhs)
    return -np.inf if row.sense == "<=" else value, np.inf if row.sense == ">=" else value


def _bound_of(row: Constraint, model: Model) -> int | None:
    """The place of the variable this row is a named bound of, else None."""
    stem, _, side = row.name.rpartition(" ")
    sense = {"lower": ">=", "upper": "<=", "fixed": "=="}.get(side)
    if row.sense != sense or stem not in model.variables:
        return None
    place = model.index(stem)
    return place if row.coefficients == unit_row(place, model.n) else None


def _assembled(kind: type[BigModel], model: Model, bounds: list[Ends], lines: dict[str, Line]) -> BigModel:
    found = [[(j, float(value)) for j, value in enumerate(row) if value] for row, _ in lines.values()]
    goal = model.objective or Objective("min", (Fraction(0),) * model.n)
    known = {*model.variables, *lines}
    return kind(
        variables=model.variables,
        rows=tuple(lines),
        indptr=np.cumsum([0, *map(len, found)]),
        indices=np.array([j for row in found for j, _ in row], dtype=np.int64),
        data=np.array([value for row in found for _, value in row]),
        row_lower=np.array([ends[0] for _, ends in lines.values()]),
        row_upper=np.array([ends[1] for _, ends in lines.values()]),
        lower=np.array([low for low, _ in bounds]),
        upper=np.array([high for _, high in bounds]),
        cost=np.array([float(value) for value in goal.coefficients]),
        goal=model.objective.goal if model.objective else None,
        constant=float(goal.constant),
        integers=model.integers,
        units=tuple(pair for pair in model.units if pair[0] in known),
        name=model.name,
    )
