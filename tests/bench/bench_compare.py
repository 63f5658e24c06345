"""How long `compare` of all rules over all vertices takes, in bare enumerations by cdd.gmp of the same rows.

Run: python tests/bench/bench_compare.py
The two families of bench_region.py, three variables, twenty rows, five random models each. The target is 40 bare
enumerations. Beside it the same walks one by one, each from the model, which is what sharing saves. Neighbouring runs
are compared and the median ratio is taken, since other work on the machine disturbs neighbours alike. Informs, never
fails.
"""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction
from statistics import median

from bench_region import bare, capacities, model_of, seconds, tangents

from polywalk.model import Model, Objective
from polywalk.region import region
from polywalk.walks import ENTERING, compare, walk

ROWS, MODELS, ROUNDS = 20, 5, 7


def aimed(rows: list[list[Fraction]]) -> Model:
    """The rows as a model with something to maximize."""
    return replace(model_of(rows), objective=Objective("max", (Fraction(3), Fraction(2), Fraction(4))))


def one_by_one(model: Model) -> None:
    """Every rule from every vertex without sharing anything."""
    for vertex in region(model).vertices:
        for rule in ENTERING:
            walk(model, rule.name, start=vertex)


def main() -> None:
    """Print one line for each model."""
    print(f"{len(ENTERING)} rules, {ROWS} rows, 3 variables")
    print("family      vertices  walks  pivots  bare ms  compare ms  ratio  one by one")
    for family in (capacities, tangents):
        for seed in range(1, MODELS + 1):
            rows = family(ROWS, seed)
            model = aimed(rows)
            found = compare(model, starts="vertices")
            times = [
                (seconds(lambda: bare(rows)), seconds(lambda: compare(model, starts="vertices")))  # noqa: B023
                for _ in range(ROUNDS)
            ]
            ratio = median(ours / theirs for theirs, ours in times)
            base, ours = (median(side) * 1000 for side in zip(*times, strict=True))
            alone = seconds(lambda: one_by_one(model)) * 1000  # noqa: B023
            pivots = sum(tally.pivots for tally in found.tallies)
            counts = f"{len(found.starts):>8}  {len(found.tallies):>5}  {pivots:>6}"
            print(
                f"{family.__name__:<10}  {counts}  {base:>7.2f}  {ours:>10.1f}  {ratio:>5.1f}  {alone / base:>10.0f}",
                flush=True,
            )


if __name__ == "__main__":
    main()
