"""The model: what makes one, how it is read, edited and shown."""

from dataclasses import FrozenInstanceError
from fractions import Fraction
from html import escape

import pytest

import polywalk as pw
from polywalk.errors import DuplicateName, ModelError, NumberError, UnknownName
from polywalk.model import Constraint, Model, Objective

ONE, TWO = Fraction(1), Fraction(2)


@pytest.fixture
def model():
    return pw.from_algebra(
        minimize="32*pump + 27*chips - 5",
        constraints={"heat": "pump + chips >= 9", "grid": "pump/3 <= 2", "mix": "pump == 2*chips"},
        bounds={"pump": (0, 5), "chips": (0, None)},
        units={"pump": "MW", "heat": "MWh"},
        integers=["chips"],
        name="one hour",
    )


def test_slack_and_holds():
    point = (TWO, ONE)
    for sense, slack, holds in (("<=", 1, True), (">=", -1, False), ("==", 1, False)):
        row = Constraint("r", (ONE, ONE), sense, Fraction(4))
        assert (row.slack(point), row.holds(point)) == (slack, holds)
        at = Constraint("r", (ONE, TWO), sense, Fraction(4))
        assert (at.slack(point), at.holds(point)) == (0, True)


@pytest.mark.parametrize("sense", ["<=", ">=", "=="])
def test_inward_is_the_slack(sense):
    row = Constraint("r", (ONE, -TWO), sense, Fraction(3))
    point = (Fraction(1, 3), Fraction(5))
    start, change = row.inward
    assert start + sum(a * x for a, x in zip(change, point, strict=True)) == row.slack(point)


@pytest.mark.parametrize(
    ("row", "sense", "found"),
    [
        ((1, 0), ">=", (0, "lower")),
        ((1, 0), "<=", (0, "upper")),
        ((0, -1), ">=", (1, "upper")),
        ((0, -1), "<=", (1, "lower")),
        ((1, 0), "==", None),
        ((2, 0), "<=", None),
        ((1, 1), "<=", None),
        ((0, 0), "<=", None),
    ],
)
def test_bounds_of_a_variable(row, sense, found):
    assert Constraint("r", tuple(map(Fraction, row)), sense, ONE).bounds() == found


def test_objective():
    least, most = Objective("min", (TWO, -ONE), ONE), Objective("max", (TWO, -ONE))
    assert least.at((Fraction(3), Fraction(4))) == 3
    assert least.upward == (-2, 1)
    assert most.upward == (2, -1)
    assert least.better(ONE, TWO)
    assert most.better(TWO, ONE)
    assert not least.better(ONE, ONE)
    assert not most.better(ONE, ONE)
    assert least.text(("x", "y")) == "minimize 2 x - y + 1"


@pytest.mark.parametrize(
    ("parts", "error", "message"),
    [
        ({"variables": ()}, ModelError, "at least one variable, got none"),
        ({"variables": ("x", "x")}, DuplicateName, "the variable 'x' is given twice"),
        ({"variables": ("x", " ")}, ModelError, "the name of a variable as text, got ' '"),
        ({"variables": ("x", 3)}, ModelError, "the name of a variable as text, got 3"),
        (
            {"constraints": (Constraint("r", (ONE, ONE), "<=", ONE),) * 2},
            DuplicateName,
            "constraint 'r' is given twice",
        ),
        ({"constraints": (Constraint("r", (ONE,), "<=", ONE),)}, ModelError, "'r': expected 2 coefficients, .* got 1"),
        ({"constraints": (Constraint("r", (ONE, ONE), "<", ONE),)}, ModelError, "'r': expected <=, >= or ==, got '<'"),
        ({"objective": Objective("min", (ONE,))}, ModelError, "the objective: expected 2 coefficients"),
        ({"objective": Objective("least", (ONE, ONE))}, ModelError, "expected the goal 'min' or 'max', got 'least'"),
        ({"units": (("z", "MW"),)}, UnknownName, r"the model \(units\) has no variable or constraint 'z'"),
        ({"integers": ("z",)}, UnknownName, "no variable 'z'"),
    ],
)
def test_parts_that_make_no_model(parts, error, message):
    with pytest.raises(error, match=message):
        Model(**{"variables": ("x", "y")} | parts)


def test_a_model_without_constraints_is_the_whole_space():
    space = Model(("x",))
    assert (space.constraints, space.objective, space.free) == ((), None, ("x",))


def test_frozen_and_hashable(model):
    with pytest.raises(FrozenInstanceError):
        model.name = "other"
    assert hash(model) == hash(model.with_rhs("heat", 9))
    assert model == model.with_rhs("heat", 9)
    assert model != model.with_rhs("heat", 10)


def test_lookups(model):
    assert model.n == 2
    assert model.index("chips") == 1
    assert model.constraint("grid").rhs == 2
    assert (model.unit("pump"), model.unit("heat"), model.unit("chips")) == ("MW", "MWh", "")
    with pytest.raises(UnknownName, match="no variable 'pmup'; did you mean 'pump'") as caught:
        model.index("pmup")
    assert caught.value.culprit == "pmup"
    with pytest.raises(UnknownName, match="no constraint 'heta'; did you mean 'heat'"):
        model.constraint("heta")


def test_free_variables():
    rows = {"single": "3*a <= 2", "equality": "b == 1", "joint": "c + d <= 1", "d low": "-d <= 0", "none": "0*e <= 1"}
    assert pw.from_algebra(constraints=rows).free == ("c", "e")


def test_points(model):
    assert model.point({"chips": "1/2", "pump": 0.1}) == (Fraction(1, 10), Fraction(1, 2))
    assert model.point([1, 2]) == (1, 2)
    with pytest.raises(UnknownName, match="'tank'"):
        model.point({"pump": 1, "tank": 2})
    with pytest.raises(ModelError, match="a value for every variable; 'chips' has none"):
        model.point({"pump": 1})
    with pytest.raises(ModelError, match=r"expected 2 values \(pump, chips\), got 3"):
        model.point([1, 2, 3])
    with pytest.raises(NumberError):
        model.point([1, float("nan")])


def test_edits_return_changed_copies(model):
    before = str(model)
    assert model.with_rhs("heat", "19/2").constraint("heat").rhs == Fraction(19, 2)
    assert model.with_objective({"chips": 0.1}, "max", 3).objective == Objective(
        "max", (0, Fraction(1, 10)), Fraction(3)
    )
    assert model.without_objective().objective is None
    more = model.with_constraint("cap", {"chips": 2}, "<=", 7, origin="review")
    assert more.constraints[-1] == Constraint("cap", (Fraction(0), TWO), "<=", Fraction(7), "review")
    assert more.constraints[:-1] == model.constraints
    assert str(model) == before


def test_edits_refuse_what_is_not_there(model):
    for edit in (
        lambda: model.with_rhs("haet", 1),
        lambda: model.without("heat", "haet"),
        lambda: model.with_objective({"x": 1}, "min"),
        lambda: model.with_constraint("cap", {"x": 1}, "<=", 1),
        lambda: model.fix("x", 1),
    ):
        with pytest.raises(UnknownName):
            edit()
    with pytest.raises(DuplicateName, match="'heat'"):
        model.with_constraint("heat", {"pump": 1}, "<=", 1)
    with pytest.raises(NumberError):
        model.with_rhs("heat", float("inf"))


def test_without_takes_the_units_along(model):
    fewer = model.without("heat", "mix")
    assert [row.name for row in fewer.constraints] == ["grid", "pump lower", "pump upper", "chips lower"]
    assert fewer.units == (("pump", "MW"),)
    same = pw.from_algebra(constraints={"x": "x <= 1"}, units={"x": "MW"})
    assert same.without("x").units == (("x", "MW"),)  # the variable of that name still has its unit


def test_fix_moves_every_remainder(model):
    fixed = model.fix("pump", 6)
    assert fixed.variables == ("chips",)
    assert fixed.objective == Objective("min", (Fraction(27),), Fraction(32 * 6 - 5))
    assert [(row.name, row.coefficients, row.rhs) for row in fixed.constraints] == [
        ("heat", (1,), 3),
        ("grid", (0,), 0),
        ("mix", (-2,), -6),
        ("pump lower", (0,), -6),
        ("pump upper", (0,), -1),
        ("chips lower", (1,), 0),
    ]
    assert not fixed.constraint("pump upper").holds((Fraction(3),))  # 6 was above its bound of 5: now 0 <= -1
    assert fixed.units == (("heat", "MWh"),)
    assert model.fix("chips", 1).integers == ()
    with pytest.raises(ModelError, match="at least one variable"):
        fixed.fix("chips", 0)


@pytest.mark.parametrize("place", range(2))
def test_fix_agrees_with_substitution(model, place):
    point = (Fraction(7, 2), Fraction(-4, 3))
    fixed = model.fix(model.variables[place], point[place])
    rest = point[:place] + point[place + 1 :]
    assert fixed.objective.at(rest) == model.objective.at(point)
    for row in model.constraints:
        assert fixed.constraint(row.name).slack(rest) == row.slack(point)


def test_shown(model):
    assert str(model).splitlines() == [
        "one hour: minimize 32 pump + 27 chips - 5",
        "constraint   rule                origin",
        "heat         pump + chips ≥ 9",
        "grid         1/3 pump ≤ 2",
        "mix          pump - 2 chips = 0",
        "pump lower   pump ≥ 0            bounds",
        "pump upper   pump ≤ 5            bounds",
        "chips lower  chips ≥ 0           bounds",
        "marked integer (drawn and walked as the relaxation): chips",
        "units: pump in MW, heat in MWh",
    ]
    assert repr(model) == str(model)
    assert list(model.frame().columns) == ["constraint", "rule", "origin"]


def test_names_are_escaped_in_html():
    evil = "<img src=x onerror=alert(1)>"
    page = Model((evil,), (Constraint(evil + "2", (ONE,), "<=", ONE, evil),), None, ((evil, evil),), (evil,), evil)
    shown = page._repr_html_()
    assert "<img" not in shown
    assert escape(evil) in shown
