"""Random models of 2 to 7 variables, of every kind, with the variables to look at."""

from __future__ import annotations

import random
from fractions import Fraction

from polywalk.model import Constraint, Model, Sense


def random_model(seed: int) -> tuple[Model, tuple[str, ...]]:
    """A model and one to three of its variables; by chance empty, flat, unbounded or with lines."""
    draw = random.Random(seed)
    names = tuple("abcdefg"[: draw.randint(2, 7)])
    rows = [_row(draw, i, len(names)) for i in range(draw.randint(1, 7))]
    for j, name in enumerate(names):
        unit = tuple(Fraction(int(k == j)) for k in range(len(names)))
        if draw.random() < 0.75:
            rows.append(Constraint(f"{name} lower", unit, ">=", Fraction(draw.choice([0, 0, 0, -2]))))
        if draw.random() < 0.5:
            rows.append(Constraint(f"{name} upper", unit, "<=", Fraction(draw.choice([1, 2, 5]))))
    return Model(names, tuple(rows)), tuple(draw.sample(names, draw.randint(1, min(3, len(names)))))


def _row(draw: random.Random, i: int, n: int) -> Constraint:
    values = [draw.choice([0, 0, 1, -1, 2, -3, 0.5]) for _ in range(n)]
    values[0] = values[0] if any(values) else 1
    senses: list[Sense] = ["<=", "<=", "<=", ">=", "=="] if i < 3 else ["<=", ">="]
    return Constraint(f"r{i}", tuple(map(Fraction, values)), draw.choice(senses), Fraction(draw.randint(-1, 8)))
