"""A picture on a sheet: one to turn on the screen, and the same one still, for print and where scripts are off."""

from __future__ import annotations

import json
from base64 import b64encode

from polywalk.drawing import View, figure
from polywalk.drawing.compose import Source
from polywalk.sheets.markup import Html, element


def figure_html(name: str, source: Source, view: View, still: bytes, caption: str) -> Html:
    """The figure element: its data, the place it is drawn in, the still picture, the caption."""
    drawn, data_id = figure(source, view), f"{name}-data"
    del drawn["layout"]["title"]
    drawn["layout"]["margin"] = {"l": 50, "r": 10, "t": 10, "b": 44}
    drawn["layout"]["modebar"] = {"remove": ["sendChartToCloud", "lasso2d", "select2d", "toImage"]}
    data = element("script", data_of(drawn), type="application/json", id=data_id)
    place = element("div", class_="turnable", id=f"{name}-figure", data_from=data_id, role="group", aria_label=caption)
    image = element("img", src=f"data:image/svg+xml;base64,{b64encode(still).decode()}", alt=caption, class_="still")
    hint = element("span", " Drag to turn or move, wheel to zoom, hover for numbers.", class_="screen")
    return element("figure", data, place, image, element("figcaption", caption, hint))


def data_of(value: object) -> Html:
    """JSON that no name can end early: markup characters are written as escapes."""
    text = json.dumps(value, allow_nan=False, ensure_ascii=True, separators=(",", ":"))
    return Html(text.replace("<", "\\u003c").replace(">", "\\u003e").replace("&", "\\u0026"))


def chart_html(still: bytes, caption: str) -> Html:
    """A picture that is only still."""
    image = element("img", src=f"data:image/svg+xml;base64,{b64encode(still).decode()}", alt=caption, class_="chart")
    return element("figure", image, element("figcaption", caption))
