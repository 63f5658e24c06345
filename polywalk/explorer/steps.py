"""A walk told pivot by pivot, as HTML: what enters, what each slack does, and which one binds first."""

from __future__ import annotations

from html import escape

from polywalk.explorer.texts import count, grid, number, point
from polywalk.table import Table
from polywalk.walks import Pivot, Walk

END = {
    "optimal": "ends at an optimum",
    "unbounded": "ends on a ray: the objective improves without end",
    "infeasible": "ends in Phase I: no plan satisfies every constraint",
    "cycling": "cycles: its whole state came back",
    "stopped": "was stopped at its limit of pivots",
}


def summary(walks: tuple[Walk, ...], refusal: str) -> str:
    """One line a walk: rule, number of pivots, end."""
    if refusal:
        return f"<p>No walk: {escape(refusal)}</p>"
    return "".join(f"<p>{_line(walk)}</p>" for walk in walks)


def _line(walk: Walk) -> str:
    counted = sum(pivot.kind != "ray" for pivot in walk.pivots)
    still = f", {walk.stays} of them without moving" if walk.stays else ""
    value = f" with objective {number(walk.value)}" if walk.end == "optimal" and walk.value is not None else ""
    return f"<b>{escape(walk.rule)}</b>: {count(counted, 'pivot')}{still}; {END[walk.end]}{value}."


def pivots(walk: Walk | None) -> Table:
    """The start and every pivot as rows."""
    columns = ("pivot", "enters", "leaves", "step length", "objective", "")
    if walk is None:
        return Table("pivots", columns, ())
    first = ("start", "", "", None, walk.pivots[0].objective_before if walk.pivots else walk.value, "")
    return Table("pivots", columns, (first, *(_row(pivot) for pivot in walk.pivots)))


def _row(pivot: Pivot) -> tuple[object, ...]:
    marks = ["Phase I"] * (pivot.phase == 1) + {"degenerate": ["stays"], "ray": ["ray"]}.get(pivot.kind, [])
    leaves = pivot.leaving or "nothing"
    return (str(pivot.number), pivot.entering, leaves, pivot.step, pivot.objective_after, ", ".join(marks))


def story(walk: Walk | None, step: int | None) -> str:
    """The current pivot's choice and ratio test in the model's terms."""
    if walk is None:
        return ""
    if step is None or not walk.pivots:
        return "<p>The whole walk is drawn. Pick a pivot, or press Step on.</p>"
    if step == 0:
        return f"<h3>Start</h3><p>The walk starts at {point(walk.points[0])}.</p>"
    return _pivot(walk, walk.pivots[step - 1])


def _pivot(walk: Walk, pivot: Pivot) -> str:
    phase = ", Phase I" if pivot.phase == 1 else ""
    title = f"<h3>Pivot {pivot.number} of {len(walk.pivots)}{phase}</h3>"
    return f"{title}<p>{escape(pivot.story())}</p>{_along(walk, pivot)}{_ratios(walk, pivot)}"


def _along(walk: Walk, pivot: Pivot) -> str:
    """How the decisions move while the entering slack grows."""
    pairs = zip(walk.model.variables, pivot.direction, strict=True)
    moves = [f"{escape(name)} by {number(change)}" for name, change in pairs if change]
    return f"<p>Each unit of <b>{escape(pivot.entering)}</b> moves {', '.join(moves)}.</p>" if moves else ""


def _ratios(walk: Walk, pivot: Pivot) -> str:
    """The ratio test: what holds the step back, and when."""
    columns = ("slack of", "rule", "now", "rate", "binds at step", "")
    lines = [
        (
            f"<b>{escape(ratio.name)}</b>" if ratio.leaves else escape(ratio.name),
            escape(_rule(walk, ratio.name)),
            number(ratio.slack),
            number(ratio.rate),
            "never" if ratio.ratio is None else number(ratio.ratio),
            "leaves" if ratio.leaves else "",
        )
        for ratio in pivot.ratios
    ]
    return grid(columns, lines, numbers={2, 3, 4})


def _rule(walk: Walk, name: str) -> str:
    """The constraint behind a slack, as people write it; the auxiliary has none."""
    constraint = walk.constraint_of.get(name)
    return "" if constraint is None else walk.model.constraint(constraint).text(walk.model.variables)
