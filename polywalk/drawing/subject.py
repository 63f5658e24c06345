"""What is drawn: a region seen along its axes, with the facts that its picture must tell."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property

from polywalk.drawing.numbers import Written, apart, brief
from polywalk.drawing.tags import letters
from polywalk.drawing.view import View
from polywalk.errors import DrawingError
from polywalk.exact import Row, full, rounded
from polywalk.model import Model
from polywalk.region import Region, Vertex, project, region, vertex_name

MOST_AXES = 3


@dataclass(frozen=True)
class Subject:
    """A region, the axes it is drawn along, and its shadow on them.

    ``seen`` is the region itself when every variable is an axis, else its projection.
    """

    region: Region
    seen: Region
    view: View

    @property
    def model(self) -> Model:
        """The model that was given."""
        return self.region.model

    @property
    def axes(self) -> tuple[str, ...]:
        """The variables along the axes."""
        return self.seen.model.variables

    @property
    def units(self) -> tuple[str, ...]:
        """The units along the axes."""
        return tuple(self.model.unit(name) for name in self.axes)

    @property
    def projected(self) -> bool:
        """Whether variables were projected away."""
        return len(self.axes) < self.model.n

    @cached_property
    def letters(self) -> dict[str, str]:
        """The letter of every constraint; those that only a shadow has come after the model's own."""
        return letters(row.name for model in (self.model, self.seen.model) for row in model.constraints)

    @cached_property
    def _places(self) -> tuple[int, ...]:
        return tuple(self.model.index(name) for name in self.axes)

    def along(self, point: tuple[Fraction, ...]) -> tuple[float, ...]:
        """A point (or direction) of the model, in the coordinates of the axes."""
        return tuple(float(point[place]) for place in self._places)

    @cached_property
    def optimal(self) -> tuple[Row, ...]:
        """The optimal vertices in the coordinates of the axes, exact; a shadow may hold them inside."""
        face = self.region.optimal
        if face is None or self.region.lines:  # a region with a line has no vertex
            return ()
        found = (self.region.vertices[k].point for k in face.vertices)
        return tuple(dict.fromkeys(tuple(point[place] for place in self._places) for point in found))

    @cached_property
    def best(self) -> tuple[int, ...]:
        """Indices of the seen vertices that are optimal."""
        return tuple(k for k, vertex in enumerate(self.seen.vertices) if vertex.point in self.optimal)

    @cached_property
    def written(self) -> tuple[Written, ...]:
        """How the numbers along each axis are written, so that those of different vertices differ."""
        points = [*(vertex.point for vertex in self.seen.vertices), *self.optimal]
        return tuple(map(apart, zip(*points, strict=True))) if points else (brief,) * len(self.axes)

    @cached_property
    def worth(self) -> Written:
        """How values of the objective are written, so that those of different vertices differ."""
        values = [vertex.objective for vertex in self.seen.vertices] + [self.region.value]
        return apart(value for value in values if value is not None)

    def place(self, point: Row) -> str:
        """A point in the coordinates of the axes, as the key writes it."""
        return f"({', '.join(how(value) for how, value in zip(self.written, point, strict=True))})"

    def hover(self, index: int) -> str:
        """Everything about one seen vertex, as lines of plain text."""
        vertex = self.seen.vertices[index]
        lines = [f"{vertex_name(index)}{' (optimum)' if index in self.best else ''}"]
        lines += [_amount(self.model, name, value) for name, value in zip(self.axes, vertex.point, strict=True)]
        if vertex.objective is not None:
            lines.append(f"objective {_both(vertex.objective)}")
        lines.append("active: " + (", ".join(vertex.active) or "none"))
        if vertex.degenerate:
            lines.append(meeting(vertex, len(self.axes)))
        return "\n".join(lines)


def subject(source: Model | Region, view: View) -> Subject:
    """The region of a model along the axes of a view; raises DrawingError where the axes do not fit."""
    whole = source if isinstance(source, Region) else region(source)
    names = whole.model.variables
    axes = view.axes
    if axes is None and len(names) > MOST_AXES:
        raise DrawingError(
            f"expected a choice of one to three axes, the model has {len(names)} variables ({', '.join(names)}); "
            f'pass axes=("{names[0]}", "{names[1]}", ...) to see the projection onto them.',
            culprit=names,
        )
    axes = names if axes is None else tuple(axes)
    if not 1 <= len(axes) <= MOST_AXES:
        raise DrawingError(f"expected one to three axes, got {len(axes)}; choose among {', '.join(names)}.", axes)
    seen = whole if axes == names else project(whole, axes)
    if view.vertex is not None and not 0 <= view.vertex < len(seen.vertices):
        raise DrawingError(f"expected a vertex from 0 to {len(seen.vertices) - 1}, got {view.vertex}.", view.vertex)
    return Subject(whole, seen, view)


def titles_of(model: Model, axes: tuple[str, ...]) -> tuple[str, ...]:
    """What the axes are called, with their units; a single one gets a second without a name."""
    titles = tuple(f"{name} [{model.unit(name)}]" if model.unit(name) else name for name in axes)
    return (*titles, "") if len(titles) == 1 else titles


def floats(point: tuple[Fraction, ...]) -> tuple[float, ...]:
    """The point rounded for drawing."""
    return tuple(float(value) for value in point)


def planar(point: tuple[float, ...]) -> tuple[float, ...]:
    """A point of a line as a point of the plane, at height 0; any other point as it is."""
    return point if len(point) > 1 else (point[0], 0.0)


def meeting(vertex: Vertex, n: int) -> str:
    """Why a vertex is degenerate, in one phrase."""
    return f"degenerate: {len(vertex.active)} constraints meet where {n} would do"


def coordinates(point: Iterable[Fraction | str]) -> str:
    """A point, or the names of its coordinates, as people write it."""
    return f"({', '.join(value if isinstance(value, str) else brief(value) for value in point)})"


def _amount(model: Model, name: str, value: Fraction) -> str:
    return f"{name} {_both(value)} {model.unit(name)}".rstrip()


def _both(value: Fraction) -> str:
    """Exact, with the rounded decimal beside a fraction."""
    text = full(value)
    return f"{text} ≈ {rounded(value)}" if "/" in text else text
