"""The sparse model in words: counts, not contents."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from polywalk.model import GOAL
from polywalk.table import Table

if TYPE_CHECKING:
    from polywalk.bigmodel.sparse import BigModel, Floats


def overview(big: BigModel) -> Table:
    """How many variables, rows and nonzeros there are, and of which kinds."""
    goal = "no objective"
    if big.goal is not None:
        goal = f"{GOAL[big.goal]} {np.count_nonzero(big.cost):,} of {counted(big.n, 'variable')}"
    title = f"{goal}, {counted(big.m, 'row')}, {counted(big.nonzeros, 'nonzero')}"
    columns, ends = _kinds(big.lower, big.upper), _kinds(big.row_lower, big.row_upper)
    whole = len(big.integers)
    lines = (
        ("variables", big.n, f"{columns[0]} free, {columns[1]} with two bounds, {columns[2]} fixed, {whole} integer"),
        ("rows", big.m, f"{ends[2]} equalities, {ends[1]} with two sides, {ends[0]} without a side"),
    )
    return Table(f"{big.name}: {title}" if big.name else title, ("part", "count", "of which"), lines, big.notes)


def counted(count: int, what: str) -> str:
    """ "1 row", "2,000 rows"."""
    return f"{count:,} {what}{'' if count == 1 else 's'}"


def _kinds(lower: Floats, upper: Floats) -> tuple[int, int, int]:
    """How many have no end, two different ones, and two equal ones."""
    low, high, same = np.isfinite(lower), np.isfinite(upper), lower == upper
    return int((~low & ~high).sum()), int((low & high & ~same).sum()), int(same.sum())
