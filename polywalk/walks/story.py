"""A pivot told in the model's own words: what rises, what runs out first, what changes."""

from __future__ import annotations

from fractions import Fraction
from typing import TYPE_CHECKING

from polywalk.exact import short
from polywalk.linear import Dictionary

if TYPE_CHECKING:
    from polywalk.walks.pivots import Pivot


def story(pivot: Pivot) -> str:
    """Two or three sentences with exact numbers.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "2*x + y <= 4"},
    ...                         bounds={"x": (0, None), "y": (0, 3)}, units={"x": "kg"})
    >>> print(pw.walk(model).pivots[0].story())
    x rises from 0 to 2 kg: each unit raises the objective by 3. labour runs out first, at step 2, and leaves. \
The objective goes from 0 to 6.
    """
    if pivot.before.slacks.names[pivot.before.slacks.auxiliary] == pivot.entering:
        return _auxiliary_enters(pivot)
    return f"{_entering(pivot)}: {_why(pivot)}. {_leaving(pivot)} {_change(pivot)}"


def _auxiliary_enters(pivot: Pivot) -> str:
    return (
        f"Phase I starts: every slack may be short by as much as an auxiliary variable, which rises to "
        f"{_number(pivot, 'step')}, what {pivot.leaving} is short by, the most of all. No decision moves."
    )


def _entering(pivot: Pivot) -> str:
    """What the entering slack means: a decision that leaves its bound, or a constraint that is let go."""
    now, index = pivot.before, pivot.before.nonbasic[pivot.column]
    if index >= now.slacks.model.n:
        name = _constraint(now, index)
        return f"The slack of {name} {_move(pivot, 'grows', Fraction(0), pivot.step)}{_unit(pivot, name)}"
    name, verb = now.slacks.names[index], "rises" if now.slacks.sides[index] > 0 else "falls"
    end = None if pivot.row is None else pivot.point_after[index]
    return f"{name} {_move(pivot, verb, pivot.point_before[index], end)}{_unit(pivot, name)}"


def _move(pivot: Pivot, verb: str, start: Fraction, end: Fraction | None) -> str:
    if pivot.kind == "degenerate":
        return f"enters, still at {short(start)}"
    return f"{verb} from {short(start)}" + ("" if end is None else f" to {short(end)}")


def _why(pivot: Pivot) -> str:
    rate, would = pivot.reduced_costs[pivot.entering], "would " if pivot.kind == "degenerate" else ""
    verb = ("raise" if rate > 0 else "lower") + ("" if would else "s")
    return f"each unit {would}{verb} the {'auxiliary' if pivot.phase == 1 else 'objective'} by {short(abs(rate))}"


def _leaving(pivot: Pivot) -> str:
    if pivot.row is None:
        return "Nothing ever runs out."
    now = pivot.before
    tied = [now.slacks.names[now.basic[i]] for i in now.first_to_run_out(pivot.column)]
    at = f"at step {_number(pivot, 'step')}"
    if now.basic[pivot.row] == now.slacks.auxiliary:
        return f"The auxiliary reaches 0 {at} and leaves: the point is feasible, and Phase I is over."
    if len(tied) == 1:
        return f"{tied[0]} runs out first, {at}, and leaves."
    both = "both" if len(tied) == 2 else "all"
    return f"{', '.join(tied[:-1])} and {tied[-1]} {both} run out {at}; {pivot.leaving} leaves."


def _change(pivot: Pivot) -> str:
    before, after = short(pivot.objective_before), short(pivot.objective_after)
    if pivot.kind == "degenerate":
        return f"So nothing moves: the objective stays at {before}."
    if pivot.kind == "ray":
        word = "rises" if pivot.before.slacks.maximizes else "falls"
        return f"The objective {word} from {before} for ever."
    return f"The objective goes from {before} to {after}." if before != after else f"The objective stays at {before}."


def _constraint(now: Dictionary, index: int) -> str:
    place = now.slacks.items[index].constraint
    return now.slacks.names[index] if place is None else now.slacks.model.constraints[place].name


def _number(pivot: Pivot, what: str) -> str:
    value = getattr(pivot, what)
    return "" if value is None else short(value)


def _unit(pivot: Pivot, name: str) -> str:
    unit = pivot.before.slacks.model.unit(name)
    return f" {unit}" if unit else ""
