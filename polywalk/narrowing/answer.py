"""The answer to a plan put to a big model: a plan with these values, or what stops them and what would have to give."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from fractions import Fraction
from typing import Literal

from polywalk.exact import short
from polywalk.model import Constraint, Model
from polywalk.narrowing.tolerances import TOLERANCES
from polywalk.table import Shown, Table

SHOWN = 20
"""Values, or constraints, that a table names before it only counts."""

Verdict = Literal["possible", "possible within solver tolerance", "impossible"]
Named = tuple[tuple[str, Fraction], ...]
Range = tuple[str, Fraction | None, Fraction | None]


@dataclass(frozen=True, repr=False)
class Completion(Shown):
    """Whether values of some variables, or of all, can be part of a plan of a big model.

    Parameters
    ----------
    plan : tuple of (str, Fraction)
        What was asked, in the order of the model's variables.
    verdict : {"possible", "possible within solver tolerance", "impossible"}
        The first and the last are proved in fractions, except where a note says otherwise.
    values : tuple of (str, Fraction)
        A whole plan with these values: first those asked, then the variables that share a row with them; () where it
        is impossible.
    beside : int
        How many of ``values`` are asked or share a row with what was asked.
    conflict : Model or None
        What stops it: constraints of the big model and of the plan ("x as planned") that contradict each other, none
        of them to spare. For a whole plan: the constraints it breaks, at most 20, the worst first.
    violated : tuple of (str, Fraction)
        For a whole plan: all constraints that fail, each with the shortfall, the worst first.
    relaxed : tuple of (str, Fraction)
        The right-hand side at which each constraint of the conflict would end it, the others unchanged.
    nearest : tuple of (str, Fraction)
        Values for what was asked that are possible and change it least in total; () where the plan is possible, or
        nothing is.
    is_nearest_proved : bool
        Whether these values are proved in fractions; else they are HiGHS's.
    limits : tuple of (str, Fraction or None, Fraction or None)
        Where one variable was asked and is impossible: the range it can have; () otherwise.
    is_whole : bool
        Whether every variable was asked.
    objective : Fraction or None
        The objective's value at ``values``, which no plan with what was asked betters (so says HiGHS).
    optimum : Fraction or None
        The best value of any plan; None where there is none.
    notes : tuple of str

    Examples
    --------
    >>> import polywalk as pw
    >>> big = pw.BigModel.from_model(pw.scenarios.harbour_row())
    >>> print(pw.completion(big, {"pump": 4, "chips": 4}))
    pump = 4, chips = 4: possible, at best so
    variable  value
    pump      4
    chips     4
    tank      4
    objective 292 at best: as good as any plan
    """

    plan: Named
    verdict: Verdict
    values: Named = ()
    beside: int = 0
    conflict: Model | None = None
    violated: Named = ()
    relaxed: Named = ()
    nearest: Named = ()
    is_nearest_proved: bool = True
    limits: tuple[Range, ...] = ()
    is_whole: bool = False
    objective: Fraction | None = None
    optimum: Fraction | None = None
    notes: tuple[str, ...] = ()

    @property
    def allowed(self) -> bool:
        """Whether the plan is allowed, exactly, or can be completed to one that is."""
        return self.verdict == "possible"

    @property
    def partial(self) -> bool:
        """Whether some variable was left open."""
        return not self.is_whole

    def table(self) -> Table:
        """The completion, or what stops it."""
        if self.conflict is None:
            return self._possible()
        model, missed, ends = self.conflict, dict(self.violated), dict(self.relaxed)
        rows: list[tuple[object, ...]] = []
        for row in model.constraints[:SHOWN]:
            last = missed[row.name] if missed else _end(row, ends.get(row.name))
            rows.append((row.name, row.text(model.variables), last))
        columns = ("constraint", "rule", "missed by" if missed else "the conflict ends at")
        return Table(f"{self._told()}: {self.verdict}", columns, tuple(rows), (*self._numbers(len(rows)), *self.notes))

    def _possible(self) -> Table:
        shown = min(self.beside, SHOWN)
        rest = len(self.values) - shown
        more = (f"and {rest:,} more {'variable' if rest == 1 else 'variables'}, see .values",) if rest else ()
        how = ", for example so" if self.objective is None else ", at best so"
        title = f"{self._told()}: {self.verdict}{how if self.partial else ''}"
        return Table(title, ("variable", "value"), self.values[:shown], (*more, *self._worth(), *self.notes))

    def _worth(self) -> Iterator[str]:
        if self.objective is None:
            return
        told = f"objective {short(self.objective)}{' at best' if self.partial else ''}"
        if self.optimum is None:
            yield told
            return
        gap = abs(self.objective - self.optimum)
        if gap <= TOLERANCES.snap * abs(self.optimum):
            yield f"{told}: as good as any plan"
            return
        share = f" ({float(100 * gap / abs(self.optimum)):.2g} %)" if self.optimum else ""
        yield f"{told}: {short(gap)}{share} from the optimum {short(self.optimum)}"

    def _told(self) -> str:
        told = ", ".join(_set(name, value) for name, value in self.plan[:SHOWN])
        return f"{told} and {len(self.plan) - SHOWN:,} more" if len(self.plan) > SHOWN else told

    def _numbers(self, shown: int) -> Iterator[str]:
        if len(self.violated) > shown:
            yield f"and {len(self.violated) - shown:,} more constraints are missed, see .violated"
        for name, low, high in self.limits:
            if low is not None and high is not None:
                yield f"{name} can be from {short(low)} to {short(high)}"
            else:
                yield from (f"{name} can be at least {short(end)}" for end in (low,) if end is not None)
                yield from (f"{name} can be at most {short(end)}" for end in (high,) if end is not None)
        asked = dict(self.plan)
        moved = [_set(name, value) for name, value in self.nearest if value != asked[name]]
        if moved and not self.limits:
            rest = f" and {len(moved) - SHOWN:,} more" if len(moved) > SHOWN else ""
            how = "" if self.is_nearest_proved else " (by HiGHS, not proved)"
            yield f"possible with the least change in total{how}: {', '.join(moved[:SHOWN])}{rest}"


def _set(name: str, value: Fraction) -> str:
    text = short(value)
    return f"{name} ≈ {text[1:]}" if text.startswith("≈") else f"{name} = {text}"


def _end(row: Constraint, rhs: Fraction | None) -> str:
    """The right-hand side that ends the conflict, and the way there: "≤ 4" means at most so much."""
    if rhs is None:
        return ""
    return f"{'≥' if rhs > row.rhs else '≤'} {short(rhs).replace('≈', 'about ')}"
