"""A big model as one linear program to be asked again and again: exact data beside the floats, names of sides."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from fractions import Fraction
from functools import cached_property
from itertools import pairwise
from math import lcm

import numpy as np
from numpy.typing import NDArray

from polywalk.bigmodel import BigModel
from polywalk.exact import exact
from polywalk.narrowing.adding import changed
from polywalk.narrowing.rational import Entries

Side = Fraction | None


@dataclass(frozen=True, eq=False)
class Program:
    """A big model with the columns to look at.

    Parameters
    ----------
    big : BigModel
    keep : tuple of int
        The columns looked at.
    held : mapping of str to Fraction, optional
        Exact right-hand sides of rows, where a float would round them.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing.program import Program
    >>> big = BigModel(("x", "y"), ("sum",), [0, 2], [0, 1], [1, 0.5], [1], [4], [0, 0], [3, 3])
    >>> program = Program(big, (0,))
    >>> program.lines, program.scales
    ([[(0, 2), (1, 1)]], [2])
    >>> program.row_name(0, 1), program.column_name(1, -1)
    ('sum upper', 'y lower')
    """

    big: BigModel
    keep: tuple[int, ...]
    held: Mapping[str, Fraction] = field(default_factory=dict)

    @cached_property
    def _scaled(self) -> tuple[list[Entries], list[int]]:
        known: dict[float, Fraction] = {}
        lines, scales = [], []
        starts, places, data = self.big.indptr.tolist(), self.big.indices.tolist(), self.big.data.tolist()
        for begin, end in pairwise(starts):
            row = [(places[k], _known(data[k], known)) for k in range(begin, end) if data[k]]
            scale = lcm(*[value.denominator for _, value in row])
            lines.append([(j, value.numerator * (scale // value.denominator)) for j, value in row])
            scales.append(scale)
        return lines, scales

    @property
    def lines(self) -> list[Entries]:
        """The rows, each times its scale, as (column, integer) pairs."""
        return self._scaled[0]

    @property
    def scales(self) -> list[int]:
        """What each row was multiplied with."""
        return self._scaled[1]

    @cached_property
    def columns(self) -> list[list[tuple[int, Fraction]]]:
        """The columns as (row, coefficient) pairs."""
        found: list[list[tuple[int, Fraction]]] = [[] for _ in range(self.big.n)]
        for i, (line, scale) in enumerate(zip(self.lines, self.scales, strict=True)):
            for j, value in line:
                found[j].append((i, Fraction(value, scale)))
        return found

    @cached_property
    def row_sizes(self) -> NDArray[np.float64]:
        """The largest size of a coefficient in every row, (m,) floats."""
        found = np.zeros(self.big.m)
        np.maximum.at(found, np.repeat(np.arange(self.big.m), np.diff(self.big.indptr)), np.abs(self.big.data))
        return found

    @cached_property
    def row_sides(self) -> tuple[list[Side], list[Side]]:
        """The lower and upper sides of the rows, None where there is none."""
        sides = _ends(self.big.row_lower), _ends(self.big.row_upper)
        for name, value in self.held.items():
            place = self.big.row_index(name)
            for side in sides:
                if side[place] is not None:
                    side[place] = value
        return sides

    @cached_property
    def bounds(self) -> tuple[list[Side], list[Side]]:
        """The lower and upper bounds of the variables, None where there is none."""
        return _ends(self.big.lower), _ends(self.big.upper)

    def row_name(self, place: int, sign: float) -> str:
        """What the exact Model calls a row's upper (sign > 0) or lower side."""
        low, high = self.big.row_lower[place], self.big.row_upper[place]
        name = self.big.rows[place]
        if low == high or np.isinf(low) or np.isinf(high):
            return name
        return f"{name} {'upper' if sign > 0 else 'lower'}"

    def column_name(self, place: int, sign: float) -> str:
        """What the exact Model calls a variable's upper (sign > 0) or lower bound."""
        name = self.big.variables[place]
        if self.big.lower[place] == self.big.upper[place]:
            return f"{name} fixed"
        return f"{name} {'upper' if sign > 0 else 'lower'}"


def cone_of(program: Program) -> Program:
    """The directions that keep every constraint, no longer than 1 in the columns looked at."""
    big = program.big
    ends = {label: np.where(np.isinf(getattr(big, label)), getattr(big, label), 0.0) for label in _ENDS}
    for j in program.keep:
        ends["lower"][j] = max(ends["lower"][j], -1.0)
        ends["upper"][j] = min(ends["upper"][j], 1.0)
    return Program(changed(big, **ends), program.keep)


_ENDS = ("row_lower", "row_upper", "lower", "upper")


def _known(value: float, known: dict[float, Fraction]) -> Fraction:
    found = known.get(value)
    if found is None:
        found = known[value] = exact(value)
    return found


def _ends(values: Iterable[float]) -> list[Side]:
    known: dict[float, Fraction] = {}
    return [None if np.isinf(value) else _known(float(value), known) for value in values]
