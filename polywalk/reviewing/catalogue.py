"""The catalogue of single slips: what a person mistypes, undone one at a time.

Each entry of ``CATALOGUE`` is a function from a model to its candidates: the model as it would be without that slip.
Missing information (a forgotten bound or constraint) cannot be undone, only looked for: see ``missing``.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from fractions import Fraction
from itertools import combinations
from typing import cast

from polywalk.exact import Row, short
from polywalk.model import GOAL, SIGN, Constraint, Model, Objective, Sense

DECIMALS = tuple(map(Fraction, ("10", "1/10", "100", "1/100")))
"""A decimal point one or two places off."""

UNITS = tuple(Fraction(text) ** power for text in ("60", "3600", "24", "8760", "1000", "3.6") for power in (1, -1))
"""Minutes and seconds in an hour, hours in a day and a year, kilo, and MJ in a kWh or km/h in a m/s; either way."""

OBJECTIVE = "objective"


@dataclass(frozen=True)
class Slip:
    """One slip undone.

    Parameters
    ----------
    kind : str
        The name of the slip in the catalogue.
    place : str
        The constraint it was made in, or "objective".
    row : Constraint or None
        The corrected constraint; None where it is lifted, or where the objective is corrected.
    goal : Objective or None
        The corrected objective.
    told : str
        What is changed, in words.
    numbers : (before, after) of Fraction, optional
        The number that was mistyped and the one that was meant.
    """

    kind: str
    place: str
    row: Constraint | None
    goal: Objective | None
    told: str
    numbers: tuple[Fraction, Fraction] | None = None

    def corrected(self, model: Model) -> Model:
        """The model without the slip."""
        if self.goal is not None:
            return replace(model, objective=self.goal)
        if self.row is None:
            return model.without(self.place)
        rows = tuple(self.row if row.name == self.place else row for row in model.constraints)
        return replace(model, constraints=rows)


Slips = Iterator[Slip]


def flipped_sense(model: Model) -> Slips:
    """<= typed for >=, or the other way round."""
    for row in model.constraints:
        if row.sense != "==":
            yield _sense("flipped sense", row, ">=" if row.sense == "<=" else "<=")


def equality_for_inequality(model: Model) -> Slips:
    """== typed where <= or >= was meant."""
    for row in model.constraints:
        if row.sense == "==":
            yield from (_sense("equality for inequality", row, sense) for sense in cast(list[Sense], ["<=", ">="]))


def inequality_for_equality(model: Model) -> Slips:
    """<= or >= typed where == was meant."""
    yield from (_sense("inequality for equality", row, "==") for row in model.constraints if row.sense != "==")


def flipped_coefficient(model: Model) -> Slips:
    """A coefficient with the wrong sign, in a constraint or in the objective."""
    yield from _rescaled(model, "flipped coefficient", (Fraction(-1),))


def flipped_rhs(model: Model) -> Slips:
    """A right-hand side with the wrong sign."""
    yield from _moved(model, "flipped right-hand side", (Fraction(-1),))


def swapped_coefficients(model: Model) -> Slips:
    """Two coefficients of a row in each other's place."""
    for place, row in _lines(model):
        for i, j in combinations(range(model.n), 2):
            if row[i] == row[j]:
                continue
            mixed = list(row)
            mixed[i], mixed[j] = mixed[j], mixed[i]
            told = f"{model.variables[i]} and {model.variables[j]} in each other's place"
            yield _with_row(model, place, tuple(mixed), kind="swapped coefficients", told=told)


def shifted_decimal(model: Model) -> Slips:
    """A decimal point one or two places off, in a coefficient or a right-hand side."""
    yield from _rescaled(model, "shifted decimal point", DECIMALS)
    yield from _moved(model, "shifted decimal point", DECIMALS)


def unit_factor(model: Model) -> Slips:
    """A number in another unit than the rest of its row."""
    yield from _rescaled(model, "unit factor", UNITS)
    yield from _moved(model, "unit factor", UNITS)


def max_for_min(model: Model) -> Slips:
    """A minimum typed as a maximum, or the other way round."""
    goal = model.objective
    if goal is not None and any(goal.coefficients):
        turned = replace(goal, goal="min" if goal.goal == "max" else "max")
        yield Slip("max for min", OBJECTIVE, None, turned, f"{GOAL[turned.goal]}, not {GOAL[goal.goal]}")


def constraint_too_many(model: Model) -> Slips:
    """A constraint that does not belong in the model."""
    for row in model.constraints:
        yield Slip("constraint too many", row.name, None, None, "the whole constraint lifted")


CATALOGUE: tuple[Callable[[Model], Slips], ...] = (
    flipped_sense,
    equality_for_inequality,
    max_for_min,
    flipped_coefficient,
    flipped_rhs,
    shifted_decimal,
    unit_factor,
    swapped_coefficients,
    constraint_too_many,
    inequality_for_equality,
)
"""Every reversible slip that is searched for."""


def _sense(kind: str, row: Constraint, sense: Sense) -> Slip:
    return Slip(kind, row.name, replace(row, sense=sense), None, f"{SIGN[sense]}, not {SIGN[row.sense]}")


def _rescaled(model: Model, kind: str, factors: tuple[Fraction, ...]) -> Slips:
    """One coefficient times each factor."""
    for place, row in _lines(model):
        found = [j for j, value in enumerate(row) if value]
        for j, factor in ((j, factor) for j in found for factor in factors):
            changed = tuple(value * factor if i == j else value for i, value in enumerate(row))
            told = f"{short(changed[j])} {model.variables[j]}, not {short(row[j])}"
            yield _with_row(model, place, changed, kind=kind, told=told, numbers=(row[j], changed[j]))


def _moved(model: Model, kind: str, factors: tuple[Fraction, ...]) -> Slips:
    """A right-hand side times each factor."""
    for row, factor in ((row, factor) for row in model.constraints if row.rhs for factor in factors):
        rhs = row.rhs * factor
        told = f"{short(rhs)} on the right, not {short(row.rhs)}"
        yield Slip(kind, row.name, replace(row, rhs=rhs), None, told, (row.rhs, rhs))


def _lines(model: Model) -> list[tuple[str | None, Row]]:
    """The rows that have coefficients: the constraints by name, then the objective as None."""
    lines: list[tuple[str | None, Row]] = [(row.name, row.coefficients) for row in model.constraints]
    return lines if model.objective is None else [*lines, (None, model.objective.coefficients)]


def _with_row(
    model: Model, place: str | None, row: Row, *, kind: str, told: str, numbers: tuple[Fraction, Fraction] | None = None
) -> Slip:
    if place is None:
        assert model.objective is not None
        return Slip(kind, OBJECTIVE, None, replace(model.objective, coefficients=row), told, numbers)
    return Slip(kind, place, replace(model.constraint(place), coefficients=row), None, told, numbers)
