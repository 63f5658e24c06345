"""From a model and a view to the sheet."""

from __future__ import annotations

import datetime
import os
from collections.abc import Callable, Iterable
from dataclasses import dataclass
from pathlib import Path
from typing import Literal

from polywalk.drawing.view import View, viewed
from polywalk.drawing.writing import target_of, write
from polywalk.errors import DrawingError, unknown
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.reviewing import Difference, Review
from polywalk.sheets import numbers, overview, sections
from polywalk.sheets.content import Content
from polywalk.sheets.markup import Html, element
from polywalk.sheets.page import PAPERS, page

SECTIONS: dict[str, tuple[str, Callable[[Content], Html]]] = {
    "summary": ("In short", overview.summary),
    "change": ("What the change does", numbers.changes),
    "picture": ("The picture", sections.picture),
    "legend": ("Legend", sections.explained),
    "model": ("The model", sections.model),
    "vertices": ("Vertices", sections.vertices),
    "findings": ("Findings", sections.findings),
    "sensitivity": ("What the numbers are worth", numbers.sensitivity),
    "walks": ("How the simplex method walks", numbers.walks),
    "words": ("Words", overview.glossary),
    "source": ("The model to copy back", sections.source),
}
"""Every section a sheet can have, in its order: heading and maker."""

LONGEST = 200
"""So many letters of a title are shown."""


@dataclass(frozen=True, repr=False)
class Sheet:
    """A finished sheet.

    Parameters
    ----------
    html : str
        The whole file.
    path : pathlib.Path or None
        The file it was written to.
    """

    html: str
    path: Path | None = None

    def __repr__(self) -> str:
        where = f", {self.path.name}" if self.path else ""
        return f"design-review sheet ({len(self.html.encode()) / 1e6:.1f} MB{where})"


def sheet(
    source: Model | Region | Difference,
    path: str | os.PathLike[str] | None = None,
    view: View | None = None,
    *,
    title: str | None = None,
    author: str = "",
    date: datetime.date | str | None = None,
    review: Review | None = None,
    sections: Iterable[str] | None = None,
    equipment: bool | None = None,
    paper: Literal["A4", "Letter"] = "A4",
) -> Sheet:
    """Write the design-review sheet of a model: one HTML file that works offline and prints.

    It holds everything: the answer in words, a picture to turn, every mark explained, vertices, findings, sensitivity,
    walks, and the exact model to copy back. It asks nothing of any network, and its policy forbids it to.

    Parameters
    ----------
    source : Model, Region or Difference
        A Region saves enumerating again. A Difference gives the sheet of the later version, with what changed.
    path : str or path-like, optional
        Ends in .html; an existing file is replaced only when the sheet is complete. Without a path nothing is written.
    view : View, optional
        Axes, walks, selected vertex, step, camera and findings of the picture; of a model with more than three
        variables the first three are the axes unless it says otherwise. Its mode and size are not used.
    title, author : str, optional
        The title is by default the model's name.
    date : datetime.date or str, optional
        What the sheet states as its date; default: today; "": none. All else is the same bytes for the same input.
    review : Review, optional
        With findings set aside (``Review.accept``); default: a new review.
    sections : iterable of str, optional
        Names in ``polywalk.sheets.SECTIONS``; default: all that say something.
    equipment : bool, optional
        Whether the caution line stands at the top; default: where the model states units.
    paper : {"A4", "Letter"}, optional
        What it is printed on.

    Returns
    -------
    Sheet

    Raises
    ------
    DrawingError
        Another ending, a folder that does not exist or may not be written, axes that do not fit, a review of another
        model, another paper.
    UnknownName
        A section that does not exist, an axis that is no variable.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> found = pw.sheet(pw.scenarios.harbour_row("two decisions"), date="2026-01-31", sections=["summary", "model"])
    >>> "The best plan is V4: pump = 5 MW, chips = 5 MW" in found.html
    True

    References
    ----------
    Own layout; no published source.
    """
    target = None if path is None else target_of(Path(path), (".html", ".htm"))
    change = source if isinstance(source, Difference) else None
    whole = source.after if isinstance(source, Difference) else source if isinstance(source, Region) else region(source)
    _check(whole, review, paper)
    wanted = _wanted(sections, change)
    name = (title if title is not None else whole.model.name).strip() or "Linear model"
    name = name if len(name) <= LONGEST else f"{name[:LONGEST]}…"
    runs = bool(whole.model.units) if equipment is None else equipment
    content = Content(whole, viewed(view, {}), review, change, name, author, runs)
    parts = {key: (SECTIONS[key][0], SECTIONS[key][1](content)) for key in wanted}
    html = page(content, {key: part for key, part in parts.items() if part[1]}, _date(date), paper)
    if target is not None:
        write(target, html.encode())
    return Sheet(html, target)


def _check(whole: Region, review: Review | None, paper: str) -> None:
    if review is not None and review.model != whole.model:
        raise DrawingError("the review is of another model; pass review(model) of the model on the sheet.", review)
    if paper not in PAPERS:
        raise DrawingError(f"expected the paper {' or '.join(PAPERS)}, got {paper!r}.", culprit=paper)


def _wanted(sections: Iterable[str] | None, change: Difference | None) -> list[str]:
    """The sections asked for, in the sheet's order."""
    if sections is None:
        return [name for name in SECTIONS if change is not None or name != "change"]
    asked = [sections] if isinstance(sections, str) else list(sections)
    for name in asked:
        if name not in SECTIONS:
            raise unknown("section", name, SECTIONS, "a sheet")
    return [name for name in SECTIONS if name in asked]


def _date(date: datetime.date | str | None) -> Html:
    found = datetime.date.today() if date is None else date
    if isinstance(found, str):
        return element("time", found) if _is_iso(found) else element("span", found) if found else Html("")
    return element("time", f"{found:%Y-%m-%d}", datetime=f"{found:%Y-%m-%d}")


def _is_iso(text: str) -> bool:
    try:
        datetime.date.fromisoformat(text)
    except ValueError:
        return False
    return len(text) == 10
