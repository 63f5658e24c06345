"""What a sweep hands out: one item a model, in order, and the few groups that thousands of them fall into."""

from __future__ import annotations

import pickle
from collections import Counter
from collections.abc import Iterable
from dataclasses import dataclass, field
from functools import cached_property
from multiprocessing.reduction import ForkingPickler
from typing import TYPE_CHECKING, Any

from polywalk.errors import unknown
from polywalk.table import Shown, Table


@dataclass(frozen=True)
class Item:
    """What became of one model.

    Parameters
    ----------
    name : str
    result : object or None
        None where it failed.
    error : Exception or None
    marks : tuple of (str, str, str), optional
        What it has in common with others: a kind ("shape", "error", ...), a text with # for every number, and its own
        text.

    Between processes the result travels packed, and is unpacked when it is first read: whoever gathers thousands then
    has little to do, and the groups need none of them.
    """

    name: str
    result: Any = field(default_factory=lambda: None)  # no default on the class, or __getattr__ would never be asked
    error: BaseException | None = None
    marks: tuple[tuple[str, str, str], ...] = ()

    def __reduce__(self) -> tuple[Any, ...]:
        packed = self.__dict__.get("_packed") or bytes(ForkingPickler.dumps(self.result))
        return _arrived, (self.name, packed, self.error, self.marks)

    if not TYPE_CHECKING:

        def __getattr__(self, name: str) -> Any:
            if name != "result" or "_packed" not in self.__dict__:
                raise AttributeError(f"{type(self).__name__!r} object has no attribute {name!r}")
            found = pickle.loads(self.__dict__["_packed"])
            self.__dict__.update(result=found)
            self.__dict__.pop("_packed", None)
            return found


def _arrived(name: str, packed: bytes, error: BaseException | None, marks: tuple[tuple[str, str, str], ...]) -> Item:
    """An item whose result is unpacked when it is read."""
    item = Item(name, None, error, marks)
    del item.__dict__["result"]
    item.__dict__["_packed"] = packed
    return item


@dataclass(frozen=True)
class Group:
    """Models that share a shape, a finding or a failure.

    Parameters
    ----------
    kind : str
        "shape", the severity of a finding, "failed", or "result".
    what : str
        In words; where several models share it, numbers are shown as #.
    names : tuple of str
        Of the models, in order; the first one is the example.
    """

    kind: str
    what: str
    names: tuple[str, ...]


TOLD = 5
"""Odd ones out that are named."""

ORDER = ("failed", "error", "warning", "note", "shape", "result")


@dataclass(frozen=True, repr=False)
class Sweep(Shown):
    """The results of one question asked of many models.

    Parameters
    ----------
    what : str
        The question.
    items : tuple of Item
        One a model, in the order given.
    notes : tuple of str, optional

    Examples
    --------
    >>> import polywalk as pw
    >>> models = {f"main {size}": pw.scenarios.harbour_row().with_rhs("harbour main", size) for size in range(9, 15)}
    >>> found = pw.sweep(models, what="region")
    >>> print(found)
    region of 6 models: 6 done, 0 failed
    kind   what                                                                      models  example
    shape  bounded, 3-D, 13 vertices, 9 facets, 1 degenerate, one vertex is optimal  4       main 11
    shape  bounded, 3-D, 11 vertices, 8 facets, 1 degenerate, one vertex is optimal  1       main 9
    shape  bounded, 3-D, 12 vertices, 9 facets, 2 degenerate, one vertex is optimal  1       main 10
    >>> len(found.results[0].vertices), found.failed
    (11, ())
    """

    what: str
    items: tuple[Item, ...]
    notes: tuple[str, ...] = ()

    @property
    def results(self) -> tuple[Any, ...]:
        """One result a model, in order; None where it failed."""
        return tuple(item.result for item in self.items)

    @property
    def failed(self) -> tuple[Item, ...]:
        """The items without a result."""
        return tuple(item for item in self.items if item.error is not None)

    @cached_property
    def _by_name(self) -> dict[str, Item]:
        return {item.name: item for item in self.items}

    def item(self, name: str) -> Item:
        """What became of the model of that name; raises UnknownName."""
        try:
            return self._by_name[name]
        except KeyError:
            raise unknown("model", name, self._by_name, "the sweep") from None

    @cached_property
    def groups(self) -> tuple[Group, ...]:
        """The distinct failures, findings and shapes: the worst kind first, within a kind the commonest first."""
        found: dict[tuple[str, str], dict[str, str]] = {}
        for item in self.items:
            for kind, what, own in item.marks:
                texts = found.setdefault((kind, what), {})
                texts[item.name] = what if item.name in texts and texts[item.name] != own else own
        groups = [
            Group(kind, what if len(texts) > 1 else next(iter(texts.values())), tuple(texts))
            for (kind, what), texts in found.items()
        ]
        return tuple(sorted(groups, key=lambda group: (_rank(group.kind), -len(group.names))))

    @property
    def alone(self) -> dict[str, int]:
        """The models that something is true of and of no other, with how many such things, the most first."""
        counts = Counter(group.names[0] for group in self.groups if len(group.names) == 1)
        return dict(counts.most_common())

    def table(self) -> Table:
        """The groups, with how many models are in each and an example."""
        failed = len(self.failed)
        title = f"{self.what} of {len(self.items)} models: {len(self.items) - failed} done, {failed} failed"
        rows = tuple((group.kind, group.what, len(group.names), group.names[0]) for group in self.groups)
        return Table(title, ("kind", "what", "models", "example"), rows, (*self.notes, *self._told()))

    def _told(self) -> tuple[str, ...]:
        """The odd ones out, where there are few beside many."""
        if not 0 < len(self.alone) <= len(self.items) // 10:
            return ()
        named = [f"{name} ({count})" for name, count in list(self.alone.items())[:TOLD]]
        more = f" and {len(self.alone) - TOLD} more" if len(self.alone) > TOLD else ""
        return (f"like no other, in so many lines: {', '.join(named)}{more}",)


def _rank(kind: str) -> int:
    return ORDER.index(kind) if kind in ORDER else len(ORDER)


def merged(what: str, parts: Iterable[Iterable[Item]], notes: Iterable[str] = ()) -> Sweep:
    """One sweep of many parts, in order."""
    return Sweep(what, tuple(item for part in parts for item in part), tuple(notes))
