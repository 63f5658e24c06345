"""A few variables of the sparse model, with the rows that have no others."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

import numpy as np
from numpy.typing import NDArray

from polywalk.errors import ModelError

if TYPE_CHECKING:
    from polywalk.bigmodel.sparse import BigModel

Places = NDArray[np.int64]

TOLD = 4
"""Rows left out that the note names; the others are counted."""


def only(big: BigModel, names: tuple[str, ...]) -> BigModel:
    """A copy with these variables and the rows that have no others; its note names the rows left out."""
    if not names:
        raise ModelError("expected the names of the variables to keep, got none.", names)
    columns = np.array([big.index(name) for name in dict.fromkeys(names)])
    inside, outside = _rows(big, columns)
    kept = tuple(big.variables[j] for j in columns)
    rows = tuple(big.rows[i] for i in inside)
    places, data, ends = _cells(big, columns, inside)
    return replace(
        big,
        variables=kept,
        rows=rows,
        indptr=np.concatenate([[0], np.cumsum(ends)]),
        indices=places,
        data=data,
        row_lower=big.row_lower[inside],
        row_upper=big.row_upper[inside],
        lower=big.lower[columns],
        upper=big.upper[columns],
        cost=big.cost[columns],
        integers=tuple(name for name in big.integers if name in kept),
        units=tuple((name, big.unit(name)) for name in (*kept, *rows) if big.unit(name)),
        notes=(*big.notes, *_told(tuple(big.rows[i] for i in outside))),
    )


def _rows(big: BigModel, columns: Places) -> tuple[Places, Places]:
    """The rows in which these variables stand: alone, and together with others."""
    cells = np.flatnonzero(np.isin(big.indices, columns) & (big.data != 0))
    rows, found = np.unique(np.searchsorted(big.indptr, cells, side="right") - 1, return_counts=True)
    sizes = np.array([np.count_nonzero(big.data[big.indptr[i] : big.indptr[i + 1]]) for i in rows], dtype=np.int64)
    return rows[found == sizes], rows[found != sizes]


def _cells(big: BigModel, columns: Places, rows: Places) -> tuple[Places, NDArray[np.float64], Places]:
    """Place among the kept variables and value of each coefficient, and how many each row has."""
    place = {int(j): k for k, j in enumerate(columns)}
    found = [[k for k in range(big.indptr[i], big.indptr[i + 1]) if big.data[k]] for i in rows]
    cells = [k for row in found for k in row]
    places = np.array([place[int(big.indices[k])] for k in cells], dtype=np.int64)
    return places, big.data[cells], np.array([len(row) for row in found], dtype=np.int64)


def _told(rows: tuple[str, ...]) -> tuple[str, ...]:
    if not rows:
        return ()
    named = ", ".join(rows[:TOLD]) + (f" and {len(rows) - TOLD} more" if len(rows) > TOLD else "")
    return (f"left out, since other variables stand in them: {named}",)
