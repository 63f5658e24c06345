"""An empty region: the contradiction, every irreducible conflict, and what would repair it.

References
----------
Gleeson & Ryan, Identifying minimally infeasible subsystems of inequalities, ORSA J. Computing 2, 1990.
"""

from __future__ import annotations

from collections.abc import Iterator

from polywalk.exact import short
from polywalk.reviewing.case import Case
from polywalk.reviewing.conflicts import Conflicts, conflicts
from polywalk.reviewing.findings import Finding
from polywalk.reviewing.repairs import least_repair, single_repairs
from polywalk.reviewing.telling import listed


def empty(case: Case) -> Iterator[Finding]:
    """Everything there is to say of a model without a plan; nothing of any other."""
    if not case.empty:
        return
    found = conflicts(case)
    yield _no_plan(case, found)
    for number, proof in enumerate(found.proofs, start=1):
        names = tuple(name for name, _ in proof.multipliers)
        count = f" {number} of {len(found.proofs)}" if len(found.proofs) > 1 else ""
        yield Finding(
            "conflict",
            f"conflict{count}: {listed(names)}",
            f"{listed(names)} cannot hold together, but without any one of them the others of them can: "
            f"{case.adds_up(proof)}.",
            "one of them must give way: look for a wrong sense, number or unit.",
            names,
            proofs=(proof,),
        )
    yield from single_repairs(case, found)
    yield least_repair(case)


def _no_plan(case: Case, found: Conflicts) -> Finding:
    proof = found.proofs[0]
    names = tuple(name for name, _ in proof.multipliers)
    each = "s itself" if len(names) == 1 else " each other"
    if found.complete:
        count = "one irreducible conflict" if len(found.proofs) == 1 else f"{len(found.proofs)} irreducible conflicts"
        how = f"The model has {count} in all."
    else:
        how = (
            "This is one irreducible conflict; the model has more than "
            f"{case.limits.conflicts} constraints, so that others, if any, were not listed."
        )
    return Finding(
        "no-plan",
        f"no plan satisfies every constraint: {listed(names)} contradict{each}",
        f"multiplied and added, {case.adds_up(proof)}, which is false. {how}{_tiny(case, found)}",
        "see which single constraint would repair it, and by how much.",
        names,
        proofs=(proof,),
        amounts=(("contradiction", proof.rhs),),
    )


def _tiny(case: Case, found: Conflicts) -> str:
    """A contradiction that a solver with a tolerance may not see."""
    sizes = [max(abs(weight) for _, weight in proof.multipliers) for proof in found.proofs]
    worst = max(-proof.rhs / size for proof, size in zip(found.proofs, sizes, strict=True))
    if worst > case.limits.solver:
        return ""
    return (
        f" The contradiction is only {short(worst)} wide, within the tolerance of {short(case.limits.solver)} common "
        "in "
        "solvers: one of those may report a plan."
    )
