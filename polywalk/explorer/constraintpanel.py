"""The constraints as rows, and one number of the model that is changed: by slider, by typing, on and off."""

from __future__ import annotations

from html import escape
from typing import Any

import ipywidgets as widgets

from polywalk.exact import full, linear, short
from polywalk.explorer.dial import Dial
from polywalk.explorer.forms import Panel, chooser, column, row, text_box, words
from polywalk.explorer.rows import Rows
from polywalk.explorer.state import State
from polywalk.model import SIGN, Constraint
from polywalk.region import vertex_name
from polywalk.reviewing.extended import told
from polywalk.reviewing.stops import Stops, number_of, stops
from polywalk.table import Table

KIND = {"right-hand side": "right-hand side of", "cost": "cost of"}


class ConstraintPanel(Panel):
    """The table and the editor below it."""

    def build(self) -> None:
        guard = self.message.guard
        self.rows = Rows(label="constraints", layout=self.message.look(widgets.Layout), on_select=guard(self._picked))
        self.number = chooser(self.message, "Change the", [("", None)], "260px")
        self.dial = Dial(
            label="Value",
            layout=self.message.look(widgets.Layout),
            on_move=guard(self._dragged),
            on_release=guard(self._released),
        )
        self.exact = text_box(self.message, "Exact value", "160px")
        self.on = widgets.Checkbox(description="counts in the model", indent=False, layout={"width": "auto"})
        self.range = words(self.message)
        self._stops: Stops | None = None
        self.on_input(self.number, self._chosen)
        self.on_input(self.exact, lambda text: self.state.set_number(text.strip()))
        self.on_input(self.on, lambda on: self.state.switch(self.state.number[1], on))
        editor = column(self.message, row(self.message, self.number, self.exact, self.on), self.dial, self.range)
        self.box = column(self.message, self.rows, editor)

    def _picked(self, place: int | None) -> None:
        if place is not None and not self._showing:
            self.state.number = ("right-hand side", self.state.whole.constraints[place].name)

    def _chosen(self, number: Any) -> None:
        self.state.number = number

    def _dragged(self, place: int) -> None:
        if self._stops is not None:
            self.state.set_number(self._stops.values[place], drag=True)

    def _released(self) -> None:
        self.state.history.rest()

    def show(self) -> None:
        state = self.state
        kind, name = state.number
        names = [row.name for row in state.whole.constraints]
        picked = names.index(name) if kind == "right-hand side" else None
        self.rows.fill(table(state), picked)
        self._show_choice()
        self.exact.value = full(number_of(state.whole, kind, name))
        self.on.disabled = kind != "right-hand side"
        self.on.value = kind != "right-hand side" or name not in state.off
        self._show_stops()

    def _show_choice(self) -> None:
        whole = self.state.whole
        listed = [("right-hand side", one.name) for one in whole.constraints] + [("cost", x) for x in whole.variables]
        offered = [(f"{KIND[kind]} {name}", (kind, name)) for kind, name in listed]
        if tuple(offered) != tuple(self.number.options):
            self.number.options = offered
        self.number.value = self.state.number

    def _show_stops(self) -> None:
        """The slider: where it may stop is worked out when the input rests, or another number is chosen."""
        state = self.state
        kind, name = state.number
        value = number_of(state.whole, kind, name)
        rested = state.settled.stops if state.settled and not state.stale else None
        if rested is not None and (rested.kind, rested.name) == (kind, name):
            self._stops = rested
        now = self._stops
        if now is None or (now.kind, now.name) != (kind, name) or now.place(value) is None:
            now = self._stops = stops(state.whole, kind, name, breakpoints=False)
        marks = [now.values.index(mark) for mark in now.marks]
        self.dial.label = f"{KIND[kind]} {name}"
        self.dial.turn_to([short(stop) for stop in now.values], marks, now.values.index(value))
        self.range.value = f"<p>{_range(now)}</p>"


def _range(found: Stops) -> str:
    """Where the optimal value's slope changes, and where there is an optimum at all."""
    function = found.function
    if function is None:
        return "breakpoints: not worked out yet"
    if function.outcome != "optimal":
        return f"no breakpoints: {escape(function.outcome)} whatever it is"
    points = ", ".join(map(short, function.breakpoints)) or "none"
    ends = [
        f"{side} {told(end)} the model is {function.beyond}"
        for side, end in (("below", function.low), ("above", function.high))
        if end in found.marks
    ]
    return escape("; ".join([f"breakpoints of the optimal value, marked: {points}", *ends]))


def table(state: State) -> Table:
    """Every constraint with sense, right-hand side, slack at the selected vertex, and marks."""
    at = "slack" if state.vertex is None else f"slack at {vertex_name(state.vertex)}"
    rows = tuple(_row(state, one) for one in state.whole.constraints)
    marks = "marks (stale)" if state.stale and state.settled else "marks"
    return Table("constraints", ("constraint", "left side", "sense", "right-hand side", at, marks), rows)


def _row(state: State, one: Constraint) -> tuple[object, ...]:
    whole, at = state.whole, state.point
    slack = None if at is None else one.slack(at)
    left = linear(one.coefficients, whole.variables)
    return (one.name, left, SIGN[one.sense], one.rhs, slack, ", ".join(_marks(state, one, slack == 0)))


def _marks(state: State, one: Constraint, active: bool) -> list[str]:
    if one.name in state.off:
        return ["off"]
    marks = ["active"] if active and not one.is_constant else []
    if state.settled is not None:
        marks += ["redundant"] * (one.name in state.settled.redundant)
        crowded = state.settled.crowded.get(one.name, ())
        marks += [f"makes {', '.join(map(vertex_name, crowded))} degenerate"] if crowded else []
    return marks
