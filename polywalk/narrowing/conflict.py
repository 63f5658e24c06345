"""A small conflict inside an infeasible big model: constraints that contradict each other, none of them to spare."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace
from itertools import count
from math import inf, isnan
from time import monotonic

import numpy as np

from polywalk.bigmodel import BigModel, locate
from polywalk.errors import NumberError, SolverError
from polywalk.linear import Farkas, farkas
from polywalk.model import Constraint, Model
from polywalk.narrowing.adding import sparse
from polywalk.narrowing.certify import Basis, Limit, holds
from polywalk.narrowing.circuit import contradiction, is_irreducible, part_of
from polywalk.narrowing.culprits import Order, added_up, ordered
from polywalk.narrowing.cutting import cut
from polywalk.narrowing.elastic import crossed, elastic, stretched_rows
from polywalk.narrowing.program import Program
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.tolerances import TOLERANCES
from polywalk.progress import progress

LARGEST = 1_000_000
"""Variables times constraints up to which a conflict is a model, which keeps every zero; past them it is added up."""

SECONDS = 60.0
"""How long a conflict may take by default: what people wait for while they can see that it goes on."""


def conflict(big: BigModel | Model, seconds: float = SECONDS) -> Model | None:
    """A few constraints of an infeasible big model that contradict each other, as an exact small model.

    Multipliers of HiGHS say which rows and bounds contradict each other; that they do, and that without any one of them
    they would not, is then proved in exact arithmetic. Where that fails, elastic filtering finds rows that cannot all
    be kept, and deletion filtering in exact arithmetic takes away what is not needed.

    Parameters
    ----------
    big : BigModel or Model
    seconds : float, optional
        After so long no more constraints are tried. A conflict that may then still have some to spare says so in its
        name.

    Returns
    -------
    Model or None
        The conflict, in the variables it touches, without an objective; None where the big model has a plan. A model
        can have many conflicts; this is one of them. First come constraints that it suffices to relax, all others
        of the big model unchanged; their origin says how far (those found in five seconds). The others follow, large
        families that differ only in an index last. A conflict too large for an exact model is added up to two
        constraints on one number, the left side of the first one: its own, and what all the others say together.

    Raises
    ------
    SolverError
        HiGHS is missing or stopped; or the model is infeasible by so little that it cannot be decided at its size.
    NumberError
        Seconds that are no number.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import conflict
    >>> from polywalk.scenarios import harbour_row
    >>> print(conflict(BigModel.from_model(harbour_row("infeasible"))))
    conflict in Harbour Row, infeasible: no objective
    constraint     rule                      origin
    harbour main   pump + chips + tank ≤ 12  relaxed to 14 it alone suffices
    town contract  pump + chips + tank ≥ 14  relaxed to 12 it alone suffices
    free (no bound of their own): pump, chips, tank
    units: pump in MW, chips in MW, tank in MW

    References
    ----------
    Chinneck & Dravnieks, Locating minimal infeasible constraint sets in linear programs, ORSA J. Comput. 3, 1991.
    Gleeson & Ryan, Identifying minimally infeasible subsystems of inequalities, ORSA J. Comput. 2, 1990.
    """
    if not isinstance(seconds, int | float) or isnan(seconds):
        raise NumberError(f"seconds: expected a number, got {seconds!r}.", seconds)
    return conflict_of(sparse(big), monotonic() + seconds, True)


def conflict_of(big: BigModel, end: float = inf, is_ranked: bool = False) -> Model | None:
    """A conflict, its constraints tried one by one for the one that suffices alone if they are to be ranked."""
    for place in crossed(big):
        names = [f"{big.variables[place]} {side}" for side in ("lower", "upper")]
        return _named(big, cut(big, [], [place]), names)
    found = contradiction(big)
    if found is not None:
        return _told(big, found, end, is_ranked)
    rows = stretched_rows(big)
    if not rows and _has_plan(big):
        return None
    proof = _proof(big, rows)
    if proof is None:
        return None
    less = irreducible(big, proof, end)
    if not is_ranked:
        return less
    order = ordered(big, [row.name for row in less.constraints], end)
    return replace(less, constraints=_rows(less, order))


def _told(big: BigModel, found: Limit, end: float, is_ranked: bool) -> Model:
    """A proved contradiction as a model: whole, or added up to two constraints."""
    names = [name for name, _ in found.multipliers]
    order = ordered(big, names, end if is_ranked else 0.0)
    places = [locate(big, name)[:2] for name in names]
    rows, bounded = ([place for what, place in places if bool(what) is is_row] for is_row in (True, False))
    touched = np.unique(part_of(big, rows).indices)
    if len(touched) * len(names) > LARGEST:
        return added_up(big, found, order)
    whole = _named(big, cut(big, rows, bounded), names)
    return replace(whole, constraints=_rows(whole, order))


def _rows(model: Model, order: Order) -> tuple[Constraint, ...]:
    return tuple(replace(model.constraint(name), origin=origin) for name, origin in order)


def irreducible(big: BigModel, proof: Farkas, end: float = inf) -> Model:
    """The constraints that an exact proof needs, as a small model in the variables they touch."""
    names, is_done = _filtered(proof, end)
    found = _named(big, proof.model, names)
    return found if is_done else replace(found, name=f"{found.name} (not proved irreducible: time was up)")


def _has_plan(big: BigModel) -> bool:
    """Whether a basis of HiGHS is a plan exactly; False where it is not, and nothing is known."""
    solver = Solver(big)
    solver.aim([0], [0.0])
    statuses = solver.basis() if solver.run() == "optimal" else None
    if statuses is None:
        return False
    try:
        program = Program(big, ())
        plan = Basis(program, statuses).point()
    except ValueError:
        return False
    return plan is not None and holds(program, plan)


def _proof(big: BigModel, rows: list[int]) -> Farkas | None:
    """The exact contradiction of these rows and the bounds they need; of the whole model where they have none."""
    if rows:
        lean = cut(big, rows, _needed_bounds(big, rows))
        found = _small_enough(lean) and farkas(lean)
        if found:
            return found
        full = cut(big, rows, range(big.n))
        found = _small_enough(full) and farkas(full)
        if found:
            return found
    if big.n * (big.n + big.m) > TOLERANCES.cells:
        raise SolverError(
            "whether the model has a plan cannot be decided: HiGHS's answer holds only within its tolerance, and the "
            f"model ({big.n} variables, {big.m} rows) is too large to decide it exactly; take a section first.",
            big.name,
        )
    return farkas(big.to_model())


def _small_enough(model: Model) -> bool:
    return model.n * len(model.constraints) <= 25 * TOLERANCES.cells


def _needed_bounds(big: BigModel, rows: list[int]) -> list[int]:
    """The variables whose bounds take part in the contradiction, by the multipliers of stretching these rows."""
    program = elastic(part_of(big, rows))
    solver = Solver(program)
    solver.aim(range(big.n, program.n), [-1.0] * (program.n - big.n))
    if solver.run() != "optimal":
        return list(range(big.n))
    _, reduced = solver.duals()
    found: list[int] = np.flatnonzero(np.abs(reduced[: big.n]) > TOLERANCES.zero).tolist()
    return found


def _filtered(proof: Farkas, end: float) -> tuple[list[str], bool]:
    """Deletion filtering, exactly: constraint by constraint is left out as long as the rest stays empty.

    Returns
    -------
    (list of str, bool)
        The constraints kept, and whether that none is to spare was proved before the time was up.
    """
    kept, tried = proof, set[str]()
    for _ in progress(count(), len(proof.multipliers), "constraints tried"):
        if is_irreducible(kept.model.constraint(name).coefficients for name in kept.multipliers):
            return list(kept.multipliers), True
        name = next((name for name in kept.multipliers if name not in tried), None)
        if name is None or monotonic() > end:
            break
        tried.add(name)
        rows = tuple(kept.model.constraint(other) for other in kept.multipliers if other != name)
        less = farkas(replace(kept.model, constraints=rows, units=())) if rows else None
        kept = kept if less is None else less
    return list(kept.multipliers), name is None


def _named(big: BigModel, model: Model, names: Iterable[str]) -> Model:
    """These constraints alone, in the variables they touch."""
    chosen = set(names)
    rows = [row for row in model.constraints if row.name in chosen]
    used = [j for j in range(model.n) if any(row.coefficients[j] for row in rows)] or [0]
    slim = tuple(replace(row, coefficients=tuple(row.coefficients[j] for j in used)) for row in rows)
    variables = tuple(model.variables[j] for j in used)
    known = {*variables, *chosen}
    return Model(
        variables,
        slim,
        units=tuple(pair for pair in big.units if pair[0] in known),
        integers=tuple(name for name in big.integers if name in variables),
        name=f"conflict in {big.name or 'the big model'}",
    )
