"""The interactive painter: a Scene as a plotly figure, as plain dicts or as a Figure to style and export."""

from __future__ import annotations

from html import escape
from itertools import groupby
from typing import TYPE_CHECKING, Any

from polywalk.drawing.compose import scene
from polywalk.drawing.heads import cones
from polywalk.drawing.scene import Label, Line, Mark, Point, Polygon, Scene
from polywalk.drawing.theme import THEMES, Style, Theme
from polywalk.drawing.view import View, viewed
from polywalk.model import Model
from polywalk.region import Region

if TYPE_CHECKING:
    import plotly.graph_objects as go

HEIGHT = 580
FONT = "DejaVu Sans, Verdana, sans-serif"
SYMBOLS = {"circle": "circle", "ring": "circle-open", "diamond": "diamond", "square ring": "square-open"}
LISTED = {
    "vertex": "vertices",
    "degenerate": "degenerate vertex",
    "optimum": "optimum",
    "start": "start of the walk",
    "selected": "selected",
}
"""Marks by role, as the legend calls them."""

IN_LEGEND = {"constraint", "conflict line", "open edge", "level line", "objective", "walk", "phase 1", "optimal face"}


def draw(source: Model | Region, view: View | None = None, **changes: Any) -> go.Figure:
    """Draw a region as an interactive plotly figure: constraints, vertices, optimum, walks.

    Parameters
    ----------
    source : Model or Region
        A Region saves enumerating again.
    view : View, optional
    **changes
        Fields of View, for short: ``walks=[...]``, ``axes=("pump", "tank")``, ``mode="dark"``.

    Returns
    -------
    plotly.graph_objects.Figure
        Hover tells exact and rounded numbers; the legend switches constraints, faces and walks off and on.

    Raises
    ------
    DrawingError
        The axes do not fit the model, or a field that View does not have.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="x", constraints={"both": "x + y <= 3"}, bounds={"x": (0, 2), "y": (0, 2)})
    >>> figure = pw.draw(model, walks=[pw.walk(model)])
    >>> figure.layout.title.text
    '<b>Feasible region</b>'
    """
    import plotly.graph_objects as go

    return go.Figure(figure(source, viewed(view, changes)))


def figure(source: Model | Region, view: View | None = None) -> dict[str, Any]:
    """The same figure as plain dicts: ``data`` and ``layout``, ready for plotly.js.

    All vertices are one trace named "vertices", whose ``customdata`` holds their indices.
    """
    looked = view or View()
    return painted(scene(source, looked), THEMES[looked.mode])


def painted(drawn: Scene, theme: Theme) -> dict[str, Any]:
    """The dicts of a scene."""
    data = _polygons(drawn, theme)
    for line in drawn.lines:
        data += _line(drawn, line, theme)
    data += _marks(drawn, theme) + _labels(drawn, theme)
    return {"data": data, "layout": _layout(drawn, theme)}


def _html(text: str) -> str:
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
        traces.append(_mesh(drawn, role, group, theme) if drawn.solid else _fill(drawn, group[0], theme))
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
        "name": _html(name),
        "showlegend": role in {"facet", "conflict"},
    }
    light = {"ambient": 0.75, "diffuse": 0.35, "specular": 0.0, "fresnel": 0.0}
    mesh = {"type": "mesh3d", **_columns(drawn, points), "i": i, "j": j, "k": k, "flatshading": True, "lighting": light}
    return mesh | look | {"hoverinfo": "skip"}


def _fill(drawn: Scene, polygon: Polygon, theme: Theme) -> dict[str, Any]:
    style = theme.style(polygon.role, polygon.index)
    line = {"color": style.colour, "width": style.width, "dash": style.dash}
    closed: list[Point | None] = [*polygon.points, polygon.points[0]]
    look = {"mode": "lines", "fill": "toself", "fillcolor": style.fill, "opacity": style.opacity, "line": line}
    return _trace(drawn, closed, **look, hoverinfo="skip", showlegend=False, name=_html(polygon.name))


def _line(drawn: Scene, item: Line, theme: Theme) -> list[dict[str, Any]]:
    style = theme.style(item.role, item.index)
    points: list[Point | None] = []
    for part in item.parts:
        points += [*part, None]
    group = f"{item.role} {item.index}" if item.role not in {"phase 1", "walk rest"} else f"walk {item.index}"
    look: dict[str, Any] = {
        "mode": "lines",
        "line": {"color": style.colour, "width": style.width * (1.6 if drawn.solid else 1.0), "dash": style.dash},
        "opacity": style.opacity,
        "name": _html(item.name or item.role),
        "legendgroup": group if item.role != "hatch" else f"constraint {item.index}",
        "showlegend": item.role in IN_LEGEND,
    }
    hover = {"hoverinfo": "text", "text": _html(item.hover)} if item.hover else {"hoverinfo": "skip"}
    traces = [_trace(drawn, points, **look, **hover)]
    if item.arrow:
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
        if found:
            traces.append(_mark_trace(drawn, role, found, theme))
    return traces


def _mark_trace(drawn: Scene, role: str, found: list[Mark], theme: Theme) -> dict[str, Any]:
    style = theme.style(role)
    size = style.size * (
        0.8 if drawn.solid and role == "vertex" else 0.55 if drawn.solid and role == "optimum" else 1.0
    )
    marker = {"symbol": SYMBOLS[style.symbol], "size": size, "color": style.fill or style.colour}
    marker["line"] = {"color": style.colour, "width": style.width}
    look: dict[str, Any] = {"mode": "markers", "marker": marker, "name": LISTED[role], "showlegend": role != "vertex"}
    if role in {"vertex", "optimum"}:
        look |= {"hoverinfo": "text", "hovertext": [_html(mark.hover) for mark in found]}
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
    for (role, index), items in groupby(sorted(wanted, key=_by_look), key=_by_look):
        group = list(items)
        style = theme.style(role, index)
        bold = role in {"step", "tag"}
        text = [f"<b>{_html(label.text)}</b>" if bold else _html(label.text) for label in group]
        look: dict[str, Any] = {"mode": "text", "text": text, "hoverinfo": "skip", "showlegend": False}
        look["textfont"] = {"size": 12, "color": theme.text if role == "tag" else style.colour, "family": FONT}
        look["textposition"] = "bottom center" if role == "stay" else "middle center"
        if role == "step":
            disc = {"symbol": "circle", "size": 17, "color": theme.paper, "line": {"color": style.colour, "width": 1}}
            look |= {"mode": "markers+text", "marker": disc, "legendgroup": f"walk {index}"}
        traces.append(_trace(drawn, [label.point for label in group], **look))
    return traces


def _by_look(label: Label) -> tuple[str, int]:
    return label.role, label.index if label.role == "step" else 0


def _annotations(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """In the plane, names are annotations: they can stand along their line."""
    found = []
    for label in drawn.labels:
        if drawn.solid or label.role == "step":
            continue
        style = theme.style(label.role, label.index)
        font = {"size": style.size, "color": style.colour, "family": FONT}
        text = f"<b>{_html(label.text)}</b>" if label.role == "point" else _html(label.text)
        note: dict[str, Any] = {
            "x": label.point[0],
            "y": label.point[1],
            "text": text,
            "showarrow": False,
            "font": font,
        }
        note |= {"textangle": -label.angle, "xanchor": "center", "yanchor": "middle", "borderpad": 1}
        if label.role == "stay":
            note |= {"bgcolor": theme.paper, "bordercolor": style.colour, "borderwidth": 1}
        found.append(note)
    return found


def _layout(drawn: Scene, theme: Theme) -> dict[str, Any]:
    subtitle = {"text": _html(drawn.subtitle), "font": {"size": 13, "color": theme.text}}
    title = {"text": f"<b>{_html(drawn.title)}</b>", "x": 0.01, "xanchor": "left", "y": 0.97, "yanchor": "top"}
    layout: dict[str, Any] = {
        "title": title | {"font": {"size": 17, "color": theme.text}, "subtitle": subtitle},
        "height": HEIGHT,
        "margin": {"l": 50, "r": 10, "t": 92, "b": 44},
        "paper_bgcolor": theme.paper,
        "plot_bgcolor": theme.paper,
        "font": {"family": FONT, "color": theme.text, "size": 12},
        "legend": {"font": {"size": 12}, "itemsizing": "constant", "bgcolor": theme.paper},
        "uirevision": "polywalk",
        "hoverlabel": {"align": "left", "bgcolor": theme.paper, "font": {"color": theme.text, "family": FONT}},
        "modebar": {"remove": ["sendChartToCloud", "lasso2d", "select2d"]},
        "template": {"layout": {}},
    }
    return layout | (_space(drawn, theme) if drawn.solid else _plane(drawn, theme))


def _plane(drawn: Scene, theme: Theme) -> dict[str, Any]:
    found: dict[str, Any] = {"annotations": _annotations(drawn, theme), "hovermode": "closest", "dragmode": "pan"}
    for name, axis in zip(("xaxis", "yaxis"), drawn.axes, strict=True):
        look = {"range": [axis.low, axis.high], "gridcolor": theme.grid, "zeroline": False, "tickcolor": theme.quiet}
        found[name] = look | {"title": {"text": _html(axis.title)}, "visible": bool(axis.title), "showgrid": False}
        found[name] |= {"linecolor": theme.grid, "mirror": True, "showline": True, "exponentformat": "none"}
    if abs(drawn.scale[0] - drawn.scale[1]) <= 1e-9 * drawn.scale[0]:  # equal units but for rounding
        found["yaxis"] |= {"scaleanchor": "x", "scaleratio": 1}
    return found


def _space(drawn: Scene, theme: Theme) -> dict[str, Any]:
    drawn_length = [(axis.high - axis.low) * unit for axis, unit in zip(drawn.axes, drawn.scale, strict=True)]
    size = max(drawn_length)
    x, y, z = drawn.camera
    far = 1.9 / (x * x + y * y + z * z) ** 0.5
    eye = {"x": x * far, "y": y * far, "z": z * far}
    space: dict[str, Any] = {
        "aspectmode": "manual",
        "aspectratio": {name: length / size for name, length in zip("xyz", drawn_length, strict=True)},
        "camera": {"eye": eye, "up": {"x": 0, "y": 0, "z": 1}, "projection": {"type": "orthographic"}},
        "dragmode": "turntable",
    }
    for name, axis in zip("xyz", drawn.axes, strict=True):
        look = {"range": [axis.low, axis.high], "showbackground": False, "gridcolor": theme.grid, "color": theme.text}
        look |= {"zeroline": False, "showspikes": False, "linecolor": theme.quiet, "nticks": 6}
        space[f"{name}axis"] = look | {"title": {"text": _html(axis.title)}}
    return {"scene": space}
