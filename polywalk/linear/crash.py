"""The crash phase: free decisions and equalities are pivoted out of the way before a walk starts.

1. Every equality, in the model's order: its slack leaves for good. The first free decision it depends on enters, else
   the first other slack. An equality that depends on nothing any more is redundant and dropped, or contradicts the
   ones before it.
2. Every free decision still at rest: it moves to the constraint nearest to it, in either direction (ties: the first),
   whose slack leaves. So a feasible rest stays feasible. A free decision that no constraint holds moves along a line
   of the region and stays at rest.

After that a free decision never leaves the basis and an equality's slack never enters it; its column stays, since its
multiplier is read there.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from typing import NamedTuple

from polywalk.linear.dictionary import Dictionary


class Swap(NamedTuple):
    """A pivot outside the walk.

    Parameters
    ----------
    entering, leaving : str
        The names of the slacks.
    """

    entering: str
    leaving: str


@dataclass(frozen=True)
class Crash:
    """What the crash phase leaves behind.

    Parameters
    ----------
    dictionary : Dictionary
    swaps : tuple of Swap
        Its pivots in order; none of them is counted as a pivot of a walk.
    contradiction : int or None
        The row of the equality that contradicts the others: it equals a constant other than 0.
    lines : tuple of int
        The free decisions that no constraint holds, by index; each stays nonbasic.
    """

    dictionary: Dictionary
    swaps: tuple[Swap, ...] = ()
    contradiction: int | None = None
    lines: tuple[int, ...] = ()

    def pivoted(self, row: int, column: int) -> Crash:
        """One more pivot."""
        return replace(
            self,
            dictionary=self.dictionary.pivot(row, column),
            swaps=(*self.swaps, swap(self.dictionary, row, column)),
        )


def swap(dictionary: Dictionary, row: int, column: int) -> Swap:
    """The names of what a pivot exchanges."""
    names = dictionary.slacks.names
    return Swap(names[dictionary.nonbasic[column]], names[dictionary.basic[row]])


def crash(dictionary: Dictionary) -> Crash:
    """Pivot equalities and free decisions out of the way.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.linear import crash, dictionary_of
    >>> model = pw.from_algebra(maximize="x", constraints={"mix": "x + y == 4", "cap": "x - y <= 2"})
    >>> crash(dictionary_of(model)).swaps
    (Swap(entering='x', leaving='mix'), Swap(entering='y', leaving='cap'))
    """
    done = Crash(dictionary)
    for index in [k for k in dictionary.basic if _kind(dictionary, k) == "equality"]:
        done = _settle_equality(done, index)
        if done.contradiction is not None:
            return done
    for index in range(dictionary.slacks.model.n):
        if _kind(dictionary, index) == "free" and index in done.dictionary.nonbasic:
            done = _settle_free(done, index)
    return done


def _kind(dictionary: Dictionary, index: int) -> str:
    return dictionary.slacks.items[index].kind


def _settle_equality(done: Crash, index: int) -> Crash:
    now = done.dictionary
    row = now.basic.index(index)
    line = now.rows[row]
    able = [j for j, k in enumerate(now.nonbasic) if line[j + 1] and _kind(now, k) != "equality"]
    if able:
        return done.pivoted(row, min(able, key=lambda j: (_kind(now, now.nonbasic[j]) != "free", now.nonbasic[j])))
    if line[0]:
        return replace(done, contradiction=row)
    basic, rows = now.basic[:row] + now.basic[row + 1 :], now.rows[:row] + now.rows[row + 1 :]
    return replace(done, dictionary=replace(now, basic=basic, rows=rows))


def _settle_free(done: Crash, index: int) -> Crash:
    now = done.dictionary
    column = now.nonbasic.index(index)
    able = [i for i, line in now.blocking_rows() if line[column + 1]]
    if not able:
        return replace(done, lines=(*done.lines, index))
    return done.pivoted(min(able, key=lambda i: (_distance(now, i, column), now.basic[i])), column)


def _distance(now: Dictionary, row: int, column: int) -> Fraction:
    line = now.rows[row]
    return abs(Fraction(line[0], line[column + 1]))
