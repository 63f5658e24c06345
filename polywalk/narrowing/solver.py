"""HiGHS, silent and warm: one object that keeps its basis while only the costs change.

Changed costs leave a basis feasible, so the primal simplex method goes on from where it stood.

References
----------
Huangfu & Hall, Parallelizing the dual revised simplex method, Math. Prog. Comp. 10, 2018 (HiGHS).
"""

from __future__ import annotations

from collections.abc import Sequence
from threading import Event, Thread
from time import monotonic
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

from polywalk.bigmodel import BigModel
from polywalk.errors import SolverError
from polywalk.narrowing.rescaling import SMALLEST, row_factors
from polywalk.narrowing.tolerances import TOLERANCES
from polywalk.reading.highs import highspy, quiet_solver

Status = Literal["optimal", "infeasible", "unbounded", "unclear"]

DIRECT = 2_000
"""Nonzeros up to which a first run is short."""

SHORT = 0.1
"""Seconds: after a run shorter than this the next one stays in this thread, since Ctrl-C can wait for it."""

LONGEST = 0.4
"""Seconds after which a run in this thread is stopped, to go on in one of its own."""

SLOWER, FEW = 10, 2_000
"""An iteration from an old basis takes about ten times one from nothing, where presolve has made the model smaller (so
measured on a year of 8,760 hours): past a tenth of the iterations of the first run, and a few, starting anew wins."""

UNKNOWN = 100_000
"""Iterations taken for those of a first run that was not made here."""

PATIENCE = 0.7
"""Seconds an interrupted HiGHS may take to stop before it is left alone: Ctrl-C answers within a second."""


def precise_solver() -> Any:
    """A quiet Highs object with this room's tighter tolerances, that keeps every coefficient it can."""
    found = quiet_solver()
    for name in ("primal_feasibility_tolerance", "dual_feasibility_tolerance"):
        found.setOptionValue(name, TOLERANCES.solver)
    found.setOptionValue("small_matrix_value", SMALLEST)
    found.setOptionValue("infinite_bound", float("inf"))  # a side of 1e20 is one
    return found


class Solver:
    """A linear program in HiGHS; integer marks are left out (the relaxation).

    Parameters
    ----------
    big : BigModel
        Its own objective is not taken over; costs are set by `aim`.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing.solver import Solver
    >>> solver = Solver(BigModel(("x", "y"), ("sum",), [0, 2], [0, 1], [1, 1], [1], [4], [0, 0], [3, 3]))
    >>> solver.aim([0, 1], [2, 1])
    >>> solver.run(), solver.point().tolist(), solver.runs
    ('optimal', [3.0, 1.0], 1)
    """

    def __init__(self, big: BigModel) -> None:
        self.big, self.runs = big, 0
        self._lasts = self._expected()
        self._cold_iterations: int | None = None
        self._factors = row_factors(big)
        self._module = highspy()
        self._solver = precise_solver()
        self._load()

    def _load(self) -> None:
        big, program = self.big, self._module.HighsLp()
        program.num_col_, program.num_row_ = big.n, big.m
        program.col_cost_ = np.zeros(big.n)
        program.col_lower_, program.col_upper_ = big.lower, big.upper
        program.row_lower_, program.row_upper_ = (side * self._factors for side in (big.row_lower, big.row_upper))
        program.a_matrix_.format_ = self._module.MatrixFormat.kRowwise
        program.a_matrix_.start_, program.a_matrix_.index_ = big.indptr, big.indices
        program.a_matrix_.value_ = big.data * np.repeat(self._factors, np.diff(big.indptr))
        program.sense_ = self._module.ObjSense.kMaximize
        if self._solver.passModel(program) == self._module.HighsStatus.kError:
            raise SolverError("HiGHS refused the model; look for numbers that are infinite or not numbers.", big.name)

    def _expected(self) -> float:
        """How long a run from nothing takes, roughly: 0 for no time."""
        return 0.0 if self.big.nonzeros <= DIRECT else SHORT

    def aim(self, places: Sequence[int], values: Sequence[float]) -> None:
        """What to maximize: the costs of these columns; the others keep theirs."""
        columns = np.array(places, dtype=np.int32)
        self._solver.changeColsCost(len(columns), columns, np.array(values, dtype=np.float64))

    def bound(self, places: Sequence[int], lower: Sequence[float], upper: Sequence[float]) -> None:
        """Other bounds for these columns."""
        columns = np.array(places, dtype=np.int32)
        self._solver.changeColsBounds(len(columns), columns, np.array(lower, float), np.array(upper, float))

    def run(self) -> Status:
        """Solve, from the last basis if there is one.

        Raises
        ------
        KeyboardInterrupt
            Within a second after Ctrl-C; the solver must not be used again.
        """
        self.runs += 1
        begun = monotonic()
        if self._lasts >= SHORT or not self._run_here():
            self._run_apart()
        self._lasts = monotonic() - begun
        status, names = self._solver.getModelStatus(), self._module.HighsModelStatus
        if status == names.kIterationLimit:  # too far from the last basis: from nothing, presolved, it is faster
            self.forget()
            return self.run()
        self._warm()
        told: dict[Any, Status] = {
            names.kOptimal: "optimal",
            names.kModelEmpty: "optimal",
            names.kInfeasible: "infeasible",
            names.kUnbounded: "unbounded",
        }
        return told.get(status, "unclear")

    def _warm(self) -> None:
        """There is a basis: primal from now on, and not for ever."""
        if self._cold_iterations is None:
            self._cold_iterations = int(self._solver.getInfo().simplex_iteration_count)
        self._solver.setOptionValue("simplex_strategy", 4)
        self._solver.setOptionValue("simplex_iteration_limit", FEW + max(self._cold_iterations, 0) // SLOWER)

    def _run_here(self) -> bool:
        """Run in this thread, where Ctrl-C has to wait; False where it took too long for that and was stopped."""
        self._solver.setOptionValue("time_limit", self._solver.getRunTime() + LONGEST)  # it counts all runs so far
        self._solver.run()
        self._solver.setOptionValue("time_limit", float("inf"))
        return bool(self._solver.getModelStatus() != self._module.HighsModelStatus.kTimeLimit)

    def _run_apart(self) -> None:
        """Run in a thread of its own, which Ctrl-C stops."""
        done = Event()
        self._solver.HandleUserInterrupt = True

        def work() -> None:
            try:
                self._solver.run()
            finally:
                done.set()

        Thread(target=work, daemon=True).start()
        try:
            done.wait()
        except KeyboardInterrupt:
            self._solver.cancelSolve()
            done.wait(PATIENCE)
            raise
        self._solver.HandleUserInterrupt = False  # a run in this thread must not be called back: Ctrl-C strikes there

    def forget(self) -> None:
        """Drop the basis: the next run starts cold."""
        self._solver.clearSolver()
        self._solver.setOptionValue("simplex_strategy", 1)
        self._solver.setOptionValue("simplex_iteration_limit", 2**31 - 1)
        self._cold_iterations = None
        self._lasts = self._expected()

    def standing(self) -> Any:
        """The last basis, for `stand_at`."""
        return self._solver.getBasis()

    def stand_at(self, basis: Any) -> None:
        """Start the next run from a basis this solver had."""
        self._solver.setBasis(basis)

    def restore(self, statuses: tuple[list[int], list[int]]) -> None:
        """Start the next run from this basis, a plan."""
        kinds = [self._module.HighsBasisStatus(k) for k in range(5)]
        basis = self._module.HighsBasis()
        basis.col_status, basis.row_status = ([kinds[one] for one in side] for side in statuses)
        basis.valid = True
        self._solver.setBasis(basis)
        self._cold_iterations = UNKNOWN
        self._warm()

    @property
    def value(self) -> float:
        """The value of the aim at the last point."""
        return float(self._solver.getInfoValue("objective_function_value")[1])

    def point(self) -> Any:
        """The last point, (n,) floats."""
        return _floats(self._solver.getSolution().col_value)

    def values(self, places: Sequence[int]) -> list[float]:
        """The values of these columns at the last point."""
        found = self._solver.getSolution().col_value
        return [found[j] for j in places]

    def duals(self) -> tuple[Any, Any]:
        """The last multipliers of rows and reduced costs of columns, (m,) and (n,) floats."""
        found = self._solver.getSolution()
        return _floats(found.row_dual) * self._factors, _floats(found.col_dual)

    def contradiction(self) -> Any | None:
        """Multipliers of rows that, with the bounds, contradict each other, (m,) floats; None where HiGHS has none.

        A run anew: presolve would end it before there are any.
        """
        self._solver.setOptionValue("presolve", "off")
        self.forget()
        self.run()
        self._solver.setOptionValue("presolve", "choose")
        _, there, values = self._solver.getDualRay()
        return np.array(values) * self._factors if there else None

    def ray(self) -> Any | None:
        """The ray along which the last run found no end, (n,) floats; None where HiGHS keeps none."""
        _, there, values = self._solver.getPrimalRay()
        return np.array(values) if there else None

    def basis(self) -> tuple[list[int], list[int]] | None:
        """The last basis, of columns and of rows: 0 at the lower side, 1 basic, 2 at the upper side, 3 at zero."""
        found = self._solver.getBasis()
        if not found.valid:
            return None
        return [int(one) for one in found.col_status], [int(one) for one in found.row_status]

    @property
    def status_text(self) -> str:
        """HiGHS's own word for how the last run ended."""
        return str(self._solver.modelStatusToString(self._solver.getModelStatus()))


def _floats(values: list[float]) -> NDArray[np.float64]:
    """As np.array, in a third of the time: a shadow asks hundreds of times for thousands of numbers."""
    return np.fromiter(values, np.float64, len(values))
