"""What a picture of a region says under its title."""

from __future__ import annotations

from polywalk.drawing.subject import Subject, coordinates
from polywalk.exact import Row


def status(looked: Subject) -> str:
    """The region and its optimum in one line."""
    seen, whole = looked.seen, looked.region
    kind = "single point" if seen.dimension == 0 else f"{seen.status} region"
    flat = f", flat (dimension {seen.dimension})" if 0 < seen.dimension < len(looked.axes) else ""
    corners = f"{len(seen.vertices)} {'vertex' if len(seen.vertices) == 1 else 'vertices'}"
    text = f"{kind}{flat}, {corners if not seen.lines else 'no vertex (it contains a line)'}"
    if whole.outcome == "unbounded":
        return f"{text}; the objective has no optimum: it improves without end"
    if whole.value is None:
        return text
    if whole.lines:
        return f"{text}; optimum {looked.worth(whole.value)} along a whole line"
    places = [_place(looked, whole.vertices[k].point) for k in (whole.optimal.vertices if whole.optimal else ())]
    where = f" at {places[0]}" if len(places) == 1 else f", tied between {len(places)} vertices" if places else ""
    onward = " and on without end" if whole.optimal and whole.optimal.rays else ""
    return f"{text}; optimum {looked.worth(whole.value)}{where}{onward}"


def _place(looked: Subject, point: Row) -> str:
    """A point of the model; along the axes it is written as in the key."""
    return coordinates(point) if looked.projected else looked.place(point)
