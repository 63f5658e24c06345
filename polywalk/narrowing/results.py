"""The shadow of a big model: its exact model in the kept variables, and what stops each facet."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property

from polywalk.bigmodel import BigModel
from polywalk.bigmodel.telling import counted
from polywalk.errors import unknown
from polywalk.exact import short
from polywalk.model import Model
from polywalk.narrowing.proof import Multipliers, Proof
from polywalk.region import Region, region
from polywalk.table import Shown, Table

SHOWN = 3
"""Multipliers of a facet that its row of the table names."""


@dataclass(frozen=True, repr=False)
class ShadowFacet(Shown):
    """One facet (or equality) of a shadow, and which constraints of the big model stop it there.

    Parameters
    ----------
    constraint : str
        Its name in the shadow's model.
    rule : str
        The same as text.
    proof : Exact or Rounded or None
        What ``multipliers`` are read from; None where the facet is not proved.
    proof_backward : Exact or Rounded or None
        The same for the >= half of an equality.
    is_proved : bool
        Whether the multipliers add up exactly.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import shadow
    >>> from polywalk.scenarios import harbour_row
    >>> big = BigModel.from_model(harbour_row())
    >>> print(shadow(big, onto=("chips", "tank")).facet("harbour main & pump lower"))
    chips + tank ≤ 12, made of 2 constraints
    constraint    multiplier
    harbour main  1
    pump lower    -1
    """

    constraint: str
    rule: str
    proof: Proof | None
    proof_backward: Proof | None = None
    is_proved: bool = True

    @cached_property
    def multipliers(self) -> Multipliers:
        """By constraint of the big model, the largest first: times these, the constraints add up to the facet.

        None is negative on a <=, none positive on a >= (the other way round for a facet >=). For an equality they add
        up to its <= half.
        """
        return () if self.proof is None else self.proof.named()

    @cached_property
    def backward(self) -> Multipliers:
        """For an equality, those that add up to its >= half."""
        return () if self.proof_backward is None else self.proof_backward.named()

    def table(self) -> Table:
        """The multipliers, the largest first."""
        made = f"made of {len(self.multipliers)} constraints" if self.multipliers else "not proved yet"
        if not self.is_proved and self.multipliers:
            made += ", rounded"
        if not self.backward:
            return Table(f"{self.rule}, {made}", ("constraint", "multiplier"), self.multipliers)
        lines = [(name, value, "≤") for name, value in self.multipliers]
        lines += [(name, value, "≥") for name, value in self.backward]
        return Table(f"{self.rule}, {made}", ("constraint", "multiplier", "of the half"), tuple(lines))


@dataclass(frozen=True, repr=False)
class Shadow(Shown):
    """The outline, in a few variables, of everything a big model allows.

    Parameters
    ----------
    model : Model
        In the kept variables, one constraint a facet; region, walks, review and pictures work on it.
    facets : tuple of ShadowFacet
        In the order of the model's constraints.
    tolerance : float or None
        None where every vertex and every facet is proved in fractions. Else floats were used: the facets hold within
        this share of the shadow's size, and nothing exact is claimed (degenerate, tied).
    whole : BigModel
        What the shadow was taken of: the big model, with the rows added for the objective.
    held : tuple of (str, Fraction)
        Exact right-hand sides of rows of ``whole`` that a float would round.
    programs : int
        How many linear programs it took.
    is_partial : bool
        Whether it was interrupted: then the shadow reaches at least so far.
    notes : tuple of str

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import shadow
    >>> from polywalk.scenarios import harbour_row
    >>> big = BigModel.from_model(harbour_row())
    >>> print(shadow(big, onto=("chips", "tank")))
    Harbour Row onto chips, tank: 5 facets, exact, 10 linear programs
    facet                      rule               what stops it there
    tank lower                 tank ≥ 0           1 tank lower
    harbour main & pump lower  chips + tank ≤ 12  1 harbour main, -1 pump lower
    tank upper                 tank ≤ 4           1 tank upper
    reheating                  chips - tank ≥ -2  -1 reheating
    chips lower                chips ≥ 0          1 chips lower
    """

    model: Model
    facets: tuple[ShadowFacet, ...]
    tolerance: float | None
    whole: BigModel
    held: tuple[tuple[str, Fraction], ...] = ()
    programs: int = 0
    is_partial: bool = False
    notes: tuple[str, ...] = ()

    @cached_property
    def region(self) -> Region:
        """The region of the shadow's model."""
        return region(self.model)

    def facet(self, name: str) -> ShadowFacet:
        """The facet of that name; raises UnknownName."""
        for one in self.facets:
            if one.constraint == name:
                return one
        raise unknown("facet", name, [one.constraint for one in self.facets], "the shadow")

    def table(self) -> Table:
        """One row a facet, with the constraints of the big model that stop it, the largest multipliers first."""
        kind = "exact" if self.tolerance is None else f"floats, within {self.tolerance:.2g} of its size"
        part = "partial outline, " if self.is_partial else ""
        title = (
            f"{self.whole.name or 'shadow'} onto {', '.join(self.model.variables)}: {part}"
            f"{counted(len(self.facets), 'facet')}, {kind}, {counted(self.programs, 'linear program')}"
        )
        rows = tuple((one.constraint, one.rule, _stops(one.proof)) for one in self.facets)
        return Table(title, ("facet", "rule", "what stops it there"), rows, self.notes)


def _stops(proof: Proof | None) -> str:
    if proof is None:
        return "not proved yet"
    shown = ", ".join(f"{short(value)} {name}" for name, value in proof.named(SHOWN))
    more = proof.count - SHOWN
    return f"{shown} and {more} more" if more > 0 else shown
