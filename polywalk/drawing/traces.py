"""The traces of a scene, as the plain dicts plotly.js reads."""

from __future__ import annotations

from html import escape
from itertools import groupby
from typing import Any

from polywalk.drawing.heads import cones
from polywalk.drawing.scene import Label, Line, Mark, Point, Polygon, Scene
from polywalk.drawing.theme import FONT, Style, Theme

SYMBOLS = {"circle": "circle", "ring": "circle-open", "diamond": "diamond", "square ring": "square-open"}
SYMBOLS |= {"square": "square", "diamond ring": "diamond-open", "cross": "x"}

FILLS = {"cut off": "/", "added": "."}
"""Patterns of areas that are not told by their colour."""
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

PLACED = {"stay": "bottom center", "evidence name": "bottom right"}
"""Where a text stands beside its point in space; others stand on it."""

OF_WALK = ("moved", "stayed")
"""Marks in the look of their walk, switched off and on with it."""

IN_LEGEND = {"constraint", "conflict line", "open edge", "level line", "objective", "walk", "phase 1", "optimal face"}
IN_LEGEND |= {"old edge", "new edge", "old edge on", "new edge on", "old border"}
IN_LEGEND |= {"curve", "pivot", "faint pivot", "exchange", "exit", "faint exit", "other exit", "letter"}


IN_SPACE = 0.55
"""plotly draws marks in space nearly twice as large as the same number in the plane (measured on screenshots)."""


def traces(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """Polygons, lines, marks and labels of a scene, in the order they are painted."""
    data = _polygons(drawn, theme)
    for line in drawn.lines:
        data += _line(drawn, line, theme)
    return data + _marks(drawn, theme) + _labels(drawn, theme)


def html(text: str) -> str:
    """Plain text as plotly's own markup: nothing in a name is taken for a tag."""
    return escape(text, quote=False).replace("\n", "<br>")


def _columns(drawn: Scene, points: list[Point | None]) -> dict[str, list[float | None]]:
    """Points as one list an axis, None where a line breaks."""
    names = "xyz"[: len(drawn.axes)]
    return {name: [None if point is None else point[k] for point in points] for k, name in enumerate(names)}


def _trace(drawn: Scene, points: list[Point | None], **look: Any) -> dict[str, Any]:
    return {"type": "scatter3d" if drawn.solid else "scatter", **_columns(drawn, points), **look}


def _polygons(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    traces = []
    for (role, _), items in groupby(
        drawn.polygons, key=lambda item: (item.role, item.name if drawn.solid and item.role != "facet" else "")
    ):
        group = list(items)
        traces += [_mesh(drawn, role, group, theme)] if drawn.solid else [_fill(drawn, item, theme) for item in group]
    return traces


def _mesh(drawn: Scene, role: str, group: list[Polygon], theme: Theme) -> dict[str, Any]:
    """Convex polygons of one look as triangles from their first corners."""
    style = theme.style(role, group[0].index)
    points: list[Point | None] = []
    triangles: list[tuple[int, int, int]] = []
    for polygon in group:
        base = len(points)
        triangles += [(base, base + k, base + k + 1) for k in range(1, len(polygon.points) - 1)]
        points += polygon.points
    i, j, k = (list(column) for column in zip(*triangles, strict=True))
    name = "faces" if role == "facet" else group[0].name or role
    look = {
        "color": style.fill,
        "opacity": style.opacity,
        "name": html(name),
        "showlegend": role in {"facet", "conflict", "cut off", "added"},
    }
    light = {"ambient": 0.75, "diffuse": 0.35, "specular": 0.0, "fresnel": 0.0}
    mesh = {"type": "mesh3d", **_columns(drawn, points), "i": i, "j": j, "k": k, "flatshading": True, "lighting": light}
    return mesh | look | {"hoverinfo": "skip"}


def _fill(drawn: Scene, polygon: Polygon, theme: Theme) -> dict[str, Any]:
    style = theme.style(polygon.role, polygon.index)
    line = {"color": style.colour, "width": style.width, "dash": style.dash}
    closed: list[Point | None] = [*polygon.points, polygon.points[0]]
    look = {"mode": "lines", "fill": "toself", "fillcolor": style.fill, "opacity": style.opacity, "line": line}
    if polygon.role in FILLS:
        shape = {
            "shape": FILLS[polygon.role],
            "fgcolor": style.colour,
            "bgcolor": style.fill,
            "size": 8,
            "solidity": 0.25,
        }
        look |= {"fillpattern": shape | {"fgopacity": 0.8, "fillmode": "overlay"}, "opacity": 0.5}
    return _trace(drawn, closed, **look, hoverinfo="skip", showlegend=False, name=html(polygon.name))


def _line(drawn: Scene, item: Line, theme: Theme) -> list[dict[str, Any]]:
    style = theme.style(item.role, item.index)
    points: list[Point | None] = []
    for part in item.parts:
        points += [*part, None]
    of_walk = item.role in {"phase 1", "walk rest", "onward"}
    group = f"walk {item.index}" if of_walk else f"{item.role} {item.index}"
    look: dict[str, Any] = {
        "mode": "lines",
        "line": {"color": style.colour, "width": style.width * (1.6 if drawn.solid else 1.0), "dash": style.dash},
        "opacity": style.opacity,
        "name": html(item.name or item.role),
        "legendgroup": group if item.role != "hatch" else f"constraint {item.index}",
        "showlegend": item.role in IN_LEGEND and (bool(item.name) or item.role != "phase 1"),
    }
    hover = {"hoverinfo": "text", "text": html(item.hover)} if item.hover else {"hoverinfo": "skip"}
    traces = [_trace(drawn, points, **look, **hover)]
    if item.arrow and item.parts:
        traces.append(_heads(drawn, item, style, look["legendgroup"]))
    return traces


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
    return _trace(drawn, points, mode="markers", marker=marker, **common)


def _marks(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    traces = []
    for role in LISTED:
        found = [mark for mark in drawn.marks if mark.role == role]
        for index in sorted({mark.index for mark in found}) if role in OF_WALK else [0] if found else []:
            group = [mark for mark in found if role not in OF_WALK or mark.index == index]
            traces.append(_mark_trace(drawn, role, group, theme))
    return traces


def _mark_trace(drawn: Scene, role: str, found: list[Mark], theme: Theme) -> dict[str, Any]:
    style = theme.style(role, found[0].index)
    size = style.size * (IN_SPACE if drawn.solid else 1.0)
    marker = {"symbol": SYMBOLS[style.symbol], "size": size, "color": style.fill or style.colour}
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
        if drawn.solid:
            font = {"size": 12, "color": theme.text, "family": FONT}
            look |= {"mode": "markers+text", "text": [mark.text for mark in found], "textfont": font}
            look["textposition"] = "top center"
    return _trace(drawn, [mark.point for mark in found], **look)


def _labels(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """Text that belongs to a place: step numbers everywhere; in space all other labels too."""
    traces = []
    wanted = [label for label in drawn.labels if drawn.solid or label.role == "step"]
    for (role, index), items in groupby(sorted(_merged(wanted), key=_by_look), key=_by_look):
        group = list(items)
        style = theme.style(role, index)
        bold = role in {"step", "tag"}
        text = [f"<b>{html(label.text)}</b>" if bold else html(label.text) for label in group]
        look: dict[str, Any] = {"mode": "text", "text": text, "hoverinfo": "skip", "showlegend": False}
        look["textfont"] = {"size": 12, "color": theme.text if role == "tag" else style.colour, "family": FONT}
        look["textposition"] = PLACED.get(role, "middle center")
        if role == "tag":
            name = f"{group[0].shorter or group[0].text}  {group[0].hover.partition(':')[0]}"
            look |= {"hoverinfo": "text", "hovertext": [html(label.hover) for label in group]}
            look |= {"showlegend": True, "name": html(name)}
        if role == "step" and drawn.solid:
            look["textposition"] = "top center"
        elif role == "step":
            disc = {"symbol": "circle", "size": 17, "color": theme.paper, "line": {"color": style.colour, "width": 1}}
            look |= {"mode": "markers+text", "marker": disc, "legendgroup": f"walk {index}"}
        traces.append(_trace(drawn, [label.point for label in group], **look))
    return traces


def _merged(labels: list[Label]) -> list[Label]:
    """Labels that tell of stays at one point, as one label of several lines."""
    found: dict[Point, list[str]] = {}
    for label in labels:
        if label.role == "stay":
            found.setdefault(label.point, []).append(label.text)
    stays = [Label("\n".join(texts), point, "stay") for point, texts in found.items()]
    return [label for label in labels if label.role != "stay"] + stays


def _by_look(label: Label) -> tuple[str, int]:
    return label.role, label.index if label.role in {"step", "tag"} else 0
