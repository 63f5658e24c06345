"""The search itself: place by place, the cheap questions first, one enumeration a place at most."""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Iterator, Sequence
from dataclasses import replace
from fractions import Fraction
from functools import partial
from time import monotonic

from polywalk.budget import Budget
from polywalk.errors import BudgetError
from polywalk.exact import Row, dot, primitive
from polywalk.linear import optimum
from polywalk.model import Constraint, Model
from polywalk.region import region
from polywalk.region.engine import SMALL_WORK, work
from polywalk.reviewing.catalogue import CATALOGUE, OBJECTIVE, Slip
from polywalk.reviewing.cutting import Cut, Ground
from polywalk.reviewing.missing import Gap, Interval, directions, lowest, stops
from polywalk.reviewing.ranking import Doubts, Ranking
from polywalk.reviewing.symptoms import Symptom

Found = tuple[Slip | Gap, Doubts, Fraction | None, Row | None, tuple[str, ...]]
MISSING = "missing information"


class Search:
    """One search; holds what the places have in common."""

    def __init__(
        self, model: Model, seen: Symptom, budget: Budget, progress: Callable[[int, int], object] | None = None
    ) -> None:
        self.model, self.seen, self.budget, self.progress = model, seen, budget, progress
        self.now = optimum(model)
        self.ways = Counter(kind for kind, _ in directions(model.n))
        self.unreached: tuple[str, ...] = ()
        self.must = (*seen.allowed, *((seen.point,) if seen.point is not None else ()))
        self.refusing = {row.name for row in model.constraints for point in self.must if not row.holds(point)}
        proof = self.now.infeasibility
        self.contradicting = None if proof is None else set(proof.multipliers)
        self.ranking = Ranking(model, self.ways, (*self.must, *seen.forbidden))
        self.end = monotonic() + budget.seconds

    def run(self) -> list[Found]:
        """Every slip that cures."""
        places = self._by_place()
        found: list[Found] = []
        steps: list[tuple[str, Callable[[], Iterator[Found]]]] = [
            (place, partial(self._place, place, slips)) for place, slips in places.items()
        ]
        steps.append((MISSING, self._gaps))
        for done, (name, step) in enumerate(steps):
            if monotonic() >= self.end:
                self.unreached = (*self.unreached, name)
                continue
            try:
                found += step()
            except BudgetError:
                self.unreached = (*self.unreached, name)
            if self.progress is not None:
                self.progress(done + 1, len(steps))
        return found

    def _by_place(self) -> dict[str, list[Slip]]:
        """The candidates by the place they change."""
        places: dict[str, list[Slip]] = {}
        for kind in CATALOGUE:
            for slip in kind(self.model):
                self.ways[slip.kind] += 1
                places.setdefault(slip.place, []).append(slip)
        return places

    def _place(self, place: str, slips: list[Slip]) -> Iterator[Found]:
        if place == OBJECTIVE:
            yield from self._objective(slips)
            return
        if self.refusing - {place} or (self.contradicting is not None and place not in self.contradicting):
            return
        others = self.model.without(place)
        let_through = [point for point in self.seen.forbidden if _allows(others, point)]
        able = [slip for slip in slips if self._may_cure(slip, let_through)]
        if not able:
            return
        ground = self._ground(others)
        if ground.region.status == "empty":
            return
        merged: dict[object, Found | None] = {_meaning(self.model.constraint(place)): None}
        for slip in able:
            key = _meaning(slip.row)
            if key not in merged:
                merged[key] = self._cured(slip, Cut(ground, slip.row))
            elif (kept := merged[key]) is not None:
                merged[key] = (*kept[:4], (*kept[4], f"{slip.kind}: {slip.told}"))
        yield from (one for one in merged.values() if one is not None)

    def _cured(self, slip: Slip, cut: Cut) -> Found | None:
        goal, wanted = slip.goal or self.model.objective, self.seen.point
        outcome, value, point = cut.outcome(goal)
        at = goal.at(wanted) if goal is not None and wanted is not None else None
        if outcome != "optimal" or not self.seen.admits(at, value):
            return None
        return slip, self.ranking.of_slip(slip, cut, point), value, point, ()

    def _ground(self, model: Model) -> Ground:
        """The region of a model; where that is much work, in a child process that ends with the budget."""
        if work(model.n, len(model.constraints)) <= SMALL_WORK:
            return Ground(region(model))
        return Ground(region(model, replace(self.budget, seconds=max(self.end - monotonic(), 0.01))))

    def _may_cure(self, slip: Slip, let_through: Sequence[Row]) -> bool:
        row = slip.row
        if row is not None and not all(row.holds(point) for point in self.must):
            return False
        if any(row is None or row.holds(point) for point in let_through):
            return False
        ray = self.now.ray
        return ray is None or (row is not None and not _goes(row, ray.direction))

    def _objective(self, slips: list[Slip]) -> Iterator[Found]:
        if not self._bare() or any(_allows(self.model, point) for point in self.seen.forbidden):
            return
        cut = Cut(self._ground(self.model), None)
        found = (self._cured(slip, cut) for slip in slips)
        yield from (one for one in found if one is not None)

    def _bare(self) -> bool:
        """Whether no constraint that stands there is in the way of a cure."""
        return self.contradicting is None and not self.refusing

    def _gaps(self) -> Iterator[Found]:
        if not self._bare():
            return
        ground, goal, wanted = self._ground(self.model), self.model.objective, self.seen.point
        for kind, direction in directions(self.model.n):
            values = self._values(ground, direction)
            if values is None or values.empty:
                continue
            gap = Gap(kind, direction, values)
            cut = Cut(ground, gap.row(self.model, values.example()))
            outcome, value, point = cut.outcome(goal)
            at = goal.at(wanted) if goal is not None and wanted is not None else None
            if outcome == "optimal" and self.seen.admits(at, value):
                yield gap, self.ranking.of_gap(gap, cut), value, point, ()

    def _values(self, ground: Ground, direction: Row) -> Interval | None:
        goal = self.model.objective
        if self.seen.status == "unbounded" and (goal is None or not stops(ground, direction, goal.upward)):
            return None
        low, levels = lowest(ground, direction), [dot(direction, p) for p in self.must]
        if levels:
            low = max(levels) if low is None else max([low, *levels])
        let_through = [dot(direction, p) for p in self.seen.forbidden if _allows(self.model, p)]
        high = min(let_through, default=None)
        if self.seen.value is None and self.seen.point is None:
            return None if high is None and self.seen.status != "unbounded" else Interval(low, high)
        exact = self._exact(direction)
        held = Interval(low, high)
        return Interval(exact, exact, True) if exact is not None and held.holds(exact) else None

    def _exact(self, direction: Row) -> Fraction | None:
        """The value at which the optimum is as wanted: the least of g.x where the objective is at least that good."""
        goal = self.model.objective
        if goal is None:
            return None
        if self.seen.point is not None:
            return dot(direction, self.seen.point)
        assert self.seen.value is not None
        sense = ">=" if goal.goal == "max" else "<="
        held = Constraint("as good", goal.coefficients, sense, self.seen.value - goal.constant)  # type: ignore[arg-type]
        names = {row.name for row in self.model.constraints}
        while held.name in names:
            held = replace(held, name=held.name + " again")
        asked = replace(self.model, constraints=(*self.model.constraints, held))
        return optimum(asked.with_objective(dict(zip(self.model.variables, direction, strict=True)), "min")).value


def _allows(model: Model, point: Row) -> bool:
    return all(row.holds(point) for row in model.constraints)


def _goes(row: Constraint, direction: Row) -> bool:
    """Whether a row lets a direction go on for ever."""
    return replace(row, rhs=Fraction(0)).holds(direction)


def _meaning(row: Constraint | None) -> object:
    """The same for rows that say the same: up to a positive factor, and up to any factor for an equality."""
    if row is None:
        return None
    shift, slope = row.inward
    whole = primitive((shift, *slope))
    if row.sense == "==" and next((value for value in whole if value), 0) < 0:
        whole = tuple(-value for value in whole)
    return row.sense == "==", whole
