"""Which rows probably bound the region, guessed in floats. A bad guess costs time, never the answer.

Rows are added where the region of those chosen so far sticks out of another one: from a point inside, one looks
towards each corner that sticks out and takes the row met first, which is not redundant unless several are met at once
(Clarkson 1994); before a point inside is known, the row that the corner breaks most.

References
----------
Clarkson, More output-sensitive geometric algorithms, FOCS 1994.
"""

from __future__ import annotations

from collections.abc import Callable
from collections.abc import Set as AbstractSet

import numpy as np

from polywalk.region.listing import Floats, sketch_generators
from polywalk.region.sieve import blocks

NEAR = 1e-9
"""A slack in balanced rows that counts as broken; rows broken by less are left to the exact rounds."""

TOUCHES, NOISE = 1e-7, 1e-14
"""A corner whose slack is so small a part of the row's largest counts as touched; rounding may leave the second."""

FAR = 0.1
"""A region smaller than this in balanced variables is looked at from closer by, lest floats take it for a point."""

ROUNDS = 40
"""Rounds at most; where each doubles the rows, a dozen are many."""

Affordable = Callable[[AbstractSet[int]], bool]


@np.errstate(all="ignore")
def guess(rows: Floats, equal: AbstractSet[int], affordable: Affordable) -> set[int]:
    """The numbers of rows (b, a) whose region is probably that of all of them, the equalities among them.

    Stops where floats get lost or the next round is not affordable, with what there is by then.
    """
    columns = _balanced(rows)
    chosen = {*equal, *_facing(columns)}
    for _ in range(ROUNDS):
        if not affordable(chosen):
            break
        places = sorted(chosen)
        corners = sketch_generators(columns[:, places].T, {k for k, place in enumerate(places) if place in equal})
        if corners is None or not len(points := corners[corners[:, 0] > NEAR]):
            break
        middle = points.sum(axis=0) / len(points)
        fresh = _met(columns, corners, middle) - chosen
        if not fresh:
            return chosen - _needless(columns, chosen - equal, corners)
        chosen |= fresh
        columns = _closer(columns, points, middle)
    return chosen


def _balanced(rows: Floats) -> Floats:
    """One row a column, all brought to like sizes; what floats cannot hold becomes zero, which is never broken."""
    columns: Floats = np.nan_to_num(rows.T, nan=0.0)
    columns /= _size(columns, axis=1)
    columns /= _size(columns[1:], axis=0)
    return columns


def _size(columns: Floats, axis: int) -> Floats:
    size: Floats = np.abs(columns).max(axis=axis, keepdims=True)
    size[size == 0] = 1.0
    return size


def _closer(columns: Floats, points: Floats, middle: Floats) -> Floats:
    """The same rows in variables in which the points lie round the origin, at about 1, if they are close together."""
    size = (points.max(axis=0) - points.min(axis=0)).max()
    if not 0 < size < FAR:
        return columns
    moved = np.vstack([middle @ columns / size, columns[1:]])
    return moved / _size(moved, axis=0)


def _facing(columns: Floats) -> set[int]:
    """The rows that look most along each axis, either way."""
    slopes = columns[1:] / np.sqrt((columns[1:] ** 2).sum(axis=0) + NEAR)
    return {*slopes.argmax(axis=1).tolist(), *slopes.argmin(axis=1).tolist()}


def _met(columns: Floats, corners: Floats, middle: Floats) -> set[int]:
    """For each corner or ray that breaks a row, a row it breaks: the first on the way from inside if that is known."""
    room = (middle + corners[corners[:, 0] <= NEAR].sum(axis=0)) @ columns
    scale = 1 / np.where(room > NEAR, room, 1.0) if room.min() > -NEAR else np.ones(len(room))
    found: set[int] = set()
    for part in blocks(len(corners), len(room)):
        slacks = corners[part] @ columns * scale
        worst = slacks.argmin(axis=1)
        found.update(worst[slacks[np.arange(len(worst)), worst] < -NEAR].tolist())
    return found


def _needless(columns: Floats, chosen: AbstractSet[int], corners: Floats) -> set[int]:
    """The chosen rows that touch no corner which another one does not touch as well; of two alike the later."""
    places = sorted(chosen)
    slacks = np.abs(corners @ columns[:, places])
    touched = slacks <= TOUCHES * slacks.max(axis=0) + NOISE
    sides = ~touched.all(axis=0)
    alone = touched.T.astype(float) @ ~touched
    within = (alone == 0) & sides & ((alone.T > 0) | np.tri(len(places), k=-1, dtype=bool))
    return {place for place, is_within in zip(places, (within.any(axis=1) & sides).tolist(), strict=True) if is_within}
