"""The sparse model in words: counts, not contents."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from polywalk.errors import LargeModelError
from polywalk.model import GOAL, Model
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


def missing(big: BigModel, name: str) -> AttributeError:
    """The error for an attribute that is not there: of the exact Model, then the way to one, or of neither."""
    if name.startswith("_") or not (hasattr(Model, name) or name in Model.__dataclass_fields__):
        return AttributeError(f"{type(big).__name__!r} object has no attribute {name!r}", name=name, obj=big)
    return LargeModelError(
        f"expected an exact Model, got {big.name or 'a model'!r}, a BigModel of {big.n:,} variables, which has no "
        f"{name!r}. Cut it down first: section(big, keep).model, shadow(big, onto).model, big.only(...).to_model(), or "
        "conflict(big) where it has no plan; big.to_model() where it is small.",
        name,
    )
