"""HTML as text that is escaped unless it was made here."""

from __future__ import annotations

from collections.abc import Iterable
from html import escape

from polywalk.exact import full
from polywalk.table import Table, cell

VOID = {"meta", "img", "br", "link"}
"""Elements without an end."""

ENDLESS = {"∞", "-∞", "−∞"}
"""Texts that stand among numbers."""

MOST_TOGETHER = 20
"""Tables of no more rows stay on one page in print."""

LONG = 22
"""Words of more letters than this may be broken anywhere."""


class Html(str):
    """Text that is markup already; any other text is escaped when it becomes part of an element."""

    __slots__ = ()


def clean(text: str) -> str:
    """The text without what HTML forbids: control characters and halves of surrogate pairs become U+FFFD."""
    return "".join(letter if _allowed(ord(letter)) else "\ufffd" for letter in text)


def _allowed(code: int) -> bool:
    control = code < 0x20 or 0x7F <= code < 0xA0
    odd = 0xD800 <= code < 0xE000 or 0xFDD0 <= code < 0xFDF0 or code & 0xFFFE == 0xFFFE
    return code in {0x09, 0x0A} or not (control or odd)


def safe(text: str) -> Html:
    """The text escaped, unless it is markup."""
    return text if isinstance(text, Html) else Html(escape(clean(text)))


def joined(parts: Iterable[str]) -> Html:
    """Parts one after another, each escaped unless it is markup."""
    return Html("".join(safe(part) for part in parts))


def element(name: str, /, *children: str, **attributes: str | None) -> Html:
    """An element; a trailing underscore of an attribute's name is dropped, other underscores become hyphens."""
    given = "".join(
        f' {key.rstrip("_").replace("_", "-")}="{escape(clean(value))}"'
        for key, value in attributes.items()
        if value is not None
    )
    return Html(f"<{name}{given}>" if name in VOID else f"<{name}{given}>{joined(children)}</{name}>")


def paragraphs(lines: Iterable[str], kind: str | None = None) -> Html:
    """Each line as a paragraph."""
    return joined(element("p", line, class_=kind) for line in lines)


def bullets(lines: Iterable[str]) -> Html:
    """The lines as a list; nothing where there is none."""
    items = [element("li", line) for line in lines]
    return element("ul", *items) if items else Html("")


def table(source: Table, caption: str | None = None) -> Html:
    """A table with its title as caption and its notes below; the first column heads its rows."""
    notes = paragraphs(source.notes, "note")
    if not source.columns or not source.rows:
        return joined([element("p", caption or source.title), notes])
    numbers = [any(_is_number(row[place]) for row in source.rows) for place in range(len(source.columns))]
    heads = zip(source.columns, numbers, strict=True)
    head = element("tr", *(element("th", n, scope="col", class_="number" if right else _kind(n)) for n, right in heads))
    rows = [element("tr", _cell(row[0], "th"), *(_cell(value, "td") for value in row[1:])) for row in source.rows]
    whole = element(
        "table", element("caption", caption or source.title), element("thead", head), element("tbody", *rows)
    )
    return joined([element("div", whole, class_=wide(len(rows))), notes])


def wide(rows: int) -> str:
    """The class of what holds a table: in print one of few rows is not broken."""
    return "wide short" if rows <= MOST_TOGETHER else "wide"


def _cell(value: object, name: str) -> Html:
    text, exact = cell(value), _exact(value)
    kind = "number" if _is_number(value) or text in ENDLESS else _kind(text)
    hover = exact if exact != text else None
    return element(name, text, class_=kind, title=hover, scope="row" if name == "th" else None)


def _is_number(value: object) -> bool:
    return hasattr(value, "denominator") and not isinstance(value, bool)


def _kind(text: str) -> str | None:
    """How a cell's text is set: a word that would not fit may break anywhere."""
    return "long" if any(len(word) > LONG for word in text.split()) else None


def _exact(value: object) -> str:
    if isinstance(value, tuple) and any(hasattr(item, "denominator") for item in value):
        return f"({', '.join(_exact(item) for item in value)})"
    return full(value) if hasattr(value, "denominator") and not isinstance(value, int) else cell(value)  # type: ignore[arg-type]
