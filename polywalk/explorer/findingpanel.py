"""The findings as rows with the selected one's proof in words, and the search for the slip that explains a symptom."""

from __future__ import annotations

from html import escape
from typing import Any

import ipywidgets as widgets

from polywalk.errors import PolywalkError
from polywalk.explorer.errands import SOME_MINUTES, Errand, Order
from polywalk.explorer.forms import Panel, button, column, heading, row, text_box, words
from polywalk.explorer.rows import Rows
from polywalk.explorer.settling import PATIENCE, Settled, is_slow, settle
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.reviewing import Finding, Suspects, suspects
from polywalk.table import Table


class FindingPanel(Panel):
    """Findings, their words, the button for a large model, and suspects."""

    def build(self) -> None:
        guard = self.message.guard
        self.status, self.words = words(self.message), words(self.message)
        self.rows = Rows(label="findings", layout=self.message.look(widgets.Layout), on_select=guard(self._picked))
        said = {"budget": PATIENCE, "remedy": "fix variables or switch constraints off."}
        task = "listing the vertices"
        self.listing = Errand(self.message, "List the vertices", self._unlisted, self._listed, task=task, **said)
        task = "the review"
        self.reviewing = Errand(self.message, "Review", self._unreviewed, self._reviewed, task=task, **said)
        self.all = button(self.message, "Mark none", self._unmarked, "Select no finding")
        self.allowed = text_box(self.message, "A plan that should be allowed", "300px", placeholder="4, 4, 4")
        self.forbidden = text_box(self.message, "A plan that should not", "300px", placeholder="5, 3, 4")
        here = "Take the selected vertex as the plan that should not be allowed"
        self.here = button(self.message, "The selected vertex should not", self._forbid, here)
        said = {"budget": SOME_MINUTES, "task": "the search for suspects", "remedy": "state more plans."}
        self.search = Errand(self.message, "Search for suspects", self._asked, self._found, **said)
        self.suspects = Rows(label="suspects", layout=self.message.look(widgets.Layout))
        self.told = words(self.message)
        self.try_it = button(self.message, "Try the selected suspect", self._tried, "Take its model; Undo leads back")
        self._searched: Suspects | None = None
        m = self.message
        facts = row(m, self.allowed, self.forbidden, self.here)
        slip = [facts, row(m, self.search.box, self.try_it), self.told, self.suspects]
        found = [self.status, self.listing.box, self.reviewing.box, self.rows, row(m, self.all), self.words]
        self.box = column(m, *found, heading(m, "Which slip would explain it?"), *slip)

    def _picked(self, place: int | None) -> None:
        if not self._showing:
            self.state.finding = place

    def _unmarked(self) -> None:
        self.state.finding = None

    # a large model

    def _unlisted(self) -> Order:
        return region, (self.state.model, PATIENCE)

    def _listed(self, seen: Region) -> None:
        if seen.model == self.state.model:
            self.state.show_region(seen)

    def _unreviewed(self) -> Order:
        state = self.state
        if state.region is None:
            raise PolywalkError("the vertices are not listed yet, and the review needs them.")
        return settle, (state.region, state.whole, state.number)

    def _reviewed(self, found: Settled) -> None:
        if found.review.model == self.state.model:
            self.state.settle(found)

    def close(self) -> None:
        super().close()
        self.listing.drop()
        self.reviewing.drop()
        self.search.drop()

    # suspects

    def _forbid(self) -> None:
        point = self.state.point
        self.forbidden.value = ", ".join(map(str, point)) if point else ""

    def _asked(self) -> Order:
        model = self.state.model
        return suspects, (model, plans(self.allowed.value, model), plans(self.forbidden.value, model))

    def _found(self, found: Suspects) -> None:
        self._searched = found
        table = found.table()
        self.suspects.fill(Table(table.title, table.columns, table.rows), 0 if table.rows else None)
        self.told.value = f"<p>{escape(table.title)}</p>" + "".join(f"<p>{escape(note)}</p>" for note in table.notes)

    def _tried(self) -> None:
        """Take the suspect's model, and choose the number that it changed or that is missing."""
        if self._searched is None or self.suspects.selected is None:
            return
        one, state = self._searched.found[self.suspects.selected], self.state
        before = {row.name for row in state.whole.constraints}
        state.model = one.model
        added = [row.name for row in state.whole.constraints if row.name not in before]
        names = [*added, *(row.name for row in state.whole.constraints if row.name == one.place)]
        if names:
            state.number = ("right-hand side", names[0])

    def show(self) -> None:
        state = self.state
        listed = () if state.review is None else state.review.findings
        rows = tuple((item.severity, item.title, item.code) for item in listed)
        self.rows.fill(Table("findings", ("severity", "finding", "code"), rows), state.finding)
        self.status.value = self._status()
        slow = is_slow(state.model)
        self.listing.box.layout.display = None if slow and state.region is None else "none"
        self.reviewing.box.layout.display = None if slow and state.region is not None and state.stale else "none"
        self.all.disabled = state.finding is None
        self.words.value = "" if state.finding is None else in_full(listed[state.finding])

    def _status(self) -> str:
        state = self.state
        if state.review is None:
            return '<p class="polywalk-stale">Not reviewed yet.</p>'
        if state.stale:
            return (
                '<p class="polywalk-stale">Stale: these are of the model before; they follow when the input rests.</p>'
            )
        return (
            "<p>Select one to mark its evidence in the picture.</p>" if state.review.findings else "<p>No finding.</p>"
        )


def in_full(item: Finding) -> str:
    """A finding in full."""
    remedy = f"<p><b>Remedy:</b> {escape(item.remedy)}</p>" if item.remedy else ""
    return f"<h3>{escape(item.title)}</h3><p>{escape(item.explanation)}</p>{remedy}"


def plans(text: str, model: Model) -> list[tuple[Any, ...]]:
    """Plans typed as numbers, several parted by semicolons."""
    return [model.point(part.split(",")) for part in text.split(";") if part.strip()]
