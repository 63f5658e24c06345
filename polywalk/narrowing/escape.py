"""The way out of an unbounded big model: the variables that grow for ever and the rows they slide along."""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError, SolverError
from polywalk.exact import Row, dot, exact, primitive
from polywalk.linear import improving_ray
from polywalk.model import Model
from polywalk.narrowing.adding import sparse
from polywalk.narrowing.best import costs
from polywalk.narrowing.certify import Basis, Whole, holds
from polywalk.narrowing.hull import whole
from polywalk.narrowing.program import Program, cone_of
from polywalk.narrowing.section import section
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.tolerances import TOLERANCES, simple, snapped


def escape(big: BigModel | Model) -> Model | None:
    """The part of an unbounded big model in which its objective improves without end, as an exact small model.

    Parameters
    ----------
    big : BigModel or Model

    Returns
    -------
    Model or None
        In the variables that change along one improving ray, the others set to their values at a plan: the rows and
        bounds the ray slides along (those it stays at the same distance of) and the bounds it leaves behind. The ray
        keeps all of them, so the small model is unbounded too; a constraint that is missing in the big one is
        missing here. None where the big model has an optimum, or no plan.

    Raises
    ------
    ModelError
        Without an objective.
    SolverError
        HiGHS is missing or stopped, or its ray does not hold exactly in a model too large to decide it otherwise.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import escape
    >>> from polywalk.scenarios import harbour_row
    >>> print(escape(BigModel.from_model(harbour_row("unbounded"))))
    way out of Harbour Row, unbounded: maximize 18 chips
    constraint   rule       origin
    chips lower  chips ≥ 0
    units: chips in MW

    References
    ----------
    Schrijver, Theory of Linear and Integer Programming, 1986, chapter 8 (directions that never leave a polyhedron).
    Which constraints are kept has no published source.
    """
    big = sparse(big)
    if big.goal is None:
        raise ModelError("expected a model with an objective; without one nothing improves without end.", big.name)
    found = _way(big)
    if found is None:
        return None
    point, ray = found
    moving = [j for j, value in enumerate(ray) if value]
    values = {name: value for j, (name, value) in enumerate(zip(big.variables, point, strict=True)) if not ray[j]}
    cut = section(big, [big.variables[j] for j in moving], values).model
    direction = tuple(ray[j] for j in moving)
    own = {f"{name} {end}" for name in cut.variables for end in ("lower", "upper")} - set(big.rows)
    kept = tuple(row for row in cut.constraints if row.name in own or not dot(row.coefficients, direction))
    known = {*cut.variables, *(row.name for row in kept)}
    units = tuple(pair for pair in big.units if pair[0] in known)
    return replace(cut, constraints=kept, units=units, name=f"way out of {big.name or 'the big model'}")


def _way(big: BigModel) -> tuple[Row, Row] | None:
    """A plan and an improving ray, exact; None where there is none."""
    sign = 1 if big.goal == "max" else -1
    solver = Solver(big)
    solver.aim(range(big.n), [sign * value for value in costs(big)])
    status = solver.run()
    if status in {"optimal", "infeasible"}:
        return None
    if status == "unbounded":
        ray, point = _exact_ray(big, solver, sign), _plan(big)
        if ray is not None and point is not None:
            return point, ray
    if big.n * (big.n + big.m) > TOLERANCES.cells:
        raise SolverError(
            f"HiGHS calls the model {solver.status_text.lower()}, but its ray does not hold exactly; rescale rows and "
            "columns of very different sizes.",
            solver.status_text,
        )
    known = improving_ray(big.to_model())
    return None if known is None else (known.point, known.direction)


def _exact_ray(big: BigModel, solver: Solver, sign: int) -> Row | None:
    """HiGHS's ray in the smallest integers, if it keeps every constraint exactly and improves."""
    met = solver.ray()
    if met is None or not met.any():
        return None
    met = np.where(np.abs(met) < TOLERANCES.zero * np.abs(met).max(), 0.0, met)
    values = whole([snapped(value) for value in (met / np.abs(met[met != 0]).min()).tolist()])
    gain = sum((sign * exact(cost) * value for cost, value in zip(costs(big), values, strict=True)), Fraction(0))
    if gain <= 0 or not holds(cone_of(Program(big, ())), Whole(list(values), 1)):
        return None
    return primitive([Fraction(value) for value in values])


def _plan(big: BigModel) -> Row | None:
    """A plan: exact from a basis, else HiGHS's floats, near simple fractions snapped."""
    solver = Solver(big)
    solver.aim([0], [0.0])
    if solver.run() != "optimal":
        return None
    statuses = solver.basis()
    try:
        plan = None if statuses is None else Basis(Program(big, ()), statuses).point()
    except ValueError:
        plan = None
    if plan is not None and holds(Program(big, ()), plan):
        return tuple(plan.at(j) for j in range(big.n))
    return tuple(simple(value) or snapped(value) for value in solver.point().tolist())
