"""The nearest allowed point, exactly: in the Euclidean norm and in the max-norm.

Euclidean: the nearest point is the projection onto the plane of some of the constraints, with multipliers that push
inward. Starting from the equalities, the working set grows by a violated constraint and drops what pushes the wrong
way (a dual active-set method), all in fractions; every answer is proved by its multipliers.

References
----------
Karush 1939; Kuhn & Tucker, Nonlinear programming, 1951 (the conditions that prove it).
Goldfarb & Idnani, A numerically stable dual method for solving strictly convex quadratic programs, Math. Program.
27, 1983.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction

from polywalk.exact import Row, dot
from polywalk.linear import optimum
from polywalk.model import Constraint, Model, Objective


@dataclass(frozen=True)
class Nearest:
    """The allowed point nearest to a plan.

    Parameters
    ----------
    point : (n,) tuple of Fraction
    distance_squared : Fraction
        Of the Euclidean distance.
    multipliers : tuple of (str, Fraction)
        The constraints that hold it back: the step from the plan to the point is the sum of the multipliers times the
        inward directions (any sign for an equality, else positive), which proves that no point is nearer.
    """

    point: Row
    distance_squared: Fraction
    multipliers: tuple[tuple[str, Fraction], ...] = ()


def nearest(model: Model, plan: Row) -> Nearest | None:
    """The allowed point nearest to a plan in the Euclidean norm; None where no point is allowed.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.nearest import nearest
    >>> model = pw.from_algebra(constraints={"labour": "x + y <= 4"}, bounds={"x": (0, None), "y": (0, None)})
    >>> nearest(model, model.point([4, 2])).point
    (Fraction(3, 1), Fraction(1, 1))
    """
    if optimum(model.without_objective()).outcome == "infeasible":
        return None
    rows = [row for row in model.constraints if not row.is_constant]
    active: list[Constraint] = []
    weights: list[Fraction] = []
    point = plan
    while (worst := _worst(rows, point)) is not None:
        point, active, weights = _added(point, active, weights, worst)
    step = tuple(b - a for a, b in zip(plan, point, strict=True))
    named = tuple((row.name, weight) for row, weight in zip(active, weights, strict=True) if weight)
    return Nearest(point, dot(step, step), named)


def _worst(rows: Sequence[Constraint], point: Row) -> Constraint | None:
    """The violated constraint that lies the farthest away; equalities, which never leave again, come first."""
    found = [(row.sense == "==", row.slack(point) ** 2 / dot(row.coefficients, row.coefficients), row) for row in rows]
    violated = [one for one in found if not one[2].holds(point)]
    return max(violated, key=lambda one: one[:2])[2] if violated else None


def _added(
    point: Row, active: list[Constraint], weights: list[Fraction], extra: Constraint
) -> tuple[Row, list[Constraint], list[Fraction]]:
    """The nearest point that the active constraints and one more allow: full and partial steps of Goldfarb & Idnani."""
    active, weights, mine = list(active), list(weights), Fraction(0)
    turned = extra.sense == "==" and extra.slack(point) > 0
    push = extra.coefficients if turned else _slope(extra)
    while True:
        slopes = [_slope(row) for row in active]
        shares = _shares(slopes, push)
        rest = _without(push, slopes, shares)
        falling = [(weights[k] / shares[k], k) for k in range(len(active)) if shares[k] > 0 and active[k].sense != "=="]
        reach = min(falling, default=None)
        gap = abs(extra.slack(point))
        full = gap / dot(rest, push) if any(rest) else None
        if full is None and reach is None:
            raise ValueError("the constraints contradict each other")  # asked before: not reached
        length = full if reach is None or (full is not None and full <= reach[0]) else reach[0]
        assert length is not None
        point = tuple(x + length * d for x, d in zip(point, rest, strict=True))
        weights = [weight - length * share for weight, share in zip(weights, shares, strict=True)]
        mine += length
        if length == full:
            return point, [*active, extra], [*weights, -mine if turned else mine]
        assert reach is not None
        del active[reach[1]], weights[reach[1]]


def _slope(row: Constraint) -> Row:
    return row.inward[1]


def _shares(slopes: Sequence[Row], push: Row) -> list[Fraction]:
    """The combination of the slopes that is nearest to the push: (S S^T) r = S push, by exact elimination."""
    table = [[*(dot(a, b) for b in slopes), dot(a, push)] for a in slopes]
    for k in range(len(table)):
        lead = table[k][k]
        table[k] = [value / lead for value in table[k]]
        for i, line in enumerate(table):
            if i != k and line[k]:
                factor = line[k]
                table[i] = [value - factor * top for value, top in zip(line, table[k], strict=True)]
    return [line[-1] for line in table]


def _without(push: Row, slopes: Sequence[Row], shares: Sequence[Fraction]) -> Row:
    rest = list(push)
    for slope, share in zip(slopes, shares, strict=True):
        rest = [a - share * b for a, b in zip(rest, slope, strict=True)]
    return tuple(rest)


def nearest_max(model: Model, plan: Row) -> tuple[Row, Fraction] | None:
    """An allowed point whose largest deviation from the plan is least, and that deviation; None where there is none.

    An exact linear program: minimize t with -t <= x_j - plan_j <= t. Of several such points, one.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.nearest import nearest_max
    >>> model = pw.from_algebra(constraints={"labour": "x + y <= 4"}, bounds={"x": (0, None), "y": (0, None)})
    >>> nearest_max(model, model.point([4, 2]))
    ((Fraction(3, 1), Fraction(1, 1)), Fraction(1, 1))
    """
    n, one, zero = model.n, Fraction(1), Fraction(0)
    rows = [Constraint(f"row {k}", (*r.coefficients, zero), r.sense, r.rhs) for k, r in enumerate(model.constraints)]
    for j, value in enumerate(plan):
        unit = [Fraction(int(i == j)) for i in range(n)]
        rows.append(Constraint(f"above {j}", (*unit, -one), "<=", value))
        rows.append(Constraint(f"below {j}", (*unit, one), ">=", value))
    names = tuple(f"x{j}" for j in range(n))
    best = optimum(Model((*names, "most"), tuple(rows), Objective("min", (*[zero] * n, one))))
    return None if best.point is None else (best.point[:n], best.point[n])
