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

from polywalk.exact import Row, linear, short
from polywalk.linear import Optimum, optimum
from polywalk.model import Constraint, Model, Objective
from polywalk.region.spans import combination
from polywalk.reviewing.findings import Proof
from polywalk.reviewing.telling import listed


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


def _proper(row: Constraint, weight: Fraction) -> bool:
    return row.sense == "==" or (weight <= 0 if row.sense == ">=" else weight >= 0)


def sum_text(model: Model, found: Proof) -> str:
    """The multiplied rows and what they add up to, in words and numbers."""
    parts = [f"{_times(weight)}{name} ({_rule(model, name)})" for name, weight in found.multipliers]
    added = f"{linear(found.coefficients, model.variables)} ≤ {short(found.rhs)}"
    return f"{listed(parts)} {'says' if len(parts) == 1 else 'add up to'} {added}"


def _times(weight: Fraction) -> str:
    return "" if weight == 1 else f"{short(weight)} × "


def _rule(model: Model, name: str) -> str:
    return model.constraint(name).text(model.variables)


def place(model: Model, point: Row) -> str:
    """A point with its variables' names: "pump = 4, chips = 4"."""
    return ", ".join(f"{name} = {short(value)}" for name, value in zip(model.variables, point, strict=True))
