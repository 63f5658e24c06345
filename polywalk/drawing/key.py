"""The key of a picture: what every mark means, in words and numbers, so that it stands on its own."""

from __future__ import annotations

from fractions import Fraction

from polywalk.drawing.conflict import Conflict
from polywalk.drawing.numbers import apart, row_text
from polywalk.drawing.paths import walk_text
from polywalk.drawing.scene import KeyPart, KeyRow
from polywalk.drawing.subject import Subject, coordinates, floats
from polywalk.model import GOAL, Constraint
from polywalk.region import vertex_name
from polywalk.walks import Walk

MOST_VERTICES = 16
"""Past this many vertices the key lists only optimal and degenerate ones, and says so."""

VERTICES = "Vertices, with the constraints active there"
"""Heading of the list of vertices."""

MOST_NAMES = 110
"""Past so many characters of names at one vertex, letters stand for them."""

MOST_STOPS = 24
"""Past this many stops the key shortens a path."""


def key(subject: Subject, tags: dict[str, str], absent: tuple[str, ...], found: Conflict | None) -> tuple[KeyPart, ...]:
    """All parts of the key that have rows; where names would fill the page, vertices are told by letters."""
    brief = max((len(", ".join(vertex.active)) for vertex in subject.seen.vertices), default=0) > MOST_NAMES
    shown = subject.letters if brief else tags
    parts = (
        KeyPart("What the marks say", _marks(subject, found)),
        KeyPart("Walks", _walks(subject)),
        KeyPart(f"{VERTICES}{', by letter' if brief else ''}", _vertices(subject, subject.letters if brief else {})),
        KeyPart("Constraints", _constraints(subject, shown, absent, found, faces=tags)),
    )
    return tuple(part for part in parts if part.rows)


def _marks(subject: Subject, found: Conflict | None) -> tuple[KeyRow, ...]:
    seen, rows = subject.seen, []
    if found is not None:
        return _conflict(subject, found)
    rows += [KeyRow("optimum", _optimum(subject))] if subject.optimal else []
    goal = seen.model.objective
    if goal is not None and any(goal.coefficients):
        verb = "falls" if goal.goal == "min" else "rises"
        rows.append(KeyRow("objective", f"direction in which the objective {verb} (goal: {GOAL[goal.goal]})"))
        if subject.region.value is not None:
            rows.append(KeyRow("level line", f"where the objective is {subject.worth(subject.region.value)}"))
    names = coordinates(subject.axes)
    for ray in seen.rays:
        better = goal is not None and ray.change is not None and goal.better(ray.change, Fraction(0))
        gain = ", and the objective improves without end" if better else ""
        along = f"; it slides along {', '.join(ray.active)}" if ray.active else ""
        rows.append(KeyRow("open edge", f"no limit along {names} = {coordinates(ray.direction)}{gain}{along}"))
    for line in seen.lines:
        rows.append(KeyRow("open edge", f"no limit along {names} = {coordinates(line)}, nor against it"))
    rows += _degenerate(subject)
    rows += _solid(subject)
    if not subject.axes[2:]:
        rows.append(KeyRow("hatch", "strokes: the side a constraint forbids"))
    return tuple(rows)


def _conflict(subject: Subject, found: Conflict) -> tuple[KeyRow, ...]:
    if subject.projected:
        return (KeyRow("none", "nothing is drawn: no point satisfies every constraint"),)
    rows = []
    if found.names:
        order = [row.name for row in subject.seen.model.constraints]
        index = min((order.index(name) for name in found.names if name in order), default=0)
        solid = len(subject.axes) == 3
        side = "; an arrow points to the side that one allows" if solid and _is_half(found.lifted) else ""
        how = "thick or shaded" if solid else "thick"
        rows.append(KeyRow("conflict line", f"{how}: the constraints that cannot hold together{side}", index))
        if not solid:
            rows.append(KeyRow("hatch", "strokes: the side a constraint forbids"))
    if found.rest is not None and found.lifted is not None:
        name = found.lifted.name
        rows.append(KeyRow("rest", f"not allowed either: only what would be left without {name}"))
        if found.nearest is not None and found.short is not None:
            miss = f"the point of that nearest to {name}, {coordinates(found.nearest)}, {found.miss(subject.model)}"
            rows.append(KeyRow("short", miss))
        rows += _excerpt(subject, found)
    return tuple(rows)


def _excerpt(subject: Subject, found: Conflict) -> list[KeyRow]:
    """That a picture shows only a part of what is left, and where no constraint of the model keeps that above 0."""
    if not found.excerpt or found.rest is None:
        return []
    said = "arrows: there it goes on without limit; the picture is an excerpt around where the constraints come nearest"
    free = [name for name, (low, _) in found.rest.ranges.items() if low is None]
    below = f"; nothing here keeps {', '.join(free)} from being negative" if free else ""
    return [KeyRow("open edge", said + below)]


def _is_half(row: Constraint | None) -> bool:
    return row is None or row.sense != "=="


def _solid(subject: Subject) -> list[KeyRow]:
    """What only a picture in space has to explain."""
    if not subject.axes[2:] or subject.seen.dimension < 3:
        return []
    rows = [KeyRow("hidden edge", "edges and letters in dashes: at the back, seen through the body")]
    if subject.seen.rays:
        rows.append(KeyRow("none", "where faces end without an edge, they go on beyond the picture"))
    return rows


def _degenerate(subject: Subject) -> list[KeyRow]:
    """One row for all degenerate vertices that lie on equally many constraints."""
    found: dict[int, list[str]] = {}
    for k, vertex in enumerate(subject.seen.vertices):
        if vertex.degenerate:
            found.setdefault(len(vertex.active), []).append(vertex_name(k))
    return [
        KeyRow("degenerate", f"degenerate: at {', '.join(names)} {most} constraints meet, {len(subject.axes)} would do")
        for most, names in found.items()
    ]


def _optimum(subject: Subject) -> str:
    names = {vertex.point: f"{vertex_name(k)} " for k, vertex in enumerate(subject.seen.vertices)}
    places = [f"{names.get(point, 'the shadow ')}{subject.place(point)}" for point in subject.optimal]
    value = f"objective {subject.worth(subject.region.value)}" if subject.region.value is not None else ""
    face = subject.region.optimal
    if face is not None and (face.rays or face.lines):
        return f"optimum: {value} at {', '.join(places)} and on without end"
    if len(places) > 1:
        return f"tied optimum: {value} at {', '.join(places)} and everywhere between"
    return f"optimum: {value} at {places[0]}"


def _walks(subject: Subject) -> tuple[KeyRow, ...]:
    rows = [_walk(subject, index, walk) for index, walk in enumerate(subject.view.walks)]
    if any(walk.pivots for walk in subject.view.walks):
        rows.append(KeyRow("start", "where the first walk starts; circled numbers count its pivots"))
    if any(pivot.phase == 1 for walk in subject.view.walks for pivot in walk.pivots):
        rows.append(
            KeyRow("phase 1", "Phase I: the search for a first allowed plan, with an auxiliary that is no decision")
        )
    return tuple(rows)


def _walk(subject: Subject, index: int, walk: Walk) -> KeyRow:
    """What a walk did, and the vertices it passed."""
    names = {floats(vertex.point): vertex_name(k) for k, vertex in enumerate(subject.seen.vertices)}
    stops = [names.get(subject.along(point)) or f"outside {subject.place(point)}" for point in walk.points]
    path = [stop for stop, before in zip(stops, ["", *stops[:-1]], strict=True) if stop != before]
    shown = path if len(path) <= MOST_STOPS else [*path[: MOST_STOPS - 2], "...", path[-1]]
    onward = " → on without end" if walk.end == "unbounded" else ""
    return KeyRow("walk", f"{walk_text(walk)}: {' → '.join(shown)}{onward}", index)


def _vertices(subject: Subject, letters: dict[str, str]) -> tuple[KeyRow, ...]:
    """Point, objective and active constraints of each vertex; with letters for these where some are given."""
    seen = subject.seen
    listed = list(range(len(seen.vertices)))
    if len(listed) > MOST_VERTICES:
        listed = [k for k in listed if seen.vertices[k].degenerate or k in subject.best][:MOST_VERTICES]
    rows = []
    for k in listed:
        vertex = seen.vertices[k]
        value = f"  objective {subject.worth(vertex.objective)}" if vertex.objective is not None else ""
        names = ", ".join(letters.get(name, name) for name in vertex.active)
        rows.append(KeyRow("point", f"{subject.place(vertex.point)}{value}: {names}", tag=vertex_name(k)))
    left = len(seen.vertices) - len(listed)
    if left:
        rows.append(KeyRow("point", f"and {left} more vertices", tag=""))
    return tuple(rows)


def _constraints(
    subject: Subject, tags: dict[str, str], absent: tuple[str, ...], found: Conflict | None, faces: dict[str, str]
) -> tuple[KeyRow, ...]:
    rows, model = [], subject.seen.model
    rhs = apart(row.rhs for row in model.constraints)
    flat = set(subject.seen.equalities)
    for index, row in enumerate(model.constraints):
        note = ""
        if found is not None:
            note = "   (in the conflict)" if row.name in found.names else ""
        elif row.name in flat:
            note = "   (active everywhere)"
        elif row.name in absent:
            note = "   (outside this picture)"
        elif row.name not in faces and len(model.variables) == 3:
            note = "   (makes no face)"
        text = f"{row.name}: {row_text(row, model.variables, rhs)}{note}"
        role = "conflict line" if found is not None and row.name in found.names else "constraint"
        rows.append(KeyRow(role, text, index, tags.get(row.name, "")))
    return tuple(rows)
