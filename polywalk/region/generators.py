"""The points, rays and lines that generate a region, from cddlib's exact double description method.

What cddlib leaves to its caller is settled here: rows without variables, the apex of a cone at the origin (cddlib
lists no point for it), emptiness (no point and the origin outside), and regions with a line (their points, one for
each smallest face, and rays are only unique after the part along the lines is taken out). Active constraints are
found by their definition, a slack of zero: so one that only touches, or stands there twice, is never missed.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction
from math import lcm
from operator import itemgetter

from polywalk.budget import Budget
from polywalk.exact import Row, integer_row, primitive
from polywalk.model import Constraint, Model
from polywalk.region.engine import generators_of
from polywalk.region.sieve import Sieve
from polywalk.region.spans import echelon, reduced

Whole = Sequence[int]


@dataclass(frozen=True)
class Generators:
    """What generates a region: the convex hull of the points, plus the cone of the rays, plus the lines.

    ``active`` has one entry for each point, then for each ray: the places in ``model.constraints`` that are active
    there. Points and rays are sorted.
    """

    points: tuple[Row, ...] = ()
    rays: tuple[Row, ...] = ()
    lines: tuple[Row, ...] = ()
    active: tuple[tuple[int, ...], ...] = ()


def generators(model: Model, budget: Budget | None = None) -> Generators:
    """The generators of the model's region; none at all where it is empty."""
    whole = [_whole(row) for row in model.constraints]
    kept = [place for place, row in enumerate(whole) if any(row[1:])]
    origin = (Fraction(0),) * model.n
    if len(kept) < len(whole) and not all(row.holds(origin) for row in model.constraints if row.is_constant):
        return Generators()
    if not kept:
        return Generators(points=(origin,), lines=_units(model.n), active=((),))
    equal = frozenset([k for k, place in enumerate(kept) if model.constraints[place].sense == "=="])
    sieve = Sieve([whole[place] for place in kept])
    array, straight = generators_of(sieve, equal, budget)
    along = echelon([tuple(array[k][1:]) for k in straight])
    bent = [reduced(row, along, 1) for k, row in enumerate(array) if k not in straight] if straight else array
    heads = [integer_row(row)[0] for row in bent]
    points = [(tuple(row[1:]), head) for row, head in zip(bent, heads, strict=True) if head[0]]
    rays = [(primitive(row[1:]), head) for row, head in zip(bent, heads, strict=True) if not head[0]]
    if not points:
        if not all(row.holds(origin) for row in model.constraints):
            return Generators()
        points = [(origin, (1, *(0,) * model.n))]
    ordered = [*sorted(points, key=itemgetter(0)), *sorted(rays, key=itemgetter(0))]
    return Generators(
        points=tuple([place for place, head in ordered if head[0]]),
        rays=tuple([place for place, head in ordered if not head[0]]),
        lines=tuple([primitive(row) for row in along[0]]),
        active=tuple([tuple([kept[k] for k in found]) for found in sieve.zeros([head for _, head in ordered])]),
    )


def _whole(row: Constraint) -> list[int]:
    """The constraint as integers (b, a) with b + a.x >= 0 inside; mostly it is written in integers already."""
    b, a = row.rhs, row.coefficients
    if lcm(b.denominator, *[value.denominator for value in a]) == 1:
        end, slopes = b.numerator, [value.numerator for value in a]
    else:
        (end, *slopes), _ = integer_row((b, *a))
    return [-end, *slopes] if row.sense == ">=" else [end, *[-value for value in slopes]]


def _units(n: int) -> tuple[Row, ...]:
    return tuple(tuple(Fraction(int(i == j)) for j in range(n)) for i in range(n))
