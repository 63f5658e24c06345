"""The optimum of a big model: HiGHS's basis read exactly, or its floats where that does not prove it."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import Literal

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError, SolverError
from polywalk.exact import Row, exact
from polywalk.linear import optimum
from polywalk.narrowing.certify import Basis, Statuses, holds
from polywalk.narrowing.program import Program
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.tolerances import TOLERANCES, snapped

Outcome = Literal["optimal", "unbounded", "infeasible"]


@dataclass(frozen=True)
class Best:
    """How a big model ends.

    Parameters
    ----------
    outcome : {"optimal", "unbounded", "infeasible"}
    value : Fraction or None
        With the objective's constant.
    point : (n,) tuple of Fraction or None
        An optimal plan.
    basis : (list of int, list of int) or None
        HiGHS's last, of columns and rows.
    is_exact : bool
        Whether plan and value are proved in fractions; else they are HiGHS's, each number near a simple fraction
        taken for it.
    """

    outcome: Outcome
    value: Fraction | None = None
    point: Row | None = None
    is_exact: bool = False
    basis: Statuses | None = None


def best(big: BigModel, plan: bool = True) -> Best:
    """The optimum, exact where its basis proves it or the model is small.

    Parameters
    ----------
    big : BigModel
    plan : bool, optional
        Whether the plan is wanted, where it is HiGHS's: to read thousands of floats as fractions takes a while.

    Raises
    ------
    ModelError
        Without an objective.
    SolverError
        Where HiGHS is missing or stops without an answer.
    """
    if big.goal is None:
        raise ModelError("expected a model with an objective; give it one with with_objective.", big.name)
    sign = 1 if big.goal == "max" else -1
    solver = Solver(big)
    solver.aim(range(big.n), [sign * float(value) for value in costs(big)])
    status = solver.run()
    found = _rebuilt(big, solver, sign) if status == "optimal" and big.nonzeros <= TOLERANCES.nonzeros else None
    if found is None and big.n * (big.n + big.m) <= TOLERANCES.cells:
        known = optimum(big.to_model())
        return Best(known.outcome, known.value, known.point if known.outcome == "optimal" else None, True)
    if found is None and status == "unclear":
        raise SolverError(f"HiGHS stopped without an optimum ({solver.status_text}).", solver.status_text)
    if found is not None or status != "optimal":
        return found or Best("unbounded" if status == "unbounded" else "infeasible")
    value = snapped(sign * solver.value + big.constant)
    point = tuple(snapped(value) for value in solver.point().tolist()) if plan else None
    return Best("optimal", value, point, basis=solver.basis())


def costs(big: BigModel) -> list[float]:
    """The objective's coefficients, one a variable."""
    found: list[float] = big.cost.tolist()
    return found


def _rebuilt(big: BigModel, solver: Solver, sign: int) -> Best | None:
    """The exact plan of the basis, if its multipliers prove it."""
    program, statuses = Program(big, ()), solver.basis()
    if statuses is None:
        return None
    target = {j: sign * exact(float(value)) for j, value in enumerate(costs(big)) if value}
    try:
        basis = Basis(program, statuses)
        plan, limit = basis.point(), basis.limit(target)
    except ValueError:
        return None
    if plan is None or limit is None or not holds(program, plan):
        return None
    value = sum([weight * plan.at(j) for j, weight in target.items()], Fraction(0))
    if limit.value != value:
        return None
    point = tuple(plan.at(j) for j in range(big.n))
    return Best("optimal", sign * value + exact(big.constant), point, True, statuses)
