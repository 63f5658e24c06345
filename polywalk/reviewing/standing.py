"""What every constraint of a feasible model is there for: needed, or implied by others, with the proof.

The rows a region needs are one for each facet, and a smallest set of rows that make its equalities; all other rows
may go together. A proof is read at the corner where the row comes closest.

References
----------
Telgen, Identifying redundant constraints and implicit equalities, Management Science 29, 1983.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from math import gcd
from typing import TYPE_CHECKING, Literal

from polywalk.model import Constraint, Model
from polywalk.region.spans import rank
from polywalk.reviewing.findings import Proof
from polywalk.reviewing.proofs import bounded_by, halves, proof, solved, tight_at, upper

if TYPE_CHECKING:
    from polywalk.reviewing.case import Case

Kind = Literal["needed", "duplicate", "parallel", "joint", "touching", "loose"]


@dataclass(frozen=True)
class Standing:
    """What a row is there for.

    Parameters
    ----------
    kind : {"needed", "duplicate", "parallel", "joint", "touching", "loose"}
    slack : Fraction
        The smallest in the region.
    corner : int
        The base point that has it.
    proofs : tuple of Proof
        That the other rows imply it; two for an equality.
    """

    kind: Kind
    slack: Fraction
    corner: int
    proofs: tuple[Proof, ...] = ()


def standings(case: Case) -> dict[int, Standing]:
    """The standing of every row with variables, by place."""
    followers = _followers(case)
    joint = _spare_equalities(case, [k for k, _ in case.rows if k not in followers])
    kept = _kept(case, {*followers, *joint})
    found = {}
    for k, row in case.rows:
        slack, corner = case.closest[k]
        if k in kept:
            found[k] = Standing("needed", slack, corner)
        elif k in followers:
            kind: Kind = "duplicate" if followers[k][1] else "parallel"
            found[k] = Standing(kind, slack, corner, followers[k][0])
        elif k in joint:
            found[k] = joint[k]
        else:
            found[k] = _implied(case, row, slack, corner, kept)
    return found


def _implied(case: Case, row: Constraint, slack: Fraction, corner: int, kept: set[int]) -> Standing:
    rows, k = case.model.constraints, next(k for k, other in case.rows if other is row)
    places = [place for place in case.active[corner] if place in kept]
    made = _simple(case, k, places)
    if made is None:
        made = tight_at(case.model, upper(row).coefficients, [rows[place] for place in places])
    assert made is not None, "what a region implies, the rows it needs imply"
    return Standing("loose" if slack else "touching", slack, corner, (made,))


def _simple(case: Case, k: int, places: list[int]) -> Proof | None:
    """The only combination of as many independent rows as there are variables; None where there is no such."""
    rows = case.model.constraints
    if len(places) != case.model.n or any(rows[place].sense == "==" for place in places):
        return None
    (_, *target), scale = case.whole[k]
    shares = solved([case.whole[place][0][1:] for place in places], target)
    if shares is None:
        return None
    weights = [share * Fraction(case.whole[place][1], scale) for place, share in zip(places, shares, strict=True)]
    signed = [-weight if rows[p].sense == ">=" else weight for p, weight in zip(places, weights, strict=True)]
    return proof([rows[place] for place in places], signed, upper(rows[k]).coefficients)


def _kept(case: Case, gone: set[int]) -> set[int]:
    """The rows that stay: the equalities that were not spared, and the first constraint of each facet."""
    places = {row.name: k for k, row in case.rows}
    kept = {places[name] for name in case.region.equalities} - gone
    for facet in case.region.facets:
        kept.add(next(places[name] for name in facet.constraints if places[name] not in gone))
    return kept


def _followers(case: Case) -> dict[int, tuple[tuple[Proof, ...], bool]]:
    """The rows that another with the same direction makes superfluous: the proofs, and whether it says the same."""
    groups: dict[tuple[int, ...], list[tuple[Fraction, bool, int]]] = {}
    rows = case.model.constraints
    for k, ((b, *a), _) in case.whole.items():
        size = gcd(*a)
        for sign in (1, -1) if rows[k].sense == "==" else (1,):
            way = tuple([sign * value // size for value in a])
            groups.setdefault(way, []).append((Fraction(sign * b, size), rows[k].sense != "==", k))
    found: dict[int, tuple[tuple[Proof, ...], bool]] = {}
    for group in groups.values():
        if len(group) > 1:
            leader = min(group)
            for end, _, k in group:
                if k != leader[2]:
                    made = _scaled(rows[leader[2]], rows[k])
                    found[k] = ((*found[k][0], made) if k in found else (made,), end == leader[0])
    return {k: pair for k, pair in found.items() if rows[k].sense != "==" or len(pair[0]) == 2}


def _scaled(lead: Constraint, row: Constraint) -> Proof:
    """The leading row times a number, which has the coefficients of the row (of one half of it)."""
    ratio = next(a / b for a, b in zip(row.coefficients, lead.coefficients, strict=True) if b)
    sign = -1 if row.sense == ">=" else 1
    if row.sense == "==":
        sign = 1 if lead.sense == "==" else (1 if ratio > 0 else -1)
    weight = sign * ratio
    claim = tuple(weight * value for value in lead.coefficients)
    return Proof(((lead.name, weight),), claim, weight * lead.rhs)


def _spare_equalities(case: Case, leaders: list[int]) -> dict[int, Standing]:
    """Of the rows that hold with equality everywhere: those that the others of them make superfluous."""
    everywhere = set(case.region.equalities)
    rows = [case.model.constraints[k] for k in leaders if case.model.constraints[k].name in everywhere]
    if all(row.sense == "==" for row in rows) and rank([row.coefficients for row in rows]) == len(rows):
        return {}
    spared: dict[int, Standing] = {}
    places = {row.name: k for k, row in case.rows}
    for row in sorted(rows, key=lambda row: (row.sense == "==", -places[row.name])):
        others = [other for other in rows if other != row and places[other.name] not in spared]
        proofs = _proofs(case.model, row, others)
        if proofs:
            k = places[row.name]
            kind: Kind = "joint" if _swaps(case.model, row, others, proofs) else "touching"
            spared[k] = Standing(kind, *case.closest[k], proofs)
    return spared


def _proofs(model: Model, row: Constraint, others: list[Constraint]) -> tuple[Proof, ...]:
    """The proofs that others imply a row (both halves of an equality); none where they do not."""
    made = [bounded_by(model, half, others) for _, half in halves(row)] if others else [None]
    return tuple(one for one in made if one is not None) if all(made) else ()


def _swaps(model: Model, row: Constraint, others: list[Constraint], proofs: tuple[Proof, ...]) -> bool:
    """Whether another row of the group could go in its place."""
    used = {name for made in proofs for name, _ in made.multipliers}
    group = [row, *(other for other in others if other.name in used)]
    return any(_proofs(model, other, [one for one in group if one != other]) for other in group[1:])
