"""``python -m polywalk``: what it prints, what it writes, and how it fails."""

import os
import subprocess
import sys

import pytest

import polywalk as pw
from polywalk.__main__ import main


def run(folder, *words, **environment):
    return subprocess.run(
        [sys.executable, "-m", "polywalk", *words],
        cwd=folder,
        capture_output=True,
        check=False,
        timeout=120,
        env={**os.environ, **environment},
    )


def test_the_demo_prints_and_writes(tmp_path):
    done = run(tmp_path, PYTHONUTF8="1")
    said = done.stdout.decode()
    assert (done.returncode, done.stderr) == (0, b"")
    for part in (
        "Harbour Row: maximize 23 pump",
        "13 vertices",
        "after 4 pivots",
        "after 6 pivots",
        "harbour-row.html",
    ):
        assert part in said
    assert [path.name for path in tmp_path.iterdir()] == ["harbour-row.html"]
    page = (tmp_path / "harbour-row.html").read_text(encoding="utf-8")
    assert "return temperature" in page
    assert len(page) > 1_000_000  # plotly.js is inside: the file works without a network


def test_another_file_and_a_plain_terminal(tmp_path):
    done = run(tmp_path, "--html", "other.html", PYTHONIOENCODING="ascii", PYTHONUTF8="0")
    assert done.returncode == 0, done.stderr
    assert b"pump ? 0" in done.stdout
    assert (tmp_path / "other.html").exists()


def test_a_file_is_replaced_as_a_whole(tmp_path, capsys):
    target = tmp_path / "picture.html"
    target.write_text("old")
    assert main(["--html", str(target)]) == 0
    assert "return temperature" in target.read_text(encoding="utf-8")
    assert list(tmp_path.iterdir()) == [target]
    assert str(target) in capsys.readouterr().out


def test_a_failure_is_told_and_leaves_nothing(tmp_path, capsys):
    assert main(["--html", str(tmp_path / "missing" / "picture.html")]) == 2
    assert "there is no folder" in capsys.readouterr().err
    (tmp_path / "folder.html").mkdir()
    assert main(["--html", str(tmp_path / "folder.html")]) == 2
    assert "could not be written" in capsys.readouterr().err
    assert [path.name for path in tmp_path.iterdir()] == ["folder.html"]


@pytest.mark.parametrize(("word", "code"), [("--help", 0), ("--bad", 2)])
def test_help_and_unknown_words(word, code, capsys):
    with pytest.raises(SystemExit) as left:
        main([word])
    assert left.value.code == code
    told = capsys.readouterr()
    assert "usage: python -m polywalk" in told.out + told.err


@pytest.fixture
def plant(tmp_path):
    """A function that writes a model as a file and hands back its path."""

    def write(model, name="plant.mps"):
        path = tmp_path / name
        (pw.to_toml if ".toml" in name else pw.to_mps)(model, path)
        return str(path)

    return write


def test_a_small_file_is_shown_whole(plant, tmp_path, capsys):
    path = plant(pw.scenarios.harbour_row())
    assert main([path, "--rules", "bland", "dantzig", "--html", str(tmp_path / "out.html")]) == 0
    said = capsys.readouterr().out
    for part in ("5 rows, 10 nonzeros", "13 vertices", "bland from", "dantzig from", "checked:", "out.html"):
        assert part in said
    assert "harbour main" in (tmp_path / "out.html").read_text(encoding="utf-8")


@pytest.mark.parametrize("name", ["day.mps", "day.mps.gz"])
def test_a_large_file_by_its_shadow(plant, capsys, name):
    path = plant(pw.scenarios.harbour_day(), name)
    assert main([path, "--onto", "pump[7]", "tank[7]", "--rules", "bland"]) == 0
    said = capsys.readouterr().out
    assert "Harbour Row, 24 hours onto pump[7], tank[7]" in said
    assert "the objective depends on other variables too" in said
    assert "nothing is optimized" not in said
    assert "no-objective" not in said  # the file has an objective


def test_a_file_without_an_objective_is_told_so(plant, capsys):
    assert main([plant(pw.scenarios.harbour_row().without_objective()), "--onto", "pump", "tank"]) == 0
    assert "nothing is optimized" in capsys.readouterr().out


def test_a_conflict_that_was_added_up_is_not_reviewed(plant, capsys, monkeypatch):
    monkeypatch.setattr("polywalk.narrowing.culprits.TRYING", 0.5)
    assert main([plant(pw.scenarios.harbour_year(500).with_rhs("timber", 111))]) == 3
    said = capsys.readouterr().out
    assert "relaxed to" in said
    assert "Neither reviewed nor drawn: it is a sum" in said


def test_a_long_conflict_is_folded(plant, capsys):
    assert main([plant(pw.scenarios.harbour_day().with_rhs("timber", 11.96))]) == 3
    said = capsys.readouterr().out
    assert "\ntimber  " in said
    assert " alike" in said
    assert said.count("\n") < 40


def test_near_the_optimum_with_the_objective_as_an_axis(plant, capsys):
    path = plant(pw.scenarios.harbour_day())
    assert main([path, "--onto", "pump[7]", "objective", "--within", "1%", "--rules", "bland"]) == 0
    assert "bland from" in capsys.readouterr().out


def test_a_section_at_the_optimum(plant, capsys):
    path = plant(pw.scenarios.harbour_row(), "plant.toml")
    assert main([path, "--onto", "pump", "chips", "--section"]) == 0
    assert "pump" in capsys.readouterr().out


def test_axes_are_suggested_where_none_are_named(plant, capsys):
    assert main([plant(pw.scenarios.harbour_year(6))]) == 0
    assert "suggested axes" in capsys.readouterr().out


@pytest.mark.parametrize("variant", ["infeasible", "unbounded"])
@pytest.mark.parametrize("words", [[], ["--onto", "pump", "chips"]])
def test_findings_of_severity_error_are_code_3(plant, tmp_path, variant, words, capsys):
    target = tmp_path / "out.html"
    code = main([plant(pw.scenarios.harbour_row(variant)), *words, "--html", str(target)])
    assert code == (0 if (variant, len(words)) == ("unbounded", 3) else 3)  # that shadow has no objective
    told = capsys.readouterr().out
    assert ("ERROR" in told) == (code == 3)
    assert ("There is no optimum" in told) == (code == 0)
    assert target.exists()


def test_a_large_conflict_is_told_and_not_drawn(plant, tmp_path, capsys):
    morning = pw.scenarios.harbour_year(5).with_rhs("timber", 4)
    code = main([plant(morning), "--html", str(tmp_path / "out.html")])
    said = capsys.readouterr().out
    assert code == 3
    assert "conflict in" in said
    assert "look first at 'timber': relaxed to" in said
    assert "Neither reviewed nor drawn" in said
    assert not (tmp_path / "out.html").exists()


@pytest.mark.parametrize(
    ("words", "reason"),
    [
        (["no such.mps"], "No such file"),
        (["{plant}", "--onto", "pomp"], "did you mean 'pump'"),
        (["{plant}", "--onto", "pump", "chips", "tank", "objective"], ""),
        (["{plant}", "--rules", "blond"], "no entering rule 'blond'"),
        (["{plant}", "--onto", "pump", "--within", "much"], "much"),
        (["{plant}", "--onto", "pump", "--section", "--within", "5%"], "leave one out"),
        (["--onto", "pump"], "name the file first"),
        (["{plant}", "--html", "."], "it is a folder; name another"),
        (["{broken}"], "line 1"),
    ],
)
def test_bad_input_is_code_2_with_the_reason(plant, tmp_path, capsys, words, reason):
    broken = tmp_path / "broken.mps"
    broken.write_text("nothing of the kind")
    paths = {"plant": plant(pw.scenarios.harbour_row()), "broken": str(broken)}
    assert main([word.format(**paths) for word in words]) == 2
    told = capsys.readouterr().err
    assert reason in told
    assert told.count("\n") < 8


def test_the_help_needs_no_manual(capsys):
    with pytest.raises(SystemExit):
        main(["--help"])
    told = capsys.readouterr().out
    for part in (
        "--onto",
        "--section",
        "--within",
        "--rules",
        "--html",
        "examples:",
        "exit codes:",
        "steepest-edge",
        "5%",
        "130",
    ):
        assert part in told
    assert "%%" not in told


def test_a_pipe_that_closes_is_no_traceback(tmp_path, plant):
    path = plant(pw.scenarios.harbour_row())
    done = subprocess.run(
        f'"{sys.executable}" -m polywalk "{path}" | true', shell=True, capture_output=True, check=False, timeout=120
    )
    assert b"Traceback" not in done.stderr
