"""The explorer in a real JupyterLab page: what a person does with mouse and keyboard, and what the page then shows."""

from __future__ import annotations

import pytest
from lab import ZOOM, Lab, apart

pytestmark = pytest.mark.browser

HARBOUR = """
import polywalk as pw
explorer = pw.explore(pw.scenarios.harbour_row(), rules=("dantzig", "bland"))
explorer
"""


def near(left: tuple[float, ...], right: tuple[float, ...], by: float = 1e-3) -> bool:
    return all(abs(a - b) < by for a, b in zip(left, right, strict=True))


def test_click_rotate_and_step_through_a_walk(lab: Lab) -> None:
    lab.open(HARBOUR)
    lab.drawn()
    lab.shoot("1 first display")
    assert "optimum" in lab.page.locator(".polywalk-verdict").inner_text()
    lab.panel("Vertices")
    rows = lab.page.get_by_role("grid", name="vertices").locator("tbody tr")
    assert rows.count() == int(lab.ask("print(len(explorer.state.region.vertices))"))
    the_wheel_zooms_only_where_one_works(lab)
    clicked = clicks_select(lab)
    lab.shoot("2 a vertex clicked")
    turned = a_drag_turns_and_queues(lab, clicked)
    lab.shoot("3 turned and stepped on")
    buttons_rows_and_keys_step(lab)
    assert near(lab.camera(), turned)
    assert lab.errors == []


def the_wheel_zooms_only_where_one_works(lab: Lab) -> None:
    """The page scrolls past the picture until one clicks into it; what the wheel zooms stays zoomed."""
    page, first = lab.page, lab.zoom()
    box = page.locator(".polywalk-figure").bounding_box()
    page.mouse.move(box["x"] + box["width"] - 30, box["y"] + 60)
    page.mouse.wheel(0, -10)
    lab.frames()
    assert lab.zoom() == first
    page.mouse.down()
    page.mouse.up()
    page.mouse.wheel(0, -60)
    page.wait_for_function(f"() => ({ZOOM})(0) > {first}")
    zoomed, drawn = lab.zoom(), lab.drawings()
    page.keyboard.press("ArrowDown")
    lab.redrawn(drawn)
    assert abs(lab.zoom() - zoomed) < 1e-6
    page.mouse.wheel(0, 60)
    page.wait_for_function(f"() => Math.abs(({ZOOM})(0) - {first}) < 0.02")


def clicks_select(lab: Lab) -> int:
    """Vertices that no other one covers can be clicked; row, card and Python follow; the picture stays put."""
    places = apart(lab.vertices())
    chosen = sorted(places)[1:5]
    assert len(chosen) == 4
    for index in chosen:
        x, y = lab.vertices()[index]
        assert near((x, y), places[index], 1)
        drawn = lab.drawings()
        lab.page.mouse.move(x, y)
        lab.page.mouse.down()
        lab.page.mouse.up()
        lab.until("print(explorer.state.vertex)", str(index))
        lab.redrawn(drawn)
    name = f"V{index}"
    lab.page.get_by_role("heading", name=f"Selected vertex: {name}").wait_for()
    selected = lab.page.get_by_role("grid", name="vertices").locator("tr[aria-selected=true] td", has_text=name)
    selected.first.wait_for()
    return index


def a_drag_turns_and_queues(lab: Lab, selected: int) -> tuple[float, ...]:
    """A drag from a vertex turns the scene and selects nothing; an update waits for its end and keeps the camera."""
    page, before = lab.page, lab.camera()
    lab.panel("Walk")
    x, y = lab.vertices()[min(set(lab.vertices()) - {selected})]
    page.mouse.move(x, y)
    page.mouse.down()
    for k in range(1, 5):
        page.mouse.move(x + 12 * k, y + 4 * k)
    during = lab.drawings()
    lab.ask("explorer.walk.on.click()")
    lab.until("print(explorer.state.step)", "1")
    for k in range(5, 9):
        page.mouse.move(x + 12 * k, y + 4 * k)
    assert lab.drawings() == during
    page.mouse.up()
    lab.redrawn(during)
    reached = "explorer.state.region.vertices[explorer.state.vertex].point == explorer.state.walks[0].points[1]"
    assert lab.ask(f"print({reached})") == "True"
    turned = lab.camera()
    assert not near(turned, before)
    page.get_by_role("button", name="Step on").click()
    lab.until("print(explorer.state.step)", "2")
    page.wait_for_function("() => document.querySelector('.polywalk').innerText.includes('Pivot 2 of')")
    assert near(lab.camera(), turned)
    return turned


def buttons_rows_and_keys_step(lab: Lab) -> None:
    """The buttons, the rows' arrow keys and the picture's arrow keys step on and back; the page tells the pivot."""
    page = lab.page
    page.get_by_role("button", name="Step back").click()
    lab.until("print(explorer.state.step)", "1")
    page.get_by_role("grid", name="pivots").locator("tr[aria-selected=true]").focus()
    page.keyboard.press("ArrowDown")
    page.keyboard.press("ArrowDown")
    lab.until("print(explorer.state.step)", "3")
    page.locator(".polywalk-figure").focus()
    page.keyboard.press("ArrowLeft")
    lab.until("print(explorer.state.step)", "2")
    page.keyboard.press("x")  # cuts a cell where JupyterLab gets it
    cells = "() => window.jupyterapp.shell.currentWidget.content.widgets.map((cell) => cell.model.sharedModel.source)"
    assert "explore" in page.evaluate(cells)[0]
    story = lab.ask("print(explorer.state.walks[0].pivots[1].story())")
    page.wait_for_function("(text) => document.querySelector('.polywalk').innerText.includes(text)", arg=story)


def test_two_explorers_share_one_plotly_and_errors_are_seen(lab: Lab) -> None:
    lab.open(HARBOUR, "second = pw.explore(pw.scenarios.harbour_row())\nsecond")
    lab.drawn(0)
    lab.drawn(1)
    assert lab.ask("print(explorer.picture.libraries_sent + second.picture.libraries_sent)") == "1"
    lab.ask("explorer.picture.receive({'kind': 'pick', 'vertex': 99})")
    lab.page.get_by_role("alert").wait_for()
    assert "expected the index of a vertex, 0 to" in lab.page.get_by_role("alert").inner_text()
    lab.shoot("1 an error")
    assert lab.errors == []


def test_a_narrow_page_stacks_the_panels_and_the_picture_fits(lab: Lab) -> None:
    lab.page.set_viewport_size({"width": 390, "height": 900})
    lab.open(HARBOUR)
    lab.drawn()
    fits = """() => {
      const all = document.querySelector('.polywalk');
      const plot = document.querySelector('.polywalk-figure').getBoundingClientRect();
      const svg = document.querySelector('.polywalk-figure .main-svg').getBoundingClientRect();
      return Math.abs(svg.width - plot.width) < 3 && all.scrollWidth <= all.clientWidth + 1;
    }"""
    lab.shoot("1 narrow")
    lab.page.wait_for_function(fits)
    lab.panel("Walk")
    lab.page.get_by_role("button", name="Step on").scroll_into_view_if_needed()
    lab.shoot("2 narrow, the walk")
