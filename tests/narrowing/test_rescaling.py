"""Coefficients that HiGHS would drop or refuse: they count all the same, or the row is named."""

from __future__ import annotations

import numpy as np
import pytest

from polywalk.bigmodel import BigModel
from polywalk.errors import SolverError
from polywalk.exact import exact
from polywalk.narrowing import completion, conflict, section, shadow, suggest_axes
from polywalk.narrowing.rescaling import row_factors
from polywalk.narrowing.solver import Solver


def faint(small: float, large: float = 1.0) -> BigModel:
    """Maximize x with large x <= small y and 0 <= y <= large / small: x reaches 1, and 0 where ``small`` is dropped."""
    most = float(exact(large) / exact(small))
    rows = ("carried", "loose")
    return BigModel(
        ("x", "y"),
        rows,
        [0, 2, 4],
        [0, 1, 0, 1],
        [large, -small, 1, small],
        [-np.inf, -np.inf],
        [0, 9 + 2 * large],
        [0, 0],
        [np.inf, most],
        [1, 0],
        "max",
    )


@pytest.mark.parametrize("small", [5e-10, 1e-11, 1e-12, 1e-13, 1e-20])
@pytest.mark.parametrize("is_exact", [True, False])
def test_tiny_coefficients_count(small: float, is_exact: bool) -> None:
    found = shadow(faint(small), ["x"], exact=is_exact)
    assert found.region.ranges["x"] == (0, 1)
    assert (found.tolerance is None) == is_exact


@pytest.mark.parametrize("large", [1e15, 1e18])
def test_huge_coefficients_count(large: float) -> None:
    found = shadow(faint(1.0, large), ["x"], exact=True)
    assert found.region.ranges["x"] == (0, 1)
    assert row_factors(faint(1.0, large))[0] * large < 1e15


def test_every_question_counts_them() -> None:
    big = faint(1e-13)
    assert section(big, ["x"]).model.constraint("carried").rhs == 1
    assert completion(big, {"x": 1}).verdict == "possible"
    no = completion(big, {"x": 2})
    assert no.verdict == "impossible"
    assert no.limits == (("x", 0, 1),)
    assert conflict(big) is None
    assert suggest_axes(big, within=1).ranked[0].variable == "y"


def test_multipliers_are_those_of_the_row_as_it_was() -> None:
    """1e-13 x <= 4e-13: x <= 4 by 1e13 times the row."""
    big = BigModel(("x",), ("only",), [0, 1], [0], [1e-13], [-np.inf], [4e-13], [0], [np.inf])
    for is_exact in (True, False):
        facets = {one.rule: dict(one.multipliers) for one in shadow(big, ["x"], exact=is_exact).facets}
        assert facets["x ≤ 4"]["only"] == pytest.approx(1e13)


def test_coefficients_too_far_apart_are_named() -> None:
    with pytest.raises(SolverError, match=r"'carried'.*1e-20 of 'y' beside 1e\+10 of 'x'.*other units"):
        Solver(faint(1e-20, 1e10))


def test_sides_beyond_what_highs_calls_infinite_are_sides() -> None:
    big = BigModel(("x",), ("far",), [0, 1], [0], [1.0], [-np.inf], [1e22], [0], [np.inf])
    assert shadow(big, ["x"], exact=True).region.ranges["x"] == (0, 10**22)
    with pytest.raises(SolverError, match="beyond 1e20"):
        shadow(big, ["x"], exact=False)


def test_other_rows_stay_as_they_are() -> None:
    assert row_factors(faint(1e-3)).tolist() == [1, 1]
    assert row_factors(faint(0.75e-12)).tolist() == [2, 2]
