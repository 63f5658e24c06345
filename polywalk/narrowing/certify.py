"""From a float basis to exact numbers: the point it stands for, checked in every row, and multipliers that prove it.

A basis says which sides hold with equality; they make a square system, solved exactly. Multipliers prove a limit by
their signs alone: whatever the basis was, the sides they point to add up to an inequality that every plan keeps.

References
----------
Applegate, Cook, Dash & Espinoza, Exact solutions to linear programming problems, Oper. Res. Lett. 35, 2007.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from math import lcm

from polywalk.narrowing.program import Program, Side
from polywalk.narrowing.rational import Factor

BASIC, UPPER = 1, 2
NOTHING = Fraction(0)
Statuses = tuple[list[int], list[int]]
Target = dict[int, Fraction]


@dataclass(frozen=True)
class Whole:
    """A whole plan over one denominator: the value of variable j is ``values[j] / common``."""

    values: list[int]
    common: int

    def at(self, place: int) -> Fraction:
        """The value of one variable."""
        return Fraction(self.values[place], self.common)


@dataclass(frozen=True)
class Limit:
    """What multipliers prove: target . x <= value, for every plan.

    Parameters
    ----------
    value : Fraction or None
        None where a multiplier points to a side that is not there: nothing is proved.
    multipliers : tuple of (str, Fraction)
        By constraint, as the exact Model names them; those that are 0 are left out.
    """

    value: Fraction | None
    multipliers: tuple[tuple[str, Fraction], ...]


class Basis:
    """A basis of HiGHS over a program, read exactly.

    Raises
    ------
    ValueError
        Where it is no basis: singular, or not square.
    """

    def __init__(self, program: Program, statuses: Statuses) -> None:
        self.program = program
        self.columns, self.rows = statuses
        self.basic = [j for j, status in enumerate(self.columns) if status == BASIC]
        self.tight = [i for i, status in enumerate(self.rows) if status != BASIC]
        if len(self.basic) != len(self.tight):
            raise ValueError("the basis is not square")

    @cached_property
    def _factor(self) -> Factor:
        place = {j: k for k, j in enumerate(self.basic)}
        lines = self.program.lines
        return Factor([[(place[j], value) for j, value in lines[i] if j in place] for i in self.tight])

    def point(self) -> Whole | None:
        """The plan at which the basis's sides hold with equality; None where no fractions were found."""
        low, high = self.program.bounds
        rest = {j: _side(status, low[j], high[j]) for j, status in enumerate(self.columns) if status != BASIC}
        shared = lcm(*[value.denominator for value in rest.values()])
        fixed = {j: value.numerator * (shared // value.denominator) for j, value in rest.items() if value}
        sides = [self._row_side(i) for i in self.tight]
        scale = lcm(shared, *[side.denominator for side in sides])
        rhs = []
        for i, side in zip(self.tight, sides, strict=True):
            moved = sum([value * fixed[j] for j, value in self.program.lines[i] if j in fixed])
            rhs.append(side.numerator * (scale // side.denominator) - moved * (scale // shared))
        solved = self._factor.solve(rhs)
        if solved is None:
            return None
        values, common = solved
        found = [0] * self.program.big.n
        for j, value in fixed.items():
            found[j] = value * (scale // shared) * common
        for j, value in zip(self.basic, values, strict=True):
            found[j] = value
        return Whole(found, common * scale)

    def _row_side(self, place: int) -> Fraction:
        low, high = self.program.row_sides
        return _side(self.rows[place], low[place], high[place]) * self.program.scales[place]

    def limit(self, target: Target) -> Limit | None:
        """What the basis's multipliers prove about the target's greatest value; None where no fractions were found."""
        scale = lcm(*[value.denominator for value in target.values()])
        whole = {j: int(value * scale) for j, value in target.items()}
        solved = self._factor.solve_transposed([whole.get(j, 0) for j in self.basic])
        if solved is None:
            return None
        values, common = solved
        shares = {i: value for i, value in zip(self.tight, values, strict=True) if value}
        return limit_of(self.program, target, shares, common * scale)


def limit_of(program: Program, target: Target, shares: dict[int, int], common: int) -> Limit:
    """What multipliers of rows prove about the target; the bounds of the variables take what is left over.

    A row's multiplier is ``share * scale / common``, its scaled line times ``share / common``: all in integers, where
    ``common`` holds the denominators of the target too.
    """
    rest = {j: int(value * common) for j, value in target.items() if value}
    for i, share in shares.items():
        for j, value in program.lines[i]:
            rest[j] = rest.get(j, 0) - share * value
    weights = {i: share * program.scales[i] for i, share in shares.items()}
    bounds = {j: value for j, value in sorted(rest.items()) if value}
    named: dict[str, Fraction] = {}
    found: list[tuple[int, Fraction]] = []
    is_proved = True
    sources = (
        (weights, program.row_sides, program.row_name),
        (bounds, program.bounds, program.column_name),
    )
    for parts, (low, high), name in sources:
        for place, weight in parts.items():
            side = high[place] if weight > 0 else low[place]
            if side is None:
                is_proved = False
            elif side:
                found.append((weight, side))
            named[name(place, float(weight > 0) - 0.5)] = Fraction(weight, common)
    return Limit(_total(found) / common if is_proved else None, tuple(named.items()))


def _total(parts: list[tuple[int, Fraction]]) -> Fraction:
    """The sum of the products, over one denominator."""
    shared = lcm(*[side.denominator for _, side in parts])
    return Fraction(sum([weight * side.numerator * (shared // side.denominator) for weight, side in parts]), shared)


def holds(program: Program, plan: Whole) -> bool:
    """Whether the plan keeps every row and bound, exactly."""
    low, high = program.bounds
    values, common = plan.values, plan.common
    for j, value in enumerate(values):
        if not _within(value, common, low[j], high[j]):
            return False
    low, high = program.row_sides
    for i, (line, scale) in enumerate(zip(program.lines, program.scales, strict=True)):
        if not _within(sum([entry * values[j] for j, entry in line]), common * scale, low[i], high[i]):
            return False
    return True


def _within(value: int, common: int, low: Side, high: Side) -> bool:
    if low is not None and value * low.denominator < low.numerator * common:
        return False
    return high is None or value * high.denominator <= high.numerator * common


def _side(status: int, low: Side, high: Side) -> Fraction:
    """Where a nonbasic variable or row stands."""
    first, second = (high, low) if status == UPPER else (low, high)
    if first is not None:
        return first
    return NOTHING if second is None else second
