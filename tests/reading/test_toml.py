"""Model files of our own: what they hold, what is refused and where, and that everything comes back."""

from dataclasses import replace
from fractions import Fraction

import pytest
import zoo
from hypothesis import Phase, given, settings
from hypothesis import strategies as st

import polywalk as pw
from polywalk.errors import FileError
from polywalk.model import Constraint, Objective

TEXT = """# the demo, with a comment
name = "Harbour"
maximize = "23*pump + 18*chips + 1/3"
integers = ["chips"]

[constraints]
"harbour main" = "pump + chips ≤ 12.1"
"return temperature" = "1 <= pump/3 <= 4 + chips - chips"

[bounds]
pump = ["1/3", inf]
chips = [0, 1_000.5]

[units]
pump = "MW"
"harbour main" = "MW"
"""


def put(folder, text):
    path = folder / "plant.toml"
    path.write_bytes(text if isinstance(text, bytes) else text.encode())
    return path


def test_a_file_typed_by_hand(tmp_path):
    model = pw.from_toml(put(tmp_path, TEXT))
    assert (model.name, model.integers) == ("Harbour", ("chips",))
    assert model.objective.constant == Fraction(1, 3)
    assert model.constraint("harbour main").rhs == Fraction(121, 10)
    assert model.constraint("return temperature lower").coefficients == (Fraction(1, 3), 0)
    assert model.constraint("pump lower").rhs == Fraction(1, 3)
    assert model.constraint("chips upper").rhs == Fraction(2001, 2)
    assert model.unit("harbour main") == "MW"


@pytest.mark.parametrize("variant", sorted(pw.scenarios.VARIANTS))
def test_the_scenario_comes_back(tmp_path, variant):
    model = pw.scenarios.harbour_row(variant)
    pw.to_toml(model, tmp_path / "a.toml")
    assert pw.from_toml(tmp_path / "a.toml") == model


def test_the_awkward_models_come_back(tmp_path):
    models = [entry[0] for entry in zoo.ZOO.values()]
    models += [pw.from_arrays([1, 2], [[1, 3]], [4]), pw.scenarios.beale(), pw.scenarios.cube(3)]
    assert len(models) > 10
    for model in models:
        pw.to_toml(model, tmp_path / "a.toml.gz")
        assert pw.from_toml(tmp_path / "a.toml.gz") == model


NAMES = st.one_of(
    st.sampled_from(["x", "pump[7]", "heat pump", "v1", "lambda", 'say "so"', "a\\b", "x lower", "é", "\x7f", "1"]),
    st.text(st.characters(blacklist_categories=("Cs",)), min_size=1, max_size=6),
).filter(str.strip)
NUMBERS = st.fractions(-100, 100, max_denominator=99)


@st.composite
def models(draw):
    variables = tuple(draw(st.lists(NAMES, min_size=1, max_size=4, unique=True)))
    row = st.tuples(*[NUMBERS] * len(variables))
    rows = tuple(
        Constraint(
            name, draw(row), draw(st.sampled_from(["<=", ">=", "=="])), draw(NUMBERS), draw(st.sampled_from(["", "p"]))
        )
        for name in draw(st.lists(NAMES, max_size=4, unique=True))
    )
    goal = Objective(draw(st.sampled_from(["min", "max"])), draw(row), draw(NUMBERS)) if draw(st.booleans()) else None
    units = tuple((name, draw(NAMES)) for name in variables if draw(st.booleans()))
    return pw.Model(variables, rows, goal, units, variables[: draw(st.integers(0, 2))], draw(NAMES))


@given(models())
@settings(max_examples=150, deadline=None, derandomize=True, phases=[Phase.generate])
def test_any_model_comes_back(tmp_path_factory, model):
    path = tmp_path_factory.getbasetemp() / "any.toml"
    pw.to_toml(model, path)
    assert pw.from_toml(path) == model


def test_a_row_without_variables_comes_back(tmp_path):
    model = pw.scenarios.harbour_row()
    nothing = Constraint("nothing", (Fraction(0),) * 3, "<=", Fraction(-1))
    model = replace(model, constraints=(nothing, *model.constraints))
    pw.to_toml(model, tmp_path / "a.toml")
    assert pw.from_toml(tmp_path / "a.toml") == model


@pytest.mark.parametrize(
    ("old", "new", "words"),
    [
        ("[bounds]", "[bounds", "line 10: expected TOML"),
        ("integers = ", "integer = ", "did you mean 'integers'"),
        ('["chips"]', '"chips"', "integers: expected a list of names"),
        ('["chips"]', '["chops"]', "'chops'"),
        ('["chips"]', "[3]", "integers, 1: expected text, got 3"),
        ('"pump + chips ≤ 12.1"', '"pump*chips <= 12"', "harbour main"),
        ('"pump + chips ≤ 12.1"', "12", "'harbour main': expected text"),
        ('["1/3", inf]', "[5, 1]", "above the upper bound"),
        ('["1/3", inf]', "5", "expected a pair"),
        ('["1/3", inf]', "[nan, 1]", "finite"),
        ('pump = "MW"', 'pomp = "MW"', "'pomp'"),
        ("[units]", '[origins]\nnone = "x"\n[units]', "'none'"),
        ("[units]", '[names]\nnone = "x"\n[units]', "'none'"),
        ("maximize", 'minimize = "pump"\nmaximize', "got both"),
    ],
)
def test_a_broken_file_is_refused_with_its_place(tmp_path, old, new, words):
    assert old in TEXT
    path = put(tmp_path, TEXT.replace(old, new, 1))
    with pytest.raises(FileError, match=words) as caught:
        pw.from_toml(path)
    assert str(path) in str(caught.value)


@pytest.mark.parametrize("content", [b"", b"\xff\xfe\x00", TEXT.encode("latin-1", "replace").replace(b"?", b"\xe4")])
def test_what_is_no_model_file(tmp_path, content):
    with pytest.raises(FileError):
        pw.from_toml(put(tmp_path, content))


def test_every_cut_is_read_or_refused(tmp_path):
    read = 0
    for cut in range(0, len(TEXT), 3):
        path = put(tmp_path, TEXT[:cut])
        try:
            read += isinstance(pw.from_toml(path), pw.Model)
        except FileError:  # anything else would be a traceback for the user
            continue
    assert 0 < read < len(TEXT) / 3
