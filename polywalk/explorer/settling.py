"""What is worked out when the input rests: review, prices, slider stops. Each is computed on a floor below."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from polywalk.budget import Budget
from polywalk.model import Model
from polywalk.region import Region
from polywalk.region.engine import SMALL_WORK, work
from polywalk.reviewing import Finding, Review, review, sensitivity
from polywalk.reviewing.crowding import crowding
from polywalk.reviewing.stops import Kind, Stops, stops
from polywalk.table import Table

PATIENCE = Budget(seconds=300.0)
"""What slow work may use before it ends by itself; its Stop button ends it sooner."""

SUPERFLUOUS = (
    *("duplicate", "parallel", "redundant", "redundant-touching", "jointly-redundant", "true-row", "loose-constant"),
)
"""Findings whose first constraint may go."""


def is_slow(model: Model) -> bool:
    """Whether listing the vertices may take so long that it is not done unasked."""
    return work(model.n, len(model.constraints)) > SMALL_WORK


@dataclass(frozen=True)
class Settled:
    """What is known of a model once it has been reviewed.

    Parameters
    ----------
    review : Review
    prices : tuple of Table
    stops : Stops or None
        For the number that is being changed; None where that is gone.
    crowded : dict of str to tuple of int
        The constraints that make vertices degenerate, and which.
    """

    review: Review
    prices: tuple[Table, ...]
    stops: Stops | None
    crowded: Mapping[str, tuple[int, ...]] = field(default_factory=dict)

    @property
    def redundant(self) -> frozenset[str]:
        """The constraints that may go."""
        return frozenset(item.constraints[0] for item in self.review.of(*SUPERFLUOUS) if item.constraints)

    def like(self, finding: Finding | None) -> int | None:
        """The place of the finding that says the same of the model as another one did; None where there is none."""
        if finding is None:
            return None
        same = [
            place
            for place, item in enumerate(self.review.findings)
            if (item.code, item.constraints) == (finding.code, finding.constraints)
        ]
        return same[0] if same else None


def settle(seen: Region, whole: Model, number: tuple[Kind, str]) -> Settled:
    """Review a model whose region is known; ``whole`` has the constraints that are switched off, too."""
    kind, name = number
    known = kind == "cost" or name in {row.name for row in seen.model.constraints}
    model = seen.model if known else whole
    return Settled(review(seen.model), sensitivity(seen).tables(), stops(model, kind, name), crowding(seen))
