"""The traces of a scene, as the plain dicts plotly.js reads."""

from __future__ import annotations

from itertools import groupby
from typing import Any

from polywalk.drawing.heads import cones
from polywalk.drawing.notes import noted
from polywalk.drawing.scene import Label, Line, Mark, Point, Scene
from polywalk.drawing.surfaces import polygons
from polywalk.drawing.theme import FONT, Style, Theme
from polywalk.drawing.tracing import html, trace

SYMBOLS = {"circle": "circle", "ring": "circle-open", "diamond": "diamond", "square ring": "square-open"}
SYMBOLS |= {"square": "square", "diamond ring": "diamond-open", "cross": "x"}


LISTED = {
    "vertex": "vertices",
    "degenerate": "degenerate vertex",
    "optimum": "optimum",
    "start": "start of the walk",
    "selected": "selected",
    "evidence": "findings",
    "first basis": "where a walk starts or arrives",
    "basis": "basis",
    "optimal basis": "optimal basis",
    "moved": "pivot that moves",
    "stayed": "stay",
    "breakpoint": "breakpoint",
    "now": "the model as it is",
    "lost": "vertex lost",
    "gained": "vertex gained",
    "old optimum": "optimum before",
}
"""Marks by role, as the legend calls them."""

NAMED = {"vertex", "lost", "gained"}
"""Marks whose names stand beside them in space."""

LARGE = {"degenerate", "optimum", "old optimum", "selected", "start", "evidence"}
"""Marks that would cover the name of their vertex in space, where it is near: it stands off to the right."""

OF_WALK = ("moved", "stayed")
"""Marks in the look of their walk, switched off and on with it."""

IN_LEGEND = {"constraint", "conflict line", "open edge", "level line", "objective", "walk", "phase 1", "optimal face"}
IN_LEGEND |= {"old edge", "new edge", "old edge on", "new edge on", "old border"}
IN_LEGEND |= {"curve", "pivot", "faint pivot", "exchange", "exit", "faint exit", "other exit", "letter"}


IN_SPACE = 0.55
"""plotly draws marks in space nearly twice as large as the same number in the plane (measured on screenshots)."""


def traces(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """Polygons, lines, marks and labels of a scene, in the order they are painted."""
    data = polygons(drawn, theme)
    for line in drawn.lines:
        data += _line(drawn, line, theme)
    return _listed_once(data + _marks(drawn, theme) + _labels(drawn, theme))


def _listed_once(data: list[dict[str, Any]]) -> list[dict[str, Any]]:
    """The traces, of which each group has no more than one entry of the same name in the legend."""
    seen: set[tuple[str, str]] = set()
    for found in data:
        entry = (found.get("legendgroup", ""), found.get("name", ""))
        if entry[0] and found.get("showlegend", True):
            found["showlegend"] = entry not in seen
            seen.add(entry)
    return data


def _line(drawn: Scene, item: Line, theme: Theme) -> list[dict[str, Any]]:
    style = theme.style(item.role, item.index)
    points: list[Point | None] = []
    for part in item.parts or ((),):  # a line without parts still has its place in the legend
        points += [*part, None]
    of_walk = item.role in {"phase 1", "walk rest", "onward"}
    group = f"walk {item.index}" if of_walk else f"{item.role} {item.index}"
    look: dict[str, Any] = {
        "mode": "lines",
        "line": {"color": style.colour, "width": style.width * (1.6 if drawn.solid else 1.0), "dash": style.dash},
        "opacity": style.opacity,
        "name": html(_called(drawn, item)),
        "legendgroup": group if item.role != "hatch" else f"constraint {item.index}",
        "showlegend": item.role in IN_LEGEND and (bool(item.name) or item.role != "phase 1"),
    }
    hover = {"hoverinfo": "text", "text": html(item.hover)} if item.hover else {"hoverinfo": "skip"}
    traces = [trace(drawn, points, **look, **hover)]
    if item.arrow and item.parts:
        traces.append(_heads(drawn, item, style, look["legendgroup"]))
    return traces


def _called(drawn: Scene, item: Line) -> str:
    """What the legend calls a line: a border that only a letter marks in the plane, by letter and name."""
    if item.role in {"constraint", "conflict line", "old border"} and not drawn.solid:
        tags = {label.longer: f"{label.text}  " for label in drawn.labels if label.role == "tag"}
        return f"{tags.get(item.name, '')}{item.name}"
    return item.name or item.role


def _heads(drawn: Scene, item: Line, style: Style, group: str) -> dict[str, Any]:
    """Arrow heads at the end of every part."""
    common = {"legendgroup": group, "showlegend": False, "hoverinfo": "skip", "opacity": style.opacity}
    if drawn.solid:
        return {"type": "mesh3d", **cones(item.parts, drawn.scale), "color": style.colour, **common}
    points: list[Point | None] = []
    for part in item.parts:
        points += [part[-2], part[-1], None]
    marker = {"symbol": "arrow", "size": [0, 11, 0] * len(item.parts), "angleref": "previous", "standoff": 4}
    marker |= {"color": style.colour, "opacity": 1, "line": {"width": 0}}
    return trace(drawn, points, mode="markers", marker=marker, **common)


def _marks(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    traces = []
    for role in LISTED:
        found = [mark for mark in drawn.marks if mark.role == role]
        for index in sorted({mark.index for mark in found}) if role in OF_WALK else [0] if found else []:
            group = [mark for mark in found if role not in OF_WALK or mark.index == index]
            traces.append(_marktrace(drawn, role, group, theme))
    return traces


def _marktrace(drawn: Scene, role: str, found: list[Mark], theme: Theme) -> dict[str, Any]:
    style = theme.style(role, found[0].index)
    size = style.size * (IN_SPACE if drawn.solid else 1.0)
    symbol = "cross" if drawn.solid and style.symbol == "cross" else SYMBOLS[style.symbol]  # in space x is a blank box
    marker = {"symbol": symbol, "size": size, "color": style.fill or style.colour}
    marker["line"] = {"color": style.colour, "width": style.width}
    look: dict[str, Any] = {"mode": "markers", "marker": marker, "name": LISTED[role], "showlegend": role != "vertex"}
    if role in OF_WALK:
        look |= {"showlegend": False, "legendgroup": f"walk {found[0].index}"}
    if role in {
        "vertex",
        "lost",
        "gained",
        "old optimum",
        "evidence",
        "optimum",
        "basis",
        "optimal basis",
        "breakpoint",
        "now",
        *OF_WALK,
    }:
        look |= {"hoverinfo": "text", "hovertext": [html(mark.hover) for mark in found]}
    else:
        look |= {"hoverinfo": "skip"}
    if role == "vertex":
        look["customdata"] = [mark.key for mark in found]
    if drawn.solid and role in NAMED:
        look |= _names(drawn, found, theme)
    return trace(drawn, [mark.point for mark in found], **look)


def _names(drawn: Scene, found: list[Mark], theme: Theme) -> dict[str, Any]:
    """In space, the names of vertices beside their marks."""
    covered = {mark.point for mark in drawn.marks if mark.role in LARGE}
    names = [f"\u2003\u2003{mark.text}" if mark.point in covered else mark.text for mark in found]
    spots = ["middle right" if mark.point in covered else "top center" for mark in found]
    font = {"size": 12, "color": theme.text, "family": FONT}
    return {"mode": "markers+text", "text": names, "textfont": font, "textposition": spots}


def _labels(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """Step numbers; in space the letters of faces too, which stay where they are when the body turns."""
    found = []
    wanted = [label for label in drawn.labels if label.role == "step" or (drawn.solid and not noted(label))]
    for (role, index), items in groupby(sorted(wanted, key=_by_look), key=_by_look):
        group = list(items)
        style = theme.style(role, index)
        text = [f"<b>{html(label.text)}</b>" if role in {"step", "tag"} else html(label.text) for label in group]
        look: dict[str, Any] = {"mode": "text", "text": text, "hoverinfo": "skip", "showlegend": False}
        look["textfont"] = {"size": 12, "color": theme.text if role == "tag" else style.colour, "family": FONT}
        look["textposition"] = "middle center"
        if role == "tag":
            look |= {"hoverinfo": "text", "hovertext": [html(label.hover) for label in group]}
            look["legendgroup"] = f"tag {index}"
            found.append(_tag_entry(drawn, group[0], theme))
        if role == "step" and drawn.solid:
            look["textposition"] = "top center"
        elif role == "step":
            disc = {"symbol": "circle", "size": 17, "color": theme.paper, "line": {"color": style.colour, "width": 1}}
            look |= {"mode": "markers+text", "marker": disc, "legendgroup": f"walk {index}"}
        found.append(trace(drawn, [label.point for label in group], **look))
    return found


def _tag_entry(drawn: Scene, tag: Label, theme: Theme) -> dict[str, Any]:
    """The legend's entry of a letter: plotly's own would be the letters Aa."""
    marker = {"symbol": "square-open", "size": 7, "color": theme.quiet}
    name = f"{tag.text}  {tag.longer.removeprefix(tag.text).strip()}"
    look: dict[str, Any] = {"mode": "markers", "marker": marker, "legendgroup": f"tag {tag.index}"}
    return trace(drawn, [None], **look, name=html(name), hoverinfo="skip")


def _by_look(label: Label) -> tuple[str, int]:
    return label.role, label.index if label.role in {"step", "tag"} else 0
