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

Rows = Sequence[Sequence[int]]
Listed = tuple[Sequence[Sequence[Fraction]], AbstractSet[int]]

SMALL_WORK = 60_000
"""Work that stays in this process: under a second at the 4 to 15 µs a unit measured on tangent planes of spheres."""


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
    """A bound on the vertices that m constraints in n variables can have, times m."""
    return m * (comb(m - (n + 1) // 2, m - n) + comb(m - (n + 2) // 2, m - n)) if m > n else m


def _run(function: Callable[..., Any], rows: Rows, straight: frozenset[int], budget: Budget | None, *said: str) -> Any:
    if budget is None and work(len(rows[0]) - 1, len(rows)) <= SMALL_WORK:
        return function(rows, straight)
    return in_child(function, rows, straight, budget=budget or Budget(), task=said[0], remedy=said[1])
