"""A dual pivot told in plain sentences: which slack was short, what helps it most cheaply, what that costs."""

from __future__ import annotations

from polywalk.exact import short
from polywalk.walks.dual_pivots import DualPivot


def dual_story(pivot: DualPivot) -> str:
    """Three or four sentences with exact numbers.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(minimize="3*x + 2*y", constraints={"need": "x + y >= 3"},
    ...                         bounds={"x": (0, None), "y": (0, None)})
    >>> print(pw.dual_walk(model).explain(1))
    need is short by 3, the only one that is, and leaves: it goes up to 0. Of x (3) and y (2) y costs the objective \
the least per unit of it, and enters, growing to 3. The objective goes from 0 to 6. No slack is short any more: the \
point is inside the region.
    """
    return f"{_short(pivot)} {_entering(pivot)} {_change(pivot)} {_after(pivot)}"


def _short(pivot: DualPivot) -> str:
    lacking = [i for i, line in pivot.before.blocking_rows() if line[0] < 0]
    if len(lacking) == 1:
        why = "the only one that is"
    elif pivot.rule == "lowest-index":
        why = f"the lowest index of the {len(lacking)} that are"
    else:
        values = [pivot.before.values[pivot.before.slacks.names[pivot.before.basic[i]]] for i in lacking]
        tied = values.count(-pivot.short) > 1
        why = f"the lowest index of the {len(lacking)} that are the most" if tied else "more than any other"
    return f"{pivot.leaving} is short by {short(pivot.short)}, {why}, and leaves: it goes up to 0."


def _entering(pivot: DualPivot) -> str:
    able = [(ratio.name, ratio.ratio) for ratio in pivot.dual_ratios if ratio.ratio is not None]
    grows = f"enters, growing to {short(pivot.step or pivot.short)}"
    if len(able) == 1:
        return f"Only {pivot.entering} can help it, and {grows}."
    told = joined([f"{name} ({short(ratio)})" for name, ratio in able])
    equal = sum(ratio == pivot.dual_step for _, ratio in able) > 1
    index = ", of equals the lowest index" if equal else ""
    return f"Of {told} {pivot.entering} costs {_what(pivot)} the least per unit of it{index}, and {grows}."


def _what(pivot: DualPivot) -> str:
    return "the objective" if pivot.goal.weights is None else "the objective of Phase I"


def _change(pivot: DualPivot) -> str:
    if pivot.objective_before == pivot.objective_after:
        return f"The objective stays at {short(pivot.objective_before)}."
    return f"The objective goes from {short(pivot.objective_before)} to {short(pivot.objective_after)}."


def _after(pivot: DualPivot) -> str:
    if not pivot.after.feasible:
        return "Other slacks are still short: the point is outside the region."
    return "No slack is short any more: the point is inside the region."


def joined(names: list[str], most: int = 4) -> str:
    """ "a", "a and b", "a, b and c", "a, b, c, d and 3 more"."""
    shown = names if len(names) <= most + 1 else [*names[:most], f"{len(names) - most} more"]
    return " and ".join([", ".join(shown[:-1]), shown[-1]]) if len(shown) > 1 else shown[0]
