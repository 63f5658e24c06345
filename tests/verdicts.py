"""Whether a suspect is the mistake that was planted. For the tests only; looks at models, not at their ranks."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from planted import Case

from polywalk.exact import dot, primitive
from polywalk.linear import optimum
from polywalk.model import Constraint, Model


def places(case: Case, found: Sequence[Any]) -> list[int]:
    """Where in the list the true correction stands."""
    right = forgotten if case.slip.startswith("forgotten") else undone
    return [k for k, suspect in enumerate(found) if right(case, suspect)]


def undone(case: Case, suspect: Any) -> bool:
    """Whether the corrected model is the true one."""
    return bool(suspect.reversible) and said(suspect.model) == said(case.truth)


def said(model: Model) -> object:
    """What a model says: its rows by name, up to a positive factor (any factor for an equality), and its objective."""
    return {row.name: meaning(row) for row in model.constraints}, model.objective


def meaning(row: Constraint) -> object:
    """A row as the smallest integers (b, a) with b + a.x >= 0 or = 0."""
    shift, slope = row.inward
    whole = primitive((shift, *slope))
    if row.sense == "==":
        return "==", max(whole, tuple(-value for value in whole))
    return ">=", whole


def forgotten(case: Case, suspect: Any) -> bool:
    """Whether it names variables of the forgotten row, on its side, and values holding what the row lets them reach."""
    if suspect.reversible:
        return False
    row, way = case.truth.constraint(case.place), suspect.gap.direction
    outward = tuple(-value for value in row.inward[1])
    named = [(a, g) for a, g in zip(outward, way, strict=True) if g]
    if row.sense == "==":
        named = [(abs(a), abs(g)) for a, g in named] if len({a * g > 0 for a, g in named}) == 1 else [(-1, 1)]
    if not all(a * g > 0 for a, g in named):
        return False
    reach = optimum(case.truth.with_objective(dict(zip(case.truth.variables, way, strict=True)), "max"))
    assert reach.outcome != "optimal" or reach.value == dot(way, reach.point)
    return reach.outcome == "optimal" and suspect.gap.values.holds(reach.value)
