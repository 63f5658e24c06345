"""The picture where no widget front end is: an image inside the HTML."""

from __future__ import annotations

from base64 import b64encode
from dataclasses import replace

from polywalk.drawing import scene
from polywalk.drawing.compacting import compact
from polywalk.drawing.static import rendered
from polywalk.drawing.theme import THEMES
from polywalk.explorer.state import State


def still(state: State) -> str:
    """The static picture, always light, as an image element that needs no other file."""
    if state.region is None:
        return ""
    drawn = rendered(scene(state.region, replace(state.view, mode="light")), THEMES["light"], "svg", outlines=False)
    source = f"data:image/svg+xml;base64,{b64encode(compact(drawn.decode()).encode()).decode()}"
    return f'<img alt="picture of the region" style="max-width: 100%" src="{source}">'
