"""What makes parts a sparse model: arrays that fit, numbers that are numbers, names given once."""

from __future__ import annotations

from collections.abc import Sequence
from math import isfinite
from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from polywalk.errors import DuplicateName, ModelError, unknown
from polywalk.model import GOAL

if TYPE_CHECKING:
    from polywalk.bigmodel.sparse import BigModel, Floats


def frozen(values: Any, kind: type) -> Any:
    """A read-only copy of these numbers."""
    array: NDArray[Any] = np.array(values, dtype=kind)
    array.setflags(write=False)
    return array


def check(big: BigModel) -> None:
    """Refuse parts that make no model, by name."""
    if not big.variables:
        raise ModelError("expected at least one variable, got none; name the decisions of the model.")
    _unique("variable", big.variables)
    _unique("row", big.rows)
    _fits(big)
    _finite("coefficient", big.data, ())
    _finite("cost of", big.cost, big.variables)
    for kind, names in (("", big.variables), ("row_", big.rows)):
        _open("lower", getattr(big, f"{kind}lower"), names)
        _open("upper", getattr(big, f"{kind}upper"), names)
    if big.goal not in (None, *GOAL):
        raise ModelError(f"expected the goal 'min', 'max' or None, got {big.goal!r}.", big.goal)
    if not isfinite(big.constant):
        raise ModelError(f"the objective's constant: expected a finite number, got {big.constant}.", big.constant)
    for name in big.integers:
        big.index(name)
    for name, _ in big.units:
        if name not in big.places and name not in big.row_places:
            raise unknown("variable or row", name, [*big.variables, *big.rows], "the model (units)")


def _finite(what: str, values: Floats, names: Sequence[str]) -> None:
    wrong = np.flatnonzero(~np.isfinite(values))
    if len(wrong):
        name = names[wrong[0]] if names else f"number {wrong[0] + 1}"
        raise ModelError(f"{what} {name!r}: expected a finite number, got {values[wrong[0]]}.", name)


def _open(side: str, values: Floats, names: Sequence[str]) -> None:
    """A bound may be infinite on its own side only."""
    wrong = np.flatnonzero(np.isnan(values) | (values == (np.inf if side == "lower" else -np.inf)))
    if len(wrong):
        name = names[wrong[0]]
        raise ModelError(f"{name!r}: {values[wrong[0]]} as {side} bound allows no value at all.", name)


def _fits(big: BigModel) -> None:
    sizes = {"indptr": big.m + 1, "row_lower": big.m, "row_upper": big.m, "lower": big.n, "upper": big.n, "cost": big.n}
    for label, size in (*sizes.items(), ("indices", len(big.data))):
        shape = getattr(big, label).shape
        if shape != (size,):
            raise ModelError(f"{label}: expected {size} entries, got {shape}.", label)
    steps = np.diff(big.indptr)
    if big.indptr[0] != 0 or big.indptr[-1] != len(big.data) or (steps < 0).any():
        raise ModelError("indptr: expected to rise from 0 to the number of coefficients.", "indptr")
    if len(big.data) and not (big.indices.min() >= 0 and big.indices.max() < big.n):
        raise ModelError(f"indices: expected columns from 0 to {big.n - 1}.", "indices")
    cells = np.repeat(np.arange(big.m), steps) * big.n + big.indices
    if len(np.unique(cells)) != len(cells):
        raise ModelError("the matrix holds a coefficient of the same row and variable twice; add them up.", "indices")


def _unique(kind: str, names: Sequence[str]) -> None:
    if len(set(names)) == len(names):
        return
    seen: set[str] = set()
    for name in names:
        if name in seen:
            raise DuplicateName(f"the {kind} {name!r} is given twice; give each {kind} a name of its own.", name)
        seen.add(name)
