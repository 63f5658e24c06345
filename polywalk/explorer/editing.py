"""The edits of a model in the explorer: what is switched off, and the way back and on again."""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property

from polywalk.model import Model
from polywalk.reviewing.stops import Kind, with_number


@dataclass(frozen=True)
class Draft:
    """A model with some of its constraints switched off.

    Parameters
    ----------
    whole : Model
        With every constraint.
    off : tuple of str
        The constraints that do not count, in the model's order.
    """

    whole: Model
    off: tuple[str, ...] = ()

    @cached_property
    def model(self) -> Model:
        """The model without what is switched off."""
        return self.whole.without(*self.off) if self.off else self.whole

    def with_number(self, kind: Kind, name: str, value: Fraction) -> Draft:
        """With another right-hand side or cost."""
        return replace(self, whole=with_number(self.whole, kind, name, value))

    def with_off(self, names: tuple[str, ...]) -> Draft:
        """With exactly these constraints switched off; raises UnknownName."""
        for name in names:
            self.whole.constraint(name)
        return replace(self, off=tuple(row.name for row in self.whole.constraints if row.name in names))


class History:
    """Drafts in the order they were made, and which of them is shown.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.explorer.editing import Draft, History
    >>> first = Draft(pw.from_algebra(maximize="x", bounds={"x": (0, 1)}))
    >>> history = History(first)
    >>> history.put(first.with_off(("x upper",)))
    >>> history.move(-1)
    >>> history.now == first, history.can_redo
    (True, True)
    """

    def __init__(self, first: Draft) -> None:
        self.drafts, self.place = [first], 0
        self._drag: object = None

    @property
    def now(self) -> Draft:
        """The draft that is shown."""
        return self.drafts[self.place]

    @property
    def first(self) -> Draft:
        """The draft it began with."""
        return self.drafts[0]

    @property
    def can_undo(self) -> bool:
        """Whether there is a draft before."""
        return self.place > 0

    @property
    def can_redo(self) -> bool:
        """Whether there is a draft after."""
        return self.place < len(self.drafts) - 1

    def put(self, draft: Draft, drag: object = None) -> None:
        """Show another draft; what came after the present one is forgotten.

        Drafts of one drag (the same mark, until `rest`) are one edit.
        """
        if draft == self.now:
            return
        same = drag is not None and drag == self._drag
        self.drafts = [*self.drafts[: self.place + (not same)], draft]
        self.place, self._drag = len(self.drafts) - 1, drag

    def rest(self) -> None:
        """The drag is over: the next edit is one of its own."""
        self._drag = None

    def move(self, by: int) -> None:
        """Show the draft before (-1) or after (+1), if there is one."""
        self.place = min(len(self.drafts) - 1, max(0, self.place + by))
        self.rest()
