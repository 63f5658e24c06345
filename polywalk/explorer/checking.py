"""Which values the explorer's state takes: a check returns the value as it is kept, or raises an error saying why."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from typing import Any

from polywalk.errors import DrawingError, ModelError, UnknownName, WalkError, unknown
from polywalk.explorer.traits import Traits
from polywalk.model import Model
from polywalk.region import Region, Vertex
from polywalk.walks import ENTERING, LEAVING, walk

LARGEST_PICTURE = 3
RULES = tuple(rule.name for rule in ENTERING)
LEAVING_RULES = tuple(rule.name for rule in LEAVING)
KINDS = ("right-hand side", "cost")


def model(given: Any) -> Model:
    """A model."""
    if not isinstance(given, Model):
        raise ModelError(
            f"expected a Model, got {type(given).__name__}; build one with from_algebra, or cut a "
            "large one down with section or shadow.",
            given,
        )
    return given


def vertex(index: int | None, seen: Region | None) -> int | None:
    """The number of a vertex of the region, or None."""
    count = len(seen.vertices) if seen else 0
    if index is not None and not 0 <= index < count:
        listed = "but the region has none" if seen else "but the vertices are not listed yet"
        known = f"0 to {count - 1}" if count else listed
        raise UnknownName(f"expected the index of a vertex, {known}, got {index}.", index)
    return index


def place(index: int | None, count: int, what: str) -> int | None:
    """The place of one of ``count`` things, or None."""
    if index is not None and not 0 <= index < count:
        known = f"0 to {count - 1}" if count else "but there is none"
        raise UnknownName(f"expected the index of a {what}, {known}, got {index}.", index)
    return index


def rules(given: Iterable[str]) -> tuple[str, ...]:
    """At least one known pivot rule."""
    found = tuple(given)
    if not found:
        raise WalkError("expected at least one pivot rule, got none.", ())
    for rule in found:
        if rule not in RULES:
            raise unknown("pivot rule", rule, RULES, "the explorer")
    return found


def leaving(given: str) -> str:
    """A known leaving rule."""
    if given not in LEAVING_RULES:
        raise unknown("leaving rule", given, LEAVING_RULES, "the explorer")
    return given


def step(given: int | None, last: int) -> int | None:
    """A step of the walk, or None for the whole."""
    if given is not None and not 0 <= given <= last:
        raise WalkError(f"expected a step from 0 to {last}, got {given}.", given)
    return given


def axes(given: tuple[str, ...] | None, shown: Model) -> tuple[str, ...] | None:
    """One to three different variables; None for all of them where they are not more."""
    if given is None:
        return first_axes(shown)
    if not 1 <= len(set(given)) == len(given) <= LARGEST_PICTURE:
        raise DrawingError(f"expected one to three different variables as axes, got {given!r}.", given)
    for name in given:
        shown.index(name)
    return given


def number(given: tuple[Any, ...], whole: Model) -> tuple[Any, ...]:
    """A kind of number and the constraint or variable it is of."""
    if len(given) != 2 or given[0] not in KINDS:
        raise ModelError(f"expected ('right-hand side', constraint) or ('cost', variable), got {given!r}.", given)
    if given[0] == "cost":
        whole.index(given[1])
    else:
        whole.constraint(given[1])
    return given


def start(given: Any, state: Traits) -> Any:
    """Where the first rule can start; None for its usual start."""
    if given is not None:
        walk(state.model, rule=state.rules[0], leaving=state.leaving, start=given)
    return given


CHECKS: dict[str, Callable[[Any, Traits], Any]] = {
    "vertex": lambda given, state: vertex(given, state.region),
    "finding": lambda given, state: place(given, len(state.review.findings) if state.review else 0, "finding"),
    "rules": lambda given, state: rules(given),
    "leaving": lambda given, state: leaving(given),
    "start": start,
    "step": lambda given, state: step(given, len(state.walks[0].pivots) if state.walks else 0),
    "axes": lambda given, state: axes(given, state.model),
    "number": lambda given, state: number(given, state.whole),
}
"""By trait."""


def first_axes(shown: Model) -> tuple[str, ...] | None:
    """The first variables where a model has more than a picture can show."""
    return None if shown.n <= LARGEST_PICTURE else shown.variables[:LARGEST_PICTURE]


def number_left(given: tuple[Any, ...], whole: Model) -> tuple[Any, ...]:
    """The same number of another model, or its first one."""
    names = {"right-hand side": [row.name for row in whole.constraints], "cost": list(whole.variables)}
    if given and given[1] in names[given[0]]:
        return given
    return (KINDS[0], names[KINDS[0]][0]) if whole.constraints else (KINDS[1], whole.variables[0])


def again(before: Vertex | None, seen: Region | None) -> int | None:
    """The vertex of a changed region that is the one before: at its point, else with its active constraints."""
    if before is None or seen is None or len(before.point) != seen.model.n:
        return None
    found = [k for k, one in enumerate(seen.vertices) if one.point == before.point]
    found += [k for k, one in enumerate(seen.vertices) if one.active == before.active]
    return found[0] if found else None
