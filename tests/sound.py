"""Sound models of two or three decisions, as an analyst would type them. For the tests only."""

from __future__ import annotations

from fractions import Fraction
from random import Random

from polywalk.exact import Row
from polywalk.linear import optimum
from polywalk.model import Constraint, Model, Objective
from polywalk.region import region

NAMES = ("pump", "chips", "tank")


def sound(draw: Random) -> Model:
    """Most profit from scarce resources, or least cost of meeting demands; numbers of two digits, as people type."""
    while True:
        model = _drawn(draw)
        best = optimum(model)
        wanted = model.n - sum(row.sense == "==" for row in model.constraints)
        if best.outcome == "optimal" and any(best.point) and region(model).dimension == wanted:
            return model


def _drawn(draw: Random) -> Model:
    n = draw.choice((2, 3))
    names = NAMES[:n]
    plan = [Fraction(draw.randint(2, 40)) for _ in names]
    earns = draw.random() < 0.5
    rows = []
    for k in range(draw.randint(2, 4) if earns else draw.randint(1, 2)):
        rows.append(limit(f"capacity {k + 1}" if earns else f"demand {k + 1}", amounts(draw, n), earns, plan, draw))
    if not earns and draw.random() < 0.7:
        rows.append(limit("budget", amounts(draw, n), True, plan, draw))
    if earns and draw.random() < 0.4:
        rows.append(limit("contract", amounts(draw, n), False, plan, draw))
    if draw.random() < 0.5:
        rows.append(_mixture(draw, n, plan))
    if draw.random() < 0.25:
        rows.append(_balance(draw, n, plan))
    for j, name in enumerate(names):
        unit = tuple(Fraction(int(i == j)) for i in range(n))
        rows.append(Constraint(f"{name} lower", unit, ">=", Fraction(0)))
        if draw.random() < 0.5:
            rows.append(Constraint(f"{name} upper", unit, "<=", _two_digits(plan[j] * _more(draw))))
    prices = tuple(Fraction(draw.randint(2, 60)) for _ in names)
    return Model(names, tuple(rows), Objective("max" if earns else "min", prices))


def amounts(draw: Random, n: int) -> Row:
    """What one unit of each decision takes of a resource."""
    typed = (1, 1, 1, 2, 2, 3, 4, 5, 6, 8, 12, 15, "1/2", "3/2", "5/2", "1/4", "2/5")
    row = [Fraction(draw.choice(typed)) for _ in range(n)]
    if n == 3 and draw.random() < 0.4:
        row[draw.randrange(3)] = Fraction(0)
    return tuple(row)


def limit(name: str, amounts: Row, at_most: bool, plan: list[Fraction], draw: Random) -> Constraint:
    """A row that the plan meets with room to spare."""
    used = sum((a * p for a, p in zip(amounts, plan, strict=True)), Fraction(0))
    factor = _more(draw) if at_most else 1 / _more(draw)
    return Constraint(name, amounts, "<=" if at_most else ">=", _two_digits(used * factor))


def _mixture(draw: Random, n: int, plan: list[Fraction]) -> Constraint:
    """One decision at most so much more than another, or than a multiple of it."""
    i, j = draw.sample(range(n), 2)
    row = [Fraction(0)] * n
    row[i], row[j] = Fraction(1), -Fraction(draw.choice((1, 1, 2, "1/2")))
    room = plan[i] + row[j] * plan[j]
    return Constraint("mixture", tuple(row), "<=", _two_digits(room * _more(draw)) if room > 0 else Fraction(0))


def _balance(draw: Random, n: int, plan: list[Fraction]) -> Constraint:
    row = tuple(Fraction(1) for _ in range(n))
    return Constraint("balance", row, "==", sum(plan, Fraction(0)))


def _more(draw: Random) -> Fraction:
    return Fraction(draw.randint(100, 150), 100)


def _two_digits(value: Fraction) -> Fraction:
    return Fraction(f"{float(value):.2g}")
