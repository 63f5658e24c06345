"""The legend of a sheet: every mark of its pictures with a sample and its meaning."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from polywalk.drawing import Scene
from polywalk.drawing.projection import laid_flat
from polywalk.drawing.theme import THEMES
from polywalk.sheets.markup import Html, element, joined
from polywalk.sheets.samples import sample

ELSEWHERE = "Vertices"
"""How the headings start of parts of a picture's key that the sheet has as tables."""

MEANINGS = {
    "region": "what the model allows: every point of the pale area is a plan (the feasible region)",
    "facet": "a face of the feasible region: the plans are the points of the body and of its faces",
    "edge": "an edge of the region",
    "hidden edge": "an edge at the back, seen through the body",
    "vertex": "a vertex (corner) of the region, with its number; a hollow one lies at the back",
    "optimum": "an optimal vertex",
    "degenerate": "ring: a degenerate vertex, where more constraints meet than are needed to fix it",
    "optimal face": "every plan along this thick line is equally good",
    "level": "a patch of the plane on which the objective has its optimal value",
    "constraint": "the border of a constraint, with its name",
    "tag": "a letter on the face that a constraint makes; the list of constraints says which",
    "step": "the number of a step (pivot) of a walk",
    "stay": "pivots that change the list of held constraints and do not move",
    "phase 1": "dotted: a walk on its way to its first plan, outside the region (Phase I)",
    "walk rest": "the part of the walk that is not shown step by step",
    "selected": "the selected vertex",
    "start": "where the walk starts",
    "rest": "what would be left if one constraint of the conflict were lifted; nothing of it is allowed",
    "rest edge": "its border",
    "short": "the gap between it and the lifted constraint",
    "conflict": "a constraint of the conflict",
    "conflict line": "the border of a constraint of the conflict",
    "open edge": "an edge without end",
    "old edge on": "an edge without end of the version before",
    "new edge on": "an edge without end of the version after",
    "onward": "a walk that goes on without end",
    "moved": "after a pivot that moves",
    "stayed": "after a stay, a pivot that does not move",
    "hatch": "strokes: the side that a constraint forbids",
    "evidence": "a place that a finding is about",
    "evidence line": "a constraint that a finding is about",
    "evidence ray": "a direction that a finding is about",
    "objective": "the direction in which the objective improves",
    "level line": "where the objective has its optimal value",
}
"""What each role of a picture means, for those that the picture's own key has no words for."""

UNSAID = {"grid", "axis", "tick", "axis name", "note", "name", "point", "part", "back", "back tag", "end", "ends"}
UNSAID |= {"evidence name", "culprit"}
"""Roles of words and of the frame, which say themselves what they are, and of backs, told with their fronts."""


def legend(drawn: Scene) -> Html:
    """The legend of one picture."""
    shown = laid_flat(drawn) if drawn.solid else drawn  # which says what found no room on paper
    parts = [(part.heading, part.rows) for part in shown.key if not part.heading.startswith(ELSEWHERE)]
    known = {row.role for _, rows in parts for row in rows}
    lists = [_list("Also drawn", _unsaid(drawn, known))]
    for heading, rows in parts:
        lists.insert(len(lists) - 1, _list(heading, [(row.role, row.index, row.tag, row.text) for row in rows]))
    return joined(lists)


def roles(drawn: Scene) -> dict[str, None]:
    """Every role that a scene draws."""
    areas, lines = [item.role for item in drawn.polygons], [item.role for item in drawn.lines]
    marks, labels = [item.role for item in drawn.marks], [item.role for item in drawn.labels]
    return dict.fromkeys(areas + lines + marks + labels)


def _unsaid(drawn: Scene, known: Iterable[str]) -> Iterator[tuple[str, int, str, str]]:
    for role in roles(drawn):
        if role not in known and role not in UNSAID:
            yield role, 0, "", MEANINGS[role]


def _list(heading: str, rows: Iterable[tuple[str, int, str, str]]) -> Html:
    theme = THEMES["light"]
    items = [
        element("li", element("span", sample(theme, role, index, tag), class_="sample"), element("span", text))
        for role, index, tag, text in rows
    ]
    if not items:
        return Html("")
    return joined([element("h3", heading), element("ul", *items, class_="legend")])
