"""Two processes against one on the same sweep, in one run: the review of many hours of a plant.

    python tests/bench/bench_sweep.py [hours]

The ratio is that of wall-clock times, each pool started beforehand; target 1.7 where two processors are idle.
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


def main(count, rounds=3):
    """Print both times, alternating so that a busy machine meets both, the median ratio, and the groups found."""
    models = list(hours(count))
    for what in ("region", "review"):
        ratios = []
        for _ in range(rounds):
            one, found = timed(models, what, 1)
            two, again = timed(models, what, 2)
            assert found == again
            ratios.append(one / two)
            print(f"{what} of {count} hours: 1 process {one:.1f} s, 2 processes {two:.1f} s, ratio {one / two:.2f}")
        print(f"{what}: median ratio {median(ratios):.2f}")
    print(found)


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else 500)
