"""Phase I: an auxiliary variable is added to every basic slack, enters at once, and is driven to zero.

It enters for the slack that is short by the most, which makes every slack feasible; it leaves on every tie as soon as
it reaches 0, and its column is dropped. Where it cannot reach 0 the model is infeasible.

References
----------
Chvátal, Linear Programming, 1983, chapter 3.
"""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction

from polywalk.linear.dictionary import Dictionary
from polywalk.linear.slacks import Integers


def relaxed(now: Dictionary) -> Dictionary:
    """With the auxiliary variable as the last column: each basic slack may be short by as much as it."""
    items = now.slacks
    rows = tuple(
        (*line, items.scales[k] * now.denominator if items.pivots[k] else 0)
        for k, line in zip(now.basic, now.rows, strict=True)
    )
    eased = tuple(k for k in now.basic if items.pivots[k])
    nonbasic, cost = (*now.nonbasic, items.auxiliary), (*now.cost, 0)
    return replace(now, nonbasic=nonbasic, rows=rows, cost=cost, relaxed_slacks=eased)


def most_violated(now: Dictionary) -> list[int]:
    """The rows whose slack, as typed, is the most negative (several when tied): one makes room for the auxiliary."""
    scales = now.slacks.scales
    values = {i: Fraction(line[0], scales[now.basic[i]]) for i, line in now.blocking_rows()}
    worst = min(values.values())
    return [i for i, value in values.items() if value == worst]


def step(now: Dictionary, row: int, column: int) -> Dictionary:
    """One pivot; the auxiliary's column is dropped when it leaves, and Phase I is over."""
    after = now.pivot(row, column)
    return _without(after, column) if now.basic[row] == now.slacks.auxiliary else after


def _without(now: Dictionary, column: int) -> Dictionary:
    def cut(line: Integers) -> Integers:
        return line[: column + 1] + line[column + 2 :]

    nonbasic = now.nonbasic[:column] + now.nonbasic[column + 1 :]
    rows = tuple(cut(line) for line in now.rows)
    return replace(now, nonbasic=nonbasic, rows=rows, cost=cut(now.cost), relaxed_slacks=())
