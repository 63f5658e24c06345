"""Which rows probably bound the region, guessed in floats. A bad guess costs time, never the answer.

Rows are added where the region of those chosen so far sticks out of another one: from a point inside, one looks
towards each corner that sticks out and takes the row met first, which is never redundant (Clarkson 1994); before a
point inside is known, the row that the corner breaks most.

References
----------
Clarkson, More output-sensitive geometric algorithms, FOCS 1994.
"""

from __future__ import annotations

from collections.abc import Callable
from collections.abc import Set as AbstractSet

import numpy as np

from polywalk.region.listing import Floats, sketch_generators

NEAR = 1e-9
"""A slack in balanced rows that counts as broken; rows broken by less are left to the exact rounds."""

Affordable = Callable[[AbstractSet[int]], bool]


def guess(rows: Floats, equal: AbstractSet[int], affordable: Affordable) -> set[int]:
    """The numbers of rows (b, a) whose region is probably that of all of them, the equalities among them.

    Stops where floats get lost or the next round is not affordable, with what there is by then.
    """
    balanced = _balanced(rows)
    chosen = {*equal, *_facing(balanced)}
    while affordable(chosen):
        places = sorted(chosen)
        corners = sketch_generators(balanced[places], {k for k, place in enumerate(places) if place in equal})
        if corners is None or not (corners[:, 0] > NEAR).any():
            break
        fresh = _met(balanced, corners) - chosen
        if not fresh:
            break
        chosen |= fresh
    return chosen


def _balanced(rows: Floats) -> Floats:
    """Rows and columns brought to like sizes; rows that floats cannot hold become zero, which is never broken."""
    found = np.nan_to_num(rows, nan=0.0)
    for _ in range(2):
        found = found / _size(found, axis=0)
        found = found / _size(found[:, 1:], axis=1)
    return found


def _size(rows: Floats, axis: int) -> Floats:
    size: Floats = np.abs(rows).max(axis=axis, keepdims=True)
    return np.where(size > 0, size, 1.0)


def _facing(rows: Floats) -> set[int]:
    """The rows that look most along each axis, either way."""
    slopes = rows[:, 1:] / np.maximum(np.linalg.norm(rows[:, 1:], axis=1, keepdims=True), NEAR)
    return {*slopes.argmax(axis=0).tolist(), *slopes.argmin(axis=0).tolist()}


def _met(rows: Floats, corners: Floats) -> set[int]:
    """For each corner or ray that breaks a row, a row it breaks: the first on the way from inside if that is known."""
    slacks = corners @ rows.T
    room = _inside(corners) @ rows.T
    if (room > -NEAR).all():
        slacks = slacks / np.where(room > NEAR, room, 1.0)
    worst = slacks.argmin(axis=1)
    return set(worst[slacks[np.arange(len(worst)), worst] < -NEAR].tolist())


def _inside(corners: Floats) -> Floats:
    """A point in the middle of the corners, moved along the rays."""
    finite = corners[:, 0] > NEAR
    middle: Floats = corners[finite].mean(axis=0) + corners[~finite].sum(axis=0)
    return middle
