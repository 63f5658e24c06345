"""A comparison of pivot rules: one tally a walk, one standing a rule, and what follows from them."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property

from polywalk.errors import unknown
from polywalk.model import Model
from polywalk.table import Shown, Table, cell
from polywalk.walks.advice import advice
from polywalk.walks.results import Walk
from polywalk.walks.standings import Pair, Standing, Tally
from polywalk.walks.starts import Start
from polywalk.walks.trace import walk

WALK_COLUMNS = (
    *("rule", "leaving", "start", "pivots", "moves", "stays", "longest stall", "path length", "end", "value"),
    *("shortest path", "shortest improving path"),
)

PAIR_COLUMNS = (
    *("rule", "leaving", "walks", "fewest pivots", "median", "mean", "most", "worst start", "longest stall"),
    *("cycles from", "stopped from"),
)


@dataclass(frozen=True, repr=False)
class Comparison(Shown):
    """Pivot rules side by side.

    ``print`` shows one row a walk for a single start, else one row a pair; ``table()`` and ``frame()`` always have one
    row a walk, ``standings_table()`` one a pair.

    Parameters
    ----------
    model : Model
    tallies : tuple of Tally
        Start by start, and for each start pair by pair.
    starts : tuple of Start
        All that were asked for.
    pairs : tuple of Pair
    order : tuple of str
        The index order, lowest first.
    seed, limit : int
    complete : bool
        False where it was interrupted; the finished walks are all there.
    """

    model: Model
    tallies: tuple[Tally, ...]
    starts: tuple[Start, ...]
    pairs: tuple[Pair, ...]
    order: tuple[str, ...]
    seed: int
    limit: int
    complete: bool = True

    @cached_property
    def standings(self) -> tuple[Standing, ...]:
        """One a pair, over the starts that every pair has walked from."""
        count, whole = len(self.pairs), len(self.tallies) // len(self.pairs)
        return tuple(
            Standing(pair, self.tallies[k : whole * count : count]) for k, pair in enumerate(self.pairs) if whole
        )

    @cached_property
    def recommendation(self) -> str:
        """Which pair to trust on this model, in a plain sentence.

        Pairs that finish from more starts come first; of those the ones with the lower worst case, then with the lower
        mean number of pivots. Pairs that are equal in all three are named together.
        """
        return advice(self.standings)

    def walks(self, start: str | None = None) -> tuple[Walk, ...]:
        """The walks of all pairs from one start, in full, to be explained or drawn.

        Parameters
        ----------
        start : str, optional
            The name of a start; by default the first.

        Raises
        ------
        UnknownName
            No start is called that.
        """
        names = {one.name: one for one in self.starts}
        if start is not None and start not in names:
            raise unknown("start", start, names, "the comparison")
        given = (self.starts[0] if start is None else names[start]).given
        made = {"order": self.order, "start": given, "seed": self.seed, "limit": self.limit}
        return tuple(walk(self.model, *pair.given, **made) for pair in self.pairs)  # type: ignore[arg-type]

    def table(self) -> Table:
        """One row a walk."""
        return Table(self._title(), WALK_COLUMNS, tuple(_row(tally) for tally in self.tallies), self._notes())

    def standings_table(self) -> Table:
        """One row a pair: how its pivots are distributed over the starts."""
        rows = tuple(_standing_row(standing) for standing in self.standings)
        return Table(self._title(), PAIR_COLUMNS, rows, self._notes())

    def _shown(self) -> Table:
        return self.table() if len(self.starts) == 1 else self.standings_table()

    def __str__(self) -> str:
        return str(self._shown())

    __repr__ = __str__

    def _repr_html_(self) -> str:
        return self._shown()._repr_html_()

    def _title(self) -> str:
        pairs = _count(len(self.pairs), "rule" if len({pair.leaving for pair in self.pairs}) == 1 else "pair of rules")
        ends = sorted({(tally.end, tally.value) for tally in self.tallies if tally.end == "optimal"})
        found = f": optimum {cell(ends[0][1])}" if ends else ""
        where = f"from {self.starts[0].name}" if len(self.starts) == 1 else f"from {len(self.starts)} starts"
        return f"{pairs} {where}{found}"

    def _notes(self) -> tuple[str, ...]:
        notes = []
        if not self.complete:
            asked = len(self.starts) * len(self.pairs)
            notes.append(
                f"interrupted: {len(self.tallies)} of {asked} walks are finished; the standings and the recommendation "
                f"count the {len(self.tallies) // len(self.pairs)} starts that every rule has walked from"
            )
        notes += self._yardsticks()
        if self.model.integers:
            notes.append(f"walked as the relaxation: {', '.join(self.model.integers)} marked integer")
        return (*notes, self.recommendation)

    def _yardsticks(self) -> list[str]:
        """The shortest paths in words; a start outside the region has none."""
        known = {(tally.start, tally.shortest, tally.improving) for tally in self.tallies}
        shortest = [least for _, least, _ in known if least is not None]
        improving = [least for _, _, least in known if least is not None]
        if not shortest:
            return []
        text = f"no rule can beat: {_range(shortest)} along edges, {_range(improving)} along improving edges"
        return [text + ("" if len(self.starts) == 1 else ", by start")]


def _row(tally: Tally) -> tuple[object, ...]:
    counts = (tally.pivots, tally.moves, tally.stays, tally.stall, Fraction(f"{tally.length:.6g}"))
    ends = (tally.end, tally.value, tally.shortest, tally.improving)
    return (tally.pair.rule, tally.pair.leaving, tally.start.name, *counts, *ends)


def _standing_row(standing: Standing) -> tuple[object, ...]:
    pivots, worst = standing.pivots, standing.worst
    stall = max((tally.stall for tally in standing.tallies), default=0)
    spread = (pivots[0] if pivots else None, standing.median, standing.mean, pivots[-1] if pivots else None)
    stopped = len(standing.unfinished) - len(standing.cycles)
    told = (worst.start.name if worst else None, stall, len(standing.cycles), stopped)
    return (standing.pair.rule, standing.pair.leaving, len(standing.tallies), *spread, *told)


def _range(numbers: list[int]) -> str:
    low, high = min(numbers), max(numbers)
    return _count(high, "move") if low == high else f"{low} to {high} moves"


def _count(number: int, word: str) -> str:
    head, _, tail = word.partition(" ")
    many = f"{head}s {tail}".strip()
    return f"{number} {word if number == 1 else many}"
