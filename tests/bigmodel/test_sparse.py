"""The sparse model: names, edits, refusals, and the way to the exact model and back."""

import pickle
import subprocess
import sys
from dataclasses import replace
from fractions import Fraction

import numpy as np
import pytest

import polywalk as pw
from polywalk.bigmodel import BigModel, locate
from polywalk.errors import DuplicateName, ModelError, UnknownName

INF = np.inf


def plant(**changes):
    """maximize 3 x + 2 y + 1: sum 1..4, tie x = y, cap y <= 3, x in 0..5, y free."""
    parts = {
        "variables": ("x", "y"),
        "rows": ("sum", "tie", "cap"),
        "indptr": [0, 2, 4, 5],
        "indices": [0, 1, 0, 1, 1],
        "data": [1, 1, 1, -1, 0.1],
        "row_lower": [1, 0, -INF],
        "row_upper": [4, 0, 0.3],
        "lower": [0, -INF],
        "upper": [5, INF],
        "cost": [3, 2],
        "goal": "max",
        "constant": 1,
        "integers": ("y",),
        "units": (("x", "MW"), ("sum", "MW")),
    }
    return BigModel(**(parts | changes))


def test_the_exact_model_reads_floats_as_decimals_and_names_every_side():
    model = plant().to_model()
    assert [(row.name, row.sense, row.rhs) for row in model.constraints] == [
        ("sum lower", ">=", 1),
        ("sum upper", "<=", 4),
        ("tie", "==", 0),
        ("cap", "<=", Fraction(3, 10)),
        ("x lower", ">=", 0),
        ("x upper", "<=", 5),
    ]
    assert model.constraint("cap").coefficients == (0, Fraction(1, 10))
    assert model.objective.text(model.variables) == "maximize 3 x + 2 y + 1"
    assert (model.integers, model.units) == (("y",), (("x", "MW"),))  # "sum" became two constraints


def test_there_and_back():
    big = plant(units=())
    assert BigModel.from_model(big.to_model()) == big
    exact = pw.scenarios.harbour_row()
    there = BigModel.from_model(exact).to_model()
    assert replace(there, constraints=tuple(replace(row, origin="") for row in there.constraints)) == replace(
        exact, constraints=tuple(replace(row, origin="") for row in exact.constraints)
    )


def test_a_lone_side_and_a_row_named_like_a_bound_stay_rows():
    model = pw.from_algebra(
        maximize="x", constraints={"r lower": "x + y >= 1", "x upper": "2*x <= 3", "s lower": "x >= 0", "s": "y <= 1"}
    )
    big = BigModel.from_model(model)
    assert big.rows == ("r lower", "x upper", "s lower", "s")
    assert not np.isfinite(big.upper).any()


@pytest.mark.parametrize(
    ("name", "found"),
    [
        ("sum lower", ("row_", 0, "lower")),
        ("tie", ("row_", 1, "both")),
        ("cap", ("row_", 2, "upper")),
        ("x lower", ("", 0, "lower")),
        ("x fixed", ("", 0, "both")),
    ],
)
def test_constraints_are_found_by_their_exact_names(name, found):
    assert locate(plant(), name) == found


@pytest.mark.parametrize("name", ["sum", "z lower", "x", "nothing", "x middle"])
def test_an_unknown_constraint_is_refused_by_name(name):
    with pytest.raises(UnknownName) as caught:
        locate(plant(), name)
    assert caught.value.culprit == name


def test_a_two_sided_row_is_told_its_two_names():
    with pytest.raises(UnknownName, match="'sum upper', 'sum lower'"):
        plant().with_rhs("sum", 3)


def test_edits_match_those_of_the_exact_model():
    big, model = plant(units=()), plant(units=()).to_model()
    for name in ("sum upper", "tie", "cap", "x upper"):
        assert big.with_rhs(name, "1/4").to_model() == model.with_rhs(name, "1/4")
        assert big.without(name).to_model().constraints == tuple(
            replace(row, name="sum") if (row.name, name) == ("sum lower", "sum upper") else row
            for row in model.without(name).constraints
        )
    assert big.with_objective({"y": "1/2"}, "min", 3).to_model() == model.with_objective({"y": "1/2"}, "min", 3)
    assert big.without_objective().to_model() == model.without_objective()


def test_a_row_goes_with_its_coefficients_and_its_unit():
    big = plant().without("sum")
    assert (big.rows, big.units, big.nonzeros) == (("tie", "cap"), (("x", "MW"),), 3)
    assert big.row("cap") == {"y": 0.1}
    assert plant().without("sum lower", "sum upper").rows == ("tie", "cap")


def test_a_few_variables_keep_the_rows_that_have_no_others():
    random = np.random.default_rng(5)
    dropped = 0
    for _ in range(60):
        n, m = 5, 7
        cells = random.integers(-1, 2, (m, n)) * (random.random((m, n)) < 0.6)
        big = BigModel(
            variables=tuple("abcde"),
            rows=tuple(f"r{i}" for i in range(m)),
            indptr=np.arange(m + 1) * n,  # the zeros are stored: they must not count
            indices=np.tile(np.arange(n), m),
            data=cells.ravel(),
            row_lower=np.full(m, -2),
            row_upper=random.integers(1, 9, m),
            lower=np.zeros(n),
            upper=np.full(n, 4),
            cost=np.arange(n),
            goal="min",
            integers=("a", "d"),
            units=(("d", "MW"), ("r3", "EUR"), ("e", "kg")),
        )
        keep = tuple(random.permutation(list("abcde"))[:3])
        part, whole = big.only(*keep), big.to_model()
        places = [whole.index(name) for name in keep]
        others = [j for j in range(n) if j not in places]
        expected = {
            (row.name, tuple(row.coefficients[j] for j in places), row.sense, row.rhs)
            for row in whole.constraints
            if not any(row.coefficients[j] for j in others) and any(row.coefficients)
        }
        found = part.to_model()
        assert {(row.name, row.coefficients, row.sense, row.rhs) for row in found.constraints} == expected
        assert found.variables == keep
        assert found.integers == tuple(name for name in ("a", "d") if name in keep)
        assert found.objective.coefficients == tuple(Fraction(j) for j in places)
        assert dict(part.units) == {name: big.unit(name) for name in (*keep, *part.rows) if big.unit(name)}
        left = [f"r{i}" for i in range(m) if cells[i, places].any() and cells[i, others].any()]
        dropped += len(left)
        assert len(part.notes) == bool(left)
        assert all(name in part.notes[0] for name in left[:4])
    assert dropped > 100
    with pytest.raises(UnknownName):
        big.only("a", "z")
    with pytest.raises(ModelError, match="names of the variables"):
        big.only()


def test_fixing_keeps_the_variable():
    big = plant().fix("y", 2)
    assert (big.lower[1], big.upper[1], big.n) == (2, 2, 2)
    assert big.to_model().constraint("y fixed").rhs == 2


def test_frozen_arrays_survive_pickling_and_the_givers_array_is_not_touched():
    given = np.array([3.0, 2.0])
    big = plant(cost=given)
    given[0] = 7
    again = pickle.loads(pickle.dumps(big))
    assert big.cost[0] == 3
    assert again == big
    assert hash(again) == hash(big)
    assert again != big.fix("x", 1)
    for each in (big, again):
        with pytest.raises(ValueError, match="read-only"):
            each.cost[0] = 1


def test_scipy_matrices():
    assert plant().csr().toarray().tolist() == [[1, 1], [1, -1], [0, 0.1]]
    assert plant().csc().nnz == 5


def test_scipy_and_pandas_are_not_loaded_with_it():
    code = "import polywalk.bigmodel, sys; print({'scipy.sparse', 'pandas', 'highspy'} & set(sys.modules))"
    assert subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True).stdout == "set()\n"


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"variables": ()}, "at least one variable"),
        ({"cost": [3, np.nan]}, "cost of 'y'"),
        ({"data": [1, 1, INF, -1, 0.1]}, "finite"),
        ({"lower": [INF, 0]}, "'x': inf as lower bound"),
        ({"row_upper": [4, -INF, 1]}, "'tie': -inf as upper bound"),
        ({"indptr": [0, 2, 4]}, "indptr: expected 4 entries"),
        ({"indptr": [0, 4, 2, 5]}, "indptr"),
        ({"indices": [0, 1, 0, 1, 2]}, "columns from 0 to 1"),
        ({"indices": [0, 0, 0, 1, 1]}, "twice"),
        ({"goal": "least"}, "'least'"),
        ({"constant": INF}, "constant"),
    ],
)
def test_parts_that_make_no_model_are_refused(changes, words):
    with pytest.raises(ModelError, match=words):
        plant(**changes)


@pytest.mark.parametrize("changes", [{"variables": ("x", "x")}, {"rows": ("a", "b", "a")}])
def test_names_given_twice_are_refused(changes):
    with pytest.raises(DuplicateName):
        plant(**({"units": (), "integers": ()} | changes))


@pytest.mark.parametrize("changes", [{"integers": ("z",)}, {"units": (("z", "MW"),)}])
def test_marks_for_names_that_are_not_there_are_refused(changes):
    with pytest.raises(UnknownName):
        plant(**changes)


def test_crossed_bounds_are_an_answer_not_an_error():
    big = plant(lower=[6, 0])
    assert pw.region(big.to_model()).status == "empty"


def test_a_model_too_large_for_zeros_says_what_to_do():
    n = 3000
    big = BigModel(tuple(f"x[{k}]" for k in range(n)), (), [0], [], [], [], [], np.zeros(n), np.full(n, INF))
    with pytest.raises(ModelError, match="section or shadow"):
        big.to_model()


@pytest.mark.parametrize("ask", ["region", "review", "optimum", "walk", "sensitivity", "suspects", "draw", "bases"])
def test_where_an_exact_model_is_needed_the_way_to_one_is_told(ask):
    with pytest.raises(ModelError, match=r"got 'Harbour Row, 24 hours', a BigModel of 96 variables.*section.*shadow"):
        getattr(pw, ask)(pw.scenarios.harbour_day(), *([0] if ask == "bases" else []))


def test_other_attributes_are_missing_as_usual():
    assert not hasattr(plant(), "constraints")
    assert not hasattr(plant(), "nonsense")
    with pytest.raises(AttributeError, match="'BigModel' object has no attribute 'nonsense'"):
        plant().nonsense  # noqa: B018


def test_it_prints_counts_and_escapes_its_name():
    shown = plant(name="<b>plant</b>", notes=("one note",))
    assert "3 rows, 5 nonzeros" in str(shown)
    assert "one note" in str(shown)
    assert "<b>plant" not in shown._repr_html_()
    assert len(str(plant())) < 500
