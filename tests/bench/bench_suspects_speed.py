"""How the time of `suspects` grows with the number of constraints: the slope of log(seconds) over log(constraints).

Run: python tests/bench/bench_suspects_speed.py
Three variables, x >= 0 and random capacity rows as people type them; three symptoms: a demand that no plan meets, a
plan refused by one row, a plan let through. Best of three runs. Informs, never fails.
"""

from __future__ import annotations

import random
import time
from math import log

from polywalk.exact import exact
from polywalk.linear import optimum
from polywalk.model import Constraint, Model, Objective
from polywalk.reviewing.suspects import suspects

SIZES = (10, 30, 100)


def capacities(m: int, seed: int = 1) -> Model:
    """x >= 0, random capacity rows, most profit."""
    draw = random.Random(seed)
    units = [[int(i == j) for i in range(3)] for j in range(3)]
    rows = [(f"lower {j}", unit, ">=", 0) for j, unit in enumerate(units)]
    rows += [(f"cap {k}", [draw.randint(1, 20) for _ in range(3)], "<=", draw.randint(20, 60)) for k in range(m - 3)]
    listed = tuple(Constraint(name, tuple(map(exact, row)), sense, exact(rhs)) for name, row, sense, rhs in rows)
    return Model(("x", "y", "z"), listed, Objective("max", tuple(map(exact, (3, 2, 4)))))


def symptoms(m: int) -> dict[str, tuple[Model, dict[str, list[object]]]]:
    """The models and what is said of them."""
    model = capacities(m)
    best = optimum(model).point
    assert best is not None
    demand = capacities(m - 1).with_constraint("demand", {"x": 1, "y": 1, "z": 1}, ">=", 60)
    refused = capacities(m - 1).with_constraint("wrong", {"x": 1, "y": 1, "z": 1}, "<=", sum(best) / 10)
    return {
        "infeasible": (demand, {}),
        "a plan refused": (refused, {"allowed": [tuple(value / 2 for value in best)]}),
        "a plan let through": (model, {"forbidden": [tuple(value / 2 for value in best)]}),
    }


def main() -> None:
    """Print one line a symptom."""
    print(f"{'symptom':<20}" + "".join(f"{m:>8} rows" for m in SIZES) + "   slope 10-100   slips listed at 100")
    for name in symptoms(SIZES[0]):
        times, count = [], 0
        for m in SIZES:
            model, said = symptoms(m)[name]
            runs = []
            for _ in range(3 if m < 100 else 1):
                start = time.perf_counter()
                count = len(suspects(model, **said).found)  # type: ignore[arg-type]
                runs.append(time.perf_counter() - start)
            times.append(min(runs))
        slope = log(times[-1] / times[0]) / log(SIZES[-1] / SIZES[0])
        print(f"{name:<20}" + "".join(f"{t:>11.3f} s" for t in times) + f"{slope:>15.2f}{count:>22}")


if __name__ == "__main__":
    main()
