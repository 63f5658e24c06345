"""The constraints of two versions of a model side by side."""

from __future__ import annotations

from dataclasses import dataclass

from polywalk.model import Constraint
from polywalk.region import Region
from polywalk.reviewing.case import Case

WORDS = {
    "needed": "needed",
    "duplicate": "redundant",
    "parallel": "redundant",
    "joint": "redundant",
    "touching": "redundant, touches",
    "loose": "redundant",
}
"""The standing of a row, as a table says it."""


@dataclass(frozen=True)
class RowState:
    """One constraint in one version.

    Parameters
    ----------
    rule : str
    standing : str
        "needed", "redundant", "redundant, touches"; "" where the version has no plan or the row no variable.
    binds : bool or None
        Whether it is active at every optimal point; None without an optimum.
    """

    rule: str
    standing: str
    binds: bool | None


@dataclass(frozen=True)
class RowChange:
    """One constraint in both versions; None where a version does not have it."""

    name: str
    before: RowState | None
    after: RowState | None

    @property
    def change(self) -> str:
        """added, removed, changed or the same."""
        if self.before is None or self.after is None:
            return "added" if self.before is None else "removed"
        return "same" if self.before.rule == self.after.rule else "changed"

    @property
    def became_redundant(self) -> bool:
        """Whether it was needed and no longer is."""
        return self._moved("needed", "redundant")

    @property
    def became_needed(self) -> bool:
        """Whether it was redundant and no longer is, or is new and needed."""
        return self._moved("redundant", "needed")

    def _moved(self, old: str, new: str) -> bool:
        one, other = self.before, self.after
        return one is not None and other is not None and one.standing[:6] == old[:6] and other.standing[:6] == new[:6]

    @property
    def became_active(self) -> bool:
        """Whether it binds at the optimum and did not, or was not there."""
        return bool(self.after and self.after.binds) and not (self.before and self.before.binds)

    @property
    def became_idle(self) -> bool:
        """Whether it bound at the optimum and no longer does, or is gone."""
        return bool(self.before and self.before.binds) and not (self.after and self.after.binds)


def row_changes(before: Region, after: Region) -> tuple[RowChange, ...]:
    """Every constraint of either version, in the order of the later one, removed ones last."""
    old, new = _states(before), _states(after)
    names = [*new, *(name for name in old if name not in new)]
    return tuple(RowChange(name, old.get(name), new.get(name)) for name in names)


def _states(found: Region) -> dict[str, RowState]:
    case = Case(found.model)
    standing = {} if found.status == "empty" else {k: WORDS[item.kind] for k, item in case.standing.items()}
    return {
        row.name: RowState(row.text(found.model.variables), standing.get(k, ""), _binds(found, row))
        for k, row in enumerate(found.model.constraints)
    }


def _binds(found: Region, row: Constraint) -> bool | None:
    if found.optimal is None:
        return None
    ways = [found.rays[k].direction for k in found.optimal.rays] + list(found.lines)
    points = [found.base[k] for k in found.optimal.vertices]
    moves = any(row.slack(tuple(a + b for a, b in zip(points[0], way, strict=True))) != 0 for way in ways)
    return not row.is_constant and not moves and all(row.slack(point) == 0 for point in points)
