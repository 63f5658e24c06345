"""Brute force, to be believed because it is short: every question answered by trying all small sets of rows.

Only `Model` is taken from polywalk, as input. A point is a vertex if it is feasible and the unique solution of n rows
made equalities; a direction is an extreme ray if it stays inside and is, up to length, the only solution of n - 1 rows
made homogeneous equalities. The rest follows the definitions in any textbook (Schrijver, Theory of Linear and Integer
Programming, 1986, chapter 8).
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import combinations
from math import gcd, lcm

from polywalk.model import Model

Vector = tuple[Fraction, ...]


@dataclass(frozen=True)
class Truth:
    """What brute force finds; vertices and rays map to the names active there. Nothing where there is a line."""

    status: str
    dimension: int
    line: bool
    vertices: dict[Vector, tuple[str, ...]]
    rays: dict[Vector, tuple[str, ...]]
    edges: frozenset[frozenset[Vector]]
    facets: frozenset[tuple[str, ...]]
    outcome: str
    value: Fraction | None


def truth(model: Model) -> Truth:
    """Everything about a model of few rows and variables whose region has no line, or that it has one."""
    n, rows = model.n, [row for row in model.constraints if any(row.coefficients)]
    normals = [row.coefficients for row in rows]
    if len(eliminate(normals, n)[1]) < n:
        return Truth("unknown", -2, True, {}, {}, frozenset(), frozenset(), "unknown", None)
    points = {x for chosen in combinations(rows, n) if (x := meet(chosen, n)) and inside(model, x)}
    ways = {way for chosen in combinations(normals, n - 1) for way in kernel(chosen, n) if recedes(model, way)}
    if not points:
        return Truth("empty", -1, False, {}, {}, frozenset(), frozenset(), "empty", None)
    vertices = {x: tuple(row.name for row in rows if value(row.coefficients, x) == row.rhs) for x in points}
    rays = {way: tuple(row.name for row in rows if value(row.coefficients, way) == 0) for way in ways}
    everything = list(vertices.values()) + list(rays.values())
    everywhere = set.intersection(*map(set, everything))
    named = dict(zip((row.name for row in rows), normals, strict=True))
    depth = rank_of(named, everywhere)
    return Truth(
        status="unbounded" if rays else "bounded",
        dimension=n - depth,
        line=False,
        vertices=vertices,
        rays=rays,
        edges=edges_of(named, vertices, rays, n),
        facets=facets_of(named, list(vertices.values()), everything, depth),
        **optimum_of(model, points, ways),  # type: ignore[arg-type]
    )


def edges_of(named: dict[str, Vector], vertices: dict, rays: dict, n: int) -> frozenset[frozenset[Vector]]:
    """Pairs, at least one of them a vertex, whose common rows have rank n - 1."""
    found = list(vertices.items()) + list(rays.items())
    pairs = [pair for pair in combinations(found, 2) if pair[0][0] in vertices]
    return frozenset(frozenset({x, y}) for (x, a), (y, b) in pairs if rank_of(named, set(a) & set(b)) == n - 1)


def facets_of(named: dict[str, Vector], at: list, everything: list, depth: int) -> frozenset[tuple[str, ...]]:
    """For each facet the rows active on exactly it: those on it have rank one more than those active everywhere."""
    found = set()
    for name in named:
        if any(name in names for names in at):
            on = [set(names) for names in everything if name in names]
            common = set.intersection(*on)
            if len(on) < len(everything) and rank_of(named, common) == depth + 1:
                exact = [
                    other
                    for other in named
                    if [other in names for names in everything] == [name in names for names in everything]
                ]
                found.add(tuple(exact))
    return frozenset(found)


def optimum_of(model: Model, points: Iterable[Vector], ways: Iterable[Vector]) -> dict[str, object]:
    """Outcome and value, from the vertices and rays."""
    goal = model.objective
    if goal is None:
        return {"outcome": "no objective", "value": None}
    sense = 1 if goal.goal == "max" else -1
    if any(sense * value(goal.coefficients, way) > 0 for way in ways):
        return {"outcome": "unbounded", "value": None}
    values = [value(goal.coefficients, x) + goal.constant for x in points]
    return {"outcome": "optimal", "value": max(values) if sense > 0 else min(values)}


def inside(model: Model, x: Vector) -> bool:
    """Whether every row holds at x."""
    signs = {"<=": lambda gap: gap <= 0, ">=": lambda gap: gap >= 0, "==": lambda gap: gap == 0}
    return all(signs[row.sense](value(row.coefficients, x) - row.rhs) for row in model.constraints)


def recedes(model: Model, way: Vector) -> bool:
    """Whether one may go for ever in this direction, as far as the rows can tell."""
    signs = {"<=": lambda change: change <= 0, ">=": lambda change: change >= 0, "==": lambda change: change == 0}
    return all(signs[row.sense](value(row.coefficients, way)) for row in model.constraints)


def value(row: Sequence[Fraction], x: Sequence[Fraction]) -> Fraction:
    """The inner product."""
    return sum((a * b for a, b in zip(row, x, strict=True)), Fraction(0))


def meet(rows: Sequence, n: int) -> Vector | None:
    """The one point at which all rows hold with equality, if there is exactly one."""
    reduced, pivots = eliminate([(*row.coefficients, row.rhs) for row in rows], n)
    return tuple(row[n] for row in reduced) if pivots == list(range(n)) else None


def kernel(rows: Sequence[Vector], n: int) -> list[Vector]:
    """Both directions of the line of solutions of homogeneous rows, in smallest integers, if it is one line."""
    reduced, pivots = eliminate(rows, n)
    free = [j for j in range(n) if j not in pivots]
    if len(free) != 1:
        return []
    way = [Fraction(0)] * n
    way[free[0]] = Fraction(1)
    for row, pivot in zip(reduced, pivots, strict=True):
        way[pivot] = -row[free[0]]
    scale = lcm(*(entry.denominator for entry in way))
    whole = [int(entry * scale) for entry in way]
    unit = gcd(*whole)
    return [tuple(Fraction(sign * entry // unit) for entry in whole) for sign in (1, -1)]


def rank_of(named: dict[str, Vector], names: Iterable[str]) -> int:
    """The rank of the named rows."""
    return len(eliminate([named[name] for name in names], len(next(iter(named.values()))))[1])


def eliminate(rows: Sequence[Vector], columns: int) -> tuple[list[list[Fraction]], list[int]]:
    """Gauss and Jordan's elimination on the first columns: the rows with a pivot, and the pivots."""
    work, pivots = [list(row) for row in rows], []
    for j in range(columns):
        k = next((i for i in range(len(pivots), len(work)) if work[i][j]), None)
        if k is None:
            continue
        top = len(pivots)
        work[top], work[k] = work[k], work[top]
        work[top] = [entry / work[top][j] for entry in work[top]]
        for i, row in enumerate(work):
            if i != top and row[j]:
                work[i] = [a - row[j] * b for a, b in zip(row, work[top], strict=True)]
        pivots.append(j)
    return work[: len(pivots)], pivots
