"""An empty region in a picture: the constraints that contradict each other, and what would be left without one."""

from __future__ import annotations

from dataclasses import dataclass

from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import Label, Layer, Line, Point, Polygon
from polywalk.drawing.space import inner, slice_of, uphill
from polywalk.drawing.subject import floats
from polywalk.drawing.window import Window, around, crossings
from polywalk.linear import farkas
from polywalk.model import Constraint, Model
from polywalk.region import Region, region

PUSH = 0.16
"""Length of the arrow to a constraint's allowed side, as a share of the longest side of the window."""


@dataclass(frozen=True)
class Conflict:
    """Which constraints contradict each other, and the region without one of them.

    ``names`` have multipliers in a proof that no point exists. ``rest`` is what remains without ``lifted``; both
    None where no single constraint of the conflict can be lifted to leave anything.
    """

    names: tuple[str, ...]
    lifted: Constraint | None
    rest: Region | None


def conflict(model: Model) -> Conflict:
    """The conflict of an empty model; a row is lifted before a bound, and what stays bounded first."""
    proof = farkas(model)
    if proof is None:
        return Conflict((), None, None)
    names = tuple(row.name for row in model.constraints if proof.multipliers.get(row.name))
    rows = sorted((model.constraint(name) for name in names), key=lambda row: row.bounds() is not None)
    rests = [(row, region(model.without(row.name))) for row in rows]
    left = sorted((pair for pair in rests if pair[1].status != "empty"), key=lambda pair: pair[1].status != "bounded")
    return Conflict(names, *left[0]) if left else Conflict(names, None, None)


def window(model: Model, found: Conflict) -> Window:
    """A window that shows the conflict: what would be left, and the border that nothing left reaches."""
    if found.rest is None or found.lifted is None:
        return around(crossings([model.constraint(name) for name in found.names], model.n))
    points = [floats(point) for point in found.rest.base]
    if not found.lifted.is_constant:
        nearest = max(found.rest.base, key=found.lifted.slack)
        row, gap = floats(found.lifted.coefficients), float(found.lifted.slack(nearest))
        _, inward = found.lifted.inward
        square = inner(row, row)
        points.append(tuple(x - gap * float(a) / square for x, a in zip(floats(nearest), inward, strict=True)))
    rays = [floats(ray.direction) for ray in found.rest.rays]
    return around(points, rays, [floats(line) for line in found.rest.lines])


def borders(model: Model, found: Conflict, frame: Window) -> Layer:
    """In space: the lifted constraint (or, where none can be lifted, each of the conflict) as a named plane."""
    rows = [found.lifted] if found.lifted is not None else [model.constraint(name) for name in found.names]
    polygons: list[Polygon] = []
    lines: list[Line] = []
    labels: list[Label] = []
    places = [row.name for row in model.constraints]
    for row in rows:
        corners = slice_of(floats(row.coefficients), float(row.rhs), frame) if not row.is_constant else ()
        if not corners:
            continue
        index = places.index(row.name)
        polygons.append(Polygon(corners, "conflict", index, row.name, f"{row.name}\n{row.text(model.variables)}"))
        centre = tuple(sum(values) / len(corners) for values in zip(*corners, strict=True))
        lines.append(Line((corners + corners[:1],), "conflict line", index, row.name))
        if row.sense != "==":
            lines.append(Line(((centre, _allowed(row, centre, frame)),), "conflict line", index, row.name, arrow="end"))
        labels.append(Label(f"{row.name}: {row.text(model.variables)}", corners[0], "name", index, (0, 10)))
    return Layer(tuple(polygons), tuple(lines), labels=tuple(labels))


def _allowed(row: Constraint, foot: Point, frame: Window) -> Point:
    _, inward = row.inward
    return tuple(x + PUSH * move for x, move in zip(foot, uphill(floats(inward), frame), strict=True))


def sentence(found: Conflict) -> str:
    """The conflict in one sentence."""
    if not found.names:
        return "empty: no point satisfies every constraint"
    listed = " and ".join([", ".join(found.names[:-1]), found.names[-1]] if len(found.names) > 1 else found.names)
    return f"empty: {listed} cannot hold together" if len(found.names) > 1 else f"empty: {listed} can never hold"


def keep_names_clear(layer: Layer, sheet: Sheet) -> None:
    """Reserve the paper under a region that is only drawn for comparison."""
    sheet.fills += [tuple(sheet.pixel(point) for point in polygon.points) for polygon in layer.polygons]
