"""From proved inequalities to the shadow's model: rows as people write them, named after what stops them."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from fractions import Fraction

from polywalk.model import Constraint, Sense
from polywalk.narrowing.outline import Edge
from polywalk.narrowing.results import ShadowFacet
from polywalk.narrowing.support import Multipliers
from polywalk.narrowing.tolerances import TOLERANCES
from polywalk.narrowing.widening import VALUE

NAMED = 2
"""Constraints that a facet is named after; more would not fit beside a line."""

PLAIN = 10**6
"""Integers up to this size are coefficients someone could have typed; larger ones are scaled to decimals."""


@dataclass(frozen=True)
class Row:
    """A facet on its way into the model."""

    constraint: Constraint
    multipliers: Multipliers
    backward: Multipliers = ()


def built(rows: Iterable[Row], variables: tuple[str, ...], exact: bool) -> tuple[list[Constraint], list[ShadowFacet]]:
    """The constraints and the facets, each with a name of its own."""
    constraints, facets, taken = [], [], set[str]()
    for row in rows:
        name = _unique(row.constraint.name, taken)
        constraint = Constraint(name, row.constraint.coefficients, row.constraint.sense, row.constraint.rhs)
        constraints.append(constraint)
        proved = exact and bool(row.multipliers)
        facets.append(ShadowFacet(name, constraint.text(variables), row.multipliers, row.backward, proved))
    return constraints, facets


def row_of(edge: Edge, exact: bool) -> Row:
    """The row of an inequality: its first coefficient positive, so that x >= 0 reads as such."""
    direction, limit, factor = _plain(edge, exact)
    turned = next(value for value in direction if value) < 0
    sign = -1 if turned else 1
    coefficients = tuple(sign * value for value in direction)
    multipliers = _sorted(edge.multipliers, sign * factor, exact)
    if edge.backward is None:
        sense: Sense = ">=" if turned else "<="
        return Row(Constraint(named(multipliers), coefficients, sense, sign * limit), multipliers)
    back = _sorted(edge.backward, -sign * factor, exact)
    first, second = (back, multipliers) if turned else (multipliers, back)
    return Row(Constraint(named(first), coefficients, "==", sign * limit), first, second)


def named(multipliers: Multipliers) -> str:
    """What a facet is called: the constraints that stop it, the largest multipliers first."""
    names = [name for name, _ in multipliers if name != VALUE] or [name for name, _ in multipliers]
    if len(names) <= NAMED + 1:
        return " & ".join(names) or "outline"
    return " & ".join([*names[:NAMED], f"{len(names) - NAMED} more"])


def _sorted(multipliers: Multipliers, factor: Fraction, exact: bool) -> Multipliers:
    """The largest first; without what is only rounding."""
    largest = max((abs(value) for _, value in multipliers), default=Fraction(0))
    least = Fraction(0) if exact else largest * Fraction(TOLERANCES.zero)
    scaled = [(name, value * factor) for name, value in multipliers if abs(value) >= least]
    return tuple(sorted(scaled, key=lambda pair: -abs(pair[1])))


def _plain(edge: Edge, exact: bool) -> tuple[tuple[Fraction, ...], Fraction, Fraction]:
    """Coefficients, right-hand side, and what the multipliers are to be multiplied with.

    Long integers that carry rounding become decimals, the largest coefficient 1.
    """
    largest = max(map(abs, edge.direction))
    if exact or largest <= PLAIN:
        scale = edge.limit.denominator  # the smallest integers, as in the projection of a region
        return tuple(Fraction(scale * value) for value in edge.direction), scale * edge.limit, Fraction(scale)
    row = [_decimal(Fraction(value, largest)) for value in edge.direction]
    return tuple(row), _decimal(edge.limit / largest), Fraction(1, largest)


def _decimal(value: Fraction) -> Fraction:
    return Fraction(f"{float(value):.{TOLERANCES.digits - 1}e}")


def _unique(name: str, taken: set[str]) -> str:
    found, count = name, 1
    while found in taken:
        count += 1
        found = f"{name} ({count})"
    taken.add(found)
    return found
