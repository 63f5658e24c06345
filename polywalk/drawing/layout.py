"""The layout of a scene, as the plain dicts plotly.js reads: titles, axes, aspect, camera, names in the plane."""

from __future__ import annotations

from itertools import product
from typing import Any

from polywalk.drawing.camera import Camera
from polywalk.drawing.notes import plane_notes, space_notes
from polywalk.drawing.scales import GROUPED
from polywalk.drawing.scene import Axis, Scene
from polywalk.drawing.theme import FONT, Theme
from polywalk.drawing.tracing import html

HEIGHT = 580
ROOM = (2.25, 1.75)
"""Width and height, in plotly's units, that a parallel projection shows of a figure this high."""


def layout(drawn: Scene, theme: Theme) -> dict[str, Any]:
    """The layout for the traces of the same scene."""
    subtitle = {"text": html(drawn.subtitle), "font": {"size": 13, "color": theme.text}}
    title = {"text": f"<b>{html(drawn.title)}</b>", "x": 0.01, "xanchor": "left", "y": 0.97, "yanchor": "top"}
    found: dict[str, Any] = {
        "title": title | {"font": {"size": 17, "color": theme.text}, "subtitle": subtitle},
        "height": HEIGHT,
        "margin": {"l": 50, "r": 10, "t": 92, "b": 44},
        "paper_bgcolor": theme.paper,
        "plot_bgcolor": theme.paper,
        "font": {"family": FONT, "color": theme.text, "size": 12},
        "legend": {"font": {"size": 12}, "itemsizing": "constant", "tracegroupgap": 0, "bgcolor": theme.paper},
        "uirevision": "polywalk",
        "hoverlabel": {"align": "left", "bgcolor": theme.paper, "font": {"color": theme.text, "family": FONT}},
        "modebar": {"remove": ["sendChartToCloud", "lasso2d", "select2d"]},
        "template": {"layout": {}},
    }
    return found | (_space(drawn, theme) if drawn.solid else _plane(drawn, theme))


def _plane(drawn: Scene, theme: Theme) -> dict[str, Any]:
    found: dict[str, Any] = {"annotations": plane_notes(drawn, theme), "hovermode": "closest", "dragmode": "pan"}
    for name, axis in zip(("xaxis", "yaxis"), drawn.axes, strict=True):
        look = {"range": [axis.low, axis.high], "gridcolor": theme.grid, "zeroline": False, "tickcolor": theme.quiet}
        found[name] = look | {"title": {"text": html(axis.title)}, "visible": bool(axis.title), "showgrid": False}
        found[name] |= {"linecolor": theme.grid, "mirror": True, "showline": True, "exponentformat": "none"}
        found[name] |= {"separatethousands": _large(axis), "automargin": True}
        found[name] |= {"tick0": 0, "dtick": axis.spacing} if axis.spacing else {}
    if abs(drawn.scale[0] - drawn.scale[1]) <= 1e-9 * drawn.scale[0]:  # equal units but for rounding
        found["yaxis"] |= {"scaleanchor": "x", "scaleratio": 1}
    return found


def _large(axis: Axis) -> bool:
    """Whether the digits of an axis's numbers stand in groups of three, as in the static picture."""
    return max(abs(axis.low), abs(axis.high)) >= GROUPED


def _size(drawn: Scene) -> float:
    """How many drawn lengths one of plotly's units must hold for the whole box to be seen."""
    camera = Camera(drawn.camera, drawn.scale)
    seen = [camera.see(corner) for corner in product(*((axis.low, axis.high) for axis in drawn.axes))]
    extents = [max(values) - min(values) for values in zip(*seen, strict=True)]
    return float(max(extents[0] / ROOM[0], extents[1] / ROOM[1]))


def _space(drawn: Scene, theme: Theme) -> dict[str, Any]:
    drawn_length = [(axis.high - axis.low) * unit for axis, unit in zip(drawn.axes, drawn.scale, strict=True)]
    size = _size(drawn)
    x, y, z = drawn.camera
    if not (x or y):
        y = -0.001 * z  # from straight above, which way is up would be left open
    far = 1.9 / (x * x + y * y + z * z) ** 0.5
    eye = {"x": x * far, "y": y * far, "z": z * far}
    space: dict[str, Any] = {
        "aspectmode": "manual",
        "aspectratio": {name: length / size for name, length in zip("xyz", drawn_length, strict=True)},
        "camera": {"eye": eye, "up": {"x": 0, "y": 0, "z": 1}, "projection": {"type": "orthographic"}},
        "dragmode": "turntable",
        "annotations": space_notes(drawn, theme),
    }
    for name, axis in zip("xyz", drawn.axes, strict=True):
        look = {"range": [axis.low, axis.high], "showbackground": False, "gridcolor": theme.grid, "color": theme.text}
        look |= {"zeroline": False, "showspikes": False, "linecolor": theme.quiet, "nticks": 6}
        look |= {"exponentformat": "none", "separatethousands": _large(axis)}
        space[f"{name}axis"] = look | {"title": {"text": html(axis.title)}}
    return {"scene": space}
