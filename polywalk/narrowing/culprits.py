"""Which constraints of a conflict to look at first: those that are enough to relax, then those least like others."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Iterable, Iterator, Sequence
from fractions import Fraction
from math import ceil, floor, log10
from time import monotonic

from polywalk.bigmodel import BigModel, locate
from polywalk.errors import SolverError
from polywalk.exact import exact, short
from polywalk.model import Constraint, Model
from polywalk.narrowing.best import best
from polywalk.narrowing.certify import Limit
from polywalk.narrowing.circuit import contradiction
from polywalk.progress import progress
from polywalk.rows import SIGN, Sense
from polywalk.table import Table

Order = tuple[tuple[str, str], ...]
"""Names of constraints, each with what to tell of it."""

TRYING = 5.0
"""Seconds spent on finding constraints that are enough to relax."""

INDEX = re.compile(r"\[[^\]]*\]|\([^)]*\)|[_.]\d+(?=$|[_. ])")
"""What tells members of a family apart: demand[7], demand(7), demand_7."""

LISTED = 6
"""Families of so many members are still listed one by one."""

ADDED_UP = "added up to two"
"""How the name ends of a conflict that is too large to be listed."""

TOLD = 12
"""Lines of constraints that one text tells."""

WIDE = 60
"""Letters of a rule in a folded table; past them it is cut short."""


def family(name: str) -> str:
    """The name without its index: members of one family share it.

    Examples
    --------
    >>> from polywalk.narrowing.culprits import family
    >>> [family(name) for name in ("demand[7]", "level[7] upper", "demand_12", "timber")]
    ['demand[]', 'level[] upper', 'demand[]', 'timber']
    """
    return INDEX.sub("[]", name)


def ordered(big: BigModel, names: Sequence[str], end: float) -> Order:
    """The constraints of a conflict in the order to look at them.

    First those that are enough to relax, with how far; then by the size of their family, the smallest first.

    Parameters
    ----------
    big : BigModel
    names : sequence of str
        The constraints of one conflict.
    end : float
        When to stop trying, on the clock of `time.monotonic`; it stops after `TRYING` seconds in any case.
    """
    sizes = Counter(map(family, names))
    left = sorted(names, key=lambda name: sizes[family(name)])
    told = dict[str, str]()
    suspects = _Suspects(left)
    for name in progress(suspects.until(min(end, monotonic() + TRYING)), len(left), "constraints tried alone"):
        less = big.without(name)
        side = None if suspects.narrow(less) else _enough(big, less, name)
        if side is not None:
            told[name] = side
    return tuple((name, told.get(name, "")) for name in sorted(left, key=lambda name: name not in told))


class _Suspects:
    """Constraints that every contradiction found so far needs: only they can be enough to relax."""

    def __init__(self, names: Iterable[str]) -> None:
        self.left = list(names)

    def until(self, end: float) -> Iterator[str]:
        """One after the other, until the time is over."""
        while self.left and monotonic() < end:
            yield self.left.pop(0)

    def narrow(self, big: BigModel) -> bool:
        """Drop what a contradiction of this model does without; whether there is one."""
        found = contradiction(big)
        if found is not None:
            needed = {name for name, _ in found.multipliers}
            self.left = [name for name in self.left if name in needed]
        return found is not None


def _enough(big: BigModel, less: BigModel, name: str) -> str | None:
    """The right-hand side nearest to the constraint's own that leaves a plan, as text; None where none does.

    Parameters
    ----------
    big, less : BigModel
        With and without the constraint.
    name : str
    """
    entries, sense, rhs = _parts(big, name)
    goals: dict[Sense, tuple[Sense, ...]] = {"<=": ("<=",), ">=": (">=",), "==": ("<=", ">=")}
    for side in goals[sense]:
        try:
            found = best(less.with_objective(entries, "min" if side == "<=" else "max"), plan=False)
        except SolverError:
            return None
        if found.outcome == "infeasible":
            return None
        if found.value is not None and (found.value > rhs) is (side == "<=") and found.value != rhs:
            told = short(found.value) if found.is_exact else f"{float(found.value):.6g}"
            room = "" if found.is_exact else ", within solver tolerance"
            return f"relaxed to {told} it alone suffices{room}"
    return None


def _parts(big: BigModel, name: str) -> tuple[dict[str, float], Sense, Fraction]:
    """Coefficients, sense and right-hand side of a constraint."""
    what, place, side = locate(big, name)
    entries = big.row(big.rows[place]) if what else {big.variables[place]: 1.0}
    ends = (big.row_lower, big.row_upper) if what else (big.lower, big.upper)
    sense: Sense = {"lower": ">=", "upper": "<=", "both": "=="}[side]  # type: ignore[assignment]
    return entries, sense, exact(float(ends[side == "upper"][place]))


def added_up(big: BigModel, found: Limit, order: Order) -> Model:
    """A conflict as two constraints on one number: the left side of the first one, and what the others say of it.

    Times their multipliers all constraints add up to 0 <= value. Without the first one they limit its left side to
    what lies -value / multiplier beyond its right-hand side; a little less is told, in few digits.
    """
    name, origin = order[0]
    assert found.value is not None
    weight = dict(found.multipliers)[name]
    _, sense, rhs = _parts(big, name)
    lines = families(other for other, _ in order[1:])
    more = [f"{len(lines) - TOLD} more"] if len(lines) > TOLD else []
    left, one = f"left side of {name}", (Fraction(1),)
    limit, is_least = rhs - found.value / weight, weight > 0
    near = _rounded(limit, downward=is_least)
    against = Constraint(
        f"the other {len(order) - 1:,} constraints",
        one,
        ">=" if is_least else "<=",
        near if (near > rhs) is is_least and near != rhs else limit,
        f"each times its multiplier, added up: {'; '.join([*lines[:TOLD], *more])}",
    )
    return Model(
        (left,),
        (Constraint(name, one, sense, rhs, origin), against),
        units=((left, big.unit(name)),) if big.unit(name) else (),
        name=f"conflict in {big.name or 'the big model'}, {len(order):,} constraints {ADDED_UP}",
    )


def _rounded(value: Fraction, downward: bool) -> Fraction:
    """The number in six digits, on the side asked for."""
    step = Fraction(10) ** (floor(log10(abs(value))) - 5) if value else Fraction(1)
    return (floor if downward else ceil)(value / step) * step


def folded(model: Model) -> Table:
    """A conflict as a table in which large families take one row; constraints that suffice alone are never folded.

    Examples
    --------
    >>> from polywalk.narrowing import conflict
    >>> from polywalk.narrowing.culprits import folded
    >>> from polywalk.scenarios import harbour_day
    >>> found = folded(conflict(harbour_day().with_rhs("timber", 12)))
    >>> found.rows[0][0], found.rows[-1][0]
    ('timber', 'return temperature[1] ... return temperature[24]: 24 alike')
    """
    members: dict[str, list[Constraint]] = {}
    for row in model.constraints:
        members.setdefault(row.name if row.origin else family(row.name), []).append(row)
    rows = []
    for some in members.values():
        if len(some) > LISTED:
            rows.append((_alike([row.name for row in some]), f"the first: {_brief(some[0], model)}", ""))
        else:
            rows += [(row.name, _brief(row, model), row.origin) for row in some]
    told = [f"look first at {row.name!r}: {row.origin}" for row in model.constraints if row.origin]
    more = (f"{len(told) - LISTED} more suffice alone",) if len(told) > LISTED else ()
    return Table(model.name, ("constraint", "rule", "origin"), tuple(rows), (*told[:LISTED], *more))


def _brief(row: Constraint, model: Model) -> str:
    text = row.text(model.variables)
    return text if len(text) <= WIDE else f"{text[: WIDE - 4]} ... {SIGN[row.sense]} {short(row.rhs)}"


def families(names: Iterable[str], listed: int = LISTED) -> list[str]:
    """Names as lines of text, large families as one line.

    Examples
    --------
    >>> from polywalk.narrowing.culprits import families
    >>> families(["timber", *(f"demand[{t}]" for t in range(1, 25))])
    ['timber', 'demand[1] ... demand[24]: 24 alike']
    """
    members: dict[str, list[str]] = {}
    for name in names:
        members.setdefault(family(name), []).append(name)
    lines = []
    for some in members.values():
        lines += some if len(some) <= listed else [_alike(some)]
    return lines


def _alike(names: Sequence[str]) -> str:
    return f"{names[0]} ... {names[-1]}: {len(names):,} alike"
