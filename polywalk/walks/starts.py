"""The starts a comparison walks from: at rest, every vertex, every basis, or those the caller lists."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Literal

from polywalk.errors import WalkError
from polywalk.exact import Row
from polywalk.linear import Crash, Dictionary
from polywalk.region import Region, vertex_name
from polywalk.table import cell
from polywalk.walks.basis import gather
from polywalk.walks.start import first_dictionary, hold

Starts = Literal["vertices", "bases"] | Sequence[object] | None

MOST_BASES = 5_000
"""Past this many bases of one vertex the walks alone would take minutes."""

REST = "rest"
"""What the default start is called: every bounded decision at its lower bound, else at its upper one."""


@dataclass(frozen=True)
class Start:
    """One start of a comparison.

    Parameters
    ----------
    name : str
        "V3"; "V3 B0" for basis B0 of ``bases(model, 3)``; "rest (V3)" or "rest (outside)" for the default start.
    given : object
        What ``walk`` takes as its start.
    vertex : int or None
        The number of the vertex it lies at; None outside the region.
    """

    name: str
    given: object
    vertex: int | None


def opened_at(first: Dictionary, region: Region, starts: Starts, rank: Sequence[int]) -> list[tuple[Start, Crash]]:
    """Each start with the dictionary it begins in.

    Parameters
    ----------
    first : Dictionary
        The model's first one, before the crash phase.
    region : Region
    starts : None, "vertices", "bases" or sequence
        See ``compare``.
    rank : sequence of int
        The index order, by slack.

    Raises
    ------
    WalkError
        Another word, no start at all, a region with a line, or a start that is no vertex or basis of the region.
    """
    opened = first_dictionary(first, None, rank)
    if starts is None:
        return [_at_rest(opened, region)]
    if isinstance(starts, str):
        if starts not in {"vertices", "bases"}:
            raise WalkError(
                f"expected as starts None, 'vertices', 'bases' or a list of starts, got {starts!r}.", culprit=starts
            )
        if starts == "vertices":
            found = [(start, _at_vertex(opened, names, rank)) for start, names in _vertices(region)]
        else:
            found = [(start, _at_basis(opened, names)) for start, names in _bases(opened, region)]
    else:
        listed = list(starts) if isinstance(starts, Sequence) else [starts]
        found = [_given(first, region, start, rank) for start in listed]
    if not found:
        why = "the region is empty" if region.status == "empty" else "the list of starts is empty"
        raise WalkError(f"there is no start to compare from: {why}; leave starts out to start at rest.", culprit=starts)
    return found


def _at_rest(opened: Crash, region: Region) -> tuple[Start, Crash]:
    number = _number(region, opened.dictionary.point) if opened.contradiction is None else None
    place = "outside" if number is None else vertex_name(number)
    return Start(f"{REST} ({place})", None, number), opened


def _number(region: Region, point: Row) -> int | None:
    return next((k for k, vertex in enumerate(region.vertices) if vertex.point == point), None)


def _vertices(region: Region) -> Iterator[tuple[Start, Sequence[str]]]:
    for number, vertex in enumerate(region.vertices):
        yield Start(vertex_name(number), number, number), vertex.active


def _bases(opened: Crash, region: Region) -> Iterator[tuple[Start, Sequence[str]]]:
    for number, vertex in enumerate(region.vertices):
        known = opened.dictionary.slacks.of_constraint
        here = hold(opened, [known[name] for name in vertex.active])[0].dictionary
        members, complete = gather(here, MOST_BASES)
        if not complete:
            raise WalkError(
                f"{vertex_name(number)} has more than {MOST_BASES} bases; start from the vertices, or list the bases.",
                culprit=number,
            )
        for basis in members:
            yield Start(f"{vertex_name(number)} {basis.name}", basis.held, number), basis.held


def _at_vertex(opened: Crash, names: Sequence[str], rank: Sequence[int]) -> Crash:
    """As ``walk`` starts there, without asking again whether it is a vertex."""
    slacks = opened.dictionary.slacks
    indices = [slacks.of_constraint[name] for name in names]
    return hold(opened, sorted((k for k in indices if slacks.pivots[k]), key=rank.__getitem__))[0]


def _at_basis(opened: Crash, names: Sequence[str]) -> Crash:
    known = opened.dictionary.slacks.of_constraint
    return hold(opened, [known[name] for name in names])[0]


def _given(first: Dictionary, region: Region, start: object, rank: Sequence[int]) -> tuple[Start, Crash]:
    begun = first_dictionary(first, start, rank)
    if start is None:
        return _at_rest(begun, region)
    number = _number(region, begun.dictionary.point)
    name = cell(begun.dictionary.point) if number is None else vertex_name(number)
    if isinstance(start, Sequence) and all(isinstance(part, str) for part in start):
        name += f": {', '.join(start)}"
    return Start(name, start, number), begun
