"""Which slacks a dictionary runs over, what each is called, and how the decisions follow from them.

Every decision has a home slack: the distance to its first lower bound, else to its first upper bound; for x >= 0
that is x itself. The home slack carries the decision's name, every other slack its constraint's name. A decision
without a bound is free: it has a column of its own and no home constraint.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from math import lcm
from typing import Literal

from polywalk.exact import dot, integer_row
from polywalk.model import Model

Kind = Literal["slack", "free", "equality", "auxiliary"]
Integers = tuple[int, ...]

AUXILIARY = "auxiliary"
"""The name of the variable that Phase I drives to zero (longer where the model uses that name)."""


@dataclass(frozen=True)
class Slack:
    """One quantity of a dictionary.

    Parameters
    ----------
    name : str
    kind : {"slack", "free", "equality", "auxiliary"}
        Only a "slack" may enter and leave once the crash phase is over.
    constraint : int or None
        The place of the constraint it belongs to.
    scale : int
        The dictionary's integers hold ``scale`` times the slack, so that a row of fractions becomes one of integers.
    """

    name: str
    kind: Kind
    constraint: int | None = None
    scale: int = 1


@dataclass(frozen=True)
class Slacks:
    """All slacks of a model: the decisions' own first, then the other constraints', then the auxiliary.

    A slack's index is its place in ``items``; the first n belong to the n decisions: ``x_j = rest_j + side_j slack_j``.

    Parameters
    ----------
    model : Model
    items : tuple of Slack
    rests : (n,) tuple of Fraction
        Where each decision is while its home slack is 0; 0 for a free decision.
    sides : (n,) tuple of int
        -1 where the home slack is the distance to an upper bound, else 1.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.linear.slacks import slacks_of
    >>> model = pw.from_algebra(maximize="x", constraints={"labour": "x + y <= 4"}, bounds={"x": (None, 3)})
    >>> [(item.name, item.kind) for item in slacks_of(model).items]
    [('x', 'slack'), ('y', 'free'), ('labour', 'slack'), ('auxiliary', 'auxiliary')]
    """

    model: Model
    items: tuple[Slack, ...]
    rests: tuple[Fraction, ...]
    sides: Integers

    @cached_property
    def names(self) -> tuple[str, ...]:
        """The names, by index."""
        return tuple(item.name for item in self.items)

    @cached_property
    def scales(self) -> Integers:
        """The scales, by index."""
        return tuple(item.scale for item in self.items)

    @cached_property
    def common_scale(self) -> int:
        """The least common multiple of the scales."""
        return lcm(*self.scales)

    @cached_property
    def pivots(self) -> tuple[bool, ...]:
        """Which slacks may enter and leave, by index."""
        return tuple(item.kind == "slack" for item in self.items)

    @cached_property
    def blocks(self) -> tuple[bool, ...]:
        """Which slacks may not fall below zero, by index."""
        return tuple(item.kind in {"slack", "auxiliary"} for item in self.items)

    @cached_property
    def auxiliary(self) -> int:
        """The index of the auxiliary variable of Phase I."""
        return len(self.items) - 1

    @cached_property
    def of_constraint(self) -> dict[str, int]:
        """The index of each constraint's slack, by the constraint's name."""
        rows = self.model.constraints
        return {rows[item.constraint].name: k for k, item in enumerate(self.items) if item.constraint is not None}

    @cached_property
    def maximizes(self) -> bool:
        """Whether the objective is maximized (a model without an objective maximizes 0)."""
        return self.model.objective is None or self.model.objective.goal == "max"

    @cached_property
    def cost(self) -> tuple[Integers, int]:
        """The objective as integers over the decisions' own slacks, constant first, and its scale."""
        goal = self.model.objective
        if goal is None:
            return (0,) * (self.model.n + 1), 1
        return integer_row(self.in_slacks(goal.constant, goal.coefficients))

    def in_slacks(self, constant: Fraction, coefficients: tuple[Fraction, ...]) -> tuple[Fraction, ...]:
        """A linear function of the decisions as one of their own slacks, constant first."""
        moved = tuple(value if side > 0 else -value for value, side in zip(coefficients, self.sides, strict=True))
        return (constant + dot(coefficients, self.rests), *moved)


def slacks_of(model: Model) -> Slacks:
    """The slacks of a model, named and scaled."""
    homes = _homes(model)
    rests, sides = [Fraction(0)] * model.n, [1] * model.n
    for j, place in homes.items():
        row = model.constraints[place]
        rests[j] = row.rhs / row.coefficients[j]
        sides[j] = 1 if row.inward[1][j] > 0 else -1
    own = [Slack(name, "slack" if j in homes else "free", homes.get(j)) for j, name in enumerate(model.variables)]
    taken = set(homes.values())
    bare = Slacks(model, (), tuple(rests), tuple(sides))
    others = [_other(bare, place) for place in range(len(model.constraints)) if place not in taken]
    names = {item.name for item in (*own, *others)}
    auxiliary = AUXILIARY
    while auxiliary in names:
        auxiliary += " variable"
    return Slacks(model, (*own, *others, Slack(auxiliary, "auxiliary")), bare.rests, bare.sides)


def _homes(model: Model) -> dict[int, int]:
    """For each bounded decision the place of the bound it is at home with: the first lower, else the first upper."""
    found: dict[tuple[int, str], int] = {}
    for place, row in enumerate(model.constraints):
        bound = row.bounds()
        if bound is not None:
            found.setdefault(bound, place)
    sides = [(found.get((j, "lower")), found.get((j, "upper"))) for j in range(model.n)]
    best = {j: upper if lower is None else lower for j, (lower, upper) in enumerate(sides)}
    return {j: place for j, place in best.items() if place is not None}


def _other(bare: Slacks, place: int) -> Slack:
    """The slack of a constraint that is no decision's home."""
    row = bare.model.constraints[place]
    name = row.name
    taken = {*bare.model.variables, *(other.name for other in bare.model.constraints)} - {row.name}
    if name in bare.model.variables:
        name += " slack"
        while name in taken:
            name += " slack"
    _, scale = integer_row(bare.in_slacks(*row.inward))
    return Slack(name, "equality" if row.sense == "==" else "slack", place, scale)
