"""A few rows and bounds of a big model as an exact small model in the variables they touch."""

from __future__ import annotations

from collections.abc import Iterable
from fractions import Fraction
from math import isinf

from polywalk.bigmodel import BigModel
from polywalk.exact import exact
from polywalk.model import Constraint, Model
from polywalk.sides import bound_rows, sided_rows, unit_row


def cut(big: BigModel, rows: Iterable[int], bounded: Iterable[int]) -> Model:
    """These rows and the bounds of these variables, as far as the rows touch them."""
    places, limits = list(rows), list(bounded)
    touched = {int(j) for i in places for j in big.indices[big.indptr[i] : big.indptr[i + 1]]}
    used = sorted(touched) or limits[:1]
    at = {j: k for k, j in enumerate(used)}
    found: list[Constraint] = []
    for i in places:
        row = [Fraction(0)] * len(used)
        for k in range(big.indptr[i], big.indptr[i + 1]):
            row[at[int(big.indices[k])]] = exact(float(big.data[k]))
        found += sided_rows(big.rows[i], tuple(row), _end(big.row_lower[i]), _end(big.row_upper[i]))
    for j in limits:
        if j in at:
            found += bound_rows(big.variables[j], unit_row(at[j], len(used)), _end(big.lower[j]), _end(big.upper[j]))
    return Model(tuple(big.variables[j] for j in used), tuple(found), name=big.name)


def _end(value: float) -> Fraction | None:
    return None if isinf(value) else exact(float(value))
