"""Small models typed as plain numbers, and random ones with the awkward cases built in. For the tests only."""

from __future__ import annotations

from fractions import Fraction
from random import Random

from polywalk.model import Constraint, Model, Objective

Typed = tuple[list[object], str, object]


def typed(goal, cost, rows, lower=(), upper=(), *, constant=0, names=None) -> Model:
    """A model of rows (coefficients, sense, right-hand side); ``lower`` and ``upper`` give bounds or None.

    ``lower=0`` means x >= 0 throughout. Rows are called r1, r2, ...; bounds "x1 lower", "x1 upper".
    """
    n = len(cost)
    variables = tuple(names or (f"x{j + 1}" for j in range(n)))
    lower = [0] * n if lower == 0 else list(lower)
    made = [Constraint(f"r{i + 1}", _row(a), sense, Fraction(b)) for i, (a, sense, b) in enumerate(rows)]
    for side, sense, bounds in (("lower", ">=", lower), ("upper", "<=", upper)):
        for j, bound in enumerate(bounds):
            if bound is not None:
                unit = [int(i == j) for i in range(n)]
                made.append(Constraint(f"{variables[j]} {side}", _row(unit), sense, Fraction(bound)))
    objective = None if goal is None else Objective(goal, _row(cost), Fraction(constant))
    return Model(variables, tuple(made), objective)


def le(goal, cost, matrix, ends) -> Model:
    """A x <= b, x >= 0: the form in which cycling examples are printed."""
    return typed(goal, cost, [(row, "<=", end) for row, end in zip(matrix, ends, strict=True)], lower=0)


def plain(model: Model) -> list[Typed]:
    """The rows of a model as plain numbers, for the checker."""
    return [(list(row.coefficients), row.sense, row.rhs) for row in model.constraints]


def klee_minty(n: int, base: int = 2, growth: int = 5) -> Model:
    """max sum base^(n-j) x_j with 2 sum_(i<j) base^(j-i) x_i + x_j <= growth^j (growth 5) or 100^(j-1), x >= 0."""
    rows = [[2 * base ** (j - i) if i < j else int(i == j) for i in range(n)] for j in range(n)]
    ends = [growth ** (j + 1) if growth == 5 else growth**j for j in range(n)]
    return le("max", [base ** (n - 1 - j) for j in range(n)], rows, ends)


def random_model(draw: Random, largest: int = 3) -> Model:
    """Small integers, so that ties, degenerate and flat regions are common; rows typed in odd scales."""
    n = draw.choice([1, 2, 2, 3, 3])
    rows = []
    for _ in range(draw.randint(0, 6)):
        scale = draw.choice([1, 1, 1, 6, Fraction(1, 3), Fraction(5, 2)])
        row = [draw.randint(-largest, largest) * scale for _ in range(n)]
        sense = draw.choice(["<="] * 10 + [">="] * 2 + ["=="])
        rows.append((row, sense, draw.choice([0, 0, 1, 2, 3, 6, -2]) * scale))
    lower = [draw.choice([0, 0, 0, None, None, -1, Fraction(1, 2)]) for _ in range(n)]
    upper = [draw.choice([None, None, None, 3, 5]) for _ in range(n)]
    cost = [draw.choice([-3, -2, -1, -1, 0, 0, 0, 1, 1, 2, 3]) for _ in range(n)]
    if draw.random() < 0.15:  # a line: nothing holds the last variable, and it seldom costs anything
        rows = [([*row[:-1], 0], sense, rhs) for row, sense, rhs in rows]
        lower[-1], upper[-1], cost[-1] = None, None, draw.choice([0, 0, 0, 1])
    return typed(draw.choice(["min", "max"]), cost, rows, lower, upper, constant=draw.choice([0, 7]))


def random_degenerate(draw: Random) -> Model:
    """Several constraints through the origin, where the walk starts."""
    rows = [([draw.randint(-4, 4) for _ in range(3)], "<=", draw.choice([0, 0, 0, 0, 1, 4])) for _ in range(5)]
    return typed(draw.choice(["min", "max"]), [draw.randint(-3, 3) for _ in range(3)], rows, lower=0, constant=2)


def _row(values) -> tuple[Fraction, ...]:
    return tuple(Fraction(value) for value in values)
