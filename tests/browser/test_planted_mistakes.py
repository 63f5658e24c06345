"""The three slips of what-is-wrong.ipynb, found with mouse and keyboard alone; what each took is written down."""

from __future__ import annotations

import time
from collections.abc import Iterator
from contextlib import contextmanager

import pytest
from lab import Lab

pytestmark = pytest.mark.browser

TYPED = """
import polywalk as pw

def typed(**changed):
    rows = {
        "harbour main": "pump + chips + tank <= 12",
        "grid connection": "pump/2.5 <= 2",
        "return temperature": "pump <= 4 + chips",
        "reheating": "tank <= 2 + chips",
        "quay pipe": "pump + tank <= 8",
    }
    rows |= {name.replace("_", " "): text for name, text in changed.items()}
    return pw.from_algebra(
        maximize="23*pump + 18*chips + 32*tank",
        constraints={name: text for name, text in rows.items() if text is not None},
        bounds={"pump": (0, None), "chips": (0, None), "tank": (0, 4)},
    )
"""
MODELS = {
    "infeasible": 'typed(quay_pipe="8 + pump + tank <= 0")',
    "unbounded": "typed(harbour_main=None)",
    "a plan that cannot be right": 'typed(quay_pipe="pump + tank <= 8000")',
}


class Log:
    """Actions with clicks (and fields typed) and seconds."""

    def __init__(self, lab: Lab) -> None:
        self.page, self.lines, self.clicks, self.seconds = lab.page, list[str](), 0, 0.0

    @contextmanager
    def action(self, what: str, clicks: int = 1) -> Iterator[None]:
        begun = time.monotonic()
        yield
        took = time.monotonic() - begun
        self.clicks, self.seconds = self.clicks + clicks, self.seconds + took
        self.lines.append(f"  {what}: {clicks} clicks, {took:.1f} s")

    def close(self, what: str) -> str:
        text = "\n".join([f"{what}: {self.clicks} clicks, {self.seconds:.1f} s", *self.lines])
        self.lines, self.clicks, self.seconds = [], 0, 0.0
        return text


def test_three_planted_mistakes(lab: Lab) -> None:
    log, told = Log(lab), []
    for place, (what, model) in enumerate(MODELS.items()):
        lab.open(TYPED, f"explorer = pw.explore({model})\nexplorer")
        lab.drawn()
        if place == 0:
            fact(lab, log, "A plan that should be allowed", "4, 4, 4", opens=True)
            fact(lab, log, "A plan that should not", "5, 3, 4")
            searched(lab, log)
            suspect(lab, log, "pump + tank ≤ 8")
        elif place == 1:
            fact(lab, log, "A plan that should be allowed", "4, 4, 4", opens=True)
            fact(lab, log, "A plan that should not", "4, 6, 4")
            searched(lab, log)
            suspect(lab, log, "pump + chips + tank")
            with log.action("set the limit to 12", 2):
                lab.panel("Constraints")
                lab.page.get_by_label("Exact value").fill("12")
                lab.page.keyboard.press("Enter")
                optimum(lab)
        else:
            with log.action("say that it should not be", 2):
                lab.panel("Findings")
                lab.page.get_by_role("button", name="The selected vertex should not").click()
            searched(lab, log)
            suspect(lab, log, "pump + tank ≤ 8")
        optimum(lab)
        lab.shoot(f"{place + 1} {what}")
        told.append(log.close(what))
    (lab.shots / "planted-mistakes.txt").write_text("\n".join(told) + "\n")
    assert lab.errors == []


def fact(lab: Lab, log: Log, label: str, plan: str, opens: bool = False) -> None:
    with log.action(f"state {label[2:]}", 1 + opens):
        if opens:
            lab.panel("Findings")
        lab.page.get_by_label(label, exact=True).fill(plan)
        lab.page.keyboard.press("Enter")


def searched(lab: Lab, log: Log) -> None:
    with log.action("search for suspects"):
        lab.page.get_by_role("button", name="Search for suspects").click()
        lab.page.get_by_role("grid", name="suspects").locator("tbody tr").first.wait_for()
    lab.shoot("suspects")


def suspect(lab: Lab, log: Log, meant: str) -> None:
    row = lab.page.get_by_role("grid", name="suspects").locator("tbody tr", has_text=meant).first
    first = row.get_attribute("aria-selected") == "true"
    with log.action(f"try {meant}", 1 if first else 2):
        if not first:
            row.click()
        lab.page.get_by_role("button", name="Try the selected suspect").click()
        lab.page.wait_for_function("() => document.querySelector('.polywalk-verdict').innerText.includes('optimum')")


def optimum(lab: Lab) -> None:
    lab.page.wait_for_function("() => document.querySelector('.polywalk-verdict').innerText.includes('optimum 292')")
