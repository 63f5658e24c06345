"""Two versions of a model side by side: what a change cuts off, adds, and moves."""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property

from polywalk.errors import ModelError
from polywalk.exact import Row
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.reviewing import changing
from polywalk.reviewing.findings import Finding, Review
from polywalk.reviewing.parts import Part, common, missing
from polywalk.reviewing.review import review
from polywalk.reviewing.rows import RowChange, row_changes
from polywalk.table import Shown, Table


@dataclass(frozen=True)
class Corner:
    """A vertex of one version or of both.

    Parameters
    ----------
    point : (n,) tuple of Fraction
    before, after : int or None
        Its index among the vertices of each version; None where it is no vertex there.
    """

    point: Row
    before: int | None
    after: int | None

    @property
    def change(self) -> str:
        """kept, lost or gained."""
        return "kept" if None not in (self.before, self.after) else "lost" if self.after is None else "gained"


@dataclass(frozen=True, repr=False)
class Difference(Shown):
    """What changes from one version of a model to another; exact.

    Parameters
    ----------
    before, after : Region
        Of models with the same variables in the same order.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.scenarios.harbour_row("two decisions")
    >>> change = pw.difference(model, model.with_rhs("harbour main", 9))
    >>> change.cut_off.volume, change.added.volume
    (Fraction(5, 1), Fraction(0, 1))
    >>> [corner.change for corner in change.corners].count("kept")
    3
    """

    before: Region
    after: Region

    @cached_property
    def cut_off(self) -> Part:
        """What was allowed before and is not after."""
        return missing(self.before, self.after.model)

    @cached_property
    def added(self) -> Part:
        """What is allowed after and was not before."""
        return missing(self.after, self.before.model)

    @cached_property
    def common(self) -> Region:
        """What both versions allow."""
        return common(self.before.model, self.after.model)

    @cached_property
    def corners(self) -> tuple[Corner, ...]:
        """Every vertex of either version, sorted by point."""
        old = {vertex.point: k for k, vertex in enumerate(self.before.vertices)}
        new = {vertex.point: k for k, vertex in enumerate(self.after.vertices)}
        return tuple(Corner(point, old.get(point), new.get(point)) for point in sorted({**old, **new}))

    def vertices(self, change: str) -> tuple[Corner, ...]:
        """The vertices that were "kept", "lost" or "gained"."""
        return tuple(corner for corner in self.corners if corner.change == change)

    @property
    def gain(self) -> Fraction | None:
        """The change of the optimal value; None unless both versions have one."""
        if self.before.value is None or self.after.value is None:
            return None
        return self.after.value - self.before.value

    @cached_property
    def rows(self) -> tuple[RowChange, ...]:
        """Every constraint of either version: its rule, its standing and whether it is active at the optimum."""
        return row_changes(self.before, self.after)

    @cached_property
    def reviews(self) -> tuple[Review, Review]:
        """The reviews of both versions."""
        return review(self.before.model), review(self.after.model)

    @cached_property
    def appeared(self) -> tuple[Finding, ...]:
        """The findings of the later version that the earlier one does not have."""
        return _beyond(self.reviews[1], self.reviews[0])

    @cached_property
    def gone(self) -> tuple[Finding, ...]:
        """The findings of the earlier version that the later one does not have."""
        return _beyond(self.reviews[0], self.reviews[1])

    @property
    def summary(self) -> tuple[str, ...]:
        """The change in plain sentences."""
        return tuple(changing.sentences(self))

    def tables(self) -> tuple[Table, ...]:
        """The versions, the constraints, the vertices, the findings: each as a table."""
        return changing.tables(self)

    def table(self) -> Table:
        """The two versions, one row each."""
        return self.tables()[0]

    def __str__(self) -> str:
        return "\n\n".join(str(table) for table in self.tables())

    __repr__ = __str__

    def _repr_html_(self) -> str:
        return "".join(table._repr_html_() for table in self.tables())

    def markdown(self) -> str:
        """All tables as Markdown, for a ticket."""
        return "\n\n".join(table.markdown() for table in self.tables())


def difference(before: Model | Region, after: Model | Region) -> Difference:
    """What changes from one version of a model to another: region, vertices, optimum, constraints, findings.

    Parameters
    ----------
    before, after : Model or Region
        With the same variables; their order may differ, that of ``before`` is kept.

    Returns
    -------
    Difference

    Raises
    ------
    ModelError
        The variables are not the same.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.scenarios.harbour_row()
    >>> for line in pw.difference(model, model.with_rhs("harbour main", 10)).summary[:2]:
    ...     print(line)
    The change cuts off 39 of 827/6 (28%) and adds nothing.
    5 vertices are lost, 4 gained and 8 kept.

    References
    ----------
    Own choice of what to compare; no published source.
    """
    old = before if isinstance(before, Region) else region(before)
    new = after if isinstance(after, Region) else region(after)
    if new.model.variables != old.model.variables:
        new = region(_arranged(new.model, old.model.variables))
    return Difference(old, new)


def _arranged(model: Model, variables: tuple[str, ...]) -> Model:
    """The model with its variables in another order."""
    for name in (*variables, *model.variables):
        if name not in model.variables or name not in variables:
            raise ModelError(
                f"expected two versions with the same variables, but only one has {name!r}; fix a variable that the "
                f"other version does not have, or add it there.",
                culprit=name,
            )
    places = [model.index(name) for name in variables]
    rows = tuple(
        replace(row, coefficients=tuple(row.coefficients[place] for place in places)) for row in model.constraints
    )
    goal = model.objective
    if goal is not None:
        goal = replace(goal, coefficients=tuple(goal.coefficients[place] for place in places))
    return replace(model, variables=variables, constraints=rows, objective=goal)


def _beyond(one: Review, other: Review) -> tuple[Finding, ...]:
    known = {_key(finding) for finding in other.findings}
    return tuple(finding for finding in one.findings if _key(finding) not in known)


def _key(finding: Finding) -> tuple[object, ...]:
    """What a finding is about; its numbers may move while it stays the same finding."""
    return finding.code, finding.constraints, finding.variables
