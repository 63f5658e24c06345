"""Rows that follow from a model's constraints: read off a point where they are tight, or off an exact optimum.

References
----------
Farkas, Theorie der einfachen Ungleichungen, J. reine angew. Math. 124, 1902.
Schrijver, Theory of Linear and Integer Programming, 1986, section 7.1.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from fractions import Fraction

from polywalk.exact import Row, short
from polywalk.linear import Optimum, optimum
from polywalk.model import Constraint, Model, Objective
from polywalk.region.spans import combination
from polywalk.reviewing.findings import Proof


@dataclass(frozen=True)
class Upper:
    """A row read as ``coefficients . x <= rhs``."""

    coefficients: Row
    rhs: Fraction

    @property
    def reverse(self) -> Upper:
        """The row the other way round: with both, it is an equality."""
        return Upper(tuple(-value for value in self.coefficients), -self.rhs)


def upper(row: Constraint) -> Upper:
    """A constraint as a <=; of an equality the half as typed."""
    same = Upper(row.coefficients, row.rhs)
    return same.reverse if row.sense == ">=" else same


def halves(row: Constraint) -> list[tuple[int, Upper]]:
    """The row as a <=, with the sign its own multiplier then has; an equality both ways."""
    if row.sense == "==":
        return [(1, upper(row)), (-1, upper(row).reverse)]
    return [(-1 if row.sense == ">=" else 1, upper(row))]


def proof(rows: Iterable[Constraint], weights: Iterable[Fraction], coefficients: Row) -> Proof:
    """The proof with these multipliers; its right-hand side is what they add up to."""
    pairs = [(row, weight) for row, weight in zip(rows, weights, strict=True) if weight]
    rhs = sum((weight * row.rhs for row, weight in pairs), Fraction(0))
    return Proof(tuple((row.name, weight) for row, weight in pairs), coefficients, rhs)


def most(model: Model, coefficients: Row, rows: Sequence[Constraint] | None = None) -> Optimum:
    """The most that a linear function can be under the model's constraints, or under these rows alone."""
    kept = model.constraints if rows is None else tuple(rows)
    return optimum(Model(model.variables, kept, Objective("max", coefficients)))


def bounded_by(model: Model, claim: Upper, rows: Sequence[Constraint] | None = None) -> Proof | None:
    """The proof that the claim follows from the rows, with the least right-hand side there is; None if it does not."""
    best = most(model, claim.coefficients, rows)
    if best.weights is None or best.value is None or best.value > claim.rhs:
        return None
    return proof(best.model.constraints, best.weights, claim.coefficients)


def tight_at(model: Model, coefficients: Row, active: Sequence[Constraint]) -> Proof | None:
    """How far the function reaches where these rows are active, if it is largest there.

    Where the active rows are independent there is one combination; else the exact optimum finds a proper one.
    """
    weights = combination([row.coefficients for row in active], coefficients) if active else None
    if weights is not None and all(_proper(row, weight) for row, weight in zip(active, weights, strict=True)):
        return proof(active, weights, coefficients)
    best = most(model, coefficients, active)
    return None if best.weights is None else proof(active, best.weights, coefficients)


def solved(rows: Sequence[Sequence[int]], target: Sequence[int]) -> Row | None:
    """The y with sum of y_i rows_i = target, for as many integer rows as columns; None where they are dependent.

    Elimination that stays in integers (Bareiss, Math. Comp. 22, 1968).
    """
    lines = [[*column, value] for column, value in zip(zip(*rows, strict=True), target, strict=True)]
    last = 1
    for k in range(len(lines)):
        chosen = next((i for i in range(k, len(lines)) if lines[i][k]), None)
        if chosen is None:
            return None
        lines[k], lines[chosen] = lines[chosen], lines[k]
        lead, pivot = lines[k], lines[k][k]
        for i, line in enumerate(lines):
            if i != k:
                factor = line[k]
                lines[i] = [(pivot * a - factor * b) // last for a, b in zip(line, lead, strict=True)]
        last = pivot
    return tuple(Fraction(line[-1], last) for line in lines)


def _proper(row: Constraint, weight: Fraction) -> bool:
    return row.sense == "==" or (weight <= 0 if row.sense == ">=" else weight >= 0)


def place(model: Model, point: Row) -> str:
    """A point with its variables' names: "pump = 4, chips = 4"."""
    return ", ".join(f"{name} = {short(value)}" for name, value in zip(model.variables, point, strict=True))
