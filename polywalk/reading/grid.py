"""Arrays as people pass them: lists, numpy, scipy sparse, pandas. Values stay as typed; labels come along.

pandas is recognised by what it offers (``iloc``), scipy sparse by ``tocsr``: neither is imported here.
"""

from __future__ import annotations

from collections.abc import Hashable
from dataclasses import dataclass
from typing import Any

import numpy as np

from polywalk.errors import ModelError

Labels = tuple[Hashable, ...]


@dataclass(frozen=True)
class Grid:
    """A matrix: its cells by row, and the labels of both sides where pandas gave some."""

    where: str
    cells: tuple[tuple[object, ...], ...]
    width: int
    row_labels: Labels | None = None
    column_labels: Labels | None = None


@dataclass(frozen=True)
class Column:
    """A vector: its values, and their labels where pandas gave some."""

    where: str
    values: tuple[object, ...]
    labels: Labels | None = None


def grid(data: Any, where: str) -> Grid:
    """A matrix with two sides; one dimension alone is read as one row."""
    if hasattr(data, "iloc"):
        return _frame(data, where)
    array = _array(data, where)
    if array.ndim == 1 and array.size:
        array = array.reshape(1, -1)
    if array.ndim == 1:
        return Grid(where, (), 0)
    if array.ndim != 2:
        raise ModelError(f"{where}: expected rows and columns, got an array of shape {array.shape}.", where)
    return Grid(where, tuple(tuple(_plain(value) for value in row) for row in array), array.shape[1])


def column(data: Any, where: str) -> Column:
    """A vector; a single number is a vector of one, and sides of length one do not count."""
    if hasattr(data, "iloc"):
        data, labels = _one_column(data, where)
        return Column(where, tuple(_plain(value) for value in _array(data, where)), labels)
    array = _array(data, where)
    array = array.squeeze() if array.ndim > 1 else array
    if array.ndim > 1:
        raise ModelError(f"{where}: expected a vector, got an array of shape {array.shape}.", where)
    return Column(where, tuple(_plain(value) for value in array.reshape(-1)))


def spread(values: Column, size: int) -> Column:
    """The vector in full length: a single number stands for all."""
    if len(values.values) == 1 and size != 1:
        return Column(values.where, values.values * size)
    return values


def _frame(data: Any, where: str) -> Grid:
    if data.ndim == 1:
        values = column(data, where)
        return Grid(where, (values.values,), len(values.values), None, values.labels)
    columns = [_array(data.iloc[:, place], where) for place in range(data.shape[1])]  # each keeps its own type
    cells = tuple(tuple(_plain(part[row]) for part in columns) for row in range(data.shape[0]))
    return Grid(where, cells, data.shape[1], tuple(data.index), tuple(data.columns))


def _one_column(data: Any, where: str) -> tuple[Any, Labels]:
    if data.ndim == 2 and data.shape[1] == 1:
        data = data.iloc[:, 0]
    elif data.ndim == 2 and data.shape[0] == 1:
        data = data.iloc[0]
    if data.ndim != 1:
        raise ModelError(f"{where}: expected a vector, got a table of shape {data.shape}.", where)
    return data, tuple(data.index)


def _array(data: Any, where: str) -> np.ndarray[Any, Any]:
    if hasattr(data, "tocsr"):
        return np.asarray(data.toarray())
    if np.ma.isMaskedArray(data) and np.ma.is_masked(data):
        raise ModelError(f"{where}: expected numbers, got masked entries; fill them first.", where)
    try:
        array = np.asarray(data, dtype=None if hasattr(data, "dtype") else object)
    except ValueError:
        raise ModelError(f"{where}: expected rows of equal length, got {_brief(data)}.", where) from None
    if array.dtype == object and any(_is_nested(value) for value in array.flat):
        raise ModelError(f"{where}: expected rows of equal length, got {_brief(data)}.", where)
    return array


def _is_nested(value: Any) -> bool:
    return hasattr(value, "__len__") and not isinstance(value, str) and getattr(value, "ndim", 1) > 0


def _brief(data: Any) -> str:
    text = repr(data)
    return text if len(text) <= 80 else text[:80] + "…"


def _plain(value: Any) -> object:
    """True and False in an array are 1 and 0, as they are for numpy."""
    return int(value) if isinstance(value, bool | np.bool_) else value
