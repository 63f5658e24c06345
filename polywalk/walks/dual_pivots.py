"""One pivot of the dual simplex method: a violated slack leaves, and the dual ratio test says what enters for it."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from fractions import Fraction
from functools import cached_property
from typing import NamedTuple

from polywalk.linear import Dictionary
from polywalk.linear.slacks import Integers
from polywalk.table import Table, cell
from polywalk.walks.pivots import Pivot


@dataclass(frozen=True)
class DualGoal:
    """The objective that stays dual feasible, turned to be maximized.

    Parameters
    ----------
    weights : mapping of int to int, or None
        Multiples of slacks, by index; None for the model's own objective.
    unit : int
        What the weights are multiplied by to be integers.
    """

    weights: Mapping[int, int] | None = None
    unit: int = 1

    def row(self, now: Dictionary) -> Integers:
        """The objective as a row of the dictionary."""
        return now.aim if self.weights is None else now.combination(self.weights)


class DualRatio(NamedTuple):
    """One line of a dual ratio test: a slack held at 0 that could enter.

    Parameters
    ----------
    name : str
    reduced_cost : Fraction
        The change of the objective in use per unit of this slack.
    rate : Fraction
        The change of the leaving slack per unit of this one; only a positive rate helps.
    ratio : Fraction or None
        What the objective loses per unit of the leaving slack; None where the slack does not help.
    enters : bool
    """

    name: str
    reduced_cost: Fraction
    rate: Fraction
    ratio: Fraction | None
    enters: bool


@dataclass(frozen=True, repr=False)
class DualPivot(Pivot):
    """One pivot of the dual simplex method.

    It starts outside the region: the leaving slack is negative and goes up to 0, so that the point always moves and
    ``kind`` is always "step". Where ``dual_step`` is 0 (dual degenerate) the objective stays all the same. The slacks
    that may enter are told in ``dual_ratios``; ``ratios`` is empty, since no slack is held back at 0.

    Parameters
    ----------
    goal : DualGoal
        The objective in use.
    rule : str
        The name of the rule that chose what leaves.
    stage : int
        1 where it is the Phase I of a primal walk, else 2.
    """

    goal: DualGoal = field(default=DualGoal(), compare=False)
    rule: str = ""
    stage: int = 2

    @property
    def dual(self) -> bool:
        """True: a pivot of the dual simplex method."""
        return True

    @property
    def outside(self) -> bool:
        """True: it starts outside the region."""
        return True

    @property
    def phase(self) -> int:
        """1 where it is the Phase I of a primal walk, else 2."""
        return self.stage

    @property
    def row_left(self) -> int:
        """The leaving slack's row."""
        assert self.row is not None
        return self.row

    @cached_property
    def reduced_costs(self) -> dict[str, Fraction]:
        """The change of the objective in use per unit of each slack held at 0.

        The model's own objective in its own sense. In a Phase I that had to put another one in its place, that one:
        minus the sum of the slacks held at the start, as typed.
        """
        now = self.before
        if self.goal.weights is None:
            return {name: now.reduced_cost(j) for j, name in enumerate(self.active_before)}
        row, unit, scales = self.goal.row(now), self.goal.unit * now.denominator, now.slacks.scales
        return {name: Fraction(row[j + 1] * scales[now.nonbasic[j]], unit) for j, name in enumerate(self.active_before)}

    @cached_property
    def dual_step(self) -> Fraction:
        """The dual ratio of the entering slack: what the objective in use loses per unit of the leaving slack."""
        return abs(self.reduced_costs[self.entering]) / self.before.rate(self.row_left, self.column)

    @property
    def short(self) -> Fraction:
        """How far below 0 the leaving slack is."""
        return -Fraction(self.before.values[self.leaving or ""])

    @property
    def ratios(self) -> tuple[()]:
        """Empty; see ``dual_ratios``."""
        return ()

    @cached_property
    def dual_ratios(self) -> tuple[DualRatio, ...]:
        """The whole dual ratio test, in the order of the columns; equalities never enter."""
        may = self.before.slacks.pivots
        return tuple(self._dual_ratio(j) for j, k in enumerate(self.before.nonbasic) if may[k])

    def _dual_ratio(self, column: int) -> DualRatio:
        name = self.active_before[column]
        cost, rate = self.reduced_costs[name], self.before.rate(self.row_left, column)
        return DualRatio(name, cost, rate, abs(cost) / rate if rate > 0 else None, column == self.column)

    def table(self) -> Table:
        """The dual ratio test, one row a slack held at 0."""
        title = f"pivot {self.number}: {self.leaving}, short by {cell(self.short)}, leaves; {self.entering} enters"
        rows = tuple((*ratio[:4], "enters" if ratio.enters else "") for ratio in self.dual_ratios)
        columns = ("held at 0", "reduced cost", f"rate of {self.leaving}", "dual ratio", "dual ratio test")
        return Table(title, columns, rows)
