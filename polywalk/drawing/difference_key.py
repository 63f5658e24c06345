"""The key of a picture of a difference."""

from __future__ import annotations

from collections.abc import Iterator

from polywalk.drawing.pair import Pair, changed, outlines
from polywalk.drawing.scene import KeyPart, KeyRow, Label
from polywalk.drawing.subject import coordinates
from polywalk.region import vertex_name
from polywalk.reviewing.changing import size
from polywalk.reviewing.parts import Part

ROLES = {"lost": "lost", "gained": "gained", "kept": "vertex"}
"""How a vertex is marked, by what happens to it."""


def key(pair: Pair, labels: tuple[Label, ...]) -> tuple[KeyPart, ...]:
    """All parts of the key that have rows."""
    tags = {label.longer: label.text for label in labels if label.role == "tag"}
    variables = pair.axes
    rows = tuple(
        KeyRow(
            "old border" if old else "constraint",
            f"{'before: ' if old else ''}{row.name}: {row.text(variables)}",
            index,
            tags.get(f"before: {row.name}" if old else row.name, ""),
        )
        for index, row, old in changed(pair)
    )
    parts = (
        KeyPart("What the marks say", tuple(_meanings(pair))),
        KeyPart("Constraints that changed", rows),
        KeyPart("Vertices lost and gained", tuple(_corners(pair))),
    )
    return tuple(part for part in parts if part.rows)


def _meanings(pair: Pair) -> Iterator[KeyRow]:
    found = pair.found
    if found.common.status != "empty":
        yield KeyRow("facet" if len(pair.axes) == 3 else "region", "allowed before and after")
    for role, part in (("cut off", found.cut_off), ("added", found.added)):
        if part.pieces:
            yield KeyRow(role, f"{role} by the change: {_sized(part)}")
    drawn = {line.role for line in outlines(pair)}
    if "old edge" in drawn:
        yield KeyRow("old edge", "dashed: the outline before the change")
    if "new edge" in drawn:
        yield KeyRow("new edge", "thick: the outline after the change, where it is another")
    for change, words in (("kept", "a vertex of both"), ("lost", "a vertex that is lost"), ("gained", "a new vertex")):
        if found.vertices(change):
            yield KeyRow(ROLES[change], words)
    for role, region in (("old optimum", found.before), ("optimum", found.after)):
        if region.optimal is not None and not region.lines:
            places = ", ".join(coordinates(region.base[k]) for k in region.optimal.vertices)
            yield KeyRow(role, f"optimum {'before' if role == 'old optimum' else 'after'}: {places}")


def _sized(part: Part) -> str:
    unit = {1: "length", 2: "area", 3: "volume"}[part.n]
    return size(part) if part.dimension < part.n or part.volume is None else f"{unit} {size(part)}"


def _corners(pair: Pair) -> Iterator[KeyRow]:
    for change, region in (("lost", pair.found.before), ("gained", pair.found.after)):
        for corner in pair.found.vertices(change):
            k = corner.before if change == "lost" else corner.after
            assert k is not None
            name = f"{'old ' if change == 'lost' else ''}{vertex_name(k)}"
            yield KeyRow(change, f"{name} {coordinates(corner.point)}: {', '.join(region.vertices[k].active)}")
