"""How far a model reaches in a direction of the columns looked at: a point or a ray, and what proves that limit.

Two ways to answer: `ExactReach` in fractions, with every claim checked; `FloatReach` with what HiGHS says.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from typing import Any

import numpy as np

from polywalk.errors import SolverError
from polywalk.linear import optimum
from polywalk.model import Model
from polywalk.narrowing.certify import Basis, Limit, Target, Whole, holds
from polywalk.narrowing.hull import Integers, smallest, whole
from polywalk.narrowing.program import Program, cone_of
from polywalk.narrowing.proof import Exact, Proof, Rounded
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.tolerances import TOLERANCES, snapped


@dataclass(frozen=True)
class Reach:
    """The answer in one direction.

    Parameters
    ----------
    generator : (k + 1,) tuple of int
        A point (positive first entry) where the limit is attained, or a ray (0 first) on which there is none.
    limit : Fraction or None
        The greatest value of direction . x; None along a ray.
    proof : Proof or None
        The multipliers that add up to direction . x <= limit.
    """

    generator: Integers
    limit: Fraction | None = None
    proof: Proof | None = None


class EmptyModelError(Exception):
    """The model allows no plan; with the proof, where there is one."""

    def __init__(self, proof: Proof | None = None) -> None:
        super().__init__()
        self.proof = proof


class InexactError(Exception):
    """No exact answer within the stated sizes; the caller goes on in floats."""


class _Asked:
    """What both ways share: two solvers that keep their bases, one for points and one for rays."""

    def __init__(self, program: Program) -> None:
        self.program = program
        self.solver = Solver(program.big)
        self._bases: dict[Integers, Any] = {}
        self._at: Integers = ()

    @cached_property
    def cone(self) -> Program:
        """The program of the directions."""
        return cone_of(self.program)

    @cached_property
    def cone_solver(self) -> Solver:
        """Its solver."""
        return Solver(self.cone.big)

    @property
    def runs(self) -> int:
        """How many linear programs were solved."""
        return self.solver.runs + (self.cone_solver.runs if "cone_solver" in self.__dict__ else 0)

    def _approach(self, facet: Sequence[Integers]) -> None:
        """Stand at a point of the facet, the newest: from there the way beyond it is short."""
        known = [generator for generator in facet if generator in self._bases]
        if known and self._at not in known:
            self.solver.stand_at(self._bases[known[-1]])

    def _arrive(self, generator: Integers) -> None:
        self._at = generator
        self._bases[generator] = self.solver.standing()

    def _target(self, direction: Sequence[int]) -> Target:
        return {j: Fraction(value) for j, value in zip(self.program.keep, direction, strict=True)}

    def _aim(self, solver: Solver, direction: Sequence[int]) -> None:
        size = max(map(abs, direction)) or 1
        solver.aim(self.program.keep, [value / size for value in direction])


def value_of(direction: Sequence[int], generator: Integers) -> Fraction:
    """direction . point, or direction . ray."""
    total = sum([a * b for a, b in zip(direction, generator[1:], strict=True)])
    return Fraction(total, generator[0] or 1)


class ExactReach(_Asked):
    """Every answer in fractions: the point keeps every row, the multipliers reach the same value."""

    def ask(self, direction: Integers, facet: Sequence[Integers] = ()) -> Reach:
        """The answer in this direction; ``facet`` has points to start from.

        Raises
        ------
        EmptyModelError, InexactError
        """
        self._approach(facet)
        self._aim(self.solver, direction)
        status = self.solver.run()
        found = None
        if status == "optimal":
            found = self._proved(direction)
        elif status == "unbounded":
            found = self._ray(direction)
        elif status == "infeasible" and not self._is_small:
            raise EmptyModelError
        return found or self._mended(direction)

    def _proved(self, direction: Integers) -> Reach | None:
        plan, limit = _read(self.program, self.solver, self._target(direction))
        if plan is None or limit is None:
            return None
        generator = self._point(plan)
        if limit.value != value_of(direction, generator):
            return None
        self._arrive(generator)
        return Reach(generator, limit.value, Exact(limit.multipliers))

    def _point(self, plan: Whole) -> Integers:
        return whole([Fraction(plan.common), *(Fraction(plan.values[j]) for j in self.program.keep)])

    def _ray(self, direction: Integers) -> Reach | None:
        """The ray HiGHS met, if it keeps every row exactly; else that of the linear program of the directions."""
        met = self.solver.ray()
        if met is not None and met.any():
            values = whole([snapped(value) for value in (met / np.abs(met[met != 0]).min()).tolist()])
            generator = (0, *smallest([values[j] for j in self.program.keep]))
            if value_of(direction, generator) > 0 and holds(self.cone, Whole(list(values), max(map(abs, values)))):
                return Reach(generator)
        self._aim(self.cone_solver, direction)
        if self.cone_solver.run() != "optimal":
            return None
        plan, _ = _read(self.cone, self.cone_solver, {})
        if plan is None:
            return None
        generator = (0, *whole([Fraction(plan.values[j]) for j in self.program.keep]))
        return Reach(generator) if value_of(direction, generator) > 0 else None

    @property
    def _is_small(self) -> bool:
        """Whether the exact simplex method can take over."""
        big = self.program.big
        return big.n * (big.n + big.m) <= TOLERANCES.cells

    @cached_property
    def _model(self) -> Model:
        if not self._is_small:
            raise InexactError
        model = self.program.big.to_model().without_objective()
        for name, value in self.program.held.items():
            model = model.with_rhs(name, value)
        return model

    def _mended(self, direction: Integers) -> Reach:
        """The answer of the exact simplex method, where HiGHS was wrong within its tolerance."""
        model, keep = self._model, self.program.keep
        way = {model.variables[j]: value for j, value in zip(keep, direction, strict=True)}
        best = optimum(model.with_objective(way, "max"))
        if best.infeasibility is not None:
            proof = Exact(tuple(best.infeasibility.multipliers.items()))
            raise EmptyModelError(proof.times(-1 / best.infeasibility.total))  # they add up to 0 <= -1
        if best.ray is not None:
            return Reach((0, *whole([best.ray.direction[j] for j in keep])))
        point, multipliers = best.point, best.multipliers
        assert point is not None
        assert multipliers is not None
        generator = whole([Fraction(1), *(point[j] for j in keep)])
        used = tuple((name, value) for name, value in multipliers.items() if value)
        return Reach(generator, best.value, Exact(used))


def _read(program: Program, solver: Solver, target: Target) -> tuple[Whole | None, Limit | None]:
    """The exact plan of the solver's basis, None where it breaks a row; and what its multipliers prove."""
    statuses = solver.basis()
    if statuses is None:
        return None, None
    try:
        basis = Basis(program, statuses)
        plan = basis.point()
        limit = basis.limit(target) if target else None
    except ValueError:
        return None, None
    return plan if plan is not None and holds(program, plan) else None, limit


class FloatReach(_Asked):
    """Every answer as HiGHS gives it; numbers near a simple fraction are taken for it."""

    def ask(self, direction: Integers, facet: Sequence[Integers] = ()) -> Reach:
        """The answer in this direction; ``facet`` has points to start from.

        Raises
        ------
        EmptyModelError, SolverError
        """
        self._approach(facet)
        self._aim(self.solver, direction)
        status = self._run(self.solver)
        if status == "infeasible":
            raise EmptyModelError
        if status == "unbounded":
            self._aim(self.cone_solver, direction)
            self._run(self.cone_solver)
            ray = whole([snapped(value) for value in self.cone_solver.values(self.program.keep)])
            if value_of(direction, (0, *ray)) <= 0:
                raise SolverError(
                    "HiGHS calls the model unbounded, and there is no ray; look for bounds, right-hand sides and "
                    "coefficients of very different sizes (it takes values beyond 1e20 for infinite).",
                    self.solver.status_text,
                )
            return Reach((0, *ray))
        generator = whole([Fraction(1), *map(snapped, self.solver.values(self.program.keep))])
        self._arrive(generator)
        size = max(map(abs, direction)) or 1
        return Reach(generator, snapped(self.solver.value) * size, self._proof(size))

    def _run(self, solver: Solver) -> str:
        status = solver.run()
        if status == "unclear":  # a basis can be at fault: once more from nothing
            solver.forget()
            status = solver.run()
        if status == "unclear":
            raise SolverError(
                f"HiGHS stopped without an answer ({solver.status_text}) after {self.runs} linear programs; look for "
                "coefficients of very different sizes, or rescale rows and columns.",
                solver.status_text,
            )
        return status

    def _proof(self, size: int) -> Rounded:
        return Rounded(self.program, *self.solver.duals(), Fraction(size))
