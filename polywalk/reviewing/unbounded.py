"""Objectives and regions without end."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.exact import Row, dot, short
from polywalk.linear import improving_ray, optimum
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding
from polywalk.reviewing.proofs import place
from polywalk.reviewing.telling import listed


def unbounded(case: Case) -> Iterator[Finding]:
    """An objective that improves for ever, or a region that goes on while the objective does not."""
    if case.outcome == "unbounded":
        yield _objective(case)
    elif case.region.rays:
        yield _open(case)


def lines(case: Case) -> Iterator[Finding]:
    """Directions that are free both ways."""
    for line in case.region.lines:
        moved = _moved(case, line)
        yield Finding(
            "line",
            f"the region contains a whole line: {listed(moved)} can go on without end both ways",
            f"from any plan one can move along {_steps(case, line)}, or back, as far as one likes: no constraint "
            "notices. "
            "Such a region has no vertex.",
            f"give {' or '.join(moved)} a bound.",
            variables=moved,
            rays=(line,),
            points=case.region.base[:1],
        )


def _objective(case: Case) -> Finding:
    model, found = case.model, improving_ray(case.model)
    assert found is not None
    level = tuple(
        row.name for row in model.constraints if not row.is_constant and not dot(row.coefficients, found.direction)
    )
    stops = stopping_bounds(case, found.point, found.direction)
    verb = "grows" if found.change > 0 else "falls"
    along = f" It slides along {listed(level)}, which do not change." if level else " No constraint holds it."
    named = " or ".join(stop for stop, _ in stops)
    halted = f"One bound would stop it: {named}." if stops else "No single bound would stop it."
    return Finding(
        "unbounded-objective",
        f"the objective {verb} without end along {_steps(case, found.direction)}",
        f"from the plan {place(model, found.point)} every step of {_steps(case, found.direction)} changes the "
        "objective by "
        f"{short(found.change)}, and no constraint ever stops it.{along} {halted}",
        "a constraint or bound is missing, or one has the wrong sense; start with the variables that grow.",
        level,
        _moved(case, found.direction),
        points=(found.point,),
        rays=(found.direction,),
        amounts=(("change", found.change), *stops),
    )


def stopping_bounds(case: Case, point: Row, direction: Row) -> list[tuple[str, Fraction]]:
    """Which bounds of one variable alone make the objective bounded, as "upper bound on chips" and a value that "
    "does."""
    model, stops = case.model, list[tuple[str, Fraction]]()
    for j, step in enumerate(direction):
        if step:
            name, side = model.variables[j], "upper" if step > 0 else "lower"
            fresh = "bound"
            while any(row.name == fresh for row in model.constraints):
                fresh += " added"
            held = model.with_constraint(fresh, {name: 1}, "<=" if step > 0 else ">=", point[j])
            if optimum(held).outcome == "optimal":
                stops.append((f"{side} bound on {name}", point[j]))
    return stops


def _open(case: Case) -> Finding:
    rays = tuple(ray.direction for ray in case.region.rays)
    bounded = "the objective does not improve that way" if case.outcome == "optimal" else "nothing is optimized"
    return Finding(
        "open-region",
        f"the region goes on without end along {listed(_steps(case, ray) for ray in rays)}; {bounded}",
        f"plans can be as large as one likes along {listed(_steps(case, ray) for ray in rays)}. This does no harm "
        "now, but "
        "another objective may improve that way for ever.",
        "check whether a bound is missing.",
        variables=tuple(dict.fromkeys(name for ray in rays for name in _moved(case, ray))),
        points=case.region.base[:1],
        rays=rays,
    )


def _moved(case: Case, direction: Row) -> tuple[str, ...]:
    return tuple(name for name, step in zip(case.model.variables, direction, strict=True) if step)


def _steps(case: Case, direction: Row) -> str:
    """A direction in the variables' names: "pump + 1, tank - 2"."""
    named = zip(case.model.variables, direction, strict=True)
    return (
        "(" + ", ".join(f"{name} {'+' if step > 0 else '-'} {short(abs(step))}" for name, step in named if step) + ")"
    )
