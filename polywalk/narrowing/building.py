"""From proved inequalities to the shadow's model: rows as people write them, named after what stops them."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace
from fractions import Fraction

from polywalk.model import Constraint, Sense
from polywalk.narrowing.outline import Edge
from polywalk.narrowing.proof import Proof
from polywalk.narrowing.results import ShadowFacet
from polywalk.narrowing.tolerances import TOLERANCES
from polywalk.narrowing.widening import VALUE

NAMED = 2
"""Constraints that a facet is named after; more would not fit beside a line."""

MANY = 9
"""Constraints from which on a second one says no more than the first."""


@dataclass(frozen=True)
class Wording:
    """How facets are written.

    Parameters
    ----------
    near : str
        The row that keeps the objective near its optimum; a facet is named after it first.
    value : int or None
        The axis that is the objective's value: its coefficient becomes 1, so that the others are prices.
    """

    near: str = ""
    value: int | None = None

    def name(self, proof: Proof | None, coefficients: Sequence[Fraction]) -> str:
        """What a facet is called: after its slopes where it is a price that many constraints make, else after those."""
        price = 0 if self.value is None else coefficients[self.value]
        if (
            price
            and proof is not None
            and proof.count >= MANY
            and any(v for k, v in enumerate(coefficients) if k != self.value)
        ):
            others = [value for k, value in enumerate(coefficients) if k != self.value]
            slopes = ", ".join(f"{float(-value / price) + 0.0:.4g}" for value in others)
            return f"slope{'s' if len(others) > 1 else ''} {slopes}"
        return named(proof, self.near)


@dataclass(frozen=True)
class Row:
    """A facet on its way into the model."""

    constraint: Constraint
    proof: Proof | None = None
    backward: Proof | None = None


def built(rows: Iterable[Row], variables: tuple[str, ...], exact: bool) -> tuple[list[Constraint], list[ShadowFacet]]:
    """The constraints and the facets, each with a name of its own."""
    constraints, facets, taken = [], [], set[str]()
    for row in rows:
        constraint = replace(row.constraint, name=_unique(row.constraint.name, taken))
        constraints.append(constraint)
        proved = exact and row.proof is not None
        facets.append(ShadowFacet(constraint.name, constraint.text(variables), row.proof, row.backward, proved))
    return constraints, facets


def row_of(edge: Edge, exact: bool, wording: Wording = Wording()) -> Row:
    """The row of an inequality: its first coefficient positive, so that x >= 0 reads as such."""
    direction, limit, scale = _plain(edge, exact, wording.value)
    turned = next(value for value in direction if value) < 0
    sign = -1 if turned else 1
    coefficients, factor = tuple(sign * value for value in direction), sign * scale
    forth, back = edge.proof and edge.proof.times(factor), edge.backward and edge.backward.times(-factor)
    if not edge.is_equality:
        sense: Sense = ">=" if turned else "<="
        return Row(Constraint(wording.name(forth, coefficients), coefficients, sense, sign * limit), forth)
    first, second = (back, forth) if turned else (forth, back)
    return Row(Constraint(wording.name(first, coefficients), coefficients, "==", sign * limit), first, second)


def named(proof: Proof | None, held: str = "") -> str:
    """What a facet is called: the constraints that stop it, the largest multipliers first.

    The row ``held`` that keeps the objective near its optimum comes before all others, and the one that only says what
    the objective is before none.
    """
    if proof is None:
        return "outline"
    found = [name for name, _ in proof.named(NAMED + 3)]
    first = [held] if held and proof.includes(held) else []
    others = [name for name in found if name not in {VALUE, held}]
    count = proof.count - len(first) - proof.includes(VALUE)
    if not first and not others:
        return found[0]
    if len(first) + count <= NAMED + 1:
        return " & ".join([*first, *others[:count]])
    told = NAMED if count < MANY else 1
    return " & ".join([*first, *others[:told], f"{count - told} more"])


def _plain(edge: Edge, exact: bool, value: int | None) -> tuple[tuple[Fraction, ...], Fraction, Fraction]:
    """Coefficients, right-hand side, and what the multipliers are to be multiplied with.

    The smallest integers, as in the projection of a region, where they are short; else the largest coefficient is 1,
    and where they carry rounding they become decimals. Where the objective's value takes part, its coefficient is 1.
    """
    largest, scale = max(map(abs, edge.direction)), edge.limit.denominator
    if value is not None and edge.direction[value]:
        largest = abs(edge.direction[value])
    elif edge.is_plain:
        return tuple(Fraction(scale * value) for value in edge.direction), scale * edge.limit, Fraction(scale)
    row = [Fraction(value, largest) for value in edge.direction]
    limit = edge.limit / largest
    if not exact and not edge.is_plain and not edge.is_met:
        row, limit = [_decimal(value) for value in row], _decimal(limit)
    return tuple(row), limit, Fraction(1, largest)


def _decimal(value: Fraction) -> Fraction:
    return Fraction(f"{float(value):.{TOLERANCES.digits - 1}e}")


def _unique(name: str, taken: set[str]) -> str:
    found, count = name, 1
    while found in taken:
        count += 1
        found = f"{name} ({count})"
    taken.add(found)
    return found
