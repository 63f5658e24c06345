"""Checks proofs on plain numbers, by addition and multiplication alone; imports nothing from polywalk.

A row is (coefficients, sense, right-hand side); every number is an int or a Fraction.
"""

from fractions import Fraction


def product(left, right):
    """The inner product."""
    return sum((Fraction(a) * b for a, b in zip(left, right, strict=True)), Fraction(0))


def holds(rows, point):
    """Whether a point satisfies every row."""
    meets = {"<=": lambda a, b: a <= b, ">=": lambda a, b: a >= b, "==": lambda a, b: a == b}
    return all(meets[sense](product(row, point), rhs) for row, sense, rhs in rows)


def combined(rows, weights):
    """The rows times the weights, added: coefficients and right-hand side."""
    width = len(rows[0][0]) if rows else 0
    row = [sum((Fraction(w) * r[0][j] for r, w in zip(rows, weights, strict=True)), Fraction(0)) for j in range(width)]
    return row, sum((Fraction(w) * r[2] for r, w in zip(rows, weights, strict=True)), Fraction(0))


def signs_hold(rows, weights, turned=1):
    """Whether the weights keep every row a <=: none negative on a <=, none positive on a >= (turned: -1 for a >=)."""
    wrong = {"<=": lambda w: w < 0, ">=": lambda w: w > 0, "==": lambda w: False}
    return not any(wrong[row[1]](turned * w) for row, w in zip(rows, weights, strict=True))


def implies(rows, weights, coefficients, rhs):
    """Whether the weighted rows add up to exactly coefficients . x <= rhs."""
    return signs_hold(rows, weights) and combined(rows, weights) == (list(coefficients), rhs)


def proves_empty(rows, weights):
    """Farkas: the rows add up to 0 <= a negative number."""
    return bool(rows) and implies(rows, weights, [0] * len(rows[0][0]), rhs := combined(rows, weights)[1]) and rhs < 0


def proves_optimal(objective, rows, point, weights, value):
    """A feasible point whose value no point can pass, as the weighted rows say; objective: (goal, cost, constant)."""
    goal, cost, constant = objective
    if not holds(rows, point) or product(cost, point) + constant != value:
        return False
    if not rows:
        return not any(cost) and value == constant
    row, rhs = combined(rows, weights)
    return signs_hold(rows, weights, 1 if goal == "max" else -1) and row == list(cost) and rhs + constant == value


def proves_unbounded(goal, cost, rows, point, direction):
    """A feasible point and a direction that keeps every row and improves the objective."""
    level = [(row, sense, 0) for row, sense, _ in rows]
    change = product(cost, direction)
    return holds(rows, point) and holds(level, direction) and (change > 0 if goal == "max" else change < 0)
