"""A small conflict inside an infeasible big model: constraints that contradict each other, none of them to spare."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.errors import SolverError
from polywalk.linear import Farkas, farkas
from polywalk.model import Model
from polywalk.narrowing.adding import changed, sparse
from polywalk.narrowing.certify import Basis, holds
from polywalk.narrowing.cutting import cut
from polywalk.narrowing.elastic import crossed, elastic, stretched_rows
from polywalk.narrowing.program import Program
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.tolerances import TOLERANCES


def conflict(big: BigModel | Model) -> Model | None:
    """A few constraints of an infeasible big model that contradict each other, as an exact small model.

    Elastic filtering with HiGHS finds rows that cannot all be kept, deletion filtering in exact arithmetic takes away
    what is not needed. That the model returned is empty, and that without any one of its constraints it is not, are
    both decided exactly.

    Parameters
    ----------
    big : BigModel or Model

    Returns
    -------
    Model or None
        The conflict, in the variables it touches, without an objective; None where the big model has a plan. A model
        can have many conflicts; this is one of them.

    Raises
    ------
    SolverError
        HiGHS is missing or stopped; or the model is infeasible by so little that it cannot be decided at its size.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import conflict
    >>> from polywalk.scenarios import harbour_row
    >>> print(conflict(BigModel.from_model(harbour_row("infeasible"))))
    conflict in Harbour Row, infeasible: no objective
    constraint     rule                      origin
    harbour main   pump + chips + tank ≤ 12
    town contract  pump + chips + tank ≥ 14
    free (no bound of their own): pump, chips, tank
    units: pump in MW, chips in MW, tank in MW

    References
    ----------
    Chinneck & Dravnieks, Locating minimal infeasible constraint sets in linear programs, ORSA J. Comput. 3, 1991.
    """
    big = sparse(big)
    for place in crossed(big):
        names = [f"{big.variables[place]} {end}" for end in ("lower", "upper")]
        return _named(big, cut(big, [], [place]), names)
    rows = stretched_rows(big)
    if not rows and _has_plan(big):
        return None
    proof = _proof(big, rows)
    if proof is None:
        return None
    return irreducible(big, proof)


def irreducible(big: BigModel, proof: Farkas) -> Model:
    """The constraints that an exact proof needs, as a small model in the variables they touch."""
    return _named(big, proof.model, _filtered(proof))


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


def part_of(big: BigModel, rows: Iterable[int]) -> BigModel:
    """The big model with some of its rows."""
    places = list(rows)
    spans = [np.arange(big.indptr[i], big.indptr[i + 1]) for i in places]
    used = np.concatenate(spans) if spans else np.array([], dtype=np.int64)
    return changed(
        big,
        rows=tuple(big.rows[i] for i in places),
        indptr=np.cumsum([0, *(len(span) for span in spans)]),
        indices=big.indices[used],
        data=big.data[used],
        row_lower=big.row_lower[places],
        row_upper=big.row_upper[places],
        units=(),
    )


def _filtered(proof: Farkas) -> list[str]:
    """Deletion filtering, exactly: constraint by constraint is left out as long as the rest stays empty."""
    kept, tried = proof, set[str]()
    while untried := [name for name in kept.multipliers if name not in tried]:
        name = untried[0]
        tried.add(name)
        rows = tuple(kept.model.constraint(other) for other in kept.multipliers if other != name)
        less = farkas(replace(kept.model, constraints=rows, units=())) if rows else None
        kept = kept if less is None else less
    return list(kept.multipliers)


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
