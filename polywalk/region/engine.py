"""cddlib's exact double description method: from rows to generators and back, in a child process where it is slow.

References
----------
Motzkin, Raiffa, Thompson & Thrall, The double description method, Contributions to the Theory of Games II, 1953.
Fukuda & Prodon, Double description method revisited, LNCS 1120, 1996.
McMullen, The maximum numbers of faces of a convex polytope, Mathematika 17, 1970.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from collections.abc import Set as AbstractSet
from fractions import Fraction
from math import comb
from typing import Any

import cdd
import cdd.gmp

from polywalk.budget import Budget, in_child
from polywalk.region.spans import rank

Rows = Sequence[Sequence[int]]
Listed = tuple[Sequence[Sequence[Fraction]], AbstractSet[int]]

SMALL_WORK = 300_000
"""Work that stays in this process. On random rows and polars of cyclic polytopes in 2 to 20 variables a unit took 0.02
to 3 microseconds, so Ctrl-C waits a second at the worst; starting a child process costs a third of one every time.
"""


def generators_of(rows: Rows, equal: frozenset[int], budget: Budget | None = None) -> Listed:
    """What rows (b, a), meaning b + a.x >= 0 or = 0, generate: rows (1, point) or (0, ray), and which are lines."""
    task = f"listing the vertices of {len(rows)} constraints in {len(rows[0]) - 1} variables"
    remedy = "fix variables, leave out constraints that never bind, or raise it: region(model, Budget(seconds=600))."
    listed: Listed = _run(list_generators, rows, equal, budget, task, remedy)
    return listed


def rows_of(generators: Rows, lines: frozenset[int], budget: Budget | None = None) -> Listed:
    """The fewest rows (b, a) that describe what generators (1, point) or (0, ray) span, and which are equalities."""
    task = f"finding the constraints of a shadow of {len(generators)} generators on {len(generators[0]) - 1} variables"
    remedy = "keep fewer variables or raise it: project(region, onto, Budget(seconds=600))."
    listed: Listed = _run(list_rows, generators, lines, budget, task, remedy)
    return listed


def list_generators(rows: Rows, equal: frozenset[int]) -> Listed:
    """The work of `generators_of`, for this process or a child."""
    matrix = cdd.gmp.matrix_from_array(rows, lin_set=equal, rep_type=cdd.RepType.INEQUALITY)
    found = cdd.gmp.copy_generators(cdd.gmp.polyhedron_from_matrix(matrix))
    return found.array, found.lin_set


def list_rows(generators: Rows, lines: frozenset[int]) -> Listed:
    """The work of `rows_of`, for this process or a child."""
    matrix = cdd.gmp.matrix_from_array(generators, lin_set=lines, rep_type=cdd.RepType.GENERATOR)
    found = cdd.gmp.copy_inequalities(cdd.gmp.polyhedron_from_matrix(matrix))
    return found.array, found.lin_set


def work(n: int, m: int) -> int:
    """How much there is to do for m constraints in n variables: the most generators there can be, times m n^2."""
    if m < n:
        return m * n * n
    return m * n * n * (comb(m + 1 - (n + 1) // 2, m + 1 - n) + comb(m + 1 - (n + 2) // 2, m + 1 - n))


def _is_small(rows: Rows, straight: frozenset[int]) -> bool:
    """Whether the work is small, if need be after each independent equality (or line) has taken one variable away."""
    n, m = len(rows[0]) - 1, len(rows)
    if work(n, m) <= SMALL_WORK or not straight:
        return work(n, m) <= SMALL_WORK
    fixed = rank([tuple(map(Fraction, rows[k])) for k in straight])
    return work(max(n - fixed, 1), m - len(straight)) <= SMALL_WORK


def _run(function: Callable[..., Any], rows: Rows, straight: frozenset[int], budget: Budget | None, *said: str) -> Any:
    if budget is None and _is_small(rows, straight):
        return function(rows, straight)
    return in_child(function, rows, straight, budget=budget or Budget(), task=said[0], remedy=said[1])
