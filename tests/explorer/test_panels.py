"""The panels: what they show is what was computed below, and what they do is what the state does."""

from __future__ import annotations

import asyncio
import random
from fractions import Fraction
from pathlib import Path

import pytest

import polywalk as pw
from polywalk.explorer.explorer import Explorer
from polywalk.reviewing.crowding import crowding

HARBOUR = pw.scenarios.harbour_row()


def column(rows: object, title: str) -> list[str]:
    place = rows.columns.index(title)
    return [row[place] for row in rows.rows]


def large() -> pw.Model:
    """Ten variables, two hundred constraints: listing the vertices takes seconds."""
    draw = random.Random(1)
    rows = {f"row {k}": " + ".join(f"{draw.randint(1, 20)}*x{j}" for j in range(10)) + " <= 40" for k in range(190)}
    return pw.from_algebra(
        maximize=" + ".join(f"x{j}" for j in range(10)),
        constraints=rows,
        bounds={f"x{j}": (0, None) for j in range(10)},
    )


def test_the_constraints_tell_sense_right_hand_side_slack_and_marks() -> None:
    region = pw.region(HARBOUR)
    crowded = next(k for k, vertex in enumerate(region.vertices) if vertex.degenerate)
    explorer = pw.explore(HARBOUR, vertex=crowded)
    rows = explorer.constraints.rows
    assert column(rows, "constraint") == [row.name for row in HARBOUR.constraints]
    assert column(rows, "right-hand side")[:2] == ["12", "2"]
    slacks = region.vertices[crowded].slacks
    assert [Fraction(text) for text in column(rows, f"slack at V{crowded}")] == list(slacks.values())
    marks = dict(zip(column(rows, "constraint"), column(rows, "marks"), strict=True))
    assert {name for name, mark in marks.items() if "active" in mark} == set(region.vertices[crowded].active)
    assert crowding(region)
    for name, numbers in crowding(region).items():
        assert f"makes {', '.join(f'V{k}' for k in numbers)} degenerate" in marks[name]
    explorer.state.set_number(100, "right-hand side", "quay pipe")
    assert "redundant" in column(rows, "marks")[column(rows, "constraint").index("quay pipe")]
    explorer.state.switch("quay pipe", False)
    assert column(rows, "marks")[column(rows, "constraint").index("quay pipe")] == "off"


def test_a_row_chooses_the_number_and_slider_and_box_change_it() -> None:
    explorer = pw.explore(HARBOUR)
    panel = explorer.constraints
    panel.rows.selected = 0
    assert explorer.state.number == ("right-hand side", "harbour main")
    assert panel.dial.stops[panel.dial.place] == "12"
    marked = [panel.dial.stops[place] for place in panel.dial.marks]
    points = pw.value_function(HARBOUR, rhs="harbour main").breakpoints
    assert {str(point) for point in points} <= set(marked)
    panel.dial.place = panel.dial.stops.index("11")
    assert explorer.state.model == HARBOUR.with_rhs("harbour main", 11)
    panel.exact.value = "37/3"
    assert explorer.state.model == HARBOUR.with_rhs("harbour main", "37/3")
    assert panel.dial.stops[panel.dial.place] == "37/3"
    panel.exact.value = "many"
    assert "expected a number such as" in explorer.message.value
    assert explorer.state.model == HARBOUR.with_rhs("harbour main", "37/3")
    panel.number.value = ("cost", "tank")
    panel.exact.value = "20"
    assert explorer.message.value == ""
    assert explorer.state.model.objective.coefficients[2] == 20
    assert panel.on.disabled


def test_a_constraint_is_switched_off_by_its_box() -> None:
    explorer = pw.explore(HARBOUR, number=("right-hand side", "harbour main"))
    explorer.constraints.on.value = False
    assert explorer.state.model == HARBOUR.without("harbour main")
    assert "1 constraint switched off" in explorer.verdict.value
    explorer.bar.undo.click()
    assert explorer.constraints.on.value
    assert explorer.state.model == HARBOUR


def test_the_bar_undoes_redoes_resets_and_gives_the_model() -> None:
    explorer = pw.explore(HARBOUR)
    bar = explorer.bar
    assert [button.disabled for button in (bar.undo, bar.redo, bar.reset)] == [True] * 3
    explorer.state.set_number("37/3", "right-hand side", "harbour main")
    bar.undo.click()
    assert explorer.state.model == HARBOUR
    bar.redo.click()
    bar.copy.click()
    found: dict[str, object] = {}
    exec(bar.text.value, found)
    assert found["model"] == explorer.state.model == HARBOUR.with_rhs("harbour main", "37/3")
    bar.reset.click()
    assert "37/3" not in bar.text.value
    assert bar.reset.disabled


def test_the_picture_is_saved_as_it_is(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    explorer = pw.explore(HARBOUR, vertex=3)
    explorer.bar.save.click()
    first = (tmp_path / "region.svg").read_bytes()
    assert "saved as region.svg" in explorer.message.value
    explorer.state.camera = {"eye": {"x": 1.0, "y": 1.0, "z": 1.0}}
    explorer.bar.save.click()
    assert (tmp_path / "region.svg").read_bytes() != first
    explorer.bar.file.value = "region.txt"
    explorer.bar.save.click()
    assert "alert" in explorer.message.value


def test_findings_are_listed_worst_first_and_one_is_marked() -> None:
    explorer = pw.explore(pw.scenarios.harbour_row("infeasible"))
    review = pw.review(pw.scenarios.harbour_row("infeasible"))
    panel = explorer.findings
    assert column(panel.rows, "finding") == [item.title for item in review.findings]
    assert "Findings: 2 errors" in explorer.verdict.value
    before = explorer.picture.figure
    panel.rows.selected = 1
    assert explorer.state.view.findings == (review.findings[1],)
    assert explorer.picture.figure != before
    assert review.findings[1].explanation.split()[0] in panel.words.value
    panel.all.click()
    assert explorer.state.finding is None


def test_prices_are_those_of_sensitivity() -> None:
    explorer = pw.explore(HARBOUR)
    assert pw.sensitivity(HARBOUR).table()._repr_html_() in explorer.prices.tables.value


def test_suspects_are_searched_in_a_child_and_tried() -> None:
    mistyped = HARBOUR.with_rhs("quay pipe", 8000)
    explorer = pw.explore(mistyped)
    panel = explorer.findings
    panel.forbidden.value = ", ".join(map(str, pw.optimum(mistyped).point))
    panel.search.start.click()
    assert not panel.search.stop.disabled
    panel.search.wait()
    assert panel.search.stop.disabled
    panel.suspects.selected = 0
    panel.try_it.click()
    assert explorer.state.model == pw.suspects(mistyped, forbidden=[pw.optimum(mistyped).point]).found[0].model
    panel.allowed.value = "1, 2"
    panel.search.start.click()
    assert "expected 3 values" in explorer.message.value


def test_the_walk_panel_sets_leaving_rule_start_and_comparison() -> None:
    explorer = pw.explore(pw.scenarios.klee_minty(3), vertex=5)
    panel = explorer.walk
    panel.leaving.value = "lexicographic"
    assert {walk.leaving for walk in explorer.state.walks} == {"lexicographic"}
    panel.from_here.click()
    assert explorer.state.walks[0].start == explorer.state.region.vertices[5].point
    assert panel.start.label == "vertex V5"
    explorer.state.start = None
    panel.compare.start.click()
    panel.compare.wait()
    found = pw.compare(explorer.state.model, leaving="lexicographic")
    assert found.recommendation in panel.compared.value
    panel.run.click()
    assert "in a notebook only" in explorer.message.value


def test_a_walk_runs_by_itself_and_stops(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("polywalk.explorer.walkpanel.PAUSE", 0.01)

    async def run() -> tuple[Explorer, int | None]:
        explorer = pw.explore(pw.scenarios.klee_minty(3))
        explorer.walk.run.click()
        assert explorer.state.step == 0
        assert not explorer.walk.stop.disabled
        await asyncio.sleep(0.06)
        explorer.walk.stop.click()
        reached = explorer.state.step
        await asyncio.sleep(0.05)
        assert explorer.state.step == reached
        explorer.walk.run.click()
        for _ in range(300):
            await asyncio.sleep(0.02)
            if explorer.state.step == explorer.state.last:
                break
        explorer.close()
        return explorer, reached

    explorer, reached = asyncio.run(run())
    assert 0 < reached <= explorer.state.last
    assert explorer.state.step == explorer.state.last == 7
    assert explorer.walk.stop.disabled


def test_axes_are_chosen_for_more_than_three_variables() -> None:
    explorer = pw.explore(pw.scenarios.cube(4))
    names = explorer.state.model.variables
    assert explorer.axes.box.layout.display is None
    explorer.axes.choosers[2].value = "none"
    assert explorer.state.axes == names[:2]
    explorer.axes.choosers[0].value = names[1]
    assert "different variables as axes" in explorer.message.value
    assert explorer.state.axes == names[:2]
    explorer.axes.choosers[1].value = names[3]
    assert explorer.state.axes == (names[1], names[3]) or explorer.state.axes == (names[0], names[3])
    explorer.picture.receive({"kind": "pick", "vertex": 2})
    assert explorer.state.view.vertex == 2
    assert pw.explore(HARBOUR).axes.box.layout.display == "none"


def test_a_large_model_opens_at_once_and_its_vertices_wait_behind_a_button() -> None:
    explorer = pw.explore(large())
    assert explorer.state.region is None
    value = pw.optimum(large()).value
    assert "vertices not listed yet" in explorer.verdict.value
    assert explorer.state.walks[0].value == value
    explorer.state.set_number(30, "right-hand side", "row 3")
    assert explorer.message.value == ""
    explorer.findings.listing.start.click()
    explorer.findings.listing.stop.click()
    explorer.findings.listing.wait()
    assert "listing the vertices was stopped" in explorer.message.value
    assert explorer.state.region is None


def test_what_was_listed_for_a_large_model_is_shown_then_reviewed(monkeypatch: pytest.MonkeyPatch) -> None:
    for room in ("explorer", "state", "findingpanel"):
        monkeypatch.setattr(f"polywalk.explorer.{room}.is_slow", lambda _: True)
    box = pw.scenarios.cube(4)
    explorer = pw.explore(box)
    state, panel = explorer.state, explorer.findings
    state.set_number(2, "right-hand side", "x1 upper")
    assert state.region is None
    panel.listing.start.click()
    panel.listing.wait()
    assert state.region == pw.region(state.model)
    assert len(explorer.vertices.rows.rows) == 16
    assert state.stale
    panel.reviewing.start.click()
    panel.reviewing.wait()
    assert not state.stale
    assert state.review.model == state.model
    assert explorer.message.value == ""
