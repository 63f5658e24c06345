"""A few rows and bounds of a big model as an exact small model in the variables they touch."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import replace
from fractions import Fraction
from math import isinf

from polywalk.bigmodel import BigModel, locate
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


def only(big: BigModel, names: Sequence[str], title: str = "") -> Model:
    """The constraints of these names alone, rows or bounds, in the variables they touch.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.narrowing.cutting import only
    >>> big = pw.BigModel.from_model(pw.scenarios.harbour_row())
    >>> print(only(big, ["quay pipe", "tank upper"]))
    no objective
    constraint  rule             origin
    quay pipe   pump + tank ≤ 8
    tank upper  tank ≤ 4
    free (no bound of their own): pump
    units: pump in MW, tank in MW
    """
    parts = []
    for name in names:
        what, place, _ = locate(big, name)
        parts.append((name, cut(big, [place], []) if what else cut(big, [], [place])))
    used = tuple(dict.fromkeys(variable for _, part in parts for variable in part.variables))
    rows = []
    for name, part in parts:
        row = part.constraint(name)
        given = dict(zip(part.variables, row.coefficients, strict=True))
        rows.append(replace(row, coefficients=tuple(given.get(variable, Fraction(0)) for variable in used)))
    units = tuple(pair for pair in big.units if pair[0] in {*used, *names})
    return Model(used, tuple(rows), units=units, name=title)


def _end(value: float) -> Fraction | None:
    return None if isinf(value) else exact(float(value))
