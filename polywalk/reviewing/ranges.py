"""How far one number may change while a basis, or a vertex, stays what it is.

References
----------
Bradley, Hax & Magnanti, Applied Mathematical Programming, 1977, chapter 3 (right-hand side and cost ranging).
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from fractions import Fraction
from itertools import combinations, islice

from polywalk.errors import ModelError
from polywalk.exact import Row, dot
from polywalk.linear import optimum
from polywalk.model import Constraint, Goal, Model, Objective
from polywalk.region.spans import echelon, rank
from polywalk.reviewing.duals import dual_rows, keeps_sign
from polywalk.reviewing.extended import INFINITY, Extended, shown
from polywalk.table import Shown, Table, cell

MOST_SUBSETS = 5_000
"""Sets of active constraints looked at in search of bases; a simple vertex has one, and 15 rows in 5 variables 3003."""


@dataclass(frozen=True, repr=False)
class BasisRanges(Shown):
    """One basis, and how far each right-hand side and each cost may change while it stays optimal.

    This is what solvers print as ranging. At a degenerate vertex it depends on the basis.

    Parameters
    ----------
    model : Model
    held : (n,) tuple of str
        The constraints held active (the nonbasic slacks), in the model's order.
    point : (n,) tuple of Fraction
        Where they meet.
    prices : (m,) tuple of Fraction
        The multipliers of this basis, one a constraint; 0 off the basis.
    rhs : (m,) tuple of (Fraction or infinity, Fraction or infinity)
        For each constraint, between which right-hand sides the basis stays feasible; None where it is not feasible.
    costs : (n,) tuple of (Fraction or infinity, Fraction or infinity)
        For each variable, between which costs its prices keep their signs; None where they have the wrong ones.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.ranges import basis_ranges
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "2*x + y <= 4"},
    ...                         bounds={"x": (0, None), "y": (0, 3)})
    >>> print(basis_ranges(model, ["labour", "y upper"]))
    basis labour, y upper at (0.5, 3): optimal
    what            price  now  from  to
    rhs of labour   1.5    4    3     ∞
    rhs of x lower  0      0    -∞    0.5
    rhs of y lower  0      0    -∞    3
    rhs of y upper  0.5    3    0     4
    cost of x              3    0     4
    cost of y              2    1.5   ∞
    """

    model: Model
    held: tuple[str, ...]
    point: Row
    prices: Row
    rhs: tuple[tuple[Extended, Extended] | None, ...]
    costs: tuple[tuple[Extended, Extended] | None, ...]

    @property
    def feasible(self) -> bool:
        """Whether its point satisfies every constraint."""
        return all(row.holds(self.point) for row in self.model.constraints)

    @property
    def dual_feasible(self) -> bool:
        """Whether its prices have the signs an optimum asks for."""
        goal = self.model.objective
        pairs = zip(self.model.constraints, self.prices, strict=True)
        return goal is None or all(keeps_sign(row.sense, goal.goal, price) for row, price in pairs)

    @property
    def optimal(self) -> bool:
        """Both."""
        return self.feasible and self.dual_feasible

    def table(self) -> Table:
        """A row a right-hand side, then a row a cost."""
        word = "optimal" if self.optimal else "not optimal" if self.feasible else "not feasible"
        rows: list[tuple[object, ...]] = [
            (f"rhs of {row.name}", price, row.rhs, *_ends(ends))
            for row, price, ends in zip(self.model.constraints, self.prices, self.rhs, strict=True)
        ]
        costs = self.model.objective.coefficients if self.model.objective else (Fraction(0),) * self.model.n
        named = zip(self.model.variables, costs, self.costs, strict=True)
        rows += [(f"cost of {name}", None, cost, *_ends(ends)) for name, cost, ends in named]
        title = f"basis {', '.join(self.held)} at {cell(self.point)}: {word}"
        return Table(title, ("what", "price", "now", "from", "to"), tuple(rows))


def _ends(ends: tuple[Extended, Extended] | None) -> tuple[object, object]:
    return (None, None) if ends is None else (shown(ends[0]), shown(ends[1]))


def basis_ranges(model: Model, held: Sequence[str]) -> BasisRanges:
    """The ranges of the basis that holds n constraints active.

    Raises
    ------
    UnknownName, ModelError
        A name that is no constraint; another number of constraints than variables, or constraints that do not meet in
        one point.
    """
    wanted = {model.constraint(name).name for name in held}
    rows = [row for row in model.constraints if row.name in wanted]
    names = tuple(row.name for row in rows)
    if len(rows) != model.n or len(held) != model.n:
        raise ModelError(
            f"expected {model.n} different constraints held active, one a variable, got {len(held)}: "
            f"{', '.join(map(str, held))}.",
            tuple(held),
        )
    inverse = _inverse([row.coefficients for row in rows])
    if inverse is None:
        raise ModelError(f"{', '.join(names)} do not meet in one point, so they are no basis.", names)
    point = tuple(dot(line, [row.rhs for row in rows]) for line in inverse)
    return _with_ranges(model, rows, inverse, point)


def _inverse(rows: Sequence[Row]) -> list[Row] | None:
    n = len(rows)
    wide = [(*row, *(Fraction(int(i == k)) for k in range(n))) for i, row in enumerate(rows)]
    lines, pivots = echelon(wide)
    return [tuple(line[n:]) for line in lines] if pivots == list(range(n)) else None


def _with_ranges(model: Model, rows: list[Constraint], inverse: list[Row], point: Row) -> BasisRanges:
    goal = model.objective or Objective("max", (Fraction(0),) * model.n)
    columns = [tuple(line[k] for line in inverse) for k in range(model.n)]
    own = {row.name: dot(goal.coefficients, column) for row, column in zip(rows, columns, strict=True)}
    ways = {row.name: column for row, column in zip(rows, columns, strict=True)}
    prices = tuple(own.get(row.name, Fraction(0)) for row in model.constraints)
    feasible = all(row.holds(point) for row in model.constraints)
    right = all(keeps_sign(row.sense, goal.goal, own[row.name]) for row in rows)
    rhs = tuple(_rhs_range(model, row, point, ways.get(row.name)) if feasible else None for row in model.constraints)
    costs = tuple(_basis_cost_range(rows, goal, own, inverse[j], j) if right else None for j in range(model.n))
    return BasisRanges(model, tuple(row.name for row in rows), point, prices, rhs, costs)


def _rhs_range(model: Model, row: Constraint, point: Row, way: Row | None) -> tuple[Extended, Extended]:
    """A constraint off the basis may move until it reaches the point; one on it takes the point along ``way``."""
    if way is None:
        here = dot(row.coefficients, point)
        return (here if row.sense != ">=" else -INFINITY), (here if row.sense != "<=" else INFINITY)
    others = [other for other in model.constraints if other.name != row.name]
    limits = []
    for other in others:
        _, inward = other.inward
        rate, slack = dot(inward, way), other.slack(point)
        limits += [(slack, rate)] + ([(-slack, -rate)] if other.sense == "==" else [])
    return _room(row.rhs, limits)


def _basis_cost_range(
    rows: list[Constraint], goal: Objective, own: dict[str, Fraction], line: Row, j: int
) -> tuple[Extended, Extended]:
    """The prices move along a row of the inverse while one cost changes."""
    limits = []
    for row, rate in zip(rows, line, strict=True):
        if row.sense != "==":
            turned = 1 if (row.sense == "<=") == (goal.goal == "max") else -1
            limits.append((turned * own[row.name], turned * rate))
    return _room(goal.coefficients[j], limits)


def _room(now: Fraction, limits: Sequence[tuple[Fraction, Fraction]]) -> tuple[Extended, Extended]:
    """Between which values of a number every ``amount + rate * change`` stays at 0 or above."""
    low: Extended = max([-amount / rate for amount, rate in limits if rate > 0], default=-INFINITY)
    high: Extended = min([amount / -rate for amount, rate in limits if rate < 0], default=INFINITY)
    return now + low, now + high


def optimal_bases(model: Model, point: Row, limit: int) -> tuple[tuple[BasisRanges, ...], bool]:
    """The optimal bases that hold constraints active at an optimal point, and whether these are all."""
    active = [row for row in model.constraints if not row.is_constant and row.slack(point) == 0]
    subsets = combinations(active, model.n)
    found = list(islice(_optimal_among(model, islice(subsets, MOST_SUBSETS)), limit + 1))
    complete = len(found) <= limit and next(subsets, None) is None
    return tuple(found[:limit]), complete


def _optimal_among(model: Model, subsets: Iterator[tuple[Constraint, ...]]) -> Iterator[BasisRanges]:
    for rows in subsets:
        if rank([row.coefficients for row in rows]) == model.n:
            found = basis_ranges(model, [row.name for row in rows])
            if found.optimal:
                yield found


def cost_ranges(model: Model, point: Row) -> tuple[tuple[Extended, Extended], ...]:
    """For each variable, between which costs an optimal point stays optimal, all other costs as they are."""
    return tuple(cost_range(model, point, j) for j in range(model.n))


def cost_range(model: Model, point: Row, place: int) -> tuple[Extended, Extended]:
    """Between which costs of one variable an optimal point stays optimal, all other costs as they are.

    These are the costs whose objective is still made up of the constraints active at the point.
    """
    goal = model.objective
    if goal is None:
        raise ValueError("only a model with an objective has cost ranges")
    active = [row for row in model.constraints if row.slack(point) == 0]
    duals = dual_rows(model, active, [f"y{i}" for i in range(len(active))])
    rows = tuple(
        replace(row, coefficients=(*row.coefficients, -Fraction(row.name == f"c{place}"))) for row in duals.constraints
    )
    wide = Model((*duals.variables, "change"), rows)
    low, high = (_last(wide, way) for way in ("min", "max"))
    return goal.coefficients[place] + low, goal.coefficients[place] + high


def _last(wide: Model, goal: Goal) -> Extended:
    found = optimum(replace(wide, objective=Objective(goal, (*[Fraction(0)] * (wide.n - 1), Fraction(1)))))
    if found.value is not None:
        return found.value
    return INFINITY if goal == "max" else -INFINITY
