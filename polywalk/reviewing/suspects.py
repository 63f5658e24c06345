"""Which single slip would explain what is wrong: every slip of the catalogue undone, and what cures is listed."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass, field
from fractions import Fraction
from typing import Any

from polywalk.budget import Budget
from polywalk.exact import Row
from polywalk.model import Model
from polywalk.reviewing.catalogue import OBJECTIVE, Slip
from polywalk.reviewing.missing import Gap
from polywalk.reviewing.ranking import Doubts
from polywalk.reviewing.search import Found, Search
from polywalk.reviewing.symptoms import Plan, Symptom, symptom_of
from polywalk.table import Shown, Table

SHOWN = 12
"""Suspects in a printed table; ``frame()`` and ``found`` have all."""


@dataclass(frozen=True)
class Suspect:
    """One slip that would explain the symptom.

    Parameters
    ----------
    kind : str
        The slip: "flipped sense", "forgotten bound", ...
    place : str
        The constraint it is in, "objective", or what a missing constraint would have to hold back.
    typed, meant : str
        The row as it is, and as it should have been.
    model : Model
        The corrected model; where information is missing, with one value of those that would do.
    value, point : Fraction, (n,) tuple of Fraction or None
        The corrected model's optimum.
    doubts : Doubts
        Why it is not listed earlier.
    gap : Gap or None
        Where information is missing: the direction it would have to stop, and the interval of values that would.
    also : tuple of str
        Other slips that come to the same model.
    """

    kind: str
    place: str
    typed: str
    meant: str
    model: Model = field(repr=False)
    value: Fraction | None
    point: Row | None
    doubts: Doubts
    gap: Gap | None = None
    also: tuple[str, ...] = ()

    @property
    def reversible(self) -> bool:
        """Whether the slip can be undone; else information is missing."""
        return self.gap is None


@dataclass(frozen=True, repr=False)
class Suspects(Shown):
    """The suspects, the least doubtful first.

    Parameters
    ----------
    model : Model
    symptom : Symptom
    found : tuple of Suspect
    unreached : tuple of str
        Constraints (or "missing information") that the budget left unsearched.
    searched : int
        How many single slips were tried.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "x + y == 40"},
    ...                         bounds={"x": (0, 30), "y": (0, 25)})
    >>> first = pw.suspects(model, allowed=[{"x": 10, "y": 10}]).found[0]
    >>> first.kind, first.meant
    ('equality for inequality', 'x + y ≤ 40')
    """

    model: Model
    symptom: Symptom
    found: tuple[Suspect, ...]
    unreached: tuple[str, ...] = ()
    searched: int = 0

    @property
    def reversible(self) -> tuple[Suspect, ...]:
        """Those that can be undone."""
        return tuple(one for one in self.found if one.reversible)

    @property
    def missing(self) -> tuple[Suspect, ...]:
        """Those that say what information is missing."""
        return tuple(one for one in self.found if not one.reversible)

    def table(self) -> Table:
        """The first suspects."""
        return self._table(SHOWN)

    def frame(self) -> Any:
        """All suspects as a pandas DataFrame."""
        return self._table(len(self.found)).frame()

    def _table(self, count: int) -> Table:
        listed = self.found[:count]
        rows = tuple((k + 1, s.kind, s.place, s.typed, s.meant, s.value, s.point) for k, s in enumerate(listed))
        columns = ("", "slip", "where", "as typed", "as meant", "optimum", "at")
        return Table(f"symptom: {self.symptom.told()}", columns if rows else (), rows, self._notes(count))

    def _notes(self, count: int) -> tuple[str, ...]:
        notes = []
        if not self.searched and not self.unreached:
            return ("the model already does what is said: nothing to explain",)
        if len(self.found) > count:
            notes.append(f"and {len(self.found) - count} more that would cure it: .found has all")
        if not self.found and not self.unreached:
            notes.append("no single slip of the catalogue would cure it: there may be two, or one of another kind")
        if any(one.gap for one in self.found[:count]):
            notes.append("something forgotten: the optimum is for one value b out of those that would do")
        if self.unreached:
            notes.append(f"the budget ended the search; not searched: {', '.join(self.unreached)}")
        return (*notes, f"{self.searched} single slips were tried")


def suspects(
    model: Model,
    allowed: Iterable[Plan] = (),
    forbidden: Iterable[Plan] = (),
    optimum: object = None,
    symptom: str | None = None,
    *,
    budget: Budget | None = None,
    progress: Callable[[int, int], object] | None = None,
) -> Suspects:
    """Search for the single slip that would explain what is wrong with a model.

    Parameters
    ----------
    model : Model
    allowed, forbidden : list of plans, optional
        Plans that should be allowed, or should not: mappings of str to number, or (n,) sequences of numbers.
    optimum : number or plan, optional
        What the optimal value should be (within a solver's tolerance), or a plan that should be optimal.
    symptom : {"infeasible", "empty", "unbounded"}, optional
        Only to state it: by default it is what the model is.
    budget : Budget, optional
        Its seconds (default 60) end the search; what was not reached is said.
    progress : callable, optional
        Called with (done, total) after every place searched.

    Returns
    -------
    Suspects
        Every slip of the catalogue that cures all that is wrong, and leaves a model that has a plan and an optimum.

    Raises
    ------
    ModelError
        Nothing is said to be wrong, or what is said contradicts itself or the model.
    UnknownName, NumberError
        A plan with a name that is not there or an entry that is no number.

    Examples
    --------
    >>> import polywalk as pw
    >>> found = pw.suspects(pw.scenarios.harbour_row("infeasible")).found
    >>> {one.place for one in found[:5]}
    {'town contract'}

    References
    ----------
    McFadden, Conditional logit analysis of qualitative choice behavior, Frontiers in Econometrics, 1974 (how the
    weights of the ranking were fitted). The slips and the search have no published source.
    """
    seen, present = symptom_of(model, allowed, forbidden, optimum, symptom)
    if not present:
        return Suspects(model, seen, ())
    search = Search(model, seen, budget or Budget(), progress)
    found = search.run()
    ranked = sorted(found, key=lambda one: one[1].total)
    return Suspects(model, seen, tuple(_suspect(model, one) for one in ranked), search.unreached, search.ways.total())


def _suspect(model: Model, one: Found) -> Suspect:
    what, doubts, value, point, also = one
    if isinstance(what, Gap):
        extra = what.row(model, what.values.example())
        row = {name: number for name, number in zip(model.variables, extra.coefficients, strict=True) if number}
        changed = model.with_constraint(extra.name, row, extra.sense, extra.rhs, "missing information")
        held = " and ".join(row)
        return Suspect(what.kind, held, "", what.text(model), changed, value, point, doubts, what)
    changed = what.corrected(model)
    typed, meant = (_text(either, what) for either in (model, changed))
    return Suspect(what.kind, what.place, typed, meant, changed, value, point, doubts, None, also)


def _text(model: Model, slip: Slip) -> str:
    if slip.place == OBJECTIVE and slip.goal is not None:
        return model.objective.text(model.variables) if model.objective else ""
    names = [row.name for row in model.constraints]
    return model.constraint(slip.place).text(model.variables) if slip.place in names else "(lifted)"
