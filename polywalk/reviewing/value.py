"""The optimal value as an exact piecewise-linear function of one right-hand side or of one cost.

References
----------
Gal, Postoptimal Analyses, Parametric Programming, and Related Topics, 1979.
Gass & Saaty, The computational algorithm for the parametric objective function, Naval Res. Logist. Quart. 2, 1955.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from typing import Literal

from polywalk.errors import ModelError
from polywalk.exact import exact
from polywalk.linear import optimum
from polywalk.model import Model
from polywalk.region import Region
from polywalk.reviewing.costs import Cost
from polywalk.reviewing.extended import INFINITY, Extended, shown, told
from polywalk.reviewing.pieces import Parameter, Piece
from polywalk.table import Shown, Table

Outcome = Literal["optimal", "unbounded", "infeasible", "no objective"]


@dataclass(frozen=True, repr=False)
class ValueFunction(Shown):
    """The optimal value as a function of one number of the model.

    Parameters
    ----------
    model : Model
    kind : {"right-hand side", "cost"}
    name : str
        The constraint whose right-hand side varies, or the variable whose cost (objective coefficient) does.
    outcome : {"optimal", "unbounded", "infeasible", "no objective"}
        "optimal" where there is an optimum for some value of the parameter; else what the model is for all of them
        that leave it feasible at all.
    low, high : Fraction, infinity or None
        The values of the parameter between which there is an optimum; None without one.
    pieces : tuple of Piece
        In order, each as long as it can be; none where a single value of the parameter has an optimum.
    corners : tuple of (Fraction, Fraction)
        (parameter, optimal value) at every end of a piece that is not infinite.
    """

    model: Model
    kind: Literal["right-hand side", "cost"]
    name: str
    outcome: Outcome
    low: Extended | None = None
    high: Extended | None = None
    pieces: tuple[Piece, ...] = ()
    corners: tuple[tuple[Fraction, Fraction], ...] = ()

    @property
    def current(self) -> Fraction:
        """The parameter's value in the model."""
        if self.kind == "right-hand side":
            return self.model.constraint(self.name).rhs
        goal = self.model.objective
        return goal.coefficients[self.model.index(self.name)] if goal else Fraction(0)

    @property
    def breakpoints(self) -> tuple[Fraction, ...]:
        """Where the slope changes; the ends of the function are not among them."""
        return tuple(t for t, _ in self.corners if t not in (self.low, self.high))

    @property
    def beyond(self) -> str:
        """What the model is where the function has no value: infeasible or unbounded."""
        return "infeasible" if self.kind == "right-hand side" else "unbounded"

    def at(self, value: object) -> Fraction | None:
        """The optimal value for a value of the parameter; None where there is no optimum."""
        t = exact(value)
        found = next((piece.at(t) for piece in self.pieces if piece.holds(t)), None)
        return dict(self.corners).get(t) if found is None else found

    def slopes(self, value: object) -> tuple[Extended, Extended] | None:
        """The slope to the left and to the right of a value of the parameter; None where there is no optimum.

        Infinite where a step to that side leaves no optimum: each with the sign that the objective getting worse (for
        a cost: better) for ever has.
        """
        t = exact(value)
        if self.at(t) is None:
            return None
        left = next((piece.slope for piece in self.pieces if piece.low < t <= piece.high), None)
        right = next((piece.slope for piece in self.pieces if piece.low <= t < piece.high), None)
        goal = self.model.objective
        falls = (goal is not None and goal.goal == "max") == (self.kind == "right-hand side")
        edge = INFINITY if falls else -INFINITY
        return (edge if left is None else left), (-edge if right is None else right)

    def table(self) -> Table:
        """Every piece as a row."""
        what = f"{self.kind} of {self.name}"
        goal = self.model.objective
        if goal is None or self.outcome != "optimal":
            why = "the model has no objective" if goal is None else f"the model is {self.outcome} whatever it is"
            return Table(f"the optimal value has no value as a function of the {what}: {why}", (), ())
        rows = tuple((shown(p.low), shown(p.high), p.slope, p.intercept) for p in self.pieces)
        ends = [f"at {told(t)} the optimal value is {told(value)}" for t, value in self.corners]
        sides = [(self.low, "below"), (self.high, "above")]
        ends += [f"{side} {told(end)} the model is {self.beyond}" for end, side in sides if isinstance(end, Fraction)]
        now = self.at(self.current)
        ends.append(f"now {told(self.current)}: {self.beyond if now is None else f'optimal value {told(now)}'}")
        return Table(
            f"the optimal value as a function of the {what}", ("from", "to", "slope", "intercept"), rows, tuple(ends)
        )


def value_function(source: Model | Region, *, rhs: str | None = None, cost: str | None = None) -> ValueFunction:
    """The optimal value as an exact piecewise-linear function of one right-hand side or one cost.

    Parameters
    ----------
    source : Model or Region
    rhs : str, optional
        The constraint whose right-hand side varies.
    cost : str, optional
        The variable whose objective coefficient varies. Give one of the two.

    Returns
    -------
    ValueFunction
        Its slope is the shadow price of the constraint, or the value of the variable in an optimal plan.

    Raises
    ------
    ModelError
        Both given, or none.
    UnknownName
        A name that is not in the model.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.value import value_function
    >>> model = pw.from_algebra(maximize="3*x + 5*y", bounds={"x": (0, 4), "y": (0, None)},
    ...                         constraints={"doors": "2*y <= 12", "hours": "3*x + 2*y <= 18"})
    >>> print(value_function(model, rhs="hours"))
    the optimal value as a function of the right-hand side of hours
    from  to  slope  intercept
    0     12  2.5    0
    12    24  1      18
    24    ∞   0      42
    at 0 the optimal value is 0
    at 12 the optimal value is 30
    at 24 the optimal value is 42
    below 0 the model is infeasible
    now 18: optimal value 36

    References
    ----------
    Gal, Postoptimal Analyses, Parametric Programming, and Related Topics, 1979; Gass & Saaty, The computational
    algorithm for the parametric objective function, Naval Res. Logist. Quart. 2, 1955.
    """
    model = source.model if isinstance(source, Region) else source
    if (rhs is None) == (cost is None):
        got = "both" if rhs is not None else "neither"
        raise ModelError(
            f"expected rhs=<name of a constraint> or cost=<name of a variable>, got {got}; give one of them.",
            (rhs, cost),
        )
    if rhs is not None:
        model.constraint(rhs)
        return _of_rhs(model, rhs)
    assert cost is not None
    return _of_cost(model, cost, model.index(cost))


def _of_rhs(model: Model, name: str) -> ValueFunction:
    blank = ValueFunction(model, "right-hand side", name, "no objective")
    if model.objective is None:
        return blank
    parameter = Parameter(model, name)
    if parameter.ends is None:
        return replace(blank, outcome="infeasible")
    start = min(max(blank.current, parameter.ends[0]), parameter.ends[1])
    assert isinstance(start, Fraction)
    first = parameter.duals(start)
    if first is None:  # then it is unbounded for every right-hand side
        return replace(blank, outcome="unbounded")
    return _joined(blank, parameter.side(first, -1), parameter.side(first, 1), (start, first.value))


def _of_cost(model: Model, name: str, place: int) -> ValueFunction:
    blank = ValueFunction(model, "cost", name, "no objective")
    if model.objective is None:
        return blank
    if optimum(model.without_objective()).outcome == "infeasible":
        return replace(blank, outcome="infeasible")
    cost = Cost(model, place)
    start = cost.start(blank.current)
    if start is None:
        return replace(blank, outcome="unbounded")
    value = cost.best(start).value
    assert value is not None
    return _joined(blank, cost.side(start, -1), cost.side(start, 1), (start, value))


def _joined(
    blank: ValueFunction, lower: tuple[Piece, ...], upper: tuple[Piece, ...], start: tuple[Fraction, Fraction]
) -> ValueFunction:
    """The pieces to both sides of a start, of which the piece through it may be in both."""
    pieces = (*lower, *(upper[1:] if lower and upper and lower[-1] == upper[0] else upper))
    if not pieces:
        return replace(blank, outcome="optimal", low=start[0], high=start[0], corners=(start,))
    low, high = pieces[0].low, pieces[-1].high
    return replace(blank, outcome="optimal", low=low, high=high, pieces=pieces, corners=_corners(pieces))


def _corners(pieces: tuple[Piece, ...]) -> tuple[tuple[Fraction, Fraction], ...]:
    ends = [(piece.low, piece) for piece in pieces] + [(piece.high, piece) for piece in pieces[-1:]]
    return tuple((t, piece.at(t)) for t, piece in ends if isinstance(t, Fraction))
