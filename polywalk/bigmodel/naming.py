"""Which row or bound of the sparse model a constraint of the exact one is, and copies with that side moved."""

from __future__ import annotations

from dataclasses import replace
from itertools import islice
from math import isinf
from typing import TYPE_CHECKING, Any, Literal

import numpy as np

from polywalk.errors import unknown

if TYPE_CHECKING:
    from polywalk.bigmodel.sparse import BigModel

Side = Literal["lower", "upper", "both"]
ENDS: tuple[Side, Side] = ("lower", "upper")


def locate(big: BigModel, name: str) -> tuple[Literal["row_", ""], int, Side]:
    """Where a constraint of the exact Model sits in the sparse one.

    Returns
    -------
    ("row_" or "", int, "lower", "upper" or "both")
        A row or a bound, its place, and which of its two sides.

    Raises
    ------
    UnknownName
        A row with two sides goes by the name of one of them.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel, locate
    >>> from polywalk.scenarios import harbour_row
    >>> locate(BigModel.from_model(harbour_row()), "tank upper")
    ('', 2, 'upper')
    """
    if name in big.row_places:
        return "row_", big.row_places[name], _side_of_row(big, name)
    stem, _, word = name.rpartition(" ")
    for side in ENDS:
        if word == side and stem in big.row_places:
            return "row_", big.row_places[stem], side
        if word == side and stem in big.places:
            return "", big.places[stem], side
    if word == "fixed" and stem in big.places:
        return "", big.places[stem], "both"
    near = (f"{stem} {end}" for stem in islice(big.variables, 200) for end in ENDS)
    raise unknown("constraint", name, [*big.rows, *near])


def _side_of_row(big: BigModel, name: str) -> Side:
    place = big.row_places[name]
    low, high = float(big.row_lower[place]), float(big.row_upper[place])
    if low == high:
        return "both"
    if isinf(low) != isinf(high):
        return "upper" if isinf(low) else "lower"
    raise unknown("constraint", name, [f"{name} lower", f"{name} upper"])


def moved(big: BigModel, name: str, lower: float, upper: float) -> BigModel:
    """A copy with the named side moved, or with both where they were equal."""
    what, place, side = locate(big, name)
    changes: dict[str, Any] = {}
    for end, value in zip(ENDS, (lower, upper), strict=True):
        if side in {"both", end}:
            values = np.array(getattr(big, what + end))
            values[place] = value
            changes[what + end] = values
    return replace(big, **changes)


def dropped(big: BigModel, name: str) -> BigModel:
    """A copy without a row, one of its sides, or a bound; a row that loses its last side goes."""
    if name not in big.row_places:
        what, place, _ = locate(big, name)
        changed = moved(big, name, -np.inf, np.inf)
        sides = (changed.row_lower[place], changed.row_upper[place]) if what else (0.0,)
        return without_row(changed, place) if all(map(isinf, sides)) else changed
    return without_row(big, big.row_places[name])


def without_row(big: BigModel, place: int) -> BigModel:
    """A copy without the row at that place, and without its unit."""
    start, stop = big.indptr[place], big.indptr[place + 1]
    name = big.rows[place]
    return replace(
        big,
        rows=big.rows[:place] + big.rows[place + 1 :],
        indptr=np.concatenate([big.indptr[: place + 1], big.indptr[place + 2 :] - (stop - start)]),
        indices=np.delete(big.indices, np.s_[start:stop]),
        data=np.delete(big.data, np.s_[start:stop]),
        row_lower=np.delete(big.row_lower, place),
        row_upper=np.delete(big.row_upper, place),
        units=tuple(pair for pair in big.units if pair[0] != name or name in big.places),
    )
