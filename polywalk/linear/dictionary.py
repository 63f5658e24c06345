"""One exact dictionary over the slacks of all constraints, and one pivot. Frozen: a pivot returns a new one.

A dictionary writes every basic slack, and the objective, as a linear function of the nonbasic ones, which are at 0.
All entries are integers over one common denominator, and a pivot keeps them so without any greatest common divisor:
each entry is a minor of the first dictionary, so that the division by the old denominator leaves no remainder.

References
----------
Chvátal, Linear Programming, 1983, chapters 2 and 3 (dictionaries; the auxiliary variable).
Edmonds, Systems of distinct representatives and linear algebra, J. Res. NBS 71B, 1967;
Bareiss, Sylvester's identity and multistep integer-preserving Gaussian elimination, Math. Comp. 22, 1968.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property

from polywalk.exact import Row, integer_row, linear
from polywalk.linear.slacks import Integers, Slacks, slacks_of
from polywalk.model import Model


@dataclass(frozen=True, repr=False)
class Dictionary:
    """Basic slacks and objective in terms of the nonbasic slacks.

    Slacks are given by index (see Slacks). What counts for a rule is the slack as the constraint was typed: a row
    multiplied by 6 has a slack six times as large. ``values``, ``rate`` and ``reduced_cost`` speak of that slack.

    Parameters
    ----------
    slacks : Slacks
    basic : (m,) tuple of int
        The slack each row stands for; the entering slack takes the row of the leaving one.
    nonbasic : (k,) tuple of int
        The slack each column stands for; k = n, and n + 1 in Phase I.
    rows : (m,) tuple of (k + 1,) tuple of int
        Scaled basic slack times ``denominator``: constant first, then one coefficient a column.
    cost : (k + 1,) tuple of int
        The same for the objective, in its own sense.
    denominator : int
        Positive.
    relaxed_slacks : tuple of int, optional
        In Phase I: the slacks the auxiliary variable is added to.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.linear import dictionary_of
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "2*x + y <= 4"},
    ...                         bounds={"x": (0, None), "y": (0, None)})
    >>> first = dictionary_of(model)
    >>> print(first.pivot(row=0, column=0))
    x = -0.5 labour - 0.5 y + 2
    objective = -1.5 labour + 0.5 y + 6
    """

    slacks: Slacks
    basic: Integers
    nonbasic: Integers
    rows: tuple[Integers, ...]
    cost: Integers
    denominator: int
    relaxed_slacks: Integers = ()

    def pivot(self, row: int, column: int) -> Dictionary:
        """The dictionary in which the slack of the column is basic and the slack of the row is not.

        Raises ZeroDivisionError where the row does not depend on the column.
        """
        old, leaving, place = self.denominator, self.rows[row], column + 1
        pivot = leaving[place]
        if pivot == 0:
            raise ZeroDivisionError("the row does not depend on the column")
        new = abs(pivot)
        turned = [-value for value in leaving] if pivot > 0 else list(leaving)
        turned[place] = old if pivot > 0 else -old
        added = turned.copy()
        added[place] -= new  # so that below the column's own entry becomes plus or minus the rate

        lines = []
        for line in (*self.rows, self.cost):
            rate = line[place]
            pairs = zip(line, added, strict=True)
            if new == old == 1:  # as so often: nothing to multiply by or to divide by
                lines.append(tuple([value + rate * other for value, other in pairs]) if rate else line)
            elif rate:
                lines.append(tuple([(value * new + rate * other) // old for value, other in pairs]))
            else:
                lines.append(line if new == old else tuple([value * new // old for value in line]))
        lines[row] = tuple(turned)
        basic, nonbasic = list(self.basic), list(self.nonbasic)
        basic[row], nonbasic[column] = nonbasic[column], basic[row]
        rows, cost = tuple(lines[:-1]), lines[-1]
        return Dictionary(self.slacks, tuple(basic), tuple(nonbasic), rows, cost, new, self.relaxed_slacks)

    @cached_property
    def phase(self) -> int:
        """1 while the auxiliary variable is there, else 2."""
        auxiliary = self.slacks.auxiliary
        return 1 if auxiliary in self.nonbasic or auxiliary in self.basic else 2

    @property
    def feasible(self) -> bool:
        """Whether no slack is negative."""
        return all(line[0] >= 0 for _, line in self.blocking_rows())

    # what a rule asks

    @cached_property
    def aim(self) -> Integers:
        """What is being increased: the objective (negated for a minimum), in Phase I the auxiliary negated."""
        if self.slacks.auxiliary in self.basic:
            return tuple(-value for value in self.rows[self.basic.index(self.slacks.auxiliary)])
        return self.cost if self.slacks.maximizes else tuple(-value for value in self.cost)

    def improving(self) -> list[int]:
        """The columns that may enter: their slack improves the objective as it grows."""
        may, aim = self.slacks.pivots, self.aim
        return [j for j, k in enumerate(self.nonbasic) if aim[j + 1] > 0 and may[k]]

    def gain(self, column: int) -> int:
        """How fast the objective improves per unit of the column's slack, times a positive number common to all."""
        return self.aim[column + 1] * self.slacks.scales[self.nonbasic[column]]

    def combination(self, weights: Mapping[int, int]) -> Integers:
        """A linear function of slacks, given by index and scaled as the rows are, as a row of this dictionary."""
        total = [0] * (len(self.nonbasic) + 1)
        for j, k in enumerate(self.nonbasic):
            total[j + 1] = weights.get(k, 0) * self.denominator
        for k, line in zip(self.basic, self.rows, strict=True):
            if weight := weights.get(k, 0):
                total = [value + weight * entry for value, entry in zip(total, line, strict=True)]
        return tuple(total)

    def blocking_rows(self) -> Iterator[tuple[int, Integers]]:
        """The rows whose slack may not fall below zero, each with its place."""
        blocks = self.slacks.blocks
        return ((i, line) for i, line in enumerate(self.rows) if blocks[self.basic[i]])

    def first_to_run_out(self, column: int) -> list[int]:
        """The ratio test: the rows whose slack reaches 0 first as the column's slack grows; none on a ray.

        Where the auxiliary is among them it is the only one returned: it leaves on ties, and Phase I is over.
        """
        blocks, place, tied = self.slacks.blocks, column + 1, list[int]()
        value, fall = 0, 0
        for i, line in enumerate(self.rows):
            rate = line[place]
            if rate < 0 and blocks[self.basic[i]]:
                order = line[0] * fall + value * rate  # the sign of this ratio minus the smallest so far
                if order < 0 or not tied:
                    tied, value, fall = [i], line[0], -rate
                elif order == 0:
                    tied.append(i)
        auxiliary = self.slacks.auxiliary
        return [i for i in tied if self.basic[i] == auxiliary] or tied

    # what a reader asks, exact

    @cached_property
    def values(self) -> dict[str, Fraction]:
        """Every slack by name, at this dictionary's point; in Phase I with the auxiliary added to the relaxed ones."""
        items = self.slacks
        found = dict.fromkeys((items.names[k] for k in self.nonbasic), Fraction(0))
        for k, line in zip(self.basic, self.rows, strict=True):
            found[items.names[k]] = Fraction(line[0], self.denominator * items.scales[k])
        return found

    @cached_property
    def point(self) -> Row:
        """The decisions, in the model's order."""
        placed = zip(self.slacks.rests, self.slacks.sides, self._own(0), strict=True)
        return tuple(rest + side * value for rest, side, value in placed)

    def direction(self, column: int) -> Row:
        """How the decisions move per unit of the column's slack."""
        own = self._own(column + 1, self.nonbasic[column])
        unit = self.slacks.scales[self.nonbasic[column]]
        return tuple(side * value * unit for side, value in zip(self.slacks.sides, own, strict=True))

    def _own(self, place: int, entering: int = -1) -> Row:
        """The decisions' own slacks in one column (0: the constants), the auxiliary taken out of the relaxed ones."""
        scales, n = self.slacks.scales, self.slacks.model.n
        own = {
            k: Fraction(line[place], self.denominator * scales[k])
            for k, line in zip(self.basic, self.rows, strict=True)
            if k < n or k == self.slacks.auxiliary
        }
        if entering >= 0:
            own[entering] = Fraction(1, scales[entering])
        short = own.get(self.slacks.auxiliary, Fraction(0))
        return tuple(own.get(k, Fraction(0)) - (short if k in self.relaxed_slacks else 0) for k in range(n))

    @property
    def objective(self) -> Fraction:
        """The objective at this dictionary's point, constant included; 0 where the model has none."""
        return Fraction(self.cost[0], self.denominator * self.slacks.cost[1])

    def reduced_cost(self, column: int) -> Fraction:
        """The change of the objective, in its own sense, per unit of the column's slack."""
        scale = self.slacks.scales[self.nonbasic[column]]
        return Fraction(self.cost[column + 1] * scale, self.denominator * self.slacks.cost[1])

    def rate(self, row: int, column: int) -> Fraction:
        """The change of the row's slack per unit of the column's slack."""
        scales = self.slacks.scales
        entry = self.rows[row][column + 1] * scales[self.nonbasic[column]]
        return Fraction(entry, self.denominator * scales[self.basic[row]])

    def __str__(self) -> str:
        names = [self.slacks.names[k] for k in self.nonbasic]
        columns = range(len(names))
        lines = [
            f"{name} = {linear([self.rate(i, j) for j in columns], names, self.values[name])}"
            for i, name in enumerate(self.slacks.names[k] for k in self.basic)
        ]
        goal = linear([self.reduced_cost(j) for j in columns], names, self.objective)
        return "\n".join([*lines, f"objective = {goal}"])

    __repr__ = __str__


def dictionary_of(model: Model) -> Dictionary:
    """The first dictionary of a model: every other constraint's slack in terms of the decisions' own slacks.

    Free decisions and equalities are still in the way; see ``crash``.
    """
    items = slacks_of(model)
    places = range(model.n, items.auxiliary)
    rows = tuple(_first_row(items, k) for k in places)
    return Dictionary(items, tuple(places), tuple(range(model.n)), rows, items.cost[0], 1)


def _first_row(items: Slacks, index: int) -> Integers:
    place = items.items[index].constraint
    assert place is not None
    return integer_row(items.in_slacks(*items.model.constraints[place].inward))[0]
