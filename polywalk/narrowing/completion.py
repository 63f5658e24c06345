"""Can a partial plan be carried out? A completion of it, or the constraints that forbid it."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction

from polywalk.bigmodel import BigModel
from polywalk.errors import SolverError
from polywalk.exact import exact, short
from polywalk.model import Model
from polywalk.narrowing.adding import sparse, with_row
from polywalk.narrowing.certify import Basis, holds
from polywalk.narrowing.conflict import conflict
from polywalk.narrowing.program import Program
from polywalk.narrowing.shadow import shadow
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.tolerances import simple
from polywalk.table import Shown, Table

SHOWN = 20
"""Values of a completion that its table names."""


@dataclass(frozen=True, repr=False)
class Completion(Shown):
    """Whether values of some variables can be part of a plan.

    Parameters
    ----------
    plan : tuple of (str, Fraction)
        What was asked.
    verdict : {"possible", "possible within solver tolerance", "impossible"}
    values : tuple of (str, Fraction)
        A whole plan with these values; () where it is impossible.
    conflict : Model or None
        What stops it: constraints of the big model and of the plan ("x as planned") that contradict each other.
    limits : tuple of (str, Fraction or None, Fraction or None)
        Where one variable was asked and is impossible: the range it can have; () otherwise.
    """

    plan: tuple[tuple[str, Fraction], ...]
    verdict: str
    values: tuple[tuple[str, Fraction], ...] = ()
    conflict: Model | None = None
    limits: tuple[tuple[str, Fraction | None, Fraction | None], ...] = ()

    def table(self) -> Table:
        """The completion, or the conflict."""
        asked = ", ".join(f"{name} = {short(value)}" for name, value in self.plan)
        notes = [f"{name} can be from {_end(low)} to {_end(high)}" for name, low, high in self.limits]
        if self.conflict is not None:
            told = self.conflict.table()
            return Table(f"{asked}: {self.verdict}", told.columns, told.rows, (*told.notes, *notes))
        rows = tuple((name, value) for name, value in self.values if value)[:SHOWN]
        rest = sum(1 for _, value in self.values if value) - len(rows)
        if rest > 0:
            notes.append(f"and {rest} more that are not 0, see .values")
        notes.append("variables that are not listed are 0")
        return Table(f"{asked}: {self.verdict}, for example so", ("variable", "value"), rows, tuple(notes))


def completion(big: BigModel | Model, plan: Mapping[str, object]) -> Completion:
    """Whether some variables of a big model can have these values, and what stops them.

    Parameters
    ----------
    big : BigModel or Model
    plan : mapping of str to number
        The values of some variables.

    Returns
    -------
    Completion
        A whole plan with these values, or the conflict that forbids them.

    Raises
    ------
    UnknownName, NumberError
        A name that is not there, a value that is no number.
    SolverError
        HiGHS is missing, or stopped without an answer.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import completion
    >>> from polywalk.scenarios import harbour_row
    >>> print(completion(BigModel.from_model(harbour_row()), {"pump": 5, "chips": 0}))
    pump = 5, chips = 0: impossible
    constraint          rule              origin
    return temperature  pump - chips ≤ 4
    pump as planned     pump = 5
    chips as planned    chips = 0
    units: pump in MW, chips in MW

    References
    ----------
    Applegate, Cook, Dash & Espinoza, Exact solutions to linear programming problems, Oper. Res. Lett. 35, 2007 (a
    solver's basis read exactly); for what stops it see `conflict`.
    """
    big = sparse(big)
    asked = tuple((name, exact(value)) for name, value in plan.items())
    held = big
    for name, value in asked:
        held = with_row(held, f"{name} as planned", ([big.index(name)], [1.0]), float(value), float(value))
    program = Program(held, (), {row: value for row, (_, value) in zip(held.rows[big.m :], asked, strict=True)})
    solver = Solver(held)
    solver.aim([0], [0.0])
    status = solver.run()
    if status == "optimal":
        return _possible(program, solver, asked)
    if status != "infeasible":
        raise SolverError(f"HiGHS stopped without an answer ({solver.status_text}).", solver.status_text)
    return Completion(asked, "impossible", conflict=conflict(held), limits=_limits(big, asked))


def _possible(program: Program, solver: Solver, asked: tuple[tuple[str, Fraction], ...]) -> Completion:
    """The completion HiGHS found, exact where its basis is one."""
    names, statuses = program.big.variables, solver.basis()
    try:
        plan = None if statuses is None else Basis(program, statuses).point()
    except ValueError:
        plan = None
    if plan is not None and holds(program, plan):
        return Completion(asked, "possible", tuple((name, plan.at(j)) for j, name in enumerate(names)))
    values = [simple(value) or exact(value) for value in solver.point().tolist()]
    return Completion(asked, "possible within solver tolerance", tuple(zip(names, values, strict=True)))


def _limits(
    big: BigModel, asked: tuple[tuple[str, Fraction], ...]
) -> tuple[tuple[str, Fraction | None, Fraction | None], ...]:
    """The range of a single variable; () where several were asked, or there is no plan at all."""
    if len(asked) != 1:
        return ()
    found = shadow(big, (asked[0][0],))
    ends = found.region.ranges.get(asked[0][0])
    return () if ends is None else ((asked[0][0], *ends),)


def _end(value: Fraction | None) -> str:
    return "no limit" if value is None else short(value)
