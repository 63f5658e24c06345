"""What the optimum is worth on either side of every right-hand side, and how far each number may change.

References
----------
Aucamp & Steinberg, The computation of shadow prices in linear programming, J. Oper. Res. Soc. 33, 1982 (left and right
prices at a degenerate optimum).
Jansen, de Jong, Roos & Terlaky, Sensitivity analysis in linear programming: just be careful!, Eur. J. Oper. Res. 101,
1997.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from fractions import Fraction
from functools import cached_property

from polywalk.exact import dot
from polywalk.linear import Optimum, optimum
from polywalk.model import Constraint, Model
from polywalk.region import Region
from polywalk.reviewing.best import BestPoint, best_points
from polywalk.reviewing.duals import OptimalDuals
from polywalk.reviewing.extended import INFINITY, Extended
from polywalk.reviewing.pieces import Parameter
from polywalk.reviewing.ranges import BasisRanges, cost_ranges, optimal_bases
from polywalk.reviewing.value import Outcome
from polywalk.reviewing.worth import tables, why
from polywalk.table import Shown, Table

MOST_BASES = 24
"""Optimal bases listed for each optimal vertex."""


@dataclass(frozen=True)
class Price:
    """The shadow price of one constraint: the change of the optimal value per unit of its right-hand side.

    Parameters
    ----------
    constraint : str
    rhs : Fraction
        The right-hand side now.
    left, right : Fraction or infinity
        For a smaller and for a larger right-hand side; infinite where any step to that side leaves no feasible plan.
        The sign is that of a change of the objective itself, whether it is minimized or maximized.
    low, high : Fraction or infinity
        How far down the left and how far up the right price holds. Where the two are equal, one price holds all the
        way from low to high.
    """

    constraint: str
    rhs: Fraction
    left: Extended
    right: Extended
    low: Extended
    high: Extended

    @property
    def unique(self) -> bool:
        """Whether one price holds on both sides."""
        return self.left == self.right


@dataclass(frozen=True)
class Range:
    """The values of one cost between which a vertex stays optimal, all other costs as they are."""

    variable: str
    cost: Fraction
    low: Extended
    high: Extended


@dataclass(frozen=True)
class ReducedCost:
    """What remains of a variable's cost after the prices of all rows but its own bounds: the least, the greatest.

    It is what its bounds, added, are worth; the two ends differ where prices are not unique.
    """

    variable: str
    low: Extended
    high: Extended


@dataclass(frozen=True, repr=False)
class Sensitivity(Shown):
    """Shadow prices, reduced costs and ranges at the optimum of a model; exact.

    Parameters
    ----------
    model : Model
    outcome : {"optimal", "unbounded", "infeasible", "no objective"}
        Only an optimum has prices; for any other outcome everything else is empty.
    value : Fraction or None
        The optimal value.
    best : tuple of BestPoint
        The optimal vertices, named as in the region; where the region has a line, its optimal base points.
    directions : tuple of (n,) tuple of Fraction
        Directions in which the optimal points go on for ever; both ways of a line.
    duals : OptimalDuals or None
    proof : Optimum or None
        What was found instead, where there are no prices.
    """

    model: Model
    outcome: Outcome
    value: Fraction | None = None
    best: tuple[BestPoint, ...] = ()
    directions: tuple[tuple[Fraction, ...], ...] = ()
    duals: OptimalDuals | None = field(default=None, compare=False)
    proof: Optimum | None = field(default=None, compare=False)

    @property
    def tied(self) -> bool:
        """Whether there is more than one optimal point."""
        return len(self.best) > 1 or bool(self.directions)

    @property
    def unique_prices(self) -> bool:
        """Whether there is only one optimal dual."""
        return self.duals is None or self.duals.unique

    @cached_property
    def prices(self) -> tuple[Price, ...]:
        """The price of every constraint, bounds included, in the model's order."""
        return tuple(self._price(row.name) for row in self.model.constraints) if self.duals else ()

    def price(self, constraint: str) -> Price | None:
        """The price of one constraint; None without an optimum. Raises UnknownName."""
        self.model.constraint(constraint)
        return next((price for price in self.prices if price.constraint == constraint), None)

    def _price(self, name: str) -> Price:
        assert self.duals is not None
        row = self.model.constraint(name)
        if row.slack(self.duals.point) != 0:
            return self._idle(row)
        parameter, rhs = Parameter(self.model, name), row.rhs
        left, right = parameter.slope(self.duals, -1), parameter.slope(self.duals, 1)
        first = parameter.piece(self.duals, left) if isinstance(left, Fraction) else None
        last = first if left == right else parameter.piece(self.duals, right) if isinstance(right, Fraction) else None
        return Price(name, rhs, left, right, first.low if first else rhs, last.high if last else rhs)

    def _idle(self, row: Constraint) -> Price:
        """Of a constraint with slack: worth nothing until it has cut off every optimal point."""
        reached = [dot(row.coefficients, corner.point) for corner in self.best]
        ways = [dot(row.coefficients, way) for way in self.directions]
        low: Extended = -INFINITY if any(way < 0 for way in ways) else min(reached)
        high: Extended = INFINITY if any(way > 0 for way in ways) else max(reached)
        low, high = (low, INFINITY) if row.sense == "<=" else (-INFINITY, high)
        return Price(row.name, row.rhs, Fraction(0), Fraction(0), low, high)

    @cached_property
    def reduced_costs(self) -> tuple[ReducedCost, ...]:
        """The reduced cost of every variable, in the model's order."""
        return tuple(self._reduced(j, name) for j, name in enumerate(self.model.variables)) if self.duals else ()

    def _reduced(self, j: int, name: str) -> ReducedCost:
        assert self.duals is not None
        rows = enumerate(self.model.constraints)
        own = {i: row.coefficients[j] for i, row in rows if (row.bounds() or (None,))[0] == j}
        tight = {i: value for i, value in own.items() if i in self.duals.tight}
        return ReducedCost(name, *(self.duals.reach(tight) if tight else (Fraction(0), Fraction(0))))

    @cached_property
    def cost_ranges(self) -> dict[str, tuple[Range, ...]]:
        """For each optimal vertex, by name, how far each cost may change while that vertex stays optimal."""
        return {corner.name: self._ranges(corner) for corner in self.best}

    def _ranges(self, corner: BestPoint) -> tuple[Range, ...]:
        assert self.model.objective is not None
        costs = self.model.objective.coefficients
        found = zip(self.model.variables, costs, cost_ranges(self.model, corner.point), strict=True)
        return tuple(Range(name, cost, *ends) for name, cost, ends in found)

    @cached_property
    def bases(self) -> tuple[BasisRanges, ...]:
        """The optimal bases, vertex by vertex, each with its ranges; none where the region has a line."""
        return tuple(basis for bases, _ in self._bases for basis in bases)

    @property
    def all_bases(self) -> bool:
        """Whether ``bases`` leaves none out."""
        return all(complete for _, complete in self._bases)

    @cached_property
    def _bases(self) -> tuple[tuple[tuple[BasisRanges, ...], bool], ...]:
        return tuple(optimal_bases(self.model, corner.point, MOST_BASES) for corner in self.best)

    @property
    def why(self) -> tuple[str, ...]:
        """Why two solvers may disagree, each on its own right: a plain sentence for each reason there is."""
        return why(self)

    def tables(self) -> tuple[Table, ...]:
        """Prices; costs (one table for all optimal vertices)."""
        return tables(self)

    def table(self) -> Table:
        """The prices, one row a constraint."""
        return self.tables()[0]

    def __str__(self) -> str:
        return "\n\n".join(str(table) for table in self.tables())

    __repr__ = __str__

    def _repr_html_(self) -> str:
        return "".join(table._repr_html_() for table in self.tables())


def sensitivity(source: Model | Region) -> Sensitivity:
    """Exact shadow prices, reduced costs, and the ranges of right-hand sides and costs.

    Parameters
    ----------
    source : Model or Region
        Of any kind. A Region saves enumerating again.

    Returns
    -------
    Sensitivity
        An infeasible or unbounded model, or one without objective, has no prices; the result says so.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.sensitivity import sensitivity
    >>> model = pw.from_algebra(maximize="3*x + 5*y", bounds={"x": (0, 4), "y": (0, None)},
    ...                         constraints={"doors": "2*y <= 12", "hours": "3*x + 2*y <= 18"})
    >>> price = sensitivity(model).price("hours")
    >>> price.left, price.right, price.low, price.high
    (Fraction(1, 1), Fraction(1, 1), Fraction(12, 1), Fraction(24, 1))

    References
    ----------
    Aucamp & Steinberg, The computation of shadow prices in linear programming, J. Oper. Res. Soc. 33, 1982; Jansen, de
    Jong, Roos & Terlaky, Sensitivity analysis in linear programming: just be careful!, Eur. J. Oper. Res. 101, 1997.
    """
    model = source.model if isinstance(source, Region) else source
    best = optimum(model)
    if model.objective is None and best.outcome != "infeasible":
        return Sensitivity(model, "no objective", proof=best)
    if best.point is None or best.weights is None:
        return Sensitivity(model, best.outcome, proof=best)
    points, directions = best_points(source, best)
    return Sensitivity(
        model, "optimal", best.value, points, directions, OptimalDuals(model, best.point, best.weights), best
    )
