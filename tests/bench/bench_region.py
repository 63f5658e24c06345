"""How long `region` takes beside bare cdd.gmp on the same rows: generators, incidence, adjacency. Informs, never fails.

Run: python tests/bench/bench_region.py
Three families, three variables. "capacities": x >= 0 and random capacity rows (small integers), as people type them;
"planes": random planes one to three units from the origin; of both most rows are redundant where there are many.
"tangents": rational tangent planes of the unit sphere, so no row is redundant and the numbers are long.
The two sides are run in turn and their medians compared; "bare" gets the rows as Fractions, as they stand in the model.
"region" is vertices with all their active constraints, rays and edges. Past some work it starts a child process.
"""

from __future__ import annotations

import random
import time
from collections.abc import Callable
from fractions import Fraction
from statistics import median

import cdd
import cdd.gmp

from polywalk.model import Constraint, Model
from polywalk.region import region

Rows = list[list[Fraction]]
Family = Callable[[int, int], Rows]


def capacities(m: int, seed: int) -> Rows:
    """Rows (b, a) with b + a.x >= 0: three lower bounds, then random capacities."""
    draw = random.Random(seed)
    rows = [[0, 1, 0, 0], [0, 0, 1, 0], [0, 0, 0, 1]]
    rows += [[draw.randint(20, 60), *(-draw.randint(1, 20) for _ in range(3))] for _ in range(m - 3)]
    return [[Fraction(value) for value in row] for row in rows]


def planes(m: int, seed: int) -> Rows:
    """Random planes, their distance from the origin between 1 and 3, rounded to thousandths."""
    draw = random.Random(seed)
    rows = []
    for _ in range(m):
        way = [draw.gauss(0, 1) for _ in range(3)]
        size = sum(value * value for value in way) ** 0.5
        rows.append([draw.randint(1000, 3000), *(round(1000 * value / size) for value in way)])
    return [[Fraction(value) for value in row] for row in rows]


def tangents(m: int, seed: int) -> Rows:
    """Rows u.x <= 1 with u rational on the unit sphere, by stereographic projection."""
    draw = random.Random(seed)
    rows = []
    for _ in range(m):
        s, t = Fraction(draw.randint(-30, 30), 10), Fraction(draw.randint(-30, 30), 10)
        size = s * s + t * t + 1
        rows.append([Fraction(1), -2 * s / size, -2 * t / size, -(size - 2) / size])
    return rows


def bare(rows: Rows) -> None:
    """What cddlib alone needs for generators, incidence and adjacency."""
    solid = cdd.gmp.polyhedron_from_matrix(cdd.gmp.matrix_from_array(rows, rep_type=cdd.RepType.INEQUALITY))
    _ = cdd.gmp.copy_generators(solid).array, cdd.gmp.copy_incidence(solid), cdd.gmp.copy_adjacency(solid)


def model_of(rows: Rows) -> Model:
    """The same rows as a model."""
    named = [Constraint(f"row {k}", tuple(row[1:]), ">=", -row[0]) for k, row in enumerate(rows)]
    return Model(("x", "y", "z"), tuple(named))


def seconds(work: Callable[[], object]) -> float:
    """One timed run."""
    start = time.perf_counter()
    work()
    return time.perf_counter() - start


CASES: list[tuple[Family, tuple[int, ...], int]] = [
    (capacities, (10, 20, 30), 41),
    (tangents, (10, 20, 30), 41),
    (capacities, (300, 1000), 21),
    (planes, (300, 1000), 7),
    (tangents, (100, 300), 5),
    (tangents, (1000,), 1),
]
"""Family, sizes and how often each is run; the last takes bare cddlib some ten seconds."""


def main() -> None:
    """Print one line for each family and size."""
    print("family      rows  vertices   bare ms  region ms  region/bare  times faster")
    for family, sizes, rounds in CASES:
        for m in sizes:
            rows = family(m, 1)
            model = model_of(rows)
            count = len(region(model).vertices)
            pairs = [(seconds(lambda: bare(rows)), seconds(lambda: region(model).edges)) for _ in range(rounds)]  # noqa: B023
            one, other = (median(side) * 1000 for side in zip(*pairs, strict=True))
            said = f"{family.__name__:<10}  {m:>4}  {count:>8}  {one:>8.2f}  {other:>9.2f}"
            print(f"{said}  {other / one:>11.2f}  {one / other:>12.1f}", flush=True)


if __name__ == "__main__":
    main()
