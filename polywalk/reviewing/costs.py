"""The walk along the pieces of the optimal value while one cost varies.

While an optimal point stays optimal the value is a line whose slope is the point's value of the variable. So a piece is
walked by its point: the one of the optimal face that reaches farthest along the variable, as long as the constraints
active there still make up the objective.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from typing import Literal

from polywalk.exact import Row
from polywalk.linear import Optimum, optimum
from polywalk.model import Goal, Model, Objective
from polywalk.reviewing.duals import dual_model
from polywalk.reviewing.extended import Extended
from polywalk.reviewing.pieces import Parameter, Piece
from polywalk.reviewing.ranges import cost_range


@dataclass(frozen=True)
class Cost:
    """One cost of a model, made to vary.

    Parameters
    ----------
    model : Model
    place : int
        The variable.

    Examples
    --------
    >>> from fractions import Fraction
    >>> import polywalk as pw
    >>> from polywalk.reviewing.costs import Cost
    >>> model = pw.from_algebra(maximize="x + y", constraints={"cap": "x + 2*y <= 4"},
    ...                         bounds={"x": (0, 3), "y": (0, 5)})
    >>> [piece.slope for piece in Cost(model, 0).side(Fraction(0), 1)]
    [Fraction(0, 1), Fraction(3, 1)]
    """

    model: Model
    place: int

    def best(self, t: Fraction) -> Optimum:
        """The optimum for one value of the cost."""
        return optimum(replace(self.model, objective=self._objective(t)))

    def start(self, now: Fraction) -> Fraction | None:
        """A value of the cost with an optimum, the present one where it has one; None where none has."""
        if self.best(now).outcome == "optimal":
            return now
        ends = Parameter(dual_model(self.model), f"c{self.place}").ends
        if ends is None:
            return None
        found = min(max(now, ends[0]), ends[1])
        assert isinstance(found, Fraction)
        return found

    def side(self, start: Fraction, way: Literal[-1, 1]) -> tuple[Piece, ...]:
        """The pieces from a start to one side, in the order of the cost."""
        t: Extended = start
        pieces = list[Piece]()
        while isinstance(t, Fraction):
            best = self.best(t)
            point = self._farthest(best, way)
            if point is None or best.value is None:  # a step further the model is unbounded
                break
            low, high = cost_range(best.model, point, self.place)
            slope = point[self.place]
            pieces.append(Piece(low, high, slope, best.value - slope * t))
            t = high if way > 0 else low
        return tuple(pieces if way > 0 else reversed(pieces))

    def _farthest(self, best: Optimum, way: Literal[-1, 1]) -> Row | None:
        """The optimal point whose line is best on one side; None where they have no end."""
        assert best.face is not None
        goal: Goal = "max" if (self._goal.goal == "max") == (way > 0) else "min"
        along = tuple(Fraction(int(j == self.place)) for j in range(self.model.n))
        found = optimum(replace(best.face, objective=Objective(goal, along)))
        return found.point if found.outcome == "optimal" else None

    @property
    def _goal(self) -> Objective:
        if self.model.objective is None:
            raise ValueError("only a model with an objective has costs")
        return self.model.objective

    def _objective(self, t: Fraction) -> Objective:
        costs = self._goal.coefficients
        return replace(self._goal, coefficients=(*costs[: self.place], t, *costs[self.place + 1 :]))
