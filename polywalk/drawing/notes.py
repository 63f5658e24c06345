"""Words of a scene as plotly's annotations: turned along their line in the plane, in front of the body in space."""

from __future__ import annotations

from typing import Any

from polywalk.drawing.camera import Camera
from polywalk.drawing.scene import Label, Point, Scene
from polywalk.drawing.theme import FONT, Theme
from polywalk.drawing.tiles import BOLD
from polywalk.drawing.tracing import html

IN_SPACE = {"stay", "note", "name", "culprit", "evidence name", "part"}
"""Roles of words that would be lost in a body: they stand in front of it."""

ROUND = 6
"""Plotly's number of a round arrow head."""

AWAY = (30.0, 40.0)
"""Pixels from a point to the words joined to it in space: across, up."""


def noted(label: Label) -> bool:
    """Whether a word of a solid scene is a note, not a letter on a face or the number of a step."""
    return label.role in IN_SPACE or bool(label.shorter)


def plane_notes(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """The words of a plane scene but step numbers, which are marks."""
    return [_in_plane(label, theme) for label in drawn.labels if label.role != "step"]


def _in_plane(label: Label, theme: Theme) -> dict[str, Any]:
    style = theme.style(label.role, label.index)
    note = _note(label, theme) | {"x": label.point[0], "y": label.point[1], "textangle": -label.angle, "borderpad": 1}
    note |= {"xanchor": "center", "yanchor": "middle", "showarrow": False}
    if label.target or label.role in {"target", "part", "tag"}:
        note |= {"bgcolor": theme.paper, "bordercolor": style.colour, "borderwidth": 1}
    if label.target:
        note |= {"x": label.target[0], "y": label.target[1], "showarrow": True, "arrowhead": 0, "arrowwidth": 1}
        note |= {"ax": label.point[0], "ay": label.point[1], "axref": "x", "ayref": "y"}
        if label.names_border:
            note |= {"arrowhead": ROUND, "arrowcolor": theme.style("constraint", label.index).colour}
    return note


def space_notes(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """The words of a solid scene; those about one point share a note."""
    found: dict[tuple[str, Point], Label] = {}
    for label in drawn.labels:
        if noted(label):
            known = found.get((label.role, label.point))
            found[label.role, label.point] = (
                label if known is None else Label(f"{known.text}\n{label.text}", *_place(label))
            )
    return [_in_space(drawn, label, theme) for label in found.values()]


def _place(label: Label) -> tuple[Any, ...]:
    return label.point, label.role, label.index, label.shift, label.angle, label.target


def _in_space(drawn: Scene, label: Label, theme: Theme) -> dict[str, Any]:
    """A word in front of the body; plotly hides notes outside the axes, so they are drawn in to the border."""
    place = (min(max(x, axis.low), axis.high) for x, axis in zip(label.point, drawn.axes, strict=True))
    note = _note(label, theme) | dict(zip("xyz", place, strict=True))
    note |= {"bgcolor": theme.paper, "opacity": 0.9, "borderpad": 2, "showarrow": False}
    if label.role == "tag":
        note |= {"bordercolor": theme.style("tag", label.index).colour, "borderwidth": 1}
    joined = label.role == "note" or (label.target and label.role != "part")
    return note | (_joined(drawn, label, theme) if joined else {"xshift": label.shift[0], "yshift": label.shift[1]})


def _joined(drawn: Scene, label: Label, theme: Theme) -> dict[str, Any]:
    """A word joined to its point: a stay is told inward of it, a note outward."""
    camera = Camera(drawn.camera, drawn.scale)
    middle = camera.see([(axis.low + axis.high) / 2 for axis in drawn.axes])
    right, up, _ = (a - b for a, b in zip(camera.see(label.point), middle, strict=True))
    side = 1.0 if (right < 0) == (label.role == "stay") else -1.0
    style = theme.style(label.role, label.index)
    note = {"showarrow": True, "arrowhead": 0, "arrowwidth": 1, "arrowcolor": style.colour}
    note |= {"bordercolor": style.colour, "borderwidth": 1} if label.role == "stay" else {}
    note |= {"ax": side * AWAY[0], "ay": -AWAY[1] if up > 0 else AWAY[1]}
    return note | {"xanchor": "left" if side > 0 else "right", "yanchor": "bottom" if up > 0 else "top"}


def _note(label: Label, theme: Theme) -> dict[str, Any]:
    style = theme.style(label.role, label.index)
    text = html(label.text)
    colour = theme.text if label.role == "tag" else style.colour  # a tag has the colour of its constraint as frame
    font = {"size": style.size, "color": colour, "family": FONT}
    return {"text": f"<b>{text}</b>" if label.role in BOLD | {"part"} else text, "font": font}
