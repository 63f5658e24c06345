"""What one region has that another has not, cut into convex pieces that overlap nowhere; exact."""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property
from math import fsum

from polywalk.exact import dot
from polywalk.model import Constraint, Model, Sense
from polywalk.region import Region, region


@dataclass(frozen=True)
class Part:
    """A part of the space that need not be convex, as convex pieces.

    Parameters
    ----------
    pieces : tuple of Region
        Closed, overlapping in their borders at most.
    n : int
        The number of variables.
    """

    pieces: tuple[Region, ...]
    n: int

    @property
    def dimension(self) -> int:
        """The largest dimension of a piece; -1 where there is none."""
        return max((piece.dimension for piece in self.pieces), default=-1)

    @property
    def unbounded(self) -> bool:
        """Whether some piece is."""
        return any(piece.status == "unbounded" for piece in self.pieces)

    @cached_property
    def volume(self) -> Fraction | None:
        """The exact n-dimensional volume; None where it is infinite."""
        solid = [piece for piece in self.pieces if piece.dimension == self.n]
        volumes = [piece.volume for piece in solid]
        return None if None in volumes else sum((value for value in volumes if value is not None), Fraction(0))

    @cached_property
    def measure(self) -> float | None:
        """The measure in the part's own dimension, rounded; None where it is infinite."""
        whole = [piece.measure for piece in self.pieces if piece.dimension == self.dimension]
        return None if None in whole else fsum(value for value in whole if value is not None)


def missing(whole: Region, other: Model) -> Part:
    """What ``whole`` allows and ``other`` forbids.

    Piece k satisfies the first k - 1 rows of the other model and violates row k, so that no two overlap. Rows that
    ``whole`` states itself forbid nothing in it and are passed over.

    Parameters
    ----------
    whole : Region
    other : Model
        With the same variables, in the same order.
    """
    model = whole.model
    own = {(row.coefficients, row.sense, row.rhs) for row in model.constraints}
    rows = [row for row in other.constraints if (row.coefficients, row.sense, row.rhs) not in own]
    pieces, kept = list[Region](), list[Constraint]()
    for row in rows if whole.status != "empty" else []:
        for broken in _broken(row):
            piece = region(_joined(model, [*kept, broken]))
            if _violates(piece, row):
                pieces.append(piece)
        kept.append(row)
    return Part(tuple(pieces), model.n)


def common(before: Model, after: Model) -> Region:
    """What both models allow, as the region of both sets of rows; a row stated by both is stated once."""
    own = {(row.coefficients, row.sense, row.rhs) for row in before.constraints}
    return region(
        _joined(before, [row for row in after.constraints if (row.coefficients, row.sense, row.rhs) not in own])
    )


def _broken(row: Constraint) -> tuple[Constraint, ...]:
    """The closed sides on which a row is broken."""
    senses: dict[Sense, tuple[Sense, ...]] = {"<=": (">=",), ">=": ("<=",), "==": ("<=", ">=")}
    return tuple(replace(row, sense=sense) for sense in senses[row.sense])


def _violates(piece: Region, row: Constraint) -> bool:
    """Whether a piece lies beyond the row's border anywhere, not only on it."""
    if piece.status == "empty":
        return False
    ways = [ray.direction for ray in piece.rays] + list(piece.lines)
    return any(row.slack(point) != 0 for point in piece.base) or any(dot(row.coefficients, way) for way in ways)


def _joined(model: Model, rows: list[Constraint]) -> Model:
    """The model with more rows, each under a name that is free."""
    taken = {row.name for row in model.constraints}
    added = []
    for row in rows:
        name, k = row.name, 2
        while name in taken:
            name, k = f"{row.name} ({k})", k + 1
        taken.add(name)
        added.append(replace(row, name=name))
    return replace(model, constraints=(*model.constraints, *added))
