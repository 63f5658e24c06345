"""The table of pivot rules, and rules of the user's own.

A rule of your own is a plain function of the dictionary and of what may be chosen, in index order, that returns one of
them and changes nothing:

    entering(dictionary, columns) -> column
    leaving(dictionary, column, rows) -> row

``columns`` are those whose slack improves the objective as it grows (in Phase I: lowers the auxiliary), never empty;
``rows`` those that the ratio test ties, never empty. ``Dictionary`` tells what may be asked: ``gain(column)``,
``reduced_cost(column)``, ``rate(row, column)``, ``first_to_run_out(column)``, and the name of a column's slack,
``dictionary.slacks.names[dictionary.nonbasic[column]]``. The choice must follow from the dictionary alone; then a cycle
is found as soon as the same dictionary, in the same arrangement, comes back.
"""

from __future__ import annotations

from collections.abc import Callable, Hashable, Sequence
from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from operator import index
from random import Random
from typing import Any, Literal, NoReturn

from polywalk.errors import WalkError, unknown
from polywalk.exact import Row
from polywalk.linear import Dictionary
from polywalk.walks import entering, leaving
from polywalk.walks.setting import Setting

Sees = Literal["basis", "rows", "arrangement", "lots"]
"""What a rule's choice depends on: the set of basic slacks; also the order of the rows; also that of the columns; or
lots, so that nothing that comes back tells the next choice. In this order each contains the ones before."""

SEES: tuple[Sees, ...] = ("basis", "rows", "arrangement", "lots")


@dataclass(frozen=True)
class Rule:
    """An entering or leaving rule under the name people ask for it.

    Parameters
    ----------
    name : str
    choose : function
        (dictionary, columns) -> column, or (dictionary, column, rows) -> row; with the setting after them if ``asks``.
    reason : str
        What is special about its choice, as the end of a sentence; empty for a rule of the user's own.
    sees : {"basis", "rows", "arrangement", "lots"}
        What the choice depends on.
    asks : bool
        Whether it needs the setting.
    measure : function or None
        What it compares, where that is one number: (dictionary, column) or (dictionary, column, row) -> Fraction, None
        for without end.
    """

    name: str
    choose: Callable[..., int]
    reason: str = ""
    sees: Sees = "basis"
    asks: bool = False
    measure: Callable[..., Fraction | None] | None = None

    def bound(self, setting: Setting) -> Callable[..., int]:
        """The rule as a function of the dictionary and the choices alone."""
        if not self.asks:
            return self.choose
        return lambda *known: self.choose(*known, setting)


ENTERING = (
    Rule("dantzig", entering.dantzig, "has the largest reduced cost", measure=entering.slope),
    Rule("bland", entering.bland, "has the lowest index"),
    Rule(
        "greatest-improvement",
        entering.greatest_improvement,
        "improves the most over its whole step",
        measure=entering.whole_improvement,
    ),
    Rule(
        "steepest-edge",
        entering.steepest_edge,
        "has the largest squared slope over all slacks",
        measure=entering.slope_squared,
    ),
    Rule(
        "steepest-edge-decisions",
        entering.steepest_edge_decisions,
        "has the largest squared slope over the decisions",
        measure=entering.slope_squared_of_decisions,
    ),
    Rule("random-edge", entering.random_edge, "was drawn by lot", sees="lots", asks=True),
    Rule(
        "shadow-vertex",
        entering.shadow_vertex,
        "is the first to improve as the objective turns from the start objective to its own",
        asks=True,
    ),
)
LEAVING = (
    Rule("lowest-index", leaving.lowest_index, "has the lowest index"),
    Rule("lexicographic", leaving.lexicographic, "has the lexicographically smallest ratios", asks=True),
    Rule("first-row", leaving.first_row, "stands in the first of their rows", sees="rows"),
    Rule("largest-pivot", leaving.largest_pivot, "falls the fastest", measure=leaving.fall),
    Rule("random", leaving.random, "was drawn by lot", sees="lots", asks=True),
)


def entering_rule(rule: object) -> Rule:
    """The entering rule of that name, or a function as one; raises WalkError."""
    return _rule(rule, ENTERING, "entering rule", _checked_column)


def leaving_rule(rule: object) -> Rule:
    """The leaving rule of that name, or a function as one; raises WalkError."""
    return _rule(rule, LEAVING, "leaving rule", _checked_row)


def _rule(given: object, known: tuple[Rule, ...], kind: str, checked: Callable[..., Callable[..., int]]) -> Rule:
    if isinstance(given, Rule):
        return given
    if callable(given):
        name = getattr(given, "__name__", type(given).__name__)
        name = f"own {kind}" if name == "<lambda>" else name
        return Rule(name, checked(name, given), sees="arrangement")
    for rule in known:
        if rule.name == given:
            return rule
    listed = [rule.name for rule in known]
    told = str(unknown(kind, given, listed, "polywalk"))
    more = f" Known are: {', '.join(listed)}." if "did you mean" in told else ""
    raise WalkError(told + more, culprit=given)


def _checked_column(name: str, choose: Callable[..., Any]) -> Callable[..., int]:
    def chosen(dictionary: Dictionary, columns: Sequence[int]) -> int:
        answer = choose(dictionary, list(columns))
        place = _place(answer)
        return place if place in columns else _refuse(name, answer, ("enter", "column"), _named(dictionary, columns))

    return chosen


def _checked_row(name: str, choose: Callable[..., Any]) -> Callable[..., int]:
    def chosen(dictionary: Dictionary, column: int, rows: Sequence[int]) -> int:
        answer = choose(dictionary, column, list(rows))
        place = _place(answer)
        names = {i: dictionary.slacks.names[dictionary.basic[i]] for i in rows}
        return place if place in names else _refuse(name, answer, ("leave", "row"), names)

    return chosen


def _named(dictionary: Dictionary, columns: Sequence[int]) -> dict[int, str]:
    return {j: dictionary.slacks.names[dictionary.nonbasic[j]] for j in columns}


def _place(answer: object) -> int:
    """The answer as a whole number, -1 where it is none."""
    try:
        return -1 if isinstance(answer, bool) else index(answer)  # type: ignore[arg-type]
    except TypeError:
        return -1


def _refuse(name: str, answer: object, words: tuple[str, str], able: dict[int, str]) -> NoReturn:
    verb, place = words
    choices = ", ".join(f"{k} ({slack})" for k, slack in able.items())
    raise WalkError(
        f"the rule {name!r} returned {answer!r}, which is no {place} that may {verb}; return one of those it is given: "
        f"{choices}.",
        culprit=answer,
    )


PhaseOne = Literal["auxiliary", "dual"]
PHASES_ONE: tuple[PhaseOne, ...] = ("auxiliary", "dual")


@dataclass(frozen=True)
class Rules:
    """The pair of rules of a walk, and what they were given.

    Parameters
    ----------
    entering, leaving : Rule
    rank : sequence of int
        The index order, by slack.
    seed : int
        For rules that draw lots.
    start_objective : (n,) tuple of Fraction or None
        For the shadow-vertex rule.
    phase_one : {"auxiliary", "dual"}
        How Phase I is done.
    """

    entering: Rule
    leaving: Rule
    rank: Sequence[int]
    seed: int = 0
    start_objective: Row | None = None
    phase_one: PhaseOne = "auxiliary"

    @cached_property
    def sees(self) -> Sees:
        """What the choices of the pair depend on."""
        return max(self.entering.sees, self.leaving.sees, key=SEES.index)

    def state(self, now: Dictionary) -> Hashable | None:
        """What makes the walk go on as before when it comes back; None where lots are drawn."""
        if self.sees == "basis":
            return frozenset(now.basic)
        if self.sees == "lots":
            return None
        return now.basic if self.sees == "rows" else (now.basic, now.nonbasic)

    def lots(self) -> Random:
        """The generator of one walk."""
        return Random(self.seed)

    def begin(self, first: Dictionary, lots: Random) -> tuple[Callable[..., int], Callable[..., int]]:
        """The two rules as functions of the dictionary and the choices, for a phase that begins here.

        Raises WalkError for a start objective for which this is no optimum.
        """
        setting = Setting(self.rank, first, lots, self.start_objective)
        if self.start_objective is not None:
            _ = setting.start_weights
        return self.entering.bound(setting), self.leaving.bound(setting)
