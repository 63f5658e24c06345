"""How large a static picture is, and where its key stands."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Literal

from polywalk.drawing.scene import PAPER

Size = Literal["page", "slide", "column", "bare"]

LEFT, BOTTOM = 64.0, 54.0
"""Pixels beside and below the drawing for the axes' numbers."""

MARGIN = 18.0
"""Pixels kept free at the picture's borders."""


@dataclass(frozen=True)
class Format:
    """One size of picture; pixels are those that text and hatching are laid out in, 96 an inch.

    Parameters
    ----------
    paper : (float, float)
        Width and height of the drawing itself.
    key : {"beside", "below", "none"}
    width : float
        Of the whole picture.
    height : float or None
        Of the whole picture; None lets it grow with its head and its key.
    zoom : float
        Pixels of the finished picture for one of layout.
    left : float
        Beside the drawing, for the numbers of its axis.
    """

    paper: tuple[float, float]
    key: Literal["beside", "below", "none"]
    width: float
    height: float | None = None
    zoom: float = 1.0
    left: float = LEFT

    @property
    def key_left(self) -> float:
        """Where the key starts."""
        return self.left + self.paper[0] + 28 if self.key == "beside" else MARGIN

    @property
    def key_width(self) -> float:
        """How wide the key is."""
        return self.width - self.key_left - (6 if self.key == "beside" else MARGIN)

    def fitted(self, left: float) -> Format:
        """The format with so much room beside the drawing, if it has less: a page grows, a slide's key gets narrower,
        and a column is shrunk to its width again."""
        more = max(left - self.left, 0.0)
        width = self.width if self.key == "beside" and self.height is not None else self.width + more
        zoom = self.zoom * self.width / width if self.key == "below" else self.zoom
        return replace(self, left=self.left + more, width=width, zoom=zoom)


FORMATS: dict[Size, Format] = {
    "page": Format(PAPER, "beside", LEFT + PAPER[0] + 459),
    "slide": Format((600.0, 440.0), "beside", 1063.0, 598.0, 1280 / 1063),
    "column": Format((258.0, 206.0), "below", 321.0, left=50.0),
    "bare": Format(PAPER, "none", LEFT + PAPER[0] + 12, PAPER[1] + BOTTOM + 8),
}
"""By name: a page with the key beside the drawing; a slide of 1280 by 720 pixels; a column of 85 mm with the key below
(its letters are 7.5 to 9 points high in print); the drawing alone."""
