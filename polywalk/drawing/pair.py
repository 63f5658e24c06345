"""Two versions of a model along the axes of a picture: their window, their outlines, what changed between them."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from functools import cached_property

from polywalk.drawing.scene import Line, Point
from polywalk.drawing.shape import Shape, shape
from polywalk.drawing.subject import floats, planar
from polywalk.drawing.view import View
from polywalk.drawing.window import Window, around, lifted, square
from polywalk.errors import DrawingError
from polywalk.model import Constraint
from polywalk.region import Region, project
from polywalk.reviewing import Difference


@dataclass(frozen=True)
class Pair:
    """Two versions along the axes of a view."""

    found: Difference
    view: View
    projected: bool

    @property
    def axes(self) -> tuple[str, ...]:
        """The variables along the axes."""
        return self.found.before.model.variables

    @cached_property
    def frame(self) -> Window:
        """The window that shows both versions."""
        both = (self.found.before, self.found.after)
        points = [floats(point) for one in both for point in one.base] or [(0.0,) * len(self.axes)]
        rays = [floats(ray.direction) for one in both for ray in one.rays]
        found = around(points, rays, [floats(line) for one in both for line in one.lines], self.view.paper)
        return (
            square(found, [self.found.before.model.unit(name) for name in self.axes]) if len(self.axes) == 2 else found
        )

    def shape(self, region: Region) -> Shape:
        """The drawn pieces of one region."""
        return shape(region, self.frame)

    @cached_property
    def window(self) -> Window:
        """The window on paper: a single decision gets a second, hidden axis."""
        return lifted(self.frame) if len(self.axes) == 1 else self.frame


def seen(found: Difference, view: View) -> Pair:
    """The two versions along the axes of a view; raises DrawingError where the axes do not fit."""
    names = found.before.model.variables
    axes = view.axes or (names if len(names) <= 3 else None)
    if axes is None or not 1 <= len(axes) <= 3:
        raise DrawingError(f"expected a choice of one to three axes among {', '.join(names)}.", culprit=names)
    if axes == names:
        return Pair(found, view, projected=False)
    return Pair(Difference(project(found.before, axes), project(found.after, axes)), view, projected=True)


def lift(points: Iterable[Point]) -> tuple[Point, ...]:
    """Points of the plane, those of a line at height 0."""
    return tuple(planar(point) for point in points)


def outlines(pair: Pair) -> Iterator[Line]:
    """The edges of either version that are no edges of what both allow."""
    kept = {frozenset(edge) for edge in pair.shape(pair.found.common).edges}
    for role, region, name in (
        ("old edge", pair.found.before, "outline before"),
        ("new edge", pair.found.after, "outline after"),
    ):
        drawn = pair.shape(region)
        parts = tuple(lift(edge) for edge in drawn.edges if frozenset(edge) not in kept)
        if parts:
            yield Line(parts, role, name=name)
        if drawn.open_edges:
            yield Line(tuple(lift(edge) for edge in drawn.open_edges), f"{role} on", name=f"{name}, on", arrow="end")


def changed(pair: Pair) -> Iterator[tuple[int, Constraint, bool]]:
    """Every constraint of one version that the other does not have: its place, the row, whether it is the old one."""
    before, after = pair.found.before.model.constraints, pair.found.after.model.constraints
    said = {True: {_rule(row) for row in after}, False: {_rule(row) for row in before}}
    for old, rows in ((False, after), (True, before)):
        for index, row in enumerate(rows):
            if _rule(row) not in said[old]:
                yield index, row, old


def _rule(row: Constraint) -> object:
    return row.name, row.coefficients, row.sense, row.rhs
