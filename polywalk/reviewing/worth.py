"""Sensitivity told: tables of prices and costs, and the plain sentences beside them."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from typing import TYPE_CHECKING

from polywalk.reviewing.best import BestPoint
from polywalk.reviewing.extended import shown, told
from polywalk.reviewing.telling import listed
from polywalk.table import Table, cell

if TYPE_CHECKING:
    from polywalk.reviewing.sensitivity import Sensitivity

SIGN = (
    "a price is the change of the optimal value, in the objective's own sense, per unit of right-hand side: the left "
    "one for a smaller right-hand side, the right one for a larger"
)
ENDLESS = "∞ or -∞: any step to that side leaves no feasible plan"


def tables(found: Sensitivity) -> tuple[Table, ...]:
    """Prices, then costs; where there is no optimum one table that says why."""
    if found.outcome != "optimal":
        return (_nothing(found),)
    return _prices(found), _costs(found)


def _nothing(found: Sensitivity) -> Table:
    if found.outcome == "no objective":
        return Table("no prices: the model has no objective, so nothing has a value; give it one", (), ())
    proof = found.proof.table() if found.proof else None
    title = f"no prices: the model is {found.outcome}, so it has no optimum"
    return Table(title, proof.columns, proof.rows, (proof.title,)) if proof else Table(title, (), ())


def _prices(found: Sensitivity) -> Table:
    rows = tuple(
        (price.constraint, price.rhs, *map(shown, (price.left, price.low, price.right, price.high)))
        for price in found.prices
    )
    columns = ("constraint", "right-hand side", "left price", "down to", "right price", "up to")
    endless = any(not isinstance(end, Fraction) for price in found.prices for end in (price.left, price.right))
    marked = found.model.integers
    relaxed = [f"integer marks are not applied here: {listed(marked)} may take any value between"] if marked else []
    notes = (SIGN, *([ENDLESS] if endless else []), *found.why, *relaxed)
    return Table(f"optimal value {told(found.value or Fraction(0))} at {where(found)}", columns, rows, notes)


def where(found: Sensitivity) -> str:
    """The optimal points, named."""
    places = listed(f"{corner.name} {cell(corner.point)}" for corner in found.best)
    ways = "".join(f", on along {cell(way)}" for way in found.directions)
    return f"{places}{' and every mix of them' if len(found.best) > 1 else ''}{ways}"


def _costs(found: Sensitivity) -> Table:
    reduced = {item.variable: item for item in found.reduced_costs}
    rows = []
    for corner in found.best:
        for j, item in enumerate(found.cost_ranges[corner.name]):
            ends = reduced[item.variable]
            worth = shown(ends.low) if ends.low == ends.high else f"{told(ends.low)} to {told(ends.high)}"
            rows.append(
                (corner.name, item.variable, corner.point[j], worth, item.cost, shown(item.low), shown(item.high))
            )
    columns = ("vertex", "variable", "value", "reduced cost", "cost", "vertex stays optimal from", "to")
    notes = ("a reduced cost is what is left of a cost after the prices of all rows but the variable's own bounds",)
    return Table("costs", columns, tuple(rows), notes)


def why(found: Sensitivity) -> tuple[str, ...]:
    """Why solvers may disagree and all be right; nothing where they cannot."""
    return tuple(_why(found)) if found.outcome == "optimal" else ()


def _why(found: Sensitivity) -> Iterator[str]:
    if found.tied:
        names = listed(corner.name for corner in found.best)
        many = len(found.best) > 1
        yield (
            f"the optimum is tied: {names}{' and every mix of them are' if many else ' and more points beyond it are'} "
            "equally good, so that solvers may stop at different points; the prices are those of all of them"
        )
    if not found.unique_prices:
        moot = [price.constraint for price in found.prices if not price.unique]
        yield (
            f"the prices of {listed(moot)} are not unique: {meeting(found)}; a solver reports those of the basis it "
            "ends with, which may be the left ones, the right ones or others between"
        )


def meeting(found: Sensitivity) -> str:
    """The reason in one phrase."""
    corner = next((corner for corner in found.best if corner.degenerate), None)
    if corner is None:
        return "the constraints that are active at every optimal point depend on each other"
    return f"at {corner.name} {_count(corner)} would do"


def _count(corner: BestPoint) -> str:
    return f"{len(corner.active)} constraints meet ({listed(corner.active)}) where {len(corner.point)}"
