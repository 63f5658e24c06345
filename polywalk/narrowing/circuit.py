"""An irreducible conflict from HiGHS's multipliers: floats say which rows and bounds, integers prove it.

Constraints that a contradiction needs all of are as many as their rank and one more, and conversely: then one
combination of them, and no other, has no variable left. So the rank, which may be found modulo a prime (it is never
less than that), proves that none is to spare, and the one combination, solved exactly, that they contradict.

References
----------
Gleeson & Ryan, Identifying minimally infeasible subsystems of inequalities, ORSA J. Comput. 2, 1990 (such subsystems
are the vertices of the polyhedron of multipliers).
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from fractions import Fraction
from heapq import heapify, heappop, heappush

import numpy as np
from numpy.typing import NDArray

from polywalk.bigmodel import BigModel
from polywalk.narrowing.adding import changed
from polywalk.narrowing.certify import Limit, limit_of
from polywalk.narrowing.program import Program
from polywalk.narrowing.rational import Factor
from polywalk.narrowing.solver import Solver

PRIME = (1 << 61) - 1
"""A rank modulo it is a proof from below; by chance it is too small once in 10^18."""

ROUNDING = 1e-9
"""A multiplier below this share of the largest, a sum below this share of its terms, is taken for 0; exactness is
decided afterwards."""

Line = Mapping[int, int]


def circuit(big: BigModel, multipliers: NDArray[np.float64]) -> Limit | None:
    """The contradiction of rows with these multipliers and of the bounds they need, if none of them is to spare.

    Returns
    -------
    Limit or None
        Exact multipliers by constraint, which add up to 0 <= value, a negative number; None where that is not proved.

    Examples
    --------
    >>> import numpy as np
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing.circuit import circuit
    >>> big = BigModel(("x", "y"), ("sum",), [0, 2], [0, 1], [1, 1], [7], [9], [0, 0], [3, 3])
    >>> found = circuit(big, np.array([-1.0]))
    >>> int(found.value), [name for name, _ in found.multipliers]
    (-1, ['sum lower', 'x upper', 'y upper'])
    """
    rows = np.flatnonzero(np.abs(multipliers) > ROUNDING * np.abs(multipliers).max(initial=0.0)).tolist()
    part = part_of(big, rows)
    matrix, weights = part.csr(), multipliers[rows]
    needed = np.abs(matrix.T @ weights) > ROUNDING * (abs(matrix).T @ np.abs(weights))
    program = Program(part, ())
    lines = [{j: value for j, value in line if not needed[j]} for line in program.lines]
    shares = _dependency(lines)
    if shares is None:
        return None
    for sign in (1, -1):
        found = limit_of(program, {}, {i: sign * share for i, share in enumerate(shares) if share}, 1)
        if found.value is not None and found.value < 0:
            return found
    return None


def _dependency(lines: Sequence[Line]) -> list[int] | None:
    """The one combination of these lines that leaves nothing; None where there is none, or more than one."""
    pivots = pivots_of(lines)
    odd = [i for i, pivot in enumerate(pivots) if pivot is None]
    if len(odd) != 1:
        return None
    rest = [i for i, pivot in enumerate(pivots) if pivot is not None]
    place = {pivot: k for k, pivot in enumerate(pivots[i] for i in rest)}
    square = [[(place[j], value) for j, value in lines[i].items() if j in place] for i in rest]
    last = lines[odd[0]]
    try:
        solved = Factor(square).solve_transposed([-last.get(pivot, 0) for pivot in place if pivot is not None])
    except ValueError:
        return None
    if solved is None:
        return None
    shares = [0] * len(lines)
    for i, value in zip((*rest, odd[0]), (*solved[0], solved[1]), strict=True):
        shares[i] = value
    return shares if _leaves_nothing(lines, shares) else None


def _leaves_nothing(lines: Sequence[Line], shares: Sequence[int]) -> bool:
    total: dict[int, int] = {}
    for line, share in zip(lines, shares, strict=True):
        for j, value in line.items():
            total[j] = total.get(j, 0) + share * value
    return not any(total.values())


def pivots_of(lines: Sequence[Line]) -> list[int | None]:
    """A column of its own for every line, as in elimination modulo a prime; None for a line the earlier ones span.

    Examples
    --------
    >>> from polywalk.narrowing.circuit import pivots_of
    >>> pivots_of([{0: 1, 1: 1}, {0: 2, 1: 2}, {1: 3}])
    [0, None, 1]
    """
    count: dict[int, int] = {}
    for line in lines:
        for j in line:
            count[j] = count.get(j, 0) + 1
    kept: list[tuple[int, dict[int, int]]] = []
    order: dict[int, int] = {}
    found: list[int | None] = []
    for line in lines:
        rest = _reduced(line, kept, order)
        pivot = min(rest, key=lambda j: (count[j], j), default=None)
        found.append(pivot)
        if pivot is not None:
            inverse = pow(rest[pivot], -1, PRIME)
            order[pivot] = len(kept)
            kept.append((pivot, {j: value * inverse % PRIME for j, value in rest.items()}))
    return found


def _reduced(line: Line, kept: Sequence[tuple[int, dict[int, int]]], order: Mapping[int, int]) -> dict[int, int]:
    """What is left of a line where the kept ones, the earliest first, have taken their pivots out of it."""
    rest = {j: value % PRIME for j, value in line.items() if value % PRIME}
    due = [order[j] for j in rest if j in order]
    heapify(due)
    while due:
        pivot, other = kept[heappop(due)]
        factor = rest.get(pivot, 0)
        for j, value in other.items() if factor else ():
            if j not in rest and j in order:
                heappush(due, order[j])
            rest[j] = (rest.get(j, 0) - factor * value) % PRIME
            if not rest[j]:
                del rest[j]
    return rest


def is_irreducible(rows: Iterable[Sequence[Fraction]]) -> bool:
    """Whether rows, all of which a contradiction uses, are one more than their rank: then none is to spare."""
    lines = []
    for row in rows:
        values = {j: value for j, value in enumerate(row) if value}
        scale = np.lcm.reduce([value.denominator for value in values.values()], dtype=object) if values else 1
        lines.append({j: int(value * scale) for j, value in values.items()})
    return pivots_of(lines).count(None) == 1


def part_of(big: BigModel, rows: Iterable[int]) -> BigModel:
    """The big model with some of its rows."""
    places = list(rows)
    spans = [np.arange(big.indptr[i], big.indptr[i + 1]) for i in places]
    used = np.concatenate(spans) if spans else np.array([], dtype=np.int64)
    return changed(
        big,
        rows=tuple(big.rows[i] for i in places),
        indptr=np.cumsum([0, *(len(span) for span in spans)]),
        indices=big.indices[used],
        data=big.data[used],
        row_lower=big.row_lower[places],
        row_upper=big.row_upper[places],
        units=(),
    )


def contradiction(big: BigModel) -> Limit | None:
    """An irreducible contradiction of a big model that HiGHS calls infeasible; None where none is proved."""
    solver = Solver(big)
    solver.aim([0], [0.0])
    weights = solver.contradiction() if solver.run() == "infeasible" else None
    return None if weights is None or not len(weights) else circuit(big, weights)
