"""An empty region in a picture: the constraints that contradict each other, and what would be left without one."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from polywalk.drawing.numbers import brief
from polywalk.drawing.placing import Sheet
from polywalk.drawing.scene import Label, Layer, Line, Point, Polygon
from polywalk.drawing.settling import ring
from polywalk.drawing.shape import Shape
from polywalk.drawing.space import inner, slice_of, uphill
from polywalk.drawing.subject import floats, planar
from polywalk.drawing.tags import letters
from polywalk.drawing.window import Window, around, crossings
from polywalk.exact import Row
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

    @property
    def nearest(self) -> Row | None:
        """The point of the rest that misses the lifted constraint by least; None where there is no rest."""
        if self.rest is None or self.lifted is None or self.lifted.is_constant:
            return None
        lifted = self.lifted  # the rest lies on its forbidden side, or, of an equality, on one side
        return min(self.rest.base, key=lambda point: abs(lifted.slack(point)))

    @property
    def short(self) -> Fraction | None:
        """By how much it misses, in the constraint's own unit; not negative."""
        return None if self.nearest is None or self.lifted is None else abs(self.lifted.slack(self.nearest))

    def miss(self, model: Model) -> str:
        """That in words, with the constraint's unit, or that of all variables it only adds up."""
        if self.short is None or self.lifted is None:
            return ""
        terms = [
            (model.unit(name), value) for name, value in zip(model.variables, self.lifted.coefficients, strict=True)
        ]
        units = {unit for unit, value in terms if value}
        plain = all(abs(value) <= 1 and value.denominator == 1 for _, value in terms)
        unit = model.unit(self.lifted.name) or (units.pop() if plain and len(units) == 1 else "")
        return f"misses by {brief(self.short)}{f' {unit}' if unit else ''}"

    @property
    def excerpt(self) -> bool:
        """Whether what is left goes on beyond every picture."""
        return self.rest is not None and bool(self.rest.rays or self.rest.lines)


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


def window(model: Model, found: Conflict, paper: Point) -> Window:
    """A window that shows the conflict: what would be left, and the border that nothing left reaches."""
    if found.rest is None or found.lifted is None:
        return around(crossings([model.constraint(name) for name in found.names], model.n), paper=paper)
    points = [floats(point) for point in found.rest.base]
    if not found.lifted.is_constant:
        points += gap(found)
    rays = [floats(ray.direction) for ray in found.rest.rays]
    return around(points, rays, [floats(line) for line in found.rest.lines], paper)


def faces(model: Model, found: Conflict, rest: Shape | None) -> Layer:
    """In space: the faces of the rest that the conflict's other constraints make, in their colours."""
    places = [row.name for row in model.constraints]
    return Layer(
        tuple(
            Polygon(
                face.corners,
                "conflict",
                places.index(name),
                name,
                f"{name}\n{model.constraint(name).text(model.variables)}",
            )
            for face in (rest.faces if rest else ())
            for name in face.constraints
            if name in found.names
        )
    )


def gap(found: Conflict) -> tuple[Point, ...]:
    """From the nearest point of the rest straight to the border it does not reach; () where there is none."""
    if found.nearest is None or found.lifted is None:
        return ()
    row, miss = floats(found.lifted.coefficients), float(found.lifted.slack(found.nearest))
    _, inward = found.lifted.inward
    foot = floats(found.nearest)
    return foot, tuple(x - miss * float(a) / inner(row, row) for x, a in zip(foot, inward, strict=True))


def shortfall(model: Model, found: Conflict, sheet: Sheet | None) -> Layer:
    """The dotted line over the gap, with its size."""
    ends = tuple(planar(point) for point in gap(found))
    if not ends or found.short is None or found.lifted is None:
        return Layer()
    text = found.miss(model)
    middle = tuple(sum(values) / 2 for values in zip(*ends, strict=True))
    if sheet is None:
        label = Label(text, middle, "name")
    else:
        sheet.lines.append((sheet.pixel(ends[0]), sheet.pixel(ends[1])))
        label = Label(text, middle, "name", spots=tuple(ring(sheet.pixel(middle), text, "name", 4.0)))
    return Layer(lines=(Line((ends,), "short", name=text),), labels=(label,))


def borders(model: Model, found: Conflict, frame: Window) -> Layer:
    """In space: the lifted constraint (or, where none can be lifted, each of the conflict) as a named plane."""
    rows = [found.lifted] if found.lifted is not None else [model.constraint(name) for name in found.names]
    polygons: list[Polygon] = []
    lines: list[Line] = []
    labels: list[Label] = []
    places, known = [row.name for row in model.constraints], letters(row.name for row in model.constraints)
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
        said = f"{known[row.name]} {row.name}"
        labels.append(Label(said, corners[0], "culprit", index, (0, 10), shorter=known[row.name], longer=said))
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
