"""Which rows of an infeasible big model cannot all be kept: rows are made to stretch, and the stretched ones enforced.

References
----------
Chinneck & Dravnieks, Locating minimal infeasible constraint sets in linear programs, ORSA J. Comput. 3, 1991
(elastic and deletion filtering).
"""

from __future__ import annotations

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.errors import SolverError
from polywalk.narrowing.adding import changed
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.tolerances import TOLERANCES


def crossed(big: BigModel) -> list[int]:
    """The variables whose lower bound is above their upper one."""
    return np.flatnonzero(big.lower > big.upper).tolist()


def stretched_rows(big: BigModel) -> list[int]:
    """Rows that contradict each other, given the bounds of the variables; none where all can be kept.

    Every row may be stretched either way at a price of 1 a unit. Those that are stretched at the cheapest plan are
    enforced from then on, until no plan is left: the enforced rows contradict each other.
    """
    wide = elastic(big)
    solver = Solver(wide)
    extra = wide.n - big.n
    solver.aim(range(big.n, wide.n), [-1.0] * extra)
    enforced: list[int] = []
    while True:
        status = solver.run()
        if status == "infeasible":
            return sorted(enforced)
        if status != "optimal":
            raise SolverError(f"HiGHS stopped while stretching rows ({solver.status_text}).", solver.status_text)
        stretch = solver.point()[big.n :]
        rows = _rows_of(stretch, big)
        new = [row for row in rows if row not in enforced]
        if not new:
            return []
        enforced += new
        places = [big.n + k for row in new for k in (2 * row, 2 * row + 1)]
        solver.bound(places, [0.0] * len(places), [0.0] * len(places))


def _rows_of(stretch: np.ndarray, big: BigModel) -> list[int]:
    sides = np.maximum(_size(big.row_lower), _size(big.row_upper))
    pairs = stretch.reshape(-1, 2).max(axis=1)
    found: list[int] = np.flatnonzero(pairs > float(TOLERANCES.violation) * 1e-2 * np.maximum(1.0, sides)).tolist()
    return found


def _size(ends: np.ndarray) -> np.ndarray:
    return np.where(np.isinf(ends), 0.0, np.abs(ends))


def elastic(big: BigModel) -> BigModel:
    """Two more variables a row, that stretch it downward and upward."""
    count = big.m
    starts = big.indptr + 2 * np.arange(count + 1)
    places = np.empty(big.nonzeros + 2 * count, dtype=np.int64)
    values = np.empty(big.nonzeros + 2 * count)
    own = np.ones(len(places), dtype=bool)
    for shift in (1, 2):
        own[starts[1:] - shift] = False
    places[own], values[own] = big.indices, big.data
    places[starts[1:] - 2], values[starts[1:] - 2] = big.n + 2 * np.arange(count), 1.0
    places[starts[1:] - 1], values[starts[1:] - 1] = big.n + 2 * np.arange(count) + 1, -1.0
    names = tuple(f"stretch {k}" for k in range(2 * count))
    while set(names) & set(big.variables):
        names = tuple(f"{name} (added)" for name in names)
    return changed(
        big,
        variables=(*big.variables, *names),
        indptr=starts,
        indices=places,
        data=values,
        lower=np.append(big.lower, np.zeros(2 * count)),
        upper=np.append(big.upper, np.full(2 * count, np.inf)),
        cost=np.zeros(0),
        goal=None,
        integers=(),
    )
