"""Which variables to look at: those with the widest range among plans that are nearly as good as the best."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from math import isclose, isfinite, isnan
from time import monotonic

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError, NumberError
from polywalk.model import Model
from polywalk.narrowing.adding import sparse
from polywalk.narrowing.given import names_of
from polywalk.narrowing.solver import Solver
from polywalk.narrowing.widening import near
from polywalk.progress import progress
from polywalk.table import Shown, Table

FIRST = 4
"""Solutions to see what differs, before variables are measured one by one."""


LEAST = 3
"""Variables measured however little time there is: as many as a picture has axes."""


TIE = 1e-6
"""Widths closer than this, relative to their size, are a tie: HiGHS knows them no better."""


@dataclass(frozen=True)
class AxisRange:
    """The range of one variable among near-optimal plans, in its own unit.

    Parameters
    ----------
    variable : str
    low, high : float
        Infinite where there is no end.
    is_measured : bool
        Whether both ends were found by linear programs; else the range is at least so wide.
    """

    variable: str
    low: float
    high: float
    is_measured: bool

    @property
    def width(self) -> float:
        """How wide the range is."""
        return self.high - self.low


@dataclass(frozen=True, repr=False)
class Axes(Shown):
    """Variables ranked by their range among near-optimal plans, the widest first.

    Parameters
    ----------
    ranked : tuple of AxisRange
    within : str
        How near to the optimum.
    names : tuple of str
        The axes suggested: the first three, but for ties.
    measured : int
        How many variables were measured.
    notes : tuple of str
    """

    ranked: tuple[AxisRange, ...]
    within: str
    names: tuple[str, ...]
    measured: int
    notes: tuple[str, ...] = ()

    def table(self) -> Table:
        """The widest ranges."""
        rows = tuple(
            (one.variable, *(_text(value, one) for value in (one.low, one.high, one.width))) for one in self.ranked[:10]
        )
        notes = [f"suggested axes: {', '.join(self.names)}"]
        if self.measured < len(self.ranked):
            notes.append(f"{self.measured} of {len(self.ranked)} variables were measured; others are at least so wide")
        notes += self.notes
        title = f"ranges among plans within {self.within} of the optimum, each in its own unit, the widest first"
        return Table(title, ("variable", "least", "greatest", "range"), rows, tuple(notes))


def suggest_axes(
    big: BigModel | Model, within: object = "1%", among: Sequence[str] | None = None, seconds: float = 20.0
) -> Axes:
    """Variables of a big model worth a picture: those that plans near the optimum disagree on most.

    The measure is the width of a variable's range among all plans whose objective is within the given distance of the
    optimum, in the variable's own unit; two linear programs a variable. Where widths tie (to six digits), a note says
    so, and of those that tie a variable goes first whose stem, the text before "[", is not among the suggested yet;
    then the one furthest, in the order of the model, from those suggested.

    Parameters
    ----------
    big : BigModel or Model
    within : number or str, optional
        As in `shadow`: "1%" of the optimum, or a distance in the objective's unit.
    among : sequence of str, optional
        The variables to rank; all by default.
    seconds : float, optional
        When to stop, counted from the call, once three variables are measured. The variables that earlier solutions
        differ on most are measured first.

    Returns
    -------
    Axes

    Raises
    ------
    ModelError
        Without an objective or an optimum.
    UnknownName, NumberError
        A name that is not there, a distance that is no number.
    SolverError
        HiGHS is missing, or stopped without an answer.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import suggest_axes
    >>> from polywalk.scenarios import harbour_row
    >>> suggest_axes(BigModel.from_model(harbour_row()), within="5%").names
    ('pump', 'chips', 'tank')

    References
    ----------
    Mahadevan & Schilling, The effects of alternate optimal solutions in constraint-based genome-scale metabolic models,
    Metabolic Engineering 5, 2003 (every variable's range near the optimum).
    """
    if not isinstance(seconds, int | float) or isnan(seconds):
        raise NumberError(f"seconds: expected a number, got {seconds!r}.", seconds)
    end = monotonic() + seconds
    big = sparse(big)
    held = near(big, within)
    if held is None:
        raise ModelError("expected a model with a plan, got an infeasible one; see conflict(big).", big.name)
    names = big.variables if among is None else tuple(dict.fromkeys(names_of(among, "the variables to rank")))
    places = [big.index(name) for name in names]
    measuring = _Measuring(held, places)
    measuring.warm_up(end - seconds / 2)
    for place in progress(measuring.next_ones(end), len(places), "variables"):
        measuring.measure(place)
    ranked = sorted(measuring.ranges(), key=lambda one: -one.width)
    notes = (*_ties(ranked), *(("integer marks are relaxed",) if big.integers else ()))
    return Axes(tuple(ranked), str(within).strip(), _suggested(ranked, big.places), len(measuring.done), notes)


def _suggested(ranked: Sequence[AxisRange], places: Mapping[str, int]) -> tuple[str, ...]:
    """The first three; among those as wide as the next one, first another stem, then the furthest from those taken."""
    left, names = list(ranked), list[str]()

    def apart(one: AxisRange) -> tuple[bool, int]:
        stems = {_stem(name) for name in names}
        far = min([abs(places[one.variable] - places[name]) for name in names], default=0)
        return _stem(one.variable) not in stems, far

    while left and len(names) < LEAST:
        chosen = max([one for one in left if _as_wide(one, left[0])], key=apart)
        left.remove(chosen)
        names.append(chosen.variable)
    return tuple(names)


def _ties(ranked: Sequence[AxisRange]) -> tuple[str, ...]:
    """What to tell where the width alone does not choose the three."""
    if len(ranked) <= LEAST or not _as_wide(ranked[LEAST], ranked[LEAST - 1]):
        return ()
    tied = sum(_as_wide(one, ranked[LEAST]) for one in ranked)
    return (f"{tied} variables tie at a range of {ranked[LEAST].width:.6g}; which of them are suggested says little",)


def _as_wide(one: AxisRange, other: AxisRange) -> bool:
    return one.width == other.width or isclose(one.width, other.width, rel_tol=TIE, abs_tol=TIE)


def _stem(name: str) -> str:
    return name.partition("[")[0]


def _text(value: float, one: AxisRange) -> str:
    """The number in print; beside the ends of its range, what is rounding is 0."""
    size = max([abs(end) for end in (one.low, one.high) if isfinite(end)], default=0.0)
    return "0" if abs(value) <= TIE * max(1.0, size) else f"{value:.6g}"


class _Measuring:
    """The ranges seen so far: every solution tells a value of every variable."""

    def __init__(self, big: BigModel, places: list[int]) -> None:
        self.big, self.places = big, places
        self.solver = Solver(big)
        self.low, self.high = np.full(big.n, np.inf), np.full(big.n, -np.inf)
        self.done: set[int] = set()

    def warm_up(self, end: float) -> None:
        """A few solutions in all directions at once, to see what differs: as many as the time allows."""
        draw = np.random.default_rng(0)
        for k in range(FIRST):
            if k >= 2 and monotonic() > end:  # two at least: one alone shows no difference
                break
            self.solver.aim(self.places, draw.choice([-1.0, 1.0], len(self.places)).tolist())
            if self.solver.run() == "optimal":
                self._see()
        self.solver.aim(self.places, [0.0] * len(self.places))
        if self.solver.run() == "optimal":
            self._see()

    def next_ones(self, end: float) -> Iterable[int]:
        """The variables to measure, the widest so far first, until the time is over; a few in any case."""
        left = list(self.places)
        while left and (monotonic() < end or len(self.done) < LEAST):
            place = max(left, key=lambda j: (self.high[j] - self.low[j], -j))
            left.remove(place)
            yield place

    def measure(self, place: int) -> None:
        """Both ends of one variable's range."""
        for sign, ends in ((1.0, self.high), (-1.0, self.low)):
            self.solver.aim([place], [sign])
            status = self.solver.run()
            if status == "optimal":
                self._see()
            elif status == "unbounded":
                ends[place] = sign * np.inf
        self.solver.aim([place], [0.0])
        self.done.add(place)

    def _see(self) -> None:
        point = self.solver.point()
        np.minimum(self.low, point, out=self.low)
        np.maximum(self.high, point, out=self.high)

    def ranges(self) -> list[AxisRange]:
        """What is known, in the order of the variables."""
        return [
            AxisRange(self.big.variables[j], float(self.low[j]), float(self.high[j]), j in self.done)
            for j in self.places
        ]
