"""The progress bar: nothing for short work, one line for long work, gone at the end, in a terminal and a notebook."""

import io
import sys

import pytest

from polywalk import progress as module
from polywalk.progress import Notebook, Terminal, bar, progress


class Paper:
    """A screen that keeps every line."""

    def __init__(self):
        self.lines = []

    def show(self, line):
        self.lines.append(line)


@pytest.fixture
def clock(monkeypatch):
    """A clock that only the test moves."""
    now = [100.0]
    monkeypatch.setattr(module.time, "monotonic", lambda: now[0])
    return now


def test_short_work_shows_nothing(clock):
    paper = Paper()
    for _ in progress(range(9), 9, "walks", paper):
        clock[0] += 0.1
    assert paper.lines == []


def test_long_work_shows_a_growing_bar_and_takes_it_away(clock):
    paper, seen = Paper(), []
    for item in progress("abcdef", 6, "walks", paper):
        seen.append(item)
        clock[0] += 0.6
    assert seen == list("abcdef")
    assert [line.split("] ")[-1] for line in paper.lines[:2]] == [
        "2 of 6 walks, about 2 s to go",
        "3 of 6 walks, about 2 s to go",
    ]
    assert [line.count("#") for line in paper.lines] == [10, 15, 20, 25, 0]
    assert paper.lines[-1] == ""


def test_fast_steps_are_not_all_drawn(clock):
    paper = Paper()
    for _ in progress(range(3000), 3000, "walks", paper):
        clock[0] += 0.001
    assert 15 <= len(paper.lines) <= 22


def worked(paper, clock, trouble):
    """A loop that fails in its fifth round."""
    for item in progress(range(9), 9, "walks", paper):
        clock[0] += 1.5
        if item == 4:
            raise trouble


@pytest.mark.parametrize("trouble", [KeyboardInterrupt, ValueError])
def test_trouble_goes_through_and_takes_the_bar_away(clock, trouble):
    paper = Paper()
    with pytest.raises(trouble):
        worked(paper, clock, trouble)
    assert [line.count("#") for line in paper.lines] == [3, 6, 10, 13, 0]
    assert paper.lines[-1] == ""


def test_a_terminal_line_is_rewritten_in_place():
    stream = io.StringIO()
    terminal = Terminal(stream)
    for line in ("long line", "short", ""):
        terminal.show(line)
    assert stream.getvalue() == "\rlong line\rshort    \r     \r"


def test_a_pipe_gets_nothing(capsys, clock):
    for _ in progress(range(4), 4, "walks"):
        clock[0] += 2
    assert capsys.readouterr() == ("", "")


def test_a_terminal_gets_the_bar(monkeypatch, clock):
    stream = io.StringIO()
    stream.isatty = lambda: True
    monkeypatch.setattr(sys, "stderr", stream)
    for _ in progress(range(4), 4, "walks"):
        clock[0] += 2
    assert "1 of 4 walks, about 6 s to go" in stream.getvalue()
    assert stream.getvalue().endswith("\r")


def test_a_notebook_gets_one_output_that_changes(monkeypatch, clock):
    shown = []

    class Handle:
        def update(self, data, raw):
            shown.append(("update", data["text/plain"], raw))

    class Shell:
        kernel = object()

    def display(data, raw, display_id):
        shown.append(("display", data["text/plain"], display_id))
        return Handle()

    import IPython.display

    monkeypatch.setattr(IPython.display, "display", display)
    monkeypatch.setattr(IPython, "get_ipython", Shell)
    for _ in progress(range(4), 4, "walks"):
        clock[0] += 2
    assert [kind for kind, _, _ in shown] == ["display", "update", "update", "update"]
    assert "1 of 4 walks" in shown[0][1]
    assert shown[-1][1] == ""
    assert isinstance(module._screen(), Notebook)


@pytest.mark.parametrize(("done", "filled"), [(0, 0), (1, 10), (3, 30)])
def test_the_bar_is_as_full_as_the_work(done, filled):
    line = bar(done, 3, "walks", 3.0)
    assert line.index("]") == 31
    assert line.count("#") == filled
    assert ("to go" in line) == (done > 0)
