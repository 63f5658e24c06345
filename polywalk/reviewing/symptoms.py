"""What is wrong, as the analyst sees it: a status, plans that should (not) be allowed, what should be optimal."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from fractions import Fraction
from typing import Any

from polywalk.errors import ModelError, unknown
from polywalk.exact import Row, exact
from polywalk.linear import Optimum
from polywalk.linear import optimum as solve
from polywalk.model import Model
from polywalk.reviewing.tolerances import TOLERANCES, within
from polywalk.table import cell

Plan = Mapping[str, object] | Iterable[object]
STATUSES = {"infeasible": "no plan is allowed", "unbounded": "the objective improves without end"}
MEANS = {"infeasible": "infeasible", "empty": "infeasible", "unbounded": "unbounded"}


@dataclass(frozen=True)
class Symptom:
    """What a suspect has to cure.

    Parameters
    ----------
    status : {"infeasible", "unbounded", ""}
        What the model is now, and should not be.
    allowed, forbidden : tuple of (n,) tuple of Fraction
        Plans that should be allowed, and plans that should not.
    value : Fraction or None
        What the optimal value should be.
    point : (n,) tuple of Fraction or None
        A plan that should be optimal.
    """

    status: str
    allowed: tuple[Row, ...] = ()
    forbidden: tuple[Row, ...] = ()
    value: Fraction | None = None
    point: Row | None = None

    def admits(self, value: Fraction | None, best: Fraction | None) -> bool:
        """Whether an optimal value, and the value at the plan that should be optimal, are as they should be."""
        if self.value is not None and (best is None or not within(best - self.value, self.value, TOLERANCES.objective)):
            return False
        return self.point is None or value == best

    def told(self) -> str:
        """One line of text."""
        parts = [STATUSES[self.status]] if self.status else []
        parts += [f"{cell(point)} should be allowed" for point in self.allowed]
        parts += [f"{cell(point)} should be forbidden" for point in self.forbidden]
        parts += [f"the optimal value should be {cell(self.value)}"] if self.value is not None else []
        parts += [f"{cell(self.point)} should be optimal"] if self.point is not None else []
        return "; ".join(parts)


def symptom_of(
    model: Model,
    allowed: Iterable[Plan] = (),
    forbidden: Iterable[Plan] = (),
    optimum: object = None,
    symptom: str | None = None,
) -> tuple[Symptom, bool]:
    """The symptom, and whether the model has it.

    Raises
    ------
    ModelError
        Nothing is said to be wrong, or what is said contradicts itself or the model.
    """
    now = solve(model)
    status = _status(now, symptom)
    value, point = _wanted(model, optimum)
    seen = Symptom(status, _plans(model, allowed, "allowed"), _plans(model, forbidden, "forbidden"), value, point)
    _check(model, seen)
    return seen, bool(status) or not _holds(model, seen, now)


def _status(now: Optimum, symptom: str | None) -> str:
    found = now.outcome if now.outcome in STATUSES else ""
    if symptom is None:
        return found
    if symptom not in MEANS:
        raise unknown("symptom", symptom, MEANS, "the list of symptoms")
    if MEANS[symptom] != now.outcome:
        raise ModelError(
            f"the model is said to be {symptom}, and it is {now.outcome}; leave symptom= out to take what it is.",
            symptom,
        )
    return found


def _wanted(model: Model, optimum: object) -> tuple[Fraction | None, Row | None]:
    if optimum is None:
        return None, None
    if model.objective is None:
        raise ModelError("an optimum is expected of a model without an objective; give it one or leave optimum= out.")
    if isinstance(optimum, Mapping | list | tuple):
        return None, model.point(optimum)
    return exact(optimum), None


def _plans(model: Model, plans: Any, where: str) -> tuple[Row, ...]:
    if isinstance(plans, Mapping | str) or not isinstance(plans, Iterable):
        raise ModelError(f"{where}=: expected a list of plans, got {plans!r}; write {where}=[plan].", plans)
    listed = list(plans)
    for plan in listed:
        if isinstance(plan, str) or not isinstance(plan, Mapping | Iterable):
            raise ModelError(f"{where}=: expected a list of plans, got {plan!r} as one; write {where}=[plan].", plan)
    return tuple(model.point(plan) for plan in listed)


def _check(model: Model, seen: Symptom) -> None:
    both = [point for point in seen.allowed if point in seen.forbidden]
    if both:
        raise ModelError(f"the plan {cell(both[0])} is said to be allowed and forbidden; leave one out.", both[0])
    if seen.point is not None and seen.point in seen.forbidden:
        raise ModelError(f"the plan {cell(seen.point)} is said to be optimal and forbidden; leave one out.", seen.point)
    if not (seen.status or seen.allowed or seen.forbidden or seen.value is not None or seen.point is not None):
        raise ModelError(
            "the model has an optimum and nothing is said to be wrong with it; say what should hold: allowed=[plan], "
            "forbidden=[plan] or optimum=value.",
            model,
        )


def _holds(model: Model, seen: Symptom, now: Optimum) -> bool:
    def fits(point: Row) -> bool:
        return all(row.holds(point) for row in model.constraints)

    if not all(map(fits, seen.allowed)) or any(map(fits, seen.forbidden)):
        return False
    if seen.point is not None and not fits(seen.point):
        return False
    at = None if seen.point is None or model.objective is None else model.objective.at(seen.point)
    return seen.admits(at, now.value)
