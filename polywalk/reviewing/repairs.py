"""The smallest relaxations that give an empty model a plan: one constraint alone, or all together."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from typing import NamedTuple

from polywalk.exact import Row, full, short
from polywalk.linear import optimum
from polywalk.model import Constraint, Model, Objective
from polywalk.reviewing.case import Case
from polywalk.reviewing.conflicts import Conflicts
from polywalk.reviewing.findings import Finding, Proof
from polywalk.reviewing.proofs import Upper, halves, most, place, proof
from polywalk.reviewing.telling import listed


class Repair(NamedTuple):
    """The right-hand side that lets one constraint hold together with all others, and the plan that then exists."""

    row: Constraint
    rhs: Fraction
    point: Row
    proof: Proof


def single_repairs(case: Case, found: Conflicts) -> Iterator[Finding]:
    """For each constraint the least relaxation that alone restores feasibility; or that none does.

    Only a constraint of the first conflict can do it; of each that cannot, a conflict of the others is kept.
    """
    repairs, left = [], [found.proofs[0]]
    for name, _ in found.proofs[0].multipliers:
        repair = _repair(case.model, case.model.constraint(name))
        if isinstance(repair, Repair):
            repairs.append(repair)
        else:
            left.append(repair)
    if not repairs:
        yield _none(left)
    for repair in sorted(repairs, key=lambda repair: _amount(repair) / _size(repair.row)):
        row = repair.row
        verb = "raising" if repair.rhs > row.rhs else "lowering"
        yield Finding(
            "single-repair",
            f"{verb} {row.name} by {short(_amount(repair))}, to {short(repair.rhs)}, alone restores feasibility",
            f"with {row.name} at {short(repair.rhs)} instead of {short(row.rhs)} there is a plan "
            f"({place(case.model, repair.point)}); nothing less will do, as the other constraints show.",
            f"set the right-hand side of {row.name} to {full(repair.rhs)}, if that is what was meant.",
            (row.name,),
            points=(repair.point,),
            proofs=(repair.proof,),
            amounts=(("least relaxation", _amount(repair)), ("right-hand side", repair.rhs)),
        )


def _none(left: list[Proof]) -> Finding:
    names = dict.fromkeys(name for made in left for name, _ in made.multipliers)
    return Finding(
        "no-single-repair",
        "no single relaxation restores feasibility",
        "whichever one constraint is relaxed, however far, the others still contradict each other.",
        "at least two constraints must change; see the least relaxation of all together.",
        tuple(names),
        proofs=tuple(left),
    )


def _repair(model: Model, row: Constraint) -> Repair | Proof:
    """The least change of one right-hand side, or the proof that the others alone are empty."""
    rest = model.without(row.name)
    for sign, half in halves(row):
        best = most(rest, half.reverse.coefficients)
        if best.infeasibility is not None:
            return proof(rest.constraints, best.infeasibility.weights, (Fraction(0),) * model.n)
        if best.value is not None and best.point is not None and best.weights is not None and -best.value > half.rhs:
            made = proof(rest.constraints, best.weights, half.reverse.coefficients)
            return Repair(row, -sign * best.value, best.point, made)
    raise AssertionError("a constraint of a conflict cannot hold beside the others")


def least_repair(case: Case) -> Finding:
    """The least weighted total of relaxations, an exact optimum; its multipliers prove that nothing less will do."""
    model, costs = case.model, _costs(case)
    sides = [(k, sign, half) for k, row in enumerate(model.constraints) for sign, half in halves(row)]
    best = optimum(_elastic(model, [(half, costs[k]) for k, _, half in sides]))
    assert best.value is not None
    assert best.point is not None
    assert best.weights is not None
    point, eased = best.point[: model.n], best.point[model.n :]
    relaxed: dict[str, Fraction] = {}
    weights = [Fraction(0)] * len(model.constraints)
    for (k, sign, _), amount, weight in zip(sides, eased, best.weights, strict=False):
        weights[k] -= sign * weight  # a minimum has multipliers <= 0 on a <=
        if amount:
            relaxed[model.constraints[k].name] = amount
    return Finding(
        "least-repair",
        f"relaxing {listed(f'{name} by {short(amount)}' for name, amount in relaxed.items())} is the least in all",
        f"the least weighted total of relaxations is {short(best.value)}; the plan {place(model, point)} then is "
        "allowed. "
        f"{_weighing(case)}",
        "read it as a hint where the model is wrong, not as a decision.",
        tuple(relaxed),
        points=(point,),
        proofs=(proof(model.constraints, weights, (Fraction(0),) * model.n),),
        amounts=(("least total", best.value), *((f"relax {name}", amount) for name, amount in relaxed.items())),
    )


def _weighing(case: Case) -> str:
    given = dict(case.weights)
    scaled = "a unit of relaxation costs 1 divided by the constraint's largest coefficient"
    if not given:
        return f"Weights: {scaled}."
    return f"Weights: as given for {listed(given)}" + (
        "." if len(given) == len(case.model.constraints) else f"; for the others {scaled}."
    )


def _costs(case: Case) -> list[Fraction]:
    given = dict(case.weights)
    return [given.get(row.name, 1 / _size(row)) for row in case.model.constraints]


def _size(row: Constraint) -> Fraction:
    return max(map(abs, row.coefficients)) or Fraction(1)


def _amount(repair: Repair) -> Fraction:
    return abs(repair.rhs - repair.row.rhs)


def _elastic(model: Model, sides: list[tuple[Upper, Fraction]]) -> Model:
    """Every row with a relaxation >= 0 of its own; minimized is their weighted total."""
    count = len(sides)
    names = tuple(f"variable {j}" for j in range(model.n)) + tuple(f"relaxation {i}" for i in range(count))
    rows = []
    for i, (half, _) in enumerate(sides):
        own = tuple(Fraction(-int(i == k)) for k in range(count))
        rows.append(Constraint(f"row {i}", (*half.coefficients, *own), "<=", half.rhs))
    for i in range(count):
        unit = tuple(Fraction(int(model.n + i == k)) for k in range(model.n + count))
        rows.append(Constraint(f"sign {i}", unit, ">=", Fraction(0)))
    cost = (*(Fraction(0),) * model.n, *(cost for _, cost in sides))
    return Model(names, tuple(rows), Objective("min", cost))
