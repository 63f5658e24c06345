"""Models held by HiGHS: the package, a solver that keeps quiet, and the sparse model of a live one."""

from __future__ import annotations

import os
from collections.abc import Sequence
from typing import Any

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.bigmodel.telling import counted
from polywalk.errors import ModelError, SolverError


def highspy() -> Any:
    """The package highspy, or the error that says how to get it."""
    try:
        import highspy as found
    except ImportError as missing:
        raise SolverError(
            "expected the package highspy, which reads files and solves large models, and it is not installed; "
            "install it with: pip install highspy."
        ) from missing
    return found


def quiet_solver() -> Any:
    """A Highs object that writes nothing; the first one of a process would print a banner from C."""
    module = highspy()
    try:
        kept = os.dup(1)
    except OSError:  # no standard output to keep quiet
        kept = None
    try:
        if kept is not None:
            with open(os.devnull, "wb") as nowhere:
                os.dup2(nowhere.fileno(), 1)
        found = module.Highs()
    finally:
        if kept is not None:
            os.dup2(kept, 1)
            os.close(kept)
    found.setOptionValue("output_flag", False)
    return found


def from_highs(solver: Any, *, name: str = "", notes: Sequence[str] = ()) -> BigModel:
    """The model that a live HiGHS object holds, which open-source modelling libraries can hand over.

    The object is only read. Numbers are the floats HiGHS keeps; coefficients of 1e-9 and less are gone by then, unless
    the object's option small_matrix_value says otherwise.

    Parameters
    ----------
    solver : highspy.Highs
    name : str, optional
        Shown in titles; by default the name HiGHS knows.
    notes : sequence of str, optional
        Lines to keep with the model.

    Returns
    -------
    BigModel
        Columns and rows without a name are called "x1", "row 1" and so on; of several of one name all but the first
        get a number, "pump (2)", and a note says so. An objective without any coefficient and constant is no objective.

    Raises
    ------
    ModelError
        Anything that is no such object, a quadratic objective, semi-continuous variables, a model without columns.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reading.highs import quiet_solver
    >>> solver = quiet_solver()
    >>> x, y = solver.addVariable(lb=0, ub=4, name="x"), solver.addVariable(lb=0, name="y")
    >>> row = solver.addConstr(x + 2 * y <= 6, name="labour")
    >>> pw.from_highs(solver).row("labour")
    {'x': 1.0, 'y': 2.0}

    References
    ----------
    Huangfu & Hall, Parallelizing the dual revised simplex method, Math. Prog. Comp. 10, 2018 (HiGHS).
    """
    if isinstance(solver, type) or not (hasattr(solver, "getLp") and hasattr(solver, "getHessianNumNz")):
        raise ModelError(f"expected a highspy.Highs object, got {type(solver).__name__}.", solver)
    if solver.getHessianNumNz():
        raise ModelError("the objective is quadratic; only its linear part would be left. Drop it first.", "objective")
    program = solver.getLp()
    variables, told = _names(program.col_names_, program.num_col_, "x")
    rows, told_too = _names(program.row_names_, program.num_row_, "row ")
    cost, constant = np.array(program.col_cost_, dtype=float), float(program.offset_)
    maximize = program.sense_ == highspy().ObjSense.kMaximize
    matrix = _by_rows(program)
    return BigModel(
        variables=variables,
        rows=rows,
        indptr=matrix.indptr,
        indices=matrix.indices,
        data=matrix.data,
        row_lower=np.array(program.row_lower_),
        row_upper=np.array(program.row_upper_),
        lower=np.array(program.col_lower_),
        upper=np.array(program.col_upper_),
        cost=cost,
        goal=("max" if maximize else "min") if cost.any() or constant else None,
        constant=constant,
        integers=_integers(program.integrality_, variables),
        name=name or program.model_name_,
        notes=(*notes, *told, *told_too),
    )


def _names(given: Sequence[str], count: int, stem: str) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """The names HiGHS keeps, which may be none, fewer than there are, empty, or the same; and what was altered."""
    listed = [*given, *[""] * (count - len(given))]
    taken, found, twice = {*listed}, list[str](), list[str]()
    seen = set[str]()
    for number, name in enumerate(listed, 1):
        called = name or f"{stem}{number}"
        if name in seen if name else called in taken:
            twice += [name] if name else []
            called = _free(called, taken)
        seen.add(name)
        taken.add(called)
        found.append(called)
    if not twice:
        return tuple(found), ()
    what = counted(len(twice), "variable" if stem == "x" else "row")
    shown = ", ".join(repr(name) for name in dict.fromkeys(twice[:3]))
    return tuple(found), (f"{what} got a number, since another has the name: {shown}",)


def _free(name: str, taken: set[str]) -> str:
    """The name with the first number that makes it a new one."""
    number = 2
    while f"{name} ({number})" in taken:
        number += 1
    return f"{name} ({number})"


def _integers(marks: Sequence[Any], variables: tuple[str, ...]) -> tuple[str, ...]:
    kinds = highspy().HighsVarType
    for name, mark in zip(variables, marks, strict=False):  # no marks at all: everything continuous
        if mark not in (kinds.kContinuous, kinds.kInteger):
            raise ModelError(f"{name!r} is semi-continuous, which is no linear region; give it plain bounds.", name)
    return tuple(name for name, mark in zip(variables, marks, strict=False) if mark == kinds.kInteger)


def _by_rows(program: Any) -> Any:
    from scipy.sparse import csc_array, csr_array

    held = program.a_matrix_
    rowwise = held.format_ == highspy().MatrixFormat.kRowwise
    parts = (np.array(held.value_, dtype=float), np.array(held.index_, dtype=int), np.array(held.start_, dtype=int))
    matrix = (csr_array if rowwise else csc_array)(parts, shape=(program.num_row_, program.num_col_)).tocsr()
    matrix.sort_indices()
    return matrix
