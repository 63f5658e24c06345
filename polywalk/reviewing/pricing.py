"""Which optimal dual a list of prices is: a mix of the extreme optimal duals, or how far it is from the nearest one."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field, replace
from fractions import Fraction
from typing import cast

from polywalk.errors import ModelError
from polywalk.exact import Row, exact
from polywalk.linear import optimum
from polywalk.model import Constraint, Model, Objective
from polywalk.reviewing.duals import OptimalDuals, keeps_sign
from polywalk.reviewing.tolerances import TOLERANCES
from polywalk.reviewing.verdicts import Verdict, judged, worst

ONE, ZERO = Fraction(1), Fraction(0)


@dataclass(frozen=True)
class Pricing:
    """The verdict on a list of prices.

    Parameters
    ----------
    model : Model
    prices : (m,) tuple of Fraction
        One a constraint, in the model's order.
    derived : tuple of str
        Bounds whose price was not given and follows: what the other prices leave of the variable's cost.
    verdict : Verdict
        Against the nearest optimal dual; the amount is the largest difference of a single price.
    nearest : (m,) tuple of Fraction
        That dual.
    mix : tuple of (int, Fraction)
        It as a mix of the extreme optimal duals: numbers in ``OptimalDuals.corners``, and shares that add up to 1 (more
        may be added along ``OptimalDuals.directions``). Empty where the extreme ones are too many to list.
    convention : str
        "" where the prices are right as they are, or wrong anyhow; else in which sign convention they are right.
    wrong_signs : tuple of str
        Constraints whose price has a sign that no optimum allows.
    """

    model: Model = field(repr=False)
    prices: Row
    derived: tuple[str, ...]
    verdict: Verdict
    nearest: Row
    mix: tuple[tuple[int, Fraction], ...]
    convention: str
    wrong_signs: tuple[str, ...]

    @property
    def right(self) -> bool:
        """Whether they are optimal prices, exactly or within solver tolerance, in polywalk's sign convention."""
        return self.verdict.right


def pricing(duals: OptimalDuals, given: object) -> Pricing:
    """Which optimal dual the given prices are; see ``explain`` for what may be given."""
    model = duals.model
    named = _named(model, given)
    open_ = _left_open(model, named)
    verdict, nearest = _nearest(duals, named, open_)
    mix = _mixed(duals, nearest)
    whole = _filled(model, named, dict(zip(open_, (nearest[i] for i in open_), strict=True)))
    derived = tuple(model.constraints[i].name for i in open_ if nearest[i]) if verdict.right else ()
    goal = duals.goal.goal
    wrong = tuple(name for name, price in named.items() if not keeps_sign(model.constraint(name).sense, goal, price))
    convention = "" if verdict.right else _convention(duals, named, open_)
    return Pricing(model, whole, derived, verdict, nearest, mix, convention, wrong)


def is_bound(model: Model, row: Constraint) -> bool:
    """Whether the constraint was given as a bound, to go by its name ("pump upper"), and not as a row of the model."""
    found = row.bounds()
    return found is not None and row.name == f"{model.variables[found[0]]} {found[1]}"


def _named(model: Model, given: object) -> dict[str, Fraction]:
    """The given prices by constraint; a sequence may leave out the bounds."""
    if isinstance(given, Mapping):
        return {model.constraint(cast(str, name)).name: exact(value) for name, value in given.items()}
    if isinstance(given, str) or not isinstance(given, Iterable):
        raise ModelError(
            f"expected prices as a mapping from constraint to number or as a sequence, got {given!r}.", given
        )
    values = [exact(value) for value in given]
    rows = list(model.constraints)
    plain = [row for row in rows if not is_bound(model, row)]
    for names in (rows, plain):
        if len(values) == len(names):
            return {row.name: value for row, value in zip(names, values, strict=True)}
    without = f", or {len(plain)} without the bounds ({', '.join(row.name for row in plain)})" if plain != rows else ""
    raise ModelError(
        f"expected {len(rows)} prices, one a constraint ({', '.join(row.name for row in rows)}){without}; "
        f"got {len(values)}.",
        given,
    )


def _left_open(model: Model, named: Mapping[str, Fraction]) -> tuple[int, ...]:
    """Places of the bounds, rows of a single variable among them, whose price was not given and follows."""
    rows = enumerate(model.constraints)
    return tuple(i for i, row in rows if row.bounds() is not None and row.name not in named)


def _filled(model: Model, named: Mapping[str, Fraction], others: Mapping[int, Fraction]) -> Row:
    """One price a constraint; those neither given nor left open are 0."""
    return tuple(named.get(row.name, others.get(i, ZERO)) for i, row in enumerate(model.constraints))


def _nearest(duals: OptimalDuals, named: Mapping[str, Fraction], open_: tuple[int, ...]) -> tuple[Verdict, Row]:
    """The optimal dual whose largest difference, each relative to its price, is least: a linear program."""
    prices = {i: price for i, price in enumerate(_filled(duals.model, named, {})) if i not in open_}
    found = optimum(_distance(duals, prices)).point
    if found is None:
        raise AssertionError("some optimal dual is nearest")
    values = dict(zip(duals.tight, found, strict=False))
    nearest = tuple(values.get(i, ZERO) for i in range(len(duals.model.constraints)))
    return worst([judged(price - nearest[i], price, TOLERANCES.price) for i, price in prices.items()]), nearest


def _distance(duals: OptimalDuals, prices: Mapping[int, Fraction]) -> Model:
    """Minimize the relative distance, a last variable, between the prices and an optimal dual."""
    face = duals.face
    rows = [replace(row, coefficients=(*row.coefficients, ZERO)) for row in face.constraints]
    for i, price in prices.items():
        size = max(ONE, abs(price))
        part = tuple(Fraction(int(place == i)) for place in duals.tight) or (ZERO,)
        rows.append(Constraint(f"above {i}", (*part, size), ">=", price))
        rows.append(Constraint(f"below {i}", (*part, -size), "<=", price))
    distance = (*(ZERO,) * face.n, ONE)
    rows.append(Constraint("distance", distance, ">=", ZERO))
    return Model((*face.variables, "distance"), tuple(rows), Objective("min", distance))


def _mixed(duals: OptimalDuals, dual: Row) -> tuple[tuple[int, Fraction], ...]:
    """An optimal dual as a mix of the extreme ones; empty where these are too many to list."""
    if not duals.listable:
        return ()
    made = [*duals.corners, *duals.directions]
    count, corners = len(made), len(duals.corners)
    unit = [tuple(Fraction(int(i == k)) for i in range(count)) for k in range(count)]
    rows = [Constraint(f"share {k}", unit[k], ">=", ZERO) for k in range(count)]
    rows.append(Constraint("whole", tuple(Fraction(int(k < corners)) for k in range(count)), "==", ONE))
    rows += [Constraint(f"price {i}", tuple(row[i] for row in made), "==", dual[i]) for i in duals.tight]
    found = optimum(Model(tuple(f"v{k}" for k in range(count)), tuple(rows))).point
    if found is None:
        raise AssertionError("every optimal dual is a mix of the extreme ones")
    return tuple((k, share) for k, share in enumerate(found[:corners]) if share)


def _convention(duals: OptimalDuals, named: Mapping[str, Fraction], open_: tuple[int, ...]) -> str:
    """The sign convention in which prices that are wrong as they stand are right; "" if there is none."""
    turned = {name: -price for name, price in named.items()}
    if _nearest(duals, turned, open_)[0].right:
        return "with all signs turned round"
    model, goal = duals.model, duals.goal.goal
    fits = {name: keeps_sign(model.constraint(name).sense, goal, price) for name, price in named.items()}
    sizes = {name: price if fits[name] else -price for name, price in named.items()}
    if sizes != named and _nearest(duals, sizes, open_)[0].right:
        return "by their sizes, with the sign each constraint's sense asks for"
    return ""
