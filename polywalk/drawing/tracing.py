"""What all traces of plotly.js share: text without markup, points as columns."""

from __future__ import annotations

from html import escape
from typing import Any

from polywalk.drawing.scene import Point, Scene


def html(text: str) -> str:
    """Plain text as plotly's own markup: nothing in a name is taken for a tag."""
    return escape(text, quote=False).replace("\n", "<br>")


def columns(drawn: Scene, points: list[Point | None]) -> dict[str, list[float | None]]:
    """Points as one list an axis, None where a line breaks."""
    names = "xyz"[: len(drawn.axes)]
    return {name: [None if point is None else point[k] for point in points] for k, name in enumerate(names)}


def trace(drawn: Scene, points: list[Point | None], **look: Any) -> dict[str, Any]:
    """A scatter trace of the scene's plane or space."""
    return {"type": "scatter3d" if drawn.solid else "scatter", **columns(drawn, points), **look}
