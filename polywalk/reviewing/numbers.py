"""Numbers that make trouble: coefficients of very different size, nearly parallel constraints, thin regions."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from fractions import Fraction
from math import asin, degrees, sqrt

import numpy as np

from polywalk.exact import Row, dot, short
from polywalk.model import Constraint
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding
from polywalk.reviewing.proofs import place, upper


def spread(case: Case) -> Iterator[Finding]:
    """Coefficients of very different size, in a row and across the model."""
    limit, names = case.limits.spread, case.model.variables
    ends = []
    for k, row in case.rows:
        (_, *a), scale = case.whole[k]
        sizes = [(abs(value), name) for value, name in zip(a, names, strict=True) if value]
        (least, small), (largest, large) = min(sizes), max(sizes)
        ends.append((Fraction(least, scale), Fraction(largest, scale), row.name))
        if largest > limit * least:
            yield _wide_row(row, (ends[-1][0], small), (ends[-1][1], large))
    if ends:
        low, high = min(ends), max(ends, key=lambda end: end[1])
        if high[1] > limit * low[0]:
            yield _wide_model((low[0], low[2]), (high[1], high[2]))


def _wide_row(row: Constraint, least: tuple[Fraction, str], largest: tuple[Fraction, str]) -> Finding:
    ratio = largest[0] / least[0]
    return Finding(
        "wide-row",
        f"{row.name} mixes coefficients of {short(least[0])} and {short(largest[0])}",
        f"in {row.name} the coefficient of {largest[1]} is {short(ratio)} times that of {least[1]}: within a solver's "
        "tolerance the smaller term is lost.",
        "choose units in which both are of similar size, or check for a unit slip.",
        (row.name,),
        (largest[1], least[1]),
        amounts=(("ratio", ratio),),
    )


def _wide_model(least: tuple[Fraction, str], largest: tuple[Fraction, str]) -> Finding:
    ratio = largest[0] / least[0]
    return Finding(
        "wide-model",
        f"coefficients run from {short(least[0])} to {short(largest[0])}",
        f"the largest coefficient of the model ({short(largest[0])} in {largest[1]}) is {short(ratio)} times the "
        "smallest "
        f"({short(least[0])} in {least[1]}).",
        "choose units that bring them together.",
        (largest[1], least[1]),
        amounts=(("ratio", ratio),),
    )


def nearly_parallel(case: Case) -> Iterator[Finding]:
    """Pairs of constraints with almost, but not quite, the same direction; decided exactly after a rough sieve."""
    if len(case.rows) < 2:
        return
    limit = case.limits.angle**2
    rows = [row for _, row in case.rows]
    whole = np.array([_unit(case.whole[k][0][1:]) for k, _ in case.rows])
    near = np.abs(whole @ whole.T) > 1 - 2 * float(limit) - 1e-9
    for i, k in zip(*np.nonzero(np.triu(near, 1)), strict=True):
        sine = sine_squared(rows[i].coefficients, rows[k].coefficients)
        if 0 < sine < limit:
            yield _parallel(case, rows[i], rows[k], sine)


def _unit(row: Sequence[int]) -> list[float]:
    """Of length 1; divided as integers first, so that no size overflows."""
    largest = max(map(abs, row))
    scaled = [value / largest for value in row]
    length = sqrt(sum(value * value for value in scaled))
    return [value / length for value in scaled]


def sine_squared(left: Row, right: Row) -> Fraction:
    """The square of the sine of the angle between two directions, exact."""
    return 1 - dot(left, right) ** 2 / (dot(left, left) * dot(right, right))


def _parallel(case: Case, first: Constraint, second: Constraint, sine: Fraction) -> Finding:
    angle = degrees(asin(sqrt(sine)))
    return Finding(
        "nearly-parallel",
        f"{first.name} and {second.name} are parallel up to {angle:.2g} degrees",
        f"{case.told(first)} and {case.told(second)} differ in direction by "
        f"{angle:.2g} "
        "degrees only: where they meet depends strongly on the last digits of their numbers.",
        "if they are meant to be the same or parallel, use the same numbers in full; else check both.",
        (first.name, second.name),
        amounts=(("square of the sine of the angle", sine),),
    )


def sliver(case: Case) -> Iterator[Finding]:
    """A bounded region that is very thin across one of its constraints."""
    region, n = case.region, case.model.n
    if n < 2 or region.status != "bounded" or region.dimension != n:
        return
    length = max(high - low for low, high in region.ranges.values() if low is not None and high is not None)
    places = {row.name: k for k, row in case.rows}
    thin = []
    for facet in region.facets:
        k = places[facet.constraints[0]]
        width, corner = case.farthest(k)
        row = case.model.constraints[k]
        thin.append((width**2 / dot(row.coefficients, row.coefficients), corner, row))
    squared, corner, row = min(thin, key=lambda item: item[0])
    if squared < (case.limits.sliver * length) ** 2:
        yield _sliver(case, row, squared, corner, length)


def _sliver(case: Case, row: Constraint, squared: Fraction, corner: int, length: Fraction) -> Finding:
    point = case.region.base[corner]
    width = sqrt(squared)
    return Finding(
        "sliver",
        f"the region is a sliver: {width:.3g} wide and {short(length)} long",
        f"no plan is farther than {width:.3g} from {case.told(row)}, the farthest is "
        f"{place(case.model, point)}; yet the region is {short(length)} long. Lengths are taken in the variables' "
        "units.",
        "small errors in a number may empty it; check the constraints on both sides, and the units.",
        (row.name,),
        points=(point,),
        amounts=(
            ("square of the width", squared),
            ("length", length),
            ("farthest slack", abs(upper(row).rhs - dot(upper(row).coefficients, point))),
        ),
    )
