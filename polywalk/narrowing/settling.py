"""What became constant when variables were set: satisfied or violated, by how much, within solver tolerance or not."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from fractions import Fraction
from typing import Literal

from polywalk.exact import short
from polywalk.model import Constraint, Model
from polywalk.narrowing.program import Program, Side
from polywalk.narrowing.tolerances import TOLERANCES

Verdict = Literal["satisfied", "violated", "violated within solver tolerance"]


@dataclass(frozen=True)
class Settled:
    """A constraint of the big model in which no kept variable is left.

    Parameters
    ----------
    constraint : str
    slack : Fraction
        Negative where it is violated.
    verdict : {"satisfied", "violated", "violated within solver tolerance"}
    variable : str
        The variable it is a bound of, "" for a row.
    """

    constraint: str
    slack: Fraction
    verdict: Verdict
    variable: str = ""

    @property
    def is_bound(self) -> bool:
        """Whether it is a bound of a variable that was set."""
        return bool(self.variable)


def settled_by(program: Program, values: dict[int, Fraction]) -> tuple[Settled, ...]:
    """Every row without a kept variable, and the bounds that the values violate."""
    return (*_rows(program, values), *_bounds(program, values))


def _rows(program: Program, values: dict[int, Fraction]) -> Iterator[Settled]:
    keep = set(program.keep)
    low, high = program.row_sides
    for i, (line, scale) in enumerate(zip(program.lines, program.scales, strict=True)):
        if any(j in keep for j, _ in line):
            continue
        value = sum((entry * values[j] for j, entry in line), Fraction(0)) / scale
        for name, slack, side in _slacks(value, low[i], high[i], (program.row_name(i, -1), program.row_name(i, 1))):
            yield Settled(name, slack, _verdict(slack, side))


def _bounds(program: Program, values: dict[int, Fraction]) -> Iterator[Settled]:
    low, high = program.bounds
    for j, value in values.items():
        names = program.column_name(j, -1), program.column_name(j, 1)
        for name, slack, side in _slacks(value, low[j], high[j], names):
            if slack < 0:
                yield Settled(name, slack, _verdict(slack, side), program.big.variables[j])


def _slacks(value: Fraction, low: Side, high: Side, names: tuple[str, str]) -> list[tuple[str, Fraction, Fraction]]:
    """Name, slack and side of each side that is there; an equality has one, never positive."""
    if low is not None and low == high:
        return [(names[0], -abs(value - low), low)]
    found = []
    if low is not None:
        found.append((names[0], value - low, low))
    if high is not None:
        found.append((names[1], high - value, high))
    return found


def _verdict(slack: Fraction, side: Fraction) -> Verdict:
    if slack >= 0:
        return "satisfied"
    return "violated within solver tolerance" if -slack <= room(side) else "violated"


def room(side: Fraction) -> Fraction:
    """How far a constraint with this right-hand side may be violated within solver tolerance."""
    return TOLERANCES.violation * max(Fraction(1), abs(side))


def relaxed(model: Model) -> Model:
    """The model with every constraint wider by solver tolerance."""
    rows: list[Constraint] = []
    for row in model.constraints:
        if row.sense != "<=":
            rows.append(replace(row, name=f"{row.name} from below", sense=">=", rhs=row.rhs - room(row.rhs)))
        if row.sense != ">=":
            rows.append(replace(row, name=f"{row.name} from above", sense="<=", rhs=row.rhs + room(row.rhs)))
    return replace(model, constraints=tuple(rows), units=())


def telling(settled: Sequence[Settled]) -> list[str]:
    """What to say about them: the violated ones by name, the others by number."""
    wrong = sorted((one for one in settled if one.verdict != "satisfied"), key=lambda one: one.slack)
    count = sum(not one.is_bound for one in settled)
    noun = "constraint" if count == 1 else "constraints"
    if not wrong and not count:
        return ["no constraint became constant"]
    if not wrong:
        return [f"{count} {noun} became constant, all satisfied"]
    lines = [f"{count} {noun} became constant; not satisfied: {len(wrong)}"]
    lines += [f"  {one.constraint}: {one.verdict}, by {short(-one.slack)}" for one in wrong[:6]]
    return [*lines, f"  and {len(wrong) - 6} more, see .settled"] if len(wrong) > 6 else lines
