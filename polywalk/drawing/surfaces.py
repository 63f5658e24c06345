"""The polygons of a scene as traces: filled outlines in the plane, triangles in space."""

from __future__ import annotations

from itertools import groupby
from typing import Any

from polywalk.drawing.scene import Point, Polygon, Scene
from polywalk.drawing.theme import Theme
from polywalk.drawing.tracing import columns, html, trace

FILLS = {"cut off": "/", "added": "."}
"""Patterns of areas that are not told by their colour."""


def polygons(drawn: Scene, theme: Theme) -> list[dict[str, Any]]:
    """One trace for each polygon of the plane; in space one for each look."""
    found = []
    for (role, _), items in groupby(
        drawn.polygons, key=lambda item: (item.role, item.name if drawn.solid and item.role != "facet" else "")
    ):
        group = list(items)
        found += [_mesh(drawn, role, group, theme)] if drawn.solid else [_fill(drawn, item, theme) for item in group]
    return found


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
        "legendgroup": f"conflict line {group[0].index}" if role == "conflict" else "",
    }
    light = {"ambient": 0.75, "diffuse": 0.35, "specular": 0.0, "fresnel": 0.0}
    mesh = {"type": "mesh3d", **columns(drawn, points), "i": i, "j": j, "k": k, "flatshading": True, "lighting": light}
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
    return trace(drawn, closed, **look, hoverinfo="skip", showlegend=False, name=html(polygon.name))
