"""How long a walk takes per pivot, all records kept, beside sympy's exact simplex and a bare integer pivot loop.

Run: python tests/bench/bench_walk.py
Klee-Minty cubes in the 2/5 form (Klee & Minty 1972), Dantzig's rule: 31 pivots for n = 5, 4,095 for n = 12. Informs,
never fails.
The sides are run in turn; told is the median of the ratios of neighbouring runs, which other work on the machine
disturbs alike; sympy's pivots are counted by its own pivot function.
"""

from __future__ import annotations

import time
import tracemalloc
from collections.abc import Callable
from fractions import Fraction
from statistics import median

import sympy
import sympy.solvers.simplex as peer

from polywalk.model import Constraint, Model, Objective
from polywalk.walks import Walk, walk

Rows = list[list[int]]


def cube(n: int) -> tuple[list[int], Rows, list[int]]:
    """Objective, coefficients and right-hand sides of the cube."""
    rows = [[2 * 2 ** (j - i) if i < j else int(i == j) for i in range(n)] for j in range(n)]
    return [2 ** (n - 1 - j) for j in range(n)], rows, [5 ** (j + 1) for j in range(n)]


def model_of(n: int) -> Model:
    """The cube as a model."""
    goal, rows, ends = cube(n)
    names = tuple(f"x{j + 1}" for j in range(n))
    capacities = [
        Constraint(f"row {i + 1}", tuple(map(Fraction, row)), "<=", Fraction(end))
        for i, (row, end) in enumerate(zip(rows, ends, strict=True))
    ]
    lower = [
        Constraint(f"{name} lower", tuple(Fraction(int(i == j)) for i in range(n)), ">=", Fraction(0))
        for j, name in enumerate(names)
    ]
    return Model(names, (*capacities, *lower), Objective("max", tuple(map(Fraction, goal))))


def bare(n: int) -> int:
    """Dantzig's rule on plain lists of integers, nothing kept: the number of pivots."""
    goal, coefficients, ends = cube(n)
    rows = [[end, *(-value for value in row)] for row, end in zip(coefficients, ends, strict=True)] + [[0, *goal]]
    whole, pivots = 1, 0
    while max(rows[-1][1:]) > 0:
        column = max(range(1, n + 1), key=rows[-1].__getitem__)
        row = -1
        for i in range(n):
            if rows[i][column] < 0 and (row < 0 or rows[i][0] * rows[row][column] > rows[row][0] * rows[i][column]):
                row = i
        whole = turn(rows, row, column, whole)
        pivots += 1
    return pivots


def turn(rows: Rows, row: int, column: int, whole: int) -> int:
    """One integer-preserving pivot in place; the new denominator."""
    new = -rows[row][column]
    turned = rows[row][:]
    turned[column] = -whole
    for i, line in enumerate(rows):
        rate = line[column]
        entries = [(value * new + rate * other) // whole for value, other in zip(line, turned, strict=True)]
        entries[column] = -rate
        rows[i] = turned if i == row else entries
    return new


def peer_pivots(n: int) -> tuple[float, int]:
    """Seconds and pivots of sympy's exact simplex."""
    goal, rows, ends = cube(n)
    x = sympy.symbols(f"x1:{n + 1}")
    pairs = zip(rows, ends, strict=True)
    limits = [sum(value * name for value, name in zip(row, x, strict=True)) <= end for row, end in pairs]
    count, original = 0, peer._pivot

    def counted(*arguments: object) -> object:
        nonlocal count
        count += 1
        return original(*arguments)

    peer._pivot = counted
    try:
        objective = sum(value * name for value, name in zip(goal, x, strict=True))
        spent = seconds(lambda: peer.lpmax(objective, [*limits, *(name >= 0 for name in x)]))
    finally:
        peer._pivot = original
    return spent, count


def seconds(work: Callable[[], object]) -> float:
    """One timed run, in seconds of the processor: other work on the machine counts less."""
    start = time.process_time()
    work()
    return time.process_time() - start


def against_peer(n: int = 5, rounds: int = 7) -> None:
    """The first lines: per pivot beside sympy, with everything a record can be asked, and without."""
    model = model_of(n)
    pivots, count = len(walk(model).pivots), 0
    ours, read, theirs = [], [], []
    for _ in range(rounds):
        ours.append(seconds(lambda: [walk(model) for _ in range(50)]) / pivots / 50)
        read.append(seconds(lambda: [everything(walk(model)) for _ in range(20)]) / pivots / 20)
        spent, count = peer_pivots(n)
        theirs.append(spent / count)
    us, them, full = median(ours), median(theirs), median(read)
    print(f"Klee-Minty n={n}: walk {us * 1e6:.0f} us a pivot ({pivots}), sympy {them * 1e6:.0f} us a pivot ({count})")
    faster, faster_read = median_ratio(theirs, ours), median_ratio(theirs, read)
    print(f"  {faster:.0f}x faster; {faster_read:.0f}x with every record read ({full * 1e6:.0f} us)")


def median_ratio(longer: list[float], shorter: list[float]) -> float:
    """The median of the ratios of neighbouring runs."""
    return median(a / b for a, b in zip(longer, shorter, strict=True))


def everything(kept: Walk) -> None:
    """Read every record of a walk."""
    for pivot in kept.pivots:
        _ = pivot.reduced_costs, pivot.direction, pivot.rates, pivot.ratios, pivot.step, pivot.point_after


def against_bare(n: int = 12, rounds: int = 15) -> None:
    """The last lines: per pivot beside the bare loop, and the memory of all records."""
    model = model_of(n)
    assert bare(n) == len(walk(model).pivots) == 2**n - 1
    pairs = [(seconds(lambda: walk(model)), seconds(lambda: bare(n))) for _ in range(rounds)]
    us, them = (median(times) for times in zip(*pairs, strict=True))
    tracemalloc.start()
    kept = walk(model)
    walked = tracemalloc.get_traced_memory()[1]
    everything(kept)
    read = tracemalloc.get_traced_memory()[1]
    tracemalloc.stop()
    print(f"Klee-Minty n={n}, {len(kept.pivots)} pivots: walk {us:.3f} s, bare integer loop {them:.3f} s")
    print(f"  {median(a / b for a, b in pairs):.2f}x; peak memory {walked / 1e6:.0f} MB, {read / 1e6:.0f} MB all read")


if __name__ == "__main__":
    against_peer()
    against_bare()
