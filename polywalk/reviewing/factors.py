"""Hints at slips of the unit: two constraints that agree in all numbers but one, which is off by a common factor."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from math import gcd

from polywalk.exact import short
from polywalk.model import Constraint
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding

FACTORS: dict[Fraction, str] = {
    Fraction(60): "minutes in an hour",
    Fraction(100): "percent, or cents",
    Fraction(1000): "kilo",
    Fraction(10**6): "mega",
    Fraction(18, 5): "MJ in a kWh, or km/h in a m/s",
    Fraction(3600): "seconds in an hour",
    Fraction(24): "hours in a day",
    Fraction(7): "days in a week",
    Fraction(365): "days in a year",
    Fraction(8760): "hours in a year",
}
"""Factors between units that are often mixed up; each is meant with its inverse (0.2778 is 1/3.6)."""

CLOSE = Fraction(1, 1000)
"""How far a typed factor may be off relatively: 0.2778 for 1/3.6."""


def unit_slips(case: Case) -> Iterator[Finding]:
    """Pairs of constraints with the same variables that agree but for one number, at least two numbers agreeing."""
    seen: dict[object, list[tuple[Constraint, Fraction]]] = {}
    told = set[tuple[str, str]]()
    for k, row in case.rows:
        b, *a = case.whole[k][0]
        numbers = (*a, -b)
        support = [j for j, value in enumerate(numbers) if value]
        for left_out in support if len(support) > 2 else ():
            rest = [numbers[j] if j != left_out else 0 for j in range(len(numbers))]
            size = gcd(*rest) * (1 if next(value for value in rest if value) > 0 else -1)
            key, share = (left_out, *[value // size for value in rest]), Fraction(numbers[left_out], size)
            for other, one in seen.get(key, ()):
                found = _factor(share / one)
                if found is not None and (other.name, row.name) not in told:
                    told.add((other.name, row.name))
                    yield _hint(case, other, row, left_out, found)
            seen.setdefault(key, []).append((row, share))


def _factor(ratio: Fraction) -> tuple[Fraction, Fraction] | None:
    """The common factor (or its inverse) that a ratio is, with the ratio; None where it is none."""
    for factor in FACTORS:
        for true in (factor, 1 / factor):
            if abs(ratio / true - 1) <= CLOSE:
                return factor, ratio
    return None


def _hint(
    case: Case, first: Constraint, second: Constraint, left_out: int, found: tuple[Fraction, Fraction]
) -> Finding:
    factor, ratio = found
    names: tuple[str, ...] = case.model.variables
    where = f"the coefficient of {names[left_out]}" if left_out < len(names) else "the right-hand side"
    return Finding(
        "unit-slip",
        f"hint: {first.name} and {second.name} differ by {short(ratio)} in {where}",
        f"{case.told(first)} and {case.told(second)} agree in every proportion but "
        "one: "
        f"{where} differs by a factor of {short(ratio)}, which is the factor between common units ({FACTORS[factor]}). "
        "This is a hint, not a proof.",
        "check the units of that number in both.",
        (first.name, second.name),
        names[left_out : left_out + 1],
        amounts=(("factor", ratio),),
    )
