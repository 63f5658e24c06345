"""How long `review` takes beside one bare exact enumeration (cdd.gmp, generators only). Informs, never fails.

Run: python tests/bench/bench_review.py
Three variables, an objective. "capacities" and "tangents" as in bench_region; "empty": capacities and a demand that
they cannot meet, beside the bare enumeration of the capacities. Medians of rounds run in turn, in CPU time. The
slope is that of the line through (log rows, log milliseconds).
"""

from __future__ import annotations

import time
from collections.abc import Callable
from fractions import Fraction
from math import log
from statistics import median

import cdd
import cdd.gmp
from bench_region import Rows, capacities, model_of, tangents

import polywalk as pw
from polywalk.model import Model

SIZES = (10, 30, 100)


def bare(rows: Rows) -> None:
    """One exact enumeration and nothing else."""
    matrix = cdd.gmp.matrix_from_array(rows, rep_type=cdd.RepType.INEQUALITY)
    _ = cdd.gmp.copy_generators(cdd.gmp.polyhedron_from_matrix(matrix)).array


def reviewed(rows: Rows, family: str) -> Model:
    """The rows as a model with an objective; in the empty family with a demand above all capacities."""
    model = model_of(rows).with_objective({"x": 3, "y": 5, "z": 4}, "max")
    return (
        model.with_constraint("demand", {"x": 1, "y": 1, "z": 1}, ">=", Fraction(200)) if family == "empty" else model
    )


def seconds(work: Callable[[], object]) -> float:
    """The CPU time of one run."""
    start = time.process_time()
    work()
    return time.process_time() - start


def slope(times: list[float]) -> float:
    """The slope of the line of least squares through (log size, log time)."""
    xs, ys = [log(size) for size in SIZES], [log(time) for time in times]
    middle, height = sum(xs) / len(xs), sum(ys) / len(ys)
    rise = sum((x - middle) * (y - height) for x, y in zip(xs, ys, strict=True))
    return rise / sum((x - middle) ** 2 for x in xs)


def main() -> None:
    """Print one line for each family and size, and each family's slope."""
    print("family      rows  findings  bare ms  review ms  ratio")
    for family, make in (("capacities", capacities), ("tangents", tangents), ("empty", capacities)):
        times = []
        for m in SIZES:
            rows = make(m, seed=1)
            model = reviewed(rows, family)
            count = len(pw.review(model).findings)
            rounds = 15 if m <= 30 else 5
            pairs = [(seconds(lambda: bare(rows)), seconds(lambda: pw.review(model))) for _ in range(rounds)]  # noqa: B023
            one, other = (median(side) * 1000 for side in zip(*pairs, strict=True))
            times.append(other)
            print(f"{family:<10}  {m:>4}  {count:>8}  {one:>7.2f}  {other:>9.2f}  {other / one:>5.1f}")
        print(f"{family:<10}  slope {slope(times):.2f}")


if __name__ == "__main__":
    main()
