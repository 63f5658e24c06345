"""All checks of a model, in one go."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass
from fractions import Fraction

from polywalk.budget import Budget
from polywalk.errors import NumberError
from polywalk.exact import exact, full
from polywalk.model import Model
from polywalk.reviewing.case import Case
from polywalk.reviewing.degenerate import degenerate_vertices
from polywalk.reviewing.empty import empty
from polywalk.reviewing.factors import unit_slips
from polywalk.reviewing.findings import Finding, Review, worst_first
from polywalk.reviewing.limits import Limits
from polywalk.reviewing.numbers import nearly_parallel, sliver, spread
from polywalk.reviewing.optimum import optima
from polywalk.reviewing.proofs import place
from polywalk.reviewing.redundancy import redundant, split_equalities, without_variables
from polywalk.reviewing.shape import shape
from polywalk.reviewing.switches import loose_switches
from polywalk.reviewing.unbounded import lines, unbounded
from polywalk.reviewing.units import unit_mismatches, units_given


@dataclass(frozen=True)
class Check:
    """One check: what it asks, and the function that answers; ``needs_plan``: only a model that has a plan is asked."""

    asks: str
    find: Callable[[Case], Iterable[Finding]]
    needs_plan: bool = True


CHECKS: tuple[Check, ...] = (
    Check("a plan exists", empty, needs_plan=False),
    Check("every constraint has a variable", without_variables, needs_plan=False),
    Check("the objective and the region are bounded", unbounded),
    Check("no direction is free both ways", lines),
    Check("no hidden equality, no forced value", shape),
    Check("no two inequalities that are one equality", split_equalities),
    Check("every constraint is needed", redundant),
    Check("no vertex is degenerate", degenerate_vertices),
    Check("the optimum is unique, and clearly so", optima),
    Check("coefficients are of similar size", spread, needs_plan=False),
    Check("no constraints are nearly parallel", nearly_parallel, needs_plan=False),
    Check("the region is no sliver", sliver),
    Check("no switch is larger than it need be", loose_switches),
    Check("no ratio looks like a unit slip", unit_slips, needs_plan=False),
    Check("units agree", unit_mismatches, needs_plan=False),
)


def review(
    model: Model,
    *,
    limits: Limits | None = None,
    weights: Mapping[str, object] | None = None,
    coefficient_units: Mapping[tuple[str, str], str] | None = None,
    budget: Budget | None = None,
) -> Review:
    """Everything worth knowing about a model: mistakes, oddities and hints, each with its proof, the worst first.

    Integer marks are not applied, save where a finding says so.

    Parameters
    ----------
    model : Model
    limits : Limits, optional
        From where on a check speaks up.
    weights : mapping of str to number, optional
        What a unit of relaxation of a constraint costs where the model is empty, above 0; default: 1 over the
        constraint's largest coefficient.
    coefficient_units : mapping of (str, str) to str, optional
        The unit of the coefficient in a constraint (or "objective") of a variable, such as "EUR/MWh"; "" is a pure
        number.
    budget : Budget, optional
        Time and memory for listing the vertices.

    Returns
    -------
    Review

    Raises
    ------
    UnknownName, NumberError
        A weight or unit for a name that is not there, a weight that is not above 0.
    ModelError
        A unit that cannot be read.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> told = pw.review(pw.scenarios.harbour_row("infeasible"))
    >>> for finding in told.findings[:3]:
    ...     print(finding.severity, "|", finding.title)
    error | no plan satisfies every constraint: harbour main and town contract contradict each other
    error | conflict: harbour main and town contract
    note | raising harbour main by 2, to 14, alone restores feasibility

    References
    ----------
    Gleeson & Ryan, Identifying minimally infeasible subsystems of inequalities, ORSA J. Computing 2, 1990 (conflicts);
    Telgen, Identifying redundant constraints and implicit equalities, Management Science 29, 1983. What else is
    checked, and how severe it is, has no published source unless its module names one.
    """
    case = Case(
        model, limits or Limits(), _weights(model, weights or {}), units_given(model, coefficient_units or {}), budget
    )
    found: list[Finding] = []
    checked = []
    for check in CHECKS:
        if check.needs_plan and case.empty:
            continue
        told = list(check.find(case))
        found += told
        checked.append(f"{check.asks}: {_result(case, check, told)}")
    left = sum(check.needs_plan for check in CHECKS)
    checked += [f"{left} more checks need a plan, and there is none"] if case.empty else []
    return Review(model, case.outcome, worst_first(found), tuple(checked))


def _result(case: Case, check: Check, told: list[Finding]) -> str:
    """What a check showed, in a phrase."""
    if told:
        codes = dict.fromkeys(item.code for item in told)
        return "does not hold, " + ", ".join(f"{sum(item.code == code for item in told)} {code}" for code in codes)
    face = case.region.optimal
    if check.find is optima and face is not None and case.region.value is not None:
        return f"holds, {full(case.region.value)} at {place(case.model, case.region.base[face.vertices[0]])}"
    if check.find is unit_mismatches and not case.model.units and not case.coefficient_units:
        return "no units were given"
    return "holds"


def _weights(model: Model, weights: Mapping[str, object]) -> tuple[tuple[str, Fraction], ...]:
    found = []
    for name, value in weights.items():
        model.constraint(name)
        if exact(value) <= 0:
            raise NumberError(f"the weight of {name!r}: expected a number above 0, got {value}.", culprit=value)
        found.append((name, exact(value)))
    return tuple(found)
