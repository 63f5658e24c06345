"""Errors: one base, each a fitting builtin, each with its culprit, none with Python's quotes around the message."""

import pickle

import pytest

from polywalk import errors
from polywalk.errors import AlgebraError, PolywalkError, UnknownName, unknown

KINDS = {
    "NumberError": ValueError,
    "UnknownName": KeyError,
    "DuplicateName": ValueError,
    "ModelError": ValueError,
    "LargeModelError": AttributeError,
    "AlgebraError": ValueError,
    "WalkError": ValueError,
    "DrawingError": ValueError,
    "ExpectationError": AssertionError,
    "SolverError": RuntimeError,
    "FileError": ValueError,
    "BudgetError": RuntimeError,
}


def test_these_are_all():
    found = {name for name, kind in vars(errors).items() if isinstance(kind, type) and issubclass(kind, PolywalkError)}
    assert found == {*KINDS, "PolywalkError"}


@pytest.mark.parametrize(("name", "builtin"), KINDS.items())
def test_each_is_a_fitting_builtin_and_carries_its_culprit(name, builtin):
    error = getattr(errors, name)("expected this, got that.", culprit=7)
    assert isinstance(error, PolywalkError)
    assert isinstance(error, builtin)
    assert str(error) == "expected this, got that."
    assert error.culprit == 7
    assert str(pickle.loads(pickle.dumps(error))) == str(error)


def test_algebra_has_a_place():
    assert AlgebraError("no", "x*y", place=2).place == 2
    assert AlgebraError("no").place is None


@pytest.mark.parametrize(
    ("name", "known", "message"),
    [
        ("pmup", ["pump", "tank"], "the model has no variable 'pmup'; did you mean 'pump'?"),
        ("zzz", ["pump", "tank"], "the model has no variable 'zzz'; it has 'pump', 'tank'."),
        ("zzz", [], "the model has no variable 'zzz'; it has none."),
        ("zzz", [f"v{k}" for k in range(10)], "it has 'v0', 'v1', 'v2', 'v3', 'v4', 'v5', 'v6', 'v7' and 2 more."),
    ],
)
def test_unknown_names_get_a_remedy(name, known, message):
    error = unknown("variable", name, known)
    assert isinstance(error, UnknownName)
    assert message in str(error)
    assert error.culprit == name
