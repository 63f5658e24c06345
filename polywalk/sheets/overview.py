"""The first section of a sheet: the answer in a few plain sentences, and the words it uses."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.exact import short
from polywalk.model import GOAL
from polywalk.region import vertex_name
from polywalk.reviewing.codes import SEVERITIES
from polywalk.sheets.content import Content
from polywalk.sheets.markup import Html, bullets, element, joined

CAUTION = (
    "polywalk checks a model, not the plant it describes: whoever runs equipment on its numbers follows local codes "
    "and licensed practice."
)

WORDS = (
    ("plan", "one value for every variable"),
    ("feasible region", "all plans that satisfy every constraint"),
    ("active", "a constraint is active at a plan that satisfies it with equality: there is no room left (no slack)"),
    ("vertex", "a corner of the region: as many constraints as there are variables, or more, are active there"),
    ("degenerate", "a vertex where more constraints are active than there are variables"),
    ("optimum", "the best value of the objective, and a plan that has it"),
    ("redundant", "a constraint that changes nothing, since others already imply it"),
    ("shadow price", "the change of the optimal value for one more unit of a constraint's right-hand side"),
    ("pivot", "one step of the simplex method: one constraint is let go, another becomes active"),
    ("stay", "a pivot that does not move, at a degenerate vertex"),
)


def summary(content: Content) -> Html:
    """The answer in a few sentences."""
    return bullets(_sentences(content))


def glossary(_: Content) -> Html:
    """The words that a sheet uses."""
    terms = [joined([element("dt", word), element("dd", meaning)]) for word, meaning in WORDS]
    return element("dl", *terms)


def _sentences(content: Content) -> Iterator[str]:
    model = content.model
    bounds = sum(row.bounds() is not None for row in model.constraints)
    rows = _count(len(model.constraints) - bounds, "constraint")
    aim = f"the goal is to {GOAL[model.objective.goal]} the objective" if model.objective else "there is no objective"
    yield f"The model has {_count(model.n, 'variable')}, {rows} and {_count(bounds, 'bound')}; {aim}."
    yield _size(content)
    yield from _answer(content)
    yield _found(content)
    if model.integers:
        yield f"Marked integer: {', '.join(model.integers)}. The marks are not applied here: fractions are allowed."
    if content.change is not None:
        yield f"Against the earlier version: {content.change.summary[0]}"


def _found(content: Content) -> str:
    findings, accepted = content.review.findings, content.review.accepted
    told = ", ".join(_count(sum(item.severity == kind for item in findings), kind) for kind in SEVERITIES)
    aside = f"; {_count(len(accepted), 'finding')} set aside with a reason" if accepted else ""
    return f"The checks found {told}{aside}."


def _size(content: Content) -> str:
    seen = content.region
    if seen.status == "empty":
        return "No plan satisfies every constraint: the model is empty (infeasible)."
    kind = {"bounded": "bounded", "unbounded": "unbounded (it has no end in some direction)"}[seen.status]
    if seen.lines:
        return f"The plans form an {kind} region without a vertex: it contains a whole line."
    flat = f", flat: it has dimension {seen.dimension} of {seen.model.n}" if seen.dimension < seen.model.n else ""
    corners = f"{len(seen.vertices)} {'vertex' if len(seen.vertices) == 1 else 'vertices'}"
    return f"The plans form a {kind} region with {corners}{flat}." if seen.dimension else "Exactly one plan is allowed."


def _answer(content: Content) -> Iterator[str]:
    seen, model = content.region, content.model
    if seen.outcome == "unbounded":
        yield "There is no best plan: the objective improves without end, so a constraint is missing or wrong."
    if seen.value is None or seen.optimal is None:
        return
    places = [seen.base[k] for k in seen.optimal.vertices]
    names = ["" if seen.lines else f"{vertex_name(k)}: " for k in seen.optimal.vertices]
    if len(places) == 1 and not seen.optimal.rays and not seen.lines:
        yield f"The best plan is {names[0]}{plan(content, places[0])}, with the objective at {short(seen.value)}."
        held = seen.vertices[seen.optimal.vertices[0]].active
        others = [row.name for row in model.constraints if row.name not in held and not row.is_constant]
        yield f"Active at the best plan (no room left): {', '.join(held)}."
        yield f"With room left there: {', '.join(others)}." if others else "Nothing has room left there."
        return
    more = ", and it goes on without end" if seen.optimal.rays or seen.lines else ""
    yield f"The optimum is tied: the objective is {short(seen.value)} at every plan between these{more}:"
    yield from (f"{name}{plan(content, place)}" for name, place in zip(names, places, strict=True))


def plan(content: Content, point: tuple[Fraction, ...]) -> str:
    """A plan with its units."""
    model = content.model
    parts = (f"{name} = {short(x)} {model.unit(name)}".rstrip() for name, x in zip(model.variables, point, strict=True))
    return ", ".join(parts)


def _count(number: int, word: str) -> str:
    return f"{number} {word}" if number == 1 else f"{number} {word}s"
