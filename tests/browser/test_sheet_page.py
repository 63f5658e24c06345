"""Sheets in a real browser: nothing on the console, nothing asked of any network, the figure turns, pages print.

Screenshots and PDFs go to artefacts/.
"""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest

import polywalk as pw
from polywalk.scenarios import VARIANTS, harbour_row, klee_minty
from polywalk.sheets import SECTIONS

pytestmark = pytest.mark.browser
SHOTS = Path(__file__).parents[2] / "artefacts"

DRAWN = """() => {
  const all = [...document.querySelectorAll('.turnable')];
  return all.length > 0 && all.every((one) => one.dataset.drawn);
}"""
EYE = "() => document.querySelector('.turnable')._fullLayout.scene._scene.getCamera().eye.x"
SEEN = "(kind) => [...document.querySelectorAll(kind)].map((one) => getComputedStyle(one).display !== 'none')"

LOOSE = """() => [...document.querySelectorAll('table, .finding, caption, thead, h2, h3, footer')].filter((one) => {
  const style = getComputedStyle(one), rows = one.querySelectorAll('tbody tr').length;
  if (one.matches('table, .finding')) return rows <= 20 && style.breakInside !== 'avoid';
  return (one.matches('footer') ? style.breakBefore : style.breakAfter) !== 'avoid';
}).map((one) => one.outerHTML.slice(0, 80))"""
"""What print could part from what belongs to it: a short table, a finding, a heading, the head of a table."""


def changed() -> pw.Model:
    return pw.difference(harbour_row(), harbour_row().with_rhs("harbour main", 10).without("quay pipe"))


SOURCES: dict[str, Callable[[], Any]] = {name: lambda name=name: harbour_row(name) for name in VARIANTS}
SOURCES |= {"klee-minty": lambda: klee_minty(3), "change": changed}


@pytest.fixture
def page(browser: Any) -> Any:
    context = browser.new_context(viewport={"width": 1100, "height": 900})
    yield context.new_page()
    context.close()


@pytest.mark.parametrize("name", SOURCES)
def test_a_sheet_is_quiet_alone_and_prints(name: str, page: Any, tmp_path: Path) -> None:
    said, asked = [], []
    page.on("console", lambda message: said.append(message.text) if message.type == "error" else None)
    page.on("pageerror", lambda error: said.append(str(error)))
    page.on("request", lambda request: asked.append(request.url))
    file = pw.sheet(SOURCES[name](), tmp_path / "sheet.html", author="A. Nalyst").path
    page.goto(file.as_uri())
    page.wait_for_function(DRAWN, timeout=60_000)
    SHOTS.mkdir(exist_ok=True)
    page.screenshot(path=SHOTS / f"sheet-{name}.png", full_page=True)
    assert all(page.evaluate(SEEN, ".turnable"))
    assert not any(page.evaluate(SEEN, ".still"))
    assert page.evaluate("() => document.querySelectorAll('h2').length") == len(SECTIONS) - (name != "change")
    assert page.evaluate("() => document.documentElement.scrollWidth <= window.innerWidth")
    printed = page.pdf(path=SHOTS / f"sheet-{name}.pdf", prefer_css_page_size=True)
    assert 4 <= len(re.findall(rb"/Type /Page\b", printed)) <= 12
    page.emulate_media(media="print")
    assert all(page.evaluate(SEEN, ".still"))
    assert not any(page.evaluate(SEEN, ".turnable"))
    assert page.evaluate(LOOSE) == []
    assert said == []
    assert [url for url in asked if not url.startswith(("data:", "file:"))] == []
    assert sum(url.startswith("file:") for url in asked) == 1


def test_the_figure_turns(page: Any, tmp_path: Path) -> None:
    file = pw.sheet(harbour_row(), tmp_path / "sheet.html", sections=["picture"]).path
    page.goto(file.as_uri())
    page.wait_for_function(DRAWN, timeout=60_000)
    box = page.locator(".turnable").bounding_box()
    middle = (box["x"] + box["width"] * 0.35, box["y"] + box["height"] / 2)
    before = page.evaluate(EYE)
    page.mouse.move(*middle)
    page.mouse.down()
    page.mouse.move(middle[0] + 120, middle[1] + 20, steps=6)
    page.mouse.up()
    page.wait_for_function(f"(old) => Math.abs(({EYE})() - old) > 0.05", arg=before, timeout=20_000)


def test_the_model_is_copied_and_a_nasty_name_runs_nothing(page: Any, tmp_path: Path) -> None:
    nasty = "<img src=x onerror=alert(1)>"
    model = pw.from_arrays([1, 1], [[1, 2]], [4]).with_constraint(nasty, {"x1": 1}, "<=", 3)
    dialogs = []
    page.on("dialog", lambda dialog: (dialogs.append(dialog.message), dialog.dismiss()))
    file = pw.sheet(model, tmp_path / "sheet.html", title=nasty, author=nasty).path
    page.goto(file.as_uri())
    page.wait_for_function(DRAWN, timeout=60_000)
    page.click("#copy")
    page.wait_for_function("() => document.getElementById('copy').textContent !== 'Copy the model'")
    assert page.evaluate("() => getSelection().toString()").startswith(("name", "minimize", "maximize"))
    assert page.evaluate("() => [...document.images].filter((one) => !one.src.startsWith('data:')).length") == 0
    assert page.inner_text("h1") == nasty
    assert dialogs == []


def test_without_scripts_the_still_picture_stands(browser: Any, tmp_path: Path) -> None:
    context = browser.new_context(java_script_enabled=False)
    page = context.new_page()
    page.goto(pw.sheet(harbour_row(), tmp_path / "sheet.html", paper="Letter").path.as_uri())
    assert page.locator(".still").first.is_visible()
    assert not page.locator(".turnable").first.is_visible()
    printed = page.pdf(path=SHOTS / "sheet-letter.pdf", prefer_css_page_size=True)
    assert b"/MediaBox [0 0 612 792]" in printed
    context.close()
