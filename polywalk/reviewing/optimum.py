"""Whether the optimum is unique, tied, or nearly tied."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.exact import short
from polywalk.region import vertex_name
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding, Proof
from polywalk.reviewing.proofs import place, tight_at
from polywalk.reviewing.telling import listed


def optima(case: Case) -> Iterator[Finding]:
    """A tied or nearly tied optimum, or no objective at all."""
    face, value, goal = case.region.optimal, case.region.value, case.model.objective
    if case.outcome == "no objective":
        yield _nothing(case)
    elif face is not None and value is not None and goal is not None:
        if len(face.vertices) > 1 or face.rays or face.lines:
            yield _tied(case, value)
        yield from _near(case, value)


def _nothing(case: Case) -> Finding:
    return Finding(
        "no-objective",
        "nothing is optimized",
        "the model has no objective, or one without variables: every plan that is allowed is as good as any other.",
        "state an objective if one is meant; else nothing needs to be done.",
    )


def best_proof(case: Case) -> tuple[Proof, ...]:
    """The multipliers that prove the optimal value, for the objective written as a maximum."""
    face, goal = case.region.optimal, case.model.objective
    if face is None or goal is None:
        return ()
    active = [case.model.constraints[k] for k in case.active[face.vertices[0]]]
    made = tight_at(case.model, goal.upward, active)
    return () if made is None else (made,)


def _tied(case: Case, value: Fraction) -> Finding:
    region, face = case.region, case.region.optimal
    assert face is not None
    points = tuple(region.base[k] for k in face.vertices)
    rays = (*(region.rays[k].direction for k in face.rays), *(region.lines[k] for k in face.lines))
    held = set.intersection(*(set(case.active[k]) for k in face.vertices))
    level = tuple(case.model.constraints[k].name for k in sorted(held))
    named = (
        [f"{vertex_name(k)} ({place(case.model, region.base[k])})" for k in face.vertices] if not region.lines else []
    )
    where = listed(named) if named else place(case.model, points[0])
    onward = f", and on without end along {listed(_way(case, ray) for ray in rays)}" if rays else ""
    return Finding(
        "tied-optimum",
        f"more than one plan reaches the optimum of {short(value)}",
        f"{where} {'are' if len(named) > 1 else 'is'} "
        f"optimal{', with everything between' if len(named) > 1 else ''}{onward}. "
        "Which plan a solver returns is chance.",
        "decide what else matters and add it to the objective, or expect different plans from different solvers.",
        level,
        points=points,
        rays=rays,
        proofs=best_proof(case),
        amounts=(("optimal value", value),),
    )


def _near(case: Case, value: Fraction) -> Iterator[Finding]:
    """The second-best vertex, where it is close enough to tell."""
    goal, limits = case.model.objective, case.limits
    assert goal is not None
    others = [(abs(goal.at(point) - value), k) for k, point in enumerate(case.region.base) if goal.at(point) != value]
    if not others:
        return
    gap, k = min(others)
    near = limits.near_tie_amount if limits.near_tie_amount is not None else limits.near_tie * abs(value)
    if gap > near:
        return
    point = case.region.base[k]
    name = "a base point" if case.region.lines else vertex_name(k)
    yield Finding(
        "near-tie",
        f"a plan only {short(gap)} worse than the best",
        f"{name} ({place(case.model, point)}) reaches {short(goal.at(point))}, the optimum is {short(value)}: a "
        f"difference of {short(gap)}, within the {short(near)} that counts as near.",
        "small changes of the objective may make it the best; look at both before deciding.",
        points=(point,),
        proofs=best_proof(case),
        amounts=(("difference", gap), ("optimal value", value)),
    )


def _way(case: Case, ray: tuple[Fraction, ...]) -> str:
    return (
        f"({', '.join(f'{name} {short(step)}' for name, step in zip(case.model.variables, ray, strict=True) if step)})"
    )
