"""A whole walk: its pivots, how it ended, and its telling."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from typing import Literal

from polywalk.errors import WalkError
from polywalk.exact import Row, primitive
from polywalk.linear import Dictionary, Farkas, Swap
from polywalk.linear.certificates import farkas_of, impossible_row
from polywalk.linear.solve import Solved
from polywalk.model import Model
from polywalk.table import Shown, Table, cell
from polywalk.walks.pivots import Pivot

End = Literal["optimal", "unbounded", "infeasible", "cycling", "stopped"]

MOST_BASES = 12
"""So many bases of a cycle are named below the table of a walk."""


@dataclass(frozen=True, repr=False)
class Walk(Shown):
    """The pivots of one rule from one start.

    Parameters
    ----------
    model : Model
    rule, leaving : str
        The names of the entering and the leaving rule.
    order : tuple of str
        The index order, lowest first.
    crash : tuple of Swap
        The pivots that took free decisions and equalities out of the way and led to the start; not counted.
    first : Dictionary
        Where the walk starts.
    pivots : tuple of Pivot
    end : {"optimal", "unbounded", "infeasible", "cycling", "stopped"}
    cycle : tuple of Pivot
        The pivots of one round, where the walk came back to a dictionary it had met; else empty.

    Examples
    --------
    >>> import polywalk as pw
    >>> walk = pw.walk(pw.scenarios.harbour_row(), rule="bland")
    >>> walk.end, len(walk.pivots), int(walk.value)
    ('optimal', 6, 292)

    References
    ----------
    See `walk`.
    """

    model: Model
    rule: str
    leaving: str
    order: tuple[str, ...]
    crash: tuple[Swap, ...]
    first: Dictionary
    pivots: tuple[Pivot, ...]
    end: End
    cycle: tuple[Pivot, ...] = ()

    @property
    def last(self) -> Dictionary:
        """The dictionary the walk ended in."""
        return self.pivots[-1].after if self.pivots else self.first

    @property
    def start(self) -> Row:
        """The point it starts from; in Phase I one outside the region."""
        return self.first.point

    @property
    def point(self) -> Row | None:
        """The point it ended at; None where the model is infeasible."""
        return None if self.end == "infeasible" else self.last.point

    @property
    def value(self) -> Fraction | None:
        """The objective at that point, constant included; None where the model is infeasible."""
        return None if self.end == "infeasible" else self.last.objective

    @cached_property
    def points(self) -> tuple[Row, ...]:
        """The start and the point after each pivot; a degenerate pivot repeats its point."""
        return (self.start, *(pivot.point_after for pivot in self.pivots))

    @property
    def constraint_of(self) -> dict[str, str]:
        """The constraint each slack belongs to, by the slack's name; free decisions and the auxiliary have none."""
        slacks = self.first.slacks
        return {slacks.names[index]: name for name, index in slacks.of_constraint.items()}

    @property
    def ray(self) -> Row | None:
        """The direction, in the smallest integers, along which an unbounded model improves for ever."""
        return primitive(self.pivots[-1].direction) if self.end == "unbounded" else None

    @cached_property
    def infeasibility(self) -> Farkas | None:
        """The proof that no point satisfies the model, where the walk ended "infeasible"; else None."""
        if self.end != "infeasible":
            return None
        return farkas_of(Solved("infeasible", self.last, impossible_row(self.last)))

    @property
    def stays(self) -> int:
        """The number of degenerate pivots: those that change the basis and not the point."""
        return sum(pivot.kind == "degenerate" for pivot in self.pivots)

    @property
    def cycle_bases(self) -> tuple[tuple[str, ...], ...]:
        """The bases of one round, each by the slacks it holds at 0; empty where the walk does not cycle."""
        return tuple(pivot.active_before for pivot in self.cycle)

    def explain(self, number: int) -> str:
        """A pivot, counted from 1, in a few plain sentences; raises WalkError where there is no such pivot."""
        if not 1 <= number <= len(self.pivots):
            raise WalkError(f"expected the number of a pivot, 1 to {len(self.pivots)}, got {number}.", culprit=number)
        return self.pivots[number - 1].story()

    def table(self) -> Table:
        """The pivots, one row each."""
        columns = ("pivot", "phase", "entering", "leaving", "step", "kind", "objective", "point")
        rows = tuple(
            (p.number, _part(p), p.entering, p.leaving, p.step, p.kind, p.objective_after, p.point_after)
            for p in self.pivots
        )
        return Table(self._title(), columns, rows, self._notes())

    def _title(self) -> str:
        counted = [pivot for pivot in self.pivots if pivot.kind != "ray"]
        plural = "" if len(counted) == 1 else "s"
        end = "infeasible" if self.end == "infeasible" else f"{self.end} at {cell(self.point)}"
        return (
            f"{self.rule} from {cell(self.start)}: {end} after {len(counted)} pivot{plural} "
            f"({self.stays} of them degenerate)"
        )

    def _notes(self) -> tuple[str, ...]:
        notes = []
        if self.crash:
            swaps = ", ".join(f"{swap.entering} for {swap.leaving}" for swap in self.crash)
            notes.append(f"pivoted before the walk, not counted: {swaps}")
        if self.ray is not None:
            notes.append(f"unbounded along {cell(self.ray)}")
        if self.cycle:
            first, last = self.cycle[0].number, self.cycle[-1].number
            rounds = f"cycling: pivots {first} to {last} lead back to where pivot {first} started, for ever"
            held = "; ".join(", ".join(names) for names in self.cycle_bases[:MOST_BASES])
            more = f"; and {len(self.cycle) - MOST_BASES} more" if len(self.cycle) > MOST_BASES else ""
            notes.append(f"{rounds}: {len(self.cycle)} bases at {cell(self.point)}, which hold {held}{more}")
        if self.end == "stopped":
            notes.append("stopped at the limit; ask for more with limit=...")
        if self.model.integers:
            notes.append(f"walked as the relaxation: {', '.join(self.model.integers)} marked integer")
        return tuple(notes)


def _part(pivot: Pivot) -> object:
    """The part of the walk a pivot belongs to: phase 1 or 2, and whether it is a dual pivot."""
    if not pivot.dual:
        return pivot.phase
    return "1, dual" if pivot.phase == 1 else "dual"
