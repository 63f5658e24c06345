"""Which vertex of the region a vertex of its picture is, where the picture is a projection, and the other way round."""

from __future__ import annotations

from polywalk.explorer.traits import Traits
from polywalk.region import project


def drawn_whole(state: Traits) -> bool:
    """Whether every variable is an axis, in the model's order."""
    return state.axes is None or state.axes == state.model.variables


def in_picture(state: Traits) -> int | None:
    """The number the selected vertex has in the picture; None where its shadow is no corner."""
    if state.vertex is None or state.region is None or drawn_whole(state):
        return state.vertex
    point = state.region.vertices[state.vertex].point
    shadow = tuple(point[state.model.index(name)] for name in state.axes)
    points = [vertex.point for vertex in project(state.region, state.axes).vertices]
    return points.index(shadow) if shadow in points else None


def in_region(state: Traits, number: int) -> int | None:
    """The vertex that a vertex of the picture is the shadow of: the best one where there are several."""
    if state.region is None or drawn_whole(state):
        return number
    places = [state.model.index(name) for name in state.axes]
    shadow = project(state.region, state.axes).vertices[number].point
    corners = state.region.vertices
    above = [k for k, vertex in enumerate(corners) if tuple(vertex.point[j] for j in places) == shadow]
    goal = state.model.objective
    if goal is None or not above:
        return above[0] if above else None
    return (min if goal.goal == "min" else max)(above, key=lambda k: goal.at(corners[k].point))
