"""The bases of a vertex as a picture: bases as discs, degenerate pivots as arrows, walks through them, ways out."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

from polywalk.drawing import basis_places as paper
from polywalk.drawing.basis_key import hover, key, lettered, letters_of, spelled
from polywalk.drawing.numbers import brief
from polywalk.drawing.paths import APART
from polywalk.drawing.scene import PAPER, Axis, Label, Line, Mark, Point, Scene
from polywalk.drawing.view import View
from polywalk.errors import DrawingError
from polywalk.region import vertex_name
from polywalk.walks import Bases, Exchange, Exit, Route

MOST = 60
"""The most bases drawn; of more a part is drawn, and the picture says so."""

FEW = 24
"""Up to so many bases the picture has room for exchanges and edges that no walk takes, too."""

DISC = 9.0
"""Radius in pixels of a step number's disc."""


@dataclass(frozen=True)
class Chart:
    """The bases that are drawn, the routes of the walks, and where everything stands."""

    bases: Bases
    view: View

    @cached_property
    def routes(self) -> tuple[Route, ...]:
        """The walks' routes, in their order."""
        return tuple(self.bases.route(walk) for walk in self.view.walks)

    @cached_property
    def shown(self) -> tuple[int, ...]:
        """Numbers of the bases drawn: those that walks pass, then the optimal, then those nearest to leaving."""
        passed = {number for route in self.routes for number in route.places}
        best = set(self.bases.optimal)
        order = sorted(self.away, key=lambda k: (k not in passed, k not in best, self.away[k], k))
        return tuple(sorted(order[:MOST]))

    @cached_property
    def away(self) -> dict[int, int]:
        """The fewest pivots from each basis to one that is optimal or can leave; one more than the most if unknown."""
        known = self.bases.fewest
        most = max((steps for steps in known if steps is not None), default=0)
        return {k: most + 1 if steps is None else steps for k, steps in enumerate(known)}

    @cached_property
    def pivots(self) -> tuple[Exchange, ...]:
        """The exchanges between bases drawn that the simplex method may take."""
        return tuple(p for p in self.bases.pivots if p.improves and {p.start, p.end} <= set(self.shown))

    @cached_property
    def ties(self) -> tuple[Exchange, ...]:
        """The other exchanges, where there is room for them."""
        few = len(self.shown) <= FEW
        return tuple(p for p in self.bases.pivots if few and not p.improves and {p.start, p.end} <= set(self.shown))

    @cached_property
    def exits(self) -> tuple[Exit, ...]:
        """The ways out of bases drawn; those that do not improve only where there is room."""
        few = len(self.shown) <= FEW
        return tuple(e for e in self.bases.exits if e.basis in self.shown and (e.improves or few))

    @cached_property
    def bands(self) -> tuple[paper.Band, ...]:
        """The bases drawn, by how far they are from leaving."""
        return paper.bands(self.shown, self.away, [(p.start, p.end) for p in self.pivots])

    @cached_property
    def centres(self) -> dict[int, Point]:
        """Where each basis stands."""
        return paper.places(self.bands)[0]

    @cached_property
    def targets(self) -> dict[str, Point]:
        """Where each vertex or ray stands that is left for."""
        heights: dict[str, list[float]] = {}
        for found in self.exits:
            heights.setdefault(found.target, []).append(self.centres[found.basis][1])
        for route in self.routes:
            if route.target:
                heights.setdefault(route.target, []).append(self.centres[route.places[-1]][1])
        return paper.spread({name: sum(found) / len(found) for name, found in heights.items()})

    def role(self, role: str) -> str:
        """The role of an arrow that no walk takes: faint where there are many, so that walks stand out."""
        return role if len(self.shown) <= FEW else f"faint {role}"

    def bulge(self, start: int, end: int) -> float:
        """How an arrow between two bases bends, the same for a walk's and for the plain one."""
        others = [point for number, point in self.centres.items() if number not in {start, end}]
        return paper.best_bulge(self.centres[start], self.centres[end], others)

    def way_out(self, number: int, target: str, aside: float = 0.0) -> tuple[Point, ...]:
        """The arrow from a basis to what it leaves for."""
        others = [point for other, point in self.centres.items() if other != number]
        others += [point for name, point in self.targets.items() if name != target]
        bulge = paper.best_bulge(self.centres[number], self.targets[target], others)
        return paper.curve(self.centres[number], self.targets[target], bulge, aside, rim=24.0)


def bases_scene(bases: Bases, view: View) -> Scene:
    """The picture of the bases of a vertex as plain data; walks that pass the vertex are drawn through its bases.

    Raises
    ------
    DrawingError
        Axes or a selected vertex, which this picture does not have.
    """
    if view.axes is not None or view.vertex is not None:
        raise DrawingError("a picture of bases has no axes and no selected vertex; leave axes and vertex out.", view)
    chart = Chart(bases, view)
    steps, numbers = _walks(chart)
    return Scene(
        axes=(Axis("", 0.0, PAPER[0]), Axis("", 0.0, PAPER[1])),
        scale=(1.0, 1.0),
        title=f"{bases.model.name or 'Model'}: the bases of {vertex_name(bases.number)}",
        subtitle=f"{bases.title}\n{_status(chart)}",
        lines=(*_arrows(chart), *steps, *_letters(chart)),
        marks=_discs(chart),
        labels=(*_headings(chart), *_names(chart), *numbers),
        key=key(bases, chart.shown, chart.routes, few=len(chart.shown) <= FEW),
    )


def _status(chart: Chart) -> str:
    best, count = chart.bases.optimal, len(chart.bases.members)
    if len(chart.shown) < count:
        text = (
            f"a part is shown, {len(chart.shown)} of {count} bases: those that walks pass, the optimal, the nearest out"
        )
    elif chart.bases.model.objective is None:
        text = "without an objective every basis is optimal"
    elif best:
        text = f"the vertex is optimal, objective {brief(chart.bases.members[0].dictionary.objective)}; "
        text += "every basis shows it" if len(best) == count else f"{len(best)} of {count} bases show it"
    else:
        text = "the farther right, the fewer degenerate pivots until a walk can leave"
    return text


def _headings(chart: Chart) -> list[Label]:
    """What each band has in common, above it."""
    found = []
    for steps, middle in paper.places(chart.bands)[1].items():
        near = "optimal" if chart.bases.optimal else "can leave"
        words = near if steps == 0 else f"{steps} {'pivot' if steps == 1 else 'pivots'} away"
        if None in chart.bases.fewest and steps == chart.bands[0].away:
            words = "not known"
        found.append(Label(words, (middle, PAPER[1] - 14), "note"))
    if chart.targets:
        found.append(Label("edges to", (PAPER[0] - 36.0, PAPER[1] - 14), "note"))
    return found


def _arrows(chart: Chart) -> list[Line]:
    def between(found: Sequence[Exchange]) -> tuple[tuple[Point, ...], ...]:
        centres = chart.centres
        return tuple(
            paper.curve(centres[p.start], centres[p.end], chart.bulge(p.start, p.end))
            for p in sorted(found, key=lambda p: (p.start, p.end))
        )

    def out(improves: bool) -> tuple[tuple[Point, ...], ...]:
        return tuple(chart.way_out(e.basis, e.target) for e in chart.exits if e.improves is improves)

    lines = [
        Line(between(chart.ties), "exchange", name="exchange that no pivot makes"),
        Line(out(False), "other exit", name="edge that does not improve", arrow="end"),
        Line(between(chart.pivots), chart.role("pivot"), name="degenerate pivot", arrow="end"),
        Line(out(True), chart.role("exit"), name="edge that improves", arrow="end"),
    ]
    return [line for line in lines if line.parts]


def _walks(chart: Chart) -> tuple[list[Line], list[Label]]:
    """The route of every walk, with the numbers of its pivots."""
    lines, labels = list[Line](), list[Label]()
    taken = [(centre, paper.RADIUS) for centre in chart.centres.values()]
    taken += [(centre, 22.0) for centre in chart.targets.values()]
    for index, route in enumerate(chart.routes):
        parts: dict[str, list[tuple[Point, ...]]] = {"walk": []}
        for number, part in _legs(chart, index, route):
            limit = chart.view.step
            role = "walk rest" if index == 0 and limit is not None and number > limit else "walk"
            parts.setdefault(role, []).append(part)
            spot = paper.clearest(part, taken, DISC)
            taken.append((spot, DISC))
            labels.append(Label(str(number), spot, "step", index))
        lines += [Line(tuple(found), role, index, route.brief, arrow="end") for role, found in parts.items()]
    return lines, labels


def _legs(chart: Chart, index: int, route: Route) -> list[tuple[int, tuple[Point, ...]]]:
    """Each pivot's number and arrow; walks that share one run side by side."""
    aside = APART * (index - (len(chart.routes) - 1) / 2)
    legs = []
    for pivot, start, end in zip(route.stays, route.places[:-1], route.places[1:], strict=True):
        centres = chart.centres
        legs.append((pivot.number, paper.curve(centres[start], centres[end], chart.bulge(start, end), aside)))
    if route.departure is not None:
        legs.append((route.departure.number, chart.way_out(route.places[-1], route.target, aside)))
    return legs


def _discs(chart: Chart) -> tuple[Mark, ...]:
    firsts = dict.fromkeys(route.places[0] for route in chart.routes if route.places)
    marks = [Mark(chart.centres[number], "first basis", text="first basis") for number in firsts]
    for number in chart.shown:
        basis = chart.bases.members[number]
        role = "optimal basis" if basis.optimal else "basis"
        marks.append(Mark(chart.centres[number], role, text=basis.name, hover=hover(chart.bases, number), key=number))
    return tuple(marks)


def _names(chart: Chart) -> list[Label]:
    found, fits = [], lettered(chart.bases)
    for number in chart.shown:
        basis, held = chart.bases.members[number], spelled(chart.bases, number)
        text = f"{basis.name}\n{held}" if held and fits else basis.name
        role = "optimal basis name" if basis.optimal else "basis name"
        found.append(Label(text, chart.centres[number], role))
    found += [Label(name, place, "target") for name, place in chart.targets.items()]
    return found


def _letters(chart: Chart) -> list[Line]:
    """Entries of the legend that say which letter is which constraint; nothing is drawn for them."""
    return [Line(((),), "letter", name=f"{letter}  {name}") for name, letter in letters_of(chart.bases).items()]
