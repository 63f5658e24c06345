"""The exact optimum of a model, its optimal face, and the proof of either."""

from __future__ import annotations

from dataclasses import dataclass, replace
from fractions import Fraction

from polywalk.exact import Row
from polywalk.linear.certificates import Farkas, ImprovingRay, dual_of, farkas_of, ray_of
from polywalk.linear.dictionary import Dictionary
from polywalk.linear.solve import Outcome, solve
from polywalk.model import Constraint, Model
from polywalk.table import Shown, Table, cell


@dataclass(frozen=True, repr=False)
class Optimum(Shown):
    """How a model ends, exactly, with the proof.

    Parameters
    ----------
    model : Model
    outcome : {"optimal", "unbounded", "infeasible"}
    value : Fraction or None
        The optimal value with the objective's constant; 0 where the model has no objective.
    point : (n,) tuple of Fraction or None
        An optimal point; where the model is unbounded a feasible one.
    weights : (m,) tuple of Fraction or None
        The optimal multipliers, one a constraint in the model's order. Times the constraints they add up to the
        objective's coefficients, times the right-hand sides (and plus the constant) to the value.
    infeasibility : Farkas or None
    ray : ImprovingRay or None
    dictionary : Dictionary
        The last one.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.linear import optimum
    >>> best = optimum(pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "2*x + y <= 4"},
    ...                                bounds={"x": (0, None), "y": (0, 3)}))
    >>> print(best)
    optimal: 7.5 at (0.5, 3)
    constraint  multiplier  slack
    labour      1.5         0
    x lower     0           0.5
    y lower     0           3
    y upper     0.5         0
    """

    model: Model
    outcome: Outcome
    value: Fraction | None
    point: Row | None
    weights: Row | None
    infeasibility: Farkas | None
    ray: ImprovingRay | None
    dictionary: Dictionary

    @property
    def multipliers(self) -> dict[str, Fraction] | None:
        """The optimal multiplier of each constraint: the change of the optimal value per unit of right-hand side."""
        if self.weights is None:
            return None
        return {row.name: value for row, value in zip(self.model.constraints, self.weights, strict=True)}

    @property
    def face(self) -> Model | None:
        """The model of the optimal face: this one, with the objective held at its optimum; None without an optimum."""
        goal = self.model.objective
        if self.value is None or goal is None or not any(goal.coefficients):
            return self.model if self.outcome == "optimal" else None
        name = "optimal objective"
        while any(row.name == name for row in self.model.constraints):
            name += " value"
        held = Constraint(name, goal.coefficients, "==", self.value - goal.constant, "the optimal face")
        return replace(self.model, constraints=(*self.model.constraints, held))

    def table(self) -> Table:
        """The optimal multipliers and slacks, or the proof that there is no optimum."""
        proof = self.infeasibility or self.ray
        if proof is not None:
            told = proof.table()
            return replace(told, title=f"{self.outcome}: {told.title}")
        if self.weights is None or self.point is None:
            raise ValueError("an optimum has a point and multipliers")
        pairs = zip(self.model.constraints, self.weights, strict=True)
        rows = tuple((row.name, weight, row.slack(self.point)) for row, weight in pairs)
        title = f"optimal: {cell(self.value)} at {cell(self.point)}"
        return Table(title, ("constraint", "multiplier", "slack"), rows)


def optimum(model: Model) -> Optimum:
    """The exact optimum of a model of any kind, with its proof; integer marks are ignored (the relaxation).

    Parameters
    ----------
    model : Model
        Any number of variables; free variables, equalities, lines, rows without variables are all fine.

    Returns
    -------
    Optimum
        Of several optimal points, or several optimal multipliers, one; see ``Optimum.face`` for all points.

    Examples
    --------
    >>> import polywalk as pw
    >>> best = pw.optimum(pw.scenarios.harbour_row())
    >>> int(best.value), int(best.multipliers["harbour main"])
    (292, 18)

    References
    ----------
    Chvátal, Linear Programming, 1983, chapters 2 and 3 (the method) and 5 (the proof by duality); Bland, New finite
    pivoting rules for the simplex method, Math. Oper. Res. 2, 1977.
    """
    solved = solve(model)
    last = solved.dictionary
    best = solved.outcome == "optimal"
    return Optimum(
        model=model,
        outcome=solved.outcome,
        value=last.objective if best else None,
        point=None if solved.outcome == "infeasible" else last.point,
        weights=dual_of(last) if best else None,
        infeasibility=farkas_of(solved),
        ray=ray_of(solved),
        dictionary=last,
    )
