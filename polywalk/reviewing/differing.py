"""Why two answers differ, one plain sentence a reason."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING

from polywalk.reviewing.recounting import apart
from polywalk.reviewing.telling import listed
from polywalk.reviewing.tolerances import TOLERANCES, within
from polywalk.reviewing.worth import meeting

if TYPE_CHECKING:
    from polywalk.reviewing.explain import Answer
    from polywalk.reviewing.places import Place
    from polywalk.reviewing.pricing import Pricing
    from polywalk.reviewing.ranges import BasisRanges
    from polywalk.reviewing.sensitivity import Sensitivity


def differing(best: Sensitivity, first: Answer, second: Answer) -> tuple[str, ...]:
    """The reasons, for points, then prices, then bases; a sentence too for what does not differ."""
    found = list[str]()
    if first.point and second.point:
        found += _points(best, first.point, second.point)
    if first.prices and second.prices:
        found += _prices(best, first.prices, second.prices)
    if first.basis and second.basis:
        found += _bases(first.basis, second.basis)
    return tuple(found) or ("the two answers give nothing in common that could be compared",)


def _points(best: Sensitivity, one: Place, two: Place) -> Iterator[str]:
    if one.right != two.right:
        yield f"only the {'first' if one.right else 'second'} point is an optimum, so they need not agree"
    elif not one.right:
        yield "neither point is an optimum"
    elif all(within(a - b, a, TOLERANCES.feasibility) for a, b in zip(one.point, two.point, strict=True)):
        yield "both give the same point" if one.point == two.point else "both give the same point, but for rounding"
    elif best.tied:
        names = listed(corner.name for corner in best.best)
        yield (
            f"both points are right: the optimum is tied, every mix of {names}"
            f"{' and what lies beyond' if best.directions else ''} is as good, and nothing in the model prefers one"
        )
    else:
        yield "the points differ by more than rounding, their objectives do not: the optimum is nearly tied"


def _prices(best: Sensitivity, one: Pricing, two: Pricing) -> Iterator[str]:
    pairs = list(zip(best.model.constraints, one.prices, two.prices, strict=True))
    moved = [row.name for row, a, b in pairs if not within(a - b, max(abs(a), abs(b)), TOLERANCES.price)]
    if not moved:
        yield "both give the same prices" + ("" if apart(one.prices, two.prices) == 0 else ", but for rounding")
    elif one.right and two.right:
        yield (
            f"both lists of prices are right, though those of {listed(moved)} differ: optimal prices are not unique, "
            f"because {meeting(best)}"
        )
    elif one.right or two.right:
        which, other = ("first", two) if one.right else ("second", one)
        told = f"; the other list is right {other.convention}" if other.convention else ""
        yield f"only the {which} list of prices is right as it stands{told}"
    elif one.convention and two.convention:
        yield f"neither list of prices is right as it stands; one is {one.convention}, the other {two.convention}"
    else:
        yield "neither list of prices is right"


def _bases(one: BasisRanges, two: BasisRanges) -> Iterator[str]:
    if one.held == two.held:
        yield "both end with the same basis"
    elif one.point == two.point and one.optimal and two.optimal:
        same = one.prices == two.prices
        yield (
            "both bases are optimal and meet in the same point: it is degenerate, and "
            f"{'their prices agree' if same else 'each basis has prices and ranges of its own'}"
        )
    elif one.optimal and two.optimal:
        yield "both bases are optimal, in different points: the optimum is tied"
    else:
        ends = [name for name, basis in (("first", one), ("second", two)) if basis.optimal]
        yield f"only the {ends[0]} basis is optimal" if ends else "neither basis is optimal"
