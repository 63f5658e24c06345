"""Rules and start, the pivots as rows, buttons to step and to run, and the current pivot's ratio test."""

from __future__ import annotations

import asyncio
from html import escape
from typing import Any

import ipywidgets as widgets

from polywalk.errors import WalkError
from polywalk.explorer import steps
from polywalk.explorer.checking import LEAVING_RULES, RULES
from polywalk.explorer.errands import SOME_MINUTES, Errand, Order
from polywalk.explorer.forms import Panel, button, chooser, column, row, words
from polywalk.explorer.resting import running_loop
from polywalk.explorer.rows import Rows
from polywalk.region import vertex_name
from polywalk.walks import Comparison, compare

NONE = "none"
USUAL = "at rest, else Phase I"
PAUSE = 0.8
"""Seconds between two steps of a walk that runs: long enough to read a line. Common practice, no source."""

MOST_STARTS = 60
"""So many vertices are offered as starts; any selected one can be made the start."""


class WalkPanel(Panel):
    """The walks."""

    def build(self) -> None:
        message = self.message
        self.rule = chooser(self.message, "Rule", RULES)
        self.other = chooser(self.message, "Second rule", (NONE, *RULES))
        self.leaving = chooser(self.message, "Leaving rule", LEAVING_RULES)
        self.start = chooser(self.message, "Start", [(USUAL, USUAL)])
        self.from_here = button(message, "Start at the selected vertex", self._from_here)
        self.back = button(message, "Step back", lambda: self._go(-1))
        self.on = button(message, "Step on", lambda: self._go(+1))
        self.run = button(message, "Run", self._run, "Step on by itself")
        self.stop = button(message, "Stop", self.halt, "Stop stepping on")
        self.whole = button(message, "Whole walk", self._whole)
        self.summary, self.story, self.compared = words(self.message), words(self.message), words(self.message)
        self.rows = Rows(
            label="pivots", layout=self.message.look(widgets.Layout), on_select=message.guard(self._picked)
        )
        said = {"budget": SOME_MINUTES, "task": "the comparison of all rules", "remedy": "compare fewer."}
        self.compare = Errand(message, "Compare all rules", self._asked, self._told, **said)
        self._running: asyncio.TimerHandle | None = None
        for widget in (self.rule, self.other):
            self.on_input(widget, lambda _: self._ruled())
        self.on_input(self.leaving, lambda rule: setattr(self.state, "leaving", rule))
        self.on_input(self.start, lambda start: setattr(self.state, "start", None if start is USUAL else start))
        chosen = row(self.message, self.rule, self.other, self.leaving, self.start, self.from_here)
        stepping = row(self.message, self.back, self.on, self.run, self.stop, self.whole)
        told = [self.rows, self.story, self.compare.box, self.compared]
        self.box = column(self.message, chosen, self.summary, stepping, *told)

    def _go(self, by: int) -> None:
        self.halt()
        self.state.go(by)

    def _whole(self) -> None:
        self.halt()
        self.state.step = None

    def _picked(self, place: int | None) -> None:
        if not self._showing:
            self.halt()
            self.state.step = place

    def _ruled(self) -> None:
        other = () if self.other.value in (NONE, self.rule.value) else (self.other.value,)
        self.state.rules = (self.rule.value, *other)

    def _from_here(self) -> None:
        if self.state.point is None:
            raise WalkError("no vertex is selected; click one in the picture first.")
        self.state.start = self.state.point

    # running

    def _run(self) -> None:
        if running_loop() is None:
            raise WalkError("a walk runs by itself in a notebook only; here, step on with state.go(+1).")
        self.halt()
        self.state.step = 0
        self._later()

    def _later(self) -> None:
        loop = running_loop()
        assert loop is not None
        self._running = loop.call_later(PAUSE, self.message.guard(self._next))
        self._show_buttons()

    def _next(self) -> None:
        self._running = None
        self.state.go(+1)
        if self.state.step != self.state.last:
            self._later()

    def halt(self) -> None:
        """Stop stepping on."""
        if self._running is not None:
            self._running.cancel()
        self._running = None
        self._show_buttons()

    def close(self) -> None:
        super().close()
        self.halt()
        self.compare.drop()

    # comparing

    def _asked(self) -> Order:
        state = self.state
        starts = None if state.start is None else [state.start]
        return compare, (state.model, None, starts, state.leaving)

    def _told(self, found: Comparison) -> None:
        self.compared.value = (
            f'<div class="polywalk-wide">{found._repr_html_()}</div><p>{escape(found.recommendation)}</p>'
        )

    # following

    def show(self) -> None:
        state = self.state
        first = state.walks[0] if state.walks else None
        self.rule.value = state.rules[0]
        self.other.value = state.rules[1] if len(state.rules) > 1 else NONE
        self.leaving.value = state.leaving
        self._show_starts()
        self.summary.value = steps.summary(state.walks, state.refusal)
        self.rows.fill(steps.pivots(first), state.step)
        self.story.value = steps.story(first, state.step)
        if self.compared.value and state.stale:
            self.compared.value = ""
        self._show_buttons()

    def _show_buttons(self) -> None:
        state = self.state
        self.back.disabled = not state.last or state.step == 0
        self.on.disabled = not state.last or state.step == state.last
        self.whole.disabled = not state.last or state.step is None
        self.run.disabled = not state.last or self._running is not None
        self.stop.disabled = self._running is None
        self.from_here.disabled = state.point is None

    def _show_starts(self) -> None:
        """Offer the region's vertices as starts."""
        state = self.state
        start = USUAL if state.start is None else state.start
        corners = state.region.vertices[:MOST_STARTS] if state.region else ()
        offered: list[tuple[str, Any]] = [(USUAL, USUAL)]
        offered += [(f"vertex {vertex_name(k)}", vertex.point) for k, vertex in enumerate(corners)]
        if start not in [value for _, value in offered]:
            offered.append(("as given", start))
        if tuple(offered) != tuple(self.start.options):
            self.start.options = offered
        self.start.value = start
