"""Big-M rows: a yes-or-no variable whose coefficient is larger than it need be."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.exact import full, short
from polywalk.model import Constraint
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding
from polywalk.reviewing.proofs import Upper, most, place, proof, upper


def loose_switches(case: Case) -> Iterator[Finding]:
    """Rows "something <= M times switch" with M far above what the something can reach.

    Only variables marked integer with a range of 0 to 1 are switches.
    """
    for name in case.model.integers:
        if case.region.ranges[name] == (Fraction(0), Fraction(1)):
            j = case.model.index(name)
            for _, row in case.rows:
                if row.sense != "==" and upper(row).coefficients[j] < 0 and any(_rest(upper(row), j)):
                    yield from _loose(case, row, j)


def _rest(half: Upper, j: int) -> tuple[Fraction, ...]:
    return tuple(Fraction(0) if i == j else value for i, value in enumerate(half.coefficients))


def _loose(case: Case, row: Constraint, j: int) -> Iterator[Finding]:
    """What the rest of the row reaches under the other constraints, beside what the switch lets through."""
    half, rest = upper(row), _rest(upper(row), j)
    best = most(case.model.without(row.name), rest)
    if best.value is None or best.weights is None or best.point is None:
        return
    size, least = -half.coefficients[j], max(best.value - half.rhs, Fraction(0))
    if size < case.limits.loose * max(least, *map(abs, rest)):
        return
    name = case.model.variables[j]
    yield Finding(
        "loose-switch",
        f"{row.name} has a switch of {short(size)}, {short(least)} would do",
        f"in {case.told(row)} the switch {name} lets through {short(size)}, but the other "
        f"constraints allow {short(least)} at the most (at {place(case.model, best.point)}). So large a number lets "
        "the "
        f"relaxation, and a solver's tolerance, cheat: {name} need only be {short(least / size)}.",
        f"use {full(least)} as the coefficient of {name} in {row.name}; no plan with {name} 0 or 1 is lost.",
        (row.name,),
        (name,),
        points=(best.point,),
        proofs=(proof(best.model.constraints, best.weights, rest),),
        amounts=(("coefficient", size), ("smallest coefficient that changes nothing", least)),
    )
