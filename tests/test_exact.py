"""Numbers: read exactly, refused by name, shown short or in full."""

from decimal import Decimal
from fractions import Fraction

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from polywalk.errors import NumberError
from polywalk.exact import bound, dot, exact, full, integer_row, linear, primitive, rounded, short


@pytest.mark.parametrize(
    ("value", "number"),
    [
        (3, Fraction(3)),
        (0.1, Fraction(1, 10)),
        (-2.5e-7, Fraction(-1, 4_000_000)),
        (1e22, Fraction(10**22)),
        ("1/3", Fraction(1, 3)),
        (" -2e-3 ", Fraction(-1, 500)),
        ("0.25", Fraction(1, 4)),
        (Decimal("0.10"), Fraction(1, 10)),
        (Fraction(2, 7), Fraction(2, 7)),
        (np.int64(7), Fraction(7)),
        (np.float64(0.1), Fraction(1, 10)),
        (np.float32(0.1), Fraction(1, 10)),
        (np.array(0.3), Fraction(3, 10)),
        (2**80 + 1, Fraction(2**80 + 1)),
        (-0.0, Fraction(0)),
    ],
)
def test_read(value, number):
    assert exact(value) == number
    assert type(exact(value)) is Fraction


@pytest.mark.parametrize(
    ("value", "message"),
    [
        (float("nan"), "expected a finite number, got nan"),
        (np.float64("inf"), "expected a finite number, got inf; only a bound may be infinite"),
        (Decimal("-Infinity"), "expected a finite number"),
        (Decimal("sNaN"), "finite"),
        (True, "got True; write 1 or 0"),
        (np.bool_(False), "write 1 or 0"),
        ("", "expected a number such as"),
        ("nan", "expected a number such as"),
        ("three", "got 'three'"),
        ("1/0", "divides by zero"),
        ("1e999999999", "beyond 1e±400"),
        (Decimal("1e99999"), "beyond 1e±400"),
        (Decimal("nan"), "expected a finite number, got NaN"),
        (None, "got None of type NoneType"),
        ([1], r"got \[1\] of type list"),
        (1j, "of type complex"),
        (np.array([1, 2]), "of type ndarray"),
    ],
)
def test_refused_by_name(value, message):
    with pytest.raises(NumberError, match=message) as caught:
        exact(value)
    assert caught.value.culprit is value
    assert isinstance(caught.value, ValueError)


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_a_float_is_the_decimal_it_prints_as(value):
    assert exact(value) == Fraction(repr(value))
    assert float(exact(value)) == value


@pytest.mark.parametrize("value", [None, float("inf"), np.float64("inf"), Decimal("Infinity"), "inf", " +Infinity"])
def test_no_upper_bound(value):
    assert bound(value, +1) is None
    if value is not None:
        with pytest.raises(NumberError, match=r"as lower bound allows no value at all; were .* swapped"):
            bound(value, -1)


def test_bounds():
    assert bound("-inf", -1) is None
    assert bound(float("-inf"), -1) is None
    assert bound("1/3", -1) == Fraction(1, 3)
    with pytest.raises(NumberError, match="as upper bound allows no value"):
        bound("-inf", +1)
    with pytest.raises(NumberError, match="got nan"):
        bound(float("nan"), -1)


@pytest.mark.parametrize(
    ("value", "in_full", "in_short", "six_digits"),
    [
        ("0", "0", "0", "0"),
        ("-12", "-12", "-12", "-12"),
        ("1/4", "0.25", "0.25", "0.25"),
        ("-1/3", "-1/3", "-1/3", "-0.333333"),
        ("0.000125", "0.000125", "0.000125", "0.000125"),
        ("1234567", "1234567", "1234567", "1.23457e+06"),
        ("1234567.5", "2469135/2", "2469135/2", "1.23457e+06"),
        ("123456789/1234567", "123456789/1234567", "≈100", "100"),
        ("1234567890123", "1234567890123", "≈1.23457e+12", "1.23457e+12"),
        ("1/1024", "1/1024", "1/1024", "0.000976562"),
    ],
)
def test_shown(value, in_full, in_short, six_digits):
    number = exact(value)
    assert (full(number), short(number), rounded(number)) == (in_full, in_short, six_digits)


def test_rounded_past_the_largest_float():
    assert rounded(Fraction(12345678 * 10**400)) == "1.23457E+407"


@given(st.fractions())
def test_full_reads_back(value):
    assert exact(full(value)) == value


@given(st.lists(st.fractions(), min_size=1, max_size=6))
def test_integer_rows_and_directions(values):
    whole, scale = integer_row(values)
    assert [Fraction(entry, scale) for entry in whole] == values
    shrunk = primitive(values)
    assert all(entry.denominator == 1 for entry in shrunk)
    place = next((k for k, value in enumerate(values) if value), None)
    if place is not None:
        factor = shrunk[place] / values[place]
        assert factor > 0
        assert [factor * value for value in values] == list(shrunk)


def test_dot():
    assert dot((Fraction(1, 2), Fraction(0)), (Fraction(4), Fraction(9))) == 2
    with pytest.raises(ValueError, match="longer"):
        dot((Fraction(1),), (Fraction(1), Fraction(2)))


@pytest.mark.parametrize(
    ("row", "constant", "text"),
    [
        ((32, 1, -1), 5, "32 pump + chips - tank + 5"),
        ((-1, 0, "1/3"), 0, "-pump + 1/3 tank"),
        ((0, 0, 0), 0, "0"),
        ((0, 0, 0), -2, "-2"),
        ((0, "-0.5", 0), "-1/7", "-0.5 chips - 1/7"),
    ],
)
def test_linear(row, constant, text):
    assert linear([exact(value) for value in row], ("pump", "chips", "tank"), exact(constant)) == text
