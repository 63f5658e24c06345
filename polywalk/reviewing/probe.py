"""Is this plan allowed? If not, what is in the way, by how much, and what would be nearest?"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from fractions import Fraction
from math import sqrt
from typing import Literal, overload

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError
from polywalk.exact import Row, dot, exact, rounded
from polywalk.linear import Farkas, farkas, optimum
from polywalk.model import Model
from polywalk.narrowing import Completion, completion
from polywalk.reviewing.nearest import Nearest, nearest, nearest_max
from polywalk.reviewing.tolerances import TOLERANCES, within
from polywalk.table import Shown, Table, cell

Verdict = Literal["inside", "boundary", "within solver tolerance", "outside"]


@dataclass(frozen=True, repr=False)
class Probe(Shown):
    """What a model says to a plan.

    Parameters
    ----------
    model : Model
    plan : tuple of (str, Fraction)
        The values asked about, in the model's order; all variables or some.
    verdict : {"inside", "boundary", "within solver tolerance", "outside"}
        Of a whole plan as it is. Of a part: "outside" where nothing completes it, else what its completion is.
        A plan that violates something by no more than a solver's tolerance is "within solver tolerance", no more.
    point : (n,) tuple of Fraction or None
        The whole plan, or a completion of a part; None where there is none.
    active : tuple of str
        The constraints that hold with equality at the point.
    violated : tuple of (str, Fraction)
        The constraints that fail at the point, each with the shortfall.
    conflict : Farkas or None
        Where a part cannot be completed: the proof, in the model with the part put in for its variables.
    nearest : Nearest or None
        The allowed point at the least Euclidean distance from a whole plan; None where no plan is allowed.
    nearest_max : (point, deviation) or None
        An allowed point whose largest deviation in one variable is the least.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(constraints={"labour": "x + y <= 4"}, bounds={"x": (0, None), "y": (0, None)})
    >>> print(pw.probe(model, {"x": 4, "y": 2}))
    (4, 2) is outside: labour is missed by 2
    constraint  rule       at the plan  slack
    labour      x + y ≤ 4  6            -2
    x lower     x ≥ 0      4            4
    y lower     y ≥ 0      2            2
    nearest allowed: (3, 1), at a distance of 1.41421; held back by labour
    least change in any one variable: 1, for example (3, 1)
    """

    model: Model
    plan: tuple[tuple[str, Fraction], ...]
    verdict: Verdict
    point: Row | None
    active: tuple[str, ...] = ()
    violated: tuple[tuple[str, Fraction], ...] = ()
    conflict: Farkas | None = None
    nearest: Nearest | None = None
    nearest_max: tuple[Row, Fraction] | None = None

    @property
    def partial(self) -> bool:
        """Whether some variable was left open."""
        return len(self.plan) < self.model.n

    @property
    def allowed(self) -> bool:
        """Whether the plan is allowed, exactly, or can be completed to one that is."""
        return self.verdict in {"inside", "boundary"}

    def table(self) -> Table:
        """Every constraint at the plan, or the conflict that forbids a part."""
        if self.point is None:
            assert self.conflict is not None
            total = cell(self.conflict.total)
            title = f"nothing completes {self._told()}: put into these, multiplied and added, it says 0 ≤ {total}"
            weights = self.conflict.multipliers
            rules = tuple((k, w, self.model.constraint(k).text(self.model.variables)) for k, w in weights.items())
            return Table(title, ("constraint", "multiplier", "rule"), rules)
        point = self.point
        rows = tuple(
            (row.name, row.text(self.model.variables), dot(row.coefficients, point), row.slack(point))
            for row in self.model.constraints
        )
        return Table(self._title(), ("constraint", "rule", "at the plan", "slack"), rows, self._notes())

    def _told(self) -> str:
        return ", ".join(f"{name} = {cell(value)}" for name, value in self.plan)

    def _title(self) -> str:
        shown = cell(self.point)
        if self.partial:
            return f"{self._told()} can be completed, for example to {shown}, which is {self._standing()}"
        return f"{shown} is {self._standing()}"

    def _standing(self) -> str:
        if self.violated:
            missed = ", ".join(f"{name} is missed by {cell(short)}" for name, short in self.violated)
            return f"{self.verdict}: {missed}"
        return f"on the boundary: {', '.join(self.active)} active" if self.active else "inside"

    def _notes(self) -> tuple[str, ...]:
        if not self.violated:
            return ()
        if self.nearest is None or self.nearest_max is None:
            return ("no plan at all is allowed: farkas(model) proves it",)
        held = ", ".join(name for name, _ in self.nearest.multipliers)
        distance = rounded(Fraction(sqrt(self.nearest.distance_squared)))
        point, most = self.nearest_max
        return (
            f"nearest allowed: {cell(self.nearest.point)}, at a distance of {distance}; held back by {held}",
            f"least change in any one variable: {cell(most)}, for example {cell(point)}",
        )


@overload
def probe(model: Model, plan: Mapping[str, object] | Iterable[object]) -> Probe: ...


@overload
def probe(model: BigModel, plan: Mapping[str, object] | Iterable[object]) -> Completion: ...


def probe(model: Model | BigModel, plan: Mapping[str, object] | Iterable[object]) -> Probe | Completion:
    """Whether a plan is allowed, and if not, what is in the way and which allowed plan is nearest.

    Parameters
    ----------
    model : Model or BigModel
        Integer marks are not applied.
    plan : mapping of str to number, or (n,) sequence of numbers
        A mapping may leave variables open.

    Returns
    -------
    Probe or Completion
        Of a big model the answer of `completion`: a whole plan with these values; or a small conflict of the model's
        constraints with the plan, proved exactly, with the right-hand sides at which it ends, and the nearest values
        that are possible. Both tell ``allowed``, ``verdict``, ``violated`` and ``partial``.

    Raises
    ------
    UnknownName, ModelError, NumberError
        A name that is not there, an entry that is no number, a sequence of the wrong length, no entry at all.
    SolverError
        Of a big model: HiGHS is missing, or stopped without an answer.

    Examples
    --------
    >>> import polywalk as pw
    >>> pw.probe(pw.scenarios.harbour_row(), {"pump": 5, "chips": 0}).verdict
    'outside'
    >>> print(pw.probe(pw.scenarios.harbour_day(), {"pump[7]": "4.5"}))
    pump[7] = 4.5: impossible
    constraint          rule               the conflict ends at
    grid connection[7]  0.474 pump[7] ≤ 2  ≥ 2.133
    pump[7] as planned  pump[7] = 4.5      ≤ 1000/237
    pump[7] can be from 0 to 1000/237

    References
    ----------
    Kuhn & Tucker, Nonlinear programming, 1951 (the nearest plan is proved by their conditions); Goldfarb & Idnani, A
    numerically stable dual method for solving strictly convex quadratic programs, Math. Program. 27, 1983.
    """
    if isinstance(model, BigModel):
        return completion(model, plan)
    if isinstance(plan, str) or not isinstance(plan, Mapping | Iterable):
        raise ModelError(f"expected a plan as names and values or a list of values, got {plan!r}.", plan)
    if isinstance(plan, Mapping) and not set(model.variables) <= set(plan):
        return _part(model, _entries(model, plan))
    return _whole(model, model.point(plan))


def _entries(model: Model, plan: Mapping[str, object]) -> tuple[tuple[str, Fraction], ...]:
    for name in plan:
        model.index(name)
    if not plan:
        raise ModelError("expected a value for at least one variable, got an empty plan.", plan)
    return tuple((name, exact(plan[name])) for name in model.variables if name in plan)


def _whole(model: Model, point: Row) -> Probe:
    named = tuple(zip(model.variables, point, strict=True))
    active = tuple(row.name for row in model.constraints if not row.is_constant and row.slack(point) == 0)
    failing = [row for row in model.constraints if not row.holds(point)]
    violated = tuple((row.name, abs(row.slack(point))) for row in failing)
    if not violated:
        return Probe(model, named, "boundary" if active else "inside", point, active)
    close = all(within(row.slack(point), row.rhs, TOLERANCES.feasibility) for row in failing)
    verdict: Verdict = "within solver tolerance" if close else "outside"
    near, most = nearest(model, point), nearest_max(model, point)
    return Probe(model, named, verdict, point, active, violated, None, near, most)


def _part(model: Model, entries: tuple[tuple[str, Fraction], ...]) -> Probe:
    rest = model
    for name, value in entries:
        rest = rest.fix(name, value)
    found = optimum(rest.without_objective()).point
    if found is None:
        return Probe(model, entries, "outside", None, conflict=farkas(rest))
    values = dict(entries) | dict(zip(rest.variables, found, strict=True))
    whole = _whole(model, model.point(values))
    return Probe(model, entries, whole.verdict, whole.point, whole.active)
