"""MPS files: the format's own cases, what HiGHS alters, what is refused and where, and the round trip."""

import gzip
import subprocess
import sys
import tempfile
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import Phase, given, settings
from hypothesis import strategies as st

import polywalk as pw
from polywalk.bigmodel import BigModel
from polywalk.errors import FileError

INF = np.inf

FREE = """* all senses, ranges and bounds; free format
NAME plant
OBJSENSE
    MAX
ROWS
 N cost
 L most
 G least
 E tie
 E up
 E down
COLUMNS
 x cost 1 most 1
 x least 1.5D0
 MARK 'MARKER' 'INTORG'
 n most 1 tie 1
 MARK 'MARKER' 'INTEND'
 a tie 1 up 1
 b up 1 down 1
 c down 1
 d most 1
 e most 1
 f most 1
RHS
 RHS cost -7 most 4
 RHS least 1 tie 2
 RHS up 3 down 3
RANGES
 RNG most 2.5 least 2
 RNG up 2 down -2
BOUNDS
 UP BND n 9
 LO BND a -1
 UP BND a 5
 FX BND b 2
 FR BND c
 MI BND d
 UP BND d 3
 PL BND e
 BV BND f
ENDATA
"""

FIXED = """NAME          FIXED
ROWS
 N  COST
 L  LIM 1
 G  LIM2
COLUMNS
    X ONE     COST                1.   LIM 1               1.
    X ONE     LIM2                1.
    Y         COST                2.   LIM 1               1.
RHS
    RHS       LIM 1               4.   LIM2                1.
BOUNDS
 UP BND       X ONE               4.
ENDATA
"""


def put(folder, text, name="plant.mps"):
    path = folder / name
    path.write_bytes(text if isinstance(text, bytes) else text.encode())
    return path


def test_free_format_with_every_sense_range_and_bound(tmp_path):
    big = pw.from_mps(put(tmp_path, FREE))
    assert (big.name, big.goal, big.constant, big.integers) == ("plant", "max", 7, ("n", "f"))
    assert dict(zip(big.rows, zip(big.row_lower, big.row_upper, strict=True), strict=True)) == {
        "most": (1.5, 4),
        "least": (1, 3),
        "tie": (2, 2),
        "up": (3, 5),
        "down": (1, 3),
    }
    assert dict(zip(big.variables, zip(big.lower, big.upper, strict=True), strict=True)) == {
        "x": (0, INF),
        "n": (0, 9),
        "a": (-1, 5),
        "b": (2, 2),
        "c": (-INF, INF),
        "d": (-INF, 3),
        "e": (0, INF),
        "f": (0, 1),
    }
    assert big.row("least") == {"x": 1.5}
    assert big.notes == ()


def test_fixed_format_with_spaces_in_names(tmp_path):
    big = pw.from_mps(put(tmp_path, FIXED))
    assert big.variables == ("X ONE", "Y")
    assert big.rows == ("LIM 1", "LIM2")
    assert big.row("LIM 1") == {"X ONE": 1, "Y": 1}
    assert (big.upper[0], big.row_upper[0], big.goal) == (4, 4, "min")


def test_gzip_goes_by_content_and_the_name_by_the_file(tmp_path):
    packed = put(tmp_path, gzip.compress(FREE.replace("NAME plant", "NAME").encode()), "mill.txt")
    assert pw.from_mps(packed).name == "mill"


def altered(folder, old, new):
    assert old in FREE
    return pw.from_mps(put(folder, FREE.replace(old, new, 1)))


@pytest.mark.parametrize(
    ("old", "new", "words"),
    [
        (" e most 1\n", " e most 1e-13\n", "1 coefficients of at most 1e-12 were left out: 'e' in 'most'"),
        (" L most\n", " N other\n N more\n L most\n", "2 further free rows (N) were left out: other, more"),
        ("x cost 1 most 1", "x cost 1 most 0.33333333333333333333", "more digits than a float keeps"),
        (" f most 1\n", " f most 1 most 2\n", "given a second time were left out: 'f' in 'most'"),
        (" UP BND n 9\n", "", "upper bound 1"),
        (" BV BND f", " UP BND f -2", "kept the lower bound 0: f"),
        (" PL BND e", " UP BND e 1e30", "mean none: 'e'"),
        ("tie 2\n RHS up 3 down 3\nRANGES\n", "tie 0.1\n RHS up 3 down 3\nRANGES\n RNG tie 0.2\n", "added up: 'tie'"),
    ],
)
def test_what_highs_alters_is_said(tmp_path, old, new, words):
    big = altered(tmp_path, old, new)
    assert [words in note for note in big.notes] == [True]
    assert big.notes[0] in str(big)


def test_small_and_large_coefficients_survive(tmp_path):
    assert altered(tmp_path, " e most 1\n", " e most 1e-11\n").row("most")["e"] == 1e-11
    assert altered(tmp_path, " e most 1\n", " e most 1e17\n").row("most")["e"] == 1e17


def test_no_objective(tmp_path):
    text = FREE.replace("cost 1 most 1", "most 1").replace("cost -7 ", "")
    assert pw.from_mps(put(tmp_path, text)).goal is None


@pytest.mark.parametrize(
    ("old", "new", "line", "words"),
    [
        ("ENDATA\n", "", 40, "without ENDATA"),
        ("x least 1.5D0", "x nothing 1", 14, "row 'nothing' is not in the section ROWS"),
        ("x least 1.5D0", "x least 1,5", 14, "'1,5'"),
        ("x least 1.5D0", "x least nan", 14, "nan"),
        ("x least 1.5D0", "x least 1e999", 14, "beyond"),
        ("x least 1.5D0", "x least", 14, "entries"),
        (" L most", " Q most", 7, "N, L, G or E"),
        (" G least", " G most", 8, "given twice"),
        (" FR BND c", " FR BND z", 36, "'z' is not in the section COLUMNS"),
        (" FR BND c", " SC BND c 4", 36, "semi-continuous"),
        (" FR BND c", " XX BND c 4", 36, "type of bound"),
        (" UP BND n 9", " UP BND n", 32, "'BND' is not in"),
        ("RANGES", "QUADOBJ", 28, "QUADOBJ is not linear"),
        ("RANGES", "CHANGES", 28, "'CHANGES' is no section"),
        ("    MAX", "    MOST", 4, "MIN or MAX"),
        (" f most 1\n", " f most 1\n x tie 1\n", 24, "comes back"),
        ("* all", '* polywalk row "x"\n* all', 1, "remove the comment"),
        (" RHS least 1 tie 2", " RHS lest 1 tie 2", 26, "'lest'"),
    ],
)
def test_a_broken_file_is_refused_with_its_line(tmp_path, old, new, line, words):
    assert old in FREE
    path = put(tmp_path, FREE.replace(old, new, 1))
    with pytest.raises(FileError, match=words) as caught:
        pw.from_mps(path)
    assert caught.value.line == line
    assert str(path) in str(caught.value)


@pytest.mark.parametrize(
    ("content", "words"),
    [
        (b"", "empty"),
        (b" \n\n", "empty"),
        (b"hello\n", "is this an MPS file"),
        (b"hello there\n", "is this an MPS file"),
        (FREE.encode("utf-16"), "UTF-16"),
        (FREE.replace("most", "m\xf6st").encode("latin-1"), "line 7: expected UTF-8, got the byte 0xf6"),
        (gzip.compress(FREE.encode())[:-20], "damaged or cut short"),
        (b"\x1f\x8bnothing", "damaged"),
        (b"NAME\nROWS\n N c\n\0\n", "line 4"),
        (b"NAME a\nROWS\n N c\nCOLUMNS\nENDATA\n", "at least one variable"),
        (b"NAME a\nENDATA\n", "at least one variable"),
    ],
)
def test_what_is_no_mps_file_is_refused(tmp_path, content, words):
    with pytest.raises(FileError, match=words):
        pw.from_mps(put(tmp_path, content))


def test_every_cut_of_a_file_is_refused(tmp_path):
    for cut in range(len(FREE) - len("ENDATA\n")):
        with pytest.raises(FileError):
            pw.from_mps(put(tmp_path, FREE[:cut]))


@pytest.mark.parametrize("path", ["no such file.mps", "."])
def test_a_path_that_is_no_file(path):
    with pytest.raises(FileError, match="readable file"):
        pw.from_mps(path)


@pytest.mark.parametrize("path", [None, 3, b"plant.mps"])
def test_what_is_no_path(path):
    for read in (pw.from_mps, pw.from_toml):
        with pytest.raises(FileError, match="expected the path of a file"):
            read(path)


def test_a_path_that_cannot_be_written(tmp_path):
    with pytest.raises(FileError, match="can be written"):
        pw.to_mps(pw.scenarios.harbour_row(), tmp_path / "no folder" / "a.mps")


def test_nothing_is_printed_not_even_the_banner(tmp_path):
    path = put(tmp_path, FREE.replace(" e most 1\n", " e most 1e-13\n"))
    code = f"import polywalk as pw; pw.from_mps({str(path)!r})"
    answer = subprocess.run([sys.executable, "-c", code], capture_output=True, check=True)
    assert (answer.stdout, answer.stderr) == (b"", b"")


def test_without_highspy_the_remedy_is_named(tmp_path, monkeypatch):
    monkeypatch.setitem(sys.modules, "highspy", None)
    with pytest.raises(pw.PolywalkError, match="pip install highspy"):
        pw.from_mps(put(tmp_path, FREE))


WORDS = st.one_of(
    st.sampled_from(
        ["pump[7]", "heat demand", "RHS", "* star", "$ dollar", "1e5", "_", "objective", "a b", "a_b", "é"]
    ),
    st.text(st.characters(blacklist_categories=("Cs",)), min_size=1, max_size=9),
).filter(str.strip)
NUMBERS = st.one_of(
    st.integers(-50, 50).map(float),
    st.floats(-1e15, 1e15).filter(lambda value: value == 0 or abs(value) > 1e-11),
)
ENDS = st.tuples(st.one_of(st.just(-INF), NUMBERS), st.one_of(st.just(INF), NUMBERS))


@st.composite
def big_models(draw):
    columns = draw(st.lists(WORDS, min_size=1, max_size=4, unique=True))
    rows = draw(st.lists(WORDS.filter(lambda name: name not in columns), max_size=4, unique=True))
    cells = [[draw(NUMBERS) if draw(st.booleans()) else 0.0 for _ in columns] for _ in rows]
    found = [[(j, value) for j, value in enumerate(row) if value] for row in cells]
    sides, bounds = ([draw(ENDS) for _ in names] for names in (rows, columns))
    cost, constant = [draw(NUMBERS) for _ in columns], draw(NUMBERS)
    return BigModel(
        tuple(columns),
        tuple(rows),
        np.cumsum([0, *map(len, found)]),
        [j for row in found for j, _ in row],
        [value for row in found for _, value in row],
        [low for low, _ in sides],
        [high for _, high in sides],
        [low for low, _ in bounds],
        [high for _, high in bounds],
        cost,
        draw(st.sampled_from(["min", "max"])) if any(cost) or constant else None,
        constant,
        tuple(name for name in columns if draw(st.booleans())),
        tuple((name, draw(WORDS)) for name in columns if draw(st.booleans())),
        draw(st.sampled_from(["plant", "two words", " edge", "line\nbreak", "FREE"])),
    )


@given(big_models())
@settings(max_examples=80, deadline=None, derandomize=True, phases=[Phase.generate])
def test_round_trip(big):
    with tempfile.TemporaryDirectory() as folder:
        pw.to_mps(big, f"{folder}/a.mps")
        again = pw.from_mps(f"{folder}/a.mps")
    if again.rows == big.rows:
        assert again == big
        return
    assert set(big.rows) - set(again.rows)  # a range that floats cannot tell: its two sides are rows of their own
    assert replace(again, rows=(), indptr=[0], indices=[], data=[], row_lower=[], row_upper=[]) == replace(
        big, rows=(), indptr=[0], indices=[], data=[], row_lower=[], row_upper=[]
    )
    assert {row.name: row for row in again.to_model().constraints} == {
        row.name: row for row in big.to_model().constraints
    }


def test_the_exact_model_comes_back(tmp_path):
    model = pw.scenarios.harbour_row()
    pw.to_mps(model, tmp_path / "row.mps.gz")
    again = pw.from_mps(tmp_path / "row.mps.gz").to_model()
    assert [(row.name, row.coefficients, row.sense, row.rhs) for row in again.constraints] == [
        (row.name, row.coefficients, row.sense, row.rhs) for row in model.constraints
    ]
    assert (again.objective, again.units, again.name) == (model.objective, model.units, model.name)
