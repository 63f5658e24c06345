"""Big models as the room takes them in, and a row or a variable more; edits return changed copies."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from fractions import Fraction
from typing import Any

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError
from polywalk.exact import exact
from polywalk.model import Model

Entries = tuple[Sequence[int], Sequence[float]]


def sparse(model: BigModel | Model) -> BigModel:
    """A big model, also from an exact one whose numbers are all decimals that a float prints as.

    Raises
    ------
    ModelError
        Where a float would round a number: the answer would not be the model's own. What is no model.
    """
    if isinstance(model, BigModel):
        return model
    if not isinstance(model, Model):
        raise ModelError(
            f"expected a BigModel or a Model, got {type(model).__name__}; from_mps and from_toml read files, and a "
            "region or a shadow has its model in .model.",
            model,
        )
    for row in model.constraints:
        for value in (*row.coefficients, row.rhs):
            _decimal(value, row.name)
    if model.objective is not None:
        for value in (*model.objective.coefficients, model.objective.constant):
            _decimal(value, "the objective")
    return BigModel.from_model(model)


def _decimal(value: Fraction, where: str) -> None:
    if exact(float(value)) != value:
        raise ModelError(
            f"{where!r}: {value} is no decimal that a float can hold, and big models are in floats; multiply the row "
            "out, or use project(region(model), onto), which takes any fraction.",
            where,
        )


def with_row(big: BigModel, name: str, entries: Entries, low: float, high: float) -> BigModel:
    """One more row at the end, ``low <= values . x[places] <= high`` for entries (places, values)."""
    places, values = np.asarray(entries[0], dtype=np.int64), np.asarray(entries[1], dtype=np.float64)
    return replace(
        big,
        rows=(*big.rows, free_name(name, big.rows)),
        indptr=np.append(big.indptr, len(big.data) + len(values)),
        indices=np.append(big.indices, places),
        data=np.append(big.data, values),
        row_lower=np.append(big.row_lower, low),
        row_upper=np.append(big.row_upper, high),
    )


def with_variable(big: BigModel, name: str, low: float = -np.inf, high: float = np.inf) -> BigModel:
    """One more variable at the end, in no row and without cost."""
    return replace(
        big,
        variables=(*big.variables, free_name(name, big.variables)),
        lower=np.append(big.lower, low),
        upper=np.append(big.upper, high),
        cost=np.append(big.cost, 0.0),
    )


def changed(big: BigModel, **arrays: Any) -> BigModel:
    """A copy with other arrays."""
    return replace(big, **arrays)


def free_name(name: str, taken: Sequence[str]) -> str:
    """The name, longer where it is taken."""
    while name in taken:
        name += " (added)"
    return name
