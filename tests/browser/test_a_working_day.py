"""What an analyst does all day with the explorer, in JupyterLab and in Notebook 7, with mouse and keyboard only."""

from __future__ import annotations

import pytest
from axe_playwright_python.sync_playwright import Axe
from lab import Lab, apart

pytestmark = pytest.mark.browser

HARBOUR = """
import polywalk as pw
explorer = pw.explore(pw.scenarios.harbour_row(), rules=("dantzig", "bland"))
explorer
"""
FLAT = """
import polywalk as pw
model = pw.from_algebra(maximize="x + 2*y", constraints={"both": "x + y <= 5"}, bounds={"x": (0, 4), "y": (0, 3)})
explorer = pw.explore(model)
explorer
"""
CLICKS = 20
RHS = "from polywalk.exact import short; print(short(explorer.state.whole.constraint('harbour main').rhs))"

WATCH_FOR_STALE = """() => {
  const look = () => {
    window.wasStale ||= document.querySelector('.polywalk-verdict').innerText.includes('Stale');
  };
  window.wasStale = false;
  new MutationObserver(look).observe(document.body, { subtree: true, childList: true, characterData: true });
}"""
"""Remembers that the verdict was stale at some moment."""


@pytest.mark.parametrize("where", ["lab/tree", "notebooks"])
def test_a_working_day(lab: Lab, where: str) -> None:
    lab.name = f"a working day in {'JupyterLab' if where == 'lab/tree' else 'Notebook 7'}"
    lab.open(HARBOUR, where=where)
    lab.drawn()
    lab.shoot("1 first display")
    assert "optimum 292 at V8" in lab.verdict()
    assert "Findings: 1 note" in lab.verdict()
    twenty_clicks_select_twenty_times(lab)
    lab.shoot("2 a vertex clicked")
    a_slider_is_dragged(lab)
    a_constraint_is_switched_off_and_undone(lab)
    a_bad_value_is_refused_and_an_exact_one_taken(lab)
    a_finding_is_marked(lab)
    a_walk_is_stepped_and_run(lab)
    no_serious_violation(lab, "light")
    drawn = lab.drawings()
    lab.dark()
    lab.redrawn(drawn)
    lab.frames()
    lab.shoot("7 dark")
    no_serious_violation(lab, "dark")
    assert [error for error in lab.errors if "/static/notebook/" not in error] == []  # Notebook 7 has one of its own


def twenty_clicks_select_twenty_times(lab: Lab) -> None:
    """A press of 50 ms on a vertex that no other one covers selects it, each time."""
    lab.panel("Constraints")
    chosen = sorted(apart(lab.vertices()))
    selected = []
    for k in range(CLICKS):
        index = chosen[k % len(chosen)]
        x, y = lab.vertices()[index]
        lab.page.mouse.move(x, y)
        lab.page.mouse.down()
        lab.page.wait_for_timeout(50)
        lab.page.mouse.up()
        lab.page.get_by_role("heading", name=f"Selected vertex: V{index}", exact=True).wait_for()
        selected.append(int(lab.ask("print(explorer.state.vertex)")) == index)
    assert selected == [True] * CLICKS
    lab.page.get_by_role("columnheader", name=f"slack at V{index}").wait_for()


def a_slider_is_dragged(lab: Lab) -> None:
    """Picture and verdict follow, findings go stale and come back, the camera stays, the last place wins."""
    page, before, drawn = lab.page, lab.camera(), lab.drawings()
    slider = page.get_by_role("slider", name="right-hand side of harbour main")
    slider.scroll_into_view_if_needed()
    box = slider.bounding_box()
    begun = int(slider.input_value())
    at = lambda place: box["x"] + 8 + (box["width"] - 16) * place / int(slider.get_attribute("max"))  # noqa: E731
    height = box["y"] + box["height"] / 2
    page.evaluate(WATCH_FOR_STALE)  # it may be over before the picture has followed
    page.mouse.move(at(begun), height)
    page.mouse.down()
    for k in range(1, 31):
        page.mouse.move(at(begun * (1 - k / 60)), height)
    lab.redrawn(drawn)
    page.wait_for_function("() => window.wasStale")
    page.mouse.up()
    shown = page.locator(".polywalk-dial output").inner_text()
    assert 0 < int(slider.input_value()) < begun
    lab.until(RHS, shown)
    page.wait_for_function("() => !document.querySelector('.polywalk-verdict').innerText.includes('Stale')")
    assert lab.ask("print(explorer.state.review.model == explorer.state.model)") == "True"
    assert "optimum 292" not in lab.verdict()
    assert all(abs(a - b) < 1e-3 for a, b in zip(lab.camera(), before, strict=True))
    lab.shoot("3 a slider dragged")
    assert lab.ask("print(len(explorer.state.history.drafts))") == "2"
    slider.focus()
    page.keyboard.press("ArrowRight")
    page.wait_for_function("(text) => document.querySelector('.polywalk-dial output').innerText !== text", arg=shown)
    lab.until(RHS, page.locator(".polywalk-dial output").inner_text())
    for _ in range(2):
        page.get_by_role("button", name="Undo").click()
    lab.until(RHS, "12")
    page.wait_for_function("() => document.querySelector('.polywalk-verdict').innerText.includes('optimum 292')")


def a_constraint_is_switched_off_and_undone(lab: Lab) -> None:
    page = lab.page
    page.get_by_role("grid", name="constraints").locator("tbody tr").first.click()
    page.get_by_label("counts in the model").uncheck()
    lab.until("print(explorer.state.off)", "('harbour main',)")
    page.wait_for_function("() => document.querySelector('.polywalk-verdict').innerText.includes('without end')")
    lab.shoot("4 a constraint off")
    page.get_by_role("button", name="Undo").click()
    lab.until("print(explorer.state.off)", "()")


def a_bad_value_is_refused_and_an_exact_one_taken(lab: Lab) -> None:
    page = lab.page
    page.get_by_label("Exact value").fill("a dozen")
    page.keyboard.press("Enter")
    alert = page.get_by_role("alert")
    alert.wait_for()
    assert "expected a number such as 3, 0.25, 2e-3 or 1/3, got 'a dozen'" in alert.inner_text()
    assert lab.ask(RHS) == "12"
    lab.shoot("5 a bad value")
    page.get_by_label("Exact value").fill("37/3")
    page.keyboard.press("Enter")
    lab.until(RHS, "37/3")
    alert.wait_for(state="detached")
    page.get_by_role("button", name="Reset", exact=True).click()
    lab.until(RHS, "12")


def a_finding_is_marked(lab: Lab) -> None:
    page = lab.page
    lab.panel("Findings")
    lab.until("print(explorer.state.stale)", "False")
    drawn = lab.drawings()
    page.get_by_role("grid", name="findings").locator("tbody tr").first.click()
    lab.until("print(explorer.state.finding)", "0")
    lab.redrawn(drawn)
    marked = "() => document.querySelector('.polywalk-figure').data.some((trace) => trace.name === 'findings')"
    page.wait_for_function(marked)
    page.get_by_text("Several bases describe this vertex").wait_for()
    lab.shoot("6 a finding marked")


def a_walk_is_stepped_and_run(lab: Lab) -> None:
    page = lab.page
    lab.panel("Prices")
    page.locator(".polywalk-tabs").get_by_role("tab", name="Prices").press("ArrowRight")
    page.get_by_role("button", name="Step on").click()
    lab.until("print(explorer.state.step)", "1")
    page.get_by_text("Pivot 1 of").wait_for()
    page.get_by_role("button", name="Step back").click()
    lab.until("print(explorer.state.step)", "0")
    page.get_by_role("button", name="Run", exact=True).click()
    lab.until("print(explorer.state.step == explorer.state.last)", "True")
    page.get_by_label("Leaving rule").select_option("largest-pivot")
    lab.until("print(explorer.state.walks[0].leaving)", "largest-pivot")


def no_serious_violation(lab: Lab, theme: str) -> None:
    """axe-core on every panel: nothing serious, and every text with enough contrast."""
    for title in ("Constraints", "Vertices", "Findings", "Prices", "Walk"):
        lab.panel(title)
        lab.frames()
        found = Axe().run(lab.page, context=".polywalk").response
        bad = [
            (item["id"], item["impact"], [node["html"] for node in item["nodes"]])
            for item in found["violations"]
            if item["impact"] in ("serious", "critical")
        ]
        assert bad == [], (theme, title)
        assert "color-contrast" in {item["id"] for item in found["passes"]}


def test_two_variables_click_and_dark_theme(lab: Lab) -> None:
    lab.open(FLAT)
    lab.drawn()
    lab.shoot("1 light")
    x, y = lab.vertices()[2]
    lab.page.mouse.click(x, y)
    lab.until("print(explorer.state.vertex)", "2")
    drawn = lab.drawings()
    lab.dark()
    lab.redrawn(drawn)
    lab.shoot("2 dark")
    assert lab.errors == []
