"""The walk along the pieces of the optimal value while one right-hand side varies.

The right-hand side becomes a variable t beside the others: all feasible (x, t) are one polyhedron. The optimal value
is its upper (of a minimum: lower) boundary in the plane of t and the objective. A piece is walked from one end: its
slope is an extreme optimal multiplier there, and it goes on as far as its line touches the polyhedron.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property
from typing import Literal

from polywalk.linear import optimum
from polywalk.model import Constraint, Goal, Model, Objective
from polywalk.reviewing.duals import OptimalDuals, optimal_duals
from polywalk.reviewing.extended import INFINITY, Extended


@dataclass(frozen=True)
class Piece:
    """One linear piece: ``value = intercept + slope * t`` for t from ``low`` to ``high``, which may be infinite."""

    low: Extended
    high: Extended
    slope: Fraction
    intercept: Fraction

    def holds(self, t: Fraction) -> bool:
        """Whether t lies on the piece, ends included."""
        return self.low <= t <= self.high

    def at(self, t: Fraction) -> Fraction:
        """The value of the piece's line."""
        return self.intercept + self.slope * t


@dataclass(frozen=True)
class Parameter:
    """One right-hand side of a model with an objective, made to vary.

    Parameters
    ----------
    model : Model
    name : str
        The constraint.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.pieces import Parameter
    >>> Parameter(pw.from_algebra(maximize="x", constraints={"cap": "x <= 3"}, bounds={"x": (1, 5)}), "cap").ends
    (Fraction(1, 1), inf)
    """

    model: Model
    name: str

    def duals(self, t: Fraction) -> OptimalDuals | None:
        """The optimal duals for one value of the right-hand side; None without an optimum."""
        return optimal_duals(self.model.with_rhs(self.name, t))

    @cached_property
    def ends(self) -> tuple[Extended, Extended] | None:
        """Between which values the model is feasible; None if for none."""
        low, high = _last(self._wide, "min"), _last(self._wide, "max")
        return None if low is None or high is None else (low, high)

    @cached_property
    def _wide(self) -> Model:
        """The model with the right-hand side as a last variable; without objective, its rows called by number."""
        rows = []
        for i, row in enumerate(self.model.constraints):
            shift, rhs = (-Fraction(1), Fraction(0)) if row.name == self.name else (Fraction(0), row.rhs)
            rows.append(Constraint(f"row {i}", (*row.coefficients, shift), row.sense, rhs))
        return Model(tuple(f"v{j}" for j in range(self.model.n + 1)), tuple(rows))

    def slope(self, duals: OptimalDuals, way: Literal[-1, 1]) -> Extended:
        """The slope of the optimal value to one side of where these duals are optimal.

        Of a maximum the value is concave: the right slope is the least multiplier, the left one the greatest; of a
        minimum the other way round.
        """
        least, most = duals.extremes(self.name)
        return least if duals.maximizes == (way > 0) else most

    def piece(self, duals: OptimalDuals, slope: Fraction) -> Piece:
        """The whole piece of this slope through the optimal value of these duals."""
        goal, t = duals.goal, duals.model.constraint(self.name).rhs
        intercept = duals.value - slope * t
        line = Constraint("the line", (*goal.coefficients, -slope), "==", intercept - goal.constant)
        held = replace(self._wide, constraints=(*self._wide.constraints, line))
        low, high = _last(held, "min"), _last(held, "max")
        if low is None or high is None:
            raise AssertionError("the line of a piece touches where it was taken")
        return Piece(low, high, slope, intercept)

    def side(self, first: OptimalDuals, way: Literal[-1, 1]) -> tuple[Piece, ...]:
        """The pieces from a start to one side, in the order of the parameter."""
        duals: OptimalDuals | None = first
        pieces = list[Piece]()
        while duals is not None:
            slope = self.slope(duals, way)
            if not isinstance(slope, Fraction):  # a step further the model is infeasible
                break
            pieces.append(self.piece(duals, slope))
            ahead = pieces[-1].high if way > 0 else pieces[-1].low
            duals = self.duals(ahead) if isinstance(ahead, Fraction) else None
        return tuple(pieces if way > 0 else reversed(pieces))


def _last(wide: Model, goal: Goal) -> Extended | None:
    """The least or the greatest value of the last variable; None where the model is infeasible."""
    last = (*[Fraction(0)] * (wide.n - 1), Fraction(1))
    found = optimum(replace(wide, objective=Objective(goal, last)))
    if found.outcome == "infeasible":
        return None
    return found.value if found.value is not None else INFINITY if goal == "max" else -INFINITY
