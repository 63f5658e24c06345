"""A row or a variable more on a big model; edits return changed copies."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from typing import Any

import numpy as np

from polywalk.bigmodel import BigModel

Entries = tuple[Sequence[int], Sequence[float]]


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
