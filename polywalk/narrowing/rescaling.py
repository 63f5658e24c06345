"""Rows as HiGHS can hold them: it drops tiny coefficients and refuses huge ones, so such rows are multiplied first."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from polywalk.bigmodel import BigModel
from polywalk.errors import SolverError

SMALLEST, LARGEST = 1e-12, 1e15
"""HiGHS drops coefficients up to the first, the least its option small_matrix_value takes, and refuses those from the
second on (its option large_matrix_value as it stands: larger ones and 1 in one factorisation leave no digits)."""


def row_factors(big: BigModel) -> NDArray[np.float64]:
    """A power of two for every row, so that HiGHS keeps each of its coefficients; 1 where it keeps them as they are.

    Powers of two change no digit. Multipliers of the rows are to be multiplied with the same factors.

    Raises
    ------
    SolverError
        Where no factor will do.

    Examples
    --------
    >>> import numpy as np
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing.rescaling import row_factors
    >>> big = BigModel(("x", "y"), ("faint",), [0, 2], [0, 1], [1, 1e-13], [-np.inf], [4], [0, 0], [9, 9])
    >>> row_factors(big)
    array([16.])
    """
    sizes = np.abs(big.data)
    outside = (sizes > 0) & ((sizes <= SMALLEST) | (sizes >= LARGEST))
    factors = np.ones(big.m)
    rows = np.repeat(np.arange(big.m), np.diff(big.indptr))
    for place in np.unique(rows[outside]).tolist():
        factors[place] = _factor(big, place)
    return factors


def _factor(big: BigModel, place: int) -> float:
    part = slice(big.indptr[place], big.indptr[place + 1])
    sizes, columns = np.abs(big.data[part]), big.indices[part]
    least, most = sizes[sizes > 0].min(), sizes.max()
    exponent = int(np.floor(np.log2(SMALLEST / least))) + 1 if least <= SMALLEST else 0
    if most >= LARGEST:
        exponent = int(np.ceil(np.log2(LARGEST / most))) - 1
    factor = float(np.ldexp(1.0, exponent))
    if least * factor <= SMALLEST or most * factor >= LARGEST or not np.isfinite(factor):
        small, large = (big.variables[columns[k]] for k in (np.flatnonzero(sizes == least)[0], sizes.argmax()))
        raise SolverError(
            f"the row {big.rows[place]!r} holds coefficients too far apart for HiGHS: {least:g} of {small!r} beside "
            f"{most:g} of {large!r}; give these variables other units, or leave the small one out.",
            big.rows[place],
        )
    return factor
