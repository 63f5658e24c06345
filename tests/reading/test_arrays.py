"""from_arrays against scipy.optimize.linprog itself, and the traps of its arguments (measured on scipy 1.17)."""

import random
from decimal import Decimal
from fractions import Fraction

import numpy as np
import pandas as pd
import pytest
from reading.scipy_model import solve
from scipy import sparse
from scipy.optimize import Bounds, linprog

import polywalk as pw
from polywalk.errors import DuplicateName, ModelError, NumberError

CASES = 250


def _random_bounds(rng, n):
    """One of linprog's forms, a third of them with open ends."""

    def ends():
        low = rng.choice([None, -np.inf, 0, -2, 1])
        high = rng.choice([None, np.inf, 3, 4, 5])
        return (low, high)

    mixed = np.array([[rng.choice([-np.inf, 0, -1]), rng.choice([2, 3, np.inf])] for _ in range(n)], dtype=float)
    return rng.choice([None, ends(), [ends()], [ends() for _ in range(n)], mixed, [], [[0], [4]]])


def _random_problem(rng):
    n, m, k = rng.randint(1, 4), rng.randint(0, 5), rng.choice([0, 0, 0, 1])
    whole = lambda rows: np.array([[rng.randint(-3, 4) for _ in range(n)] for _ in range(rows)], dtype=float)  # noqa: E731
    c = np.array([rng.randint(-4, 5) for _ in range(n)], dtype=float)
    upper, upper_side = (whole(m), np.array([float(rng.randint(-3, 9)) for _ in range(m)])) if m else (None, None)
    equal, equal_side = (whole(k), np.array([float(rng.randint(0, 4)) for _ in range(k)])) if k else (None, None)
    return c, upper, upper_side, equal, equal_side, _random_bounds(rng, n)


def _agrees(expected, model):
    status, value = solve(model)
    assert status == expected.status
    if status == 0:
        assert value == pytest.approx(expected.fun, abs=1e-7)
    return status


def test_random_arguments_mean_what_they_mean_to_linprog():
    rng = random.Random(1)
    seen = {0: 0, 2: 0, 3: 0}
    for _ in range(CASES):
        problem = _random_problem(rng)
        expected = linprog(*problem)
        if expected.status == 4:  # HiGHS gave up between infeasible and unbounded: nothing to compare
            continue
        seen[_agrees(expected, pw.from_arrays(*problem))] += 1
    assert seen[0] >= 100
    assert seen[2] >= 20
    assert seen[3] >= 20


def test_shuffled_pandas_objects_are_aligned_by_label():
    """Unshuffled numpy arrays in linprog are the reference: a reordered Series must not change the optimum."""
    rng = random.Random(2)
    solved = 0
    for _ in range(CASES):
        n, m = rng.randint(2, 4), rng.randint(2, 4)
        c = np.array([rng.randint(-5, -1) for _ in range(n)], dtype=float)
        a = np.array([[rng.randint(0, 4) for _ in range(n)] for _ in range(m)], dtype=float)
        b = np.array([rng.randint(1, 9) for _ in range(m)], dtype=float)
        top = np.array([rng.randint(1, 6) for _ in range(n)], dtype=float)
        names, rows = [f"v{j}" for j in range(n)], [f"r{i}" for i in range(m)]
        mix = lambda listed: rng.sample(listed, len(listed))  # noqa: E731
        frame = pd.DataFrame(a, index=rows, columns=names).loc[mix(rows), mix(names)]
        ends = pd.DataFrame({"low": 0.0, "high": top}, index=names).loc[mix(names)]
        model = pw.from_arrays(pd.Series(c, names)[mix(names)], frame, pd.Series(b, rows)[mix(rows)], bounds=ends)
        expected = linprog(c, a, b, bounds=list(zip([0] * n, top, strict=True)))
        solved += _agrees(expected, model) == 0
        for i, row in enumerate(rows):
            kept = model.constraint(row)
            assert kept.rhs == b[i]
            assert all(kept.coefficients[model.index(name)] == a[i, j] for j, name in enumerate(names))
    assert solved == CASES


def test_default_bounds_are_named_constraints():
    for model in (pw.from_arrays([1, 1]), pw.from_arrays([1, 1], bounds=None), pw.from_arrays([1, 1], bounds=[])):
        assert [(row.name, row.sense, row.rhs, row.origin) for row in model.constraints] == [
            ("x1 lower", ">=", 0, "linprog's default"),
            ("x2 lower", ">=", 0, "linprog's default"),
        ]
    assert {row.origin for row in pw.from_arrays([1, 1], bounds=(0, None)).constraints} == {"bounds"}


def test_two_pairs_for_two_variables_are_pairs():
    model = pw.from_arrays([-1, -1], bounds=[(0, 1), (0, 2)])
    assert (model.constraint("x1 upper").rhs, model.constraint("x2 upper").rhs) == (1, 2)
    expected = linprog([-1, -1], bounds=[(0, 1), (0, 2)])
    assert solve(model)[1] == pytest.approx(expected.fun)


def test_lower_and_upper_vectors_are_refused_with_the_remedy():
    with pytest.raises(ValueError, match="x 2 array"):  # scipy refuses them too
        linprog([1, 1, 1], bounds=[(0, 0, 0), (1, 1, 1)])
    with pytest.raises(ModelError, match=r"got 2 vectors of 3; pass list\(zip"):
        pw.from_arrays([1, 1, 1], bounds=[(0, 0, 0), (1, 1, 1)])
    with pytest.raises(ModelError, match=r"got an array of shape \(4, 2\)"):
        pw.from_arrays([1, 1, 1], bounds=[(0, 1)] * 4)


def test_bounds_objects_and_equal_bounds():
    model = pw.from_arrays([1, 1, 1], bounds=Bounds([0, -np.inf, 2], [1, np.inf, 2]))
    assert [row.name for row in model.constraints] == ["x1 lower", "x1 upper", "x3 fixed"]
    assert model.constraint("x3 fixed").sense == "=="
    assert model.free == ("x2",)
    spread = pw.from_arrays([1, 1, 1], bounds=Bounds(0, 2))
    assert len(spread.constraints) == 6
    with pytest.raises(ModelError, match="expected 3 entries of lb, one a variable, got 2"):
        pw.from_arrays([1, 1, 1], bounds=Bounds([0, 0], [1, 1]))


def test_one_dimension_is_one_row_and_sparse_is_read():
    rows = [
        np.array([1, 2]),
        [1, 2],
        [[1, 2]],
        sparse.csr_array([[1, 2]]),
        sparse.coo_matrix([[1, 2]]),
        sparse.coo_array([1, 2]),
        pd.DataFrame([[1, 2]]),
    ]
    models = [pw.from_arrays([1, 1], row, [4]) for row in rows]
    assert all(model == models[0] for model in models)
    assert models[0].constraint("row 1").coefficients == (1, 2)


def test_duplicate_entries_of_a_coordinate_array_add_up():
    twice = sparse.coo_array(([1.0, 2.0], ([0, 0], [1, 1])), shape=(1, 2))
    assert pw.from_arrays([1, 1], twice, [4]).constraint("row 1").coefficients == (0, 3)


def test_exact_values_stay_exact():
    model = pw.from_arrays(
        [Fraction(1, 3), Decimal("0.1")],
        [["1/7", 0.1], [np.float32(0.1), 2**70 + 1]],
        np.array([0.3, 1e-3]),
        bounds=[("1/3", None), (None, Decimal("2.5"))],
    )
    assert model.objective.coefficients == (Fraction(1, 3), Fraction(1, 10))
    assert model.constraint("row 1").coefficients == (Fraction(1, 7), Fraction(1, 10))
    assert model.constraint("row 2").coefficients == (Fraction(1, 10), 2**70 + 1)
    assert model.constraint("row 1").rhs == Fraction(3, 10)
    assert model.constraint("x1 lower").rhs == Fraction(1, 3)
    assert model.constraint("x2 upper").rhs == Fraction(5, 2)


def test_a_table_keeps_the_type_of_each_column():
    """numpy would turn both columns into doubles: the large integer would be rounded, the 0.1 get binary noise."""
    table = pd.DataFrame({"a": [2**60 + 1], "b": np.array([0.1], dtype=np.float32)})
    row = pw.from_arrays([1, 1], table, [1]).constraint("row 1")
    assert row.coefficients == (2**60 + 1, Fraction(1, 10))
    assert float(table.to_numpy(dtype=float)[0, 0]) != 2**60 + 1


def test_truth_values_are_zero_and_one_as_they_are_to_linprog():
    model = pw.from_arrays([1, 1], np.array([[True, False]]), [4])
    assert model.constraint("row 1").coefficients == (1, 0)


def test_labels_become_names():
    plain = pd.DataFrame([[1, 2], [3, 4]], columns=["pump", "tank"], index=["heat", "grid"])
    model = pw.from_arrays([1, 1], plain, [5, 6])
    assert model.variables == ("pump", "tank")
    assert [row.name for row in model.constraints[:2]] == ["heat", "grid"]
    many = pd.MultiIndex.from_tuples([("pump", 7), ("pump", 8)])
    assert pw.from_arrays(pd.Series([1, 2], many)).variables == ("pump[7]", "pump[8]")
    odd = pw.from_arrays(pd.Series([1, 2], [10, 20]), pd.DataFrame([[3, 4]], index=[5], columns=[20, 10]), [1])
    assert odd.variables == ("x[10]", "x[20]")
    assert odd.constraint("row 5").coefficients == (4, 3)


def test_a_shuffled_numbering_is_aligned_with_a_numbering():
    c = pd.Series([1.0, 2.0, 3.0]).iloc[[2, 0, 1]]
    table = pd.DataFrame([[10, 20, 30]])
    model = pw.from_arrays(c, table, [1])
    assert dict(zip(model.variables, model.objective.coefficients, strict=True)) == {"x[2]": 3, "x[0]": 1, "x[1]": 2}
    row = model.constraint("row 1")
    assert dict(zip(model.variables, row.coefficients, strict=True)) == {"x[2]": 30, "x[0]": 10, "x[1]": 20}


def test_a_numbering_beside_names_goes_by_position():
    model = pw.from_arrays(pd.Series([1, 2]), pd.DataFrame([[3, 4]], columns=["b", "a"]), pd.Series([5]))
    assert model.variables == ("b", "a")
    assert model.objective.coefficients == (1, 2)


def test_given_names_name_everything():
    model = pw.from_arrays(
        [1, 1], [[1, 2]], [3], [[1, 0]], [1], variables=["a", "b"], rows=["heat"], equalities=["fixed a"], name="two"
    )
    assert model.variables == ("a", "b")
    assert [row.name for row in model.constraints[:2]] == ["heat", "fixed a"]
    assert model.name == "two"
    with pytest.raises(ModelError, match="expected 2 names of variables, got 1: a"):
        pw.from_arrays([1, 1], variables=["a"])


def test_different_labels_are_refused_by_name():
    c = pd.Series([1, 2], ["pump", "tank"])
    with pytest.raises(ModelError, match=r"A_ub: its labels .* lacks tank and has chips instead"):
        pw.from_arrays(c, pd.DataFrame([[1, 2]], columns=["pump", "chips"]), [1])
    with pytest.raises(ModelError, match="b_ub: its labels are not those of the rows"):
        pw.from_arrays(c, pd.DataFrame([[1, 2]], index=["heat"], columns=c.index), pd.Series([1], ["grid"]))
    with pytest.raises(DuplicateName, match="'pump' occurs twice") as caught:
        pw.from_arrays(pd.Series([1, 2], ["pump", "pump"]))
    assert caught.value.culprit == "pump"


@pytest.mark.parametrize("value", [float("nan"), np.float32("nan"), Decimal("nan"), pd.NA, None])
def test_missing_numbers_are_refused_by_row_and_column(value):
    with pytest.raises(NumberError, match="A_ub, row 'row 2', column 'x1': expected a"):
        pw.from_arrays([1, 1], [[1, 2], [value, 4]], [1, 2])
    with pytest.raises(NumberError, match="b_ub, row 'row 1': expected a"):
        pw.from_arrays([1, 1], [[1, 2]], [value])
    with pytest.raises(NumberError, match="c, variable 'x2': expected a"):
        pw.from_arrays([1, value])


def test_missing_bounds_are_refused_although_linprog_reads_them_as_open():
    assert linprog([1.0], bounds=[(float("nan"), 1)]).status == 3
    with pytest.raises(NumberError, match="bounds of 'x1': expected a finite number, got nan"):
        pw.from_arrays([1.0], bounds=[(float("nan"), 1)])


def test_infinite_sides():
    model = pw.from_arrays([1, 1], [[1, 2], [3, 4]], [np.inf, 5])
    assert [row.name for row in model.constraints[:2]] == ["row 2", "x1 lower"]
    with pytest.raises(NumberError, match="b_ub, row 'row 1': -inf as upper bound allows no value"):
        pw.from_arrays([1, 1], [[1, 2]], [-np.inf])
    with pytest.raises(NumberError, match="b_eq, row 'equality 1': expected a finite number"):
        pw.from_arrays([1, 1], None, None, [[1, 2]], [np.inf])
    with pytest.raises(NumberError, match=r"bounds of 'x2': inf as lower bound allows no value.*swapped"):
        pw.from_arrays([1, 1], bounds=[(0, 1), (np.inf, None)])


def test_crossed_bounds_name_the_variable():
    with pytest.raises(ModelError, match="bounds of 'pump': the lower bound 3 is above the upper bound 2"):
        pw.from_arrays(pd.Series([1, 1], ["chips", "pump"]), bounds=[(0, 1), (3, 2)])


@pytest.mark.parametrize(
    ("arguments", "message"),
    [
        (([1, 1], [[1, 2]]), "A_ub and b_ub together, got A_ub without b_ub"),
        (([1, 1], None, None, None, [1]), "A_eq and b_eq together, got b_eq without A_eq"),
        (([1, 1], [[1, 2, 3]], [1]), "A_ub has 3 variables but c has 2"),
        (([1, 1], [[1, 2]], [1, 2]), "b_ub has 2 rows but A_ub has 1"),
        (([[1, 1], [2, 2]],), r"c: expected a vector, got an array of shape \(2, 2\)"),
        (([1, 1], [[1, 2], [3]], [1, 2]), "A_ub: expected rows of equal length"),
        (([1, 1], np.zeros((1, 1, 2)), [1]), r"A_ub: expected rows and columns, got an array of shape \(1, 1, 2\)"),
        ((np.ma.array([1, 2], mask=[True, False]),), "c: expected numbers, got masked entries"),
    ],
)
def test_shapes_that_do_not_fit(arguments, message):
    with pytest.raises(ModelError, match=message):
        pw.from_arrays(*arguments)


def test_integrality_marks():
    arguments = {"integrality": [0, 1], "method": "highs", "options": {"disp": False}}
    assert pw.from_arrays([1, 1], **arguments).integers == ("x2",)
    assert pw.from_arrays([1, 1], integrality=1).integers == ("x1", "x2")
    with pytest.raises(ModelError, match=r"integrality: expected 0 .* for 'x1', got 2; semi-continuous"):
        pw.from_arrays([1, 1], integrality=[2, 0])
