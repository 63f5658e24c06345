"""One pivot of a walk, with all it was decided by. Everything is computed from the two dictionaries on first use."""

from __future__ import annotations

from dataclasses import dataclass, field
from fractions import Fraction
from functools import cached_property
from typing import Literal, NamedTuple

from polywalk.exact import Row
from polywalk.linear import Dictionary
from polywalk.table import Shown, Table, cell
from polywalk.walks.rules import Rules

Kind = Literal["step", "degenerate", "ray"]


class Ratio(NamedTuple):
    """One line of a ratio test: a slack, how fast it changes, and at which step it runs out.

    Parameters
    ----------
    name : str
    slack : Fraction
        Before the pivot.
    rate : Fraction
        Its change per unit of the entering slack.
    ratio : Fraction or None
        The step at which it reaches 0; None where it never does.
    leaves : bool
    """

    name: str
    slack: Fraction
    rate: Fraction
    ratio: Fraction | None
    leaves: bool


@dataclass(frozen=True, repr=False)
class Pivot(Shown):
    """One pivot.

    In Phase I (``phase`` 1) the auxiliary variable is being lowered: reduced costs are those of the auxiliary, and the
    slacks that were basic when it came are told with it added. Its own entry, the first pivot, moves no decision.

    Parameters
    ----------
    number : int
        From 1.
    before, after : Dictionary
        The same one for a ray. After the pivot in which the auxiliary leaves, its column is dropped.
    column : int
        The entering slack's column in ``before``.
    row : int or None
        The leaving slack's row in ``before``; None on a ray.
    rules : Rules or None
        The pair that chose it.
    """

    number: int
    before: Dictionary
    after: Dictionary
    column: int
    row: int | None
    rules: Rules | None = field(default=None, compare=False)

    @property
    def phase(self) -> int:
        """1 while the auxiliary variable is there, else 2."""
        return self.before.phase

    @property
    def dual(self) -> bool:
        """Whether it is a pivot of the dual simplex method."""
        return False

    @property
    def outside(self) -> bool:
        """Whether it starts outside the region: Phase I and dual pivots do."""
        return self.phase == 1

    @property
    def entering(self) -> str:
        """The name of the slack that leaves 0."""
        return self.before.slacks.names[self.before.nonbasic[self.column]]

    @property
    def leaving(self) -> str | None:
        """The name of the slack that is held at 0 from now on; None on a ray."""
        return None if self.row is None else self.before.slacks.names[self.before.basic[self.row]]

    @cached_property
    def step(self) -> Fraction | None:
        """The step length: the value the entering slack rises to; None on a ray."""
        if self.row is None:
            return None
        line = self.before.rows[self.row]
        scale = self.before.slacks.scales[self.before.nonbasic[self.column]]
        return Fraction(-line[0], line[self.column + 1] * scale)

    @property
    def kind(self) -> Kind:
        """ "ray" where nothing runs out, "degenerate" where the step length is 0, else "step".

        So "degenerate" always means that the point stays where it is.
        """
        if self.row is None:
            return "ray"
        return "step" if self.before.rows[self.row][0] else "degenerate"

    @property
    def basis_before(self) -> tuple[str, ...]:
        """The basic slacks before."""
        return _names(self.before, self.before.basic)

    @property
    def basis_after(self) -> tuple[str, ...]:
        """The basic slacks after."""
        return _names(self.after, self.after.basic)

    @property
    def active_before(self) -> tuple[str, ...]:
        """The slacks held at 0 before."""
        return _names(self.before, self.before.nonbasic)

    @property
    def active_after(self) -> tuple[str, ...]:
        """The slacks held at 0 after."""
        return _names(self.after, self.after.nonbasic)

    @cached_property
    def reduced_costs(self) -> dict[str, Fraction]:
        """The change of the objective, in its own sense, per unit of each slack held at 0; in Phase I the auxiliary's.

        A minimum is improved by a negative one, a maximum by a positive one. An equality's slack never enters.
        """
        now = self.before
        columns = range(len(now.nonbasic))
        if self.phase == 2:
            return {name: now.reduced_cost(j) for j, name in zip(columns, self.active_before, strict=True)}
        auxiliary = now.slacks.auxiliary
        if auxiliary in now.nonbasic:
            return {name: Fraction(now.nonbasic[j] == auxiliary) for j, name in enumerate(self.active_before)}
        row = now.basic.index(auxiliary)
        return {name: now.rate(row, j) for j, name in zip(columns, self.active_before, strict=True)}

    @cached_property
    def direction(self) -> Row:
        """How the decisions move per unit of the entering slack, in the model's order."""
        return self.before.direction(self.column)

    @cached_property
    def rates(self) -> dict[str, Fraction]:
        """How every slack changes per unit of the entering one."""
        found = dict.fromkeys(self.active_before, Fraction(0))
        found |= {name: self.before.rate(i, self.column) for i, name in enumerate(self.basis_before)}
        return found | {self.entering: Fraction(1)}

    @cached_property
    def ratios(self) -> tuple[Ratio, ...]:
        """The whole ratio test, in the order of the rows.

        Where the auxiliary enters, it rises until the most violated constraint is satisfied: there the largest leaves.
        """
        return tuple(self._ratio(i) for i, _ in self.before.blocking_rows())

    def _ratio(self, row: int) -> Ratio:
        name = self.before.slacks.names[self.before.basic[row]]
        slack, rate = self.before.values[name], self.before.rate(row, self.column)
        runs_out = rate < 0 or slack < 0
        return Ratio(name, slack, rate, -slack / rate if runs_out else None, row == self.row)

    @property
    def point_before(self) -> Row:
        """The decisions before."""
        return self.before.point

    @property
    def point_after(self) -> Row:
        """The decisions after."""
        return self.after.point

    @property
    def objective_before(self) -> Fraction:
        """The objective before, constant included."""
        return self.before.objective

    @property
    def objective_after(self) -> Fraction:
        """The objective after, constant included."""
        return self.after.objective

    def table(self) -> Table:
        """The ratio test, one row a slack."""
        if self.row is None:
            title = f"pivot {self.number}: {self.entering} enters, nothing ever runs out"
        else:
            title = f"pivot {self.number}: {self.entering} enters, {self.leaving} leaves at step {cell(self.step)}"
        rows = tuple((*ratio[:4], "leaves" if ratio.leaves else "") for ratio in self.ratios)
        return Table(title, ("slack", "now", "rate", "runs out at step", "ratio test"), rows)

    def story(self) -> str:
        """The pivot in a few plain sentences with exact numbers."""
        from polywalk.walks.story import story

        return story(self)


def _names(dictionary: Dictionary, indices: tuple[int, ...]) -> tuple[str, ...]:
    names = dictionary.slacks.names
    return tuple(names[k] for k in indices)
