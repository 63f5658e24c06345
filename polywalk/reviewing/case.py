"""What the checks of one model share: its region, the slacks at its corners, what each row is there for."""

from __future__ import annotations

from dataclasses import dataclass, field
from fractions import Fraction
from functools import cached_property
from operator import mul

from polywalk.budget import Budget
from polywalk.exact import integer_row, linear, short
from polywalk.model import Constraint, Model
from polywalk.region import Region, region
from polywalk.reviewing.expectations import Outcome
from polywalk.reviewing.findings import Proof
from polywalk.reviewing.limits import Limits
from polywalk.reviewing.standing import Standing, standings
from polywalk.reviewing.telling import listed

Integers = tuple[int, ...]


@dataclass(frozen=True)
class Case:
    """A model under review.

    Parameters
    ----------
    model : Model
    limits : Limits
    weights : tuple of (str, Fraction)
        What a unit of relaxation of a constraint costs.
    coefficient_units : tuple of (str, str, str)
        Constraint, variable, unit of the coefficient.
    budget : Budget or None
        For listing the vertices.
    """

    model: Model
    limits: Limits = field(default_factory=Limits)
    weights: tuple[tuple[str, Fraction], ...] = ()
    coefficient_units: tuple[tuple[str, str, str], ...] = ()
    budget: Budget | None = None

    @cached_property
    def region(self) -> Region:
        """The region, listed once."""
        return region(self.model, self.budget)

    @property
    def empty(self) -> bool:
        """Whether no plan exists."""
        return self.region.status == "empty"

    @cached_property
    def outcome(self) -> Outcome:
        """How the model ends."""
        goal = self.model.objective
        if self.empty:
            return "infeasible"
        if goal is None or not any(goal.coefficients):
            return "no objective"
        return "unbounded" if self.region.outcome == "unbounded" else "optimal"

    @cached_property
    def rows(self) -> tuple[tuple[int, Constraint], ...]:
        """The constraints with variables, each with its place."""
        return tuple((k, row) for k, row in enumerate(self.model.constraints) if not row.is_constant)

    @cached_property
    def whole(self) -> dict[int, tuple[Integers, int]]:
        """Each row as integers (b, a), b + a.x >= 0 inside, and what it was multiplied by."""
        found = {}
        for k, row in self.rows:
            (b, *a), scale = integer_row((row.rhs, *row.coefficients))
            found[k] = ((-b, *a) if row.sense == ">=" else (b, *[-value for value in a])), scale
        return found

    @cached_property
    def _corners(self) -> list[Integers]:
        return [integer_row((Fraction(1), *point))[0] for point in self.region.base]

    @cached_property
    def _products(self) -> dict[int, list[int]]:
        """For each row and base point: the slack times two positive numbers."""
        corners = self._corners
        return {k: [sum(map(mul, whole, corner)) for corner in corners] for k, (whole, _) in self.whole.items()}

    @cached_property
    def active(self) -> list[list[int]]:
        """The places of the rows active at each base point."""
        found = self._products
        return [[k for k, products in found.items() if not products[corner]] for corner in range(len(self._corners))]

    @cached_property
    def closest(self) -> dict[int, tuple[Fraction, int]]:
        """For each row the smallest slack in the whole region, and the base point that has it."""
        return {k: self._extreme(k, products, least=True) for k, products in self._products.items()}

    def farthest(self, k: int) -> tuple[Fraction, int]:
        """The largest slack of a row among the base points, and where."""
        return self._extreme(k, self._products[k], least=False)

    def _extreme(self, k: int, products: list[int], *, least: bool) -> tuple[Fraction, int]:
        scale, heads = self.whole[k][1], [corner[0] for corner in self._corners]
        best, sign = 0, 1 if least else -1
        for c, value in enumerate(products):
            if sign * (value * heads[best] - products[best] * heads[c]) < 0:
                best = c
        return Fraction(products[best], heads[best] * scale), best

    @cached_property
    def standing(self) -> dict[int, Standing]:
        """What each row with variables is there for, by place; of a model that has a plan."""
        return standings(self)

    @cached_property
    def _rules(self) -> dict[str, str]:
        return {row.name: row.text(self.model.variables) for row in self.model.constraints}

    def told(self, row: Constraint | str) -> str:
        """A constraint by name and rule: "cap (x ≤ 3)"."""
        name = row if isinstance(row, str) else row.name
        return f"{name} ({self._rules[name]})"

    def adds_up(self, proof: Proof) -> str:
        """The multiplied rows and what they add up to, in words and numbers."""
        parts = [f"{_times(weight)}{self.told(name)}" for name, weight in proof.multipliers]
        verb = "says" if len(parts) == 1 else "add up to"
        return f"{listed(parts)} {verb} {linear(proof.coefficients, self.model.variables)} ≤ {short(proof.rhs)}"


def _times(weight: Fraction) -> str:
    return "" if weight == 1 else f"{short(weight)} × "
