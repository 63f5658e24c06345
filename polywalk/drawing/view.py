"""What is looked at: axes, selection, walks, step, camera. Frozen, so that two pictures of one View are the same."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, fields, replace
from typing import Any, Literal

from polywalk.drawing.formats import FORMATS, Size
from polywalk.errors import DrawingError
from polywalk.reviewing import Finding, Review
from polywalk.walks import Walk

Mode = Literal["light", "dark", "grey"]


@dataclass(frozen=True)
class View:
    """What a picture shows of a model.

    Parameters
    ----------
    axes : tuple of str or None, optional
        One to three variables; None takes all variables of a model that has at most three.
    vertex : int or None, optional
        Index of the selected vertex in ``region(model).vertices``; the axes must then be all variables.
    walks : tuple of Walk, optional
        Paths to draw, in the order of the legend.
    step : int or None, optional
        Draw the first walk up to this pivot and the rest of it faintly; None draws it whole.
    camera : (3,) tuple of float, str or None, optional
        Direction from the solid to the eye, the third axis upward; or "isometric", or "along pump" for the direction of
        an axis; None chooses the direction that keeps vertices apart.
    mode : {"light", "dark", "grey"}, optional
    findings : tuple of Finding, optional
        Findings whose evidence is marked; ``draw(model, findings=review)`` takes a whole Review.
    size : {"page", "slide", "column", "bare"}, optional
        Of a static picture: with its key beside it; 1280 by 720 pixels for a slide; 85 mm wide, the key below, for a
        column of a paper; the drawing alone.

    Examples
    --------
    >>> from polywalk.drawing import View
    >>> View(axes=("pump", "tank")).walks
    ()
    """

    axes: tuple[str, ...] | None = None
    vertex: int | None = None
    walks: tuple[Walk, ...] = ()
    step: int | None = None
    camera: tuple[float, float, float] | str | None = None
    mode: Mode = "light"
    findings: tuple[Finding, ...] = ()
    size: Size = "page"

    @property
    def paper(self) -> tuple[float, ...]:
        """Width and height in pixels of the drawing."""
        return FORMATS[self.size].paper


def viewed(view: View | None, changes: Mapping[str, Any]) -> View:
    """A view with some fields changed; one walk may stand for a tuple of them.

    Raises
    ------
    DrawingError
        A field that View does not have, an unknown mode.
    """
    known = [field.name for field in fields(View)]
    for name in changes:
        if name not in known:
            raise DrawingError(f"expected one of {', '.join(known)}, got {name!r}.", culprit=name)
    changed = dict(changes)
    walks = changed.get("walks", ())
    changed["walks"] = (walks,) if isinstance(walks, Walk) else tuple(walks)
    if "walks" not in changes:
        del changed["walks"]
    if "findings" in changes:
        changed["findings"] = _findings(changes["findings"])
    if changed.get("axes") is not None:
        changed["axes"] = tuple(changed["axes"])
    found = replace(view or View(), **changed)
    if found.mode not in ("light", "dark", "grey"):
        raise DrawingError(f"expected the mode light, dark or grey, got {found.mode!r}.", culprit=found.mode)
    if found.size not in FORMATS:
        raise DrawingError(f"expected the size {', '.join(FORMATS)}, got {found.size!r}.", culprit=found.size)
    return found


def _findings(given: Any) -> tuple[Finding, ...]:
    """A review, a finding or several findings as a tuple of findings."""
    found = given.findings if isinstance(given, Review) else (given,) if isinstance(given, Finding) else tuple(given)
    for item in found:
        if not isinstance(item, Finding):
            raise DrawingError(f"expected a review or findings of one, got {item!r}.", culprit=item)
    return found
