"""Points and planes in floats, moved as little as can be until each point lies on its planes to the last digit.

References
----------
Björck, Numerical Methods for Least Squares Problems, 1996, section 9.2 (Gauss-Newton); the smallest step is taken.
"""

from __future__ import annotations

from collections.abc import Sequence
from collections.abc import Set as AbstractSet

import numpy as np
from numpy.typing import NDArray

from polywalk.exact import Row

Floats = NDArray[np.float64]

STEPS = 6
"""Gauss-Newton's steps at most; two or three are enough where the floats were nearly right."""

ZERO = 1e-12
"""A direction that changes the gaps by less than this share of the most is none: what is left of it is rounding."""

DONE = 1e-15
"""A gap that is rounding, where all numbers are about as large as 1."""


def agreed(
    points: Sequence[Row], planes: Sequence[Row], links: Sequence[Sequence[int]], fixed: AbstractSet[int]
) -> tuple[Floats, Floats]:
    """Points (1, p) and planes (b, a), the largest slope of each 1, near the given ones; the fixed ones stay.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.narrowing.agreeing import agreed
    >>> near = Fraction(1, 10**6)
    >>> points, planes = agreed([(1, near, 0, 1)], [(0, 1, 0, 0), (1 + near, 0, 0, -1)], [[0], [0]], {0})
    >>> bool(abs(planes @ points[0]).max() < 1e-15), planes[0].tolist()
    (True, [0.0, 1.0, 0.0, 0.0])
    """
    corners, rows = _array(points), _array(planes)
    rows /= np.abs(rows[:, 1:]).max(axis=1, keepdims=True)
    pairs = [(k, p) for k, part in enumerate(links) for p in part]
    for _ in range(STEPS):
        gaps = np.array([rows[k] @ corners[p] for k, p in pairs])
        if not len(gaps) or np.abs(gaps).max() <= DONE:
            break
        step = np.linalg.lstsq(_slopes(corners, rows, pairs, fixed), -gaps, rcond=ZERO)[0]
        size = corners.size
        corners += step[:size].reshape(corners.shape)
        rows += step[size:].reshape(rows.shape)
    return corners, rows


def _slopes(corners: Floats, rows: Floats, pairs: Sequence[tuple[int, int]], fixed: AbstractSet[int]) -> Floats:
    """How each gap changes with every number; 1 of a point, the largest slope of a plane and fixed planes do not."""
    found = np.zeros((len(pairs), corners.size + rows.size))
    d = corners.shape[1]
    for line, (k, p) in enumerate(pairs):
        found[line, p * d + 1 : (p + 1) * d] = rows[k, 1:]
        if k not in fixed:
            part = found[line, corners.size + k * d : corners.size + (k + 1) * d]
            part[:] = corners[p]
            part[1 + int(np.abs(rows[k, 1:]).argmax())] = 0
    return found


def _array(rows: Sequence[Row]) -> Floats:
    return np.array([[float(value) for value in row] for row in rows])
