"""How long a shadow takes beside the linear programs it is made of, and how much memory. Informs, never fails.

Run: python tests/bench/bench_shadow.py
Times are of the processor, since others may work on the machine; each is the least of three rounds, in which peers and
shadow take turns. The peers: "cold", HiGHS solving the model for its own objective, from nothing, with
the tolerance used here; "warm", HiGHS solving it again for a random direction in the kept variables, from the last
basis (mean of 30). The target: 20 cold and half a warm one for each linear program of the shadow; for two variables of
the year 30 cold; at most 2 (vertices + facets) + 10 linear programs; at most 3 times the memory HiGHS takes.
Models: Harbour Row over 900 hours (3,600 variables), onto the tank's level in two hours drawn by seed and the
objective, within 0.5% of the optimum; freight (3,600 variables, seeded, tests/narrowing/freight.py), onto three
totals drawn by seed; Harbour Row over 8,760 hours, onto the pump and the tank of an hour.
"""

from __future__ import annotations

import subprocess
import sys
import time
from collections.abc import Callable, Sequence
from pathlib import Path

import numpy as np

sys.path.insert(0, str(Path(__file__).parents[1] / "narrowing"))

from freight import TOTALS, freight

from polywalk.bigmodel import BigModel
from polywalk.narrowing import Shadow, shadow
from polywalk.narrowing.solver import Solver
from polywalk.scenarios import harbour_year

ROUNDS, WARM = 3, 30


def seconds(*works: Callable[[], object]) -> list[float]:
    """The least processor time of each in a few rounds."""
    least = [float("inf")] * len(works)
    for _ in range(ROUNDS):
        for k, work in enumerate(works):
            start = time.process_time()
            work()
            least[k] = min(least[k], time.process_time() - start)
    return least


def cold(big: BigModel) -> None:
    """HiGHS alone, for the model's own objective."""
    solver = Solver(big)
    solver.aim(range(big.n), (big.cost if big.goal == "max" else -big.cost).tolist())
    solver.run()


def warmed(found: Shadow) -> Solver:
    """A solver that has a basis of the shadow's model."""
    solver = Solver(found.whole)
    solver.aim([found.whole.index(found.model.variables[0])], [1.0])
    solver.run()
    return solver


def warm(found: Shadow, solver: Solver) -> None:
    """WARM more solutions, from the last basis, in random directions of the kept variables."""
    keep = [found.whole.index(name) for name in found.model.variables]
    draw = np.random.default_rng(0)
    for _ in range(WARM):
        solver.aim(keep, draw.normal(size=len(keep)).tolist())
        solver.run()


def line(label: str, big: BigModel, onto: Sequence[str], within: str | None) -> None:
    """One line of the table."""
    found = shadow(big, onto, within=within)
    solver = warmed(found)
    base, one, took = seconds(lambda: cold(big), lambda: warm(found, solver), lambda: shadow(big, onto, within=within))
    one /= WARM
    corners, sides = len(found.region.vertices), len(found.facets)
    target = 20 * base + 0.5 * one * found.programs if len(onto) == 3 else 30 * base
    print(
        f"{label:<24} {corners:>8} {sides:>6} {found.programs:>5} {2 * (corners + sides) + 10:>7} {base:>7.3f} "
        f"{one * 1000:>7.2f} {took:>8.2f} {took / base:>7.1f} {took / target:>9.2f}"
    )


def peak(what: str) -> int:
    """The memory that a process of its own needed beyond the loaded model and libraries, in kB."""
    answer = subprocess.run([sys.executable, __file__, what], capture_output=True, text=True, check=True)
    return int(answer.stdout.split()[-1])


def resident(line: str) -> int:
    """The resident memory of this process in kB: VmRSS now, VmHWM at most since the mark was reset (Linux only)."""
    status = Path("/proc/self/status").read_text(encoding="ascii")
    return int(next(text for text in status.splitlines() if text.startswith(line)).split()[1])


def alone(what: str) -> None:
    """One process: the model and the libraries are there already, then HiGHS's own solution, or the shadow."""
    big = harbour_year()
    shadow(harbour_year(24), ("pump[7]", "tank[7]"), exact=False)
    Path("/proc/self/clear_refs").write_text("5", encoding="ascii")
    before = resident("VmRSS")
    if what == "highs":
        cold(big)
    else:
        shadow(big, ("pump[7]", "tank[7]"))
    print(resident("VmHWM") - before)


def main() -> None:
    """Print one line for each model, then the memory."""
    if len(sys.argv) > 1:
        alone(sys.argv[1])
        return
    print("model                    vertices facets   LPs allowed  cold s warm ms shadow s /cold   of target")
    hours = harbour_year(900)
    for seed in (1, 2, 3):
        first, second = sorted(np.random.default_rng(seed).choice(np.arange(1, 901), 2, replace=False))
        line(f"900 hours, seed {seed}", hours, (f"level[{first}]", f"level[{second}]", "objective"), "0.5%")
    for seed in (1, 2, 3):
        totals = np.random.default_rng(seed).choice(TOTALS, 3, replace=False)
        line(f"freight, seed {seed}", freight(seed), [f"total[{k}]" for k in totals], None)
    line("8,760 hours", harbour_year(), ("pump[7]", "tank[7]"), None)
    line("8,760 hours, within 1%", harbour_year(), ("pump[7]", "tank[7]"), "1%")
    highs, ours = peak("highs"), peak("shadow")
    print(f"memory, 8,760 hours: HiGHS {highs / 1024:.0f} MB, shadow {ours / 1024:.0f} MB, ratio {ours / highs:.2f}")


if __name__ == "__main__":
    main()
