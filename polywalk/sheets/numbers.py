"""The sections that say what the model is worth and how rules walk it: sensitivity, walks, changes."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.drawing import scene
from polywalk.drawing.static import rendered
from polywalk.drawing.theme import THEMES
from polywalk.drawing.view import View
from polywalk.exact import short
from polywalk.reviewing import Difference
from polywalk.sheets.content import Content
from polywalk.sheets.figures import chart_html, figure_html
from polywalk.sheets.legend import legend
from polywalk.sheets.markup import Html, bullets, element, joined, paragraphs, table
from polywalk.table import Table
from polywalk.walks import Walk

SHOWN = ("rule", "pivots", "moves", "stays", "longest stall", "path length", "end", "value")
"""The columns of the comparison that a sheet has room for."""

WALKING = "The simplex method walks from vertex to vertex. Which way it takes depends on its pivot rule."

MOST_PIVOTS = 40
"""So many pivots of a walk are listed."""


def sensitivity(content: Content) -> Html:
    """What one unit of each constraint is worth, and how far each number may move."""
    found = content.sensitivity
    first, *rest = found.tables()
    if found.outcome != "optimal":
        return table(first)
    worth = list(_worth(content))
    told = [element("p", "What a unit of a constraint's right-hand side is worth:"), bullets(worth)] if worth else []
    return joined([*told, table(first), *(table(one) for one in rest)])


def _worth(content: Content) -> Iterator[str]:
    for price in content.sensitivity.prices:
        if not (price.left or price.right):
            continue
        row = f"{price.constraint} (now {short(price.rhs)} {content.model.unit(price.constraint)}".rstrip() + ")"
        up, down = _change(price.right, 1), _change(price.left, -1)
        yield (
            f"{row}: a unit more {up}{_till(price.right, price.high, 'up to')}; "
            f"a unit less {down}{_till(price.left, price.low, 'down to')}."
        )


def _change(price: object, sign: int) -> str:
    if not isinstance(price, Fraction):
        return "leaves no plan at all"
    change = sign * price
    return f"changes the optimal value by {'+' if change > 0 else ''}{short(change)}"


def _till(price: object, end: object, words: str) -> str:
    if not isinstance(price, Fraction):
        return ""
    return f" ({words} {short(end)})" if isinstance(end, Fraction) else " (without end)"


def walks(content: Content) -> Html:
    """The walks drawn, pivot by pivot, beside all other rules."""
    if content.refusal:
        return element("p", content.refusal)
    parts = [paragraphs([WALKING])]
    if content.comparison is not None:
        whole = content.comparison.table()
        places = [whole.columns.index(name) for name in SHOWN]
        rows = tuple(tuple(row[place] for place in places) for row in whole.rows)
        parts.append(table(Table(whole.title, SHOWN, rows, whole.notes), "Every rule from the same start"))
    chart = scene(content.walks)
    drawn = rendered(chart, THEMES["light"], "svg", size="bare")
    parts += [chart_html(drawn, "The objective after each pivot of the walks that are drawn"), legend(chart)]
    return joined([*parts, *(_walk(walk) for walk in content.walks)])


def _walk(walk: Walk) -> Html:
    whole = walk.table()
    rows = whole.rows[:MOST_PIVOTS]
    left = len(whole.rows) - len(rows)
    notes = (*whole.notes, *([f"and {left} more pivots, not listed here"] if left else []))
    return table(Table(whole.title, whole.columns, rows, notes))


def changes(content: Content) -> Html:
    """What changed since an earlier version: in words, in one picture, in tables."""
    found = content.change
    if found is None:
        return Html("")
    first, *rest = found.tables()
    parts = [bullets(found.summary), _change_picture(content, found)]
    parts.append(table(Table(first.title, first.columns, first.rows), "Before and after"))
    return joined([*parts, *(table(one) for one in rest)])


def _change_picture(content: Content, found: Difference) -> Html:
    view = View(axes=content.axes, camera=content.given.camera)
    still = View(axes=content.axes, camera=content.given.camera, size="bare")
    drawn = scene(found, still)
    svg = rendered(drawn, THEMES["light"], "svg", size="bare")
    caption = f"{drawn.title}. {drawn.subtitle.split(chr(10))[-1]}"
    return joined([figure_html("change", found, view, svg, caption), legend(drawn)])
