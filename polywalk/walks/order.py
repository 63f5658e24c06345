"""The index order: which slack counts as lower where a rule or a tie asks for the lowest index."""

from __future__ import annotations

from collections.abc import Sequence

from polywalk.errors import DuplicateName, WalkError, unknown
from polywalk.linear import Slacks

DECISIONS_FIRST, SLACKS_FIRST, INTERLEAVED = "decisions first", "slacks first", "interleaved"
ORDERS = (DECISIONS_FIRST, SLACKS_FIRST, INTERLEAVED)
"""Orders known by a name; any other order is given in full."""


def ranks(slacks: Slacks, order: str | Sequence[str] | None) -> tuple[int, ...]:
    """The rank of every slack, by its index.

    Parameters
    ----------
    slacks : Slacks
    order : str or sequence of str, optional
        "decisions first" (the default: as written), "slacks first", "interleaved" (first decision, first slack,
        second decision, ...), or every slack's name exactly once; free decisions and equalities, which never enter or
        leave, may be left out.

    Raises
    ------
    WalkError
        An order that leaves out a slack, or an unknown name for an order.
    UnknownName, DuplicateName
        A name in the order that no slack has, or that comes twice.
    """
    if order is None or isinstance(order, str):
        places = _named(slacks, DECISIONS_FIRST if order is None else order)
    else:
        places = _listed(slacks, list(order))
    rank = {index: place for place, index in enumerate(places)}
    last = len(rank)
    return tuple(rank.get(index, last + index) for index in range(len(slacks.items)))


def _named(slacks: Slacks, order: str) -> list[int]:
    n = slacks.model.n
    decisions, others = list(range(n)), list(range(n, slacks.auxiliary))
    if order == DECISIONS_FIRST:
        return decisions + others
    if order == SLACKS_FIRST:
        return others + decisions
    if order == INTERLEAVED:
        longest = range(max(len(decisions), len(others)))
        return [index for k in longest for index in (*decisions[k : k + 1], *others[k : k + 1])]
    raise WalkError(str(unknown("index order", order, ORDERS, "polywalk")), culprit=order)


def _listed(slacks: Slacks, order: list[str]) -> list[int]:
    known = {name: k for k, name in enumerate(slacks.names[: slacks.auxiliary])}
    for k, name in enumerate(order):
        if name not in known:
            raise unknown("slack", name, known, "the index order")
        if name in order[:k]:
            raise DuplicateName(f"the index order names {name!r} twice; name every slack once.", culprit=name)
    missing = [name for name, k in known.items() if slacks.pivots[k] and name not in order]
    if missing:
        raise WalkError(
            f"the index order leaves out {', '.join(map(repr, missing))}; "
            f"name every slack once: {', '.join(name for name, k in known.items() if slacks.pivots[k])}.",
            culprit=missing[0],
        )
    return [known[name] for name in order]
