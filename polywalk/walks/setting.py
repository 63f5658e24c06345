"""What a rule may need besides the dictionary: the index order, where the phase began, lots, a second objective."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property
from math import lcm
from random import Random

from polywalk.errors import WalkError
from polywalk.exact import Row, full, integer_row
from polywalk.linear import Dictionary


@dataclass(frozen=True)
class Setting:
    """The surroundings of a rule in one phase of one walk. Rules read it and change nothing but the state of ``lots``.

    Parameters
    ----------
    rank : sequence of int
        The index order, by slack.
    first : Dictionary
        Where the phase began (Phase I: with the auxiliary variable already basic).
    lots : Random
        Drawn from by rules that draw lots; one generator for the whole walk.
    start_objective : (n,) tuple of Fraction or None
        The shadow-vertex rule's, by decision; None for the default.
    """

    rank: Sequence[int]
    first: Dictionary
    lots: Random
    start_objective: Row | None = None

    @cached_property
    def disturbed(self) -> tuple[int, ...]:
        """The slacks that were basic when the phase began and may not fall below zero, lowest index first."""
        blocks = self.first.slacks.blocks
        return tuple(sorted((k for k in self.first.basic if blocks[k]), key=self.rank.__getitem__))

    @cached_property
    def start_weights(self) -> Mapping[int, int]:
        """The shadow-vertex rule's first objective as weights of slacks, for which the first dictionary is optimal.

        Raises WalkError where it is not, for an objective that was asked for.
        """
        if self.start_objective is None or self.first.phase == 1:
            return least_of_those_held(self.first)[0]
        weights = _of_decisions(self.first, self.start_objective)
        gains = self.first.combination(weights)[1:]
        may = self.first.slacks.pivots
        for k, gain in zip(self.first.nonbasic, gains, strict=True):
            if gain > 0 and may[k]:
                point = ", ".join(map(full, self.first.point))
                raise WalkError(
                    f"the start ({point}) is not optimal for the start objective: "
                    f"{self.first.slacks.names[k]!r} would improve it; start at its optimum, or leave start_objective "
                    "out for one that fits the start.",
                    culprit=self.start_objective,
                )
        return weights


def least_of_those_held(first: Dictionary) -> tuple[dict[int, int], int]:
    """Minus the sum of the slacks held at 0, as typed: nothing improves it here. Its weights, and their scale."""
    scales, may = first.slacks.scales, first.slacks.pivots
    whole = lcm(*(scales[k] for k in first.nonbasic))
    return {k: -whole // scales[k] for k in first.nonbasic if may[k]}, whole


def _of_decisions(first: Dictionary, objective: Row) -> dict[int, int]:
    """An objective of the model's own sense, as weights of the decisions' own slacks, turned to be maximized."""
    whole, _ = integer_row(objective)
    sense = 1 if first.slacks.maximizes else -1
    return {j: sense * side * value for j, (side, value) in enumerate(zip(first.slacks.sides, whole, strict=True))}


def check_numbers(seed: object, limit: object) -> None:
    """Raise WalkError where the seed is no whole number or the limit no number of pivots."""
    if isinstance(seed, bool) or not isinstance(seed, int):
        raise WalkError(f"expected as seed a whole number, got {seed!r}.", culprit=seed)
    if isinstance(limit, bool) or not isinstance(limit, int) or limit < 0:
        raise WalkError(f"expected as limit a number of pivots, 0 or more, got {limit!r}.", culprit=limit)
