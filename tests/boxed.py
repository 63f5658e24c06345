"""How a small model ends, by brute force: every n-subset of its rows inside a box, and again inside one twice as large.

The data of a random model are so small that no basic point comes near the box. So the model is infeasible if no
basic point satisfies it, unbounded if the best value grows with the box, and otherwise optimal with that value.
"""

from __future__ import annotations

from fractions import Fraction
from itertools import combinations
from math import lcm

BOX = 10**9


def brute(goal, cost, constant, rows):
    """(outcome, value, optimal points) of rows (coefficients, sense, right-hand side), all exact."""
    whole = [_integers(row, sense, rhs) for row, sense, rhs in rows]
    small = best_in_box(goal, cost, whole, BOX)
    if small is None:
        return "infeasible", None, []
    if best_in_box(goal, cost, whole, 2 * BOX)[0] != small[0]:
        return "unbounded", None, []
    inside = [point for point in small[1] if all(abs(value) < BOX for value in point)]
    return "optimal", small[0] + constant, inside


def best_in_box(goal, cost, rows, size):
    """The best value and the basic points that take it; None where no basic point is feasible."""
    n = len(cost)
    units = [[int(i == j) for i in range(n)] for j in range(n)]
    all_rows = [*rows, *((unit, "<=", size) for unit in units), *((unit, ">=", -size) for unit in units)]
    values = {}
    for chosen in combinations(all_rows, n):
        point = meet([row for row, _, _ in chosen], [rhs for _, _, rhs in chosen])
        if point is not None and _inside(all_rows, *point):
            exact = tuple(Fraction(value, point[1]) for value in point[0])
            values[exact] = sum(Fraction(c) * value for c, value in zip(cost, exact, strict=True))
    if not values:
        return None
    best = max(values.values()) if goal == "max" else min(values.values())
    return best, sorted(point for point, value in values.items() if value == best)


def meet(matrix, rhs):
    """Cramer's rule for up to three integer rows: numerators and the (positive) denominator, or None."""
    whole = determinant(matrix)
    if whole == 0:
        return None
    sign = 1 if whole > 0 else -1
    columns = range(len(matrix))
    replaced = [
        [[b if j == k else value for j, value in enumerate(row)] for row, b in zip(matrix, rhs, strict=True)]
        for k in columns
    ]
    return [sign * determinant(square) for square in replaced], abs(whole)


def determinant(square):
    """By the rule of Sarrus and its smaller relatives."""
    if len(square) == 1:
        return square[0][0]
    if len(square) == 2:
        (a, b), (c, d) = square
        return a * d - b * c
    (a, b, c), (d, e, f), (g, h, i) = square
    return a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g)


def _integers(row, sense, rhs):
    scale = lcm(*(Fraction(value).denominator for value in (*row, rhs)))
    return [int(Fraction(value) * scale) for value in row], sense, int(Fraction(rhs) * scale)


def _inside(rows, numerators, whole):
    for row, sense, rhs in rows:
        gap = sum(a * b for a, b in zip(row, numerators, strict=True)) - rhs * whole
        if (gap > 0 and sense != ">=") or (gap < 0 and sense != "<="):
            return False
    return True
