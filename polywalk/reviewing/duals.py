"""All optimal duals of a model: their extremes in any direction, their corners, and the dual model itself.

A dual y gives every constraint a multiplier (>= 0 on a <= of a maximum, <= 0 on a >=, any on an equality; all turned
round for a minimum) so that the rows, multiplied and added, are the objective. With one optimal point x known, the
optimal duals are exactly those that are 0 wherever x leaves slack.

References
----------
Schrijver, Theory of Linear and Integer Programming, 1986, chapter 7 (duality, complementary slackness).
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property

from polywalk.exact import Row, dot
from polywalk.linear import optimum
from polywalk.model import Constraint, Goal, Model, Objective, Sense
from polywalk.region import Region, region
from polywalk.region.engine import SMALL_WORK, work
from polywalk.region.spans import rank
from polywalk.reviewing.extended import INFINITY, Extended

ZERO, ONE = Fraction(0), Fraction(1)


@dataclass(frozen=True)
class OptimalDuals:
    """The face of all optimal duals of a model that has an optimum.

    Parameters
    ----------
    model : Model
        With an objective and an optimum.
    point : (n,) tuple of Fraction
        Any optimal point.
    weights : (m,) tuple of Fraction
        Any optimal dual.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.duals import optimal_duals
    >>> model = pw.from_algebra(maximize="x", constraints={"a": "x <= 2", "b": "2*x <= 4"}, bounds={"x": (0, None)})
    >>> optimal_duals(model).extremes("a")
    (Fraction(0, 1), Fraction(1, 1))
    """

    model: Model
    point: Row
    weights: Row

    @property
    def goal(self) -> Objective:
        """The model's objective, which is there."""
        if self.model.objective is None:
            raise ValueError("only a model with an objective has optimal duals")
        return self.model.objective

    @property
    def maximizes(self) -> bool:
        """Whether the objective is maximized."""
        return self.goal.goal == "max"

    @property
    def value(self) -> Fraction:
        """The optimal value."""
        return self.goal.at(self.point)

    @cached_property
    def tight(self) -> tuple[int, ...]:
        """The places of the constraints that may have a price: those without slack at the optimal point."""
        return tuple(i for i, row in enumerate(self.model.constraints) if row.slack(self.point) == 0)

    @cached_property
    def _independent(self) -> bool:
        """Whether the tight constraints leave no choice of multipliers."""
        return rank([self.model.constraints[i].coefficients for i in self.tight]) == len(self.tight)

    @cached_property
    def unique(self) -> bool:
        """Whether there is only one optimal dual."""
        return self._independent or all(low == high for low, high in (self._ends(i) for i in self.tight))

    @cached_property
    def face(self) -> Model:
        """The optimal duals as a model over the tight constraints' multipliers."""
        rows = [self.model.constraints[i] for i in self.tight]
        return dual_rows(self.model, rows, [f"y{i}" for i in self.tight])

    def extremes(self, name: str) -> tuple[Extended, Extended]:
        """The least and the greatest multiplier of a constraint among all optimal duals."""
        self.model.constraint(name)
        place = next(i for i, row in enumerate(self.model.constraints) if row.name == name)
        return self._ends(place) if place in self.tight else (ZERO, ZERO)

    @cached_property
    def _known(self) -> dict[int, tuple[Extended, Extended]]:
        return {}

    def _ends(self, place: int) -> tuple[Extended, Extended]:
        if place not in self._known:
            self._known[place] = self.reach({place: ONE})
        return self._known[place]

    def reach(self, shares: Mapping[int, Fraction]) -> tuple[Extended, Extended]:
        """The least and the greatest of a sum of multiples of multipliers, given by place of the constraint."""
        if self._independent:
            value = dot(shares.values(), [self.weights[i] for i in shares])
            return value, value
        costs = tuple(shares.get(i, ZERO) for i in self.tight)
        return tuple(_end(self.face, goal, costs) for goal in ("min", "max"))  # type: ignore[return-value]

    @property
    def listable(self) -> bool:
        """Whether the corners are few enough to be listed at once."""
        return self._independent or work(len(self.tight), len(self.face.constraints)) <= SMALL_WORK

    @cached_property
    def corners(self) -> tuple[Row, ...]:
        """The extreme optimal duals, one multiplier a constraint, sorted; base points where the face has a line."""
        return (self.weights,) if self._independent else tuple(self._whole(point) for point in self.region.base)

    @cached_property
    def region(self) -> Region:
        """The face as a region over the tight constraints' multipliers."""
        return region(self.face)

    @cached_property
    def directions(self) -> tuple[Row, ...]:
        """Directions in which optimal duals go on for ever; a line gives two of them."""
        if self._independent:
            return ()
        lines = [tuple(sign * value for value in line) for line in self.region.lines for sign in (1, -1)]
        return tuple(self._whole(way) for way in [*(ray.direction for ray in self.region.rays), *lines])

    def _whole(self, part: Row) -> Row:
        values = dict(zip(self.tight, part, strict=False))
        return tuple(values.get(i, ZERO) for i in range(len(self.model.constraints)))


def optimal_duals(model: Model) -> OptimalDuals | None:
    """The optimal duals of a model; None where it has no optimum or no objective."""
    best = optimum(model)
    if best.point is None or best.weights is None or model.objective is None:
        return None
    return OptimalDuals(model, best.point, best.weights)


def dual_model(model: Model) -> Model:
    """The dual as a model of its own: multipliers y0, y1, ..., and one equality a variable, named c0, c1, ...

    Its optimal value is the model's; its other optimal duals are the model's optimal points.
    """
    names = [f"y{i}" for i in range(len(model.constraints))]
    dual = dual_rows(model, model.constraints, names)
    rhs = tuple(row.rhs for row in model.constraints) or (ZERO,)
    assert model.objective is not None
    goal: Goal = "min" if model.objective.goal == "max" else "max"
    return Model(dual.variables, dual.constraints, Objective(goal, rhs, model.objective.constant))


def dual_rows(model: Model, rows: Sequence[Constraint], names: list[str]) -> Model:
    """The model of all multipliers of these rows that are dual feasible.

    The rows, multiplied and added, are the objective (one equality a variable, named c0, c1, ...); each multiplier has
    its constraint's sign.
    """
    assert model.objective is not None
    signs = [_sign(row.sense, model.objective.goal) for row in rows]
    if not rows:  # a model needs a variable: one that is 0
        names, signs = ["nothing"], ["=="]
    made = []
    for j, cost in enumerate(model.objective.coefficients):
        column = tuple(row.coefficients[j] for row in rows) or (ZERO,)
        made.append(Constraint(f"c{j}", column, "==", cost))
    for k, sense in enumerate(signs):
        if sense is not None:
            made.append(Constraint(f"sign {k}", tuple(Fraction(int(i == k)) for i in range(len(names))), sense, ZERO))
    return Model(tuple(names), tuple(made))


def _sign(sense: Sense, goal: Goal) -> Sense | None:
    """How a multiplier is bounded by 0; None for an equality's."""
    if sense == "==":
        return None
    return ">=" if (sense == "<=") == (goal == "max") else "<="


def keeps_sign(sense: Sense, goal: Goal, price: Fraction) -> bool:
    """Whether a price has the sign that the constraint's sense and the goal ask for."""
    asked = _sign(sense, goal)
    return asked is None or (price >= 0 if asked == ">=" else price <= 0)


def _end(model: Model, goal: Goal, costs: Row) -> Extended:
    found = optimum(Model(model.variables, model.constraints, Objective(goal, costs)))
    if found.value is not None:
        return found.value
    assert found.outcome == "unbounded"  # the face holds the dual it was made from
    return INFINITY if goal == "max" else -INFINITY
