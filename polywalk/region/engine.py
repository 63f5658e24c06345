"""From rows to generators and back: here where it is quick, in a child process where it is not."""

from __future__ import annotations

from typing import Any

from polywalk.budget import Budget, in_child
from polywalk.region.effort import SMALL_WORK, is_small, work
from polywalk.region.listing import Listed, Rows, list_rows
from polywalk.region.sieve import Sieve
from polywalk.region.workingset import list_needed

__all__ = ["SMALL_WORK", "Listed", "Rows", "generators_of", "rows_of", "work"]


def generators_of(sieve: Sieve, equal: frozenset[int], budget: Budget | None = None) -> Listed:
    """What its rows (b, a), b + a.x >= 0 or = 0, generate: rows (1, point) or (0, ray), and which are lines."""
    found = list_needed(sieve, equal, is_small) if budget is None else None
    if found is not None:
        return found
    task = f"listing the vertices of {len(sieve.rows)} constraints in {len(sieve.rows[0]) - 1} variables"
    remedy = "fix variables, leave out constraints that never bind, or raise it: region(model, Budget(seconds=600))."
    return _listed(in_child(list_needed, sieve, equal, budget=budget or Budget(), task=task, remedy=remedy))


def rows_of(generators: Rows, lines: frozenset[int], budget: Budget | None = None) -> Listed:
    """The fewest rows (b, a) that describe what generators (1, point) or (0, ray) span, and which are equalities."""
    if budget is None and is_small(generators, lines):
        return list_rows(generators, lines)
    task = f"finding the constraints of a shadow of {len(generators)} generators on {len(generators[0]) - 1} variables"
    remedy = "keep fewer variables or raise it: project(region, onto, Budget(seconds=600))."
    return _listed(in_child(list_rows, generators, lines, budget=budget or Budget(), task=task, remedy=remedy))


def _listed(answer: Any) -> Listed:
    """The answer of a child process, which comes without a type."""
    listed: Listed = answer
    return listed
