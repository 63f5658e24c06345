"""Mistakes planted one at a time in sound models of two or three decisions. For the tests only.

Written before any ranking of suspects, and on its own: nothing is imported from the reviewing room. A case is a sound
model, the same model with one slip, and all that an analyst would see of it: the status where the slip made the model
infeasible or unbounded, else a single plan that should be allowed (or forbidden) and is not.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from fractions import Fraction
from random import Random

from sound import amounts, limit, sound

from polywalk.exact import Row
from polywalk.linear import optimum
from polywalk.model import Constraint, Model
from polywalk.region import region

DECIMALS = tuple(map(Fraction, ("10", "1/10", "100", "1/100")))
UNITS = tuple(Fraction(f) ** p for f in (60, 1000, Fraction(18, 5), 24) for p in (1, -1))


@dataclass(frozen=True)
class Case:
    """One planted mistake; ``place`` is the constraint it was made in (or that was forgotten), or "objective"."""

    slip: str
    place: str
    truth: Model
    planted: Model
    allowed: tuple[Row, ...] = ()
    forbidden: tuple[Row, ...] = ()

    @property
    def symptom(self) -> str:
        """What the analyst sees."""
        return "a plan refused" if self.allowed else "a plan let through" if self.forbidden else "status"


# slips: each turns a model into (the place, the model with the slip), or None where it has nothing to slip on

Planted = tuple[str, Model] | None


def _sense(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: row.sense != "==")
    return row and _put(model, replace(row, sense=">=" if row.sense == "<=" else "<="))


def _coefficient_sign(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: len(_places(row)) > 1)
    return row and _put(model, _scaled(row, draw.choice(_places(row)), Fraction(-1)))


def _rhs_sign(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: bool(row.rhs))
    return row and _put(model, replace(row, rhs=-row.rhs))


def _swapped(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: len(set(row.coefficients)) > 1 and row.bounds() is None)
    if row is None:
        return None
    pairs = [(i, j) for i in range(model.n) for j in range(i) if row.coefficients[i] != row.coefficients[j]]
    i, j = draw.choice(pairs)
    mixed = list(row.coefficients)
    mixed[i], mixed[j] = mixed[j], mixed[i]
    return _put(model, replace(row, coefficients=tuple(mixed)))


def _decimal(model: Model, draw: Random) -> Planted:
    return _number(model, draw, draw.choice(DECIMALS))


def _unit(model: Model, draw: Random) -> Planted:
    return _number(model, draw, draw.choice(UNITS))


def _number(model: Model, draw: Random, factor: Fraction) -> Planted:
    spots: list[tuple[Constraint, int]] = []
    for row in model.constraints:
        single = len(_places(row)) == 1
        spots += [(row, j) for j in ([] if single else _places(row))] + ([(row, -1)] if row.rhs else [])
    row, j = draw.choice(spots)
    return _put(model, replace(row, rhs=row.rhs * factor) if j < 0 else _scaled(row, j, factor))


def _goal(model: Model, draw: Random) -> Planted:
    goal = model.objective
    return goal and ("objective", replace(model, objective=replace(goal, goal="min" if goal.goal == "max" else "max")))


def _too_many(model: Model, draw: Random) -> Planted:
    """A row of another season: its own amounts, and a limit that another plan would have met."""
    plan = [Fraction(draw.randint(2, 40)) for _ in model.variables]
    row = limit("pasted", amounts(draw, model.n), draw.random() < 0.5, plan, draw)
    at = draw.randrange(len(model.constraints) + 1)
    return "pasted", replace(model, constraints=(*model.constraints[:at], row, *model.constraints[at:]))


def _equality(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: row.sense != "==" and row.bounds() is None)
    return row and _put(model, replace(row, sense="=="))


def _inequality(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: row.sense == "==")
    return row and _put(model, replace(row, sense=draw.choice(("<=", ">="))))


def _no_constraint(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: row.bounds() is None)
    return row and (row.name, model.without(row.name))


def _no_bound(model: Model, draw: Random) -> Planted:
    row = _pick(model, draw, lambda row: row.bounds() is not None)
    return row and (row.name, model.without(row.name))


SLIPS: dict[str, Callable[[Model, Random], Planted]] = {
    "flipped sense": _sense,
    "flipped coefficient": _coefficient_sign,
    "flipped right-hand side": _rhs_sign,
    "swapped coefficients": _swapped,
    "shifted decimal point": _decimal,
    "unit factor": _unit,
    "max for min": _goal,
    "constraint too many": _too_many,
    "equality for inequality": _equality,
    "inequality for equality": _inequality,
    "forgotten constraint": _no_constraint,
    "forgotten bound": _no_bound,
}


def cases(seed: int, count: int) -> Iterator[Case]:
    """So many cases, the slips in turn; a slip that shows in nothing an analyst sees is drawn again."""
    draw = Random(seed)
    for k in range(count):
        slip = list(SLIPS)[k % len(SLIPS)]
        made = None
        while made is None:
            made = _case(slip, draw)
        yield made


def _case(slip: str, draw: Random) -> Case | None:
    truth = sound(draw)
    planted = SLIPS[slip](truth, draw)
    if planted is None:
        return None
    case = Case(slip, planted[0], truth, planted[1])
    seen = optimum(case.planted)
    if seen.outcome != "optimal":
        return case
    should = _plans(truth)
    refused = [point for point in should if not _allows(case.planted, point)]
    let_through = [point for point in _plans(case.planted) if not _allows(truth, point)]
    if refused and (not let_through or draw.random() < 0.5):
        return replace(case, allowed=(draw.choice(refused),))
    return replace(case, forbidden=(let_through[0],)) if let_through else None


def _plans(model: Model) -> list[Row]:
    """Plans that would come up in conversation: the best one, and one from the middle."""
    best, middle = optimum(model).point, region(model).centroid
    assert best is not None
    if middle is None:
        return [best]
    rounded = tuple(Fraction(round(value)) for value in middle)
    return [best, rounded if _allows(model, rounded) else middle]


def _allows(model: Model, point: Row) -> bool:
    return all(row.holds(point) for row in model.constraints)


def _pick(model: Model, draw: Random, able: Callable[[Constraint], bool]) -> Constraint | None:
    rows = [row for row in model.constraints if able(row)]
    return draw.choice(rows) if rows else None


def _places(row: Constraint) -> list[int]:
    return [j for j, value in enumerate(row.coefficients) if value]


def _scaled(row: Constraint, place: int, factor: Fraction) -> Constraint:
    return replace(
        row, coefficients=tuple(value * factor if j == place else value for j, value in enumerate(row.coefficients))
    )


def _put(model: Model, row: Constraint) -> tuple[str, Model]:
    return row.name, replace(model, constraints=tuple(row if r.name == row.name else r for r in model.constraints))
