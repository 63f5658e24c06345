"""The part of the plane or of space that a picture shows, and the region cut to it, exactly."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property
from itertools import combinations

from polywalk.drawing.scene import PAPER, Point
from polywalk.drawing.subject import floats
from polywalk.model import Constraint, Model
from polywalk.region import Region, region

CUT = "\0window"
"""Start of the name of a constraint that only cuts the region to the window; no user can type it."""

ROOM = {1: 0.16, 2: 0.16, 3: 0.05}
"""Free room on each side of the region, as a share of its extent: in the plane the constraints' names stand there."""

OPEN_ROOM = 0.75
"""How far an unbounded region is followed past its vertices, as a share of their extent."""

LIKE = 4.0
"""Axes whose extents differ by no more than this keep equal units; past it each fills its side."""


@dataclass(frozen=True)
class Window:
    """Lowest and highest drawn value along each axis, and the pixels of the paper it is laid out on."""

    low: Point
    high: Point
    paper: Point = PAPER

    @cached_property
    def extent(self) -> Point:
        """Length along each axis."""
        return tuple(b - a for a, b in zip(self.low, self.high, strict=True))

    @property
    def middle(self) -> Point:
        """Its centre."""
        return tuple((a + b) / 2 for a, b in zip(self.low, self.high, strict=True))

    @cached_property
    def scale(self) -> Point:
        """Pixels (in the plane) or shares of the longest side (in space) for a unit along each axis."""
        if len(self.extent) == 2:
            return tuple(pixels / length for pixels, length in zip(self.paper, self.extent, strict=True))
        longest = max(self.extent)
        alike = longest <= LIKE * min(self.extent)
        return tuple(1 / (longest if alike else length) for length in self.extent)

    def grown(self, share: float) -> Window:
        """The window with more room on every side, as a share of its extent."""
        more = [share * length for length in self.extent]
        return Window(
            tuple(a - room for a, room in zip(self.low, more, strict=True)),
            tuple(b + room for b, room in zip(self.high, more, strict=True)),
            self.paper,
        )

    def inside(self, point: Sequence[float], slack: float = 1e-9) -> bool:
        """Whether a point lies in it; the slack only forgives rounding of a drawn coordinate."""
        return all(
            a - slack * (b - a) <= x <= b + slack * (b - a) for x, a, b in zip(point, self.low, self.high, strict=True)
        )


def around(
    points: Iterable[Point], directions: Iterable[Point] = (), lines: Iterable[Point] = (), paper: Point = PAPER
) -> Window:
    """The window that shows all points, with room for names, and follows the given directions out of sight."""
    found = list(points)
    low = [min(values) for values in zip(*found, strict=True)]
    high = [max(values) for values in zip(*found, strict=True)]
    widest = max([b - a for a, b in zip(low, high, strict=True)] + [0.0])
    size = widest or max([abs(value) for value in (*low, *high)] + [0.0]) or 1.0
    rays = [*directions, *lines, *(tuple(-value for value in line) for line in lines)]
    for axis in range(len(low)):
        length = high[axis] - low[axis] or size
        extents = [ray[axis] / max(abs(value) for value in ray) for ray in rays]
        low[axis] += OPEN_ROOM * max(length, size / 2) * min([0.0, *extents])
        high[axis] += OPEN_ROOM * max(length, size / 2) * max([0.0, *extents])
        room = ROOM[len(low)] * ((high[axis] - low[axis]) or size)
        low[axis] -= room
        high[axis] += room
    return Window(tuple(low), tuple(high), paper)


def square(window: Window, units: Sequence[str]) -> Window:
    """A plane window widened until both axes have equal lengths on paper, where their units and extents are alike."""
    width, height = window.extent
    if len(set(units)) > 1 or max(width, height) > LIKE * min(width, height):
        return window
    unit = max(width / window.paper[0], height / window.paper[1])
    grow = [(pixels * unit - length) / 2 for pixels, length in zip(window.paper, (width, height), strict=True)]
    return Window(
        tuple(a - more for a, more in zip(window.low, grow, strict=True)),
        tuple(b + more for b, more in zip(window.high, grow, strict=True)),
        window.paper,
    )


def lifted(window: Window) -> Window:
    """The window of a single decision with a second axis, which is not shown."""
    return Window((window.low[0], -1.0), (window.high[0], 1.0), window.paper)


def cut(shape: Region, window: Window) -> Region:
    """The region cut to the window; an exact region again, whose cutting constraints start with CUT."""
    model = shape.model
    if shape.status != "unbounded":
        return shape
    sides: list[Constraint] = []
    for axis, (low, high) in enumerate(zip(window.low, window.high, strict=True)):
        unit = tuple(Fraction(int(k == axis)) for k in range(model.n))
        sides.append(Constraint(f"{CUT} low {axis}", unit, ">=", Fraction(low).limit_denominator(10**9)))
        sides.append(Constraint(f"{CUT} high {axis}", unit, "<=", Fraction(high).limit_denominator(10**9)))
    bounded: Model = replace(model, constraints=(*model.constraints, *sides))
    return region(bounded)


def crossings(rows: Sequence[Constraint], n: int) -> list[Point]:
    """Where the borders of n of the rows meet; without any, the point of each border nearest to 0."""
    import numpy as np

    borders = [(floats(row.coefficients), float(row.rhs)) for row in rows if not row.is_constant]
    found: list[Point] = []
    for group in combinations(borders, n):
        matrix = np.array([coefficients for coefficients, _ in group])
        if np.linalg.matrix_rank(matrix) == n:
            meet = np.linalg.solve(matrix, np.array([rhs for _, rhs in group]))
            found.append(tuple(float(value) for value in meet))
    if found:
        return found
    return [tuple(a * rhs / sum(c * c for c in row) for a in row) for row, rhs in borders] or [(0.0,) * n]
