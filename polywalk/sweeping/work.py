"""What is asked of one model, and what its answer has in common with others; runs in the worker."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator
from fractions import Fraction
from importlib import import_module
from multiprocessing.reduction import ForkingPickler
from typing import Any

from polywalk.errors import PolywalkError
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.sweeping.results import Item

Mark = tuple[str, str, str]
QUESTIONS = {
    "region": ("polywalk.region", "region"),
    "review": ("polywalk.reviewing", "review"),
    "optimum": ("polywalk.linear", "optimum"),
    "walk": ("polywalk.walks", "walk"),
    "sensitivity": ("polywalk.reviewing", "sensitivity"),
}
"""The questions by name, and where each is answered."""


def _parts(number: Fraction) -> tuple[type[Fraction], tuple[int, int]]:
    return Fraction, (number.numerator, number.denominator)


ForkingPickler.register(Fraction, _parts)
"""Between processes a Fraction travels as two integers, not as text: a region takes a quarter less time on its way."""

TOLD_ALREADY = "conflict"
"""A finding that repeats for one model what another one ("no-plan") has said."""

NUMBER = re.compile(r"≈?(?<![\w.])-?\d+(?:[./]\d+)*(?:e[+-]?\d+)?(?![\w.]*\w)(?!-\w)")
VERTEX = re.compile(r"\bV\d+\b")


def answers(what: str | Callable[[Model], Any], models: list[tuple[str, Model]]) -> list[Item]:
    """One item a model; an error of one model is kept in its item."""
    ask = question(what)
    return [_answer(ask, name, model) for name, model in models]


def question(what: str | Callable[[Model], Any]) -> Callable[[Model], Any]:
    """The function behind the name of a question."""
    if isinstance(what, str):
        room, name = QUESTIONS[what]
        what = getattr(import_module(room), name)
    return what  # type: ignore[return-value]


def _answer(ask: Callable[[Model], Any], name: str, model: Model) -> Item:
    try:
        result = ask(model)
        return Item(name, result, marks=tuple(_marks(model, result)))
    except Exception as error:  # a failure of one model must not lose the others
        return failure(name, error)


def failure(name: str, error: BaseException) -> Item:
    """The item of a model without a result."""
    kind = "" if isinstance(error, PolywalkError) else f"{type(error).__name__}: "
    return Item(name, error=error, marks=(_mark("failed", f"{kind}{error}"),))


def _marks(model: Model, result: Any) -> Iterator[Mark]:
    if hasattr(result, "findings"):
        for finding in result.findings:
            if finding.code != TOLD_ALREADY:
                yield _mark(finding.severity, f"{finding.code}: {finding.title}")
        yield _shape_mark(region(model))
    elif isinstance(result, Region):
        yield _shape_mark(result)
    else:
        yield _mark("result", str(result).split("\n", 1)[0])


def _mark(kind: str, text: str) -> Mark:
    return kind, general(text), text


def _shape_mark(found: Region) -> Mark:
    text = shape(found)
    return "shape", text, text


def shape(found: Region) -> str:
    """The kind of region in words: what two pictures share that look alike."""
    if found.status == "empty":
        return "empty"
    parts = [found.status, f"{found.dimension}-D", _count(len(found.vertices), "vertex", "vertices")]
    if found.rays:
        parts.append(_count(len(found.rays), "ray", "rays"))
    if found.lines:
        parts.append(_count(len(found.lines), "line", "lines"))
    if found.dimension == found.model.n:
        parts.append(_count(len(found.facets), "facet", "facets"))
    if any(vertex.degenerate for vertex in found.vertices):
        parts.append(f"{sum(vertex.degenerate for vertex in found.vertices)} degenerate")
    return ", ".join([*parts, _end(found)])


def _end(found: Region) -> str:
    face = found.optimal
    if face is None:
        return {"unbounded": "objective unbounded"}.get(found.outcome, found.outcome)
    if len(face.vertices) == 1 and not face.rays and not face.lines:
        return "one vertex is optimal"
    return f"a face with {_count(len(face.vertices), 'vertex', 'vertices')} is optimal"


def _count(number: int, one: str, many: str) -> str:
    return f"{number} {one if number == 1 else many}"


def general(text: str) -> str:
    """The text with every number, and the number of every vertex, as #, so that hours that say the same fall together.

    Examples
    --------
    >>> from polywalk.sweeping.work import general
    >>> general("demand[7] misses 2.5 of 1/3 at V4 in row x2")
    'demand[#] misses # of # at V# in row x2'
    """
    return VERTEX.sub("V#", NUMBER.sub("#", text))
