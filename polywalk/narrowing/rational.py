"""Sparse systems of integers solved exactly: a float factorisation, residuals in integers, fractions read off.

The float solution is corrected by the exact residual until its binary digits tell the fractions; the fractions count
only if they solve the system exactly.

References
----------
Wan, An algorithm to solve integer linear systems exactly using numerical methods, J. Symbolic Comput. 41, 2006.
Cook & Steffy, Solving very sparse rational systems of equations, ACM Trans. Math. Software 37, 2011.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from math import frexp, gcd, ldexp
from typing import Any

import numpy as np

Entries = list[tuple[int, int]]
Solution = tuple[list[int], int]

GUARD = 24
"""Binary digits at the end of a corrected solution that are not trusted; 45 are added at a time."""

LARGEST = 60_000
"""Binary digits after which the search for fractions ends; Hadamard's bound for the bases met is far below."""


class Factor:
    """A square sparse integer matrix, factorised in floats, that solves exactly.

    Parameters
    ----------
    rows : list of list of (column, value)
        Square and nonsingular.

    Raises
    ------
    ValueError
        Where floats find the matrix singular.

    Examples
    --------
    >>> from polywalk.narrowing.rational import Factor
    >>> Factor([[(0, 3), (1, 1)], [(1, 7)]]).solve([1, 2])
    ([5, 6], 21)
    """

    def __init__(self, rows: list[Entries]) -> None:
        from scipy.sparse import csc_array
        from scipy.sparse.linalg import splu

        self.rows = rows
        size = len(rows)
        self.columns: list[Entries] = [[] for _ in range(size)]
        for i, row in enumerate(rows):
            for j, value in row:
                self.columns[j].append((i, value))
        starts = np.cumsum([0, *(len(column) for column in self.columns)])
        places = [i for column in self.columns for i, _ in column]
        values = np.array([float(value) for column in self.columns for _, value in column])
        self._factor: Any = None
        if size:
            matrix = csc_array((values, places, starts), shape=(size, size))
            try:
                self._factor = splu(matrix)
            except RuntimeError as trouble:
                raise ValueError("the matrix is singular") from trouble

    def solve(self, rhs: Sequence[int]) -> Solution | None:
        """Numerators and the common denominator of x with A x = rhs; None where no fractions were found."""
        return _lifted(self.rows, lambda given: self._factor.solve(given, "N"), rhs)

    def solve_transposed(self, rhs: Sequence[int]) -> Solution | None:
        """The same for the transposed matrix."""
        return _lifted(self.columns, lambda given: self._factor.solve(given, "T"), rhs)


def _lifted(rows: list[Entries], solve: Callable[[Any], Any], rhs: Sequence[int]) -> Solution | None:
    rest, found = list(rhs), [0] * len(rows)
    digits, attempt, idle = 0, 40, 0
    while digits < LARGEST and idle < 8:
        top = max((abs(value) for value in rest), default=0).bit_length()
        if top == 0:
            return _reduced(found, 1 << digits)
        shift = max(top - 60, 0)
        step = solve(np.array([float(value >> shift) for value in rest]))
        size = float(np.abs(step).max())
        if not np.isfinite(size) or size == 0:
            return None
        rise = 45 - frexp(size)[1] - shift
        idle = 0 if rise >= 8 else idle + 1
        rise = max(rise, 8)
        moves = [round(ldexp(value, rise + shift)) for value in step.tolist()]
        found = [(value << rise) + move for value, move in zip(found, moves, strict=True)]
        rest = [
            (value << rise) - sum([entry * moves[j] for j, entry in row]) for value, row in zip(rest, rows, strict=True)
        ]
        digits += rise
        if digits >= attempt:
            attempt = digits * 8 // 5
            told = _told(found, digits)
            if told is not None and _solves(rows, told, rhs):
                return told
    return None


def _solves(rows: list[Entries], told: Solution, rhs: Sequence[int]) -> bool:
    values, common = told
    return all(
        sum([entry * values[j] for j, entry in row]) == common * value for row, value in zip(rows, rhs, strict=True)
    )


def _told(found: list[int], digits: int) -> Solution | None:
    """The fractions that the binary digits stand for, over one denominator; None where these are too few digits."""
    common, one = 1, 1 << digits
    for value in found:
        scaled = value * common
        error = common << GUARD
        nearest = (scaled + (one >> 1)) >> digits
        if abs(scaled - (nearest << digits)) <= error:
            continue
        denominator = _denominator(scaled, one, error)
        if denominator is None:
            return None
        common *= denominator
        if common.bit_length() * 2 > digits - GUARD:
            return None
    return _reduced([(value * common + (one >> 1)) >> digits for value in found], common)


def _denominator(value: int, one: int, error: int) -> int | None:
    """That of the first convergent of value / one within error / one; None where it is too large to be believed."""
    up, down = abs(value), one
    before, now = 0, 1  # denominators of convergents
    above, top = 1, up // down
    up, down = down, up % down
    while abs(abs(value) * now - top * one) > error * now:
        if down == 0:
            return None
        part = up // down
        up, down = down, up % down
        before, now = now, part * now + before
        above, top = top, part * top + above
        if now * now * error > one:
            return None
    return now


def _reduced(values: list[int], common: int) -> Solution:
    divisor = gcd(common, *values)
    return [value // divisor for value in values], common // divisor
