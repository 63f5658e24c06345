"""What the explorer costs: a slider step beside bare cdd.gmp and a bare FigureWidget, and what goes to the page.

Run: python tests/bench/bench_explorer.py
The model has three variables and 30 constraints, of the two families of bench_region.py, and an objective. "step" is
the kernel's side of one slider event: region, walk, verdict, tables, scene, and the messages made ready to be sent (an
event loop runs, so that findings wait for the input to rest, as in a kernel). The peers, in the same run: "cdd" bare
cdd.gmp on the same rows (generators, incidence, adjacency), "update" one FigureWidget.batch_update of the same traces
(every property of every trace), and "coordinates" the same with nothing but the arrays that can change. Medians.
Sizes are those of the JSON of every message, in kB, plotly.js not counted: it goes over once a page.
"""

from __future__ import annotations

import asyncio
import json
import sys
from collections.abc import Callable
from fractions import Fraction
from itertools import cycle
from pathlib import Path
from statistics import median
from typing import Any

import comm
import nbformat
import plotly.graph_objects as go
from comm.base_comm import BaseComm

sys.path.insert(0, str(Path(__file__).parent))
from bench_region import Rows, bare, capacities, seconds, tangents

import polywalk as pw
from polywalk.model import Constraint, Model, Objective

ROUNDS = 31
ARRAYS = ("x", "y", "z", "i", "j", "k", "text", "hovertext", "customdata")


class Counted(BaseComm):
    """A comm that counts what it would send."""

    sent: list[int] = []  # noqa: RUF012 (one list for all, on purpose)

    def publish_msg(self, msg_type: str, data: Any = None, metadata: Any = None, buffers: Any = None, **_: Any) -> None:
        self.sent.append(len(json.dumps({"data": data, "metadata": metadata})) + sum(map(len, buffers or ())))


def model_of(rows: Rows) -> Model:
    """The same rows as a model with an objective."""
    named = tuple(Constraint(f"row {k}", tuple(row[1:]), ">=", -row[0]) for k, row in enumerate(rows))
    return Model(("x", "y", "z"), named, Objective("max", (Fraction(3), Fraction(2), Fraction(4))))


def sent_by(work: Callable[[], Any]) -> float:
    """kB of messages."""
    Counted.sent.clear()
    work()
    return sum(Counted.sent) / 1000


def updates(figure: dict[str, Any]) -> tuple[Callable[[], None], Callable[[], None]]:
    """The two bare updates of a FigureWidget with these traces."""
    widget = go.FigureWidget(figure)

    def whole() -> None:
        with widget.batch_update():
            for trace, new in zip(widget.data, figure["data"], strict=True):
                trace.update(new)

    def coordinates() -> None:
        with widget.batch_update():
            for trace, new in zip(widget.data, figure["data"], strict=True):
                for name in ARRAYS:
                    if name in new:
                        trace[name] = new[name]

    return whole, coordinates


def saved(explorer: Any) -> float:
    """kB a saved notebook grows by: the cell's output and the state of every widget."""
    from ipywidgets.embed import dependency_state

    bundle = explorer._repr_mimebundle_()
    state = dependency_state([explorer])
    shown = nbformat.v4.new_output("display_data", bundle)
    book = nbformat.v4.new_notebook(cells=[nbformat.v4.new_code_cell("", outputs=[shown])])
    book.metadata["widgets"] = {"application/vnd.jupyter.widget-state+json": {"state": state}}
    return len(nbformat.writes(book)) / 1000


def binding(region: Any) -> str:
    """A constraint whose right-hand side moves the optimum."""
    return next(name for name in region.vertices[region.optimal.vertices[0]].active if name not in ("row 0", "row 1"))


async def measure(rows: Rows) -> dict[str, float]:
    """Everything of one model; inside an event loop."""
    model = model_of(rows)
    opened: list[Any] = []
    pw.explore(model)
    open_kb = sent_by(lambda: opened.append(pw.explore(model)))
    explorer = opened[0]
    explorer.state.number = ("right-hand side", binding(explorer.state.region))
    html = len(explorer._repr_mimebundle_()["text/html"]) / 1000
    begun = explorer.constraints.dial.place
    last = len(explorer.constraints.dial.stops) - 1
    places = cycle([min(last, max(0, begun + by)) for by in (1, 2, 3, 4, 3, 2, 1, 0, -1, -2, -1, 0)])

    def step() -> None:
        explorer.constraints.dial.place = next(places)

    step()
    step_kb = max(sent_by(step) for _ in range(12))
    whole, coordinates = updates(explorer.picture.figure)
    works = {"cdd": lambda: bare(rows), "update": whole, "coordinates": coordinates, "step": step}
    times = [[seconds(work) for work in works.values()] for _ in range(ROUNDS)]
    found = {name: median(side) * 1000 for name, side in zip(works, zip(*times, strict=True), strict=True)}
    explorer.rest.cancel()
    return found | {"open kB": open_kb, "html kB": html, "step kB": step_kb, "saved kB": saved(explorer)}


def main() -> None:
    """Print one line for each family."""
    comm.create_comm = Counted
    columns = ("family", "vertices", "cdd ms", "update ms", "coordinates ms", "step ms", "ratio", "of coordinates")
    print("  ".join((*columns, "open kB", "step kB", "saved kB")))
    for family in (capacities, tangents):
        rows = family(30, seed=1)
        f = asyncio.run(measure(rows))
        count = len(pw.region(model_of(rows)).vertices)
        ratio, hard = f["step"] / (f["cdd"] + f["update"]), f["step"] / (f["cdd"] + f["coordinates"])
        times = (f"{f['cdd']:6.2f}", f"{f['update']:9.1f}", f"{f['coordinates']:14.1f}", f"{f['step']:7.1f}")
        sizes = (f"{f['open kB'] + f['html kB']:7.0f}", f"{f['step kB']:7.1f}", f"{f['saved kB']:8.0f}")
        print("  ".join((f"{family.__name__:<10}", f"{count:4}", *times, f"{ratio:5.2f}", f"{hard:14.2f}", *sizes)))


if __name__ == "__main__":
    main()
