"""All irreducible infeasible subsets of a small empty model, one of a larger one.

The multipliers that prove emptiness form a polyhedron; the supports of its vertices are the irreducible subsets
(Gleeson & Ryan 1990). An equality counts as one constraint, though either half may be what conflicts.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction

from polywalk.exact import Row, primitive
from polywalk.linear import farkas
from polywalk.model import Constraint, Model
from polywalk.region import region
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Proof
from polywalk.reviewing.proofs import Upper, halves, proof


@dataclass(frozen=True)
class Conflicts:
    """Irreducible conflicts, each with its proof, the smallest first; ``complete`` if these are all."""

    proofs: tuple[Proof, ...]
    complete: bool


def conflicts(case: Case) -> Conflicts:
    """All conflicts of an empty model, or one where it has too many constraints."""
    if len(case.model.constraints) <= case.limits.conflicts:
        return Conflicts(all_conflicts(case), complete=True)
    return Conflicts((one_conflict(case.model),), complete=False)


def all_conflicts(case: Case) -> tuple[Proof, ...]:
    """Every irreducible conflict: the vertices of the alternative polyhedron with the smallest supports."""
    model = case.model
    sides = [(k, sign, half) for k, row in enumerate(model.constraints) for sign, half in halves(row)]
    vertices = region(_alternative([half for *_, half in sides], model.n), case.budget).base
    found: dict[frozenset[int], Row] = {}
    for vertex in vertices:
        weights = [Fraction(0)] * len(model.constraints)
        for (k, sign, _), weight in zip(sides, vertex, strict=True):
            weights[k] += sign * weight
        found.setdefault(frozenset(k for k, weight in enumerate(weights) if weight), primitive(weights))
    least = [support for support in found if not any(other < support for other in found)]
    nothing = (Fraction(0),) * model.n
    ordered = sorted(least, key=lambda support: (len(support), sorted(support)))
    return tuple(proof(model.constraints, found[support], nothing) for support in ordered)


def _alternative(sides: list[Upper], n: int) -> Model:
    """Multipliers >= 0 with which no variable is left and the right-hand sides add up to -1."""
    count = len(sides)
    names = tuple(f"multiplier {i}" for i in range(count))
    rows = [
        Constraint(f"variable {j}", tuple(half.coefficients[j] for half in sides), "==", Fraction(0)) for j in range(n)
    ]
    rows.append(Constraint("contradiction", tuple(half.rhs for half in sides), "==", Fraction(-1)))
    for i in range(count):
        unit = tuple(Fraction(int(i == k)) for k in range(count))
        rows.append(Constraint(f"sign {i}", unit, ">=", Fraction(0)))
    return Model(names, tuple(rows))


def one_conflict(model: Model) -> Proof:
    """One irreducible conflict: from a first proof, constraints are left out one by one as long as it stays empty."""
    found = farkas(model)
    assert found is not None
    kept, tried = found, set[str]()
    while untried := [name for name in kept.multipliers if name not in tried]:
        name = untried[0]
        tried.add(name)
        rows = tuple(model.constraint(other) for other in kept.multipliers if other != name)
        less = farkas(replace(model, constraints=rows, units=()))
        kept = kept if less is None else less
    return proof(kept.model.constraints, kept.weights, (Fraction(0),) * model.n)
