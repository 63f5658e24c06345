"""Live HiGHS objects: what is taken over, under which names, and what is refused."""

import numpy as np
import pytest

import polywalk as pw
from polywalk.errors import ModelError
from polywalk.reading.highs import highspy, quiet_solver

INF = np.inf


def plant(rowwise=False, **changes):
    """maximize 3 x + 2 y + 1 with 1 <= x + y <= 4, x = 2 y."""
    module = highspy()
    program = module.HighsLp()
    program.num_col_, program.num_row_ = 2, 2
    program.col_cost_, program.offset_ = np.array([3.0, 2]), 1.0
    program.col_lower_, program.col_upper_ = np.array([0, -INF]), np.array([5, INF])
    program.row_lower_, program.row_upper_ = np.array([1.0, 0]), np.array([4.0, 0])
    held = program.a_matrix_
    kinds = module.MatrixFormat
    held.format_ = kinds.kRowwise if rowwise else kinds.kColwise
    held.start_ = np.array([0, 2, 4])
    held.index_ = np.array([0, 1, 0, 1])
    held.value_ = np.array([1.0, 1, 1, -2])
    program.sense_ = module.ObjSense.kMaximize
    program.col_names_, program.row_names_ = ["x", "y"], ["sum", "tie"]
    for label, value in changes.items():
        setattr(program, label, value)
    solver = quiet_solver()
    solver.passModel(program)
    return solver


@pytest.mark.parametrize("rowwise", [False, True])
def test_everything_is_taken_over(rowwise):
    big = pw.from_highs(plant(rowwise), name="plant")
    across = [[1, 1], [1, -2]]
    assert big.csr().toarray().tolist() == (across if rowwise else np.transpose(across).tolist())
    assert (big.variables, big.rows, big.goal, big.constant, big.name) == (
        ("x", "y"),
        ("sum", "tie"),
        "max",
        1,
        "plant",
    )
    assert [*big.row_lower, *big.row_upper, *big.lower, *big.upper] == [1, 0, 4, 0, 0, -INF, 5, INF]
    assert big.cost.tolist() == [3, 2]


def test_names_that_are_not_there_are_made_up():
    big = pw.from_highs(plant(col_names_=[], row_names_=[]))
    assert (big.variables, big.rows) == (("x1", "x2"), ("row 1", "row 2"))


def test_integer_marks_and_no_objective():
    kinds = highspy().HighsVarType
    big = pw.from_highs(plant(integrality_=[kinds.kContinuous, kinds.kInteger], col_cost_=np.zeros(2), offset_=0.0))
    assert (big.integers, big.goal) == (("y",), None)


def test_semi_continuous_variables_are_refused():
    kinds = highspy().HighsVarType
    solver = plant(integrality_=[kinds.kSemiContinuous, kinds.kContinuous])
    with pytest.raises(ModelError, match="'x' is semi-continuous"):
        pw.from_highs(solver)


def test_a_quadratic_objective_is_refused():
    module, solver = highspy(), plant(sense_=highspy().ObjSense.kMinimize)
    hessian = module.HighsHessian()
    hessian.dim_, hessian.format_ = 2, module.HessianFormat.kTriangular
    hessian.start_, hessian.index_, hessian.value_ = np.array([0, 1, 1]), np.array([0]), np.array([2.0])
    solver.passHessian(hessian)
    with pytest.raises(ModelError, match="quadratic"):
        pw.from_highs(solver)


def test_what_is_no_solver_and_what_holds_no_model():
    with pytest.raises(ModelError, match=r"expected a highspy\.Highs object, got str"):
        pw.from_highs("plant.mps")
    with pytest.raises(ModelError, match="expected a highspy"):
        pw.from_highs(highspy().Highs)
    with pytest.raises(ModelError, match="at least one variable"):
        pw.from_highs(quiet_solver())


def test_names_given_twice_get_a_number_and_a_note():
    big = pw.from_highs(plant(col_names_=["load", "load"], row_names_=["load", ""]))
    assert (big.variables, big.rows) == (("load", "load (2)"), ("load", "row 2"))
    assert big.notes == ("1 variable got a number, since another has the name: 'load'",)
    assert big.row("load") == {"load": 1, "load (2)": 1}


def test_names_that_are_made_up_are_new():
    big = pw.from_highs(plant(col_names_=["x2", ""], row_names_=["row 2", ""]))
    assert (big.variables, big.rows, big.notes) == (("x2", "x2 (2)"), ("row 2", "row 2 (2)"), ())


def test_the_object_is_left_as_it_was():
    solver = plant()
    solver.run()
    before = solver.getInfoValue("objective_function_value")[1]
    pw.from_highs(solver)
    assert solver.getInfoValue("objective_function_value")[1] == before
