"""The tally of one walk, and the standing of one pair of rules over all its walks."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from typing import Any

from polywalk.walks.results import End
from polywalk.walks.starts import Start


@dataclass(frozen=True)
class Pair:
    """An entering rule and the leaving rule it is combined with.

    Parameters
    ----------
    rule, leaving : str
        Their names.
    given : tuple
        What ``walk`` takes as rule and leaving: the names, or a caller's own functions.
    """

    rule: str
    leaving: str
    given: tuple[Any, Any]


@dataclass(frozen=True)
class Tally:
    """What one walk came to.

    Parameters
    ----------
    pair : Pair
    start : Start
    pivots : int
        Changes of basis; the ray at the end of an unbounded walk changes none and is not counted.
    moves : int
        Pivots that change the point.
    stays : int
        Degenerate pivots: those that leave the point where it is. (In Phase I a pivot may also change the auxiliary
        alone, which is neither a move nor a stay.)
    stall : int
        The longest run of stays; of a walk that cycles, the part walked until the cycle was met.
    length : float
        Euclidean length of the way walked, in the units of the decisions, rounded: the sum of square roots is seldom
        a fraction.
    end : {"optimal", "unbounded", "infeasible", "cycling", "stopped"}
    value : Fraction or None
        The objective where it ended, constant included.
    shortest, improving : int or None
        The fewest moves any way along edges, and any strictly improving way, takes from this start; no rule takes
        fewer. None for a start outside the region.
    """

    pair: Pair
    start: Start
    pivots: int
    moves: int
    stays: int
    stall: int
    length: float
    end: End
    value: Fraction | None
    shortest: int | None
    improving: int | None

    @property
    def finished(self) -> bool:
        """Whether the walk came to an answer; it did not if it cycles or was stopped at the limit."""
        return self.end not in {"cycling", "stopped"}


@dataclass(frozen=True)
class Standing:
    """One pair over all starts.

    Parameters
    ----------
    pair : Pair
    tallies : tuple of Tally
        One a start.
    """

    pair: Pair
    tallies: tuple[Tally, ...]

    @cached_property
    def pivots(self) -> tuple[int, ...]:
        """The pivots of the walks that finished, in ascending order."""
        return tuple(sorted(tally.pivots for tally in self.tallies if tally.finished))

    @property
    def median(self) -> Fraction | None:
        """The median of the pivots; None where no walk finished."""
        count = len(self.pivots)
        return Fraction(self.pivots[(count - 1) // 2] + self.pivots[count // 2], 2) if count else None

    @property
    def mean(self) -> Fraction | None:
        """The mean of the pivots; None where no walk finished."""
        return Fraction(sum(self.pivots), len(self.pivots)) if self.pivots else None

    @property
    def worst(self) -> Tally | None:
        """The finished walk with the most pivots, of several the first."""
        return max((tally for tally in self.tallies if tally.finished), key=lambda tally: tally.pivots, default=None)

    @property
    def cycles(self) -> tuple[Start, ...]:
        """The starts from which it cycles."""
        return tuple(tally.start for tally in self.tallies if tally.end == "cycling")

    @property
    def unfinished(self) -> tuple[Start, ...]:
        """The starts from which it cycles or was stopped at the limit."""
        return tuple(tally.start for tally in self.tallies if not tally.finished)
