"""The big model made ready for a shadow: the objective's value as a variable, or held near its optimum."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.errors import DuplicateName, ModelError, NumberError
from polywalk.exact import exact, short
from polywalk.narrowing.adding import with_row, with_variable
from polywalk.narrowing.best import Best, best
from polywalk.narrowing.certify import BASIC, Statuses
from polywalk.narrowing.given import names_of

OBJECTIVE = "objective"
"""What the objective's value is called as an axis."""

SUBOPTIMALITY = "suboptimality"
"""What the distance of the objective from its optimum is called as an axis (Boyd & Vandenberghe, Convex Optimization,
Cambridge 2004, section 1.3 onwards: a plan is e-suboptimal where its objective is within e of the optimum).
"""

VALUE_AXES = (OBJECTIVE, SUBOPTIMALITY)

VALUE = "objective's value"
"""The row that says what it is."""


@dataclass(frozen=True)
class Widened:
    """The model to take the shadow of, the kept columns, exact sides, what to tell, a basis to start from, and
    the row that keeps the objective near its optimum."""

    big: BigModel
    keep: tuple[int, ...]
    held: tuple[tuple[str, Fraction], ...]
    notes: tuple[str, ...]
    start: Statuses | None = None
    near: str = ""


def widened(big: BigModel, onto: Sequence[str], within: object) -> Widened:
    """The big model with what the question adds to it.

    Raises
    ------
    ModelError, UnknownName, DuplicateName, NumberError
        No names or more than three, one that is not there or is given twice, an objective that is not there.
    """
    names = names_of(onto, "one to three variables to keep", 3)
    for name in names:
        if names.count(name) > 1:
            raise DuplicateName(f"the variable {name!r} is given twice; name each one once.", name)
    wide, held, notes, start, close = big, list[tuple[str, Fraction]](), list[str](), None, ""
    asked = [name for name in VALUE_AXES if name in names and name not in big.variables]
    for name in asked:
        if big.goal is None:
            raise ModelError(f"expected a model with an objective for the axis {name!r}; it has none.", name)
    found = _optimum(big) if within is not None or SUBOPTIMALITY in asked else None
    if within is not None and found is not None:
        wide, held, notes, start = _near(big, within, found)
        close = wide.rows[-1]
    for name in asked:
        wide, side = _with_value(wide, name, found)
        held += [(wide.rows[-1], side)] if name == SUBOPTIMALITY else []
        start = start and ([*start[0], BASIC], [*start[1], 0])
    keep = tuple(wide.index(name) for name in names)
    marked = [name for name in names if name in big.integers]
    others = len(big.integers) - len(marked)
    if big.integers:
        rest = f"{others:,} other {'variable' if others == 1 else 'variables'}"
        what = " and ".join([*marked, *([rest] if others else [])])
        notes.append(f"integer marks are relaxed: {what}")
    return Widened(wide, keep, tuple(held), tuple(notes), start, close)


def _optimum(big: BigModel) -> Best | None:
    """The optimum to stay near, or to measure from; None where there is no plan."""
    found = best(big, plan=False)
    if found.outcome == "infeasible":
        return None
    if found.outcome == "unbounded" or found.value is None:
        raise ModelError(
            "expected a model with an optimum to stay near, got an unbounded one; see escape(big) for why.", big.name
        )
    return found


def _with_value(big: BigModel, name: str, found: Best | None) -> tuple[BigModel, Fraction]:
    """One more variable that equals the objective, or its distance from the optimum, with the row that says so."""
    sign, side = 1, exact(big.constant)
    if name == SUBOPTIMALITY:
        sign = 1 if big.goal == "min" else -1
        side = sign * (side - (found.value or 0 if found else 0))
    used = np.flatnonzero(big.cost)
    entries = [*used.tolist(), big.n], [*(-sign * big.cost[used]).tolist(), 1.0]
    return with_row(with_variable(big, name), VALUE, entries, float(side), float(side)), side


Near = tuple[BigModel, list[tuple[str, Fraction]], list[str], Statuses | None]


def _near(big: BigModel, within: object, found: Best) -> Near:
    """One more row that keeps the objective near its optimum, whose basis stays one when the new row is basic."""
    assert found.value is not None
    distance, said = _distance(within, found.value)
    better = 1 if big.goal == "min" else -1
    side = found.value + better * distance - exact(big.constant)
    name = f"objective within {said}"
    ends = (-np.inf, float(side)) if better > 0 else (float(side), np.inf)
    used = np.flatnonzero(big.cost)
    wide = with_row(big, name, (used.tolist(), big.cost[used].tolist()), *ends)
    start = found.basis and (found.basis[0], [*found.basis[1], BASIC])
    return wide, [(wide.rows[-1], side)], _told(found, said), start


def near(big: BigModel, within: object) -> BigModel | None:
    """The big model with its objective held near the optimum, in floats; None where it has no plan."""
    found = _optimum(big)
    return _near(big, within, found)[0] if found else None


def _told(found: Best, said: str) -> list[str]:
    assert found.value is not None
    rebuilt = "" if found.is_exact else " (HiGHS's, not proved exactly)"
    return [f"plans whose objective is within {said} of the optimum {short(found.value)}{rebuilt}"]


def _distance(within: object, value: Fraction) -> tuple[Fraction, str]:
    """How far from the optimum, and the same in words; "5%" is a share of it, a number is in its own unit."""
    text = str(within).strip()
    try:
        distance = exact(text[:-1].strip()) / 100 * abs(value) if text.endswith("%") else exact(within)
    except NumberError as wrong:
        said = f'within: expected a number, or a share of the optimum such as "5%", got {within!r}.'
        raise NumberError(said, within) from wrong
    if distance < 0:
        raise NumberError(f"within: expected a distance of at least 0 from the optimum, got {within!r}.", within)
    return distance, text if text.endswith("%") else short(distance)
