"""Proofs anyone can check by hand: of emptiness (Farkas), of unboundedness (a ray), of an optimum (a dual).

A proof is read off the last dictionary: its last row writes one quantity as a constant plus multiples of slacks,
which holds for every point whatever, so that the multiples, with their signs, are the multipliers of the constraints.

References
----------
Farkas, Theorie der einfachen Ungleichungen, J. reine angew. Math. 124, 1902.
Chvátal, Linear Programming, 1983, chapters 5 and 16.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from polywalk.exact import Row, dot, primitive
from polywalk.linear.dictionary import Dictionary
from polywalk.linear.solve import Solved, solve
from polywalk.model import Model
from polywalk.table import Shown, Table, cell


@dataclass(frozen=True, repr=False)
class Farkas(Shown):
    """Multipliers that turn the constraints of an empty model into a contradiction.

    Each multiplier is >= 0 on a <=, <= 0 on a >= and of any sign on an equality. The constraints, multiplied and
    added, have no variable left, and say that 0 is at most a negative number.

    Parameters
    ----------
    model : Model
    weights : (m,) tuple of Fraction
        One a constraint, in the model's order, in the smallest integers.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.linear import farkas
    >>> print(farkas(pw.from_algebra(constraints={"need": "x + y >= 3", "cap x": "x <= 1", "cap y": "y <= 1"})))
    these constraints, multiplied and added, say 0 ≤ -1
    constraint  multiplier  rule
    need        -1          x + y ≥ 3
    cap x       1           x ≤ 1
    cap y       1           y ≤ 1

    References
    ----------
    See `farkas`.
    """

    model: Model
    weights: Row

    @property
    def multipliers(self) -> dict[str, Fraction]:
        """The multipliers by constraint; those that are 0 are left out."""
        return _named(self.model, self.weights)

    @property
    def total(self) -> Fraction:
        """The negative number that 0 would have to be at most."""
        return dot(self.weights, [row.rhs for row in self.model.constraints])

    def table(self) -> Table:
        """The constraints that contradict each other, with their multipliers."""
        title = f"these constraints, multiplied and added, say 0 ≤ {self.total}"
        return Table(title, ("constraint", "multiplier", "rule"), _rules(self.model, self.multipliers))


@dataclass(frozen=True, repr=False)
class ImprovingRay(Shown):
    """A direction along which an unbounded model improves for ever.

    Parameters
    ----------
    model : Model
    point : (n,) tuple of Fraction
        A feasible point it starts from.
    direction : (n,) tuple of Fraction
        In the smallest integers.
    change : Fraction
        The change of the objective per step of that direction.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.linear import improving_ray
    >>> model = pw.from_algebra(maximize="x + y", constraints={"gap": "x - y <= 1"},
    ...                         bounds={"x": (0, None), "y": (0, None)})
    >>> print(improving_ray(model))
    from (1, 0) the objective changes by 2 for each step
    variable  per step
    x         1
    y         1

    References
    ----------
    See `improving_ray`.
    """

    model: Model
    point: Row
    direction: Row
    change: Fraction

    def table(self) -> Table:
        """The direction, one row a variable."""
        title = f"from {cell(self.point)} the objective changes by {cell(self.change)} for each step"
        return Table(title, ("variable", "per step"), tuple(zip(self.model.variables, self.direction, strict=True)))


def farkas(model: Model) -> Farkas | None:
    """The proof that no point satisfies the model, or None where one does.

    Parameters
    ----------
    model : Model
        Of any kind; integer marks are ignored (the relaxation).

    Returns
    -------
    Farkas or None
        One multiplier a constraint; added up, the constraints contradict themselves.

    Examples
    --------
    >>> import polywalk as pw
    >>> proof = pw.farkas(pw.scenarios.harbour_row("infeasible"))
    >>> {name: int(weight) for name, weight in proof.multipliers.items() if weight}
    {'harbour main': 1, 'town contract': -1}
    >>> pw.farkas(pw.scenarios.harbour_row()) is None
    True

    References
    ----------
    Farkas, Theorie der einfachen Ungleichungen, J. reine angew. Math. 124, 1902; Chvátal, Linear Programming, 1983,
    chapter 16.
    """
    return farkas_of(solve(model))


def improving_ray(model: Model) -> ImprovingRay | None:
    """The proof that the model is unbounded, or None where it is infeasible or has an optimum.

    Parameters
    ----------
    model : Model
        Of any kind; integer marks are ignored (the relaxation).

    Returns
    -------
    ImprovingRay or None
        A feasible point and a direction, both (n,) tuples of Fraction.

    Examples
    --------
    >>> import polywalk as pw
    >>> ray = pw.improving_ray(pw.scenarios.harbour_row("unbounded"))
    >>> [int(step) for step in ray.direction], int(ray.change)
    ([0, 1, 0], 18)

    References
    ----------
    Chvátal, Linear Programming, 1983, chapter 3 (a column without a leaving slack).
    """
    return ray_of(solve(model))


def farkas_of(solved: Solved) -> Farkas | None:
    """The proof of an infeasible end.

    The row that cannot be met is a slack (the auxiliary, with 0 put for it; or an equality's slack, brought to the
    same side) that equals a constant plus multiples of other slacks.
    """
    if solved.outcome != "infeasible" or solved.place is None:
        return None
    now, row = solved.dictionary, solved.place
    shares = {k: now.rate(row, j) for j, k in enumerate(now.nonbasic)}
    if now.basic[row] != now.slacks.auxiliary:
        shares[now.basic[row]] = Fraction(-1)
        if now.rows[row][0] < 0:
            shares = {k: -value for k, value in shares.items()}
    return Farkas(now.slacks.model, primitive(constraint_weights(now, shares)))


def impossible_row(now: Dictionary) -> int | None:
    """The row that no point can meet: the auxiliary's; or a negative one that no slack can help; None without one."""
    auxiliary, may = now.slacks.auxiliary, now.slacks.pivots
    if auxiliary in now.basic:
        return now.basic.index(auxiliary)
    columns = [j for j, k in enumerate(now.nonbasic, 1) if may[k]]
    for i, line in enumerate(now.rows):
        entries = [line[j] for j in columns]
        if now.slacks.items[now.basic[i]].kind == "equality":
            if line[0] and not any(entries):
                return i
        elif now.slacks.blocks[now.basic[i]] and line[0] < 0 and all(entry <= 0 for entry in entries):
            return i
    return None


def ray_of(solved: Solved) -> ImprovingRay | None:
    """The proof of an unbounded end."""
    if solved.outcome != "unbounded" or solved.place is None:
        return None
    now = solved.dictionary
    model = now.slacks.model
    assert model.objective is not None
    sense = 1 if now.aim[solved.place + 1] > 0 else -1  # along a line either way is open
    direction = primitive([sense * value for value in now.direction(solved.place)])
    return ImprovingRay(model, now.point, direction, dot(model.objective.coefficients, direction))


def dual_of(dictionary: Dictionary) -> Row:
    """The multipliers that prove an optimal dictionary, one a constraint.

    The objective is the optimal value plus reduced costs times slacks. Each multiplier is the change of the optimal
    value per unit of its constraint's right-hand side, as long as the basis stays optimal.
    """
    costs = {k: -dictionary.reduced_cost(j) for j, k in enumerate(dictionary.nonbasic)}
    return constraint_weights(dictionary, costs)


def constraint_weights(dictionary: Dictionary, shares: dict[int, Fraction]) -> Row:
    """Multiples of slacks as multiples of constraints: a >= has its slack the other way round."""
    items, rows = dictionary.slacks.items, dictionary.slacks.model.constraints
    weights = [Fraction(0)] * len(rows)
    for k, share in shares.items():
        place = items[k].constraint
        if place is not None:
            weights[place] = -share if rows[place].sense == ">=" else share
    return tuple(weights)


def _named(model: Model, weights: Row) -> dict[str, Fraction]:
    return {row.name: value for row, value in zip(model.constraints, weights, strict=True) if value}


def _rules(model: Model, multipliers: dict[str, Fraction]) -> tuple[tuple[object, ...], ...]:
    named = ((name, value, model.constraint(name)) for name, value in multipliers.items())
    return tuple((name, value, row.text(model.variables)) for name, value, row in named)
