"""Explorers that are closed leave nothing behind; one that opens sends little."""

from __future__ import annotations

import gc
import weakref

import ipywidgets as widgets

import polywalk as pw
from polywalk.explorer.explorer import Explorer

SQUARE = pw.from_algebra(maximize="x", bounds={"x": (0, 1)})


def test_two_hundred_explorers_leave_no_widget() -> None:
    def open_and_close() -> weakref.ref[Explorer]:
        explorer = pw.explore(SQUARE)
        explorer.state.vertex = 1
        explorer.close()
        return weakref.ref(explorer)

    live = widgets.Widget._instances if hasattr(widgets.Widget, "_instances") else widgets.widget._instances
    open_and_close()
    before = len(live)
    left = [open_and_close() for _ in range(200)]
    assert len(live) == before
    gc.collect()
    assert sum(ref() is not None for ref in left) <= 1


def test_a_closed_explorer_follows_its_state_no_more() -> None:
    explorer = pw.explore(SQUARE)
    explorer.close()
    told = explorer.verdict.value
    explorer.state.set_number(3, "right-hand side", "x upper")
    assert explorer.verdict.value == told
    assert explorer.state._trait_notifiers.get("version", {}).get("change", []) == []
