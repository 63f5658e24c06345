"""Python text of a model makes the same model again."""

from __future__ import annotations

import pytest

import polywalk as pw
from polywalk.reading.python_text import to_python

MODELS = [pw.scenarios.harbour_row(variant) for variant in ("base", "infeasible", "unbounded", "flat", "two decisions")]
MODELS += [pw.scenarios.klee_minty(3), pw.scenarios.beale(), pw.scenarios.cube(3)]
MODELS += [
    pw.from_algebra(minimize="x - y/3 + 5", constraints={'a "b" \\': "-x + 2/7*y >= -1"}, bounds={"x": (1, 1)}),
    pw.from_algebra(maximize="x[1] + x[2]", bounds={"x[1]": ("1/3", None), "x[2]": (None, 2)}, integers=["x[2]"]),
    pw.scenarios.harbour_row().with_rhs("harbour main", "37/3").without("tank upper"),
    pw.scenarios.harbour_row().without_objective(),
    pw.Model(("not an identifier",), (pw.Constraint("cap", (pw.exact(1),), "<=", pw.exact("1/3")),)),
]


@pytest.mark.parametrize("model", MODELS)
def test_the_text_makes_the_model_again(model: pw.Model) -> None:
    assert eval(to_python(model), {"pw": pw}) == model


def test_a_model_typed_as_algebra_is_told_as_algebra() -> None:
    assert to_python(pw.scenarios.harbour_row()).startswith("pw.from_algebra(")
