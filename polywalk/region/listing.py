"""cddlib's double description method, exact and in floats: from rows to generators and back.

References
----------
Motzkin, Raiffa, Thompson & Thrall, The double description method, Contributions to the Theory of Games II, 1953.
Fukuda & Prodon, Double description method revisited, LNCS 1120, 1996.
"""

from __future__ import annotations

from collections.abc import Sequence
from collections.abc import Set as AbstractSet
from fractions import Fraction

import cdd
import cdd.gmp
import numpy as np
from numpy.typing import NDArray

Rows = Sequence[Sequence[int]]
Listed = tuple[Sequence[Sequence[Fraction]], AbstractSet[int]]
Floats = NDArray[np.float64]


def list_generators(rows: Rows, equal: AbstractSet[int]) -> Listed:
    """What rows (b, a), meaning b + a.x >= 0 or = 0, generate: rows (1, point) or (0, ray), and which are lines."""
    matrix = cdd.gmp.matrix_from_array(rows, lin_set=equal, rep_type=cdd.RepType.INEQUALITY)
    found = cdd.gmp.copy_generators(cdd.gmp.polyhedron_from_matrix(matrix))
    return found.array, found.lin_set


def infinity(n: int) -> tuple[int, ...]:
    """The row 1 >= 0, which every point satisfies: beside it cddlib lists the apex of a cone at the origin too."""
    return (1, *(0,) * n)


def list_rows(generators: Rows, lines: AbstractSet[int]) -> Listed:
    """The fewest rows (b, a) that describe what generators (1, point) or (0, ray) span, and which are equalities."""
    matrix = cdd.gmp.matrix_from_array(generators, lin_set=lines, rep_type=cdd.RepType.GENERATOR)
    found = cdd.gmp.copy_inequalities(cdd.gmp.polyhedron_from_matrix(matrix))
    return found.array, found.lin_set


def sketch_generators(rows: Floats, equal: AbstractSet[int]) -> Floats | None:
    """Roughly what the rows generate, a line as two rays; None where floats got lost. Never to be relied on."""
    try:
        every = [*rows.tolist(), infinity(rows.shape[1] - 1)]
        matrix = cdd.matrix_from_array(every, lin_set=equal, rep_type=cdd.RepType.INEQUALITY)
        found = cdd.copy_generators(cdd.polyhedron_from_matrix(matrix))
    except RuntimeError:
        return None
    array = np.array(found.array, dtype=float).reshape(-1, rows.shape[1])
    both = np.concatenate([array, -array[list(found.lin_set)]]) if found.lin_set else array
    return both if np.isfinite(both).all() else None
