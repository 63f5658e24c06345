"""The layers that only a picture in space has: faces that know their constraints, and the letters on them."""

from __future__ import annotations

from polywalk.drawing import plane
from polywalk.drawing.scene import Label, Layer, Polygon
from polywalk.drawing.shape import Shape, Side
from polywalk.drawing.subject import Subject


def faces(looked: Subject, drawn: Shape) -> Layer:
    """Facets that know their constraints, and the edges."""
    rows = [row.name for row in looked.seen.model.constraints]
    polygons = []
    for face in drawn.faces:
        words = [f"{name}\n{looked.seen.model.constraint(name).text(looked.axes)}" for name in face.constraints]
        index = rows.index(face.constraints[0]) if face.constraints else 0
        polygons.append(Polygon(face.corners, "facet", index, " & ".join(face.constraints), "\n".join(words)))
    return Layer(tuple(polygons), plane.region(drawn).lines)


def tags(looked: Subject, drawn: Shape, culprits: tuple[str, ...] = ()) -> tuple[dict[str, str], Layer]:
    """The letters of the constraints that make a side, and one label at the middle of each side.

    A side that a culprit makes is labelled with the whole name, wherever there is room.
    """
    order = [row.name for row in looked.seen.model.constraints]
    sides = sorted(drawn.sides, key=lambda side: order.index(side.constraints[0]))
    found = {name: looked.letters[name] for side in sides for name in side.constraints}
    return found, Layer(labels=tuple(_tag(looked, side, order, culprits) for side in sides))


def _tag(looked: Subject, side: Side, order: list[str], culprits: tuple[str, ...]) -> Label:
    rows = [looked.seen.model.constraint(name) for name in side.constraints]
    letter = " & ".join(looked.letters[row.name] for row in rows)
    longer = f"{letter} {' & '.join(side.constraints)}"
    hover = "\n".join(f"{row.name}: {row.text(looked.axes)}" for row in rows)
    index = order.index(side.constraints[0])
    if set(side.constraints) & set(culprits):
        return Label(longer, side.centre, "tag", index, hover=hover, longer=longer, shorter=letter)
    return Label(letter, side.centre, "tag", index, hover=hover, longer=longer)
