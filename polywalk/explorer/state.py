"""What the explorer shows, as traits that a notebook can read, observe and set. Nothing is computed here."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager
from typing import Any

from traitlets import observe, validate

from polywalk.drawing import View
from polywalk.drawing.view import Mode
from polywalk.errors import PolywalkError, unknown
from polywalk.exact import Row, exact
from polywalk.explorer import checking
from polywalk.explorer.editing import Draft, History
from polywalk.explorer.settling import Settled, is_slow, settle
from polywalk.explorer.shadows import in_picture
from polywalk.explorer.traits import SETTABLE, Traits
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.reviewing import Finding
from polywalk.reviewing.stops import Kind
from polywalk.walks import Walk, walk


class State(Traits):
    """The explorer's state. A value that does not fit raises an error that says why, and changes nothing.

    Its traits are those of `Traits`.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.explorer.state import State
    >>> square = pw.from_algebra(maximize="x + 2*y", bounds={"x": (0, 1), "y": (0, 1)})
    >>> state = State(model=square)
    >>> state.go(+1)
    >>> state.step, state.walks[0].pivots[0].entering
    (1, 'y')
    >>> state.set_number("7/3", "right-hand side", "x upper")
    >>> state.region.value, state.stale
    (Fraction(13, 3), True)
    >>> state.undo()
    >>> state.model == square
    True
    """

    def __init__(self, model: Model, **traits: Any) -> None:
        super().__init__()
        for name in traits:
            if name not in SETTABLE:
                raise unknown("trait", name, SETTABLE, "the explorer")
        self._depth = 0
        self._taking = False
        self._kept: Finding | None = None
        self.eye: tuple[float, float, float] | None = None
        self.history = History(Draft(checking.model(model)))
        self._take(self.history.now, self._listed(model))
        for name in SETTABLE:
            if name in traits:
                setattr(self, name, traits[name])

    @property
    def last(self) -> int:
        """The number of pivots of the walk that is stepped through."""
        return len(self.walks[0].pivots) if self.walks else 0

    @property
    def view(self) -> View:
        """What is drawn of the region."""
        view: View = self.picture[1]
        return view

    @property
    def point(self) -> Row | None:
        """The selected vertex' point."""
        return None if self.region is None or self.vertex is None else self.region.vertices[self.vertex].point

    def go(self, by: int) -> None:
        """Step on (+1) or back (-1) in the first walk; from the whole walk, on is its first pivot."""
        if self.step is None:
            self.step = min(1, self.last) if by > 0 else max(0, self.last - 1)
        else:
            self.step = min(self.last, max(0, self.step + by))

    def choose(self, by: int) -> None:
        """Select the next (+1) or previous (-1) vertex."""
        count = len(self.region.vertices) if self.region else 0
        if count:
            self.vertex = 0 if self.vertex is None else (self.vertex + by) % count

    def set_number(self, value: object, kind: Kind | None = None, name: str = "", drag: bool = False) -> None:
        """Change a right-hand side or a cost, by default the chosen one; ``drag``: one edit with those before it."""
        kind, name = (kind, name) if kind is not None else self.number
        draft = self.history.now.with_number(kind, name, exact(value))
        self._edit(draft, (kind, name) if drag else None)

    def switch(self, name: str, on: bool) -> None:
        """Switch a constraint off or on again."""
        others = tuple(other for other in self.off if other != name)
        self.off = others if on else (*others, name)

    def undo(self) -> None:
        """Go back before the last edit of the model."""
        self._move(-1)

    def redo(self) -> None:
        """Take back the last undo."""
        self._move(+1)

    def reset(self) -> None:
        """Go back to the model as it was given; this can be undone, too."""
        self._edit(self.history.first)

    def show_region(self, seen: Region) -> None:
        """Show the region of a large model, listed elsewhere."""
        with self._as_one():
            self.set_trait("region", seen)

    def settle(self, found: Settled | None = None) -> None:
        """Review the model as it is now, and end ``stale``; or take what was worked out elsewhere."""
        if self.region is None:
            return
        kept = self.review.findings[self.finding] if self.review and self.finding is not None else self._kept
        found = settle(self.region, self.whole, self.number) if found is None else found
        with self._as_one():
            self.finding = None
            self.set_trait("settled", found)
            self.set_trait("review", found.review)
            self.set_trait("stale", False)
            self.finding = found.like(kept)

    # edits of the model

    def _listed(self, model: Model) -> Region | None:
        return None if is_slow(model) else region(model)

    def _edit(self, draft: Draft, drag: object = None) -> None:
        ready = self._listed(draft.model)
        self.history.put(draft, drag)
        self._take(draft, ready)

    def _move(self, by: int) -> None:
        self.history.move(by)
        self._take(self.history.now, self._listed(self.history.now.model))

    def _take(self, draft: Draft, seen: Region | None) -> None:
        """Show a draft: everything that follows from the model, in one change of the picture."""
        vertex = None if self.vertex is None or self.region is None else self.region.vertices[self.vertex]
        with self._as_one():
            if self.review and self.finding is not None:
                self._kept = self.review.findings[self.finding]
            self.finding, self.step = None, None
            self.set_trait("region", seen)
            self.vertex = checking.again(vertex, seen)
            self.set_trait("stale", True)
            self.set_trait("whole", draft.whole)
            with self._taken():
                self.model, self.off = draft.model, draft.off
            if self.axes is None or not set(self.axes) <= set(self.model.variables):
                self.axes = checking.first_axes(self.model)  # type: ignore[assignment]
            self.number = checking.number_left(self.number, self.whole)
            self._walk()

    @contextmanager
    def _taken(self) -> Iterator[None]:
        """While model and what is off are set together, they are not edits of their own."""
        self._taking = True
        try:
            yield
        finally:
            self._taking = False

    @contextmanager
    def _as_one(self) -> Iterator[None]:
        """However much changes inside, the picture changes once, at the end."""
        self._depth += 1
        try:
            yield
        finally:
            self._depth -= 1
        if not self._depth:
            self._draw()

    def _walk(self) -> None:
        walks: tuple[Walk, ...] = ()
        refusal = ""
        try:
            given = {"leaving": self.leaving, "start": self.start}
            walks = tuple(walk(self.model, rule=rule, **given) for rule in self.rules)
        except PolywalkError as error:
            refusal = str(error)
        self.step = None
        self.set_trait("refusal", refusal)
        self.set_trait("walks", walks)

    def _draw(self) -> None:
        mode: Mode = "dark" if self.dark else "light"
        chosen = () if self.finding is None or self.review is None else (self.review.findings[self.finding],)
        view = View(self.axes, in_picture(self), self.walks, self.step, self.eye, mode, chosen)
        self.set_trait("picture", (self.region, view))
        self.set_trait("version", self.version + 1)

    # what traits take, and what follows from each

    @validate("model", "off")
    def _an_edit(self, proposal: Any) -> Any:
        if self._taking:
            return proposal["value"]
        of_model = proposal["trait"].name == "model"
        draft = Draft(proposal["value"]) if of_model else self.history.now.with_off(proposal["value"])
        self._ready = draft, self._listed(draft.model)
        return draft.model if of_model else draft.off

    @observe("model", "off")
    def _edited(self, change: Any) -> None:
        if not self._taking:
            draft, seen = self._ready
            self.history.put(draft)
            self._take(draft, seen)

    @validate(*checking.CHECKS)
    def _checked(self, proposal: Any) -> Any:
        return checking.CHECKS[proposal["trait"].name](proposal["value"], self)

    @observe("rules", "leaving", "start")
    def _walk_again(self, change: Any) -> None:
        with self._as_one():
            self._walk()

    @observe("step")
    def _follow(self, change: Any) -> None:
        with self._as_one():
            if self.step is not None and self.walks and self.region:
                points = [vertex.point for vertex in self.region.vertices]
                reached = self.walks[0].points[self.step]
                self.vertex = points.index(reached) if reached in points else None

    @observe("vertex", "axes", "dark", "finding", "number")
    def _look(self, change: Any) -> None:
        with self._as_one():
            if change["name"] == "axes":
                self.eye = None
