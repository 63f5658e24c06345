"""Small samples of what the marks of a picture look like, as inline SVG without any style of its own."""

from __future__ import annotations

from polywalk.drawing.theme import Style, Theme
from polywalk.sheets.markup import Html, element, joined

WIDE, HIGH = 44, 18
MIDDLE = HIGH / 2

DASHES = {"solid": None, "dash": "7 4", "dot": "2 3", "dashdot": "8 3 2 3"}
DASHES |= {"longdash": "11 3", "longdashdot": "11 3 2 3"}
"""The theme's words for dashes, as SVG counts them."""

MARKS = {"vertex", "degenerate", "optimum", "selected", "start", "evidence", "moved", "stayed", "lost", "gained"}
MARKS |= {"breakpoint", "now", "old optimum"}
AREAS = {"region", "facet", "rest", "back", "conflict", "level", "beyond", "cut off", "added"}
ARROWS = {"objective", "open edge", "evidence ray", "onward"}
PLAIN = {"none", "point", "note", "letter", "name"}


def sample(theme: Theme, role: str, index: int = 0, tag: str = "") -> Html:
    """How a role looks; a tag is written beside its line."""
    style = theme.style(role, index)
    if role in PLAIN:
        inside = _text(tag, theme) if tag else Html("")
    elif role == "hatch":
        inside = _hatch(theme)
    elif role in MARKS:
        inside = _mark(style, role, theme)
    elif role in AREAS:
        inside = _area(style, role, theme)
    elif role == "step":
        inside = _step(style)
    elif role in {"tag", "back tag"}:
        inside = _tag(style, theme, "3 2" if role == "back tag" else None)
    else:
        inside = joined([_line(style, role in ARROWS, 20 if tag else 2), _text(tag, theme) if tag else ""])
    size = {"width": str(WIDE), "height": str(HIGH), "viewBox": f"0 0 {WIDE} {HIGH}"}
    return element("svg", inside, aria_hidden="true", focusable="false", **size)


def _line(style: Style, arrow: bool, left: float) -> Html:
    width = f"{min(style.width, 5):g}"
    look = {"stroke": style.colour, "stroke_width": width, "stroke_dasharray": DASHES[style.dash]}
    look["opacity"] = f"{style.opacity:g}"
    right = WIDE - 9 if arrow else WIDE - 2
    line = element("line", x1=f"{left:g}", y1=f"{MIDDLE:g}", x2=f"{right:g}", y2=f"{MIDDLE:g}", **look)
    head = f"{WIDE - 11},{MIDDLE - 5:g} {WIDE - 1},{MIDDLE:g} {WIDE - 11},{MIDDLE + 5:g}"
    return joined([line, element("polygon", points=head, fill=style.colour) if arrow else ""])


def _mark(style: Style, role: str, theme: Theme) -> Html:
    half = min(style.size, 15) / 2
    fill = style.fill or "none"
    if role == "stayed":
        fill = theme.paper
    look = {"fill": fill, "stroke": style.colour, "stroke_width": f"{max(style.width, 1):g}"}
    x = WIDE / 2
    if style.symbol.startswith("diamond"):
        corners = ((x, MIDDLE - half), (x + half, MIDDLE), (x, MIDDLE + half), (x - half, MIDDLE))
        return element("polygon", points=" ".join(f"{a:g},{b:g}" for a, b in corners), **look)
    if style.symbol == "cross":
        ends = [(x - half, MIDDLE - half, x + half, MIDDLE + half), (x - half, MIDDLE + half, x + half, MIDDLE - half)]
        strokes = {"stroke": style.colour, "stroke_width": f"{style.width:g}"}
        return joined(
            element("line", x1=f"{a:g}", y1=f"{b:g}", x2=f"{c:g}", y2=f"{d:g}", **strokes) for a, b, c, d in ends
        )
    if style.symbol in {"square ring", "square"}:
        side = f"{2 * half:g}"
        return element("rect", x=f"{x - half:g}", y=f"{MIDDLE - half:g}", width=side, height=side, **look)
    return element("circle", cx=f"{x:g}", cy=f"{MIDDLE:g}", r=f"{half:g}", **look)


def _area(style: Style, role: str, theme: Theme) -> Html:
    look = {"fill": style.fill, "fill_opacity": f"{style.opacity:g}", "stroke": style.colour, "stroke_width": "1"}
    look |= {"stroke_dasharray": "4 3"} if role in {"rest", "cut off"} else {}
    box = element("rect", x="3", y="2", width=f"{WIDE - 6}", height=f"{HIGH - 4}", **look)
    strokes: list[str] = []
    if role == "cut off":
        strokes = [f"M{x},{HIGH - 3} l9,-12" for x in range(5, WIDE - 12, 6)]
    elif role == "added":
        dots = [(x, y) for x in range(8, WIDE - 4, 6) for y in (6, 12)]
        return joined([box, *(element("circle", cx=f"{x}", cy=f"{y}", r="1.2", fill=style.colour) for x, y in dots)])
    path = element("path", d=" ".join(strokes), stroke=style.colour, stroke_width="1", fill="none") if strokes else ""
    return joined([box, path])


def _hatch(theme: Theme) -> Html:
    strokes = " ".join(f"M{x},{MIDDLE - 3:g} l5,7" for x in range(6, WIDE - 8, 7))
    line = element("path", d=f"M2,{MIDDLE - 3:g} H{WIDE - 2}", stroke=theme.text, stroke_width="1.6", fill="none")
    return joined([line, element("path", d=strokes, stroke=theme.text, stroke_width="0.9", fill="none")])


def _step(style: Style) -> Html:
    look = {"fill": style.fill, "stroke": style.colour, "stroke_width": "1"}
    disc = element("circle", cx=f"{WIDE / 2:g}", cy=f"{MIDDLE:g}", r="7.5", **look)
    return joined([disc, _letter("1", style.colour, WIDE / 2)])


def _tag(style: Style, theme: Theme, dash: str | None) -> Html:
    look = {"fill": theme.paper, "stroke": style.colour, "stroke_width": "1.4", "stroke_dasharray": dash}
    x = WIDE / 2
    box = element("rect", x=f"{x - 8:g}", y="1.5", width="16", height="15", rx="3", **look)
    return joined([box, _letter("a", theme.text, x)])


def _text(words: str, theme: Theme) -> Html:
    return _letter(words, theme.text, 8, weight="bold")


def _letter(words: str, colour: str, x: float, weight: str | None = None) -> Html:
    place = {"x": f"{x:g}", "y": f"{MIDDLE + 4:g}", "text_anchor": "middle", "font_size": "11"}
    return element("text", words, fill=colour, font_weight=weight, **place)
