"""How much work it is to list generators, before it is begun.

References
----------
McMullen, The maximum numbers of faces of a convex polytope, Mathematika 17, 1970.
"""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from math import comb

from polywalk.region.spans import rank

SMALL_WORK = 300_000
"""Work that stays in this process. On random rows and polars of cyclic polytopes in 2 to 20 variables a unit took 0.02
to 3 microseconds, so Ctrl-C waits a second at the worst; starting a child process costs a third of one every time.
"""


def work(n: int, m: int) -> int:
    """How much there is to do for m constraints in n variables: the most generators there can be, times m n^2."""
    if m < n:
        return m * n * n
    return m * n * n * (comb(m + 1 - (n + 1) // 2, m + 1 - n) + comb(m + 1 - (n + 2) // 2, m + 1 - n))


def is_small(rows: Sequence[Sequence[int]], straight: frozenset[int]) -> bool:
    """Whether the work is small, if need be after each independent equality (or line) has taken one variable away."""
    n, m = len(rows[0]) - 1, len(rows)
    if work(n, m) <= SMALL_WORK or not straight:
        return work(n, m) <= SMALL_WORK
    fixed = rank([tuple(map(Fraction, rows[k])) for k in straight])
    return work(max(n - fixed, 1), m - len(straight)) <= SMALL_WORK
