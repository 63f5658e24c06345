"""Algebra as text: what is read, in which order and how exactly, and every refusal with its place."""

from fractions import Fraction
from random import Random

import pytest
from hypothesis import given
from hypothesis import strategies as st

import polywalk as pw
from polywalk.errors import AlgebraError, DuplicateName, ModelError, NumberError, UnknownName


def row(text, **more):
    """The one constraint of a text, with its coefficients by name."""
    model = pw.from_algebra(constraints={"c": text}, **more)
    found = model.constraint("c")
    terms = {name: value for name, value in zip(model.variables, found.coefficients, strict=True) if value}
    return terms, found.sense, found.rhs


@pytest.mark.parametrize(
    ("text", "terms", "sense", "rhs"),
    [
        ("pump + chips + tank >= 9", {"pump": 1, "chips": 1, "tank": 1}, ">=", 9),
        ("pump/3 <= 2", {"pump": Fraction(1, 3)}, "<=", 2),
        ("0.1*x == .3", {"x": Fraction(1, 10)}, "==", Fraction(3, 10)),
        ("-(x - 3*(y - 2)) <= 1_000", {"x": -1, "y": 3}, "<=", 1006),
        ("x + 3 <= 2*y - 1", {"x": 1, "y": -2}, "<=", -4),
        ("9 <= x", {"x": 1}, ">=", 9),
        ("9 - 2 >= x + y", {"x": 1, "y": 1}, "<=", 7),
        ("5 == x", {"x": 1}, "==", 5),
        ("2e-3*x <= 1e3", {"x": Fraction(1, 500)}, "<=", 1000),
        ("10**3*x <= 2**-2", {"x": 1000}, "<=", Fraction(1, 4)),
        ("(1 + 2)*x/(4 - 1) <= +1", {"x": 1}, "<=", 1),
        ("x*2*3 <= --1", {"x": 6}, "<=", 1),
        ("(2*3)**2*x <= 0**0", {"x": 36}, "<=", 1),
        ("pump[7] + x[1, 2] + f[ north , -1 ] <= 1", {"pump[7]": 1, "x[1,2]": 1, "f[north,-1]": 1}, "<=", 1),
        ("x ≤ 3", {"x": 1}, "<=", 3),
        ("x ≥ −3·2", {"x": 1}, ">=", -6),
        ("  x\n  + y\t<= 1 ", {"x": 1, "y": 1}, "<=", 1),
        ("wärme + café <= 1", {"wärme": 1, "café": 1}, "<=", 1),
        ("match + type + _ <= 1", {"match": 1, "type": 1, "_": 1}, "<=", 1),
        ("1.*x <= 1.5E+2", {"x": 1}, "<=", 150),
        ("x <= 123456789012345678901234567890.1", {"x": 1}, "<=", Fraction("123456789012345678901234567890.1")),
    ],
)
def test_read(text, terms, sense, rhs):
    assert row(text) == (terms, sense, rhs)


def test_each_row_keeps_its_scale():
    """Multiplying a row can destroy a cycle (CHECKS B): coefficients stay as typed."""
    assert row("2*x + 4*y <= 6")[0] == {"x": 2, "y": 4}


def test_variables_come_in_order_of_first_appearance():
    model = pw.from_algebra(
        minimize="c + 0*b", constraints={"r": "a - a + c <= 1"}, bounds={"z": (0, None), "c": (0, None)}
    )
    assert model.variables == ("c", "b", "a", "z")
    assert model.constraint("r").coefficients == (1, 0, 0, 0)
    assert model.free == ("b", "a")
    assert "free (no bound of their own): b, a" in str(model)


def test_objective_with_constant():
    model = pw.from_algebra(maximize="3*(x - 2) + 1")
    assert (model.objective.goal, model.objective.coefficients, model.objective.constant) == ("max", (3,), -5)
    assert pw.from_algebra(minimize="5", constraints=["x <= 1"]).objective.constant == 5
    assert pw.from_algebra(constraints=["x <= 1"]).objective is None


def test_chains_are_two_constraints_lower_first():
    for text in ("2 <= x + y <= 5", "5 >= x + y >= 2"):
        model = pw.from_algebra(constraints={"mix": text})
        assert [(r.name, r.sense, r.rhs) for r in model.constraints] == [("mix lower", ">=", 2), ("mix upper", "<=", 5)]
    between = pw.from_algebra(constraints={"mix": "x <= y <= 2*x"})
    assert [between.constraints[k].coefficients for k in (0, 1)] == [(1, -1), (-2, 1)]


def test_unnamed_constraints_are_numbered():
    model = pw.from_algebra(constraints=["x <= 1", "0 <= y <= 1"])
    assert [r.name for r in model.constraints] == ["constraint 1", "constraint 2 lower", "constraint 2 upper"]


def test_rows_without_variables_are_kept():
    model = pw.from_algebra(constraints={"never": "0 <= -1", "always": "1 >= 0", "gone": "x - x <= 2"})
    assert model.constraint("never").is_constant
    assert not model.constraint("never").holds((Fraction(0),))
    assert model.constraint("always").holds((Fraction(0),))
    assert model.constraint("gone").is_constant


def test_bounds():
    model = pw.from_algebra(
        minimize="x",
        bounds={
            "x": (0, None),
            "y": ("1/3", 2.5),
            "z": (4, 4),
            "w": (float("-inf"), float("inf")),
            "x[1, 2]": (None, 1),
        },
    )
    assert model.variables == ("x", "y", "z", "w", "x[1,2]")
    assert [(r.name, r.sense, r.rhs, r.origin) for r in model.constraints] == [
        ("x lower", ">=", 0, "bounds"),
        ("y lower", ">=", Fraction(1, 3), "bounds"),
        ("y upper", "<=", Fraction(5, 2), "bounds"),
        ("z fixed", "==", 4, "bounds"),
        ("x[1,2] upper", "<=", 1, "bounds"),
    ]
    assert model.free == ("w",)


def test_crossed_constraints_are_a_model_and_crossed_bounds_a_slip():
    assert len(pw.from_algebra(constraints={"a": "3 <= x <= 2"}).constraints) == 2
    with pytest.raises(ModelError, match="bounds of 'x': the lower bound 3 is above the upper bound 2"):
        pw.from_algebra(bounds={"x": (3, 2)})


def test_units_and_marks():
    model = pw.from_algebra(
        constraints={"heat": "x[1,2] + y <= 1"}, units={"x[1, 2]": "MW", "heat": "MWh"}, integers=["y"], name="hour"
    )
    assert (model.unit("x[1,2]"), model.unit("heat"), model.integers, model.name) == ("MW", "MWh", ("y",), "hour")
    assert pw.from_algebra(minimize="y", integers="y").integers == ("y",)
    for wrong in ({"units": {"z": "MW"}}, {"integers": ["z"]}):
        with pytest.raises(UnknownName, match="'z'"):
            pw.from_algebra(minimize="x", **wrong)


@pytest.mark.parametrize(
    ("text", "place", "message"),
    [
        ("3 x <= 1", 2, "a sign is missing here; products are written with \\*"),
        ("3x <= 1", 1, "a sign is missing"),
        ("2(x + y) <= 3", 1, "a sign is missing"),
        ("(x + y) z <= 3", 8, "a sign is missing"),
        ("x y <= 3", 2, "a sign is missing"),
        ("x[1] y <= 3", 5, "a sign is missing"),
        ("1 + f(x) <= 1", 4, "functions such as f are not linear"),
        ("1 + x*y <= 1", 6, "a product of variables"),
        ("(x + 1)*(x - 1) <= 1", 9, "a product of variables"),
        ("a≤b·c", 4, "a product of variables"),
        ("x <= 1 + 1/y", 11, "a variable may not divide"),
        ("2**x <= 1", 3, "a variable may not divide or be an exponent"),
        ("x**2 <= 1", 0, "a power of a variable"),
        ("x^2 <= 1", 1, "powers are written \\*\\*"),
        ("2**0.5*x <= 1", 3, "whole number as exponent, got 1/2"),
        ("10**999*x <= 1", 4, "the power is too large"),
        ("2**2**2**2**2*x <= 1", 3, "the power is too large"),
        ("x/0 <= 1", 2, "division by zero"),
        ("x/(1 - 1) <= 1", 3, "division by zero"),
        ("0**-1*x <= 1", 0, "division by zero"),
        ("x < 1", 2, "strict comparisons"),
        ("x <= 1 > y", 7, "strict comparisons"),
        ("x != 1", 2, "'not equal' cuts no closed region"),
        ("x ≠ 1", 2, "'not equal'"),
        ("x = 1", 2, "write == for an equality"),
        ("x => 1", 2, "write <= or >="),
        ("x =< 1", 2, "write <= or >="),
        ("x === 1", 2, "expected one of"),
        ("lambda <= 1", 0, "'lambda' is a word of Python .* say lambda_"),
        ("x in y", 2, "'in' is a word of Python"),
        ("x and y <= 1", 2, "'and' is a word of Python"),
        ("x <= True", 5, "'True' is a word of Python"),
        ("x <= 'a'", 5, "quotes are no part of algebra"),
        ('x["a"] <= 1', 2, "quotes are no part of algebra"),
        ("x <= 1e999999999", 5, "beyond 1e±400"),
        ("1,5*x <= 2", 1, "decimals are written with a point"),
        ("x <= 1,5", 6, "decimals are written with a point"),
        ("x*(1,5) <= 2", 2, "decimals are written with a point"),
        ("plant.pump <= 1", 0, "a dot inside a name"),
        ("x[1][2] <= 3", 0, "expected an index after a name"),
        ("x[1.5] <= 3", 2, "whole numbers or plain names as indices"),
        ("x[1:2] <= 3", 3, "no part of linear algebra"),
        ("x <= 3 # hours", 7, "no part of linear algebra"),
        ("x % 2 <= 1", 2, "no part of linear algebra"),
        ("x // 2 <= 1", 3, "only \\+ - \\* / \\*\\*"),
        ("(x <= 2", 0, "not algebra"),
        ("x) <= (2", 1, "not algebra"),
        ("x + <= 2", 4, "not algebra"),
        ("x <= 0x1f", 6, "a sign is missing"),
        ("x <= 3j", 6, "a sign is missing"),
        ("(x <= 2)*3 <= 1", 1, "a comparison inside an expression"),
        ("x <= y >= 2", 10, "a chain has two"),
        ("x == y == 2", 10, "a chain has two"),
        ("1 <= x <= y <= 2", 10, "a chain has two"),
        ("x + y", None, "expected a comparison with <=, >= or =="),
        ("", 0, "got empty text"),
        ("   ", 0, "got empty text"),
        (3, None, "expected algebra as text, got 3"),
        ("(" * 250 + "x" + ")" * 250 + " <= 1", None, "too|nested"),
        ("-" * 90_000 + "x <= 1", None, "too long or too deeply nested"),
        ("x" * 200_000 + " <= 1", None, "at most 100000 characters"),
    ],
)
def test_refused_with_the_place(text, place, message):
    with pytest.raises(AlgebraError, match=message) as caught:
        pw.from_algebra(constraints={"c": text})
    error = caught.value
    assert error.culprit == text
    if place is not None:
        assert error.place == place
    assert str(error).startswith("constraint 'c'")
    if place and isinstance(text, str) and len(text) < 60:
        shown, caret = str(error).splitlines()[-2:]
        assert shown[caret.index("^")] == text[place]


def test_the_caret_finds_its_way_through_signs_of_other_widths():
    with pytest.raises(AlgebraError) as caught:
        pw.from_algebra(constraints={"c": "  wärme·2 ≤ 3 + é·café"})
    assert str(caught.value) == (
        "constraint 'c' (column 18): not linear: a product of variables; one factor must be a number.\n"
        "      wärme·2 ≤ 3 + é·café\n"
        "                      ^"
    ).replace("column 18", f"column {caught.value.place + 1}")
    assert "  wärme·2 ≤ 3 + é·café"[caught.value.place :] == "café"


def test_a_far_place_is_shown_with_its_surroundings():
    with pytest.raises(AlgebraError) as caught:
        pw.from_algebra(minimize=" + ".join(f"x{j}" for j in range(100)) + " + x1*x2")
    *_, shown, caret = str(caught.value).splitlines()
    assert len(shown) < 130
    assert shown[caret.index("^") :].startswith("x2")


def test_long_sums_are_read():
    names = [f"x{j}" for j in range(700)]
    assert pw.from_algebra(maximize=" + ".join(names)).variables == tuple(names)


def test_objective_refusals():
    with pytest.raises(AlgebraError, match=r"minimize .*got a comparison; move it to the constraints"):
        pw.from_algebra(minimize="x <= 3")
    with pytest.raises(ModelError, match="got both; a model has one objective"):
        pw.from_algebra(minimize="x", maximize="y")
    with pytest.raises(AlgebraError, match="expected algebra as text, got 5"):
        pw.from_algebra(minimize=5)
    with pytest.raises(ModelError, match="expected at least one variable"):
        pw.from_algebra(minimize="5")
    with pytest.raises(ModelError, match="expected at least one variable"):
        pw.from_algebra()


def test_other_refusals():
    with pytest.raises(ModelError, match="got one text"):
        pw.from_algebra(constraints="x <= 1")
    with pytest.raises(ModelError, match=r"bounds of 'x': expected a pair \(lower, upper\) .* got 5"):
        pw.from_algebra(bounds={"x": 5})
    with pytest.raises(ModelError, match="expected a pair"):
        pw.from_algebra(bounds={"x": (1, 2, 3)})
    with pytest.raises(ModelError, match="expected a pair"):
        pw.from_algebra(bounds={"x": "05"})
    with pytest.raises(NumberError, match="bounds of 'x': expected a finite number, got nan"):
        pw.from_algebra(bounds={"x": (float("nan"), 1)})
    with pytest.raises(NumberError, match=r"bounds of 'x': inf as lower bound .* swapped"):
        pw.from_algebra(bounds={"x": (float("inf"), 1)})
    with pytest.raises(ModelError, match=r"the bounds of 'x\[1,2\]' are given twice"):
        pw.from_algebra(bounds={"x[1,2]": (0, 1), "x[1, 2]": (0, 2)})
    with pytest.raises(AlgebraError, match="expected the name of a variable"):
        pw.from_algebra(bounds={"2*x": (0, 1)})
    with pytest.raises(DuplicateName, match="'x upper' is given twice"):
        pw.from_algebra(constraints={"x upper": "x <= 2"}, bounds={"x": (0, 3)})


def test_nothing_is_evaluated():
    for text in (
        "__import__('os').getcwd() <= 1",
        "exit() <= 1",
        "(lambda: 1)() <= 1",
        "[x for x in y] <= 1",
        "f'{x}' <= 1",
    ):
        with pytest.raises(AlgebraError):
            pw.from_algebra(constraints=[text])


_LEAVES = st.one_of(
    st.sampled_from(["x", "y", "z[1]"]),
    st.integers(0, 20).map(str),
    st.sampled_from(["0.1", "2.50", "1e-2", ".75"]),
)


def _joined(parts):
    return st.one_of(
        st.tuples(parts, st.sampled_from(["+", "-"]), parts).map(lambda p: f"({p[0]} {p[1]} {p[2]})"),
        st.tuples(st.sampled_from(["3*", "-", "0.5*", "-2*"]), parts).map(lambda p: f"{p[0]}({p[1]})"),
        parts.map(lambda p: f"({p})/4"),
    )


@given(st.recursive(_LEAVES, _joined, max_leaves=12), st.integers(0, 10_000))
def test_reading_agrees_with_python_arithmetic(text, seed):
    """The oracle: Python's own evaluation of the same text, at a random point of fractions."""
    rng = Random(seed)
    values = {name: Fraction(rng.randint(-9, 9), rng.randint(1, 5)) for name in ("x", "y", "z[1]")}
    model = pw.from_algebra(minimize=text, bounds={"unused": (0, None)})
    point = [values.get(name, Fraction(0)) for name in model.variables]
    for decimal in ("0.1", "2.50", "1e-2", ".75", "0.5"):
        text = text.replace(decimal, f"Fraction('{decimal}')")
    text = text.replace("/4", "/Fraction(4)")  # Python's 1/4 would be a float
    expected = eval(text, {"Fraction": Fraction, "x": values["x"], "y": values["y"], "z": {1: values["z[1]"]}})
    assert model.objective.at(tuple(point)) == expected


@given(st.text(alphabet="xyz[]()+-*/.,<>=!&|^ 0123456789e≤≥·\n'\"#:\\", max_size=25))
def test_any_text_is_read_or_refused(text):
    """Never another error than AlgebraError (or ModelError, where the text names no variable)."""
    error = _refusal(text)
    if isinstance(error, AlgebraError):
        assert error.place is None or 0 <= error.place <= max(len(text) - 1, 0)
    elif error is not None:
        assert "expected at least one variable" in str(error)


def _refusal(text):
    try:
        pw.from_algebra(constraints={"c": text})
    except (AlgebraError, ModelError) as error:
        return error
    return None
