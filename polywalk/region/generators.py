"""The points, rays and lines that generate a region, from cddlib's exact double description method.

What cddlib leaves to its caller is settled here: rows without variables, the apex of a cone at the origin (cddlib
lists no point for it), emptiness (no point and the origin outside), and regions with a line (their points, one for
each minimal face, and rays are only unique after the part along the lines is taken out).
"""

from __future__ import annotations

from collections.abc import Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass
from fractions import Fraction

from polywalk.budget import Budget
from polywalk.exact import Row, integer_row, primitive
from polywalk.model import Model
from polywalk.region.engine import Listed, generators_of
from polywalk.region.spans import echelon, reduced

Pairs = tuple[tuple[int, int], ...]
Member = tuple[bool, Row, tuple[int, ...], int]


@dataclass(frozen=True)
class Generators:
    """What generates a region: the convex hull of the points, plus the cone of the rays, plus the lines.

    ``active`` has one entry for each point, then for each ray: the places in ``model.constraints`` that are active
    there. ``pairs`` are the generators joined by an edge, numbered the same way; there are none beside a line.
    """

    points: tuple[Row, ...] = ()
    rays: tuple[Row, ...] = ()
    lines: tuple[Row, ...] = ()
    active: tuple[tuple[int, ...], ...] = ()
    pairs: Pairs = ()


def generators(model: Model, budget: Budget | None = None) -> Generators:
    """The generators of the model's region, points and rays sorted; none at all where it is empty."""
    rows = [row.inward for row in model.constraints]
    kept = [place for place, (_, row) in enumerate(rows) if any(row)]
    constant = [row for row in model.constraints if row.is_constant] if len(kept) < len(rows) else []
    origin = (Fraction(0),) * model.n
    if not all(row.holds(origin) for row in constant):
        return Generators()
    if not kept:
        return Generators(points=(origin,), lines=_units(model.n), active=((),))
    whole = [integer_row((rows[place][0], *rows[place][1]))[0] for place in kept]
    equal = frozenset(k for k, place in enumerate(kept) if model.constraints[place].sense == "==")
    listed = generators_of(whole, equal, budget)
    if not any(row[0] for row in listed[0]) and not all(row.holds(origin) for row in model.constraints):
        return Generators()
    return _tidied(listed, kept, model.n, [k for k, row in enumerate(whole) if row[0] == 0])


def _tidied(listed: Listed, kept: list[int], n: int, homogeneous: list[int]) -> Generators:
    """Points and rays told apart and sorted, constraints and generators renumbered."""
    array, straight, incidence, adjacency = listed
    lines = [tuple(array[k][1:]) for k in sorted(straight)]
    along = echelon(lines) if lines else None
    members: list[Member] = []
    for k, row in enumerate(array):
        if k not in straight:
            place = tuple(row[1:]) if along is None else reduced(tuple(row[1:]), along)
            # cddlib counts the plane at infinity as one more row; it is none of ours
            active = tuple(kept[i] for i in sorted(incidence[k]) if i < len(kept))
            members.append((not row[0], place if row[0] else primitive(place), active, k))
    if all(is_ray for is_ray, *_ in members):
        apex = (Fraction(0),) * n
        members.append((False, apex, tuple(kept[i] for i in homogeneous), len(array)))
        adjacency = [*adjacency, {k for k in range(len(array)) if k not in straight}]
    members.sort(key=lambda member: member[:2])
    number = {member[3]: position for position, member in enumerate(members)}
    count = sum(not member[0] for member in members)
    return Generators(
        points=tuple(member[1] for member in members[:count]),
        rays=tuple(member[1] for member in members[count:]),
        lines=() if along is None else tuple(primitive(row) for row in along[0]),
        active=tuple(member[2] for member in members),
        pairs=() if lines else _pairs(members, adjacency, number, count),
    )


def _pairs(members: list[Member], adjacency: Sequence[AbstractSet[int]], number: dict[int, int], count: int) -> Pairs:
    """Edges as pairs of generators, the first of them a point: two rays only meet at infinity."""
    found: list[tuple[int, int]] = []
    for position, member in enumerate(members[:count]):
        others = sorted(number[k] for k in adjacency[member[3]])
        found.extend((position, other) for other in others if other > position)
    return tuple(found)


def _units(n: int) -> tuple[Row, ...]:
    return tuple(tuple(Fraction(int(i == j)) for j in range(n)) for i in range(n))
