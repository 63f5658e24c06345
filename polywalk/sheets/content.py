"""What a sheet is made from, each part computed once."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cached_property

from polywalk.drawing import Scene, View, scene
from polywalk.errors import WalkError
from polywalk.model import Model
from polywalk.region import Region
from polywalk.reviewing import Difference, Review, Sensitivity, review, sensitivity
from polywalk.walks import Comparison, Walk, compare, walk

RULES = ("dantzig", "bland")
"""The rules whose walks are drawn where the view brings none."""

LIMIT = 1000
"""The most pivots of a walk on a sheet."""


@dataclass(frozen=True)
class Content:
    """One model with everything a sheet says of it.

    Parameters
    ----------
    region : Region
    given : View
    given_review : Review or None
        With findings set aside.
    change : Difference or None
        From an earlier version to this model.
    title, author : str
    equipment : bool
        Whether people may run equipment on the model's numbers.
    """

    region: Region
    given: View
    given_review: Review | None
    change: Difference | None
    title: str
    author: str
    equipment: bool

    @property
    def model(self) -> Model:
        """The model."""
        return self.region.model

    @cached_property
    def _default_walks(self) -> tuple[tuple[Walk, ...], str]:
        if self.region.status == "empty":
            return (), "There is no plan, so no rule has anywhere to walk."
        if self.model.objective is None:
            return (), "There is no objective, so no rule has a reason to walk."
        try:
            return tuple(walk(self.model, rule=rule, limit=LIMIT) for rule in RULES), ""
        except WalkError as error:
            return (), f"No rule can walk here: {error}"

    @property
    def walks(self) -> tuple[Walk, ...]:
        """The walks that are drawn and told."""
        return self.given.walks or self._default_walks[0]

    @property
    def refusal(self) -> str:
        """Why there is no walk; "" where there are some."""
        return "" if self.walks else self._default_walks[1]

    @cached_property
    def comparison(self) -> Comparison | None:
        """Every rule from rest; None where no rule can walk."""
        if not self.walks or self._default_walks[1]:
            return None
        return compare(self.model, limit=LIMIT)

    @cached_property
    def axes(self) -> tuple[str, ...] | None:
        """The axes of the pictures: those of the view, or the first three variables of a larger model."""
        if self.given.axes is None and self.model.n > 3:
            return self.model.variables[:3]
        return self.given.axes

    @cached_property
    def view(self) -> View:
        """The view of the picture that can be turned."""
        return replace(self.given, axes=self.axes, walks=self.walks, mode="light", size="page")

    @cached_property
    def still(self) -> View:
        """The same view for the picture in print, in which the key stands outside."""
        return replace(self.view, size="bare")

    @cached_property
    def drawn(self) -> Scene:
        """The picture as plain data."""
        return scene(self.region, self.still)

    @cached_property
    def review(self) -> Review:
        """The findings."""
        return self.given_review or review(self.model)

    @cached_property
    def sensitivity(self) -> Sensitivity:
        """Prices and ranges at the optimum."""
        return sensitivity(self.region)
