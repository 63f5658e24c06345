"""Where a slider for one number of a model may stop: a round grid over the range that matters, and the breakpoints.

The range is read from the region (what the row can reach without itself) and from the value function (where its slope
changes, and where it ends); a little is added on both sides, so that one can see what lies beyond.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from math import ceil, floor, log10
from typing import Literal

from polywalk.linear import optimum
from polywalk.model import Goal, Model, Objective
from polywalk.reviewing.value import ValueFunction, value_function

Kind = Literal["right-hand side", "cost"]

STEPS = 100
"""About so many stops: a slider of some 300 pixels tells no more apart."""

MARGIN = Fraction(1, 10)
"""Added on both sides, as a share of the range. Common practice, no source."""


@dataclass(frozen=True)
class Stops:
    """The values a slider offers.

    Parameters
    ----------
    kind : {"right-hand side", "cost"}
    name : str
        The constraint, or the variable.
    values : tuple of Fraction
        Ascending; the present value and every breakpoint are among them.
    marks : tuple of Fraction
        Breakpoints of the value function and its ends, as far as they are finite and known.
    function : ValueFunction or None
        None where it was not asked for.
    """

    kind: Kind
    name: str
    values: tuple[Fraction, ...]
    marks: tuple[Fraction, ...] = ()
    function: ValueFunction | None = None

    def place(self, value: Fraction) -> int | None:
        """Which of the values it is; None where it is none of them."""
        return self.values.index(value) if value in self.values else None


def number_of(model: Model, kind: Kind, name: str) -> Fraction:
    """The right-hand side or cost as it is; 0 for a cost without an objective."""
    if kind == "right-hand side":
        return model.constraint(name).rhs
    place = model.index(name)
    return model.objective.coefficients[place] if model.objective else Fraction(0)


def with_number(model: Model, kind: Kind, name: str, value: Fraction) -> Model:
    """A copy with another right-hand side or cost; a model without objective gets one to maximize."""
    if kind == "right-hand side":
        return model.with_rhs(name, value)
    goal = model.objective or Objective("max", (Fraction(0),) * model.n)
    costs = dict(zip(model.variables, goal.coefficients, strict=True)) | {name: value}
    model.index(name)
    return model.with_objective(costs, goal.goal, goal.constant)


def stops(model: Model, kind: Kind, name: str, *, breakpoints: bool = True) -> Stops:
    """The stops for one number of a model.

    Parameters
    ----------
    model : Model
    kind : {"right-hand side", "cost"}
    name : str
        The constraint, or the variable.
    breakpoints : bool, optional
        False leaves the value function out, which takes seconds for a large model.

    Raises
    ------
    UnknownName
        A name that is not in the model.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.stops import stops
    >>> model = pw.from_algebra(maximize="3*x + 5*y", bounds={"x": (0, 4), "y": (0, None)},
    ...                         constraints={"doors": "2*y <= 12", "hours": "3*x + 2*y <= 18"})
    >>> found = stops(model, "right-hand side", "hours")
    >>> [str(value) for value in found.marks]
    ['0', '12', '24']
    >>> found.values[0] < 0, found.values[-1] > 24
    (True, True)
    """
    now = number_of(model, kind, name)
    function = None
    marks: set[Fraction] = set()
    if breakpoints:
        asked = {"rhs": name} if kind == "right-hand side" else {"cost": name}
        function = value_function(model, **asked)
        ends = [end for end in (function.low, function.high) if isinstance(end, Fraction)]
        marks = {*function.breakpoints, *ends}
    reach = _reach(model, name) if kind == "right-hand side" else set()
    values = _grid({now, *marks, *reach})
    return Stops(kind, name, tuple(sorted({*values, now, *marks})), tuple(sorted(marks)), function)


def _reach(model: Model, name: str) -> set[Fraction]:
    """The least and greatest value of a row's left side over the region without the row, where there are any."""
    row, rest = model.constraint(name), model.without(name)
    goals: tuple[Goal, Goal] = ("min", "max")
    found = [optimum(_aimed(rest, Objective(goal, row.coefficients))) for goal in goals]
    return {end.value for end in found if end.value is not None}


def _aimed(model: Model, goal: Objective) -> Model:
    names = dict(zip(model.variables, goal.coefficients, strict=True))
    return model.with_objective(names, goal.goal)


def _grid(points: set[Fraction]) -> set[Fraction]:
    """Round numbers from a little below the least of the points to a little above the greatest."""
    low, high = min(points), max(points)
    pad = (high - low) * MARGIN or max(Fraction(1), abs(high))
    step = _round_step((high - low + 2 * pad) / STEPS)
    return {k * step for k in range(floor((low - pad) / step), ceil((high + pad) / step) + 1)}


def _round_step(size: Fraction) -> Fraction:
    """The next 1, 2 or 5 times a power of ten."""
    power = Fraction(10) ** floor(log10(size))
    return next(factor * power for factor in (1, 2, 5, 10, 20) if factor * power >= size)
