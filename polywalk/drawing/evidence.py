"""Findings of a review in a picture: their places framed, their constraints underlaid, their directions drawn."""

from __future__ import annotations

from polywalk.drawing.placing import Sheet
from polywalk.drawing.plane import BEYOND, RADII, chord
from polywalk.drawing.scene import KeyPart, KeyRow, Label, Layer, Line, Mark, Point
from polywalk.drawing.settling import ring
from polywalk.drawing.shape import Shape
from polywalk.drawing.space import exit_point
from polywalk.drawing.subject import Subject, planar
from polywalk.drawing.window import Window
from polywalk.reviewing import Finding

MOST = 8
"""So many findings are marked; more would hide the region."""

POINTED = ("degenerate-vertex", "tied-optimum", "near-tie", "flat-region")
"""Codes that a place tells whole; of the others, unless they have rays, constraints are marked too."""


def number(k: int) -> str:
    """What finding number k (from 0) is called in picture and key."""
    return f"F{k + 1}"


def layer(looked: Subject, frame: Window, sheet: Sheet | None, drawn: Shape | None = None) -> Layer:
    """The evidence of the first findings; in the plane with their numbers beside."""
    shown = looked.view.findings[:MOST]
    places: dict[Point, list[int]] = {}
    for k, finding in enumerate(shown):
        for point in finding.points[:1] if finding.code == "flat-region" else finding.points:
            place = planar(looked.along(point))
            if frame.inside(place):
                places.setdefault(place, []).append(k)
    bands = _bands(looked, drawn) if len(frame.low) == 3 else _borders(looked, frame)
    rays = [ray for k, finding in enumerate(shown) for ray in _rays(looked, finding, frame, k)]
    marks = tuple(Mark(place, "evidence", hover=_said(looked, ks)) for place, ks in places.items())
    return Layer(lines=(*bands, *rays), marks=marks, labels=tuple(_labels(places, frame, sheet)))


def part(looked: Subject) -> tuple[KeyPart, ...]:
    """The findings in the key: number, severity, title."""
    found = looked.view.findings
    rows = [KeyRow("evidence", f"{item.severity}: {item.title}", tag=number(k)) for k, item in enumerate(found[:MOST])]
    if len(found) > MOST:
        rows.append(KeyRow("none", f"and {len(found) - MOST} more findings, not marked"))
    return (KeyPart("Findings (square: place, band: constraint, arrow: ray)", tuple(rows)),) if rows else ()


def _said(looked: Subject, ks: list[int]) -> str:
    return "\n".join(f"{number(k)}: {looked.view.findings[k].title}" for k in dict.fromkeys(ks))


def _marked(looked: Subject) -> dict[str, list[int]]:
    """The constraints to mark, each with the findings it is marked for."""
    found: dict[str, list[int]] = {}
    for k, finding in enumerate(looked.view.findings[:MOST]):
        if finding.code not in POINTED and not finding.rays:
            for name in finding.constraints[:1] if finding.points else finding.constraints:
                found.setdefault(name, []).append(k)
    return found


def _borders(looked: Subject, frame: Window) -> list[Line]:
    """A band along the border of each marked constraint in the plane."""
    bands = []
    for name, ks in _marked(looked).items():
        row = next((row for row in looked.seen.model.constraints if row.name == name and not row.is_constant), None)
        if row is not None and chord(row, frame) is not None:
            ends = chord(row, frame.grown(BEYOND))
            bands += [Line((ends,), "evidence line", name=name, hover=_said(looked, ks))] if ends else []
    return bands


def _bands(looked: Subject, drawn: Shape | None) -> list[Line]:
    """A band round the faces of the marked constraints in space."""
    marked, bands = _marked(looked), []
    for side in drawn.sides if drawn is not None else ():
        ks = [k for name in side.constraints for k in marked.get(name, ())]
        if ks:
            outline = (*side.corners, side.corners[0])
            bands.append(Line((outline,), "evidence line", name=side.constraints[0], hover=_said(looked, ks)))
    return bands


def _rays(looked: Subject, finding: Finding, frame: Window, k: int) -> list[Line]:
    """From the finding's first point (or the middle of the picture) to the edge of the window."""
    start = planar(looked.along(finding.points[0])) if finding.points else frame.middle
    if not frame.inside(start):
        return []
    ends = [exit_point(start, planar(looked.along(ray)), frame) for ray in finding.rays]
    parts = tuple((start, end) for end in ends if end != start)
    said = f"{number(k)}: {finding.title}"
    return [Line(parts, "evidence ray", name=said, hover=said, arrow="end")] if parts else []


def _labels(places: dict[Point, list[int]], frame: Window, sheet: Sheet | None) -> list[Label]:
    texts = {place: ", ".join(map(number, dict.fromkeys(ks))) for place, ks in places.items()}
    if sheet is None:
        return [Label(text, place, "evidence name", shift=(18, -18)) for place, text in texts.items()]
    middle = sheet.pixel(frame.middle)
    for place in places:
        sheet.keep_clear(place, RADII["evidence"])
    found = []
    for place, text in texts.items():
        spots = ring(sheet.pixel(place), text, "evidence name", RADII["evidence"], middle)
        found.append(Label(text, place, "evidence name", spots=tuple(spots)))
    return found
