"""Two processes against one on the same sweep, in one run: the review of many hours of a plant.

    python tests/bench/bench_sweep.py [hours]

The ratio is that of wall-clock times, each pool started beforehand; target 1.7 where two processors are idle. Short
rounds alternate, and the best round of each side is compared beside the medians: the best one met the idlest machine.
"""

import sys
import time
from concurrent.futures import ProcessPoolExecutor
from dataclasses import replace
from statistics import median

import polywalk as pw


def hours(count):
    """Harbour Row with what the town takes in that hour of the year."""
    year = pw.scenarios.harbour_year()
    row = pw.scenarios.harbour_row()
    for hour in range(1, count + 1):
        demand = float(year.row_lower[year.row_index(f"demand[{hour}]")])
        yield replace(row.with_rhs("harbour main", demand), name=f"hour {hour}")


def timed(models, what, workers):
    """Seconds of one sweep in a pool that is warm."""
    with ProcessPoolExecutor(workers) as pool:
        pw.sweep(models[:100], what=what, executor=pool)
        start = time.perf_counter()
        found = pw.sweep(models, what=what, executor=pool)
        return time.perf_counter() - start, found


def main(count, rounds=9):
    """Print the best and the median round of each side, their ratios, and the groups found."""
    models = list(hours(count))
    for what in ("region", "review"):
        one, two = [], []
        for _ in range(rounds):
            for times, workers in ((one, 1), (two, 2)):
                spent, found = timed(models, what, workers)
                times.append(spent)
        for name, middle in (("best", min), ("median", median)):
            a, b = middle(one), middle(two)
            print(f"{what} of {count} hours, {name} of {rounds}: 1 process {a:.2f} s, 2 {b:.2f} s, ratio {a / b:.2f}")
    print(found)


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else 500)
