"""from_scipy against scipy.optimize.milp itself, and the traps of its arguments (measured on scipy 1.17)."""

import random
from fractions import Fraction

import numpy as np
import pandas as pd
import pytest
from reading.scipy_model import solve
from scipy import sparse
from scipy.optimize import Bounds, LinearConstraint, linprog, milp

import polywalk as pw
from polywalk.errors import ModelError, NumberError

CASES = 250


def _side(rng, m, values):
    return rng.choice([float(rng.choice(values)), np.array([float(rng.choice(values)) for _ in range(m)])])


def _random_constraint(rng, n):
    m = rng.randint(1, 3)
    a = np.array([[rng.randint(-3, 4) for _ in range(n)] for _ in range(m)], dtype=float)
    parts = (a, _side(rng, m, [-np.inf, -4, 0, 1]), _side(rng, m, [1, 2, 5, np.inf]))
    form = rng.choice(["object", "tuple", "list", "sparse"])
    if form == "object":
        return LinearConstraint(*parts)
    if form == "sparse":
        return LinearConstraint(sparse.csr_array(a), *parts[1:])
    return list(parts) if form == "list" else parts


def _random_constraints(rng, n):
    count = rng.randint(0, 4)
    if count == 0:
        return rng.choice([None, ()])
    if count == 1 and rng.random() < 0.7:
        return _random_constraint(rng, n)
    return [_random_constraint(rng, n) for _ in range(count)]


def _random_bounds(rng, n):
    low, high = _side(rng, n, [-np.inf, -1, 0]), _side(rng, n, [1, 3, 4, np.inf])
    return rng.choice([None, Bounds(low, high), (low, high), [low, high]])


def test_random_arguments_mean_what_they_mean_to_milp():
    rng = random.Random(3)
    seen = {0: 0, 2: 0, 3: 0}
    for _ in range(CASES):
        n = rng.randint(1, 4)
        c = np.array([rng.randint(-4, 5) for _ in range(n)], dtype=float)
        arguments = {"bounds": _random_bounds(rng, n), "constraints": _random_constraints(rng, n)}
        expected = milp(c, **arguments)
        if expected.status == 4:  # HiGHS gave up between infeasible and unbounded: nothing to compare
            continue
        status, value = solve(pw.from_scipy(c, **arguments))
        assert status == expected.status, (c, arguments)
        if status == 0:
            assert value == pytest.approx(expected.fun, abs=1e-7)
        seen[status] += 1
    assert seen[0] >= 100
    assert seen[2] >= 5
    assert seen[3] >= 20


def test_two_tuples_are_lower_and_upper_vectors():
    """The same text means pairs to linprog: the two solvers, and the two readers, differ on purpose."""
    bounds = [(0, 1), (0, 2)]
    by_vectors, by_pairs = pw.from_scipy([-1, 1], bounds=bounds), pw.from_arrays([-1, 1], bounds=bounds)
    assert by_vectors.constraint("x1 fixed").rhs == 0
    assert (by_vectors.constraint("x2 lower").rhs, by_vectors.constraint("x2 upper").rhs) == (1, 2)
    assert solve(by_vectors)[1] == pytest.approx(milp([-1, 1], bounds=bounds).fun) == pytest.approx(1)
    assert solve(by_pairs)[1] == pytest.approx(linprog([-1, 1], bounds=bounds).fun) == pytest.approx(-1)


def test_three_constraints_are_not_one_triple():
    three = [([[1, 0]], 0, 1), ([[0, 1]], 0, 2), ([[1, 1]], 0, 3)]
    assert [row.name for row in pw.from_scipy([1, 1], constraints=three).constraints[:6:2]] == [
        "row 1 lower",
        "row 2 lower",
        "row 3 lower",
    ]
    columns = [([1], [0], [5])] * 3  # every part could be a column, but sides of two dimensions are none of milp's
    assert len(pw.from_scipy([1], constraints=columns).constraints) == 7
    objects = [LinearConstraint([[1, 0]], 0, 1)] * 3
    assert len(pw.from_scipy([1, 1], constraints=objects).constraints) == 8


def test_default_bounds_are_named_constraints():
    assert [(row.name, row.origin) for row in pw.from_scipy([1, 1]).constraints] == [
        ("x1 lower", "milp's default"),
        ("x2 lower", "milp's default"),
    ]


def test_sides_of_a_row():
    rows = LinearConstraint(
        [[1, 0], [0, 1], [1, 1], [1, 2], [3, 4]], [-np.inf, 1, 2, 2, -np.inf], [4, np.inf, 2, 5, np.inf]
    )
    model = pw.from_scipy([1, 1], constraints=rows, bounds=Bounds())
    assert [(row.name, row.sense, row.rhs) for row in model.constraints] == [
        ("row 1", "<=", 4),
        ("row 2", ">=", 1),
        ("row 3", "==", 2),
        ("row 4 lower", ">=", 2),
        ("row 4 upper", "<=", 5),
    ]
    assert model.free == ()  # rows 1 and 2 have one variable each


def test_crossed_rows_are_an_empty_model_and_crossed_bounds_a_slip():
    crossed = pw.from_scipy([1, 1], constraints=([[1, 1]], 5, 3))
    assert solve(crossed)[0] == milp([1, 1], constraints=([[1, 1]], 5, 3)).status == 2
    with pytest.raises(ModelError, match="bounds of 'x2': the lower bound 5 is above the upper bound 3"):
        pw.from_scipy([1, 1], bounds=([0, 5], [1, 3]))


def test_exact_values_and_short_tuples():
    model = pw.from_scipy(["1/3", 1], constraints=[([[Fraction(1, 7), 0.1]], "1/9"), [[1, 1]]])
    assert model.objective.coefficients[0] == Fraction(1, 3)
    assert model.constraint("row 1").coefficients == (Fraction(1, 7), Fraction(1, 10))
    assert (model.constraint("row 1").sense, model.constraint("row 1").rhs) == (">=", Fraction(1, 9))


def test_labels_and_names():
    table = pd.DataFrame([[1, 2]], index=["heat"], columns=["tank", "pump"])
    c = pd.Series([5, 6], ["pump", "tank"])
    model = pw.from_scipy(c, constraints=(table, 0, 9), bounds=(0, pd.Series([7, 8], ["tank", "pump"])))
    assert model.variables == ("pump", "tank")
    assert model.constraint("heat upper").coefficients == (2, 1)
    assert model.constraint("tank upper").rhs == 7
    named = pw.from_scipy(
        [1, 1], constraints=[([[1, 0]], 0), ([[0, 1], [1, 1]], 1, [2, 3])], variables=["a", "b"], rows=["r", "s", "t"]
    )
    assert [row.name for row in named.constraints[:5]] == ["r", "s lower", "s upper", "t lower", "t upper"]
    with pytest.raises(ModelError, match="expected 1 names of rows, got 2"):
        pw.from_scipy([1, 1], constraints=([[1, 0]], 0, 1), rows=["r", "s"])


@pytest.mark.parametrize(
    ("arguments", "error", "message"),
    [
        ({"constraints": ([[1, 2, 3]], 0, 1)}, ModelError, "constraints.A has 3 columns but c has 2"),
        ({"constraints": ([[1, 2]], [0, 0], 1)}, ModelError, "constraints.*lb: expected a number or 1 of them"),
        ({"constraints": [5]}, ModelError, r"constraints\[0\]: expected a LinearConstraint or \(A, lower, upper\)"),
        ({"constraints": ([[1, 2]], float("nan"), 1)}, NumberError, "constraints.lb, row 'row 1': .* got nan"),
        ({"constraints": ([[1, 2]], np.inf, np.inf)}, NumberError, "inf as lower bound allows no value"),
        ({"bounds": [(0, 1)] * 4}, ModelError, "got 4 parts; pairs are linprog's form"),
        ({"bounds": Bounds([0, 0, 0], 1)}, ModelError, "expected 2 entries of lb"),
        ({"integrality": [0, 3]}, ModelError, "semi-continuous"),
    ],
)
def test_refusals(arguments, error, message):
    with pytest.raises(error, match=message):
        pw.from_scipy([1, 1], **arguments)


def test_integrality_marks_and_options():
    assert pw.from_scipy([1, 1], integrality=1, options={"disp": False}).integers == ("x1", "x2")
