"""Where a walk starts: at rest, at a vertex, or at a basis the caller names."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from numbers import Integral
from typing import cast

from polywalk.errors import WalkError, unknown
from polywalk.exact import Row, full
from polywalk.linear import Crash, Dictionary, crash, optimum
from polywalk.model import Constraint, Model


def first_dictionary(opened: Dictionary, start: object, rank: Sequence[int], inside: bool = True) -> Crash:
    """The dictionary a walk starts from, with the pivots that led there.

    Parameters
    ----------
    opened : Dictionary
        The model's first one, before the crash phase.
    start : None, int, vertex, point or sequence of str
        See ``walk``.
    rank : sequence of int
        The index order, by slack.
    inside : bool, optional
        Whether a basis must be feasible; a dual walk's need not.

    Raises
    ------
    WalkError
        A region with a line, a start that is no vertex or no feasible basis.
    """
    model, first = opened.slacks.model, crash(opened)
    if first.lines and optimum(model).outcome != "infeasible":
        name = model.variables[first.lines[0]]
        raise WalkError(
            f"no constraint stops {name!r}: the region contains a line, so it has no vertex to walk from; "
            f"give {name!r} a bound, or ask for the optimum instead.",
            culprit=name,
        )
    if start is None:
        return first
    names = _basis_names(model, first.dictionary, start)
    if names is not None:
        return _at_basis(model, first, names, inside)
    return _at_vertex(model, first, _point(model, start), rank)


def _basis_names(model: Model, dictionary: Dictionary, start: object) -> list[str] | None:
    """The start as constraint names, or None where it is something else."""
    if isinstance(start, str | Mapping) or not isinstance(start, Sequence):
        return None
    known = dictionary.slacks.of_constraint
    if not all(isinstance(name, str) for name in start) or not any(name in known for name in start):
        return None
    for name in start:
        if name not in known:
            raise WalkError(str(unknown("constraint", name, known, "the model (start)")), culprit=name)
    if len(set(start)) != model.n or len(start) != model.n:
        raise WalkError(
            f"a basis of this model holds {model.n} different constraints active, one a decision; "
            f"got {len(start)}: {', '.join(start)}.",
            culprit=tuple(start),
        )
    return list(start)


def _at_basis(model: Model, first: Crash, names: list[str], inside: bool) -> Crash:
    known = first.dictionary.slacks.of_constraint
    done, held = hold(first, [known[name] for name in names])
    for name in names:
        if known[name] not in held:
            raise WalkError(
                f"{', '.join(names)} are no basis: {name!r} follows from the others and the equalities, so they do "
                f"not meet in one point; replace {name!r}.",
                culprit=name,
            )
    if inside:
        _check_inside(model, done.dictionary.point, f"the basis {', '.join(names)}")
    return done


def _at_vertex(model: Model, first: Crash, point: Row, rank: Sequence[int]) -> Crash:
    """Of the bases of a degenerate vertex the one that holds the lowest independent indices active."""
    _check_inside(model, point, "the start")
    known = first.dictionary.slacks.of_constraint
    touching = [known[row.name] for row in model.constraints if _touches(row, point)]
    done, held = hold(first, sorted(touching, key=rank.__getitem__))
    if len(held) < model.n:
        raise WalkError(
            f"the start {_told(point)} is no vertex: only {len(held)} independent constraints are active there, "
            f"a vertex of {model.n} decisions needs {model.n}; take a point of region(model).vertices.",
            culprit=point,
        )
    return done


def hold(first: Crash, wanted: list[int]) -> tuple[Crash, set[int]]:
    """Pivot the wanted slacks to 0, one after another; those that follow from the ones before are passed over."""
    items = first.dictionary.slacks.items
    held = {k for k in first.dictionary.nonbasic if items[k].kind == "equality"}
    for index in wanted:
        now = first.dictionary
        if index in now.basic:
            row = now.basic.index(index)
            able = [j for j, k in enumerate(now.nonbasic) if k not in held and now.rows[row][j + 1]]
            if not able:
                continue
            first = first.pivoted(row, min(able, key=lambda j: (now.nonbasic[j] in wanted, now.nonbasic[j])))
        if index in first.dictionary.nonbasic:
            held.add(index)
    return first, held


def _touches(row: Constraint, point: Row) -> bool:
    return row.sense != "==" and not row.is_constant and row.slack(point) == 0


def _check_inside(model: Model, point: Row, what: str) -> None:
    for row in model.constraints:
        if not row.holds(point):
            raise WalkError(
                f"{what} is not feasible: at {_told(point)} {row.name!r} ({row.text(model.variables)}) is violated by "
                f"{full(abs(row.slack(point)))}; start at a vertex of the region, or leave start out for Phase I.",
                culprit=row.name,
            )


def _point(model: Model, start: object) -> Row:
    if isinstance(start, Integral) and not isinstance(start, bool):
        return _vertex(model, int(start))
    if hasattr(start, "point"):
        return cast(Row, start.point)
    if isinstance(start, str | bool) or not hasattr(start, "__iter__"):
        raise WalkError(
            "expected as start a vertex (its number, the vertex itself, or its point) or the names of the "
            f"constraints held active, got {start!r}.",
            culprit=start,
        )
    return model.point(cast("Sequence[object]", start))


def _vertex(model: Model, number: int) -> Row:
    from polywalk.region import region  # only here: enumeration is not needed for any other start

    vertices = region(model).vertices
    if not 0 <= number < len(vertices):
        raise WalkError(
            f"expected as start the number of one of the region's {len(vertices)} vertices, counted from 0, "
            f"got {number}.",
            culprit=number,
        )
    return vertices[number].point


def _told(point: Row) -> str:
    return f"({', '.join(full(value) for value in point)})"
