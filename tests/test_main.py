"""``python -m polywalk``: what it prints, what it writes, and how it fails."""

import os
import subprocess
import sys

import pytest

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
