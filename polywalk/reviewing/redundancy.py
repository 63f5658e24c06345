"""Constraints that others imply: redundant, only touching, said twice, weaker, jointly redundant, without variables."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from math import gcd

from polywalk.exact import full, short
from polywalk.model import Constraint
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding, Proof
from polywalk.reviewing.proofs import bounded_by, place, upper
from polywalk.reviewing.standing import Standing
from polywalk.reviewing.telling import listed


def redundant(case: Case) -> Iterator[Finding]:
    """Every row that may go; all of those told here may go together."""
    for k, standing in case.standing.items():
        row = case.model.constraints[k]
        if standing.kind != "needed":
            yield _loose(case, row, standing) if _is_big(case, row, standing) else _spare(case, row, standing)


def without_variables(case: Case) -> Iterator[Finding]:
    """Rows in which no variable is left."""
    for row in case.model.constraints:
        if row.is_constant:
            true = row.holds((Fraction(0),) * case.model.n)
            sign = Fraction(-1 if row.rhs > 0 else 1)
            proofs = () if true else (Proof(((row.name, sign),), row.coefficients, sign * row.rhs),)
            says = f"{row.name} reads {row.text(case.model.variables)}: no variable is left in it, so it is "
            yield Finding(
                "true-row" if true else "false-row",
                f"{row.name} {'says nothing' if true else 'can never hold'}",
                says + ("always true and restricts nothing." if true else "false whatever is planned."),
                "check whether its coefficients were lost; else remove it.",
                (row.name,),
                proofs=proofs,
            )


def split_equalities(case: Case) -> Iterator[Finding]:
    """Two inequalities with opposite directions and the same end."""
    seen: dict[tuple[int, ...], Constraint] = {}
    for k, row in case.rows:
        if row.sense == "==":
            continue
        whole, _ = case.whole[k]
        size = gcd(*whole)
        back = tuple([-value // size for value in whole])
        if back in seen:
            yield _one_equality(case, seen[back], row)
        seen.setdefault(tuple([value // size for value in whole]), row)


def _one_equality(case: Case, first: Constraint, second: Constraint) -> Finding:
    names = case.model.variables
    return Finding(
        "split-equality",
        f"{first.name} and {second.name} together are one equality",
        f"{case.told(first)} and {case.told(second)} leave only "
        f"{first.text(names).replace('≤', '=').replace('≥', '=')}.",
        "if an equality is meant, write it as one constraint; if not, one of the two has a wrong sense or number.",
        (first.name, second.name),
    )


def _is_big(case: Case, row: Constraint, standing: Standing) -> bool:
    """Whether the constant is far beyond what the region reaches."""
    reach = abs(upper(row).rhs - standing.slack)
    return abs(row.rhs) >= case.limits.loose * max(reach, *(abs(value) for value in row.coefficients))


def _loose(case: Case, row: Constraint, standing: Standing) -> Finding:
    reach = upper(row).rhs - standing.slack
    least = -reach if row.sense == ">=" else reach
    return Finding(
        "loose-constant",
        f"{row.name} has a constant of {short(row.rhs)}, {short(least)} would change nothing",
        f"{case.told(row)} never binds: the other constraints keep its left side at "
        f"{short(least)} or {'more' if row.sense == '>=' else 'less'}, reached at {_corner(case, standing)}.",
        f"use {full(least)} if it is meant as a switch (a big M), or check the number and its unit.",
        (row.name,),
        points=(case.region.base[standing.corner],),
        proofs=_tightest(case, row, standing),
        amounts=(("smallest constant that changes nothing", least), ("slack", standing.slack)),
    )


def _tightest(case: Case, row: Constraint, standing: Standing) -> tuple[Proof, ...]:
    """A proof of the reach itself: a parallel row that never binds either would prove less."""
    if standing.proofs[0].rhs == upper(row).rhs - standing.slack:
        return standing.proofs
    made = bounded_by(case.model, upper(row), [other for other in case.model.constraints if other != row])
    return standing.proofs if made is None else (made,)


CODE = {
    "duplicate": "duplicate",
    "parallel": "parallel",
    "joint": "jointly-redundant",
    "touching": "redundant-touching",
    "loose": "redundant",
}


def _spare(case: Case, row: Constraint, standing: Standing) -> Finding:
    title, explanation, remedy = _WORDS[standing.kind](case, row, standing)
    others = dict.fromkeys(name for made in standing.proofs for name, _ in made.multipliers)
    return Finding(
        CODE[standing.kind],
        title,
        explanation,
        remedy,
        (row.name, *others),
        points=() if standing.kind in {"duplicate", "parallel"} else (case.region.base[standing.corner],),
        proofs=standing.proofs,
        amounts=(("slack", standing.slack),),
    )


def _duplicate(case: Case, row: Constraint, standing: Standing) -> tuple[str, str, str]:
    lead, rule = _leader(case, standing)
    says = f"{case.told(row)} is {lead} ({rule}) times {short(_ratio(standing))}."
    return f"{row.name} says the same as {lead}", says, "keep one of the two; was the second meant to be different?"


def _parallel(case: Case, row: Constraint, standing: Standing) -> tuple[str, str, str]:
    lead, rule = _leader(case, standing)
    gap = upper(row).rhs - standing.proofs[0].rhs
    says = (
        f"{case.told(row)} points the same way as {lead} ({rule}), which is tighter by "
        f"{short(gap)}; {row.name} never binds."
    )
    return f"{row.name} is weaker than {lead}", says, f"remove {row.name}, or check whether its number was mistyped."


def _joint(case: Case, row: Constraint, standing: Standing) -> tuple[str, str, str]:
    others = listed(dict.fromkeys(name for made in standing.proofs for name, _ in made.multipliers))
    says = (
        f"of {others} and {row.name} one can go without changing what is allowed, but not all: "
        f"{case.adds_up(standing.proofs[0])}. Here {row.name} is the one that could go."
    )
    return (
        f"{others} already imply {row.name}",
        says,
        "leave one out, or check whether one of them was meant otherwise.",
    )


def _touching(case: Case, row: Constraint, standing: Standing) -> tuple[str, str, str]:
    says = (
        f"{case.told(row)} cuts nothing off and is only touched, at "
        f"{_corner(case, standing)}: {case.adds_up(standing.proofs[0])}."
    )
    return (
        f"{row.name} only touches the region",
        says,
        "it makes the vertices it touches degenerate; remove it or tighten it.",
    )


def _redundant(case: Case, row: Constraint, standing: Standing) -> tuple[str, str, str]:
    says = (
        f"{case.told(row)} never binds: {case.adds_up(standing.proofs[0])}. "
        f"It comes closest at {_corner(case, standing)}, with {short(standing.slack)} to spare."
    )
    return f"{row.name} never binds", says, "remove it, or check whether its number was meant to be tighter."


_WORDS = {"duplicate": _duplicate, "parallel": _parallel, "joint": _joint, "touching": _touching, "loose": _redundant}


def _leader(case: Case, standing: Standing) -> tuple[str, str]:
    name = standing.proofs[0].multipliers[0][0]
    return name, case.model.constraint(name).text(case.model.variables)


def _ratio(standing: Standing) -> Fraction:
    return abs(standing.proofs[0].multipliers[0][1])


def _corner(case: Case, standing: Standing) -> str:
    return place(case.model, case.region.base[standing.corner])
