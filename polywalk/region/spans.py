"""Exact elimination on a few rows: rank, a reduced basis, and how one row is made of others."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction

from polywalk.exact import Row

Basis = tuple[list[list[Fraction]], list[int]]


def echelon(rows: Sequence[Row]) -> Basis:
    """The reduced row echelon form: its non-zero rows and the column of each row's leading 1."""
    left = [list(row) for row in rows]
    basis: list[list[Fraction]] = []
    pivots: list[int] = []
    for column in range(len(left[0]) if left else 0):
        chosen = next((row for row in left if row[column]), None)
        if chosen is None:
            continue
        left.remove(chosen)
        lead = chosen[column]
        chosen = [value / lead for value in chosen]
        basis = [_minus(row, chosen, row[column]) for row in basis]
        left = [_minus(row, chosen, row[column]) for row in left]
        basis.append(chosen)
        pivots.append(column)
    return basis, pivots


def rank(rows: Sequence[Row]) -> int:
    """The number of linearly independent rows."""
    return len(echelon(rows)[1])


def reduced(row: Sequence[Fraction], basis: Basis, skip: int = 0) -> list[Fraction]:
    """The row minus its part in the span of the basis, zero in every pivot column; the first ``skip`` entries stay."""
    rest = list(row)
    for lead, pivot in zip(*basis, strict=True):
        rest[skip:] = _minus(rest[skip:], lead, rest[skip + pivot])
    return rest


def combination(rows: Sequence[Row], target: Row) -> tuple[Fraction, ...] | None:
    """Numbers y with sum of y_i rows_i = target, non-zero only at independent rows; None if none exist."""
    columns = [tuple(row[j] for row in rows) for j in range(len(target))]
    basis, pivots = echelon([(*column, value) for column, value in zip(columns, target, strict=True)])
    if len(rows) in pivots:
        return None
    found = [Fraction(0)] * len(rows)
    for lead, pivot in zip(basis, pivots, strict=True):
        found[pivot] = lead[-1]
    return tuple(found)


def _minus(row: Sequence[Fraction], other: Sequence[Fraction], factor: Fraction) -> list[Fraction]:
    if not factor:
        return list(row)
    return [value - factor * part for value, part in zip(row, other, strict=True)]
