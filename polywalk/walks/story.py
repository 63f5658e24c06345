"""A pivot told in the model's own words: what rises, what runs out first, what changes."""

from __future__ import annotations

from fractions import Fraction
from typing import TYPE_CHECKING

from polywalk.exact import short
from polywalk.linear import Dictionary
from polywalk.walks.dual_pivots import DualPivot
from polywalk.walks.dual_story import dual_story, joined
from polywalk.walks.rules import Rule

if TYPE_CHECKING:
    from polywalk.walks.pivots import Pivot


def story(pivot: Pivot) -> str:
    """Three or four sentences with exact numbers: what moves, why it was chosen, what stops it, what it earns.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "2*x + y <= 4"},
    ...                         bounds={"x": (0, None), "y": (0, 3)}, units={"x": "kg"})
    >>> print(pw.walk(model).pivots[0].story())
    x rises from 0 to 2 kg: each unit raises the objective by 3. Of x (3) and y (2) it has the largest reduced cost. \
labour runs out first, at step 2, and leaves. The objective goes from 0 to 6.
    """
    if isinstance(pivot, DualPivot):
        return dual_story(pivot)
    if pivot.before.slacks.names[pivot.before.slacks.auxiliary] == pivot.entering:
        return _auxiliary_enters(pivot)
    return f"{_entering(pivot)}: {_worth(pivot)}. {_chosen(pivot)}{_leaving(pivot)} {_change(pivot)}"


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


def _worth(pivot: Pivot) -> str:
    rate, would = pivot.reduced_costs[pivot.entering], "would " if pivot.kind == "degenerate" else ""
    verb = ("raise" if rate > 0 else "lower") + ("" if would else "s")
    return f"each unit {would}{verb} the {'auxiliary' if pivot.phase == 1 else 'objective'} by {short(abs(rate))}"


def _chosen(pivot: Pivot) -> str:
    """Why the rule let it enter, beside the others that improve; empty where nobody says which rule it was."""
    if pivot.rules is None:
        return ""
    now, rule, rank = pivot.before, pivot.rules.entering, pivot.rules.rank
    able = sorted(now.improving(), key=lambda j: rank[now.nonbasic[j]])
    if len(able) == 1:
        return "No other slack improves. "
    told = [_measured(now.slacks.names[now.nonbasic[j]], rule, now, j) for j in able]
    if not rule.reason:
        return f"{rule.name} chose it among {joined(told)}. "
    return f"Of {joined(told)} it {_special(rule, now, [(j,) for j in able], (pivot.column,))}. "


def _special(rule: Rule, now: Dictionary, able: list[tuple[int, ...]], chosen: tuple[int, ...]) -> str:
    """What is special about the choice; where others measure the same, that it is the lowest index of them."""
    if rule.measure is None:
        return rule.reason
    best = rule.measure(now, *chosen)
    equal = sum(rule.measure(now, *other) == best for other in able)
    return rule.reason + (", of equals the lowest index" if equal > 1 else "")


def _measured(name: str, rule: Rule | None, now: Dictionary, *places: int) -> str:
    """The name, with the number the rule compares."""
    if rule is None or rule.measure is None:
        return name
    value = rule.measure(now, *places)
    return f"{name} ({'without end' if value is None else short(value)})"


def _leaving(pivot: Pivot) -> str:
    if pivot.row is None:
        return "Nothing ever runs out."
    now, at = pivot.before, f"at step {_number(pivot, 'step')}"
    if now.basic[pivot.row] == now.slacks.auxiliary:
        return f"The auxiliary reaches 0 {at} and leaves: the point is feasible, and Phase I is over."
    rows = now.first_to_run_out(pivot.column)
    if len(rows) == 1:
        return f"{pivot.leaving} runs out first, {at}, and leaves."
    rule, column = None if pivot.rules is None else pivot.rules.leaving, pivot.column
    tied = [_measured(now.slacks.names[now.basic[i]], rule, now, column, i) for i in rows]
    return f"{joined(tied)} {'both' if len(tied) == 2 else 'all'} run out {at}; {_untied(pivot, rule, rows)}."


def _untied(pivot: Pivot, rule: Rule | None, rows: list[int]) -> str:
    """Why that one of the tied slacks leaves."""
    if rule is None or pivot.row is None:
        return f"{pivot.leaving} leaves"
    if not rule.reason:
        return f"{rule.name} chose {pivot.leaving} to leave"
    special = _special(rule, pivot.before, [(pivot.column, i) for i in rows], (pivot.column, pivot.row))
    return f"{pivot.leaving} {special}{',' if ',' in special else ''} and leaves"


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
