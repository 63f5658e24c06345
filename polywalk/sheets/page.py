"""The page around the sections: head, policy, contents, styles, scripts."""

from __future__ import annotations

from base64 import b64encode
from hashlib import sha256
from importlib.metadata import version
from importlib.resources import files

from polywalk.sheets.content import Content
from polywalk.sheets.markup import Html, clean, element, joined
from polywalk.sheets.overview import CAUTION

EMPTY = "47DEQpj8HBSa+/TImW+5JCeuQeRkm5NMpJWZG3hSuFU="
"""The hash of no text: plotly.js makes an empty style element and adds its rules one by one."""

PAPERS = {"A4": "A4", "Letter": "letter"}
"""Paper sizes by their names, as a style sheet calls them."""


def page(content: Content, parts: dict[str, tuple[str, Html]], date: Html, paper: str) -> str:
    """The whole HTML file.

    ``parts`` are the sections by id: heading and body; ``date`` is the one field that may differ between two sheets of
    the same model and options.
    """
    style = f"{_own('sheet.css')}\n@page {{ size: {PAPERS[paper]} portrait; margin: 16mm 14mm; }}\n"
    turns = any('class="turnable"' in body for _, body in parts.values())
    scripts = [_own("guard.js"), _plotly()] if turns else []
    scripts += [_own("sheet.js")] if turns or "source" in parts else []
    body = [_header(content, date), _contents(parts)]
    body += [_section(name, *part) for name, part in parts.items()]
    body.append(_footer())
    head = element(
        "head",
        element("meta", charset="utf-8"),
        element("meta", http_equiv="Content-Security-Policy", content=_policy(style, scripts)),
        element("meta", name="viewport", content="width=device-width, initial-scale=1"),
        element("title", f"{content.title}: design-review sheet"),
        element("style", Html(style)),
    )
    run = joined(element("script", Html(script)) for script in scripts)
    whole = element("html", "\n", head, "\n", element("body", *body, run), "\n", lang="en")
    return f"<!DOCTYPE html>\n{whole}\n"


def _policy(style: str, scripts: list[str]) -> str:
    allowed = " ".join(f"'sha256-{_hash(script)}'" for script in scripts) or "'none'"
    styles = f"'sha256-{_hash(style)}' 'sha256-{EMPTY}'"
    return (
        f"default-src 'none'; script-src {allowed}; style-src {styles}; img-src data:; "
        "base-uri 'none'; form-action 'none'"
    )


def _hash(text: str) -> str:
    return b64encode(sha256(text.encode()).digest()).decode()


def _own(name: str) -> str:
    return files("polywalk.sheets").joinpath(name).read_text(encoding="utf-8").replace("\r\n", "\n")


def _plotly() -> str:
    """plotly.js as the plotly package carries it, in a form that can stand in a page: what HTML forbids is escaped."""
    from plotly.offline import get_plotlyjs

    text: str = get_plotlyjs().replace("\r\n", "\n")
    text = text.replace("</script", "<\\/script").replace("<!--", "<\\!--")
    for letter in sorted(set(text)):
        if clean(letter) != letter:
            text = text.replace(letter, f"\\u{ord(letter):04x}")
    return text


def _header(content: Content, date: Html) -> Html:
    lines = [element("p", "Design-review sheet of a linear model", class_="kind"), element("h1", content.title)]
    if content.author:
        lines.append(element("p", "Author: ", content.author, class_="author"))
    if date:
        lines.append(element("p", "Date: ", date, class_="date"))
    if content.equipment:
        lines.append(element("p", element("strong", "Caution: "), CAUTION, class_="caution", role="note"))
    return element("header", *lines)


def _contents(parts: dict[str, tuple[str, Html]]) -> Html:
    links = [element("li", element("a", heading, href=f"#{name}")) for name, (heading, _) in parts.items()]
    return element("nav", element("ul", *links), aria_label="Sections")


def _section(name: str, heading: str, body: Html) -> Html:
    title = element("h2", heading, id=f"{name}-heading")
    return element("section", title, body, id=name, aria_labelledby=f"{name}-heading")


def _footer() -> Html:
    words = f"Made with polywalk {version('polywalk')}. What is decided here is decided in exact arithmetic."
    return element("footer", element("p", words))
