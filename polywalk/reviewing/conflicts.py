"""All irreducible infeasible subsets of a small empty model, one of a larger one.

The multipliers that prove emptiness form a polyhedron; the supports of its vertices are the irreducible subsets
(Gleeson & Ryan 1990). An equality counts as one constraint, though either half may be what conflicts. A proof read off
a last dictionary is such a vertex, so that it names one irreducible subset at no further cost.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from polywalk.exact import primitive
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
    """Every irreducible conflict: one for each vertex of the alternative polyhedron, the fewest constraints first."""
    model, nothing = case.model, (Fraction(0),) * case.model.n
    sides = [(k, sign, half) for k, row in enumerate(model.constraints) for sign, half in halves(row)]
    found = []
    for vertex in region(_alternative([half for *_, half in sides], model.n), case.budget).base:
        weights = [Fraction(0)] * len(model.constraints)
        for (k, sign, _), weight in zip(sides, vertex, strict=True):
            weights[k] += sign * weight
        support = [k for k, weight in enumerate(weights) if weight]
        found.append((len(support), support, primitive(weights)))
    return tuple(proof(model.constraints, weights, nothing) for *_, weights in sorted(found))


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
    """One irreducible conflict: the constraints of a proof that is read off one basis."""
    found = farkas(model)
    assert found is not None
    return proof(model.constraints, found.weights, (Fraction(0),) * model.n)
