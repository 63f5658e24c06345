"""Regions flatter than meant: implied equalities, forced values, a single point."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.exact import Row, short
from polywalk.model import Constraint
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding, Proof
from polywalk.reviewing.proofs import Upper, bounded_by, place, upper
from polywalk.reviewing.telling import listed


def shape(case: Case) -> Iterator[Finding]:
    """Everything that takes a dimension away."""
    region = case.region
    if region.dimension == case.model.n:
        return
    yield _point(case) if region.dimension == 0 else _flat(case)
    for name in region.equalities:
        row = case.model.constraint(name)
        if row.sense != "==":
            yield _implied(case, row)
    stated = {_only(row) for _, row in case.rows if row.sense == "=="}
    for j, (name, (low, high)) in enumerate(region.ranges.items()):
        if low is not None and low == high and j not in stated:
            yield _fixed(case, j, name, low)


def _only(row: Constraint) -> int | None:
    """The one variable of a row; None where there are more."""
    found = [j for j, value in enumerate(row.coefficients) if value]
    return found[0] if len(found) == 1 else None


def _flat(case: Case) -> Finding:
    region, n = case.region, case.model.n
    return Finding(
        "flat-region",
        f"the region is flat: dimension {region.dimension} in {n} variables",
        f"{listed(region.equalities)} hold{'s' if len(region.equalities) == 1 else ''} with equality in every plan, "
        "so the "
        f"region has no inside: {n - region.dimension} of the {n} variables follow from the others.",
        "nothing to do if these equalities are meant; else one was typed with = for ≤ or ≥.",
        region.equalities,
        points=region.base,
    )


def _point(case: Case) -> Finding:
    only = case.region.base[0]
    return Finding(
        "single-point",
        f"only one plan is allowed: {place(case.model, only)}",
        f"{listed(case.region.equalities)} together leave {place(case.model, only)} and nothing else; there is nothing "
        "to optimize.",
        "check whether one of them is too tight, or an equality that was meant as an inequality.",
        case.region.equalities,
        points=(only,),
    )


def _implied(case: Case, row: Constraint) -> Finding:
    made = bounded_by(case.model, upper(row).reverse)
    assert made is not None
    forcing = tuple(name for name, _ in made.multipliers)
    rule = row.text(case.model.variables)
    return Finding(
        "implied-equality",
        f"{row.name} can only hold with equality",
        f"{row.name} ({rule}) has no room in any plan, because {listed(forcing)} already "
        f"force{'s' * (len(forcing) == 1)} "
        f"the opposite: {case.adds_up(made)}.",
        f"write {row.name} as an equality if that is meant; else look for a wrong number in {listed(forcing)}.",
        (row.name, *(name for name in forcing if name != row.name)),
        proofs=(made,),
    )


def _fixed(case: Case, j: int, name: str, value: Fraction) -> Finding:
    unit: Row = tuple(Fraction(int(i == j)) for i in range(case.model.n))
    above = Upper(unit, value)
    made = [bounded_by(case.model, above), bounded_by(case.model, above.reverse)]
    proofs: tuple[Proof, ...] = tuple(one for one in made if one is not None)
    forcing = tuple(dict.fromkeys(other for one in proofs for other, _ in one.multipliers))
    return Finding(
        "fixed-variable",
        f"{name} can only be {short(value)}",
        f"{listed(forcing)} leave {name} no other value: {'; '.join(case.adds_up(one) for one in proofs)}.",
        f"if {name} is meant to be decided, one of them is too tight.",
        forcing,
        (name,),
        proofs=proofs,
        amounts=(("value", value),),
    )
