"""Dictionaries that are pivoted once, however many walks pass through them, and choices made once."""

from __future__ import annotations

from collections.abc import Callable, Hashable
from dataclasses import dataclass, field, fields, replace

from polywalk.linear import Dictionary
from polywalk.walks.rules import Rule


@dataclass(frozen=True, repr=False)
class Shared(Dictionary):
    """A dictionary that keeps its neighbours and what it was asked.

    All that come from one another share ``met``: a dictionary met again is the same object, so that walks that come
    together share their work from there on. Its entries follow from its basis alone, up to the order of rows and
    columns. Where no rule looks at that order, ``arranged`` is False and any order is as good as any other; in Phase I
    it is always kept, since the auxiliary's column is dropped by its place.

    Parameters
    ----------
    arranged : bool
        Whether two orders of one basis are told apart.
    met : dict
        Every dictionary so far.
    choices : dict
        What rules have chosen here.
    """

    arranged: bool = True
    met: dict[Hashable, Shared] = field(default_factory=dict, compare=False)
    choices: dict[tuple[object, ...], int] = field(default_factory=dict, init=False, compare=False)
    _turns: dict[tuple[int, int], Shared] = field(default_factory=dict, init=False, compare=False)
    _ties: dict[int, list[int]] = field(default_factory=dict, init=False, compare=False)

    def pivot(self, row: int, column: int) -> Shared:
        """The dictionary after the pivot, made once."""
        if (row, column) not in self._turns:
            self._turns[row, column] = shared(super().pivot(row, column), self.arranged, self.met)
        return self._turns[row, column]

    def first_to_run_out(self, column: int) -> list[int]:
        """The ratio test, made once."""
        if column not in self._ties:
            self._ties[column] = super().first_to_run_out(column)
        return self._ties[column]


PLAIN = tuple(part.name for part in fields(Dictionary))


def shared(now: Dictionary, arranged: bool, met: dict[Hashable, Shared] | None = None) -> Shared:
    """The dictionary as one of those met; itself, from now on, if it was not met before."""
    known = {} if met is None else met
    exact = arranged or bool(now.relaxed_slacks)
    place = (now.basic, now.nonbasic, now.relaxed_slacks) if exact else frozenset(now.basic)
    if place not in known:
        known[place] = Shared(**{name: getattr(now, name) for name in PLAIN}, arranged=arranged, met=known)
    return known[place]


def looks_at_order(rule: Rule) -> bool:
    """Whether the rule's choice may depend on the order of rows or columns."""
    return rule.sees in {"rows", "arrangement"}


def remembered(rule: Rule) -> Rule:
    """The same rule, asked only once in each shared dictionary, where nothing else tells its choice."""
    if rule.asks or rule.sees == "lots":
        return rule
    choose: Callable[..., int] = rule.choose

    def once(dictionary: Dictionary, *given: int) -> int:
        if not isinstance(dictionary, Shared):
            return choose(dictionary, *given)
        key = (choose, *given[:-1])  # the last is what may be chosen, which follows from the rest
        if key not in dictionary.choices:
            dictionary.choices[key] = choose(dictionary, *given)
        return dictionary.choices[key]

    return replace(rule, choose=once)
