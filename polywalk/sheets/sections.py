"""The sections that say what the model is: its rows, its pictures, its vertices, its findings."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.drawing.static import rendered
from polywalk.drawing.theme import THEMES
from polywalk.exact import short
from polywalk.model import GOAL, SIGN
from polywalk.reading.toml_write import toml_text
from polywalk.reviewing import CODES, Finding
from polywalk.sheets.content import Content
from polywalk.sheets.figures import figure_html
from polywalk.sheets.legend import legend
from polywalk.sheets.markup import Html, bullets, element, joined, paragraphs, table, wide
from polywalk.table import Table

MOST_VERTICES = 200
"""So many vertices are listed; past them the sheet says how many are not."""


def model(content: Content) -> Html:
    """The objective and every constraint as people write them, and the variables."""
    found, names = content.model, content.model.variables
    goal = found.objective
    aim = [f"{GOAL[goal.goal]} ", *_terms(goal.coefficients, names, goal.constant)] if goal else ["no objective"]
    rows = [
        (row.name, joined([*_terms(row.coefficients, names), f" {SIGN[row.sense]} {short(row.rhs)}"]), row)
        for row in found.constraints
    ]
    lines = [
        element(
            "tr",
            element("th", name, scope="row", class_="long"),
            element("td", rule, class_="rule"),
            element("td", found.unit(name)),
            element("td", row.origin),
        )
        for name, rule, row in rows
    ]
    head = element("tr", *(element("th", word, scope="col") for word in ("constraint", "rule", "unit", "where from")))
    listed = element("table", element("caption", "Subject to"), element("thead", head), element("tbody", *lines))
    rounded = any("≈" in rule for _, rule, _ in rows)
    note = ["≈ marks a rounded number; the model as TOML has every number in full."] if rounded else []
    body = element("div", listed, class_=wide(len(rows))) if rows else element("p", "No constraint.")
    return joined([element("p", *aim, class_="rule goal"), body, paragraphs(note, "note"), table(_variables(content))])


def _terms(row: tuple[Fraction, ...], names: tuple[str, ...], constant: Fraction = Fraction(0)) -> Iterator[str]:
    """A linear function, its variables in italics."""
    first = True
    for value, name in [(value, name) for value, name in zip(row, names, strict=True) if value]:
        sign = ("−" if value < 0 else "") if first else (" − " if value < 0 else " + ")
        size = "" if abs(value) == 1 else f"{short(abs(value))} "
        yield sign + size
        yield element("var", name)
        first = False
    if constant or first:
        yield ("" if first else " − " if constant < 0 else " + ") + short(constant if first else abs(constant))


def _variables(content: Content) -> Table:
    found, seen = content.model, content.region
    best = seen.base[seen.optimal.vertices[0]] if seen.optimal and len(seen.optimal.vertices) == 1 else None
    rows = []
    for j, name in enumerate(found.variables):
        low, high = seen.ranges.get(name, (None, None))
        ends = ("", "") if seen.status == "empty" else ("−∞" if low is None else low, "∞" if high is None else high)
        kind = "integer (not applied)" if name in found.integers else "free" if name in found.free else ""
        rows.append((name, found.unit(name), kind, *ends, best[j] if best else ""))
    columns = ("variable", "unit", "mark", "least in the region", "greatest", "at the best plan")
    return Table("Variables", columns, tuple(rows))


def picture(content: Content) -> Html:
    """The picture to turn, the same picture still, and every mark explained."""
    name = f"{content.title}: the feasible region"
    parts = [figure_html("picture", content.region, content.view, _still(content), f"{name}. {_caption(content)}")]
    return joined(parts)


def _still(content: Content) -> bytes:
    return rendered(content.drawn, THEMES["light"], "svg", size="bare")


def _caption(content: Content) -> str:
    return content.drawn.subtitle.split("\n")[-1]


def explained(content: Content) -> Html:
    """The legend of the picture."""
    return legend(content.drawn)


def vertices(content: Content) -> Html:
    """Every vertex with its active constraints."""
    seen = content.region
    whole = seen.table()
    if not whole.rows:
        return joined([element("p", whole.title), paragraphs(whole.notes, "note")])
    rows = whole.rows[:MOST_VERTICES]
    left = len(whole.rows) - len(rows)
    notes = (*whole.notes, *([f"and {left} more vertices, not listed here"] if left else []))
    return table(Table(whole.title, whole.columns, rows, notes), "Vertices, with the constraints active at each")


def findings(content: Content) -> Html:
    """Findings, worst first; those set aside with their reasons; what was checked."""
    review = content.review
    same = _same_repair(review.findings)
    told = [item for item in review.findings if item not in same.values()]
    parts = [_finding(item, also=same.get(item)) for item in told] or [element("p", "Nothing was found.")]
    if review.accepted:
        parts.append(element("h3", "Set aside"))
        parts += [
            joined([_finding(item, "h4"), element("p", element("strong", "Set aside because: "), why, class_="why")])
            for item, why in review.accepted
        ]
    parts += [element("h3", "What was checked"), bullets(review.checked)]
    return joined(parts)


def _same_repair(found: tuple[Finding, ...]) -> dict[Finding, Finding]:
    """The repair by one constraint that is also the least in all, with the finding that says so: one entry for both."""
    least = [item for item in found if item.code == "least-repair" and len(item.constraints) == 1]
    return {
        item: other
        for item in found
        for other in least
        if item.code == "single-repair"
        and (item.constraints, item.amounts[0][1]) == (other.constraints, other.amounts[1][1])
    }


def _finding(item: Finding, heading: str = "h3", also: Finding | None = None) -> Html:
    """One finding; ``also`` is one about the same change, told in the same entry."""
    mark = element("span", item.severity, class_=f"severity {item.severity}")
    parts = [element(heading, mark, " ", item.title), element("p", item.explanation)]
    parts += [element("p", "The same change is the least in all: ", also.explanation)] if also else []
    parts += [element("p", element("strong", "Remedy: "), one.remedy) for one in (item, also) if one and one.remedy]
    parts += [element("p", f"{one.code}: {CODES[one.code].meaning}", class_="note") for one in (item, also) if one]
    return element("div", *parts, class_="finding")


def source(content: Content) -> Html:
    """The exact model as TOML, to copy back."""
    how = 'Save this as model.toml; in Python, polywalk.from_toml("model.toml") reads exactly this model back.'
    button = element("button", "Copy the model", type="button", id="copy", hidden="")
    code = element("pre", element("code", toml_text(content.model)), id="toml", tabindex="0")
    return joined([element("p", how), button, code])
