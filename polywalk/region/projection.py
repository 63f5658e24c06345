"""The exact projection of a region onto some of its variables, as a region of its own."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from fractions import Fraction

from polywalk.budget import Budget
from polywalk.errors import DuplicateName, ModelError
from polywalk.exact import Row, dot, integer_row, primitive
from polywalk.model import Constraint, Model, Objective
from polywalk.region.engine import rows_of
from polywalk.region.enumeration import region
from polywalk.region.results import Region
from polywalk.region.spans import combination


def project(whole: Region, onto: Sequence[str], budget: Budget | None = None) -> Region:
    """The region's shadow: all values of the chosen variables that some point of the region has.

    Each constraint of the result is named after the original ones that are active all over the part of the region
    that lies above it, joined with " & ". The objective stays only where it depends on the chosen variables alone.

    Parameters
    ----------
    whole : Region
    onto : sequence of str
        Names of variables, in the order wanted.
    budget : Budget, optional
        As in `region`.

    Returns
    -------
    Region
        Of a model whose variables are ``onto`` and whose constraints are the facets and equalities of the shadow.

    Raises
    ------
    UnknownName, DuplicateName, ModelError
        A name that is no variable, a name given twice, no name at all.
    BudgetError
        The budget gave out before the facets were listed.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.model import Constraint, Model
    >>> from polywalk.region import project, region
    >>> one, zero = Fraction(1), Fraction(0)
    >>> rows = (Constraint("x lower", (one, zero), ">=", zero), Constraint("y lower", (zero, one), ">=", zero),
    ...         Constraint("labour", (one, one), "<=", Fraction(4)))
    >>> print(project(region(Model(("x", "y"), rows)), ["x"]).model)
    no objective
    constraint        rule   origin
    x lower           x ≥ 0
    y lower & labour  x ≤ 4

    References
    ----------
    Ziegler, Lectures on Polytopes, 1995, lecture 1 (a projection of a polyhedron is one; its facets as in `region`).
    """
    model = whole.model
    places = _places(model, onto)
    rows = _rows(whole, places, budget) if whole.base else [_nothing(len(places))]
    names = tuple(model.variables[j] for j in places)
    kept = Model(
        variables=names,
        constraints=tuple(rows),
        objective=_objective(model, places),
        units=tuple(pair for pair in model.units if pair[0] in names),
        integers=tuple(name for name in model.integers if name in names),
        name=model.name,
    )
    return region(kept, budget)


def _places(model: Model, onto: Sequence[str]) -> list[int]:
    if isinstance(onto, str) or not onto:
        raise ModelError(f"expected the names of the variables to keep, as a list, got {onto!r}.", onto)
    for name in onto:
        if list(onto).count(name) > 1:
            raise DuplicateName(f"the variable {name!r} is given twice; name each one once.", name)
    return [model.index(name) for name in onto]


def _objective(model: Model, places: list[int]) -> Objective | None:
    goal = model.objective
    if goal is None or any(value for j, value in enumerate(goal.coefficients) if j not in places):
        return None
    return replace(goal, coefficients=tuple(goal.coefficients[j] for j in places))


def _rows(whole: Region, places: list[int], budget: Budget | None) -> list[Constraint]:
    """One constraint for each facet and equality of the shadow, in the order of the original ones."""
    shadows = [(head, *(row[j] for j in places)) for head, row in _generated(whole)]
    kept = [k for k, row in enumerate(shadows) if any(row)]
    lines = frozenset(i for i, k in enumerate(kept) if k >= len(shadows) - len(whole.lines))
    hull, equal = rows_of([integer_row(shadows[k])[0] for k in kept], lines, budget)
    found = []
    for k, row in enumerate(hull):
        if any(row[1:]):
            origin = _combined(whole, places, row[1:]) if k in equal else _above(whole, shadows, tuple(row))
            found.append((origin, tuple(row), k in equal))
    found.sort()
    names = _unique([" & ".join(whole.model.constraints[place].name for place in origin) for origin, *_ in found])
    return [_constraint(name, row, equal) for name, (_, row, equal) in zip(names, found, strict=True)]


def _generated(whole: Region) -> list[tuple[Fraction, Row]]:
    """Every generator with 1 before a point and 0 before a direction: points, then rays, then lines."""
    one, zero = Fraction(1), Fraction(0)
    directions = [ray.direction for ray in whole.rays] + list(whole.lines)
    return [(one, point) for point in whole.base] + [(zero, direction) for direction in directions]


def _above(whole: Region, shadows: list[Row], row: Row) -> list[int]:
    """The constraints, by place, that are active all over the face of the region that lies above this facet."""
    active = [set(places) for places, shadow in zip(whole._active, shadows, strict=False) if not dot(row, shadow)]
    everywhere = set.intersection(*map(set, whole._active))
    return sorted(set.intersection(*active) - everywhere)


def _combined(whole: Region, places: list[int], row: Sequence[Fraction]) -> list[int]:
    """Equalities of the region, by place, that together make this equality of its shadow."""
    everywhere = sorted(set.intersection(*map(set, whole._active)))
    target = [Fraction(0)] * whole.model.n
    for j, value in zip(places, row, strict=True):
        target[j] = value
    parts = combination([whole.model.constraints[place].coefficients for place in everywhere], tuple(target))
    return [place for place, part in zip(everywhere, parts or (), strict=True) if part]


def _constraint(name: str, row: Row, is_equality: bool) -> Constraint:
    """The row b + a.x >= 0 or = 0 as people write it: in the smallest integers, its first coefficient positive."""
    b, *inward = primitive(row)
    if next(value for value in inward if value) > 0:
        return Constraint(name, tuple(inward), "==" if is_equality else ">=", -b)
    return Constraint(name, tuple(-value for value in inward), "==" if is_equality else "<=", b)


def _nothing(n: int) -> Constraint:
    return Constraint("empty region", (Fraction(0),) * n, "<=", Fraction(-1))


def _unique(names: list[str]) -> list[str]:
    return [name if name not in names[:k] else f"{name} ({k + 1})" for k, name in enumerate(names)]
