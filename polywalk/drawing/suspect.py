"""A model as typed and as it was probably meant, side by side: two complete pictures on one sheet."""

from __future__ import annotations

import os
from base64 import b64encode
from dataclasses import replace
from io import BytesIO
from pathlib import Path
from typing import Any, cast
from xml.etree import ElementTree

from polywalk.drawing.compose import scene
from polywalk.drawing.static import Picture, rendered
from polywalk.drawing.theme import THEMES
from polywalk.drawing.view import View, viewed
from polywalk.drawing.writing import target_of, write
from polywalk.errors import DrawingError
from polywalk.model import Model
from polywalk.reviewing import Suspect


def before_after(
    model: Model, suspect: Suspect, path: str | os.PathLike[str] | None = None, view: View | None = None, **changes: Any
) -> Picture:
    """Paint a model beside what a suspect makes of it.

    Parameters
    ----------
    model : Model
        As typed.
    suspect : Suspect
        One of ``suspects(model, ...).found``.
    path : str or path-like, optional
        Ends in .svg or .png; without one the picture is an SVG that only shows itself.
    view : View, optional
    **changes
        Fields of View, for short: ``axes=("pump", "tank")``, ``mode="grey"``.

    Returns
    -------
    Picture

    Raises
    ------
    DrawingError
        Another ending, a folder that does not exist or may not be written, or a view as for `draw`.
    UnknownName, DuplicateName
        An axis that is no variable, or given twice.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.scenarios.harbour_row("flat")
    >>> suspect = pw.suspects(model, allowed=[(2, 3, 1)]).found[0]
    >>> pw.before_after(model, suspect)
    picture of a region (svg)

    References
    ----------
    See `picture`.
    """
    target = None if path is None else target_of(Path(path))
    ending = target.suffix.lower()[1:] if target else "svg"
    if ending not in {"svg", "png"}:
        raise DrawingError(f"expected a file ending in .svg or .png, got {str(path)!r}.", culprit=path)
    looked = viewed(view, changes)
    named = (replace(model, name="As typed"), replace(suspect.model, name=_heading(suspect)))
    theme, outlines = THEMES[looked.mode], target is not None
    sides = [rendered(scene(one, looked), theme, ending, outlines=outlines) for one in named]
    data = _svg(sides) if ending == "svg" else _png(sides)
    if target is not None:
        write(target, data)
    return Picture(data, ending, target)


def _heading(suspect: Suspect) -> str:
    return f"As meant: {suspect.kind} in {suspect.place}" if suspect.reversible else f"With a {suspect.kind}"


def _svg(sides: list[bytes]) -> bytes:
    """Each side as an image of its own, so that the names inside them do not meet."""
    roots = [ElementTree.fromstring(side) for side in sides]
    sizes = [tuple(float(root.attrib[key].removesuffix("pt")) for key in ("width", "height")) for root in roots]
    width, height = sum(size[0] for size in sizes), max(size[1] for size in sizes)
    parts, left = [], 0.0
    for side, (wide, high) in zip(sides, sizes, strict=True):
        source = b64encode(side).decode()
        parts.append(
            f'<image x="{left:g}" y="0" width="{wide:g}" height="{high:g}" href="data:image/svg+xml;base64,{source}"/>'
        )
        left += wide
    head = f'<svg xmlns="http://www.w3.org/2000/svg" width="{width:g}pt" height="{height:g}pt"'
    return f'{head} viewBox="0 0 {width:g} {height:g}">{"".join(parts)}</svg>'.encode()


def _png(sides: list[bytes]) -> bytes:
    """Both pictures in one, the lower one filled up with its own paper."""
    import numpy as np
    from matplotlib.image import imread, imsave

    images = [imread(BytesIO(side)) for side in sides]
    height = max(image.shape[0] for image in images)
    filled = [np.concatenate([i, np.repeat(i[-1:, -1:], height - len(i), 0).repeat(i.shape[1], 1)]) for i in images]
    out, plain = BytesIO(), cast(Any, {"Software": None})
    imsave(out, np.concatenate(filled, axis=1), format="png", metadata=plain)
    return out.getvalue()
