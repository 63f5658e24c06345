"""A list of versions of a model, each beside the one before it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

from polywalk.errors import ModelError
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.reviewing import changing
from polywalk.reviewing.difference import Difference, difference
from polywalk.table import Shown, Table


@dataclass(frozen=True, repr=False)
class Versions(Shown):
    """Several versions of a model, each beside the one before it.

    Parameters
    ----------
    regions : tuple of Region
    names : tuple of str
        What each version is called.
    """

    regions: tuple[Region, ...]
    names: tuple[str, ...]

    @cached_property
    def steps(self) -> tuple[Difference, ...]:
        """From each version to the next."""
        return tuple(Difference(*pair) for pair in zip(self.regions, self.regions[1:], strict=False))

    def table(self) -> Table:
        """One row a version."""
        return changing.versions_table(self)


def versions(models: Sequence[Model | Region], names: Sequence[str] | None = None) -> Versions:
    """A list of versions of a model as a table: what each has, and what it changes of the one before.

    Parameters
    ----------
    models : sequence of Model or Region
        At least one; all with the same variables.
    names : sequence of str, optional
        What each is called; default: "version 1", "version 2", ...

    Returns
    -------
    Versions

    Raises
    ------
    ModelError
        No version, names for another number of versions, variables that differ.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.scenarios.harbour_row()
    >>> found = pw.versions([model, model.with_rhs("harbour main", 10)], ["as drafted", "narrow main"])
    >>> [step.cut_off.volume for step in found.steps]
    [Fraction(39, 1)]

    References
    ----------
    See `difference`.
    """
    if not models:
        raise ModelError("expected at least one version of a model, got none.", models)
    named = [f"version {k + 1}" for k in range(len(models))] if names is None else list(names)
    if len(named) != len(models):
        raise ModelError(f"expected {len(models)} names, one a version, got {len(named)}.", named)
    first = models[0] if isinstance(models[0], Region) else region(models[0])
    return Versions((first, *(difference(first, other).after for other in models[1:])), tuple(named))
