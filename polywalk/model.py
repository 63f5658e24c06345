"""The exact linear model that everything else reads: variables, named constraints, an objective. Frozen.

Decided here, once: a model has at least one variable; names of variables are unique, and so are names of
constraints; a model without constraints is the whole space; a constraint without variables is allowed (``0 <= -1``
makes the region empty, ``0 <= 1`` says nothing) and never counts as active; a variable is free unless a constraint
bounds it. Integer marks are kept and shown; the picture and the walks are those of the relaxation.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property
from typing import Any, cast

from polywalk.errors import DuplicateName, ModelError, unknown
from polywalk.exact import Row, exact
from polywalk.rows import GOAL, SIGN, Constraint, Goal, Objective, Sense
from polywalk.table import Shown, Table

__all__ = ["GOAL", "SIGN", "Constraint", "Goal", "Model", "Objective", "Sense"]


@dataclass(frozen=True, repr=False)
class Model(Shown):
    """An exact linear model.

    Parameters
    ----------
    variables : tuple of str
        At least one; unique.
    constraints : tuple of Constraint
        Names unique; a two-sided row is two constraints.
    objective : Objective or None, optional
        None where only the region matters.
    units : tuple of (str, str), optional
        Pairs of a variable's or constraint's name and its unit.
    integers : tuple of str, optional
        Variables marked as integer; walked and drawn as the relaxation.
    name : str, optional
        Shown in titles.

    Raises
    ------
    ModelError
        No variable, a row of the wrong length, an unknown sense or goal.
    DuplicateName, UnknownName
        A name given twice, a unit or integer mark for a name that is not there.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "x + y <= 4"},
    ...                         bounds={"x": (0, 3), "y": (0, None)})
    >>> print(model)
    maximize 3 x + 2 y
    constraint  rule       origin
    labour      x + y ≤ 4
    x lower     x ≥ 0      bounds
    x upper     x ≤ 3      bounds
    y lower     y ≥ 0      bounds
    >>> model.with_rhs("labour", "9/2").constraint("labour").rhs
    Fraction(9, 2)
    """

    variables: tuple[str, ...]
    constraints: tuple[Constraint, ...] = ()
    objective: Objective | None = None
    units: tuple[tuple[str, str], ...] = ()
    integers: tuple[str, ...] = ()
    name: str = ""

    def __post_init__(self) -> None:
        if not self.variables:
            raise ModelError("expected at least one variable, got none; name the decisions of the model.")
        _unique("variable", self.variables)
        _unique("constraint", [row.name for row in self.constraints])
        for row in self.constraints:
            _check_row(f"constraint {row.name!r}", row.coefficients, self.variables)
            if row.sense not in SIGN:
                raise ModelError(f"constraint {row.name!r}: expected <=, >= or ==, got {row.sense!r}.", row.sense)
        if self.objective is not None:
            _check_row("the objective", self.objective.coefficients, self.variables)
            if self.objective.goal not in GOAL:
                raise ModelError(f"expected the goal 'min' or 'max', got {self.objective.goal!r}.", self.objective.goal)
        for name, _ in self.units:
            if name not in self.variables and name not in self._rows:
                raise unknown("variable or constraint", name, [*self.variables, *self._rows], "the model (units)")
        for name in self.integers:
            self.index(name)

    @cached_property
    def _rows(self) -> dict[str, Constraint]:
        return {row.name: row for row in self.constraints}

    @cached_property
    def _places(self) -> dict[str, int]:
        return {name: place for place, name in enumerate(self.variables)}

    @property
    def n(self) -> int:
        """The number of variables."""
        return len(self.variables)

    def index(self, variable: str) -> int:
        """The place of a variable; raises UnknownName."""
        try:
            return self._places[variable]
        except KeyError:
            raise unknown("variable", variable, self.variables) from None

    def constraint(self, name: str) -> Constraint:
        """The constraint of that name; raises UnknownName."""
        try:
            return self._rows[name]
        except KeyError:
            raise unknown("constraint", name, self._rows) from None

    def unit(self, name: str) -> str:
        """The unit of a variable or constraint, or "" where none was given."""
        return dict(self.units).get(name, "")

    @cached_property
    def free(self) -> tuple[str, ...]:
        """Variables that no single constraint bounds."""
        alone = [[j for j, value in enumerate(row.coefficients) if value] for row in self.constraints]
        bounded = {places[0] for places in alone if len(places) == 1}
        return tuple(name for j, name in enumerate(self.variables) if j not in bounded)

    def point(self, values: Mapping[str, object] | Iterable[object]) -> Row:
        """A whole plan as exact numbers in the order of the variables.

        Parameters
        ----------
        values : mapping of str to number, or (n,) sequence of numbers
            Every variable exactly once.

        Raises
        ------
        UnknownName, ModelError, NumberError
            A name that is not there, a missing or surplus entry, an entry that is no number.
        """
        if isinstance(values, Mapping):
            for name in values:
                self.index(cast(str, name))
            missing = [name for name in self.variables if name not in values]
            if missing:
                raise ModelError(f"expected a value for every variable; {missing[0]!r} has none.", missing[0])
            return tuple(exact(values[name]) for name in self.variables)
        listed = tuple(exact(value) for value in values)
        if len(listed) != self.n:
            raise ModelError(f"expected {self.n} values ({', '.join(self.variables)}), got {len(listed)}.", listed)
        return listed

    # edits: each returns a changed copy

    def with_rhs(self, name: str, rhs: object) -> Model:
        """A copy in which one constraint has another right-hand side."""
        changed = replace(self.constraint(name), rhs=exact(rhs))
        return replace(self, constraints=tuple(changed if row.name == name else row for row in self.constraints))

    def with_objective(self, coefficients: Mapping[str, object], goal: Goal, constant: object = 0) -> Model:
        """A copy with another objective; variables that are not named get coefficient 0."""
        return replace(self, objective=Objective(goal, self._row(coefficients), exact(constant)))

    def without_objective(self) -> Model:
        """A copy without an objective."""
        return replace(self, objective=None)

    def with_constraint(
        self, name: str, coefficients: Mapping[str, object], sense: Sense, rhs: object, origin: str = ""
    ) -> Model:
        """A copy with one more constraint at the end; variables that are not named get coefficient 0."""
        added = Constraint(name, self._row(coefficients), sense, exact(rhs), origin)
        return replace(self, constraints=(*self.constraints, added))

    def without(self, *names: str) -> Model:
        """A copy without the named constraints, and without their units."""
        for name in names:
            self.constraint(name)
        kept = tuple(row for row in self.constraints if row.name not in names)
        gone = set(names) - set(self.variables)
        return replace(self, constraints=kept, units=tuple(pair for pair in self.units if pair[0] not in gone))

    def fix(self, variable: str, value: object) -> Model:
        """A copy in which one variable is a constant: it leaves the model, and every row keeps its remainder.

        A row that loses its last variable stays, as a constraint without variables.
        """
        place, number = self.index(variable), exact(value)
        rows = tuple(
            replace(row, coefficients=_drop(row.coefficients, place), rhs=row.rhs - row.coefficients[place] * number)
            for row in self.constraints
        )
        goal = self.objective
        if goal is not None:
            moved = goal.constant + goal.coefficients[place] * number
            goal = replace(goal, coefficients=_drop(goal.coefficients, place), constant=moved)
        return replace(
            self,
            variables=tuple(name for name in self.variables if name != variable),
            constraints=rows,
            objective=goal,
            units=tuple(pair for pair in self.units if pair[0] != variable or pair[0] in self._rows),
            integers=tuple(name for name in self.integers if name != variable),
        )

    def _row(self, coefficients: Mapping[str, object]) -> Row:
        row = [Fraction(0)] * self.n
        for name, value in coefficients.items():
            row[self.index(name)] = exact(value)
        return tuple(row)

    def table(self) -> Table:
        """Every constraint as a row; notes name the free and the integer variables."""
        goal = self.objective.text(self.variables) if self.objective else "no objective"
        notes = []
        if self.free:
            notes.append(f"free (no bound of their own): {', '.join(self.free)}")
        if self.integers:
            notes.append(f"marked integer (drawn and walked as the relaxation): {', '.join(self.integers)}")
        if self.units:
            notes.append("units: " + ", ".join(f"{name} in {unit}" for name, unit in self.units))
        rows = tuple((row.name, row.text(self.variables), row.origin) for row in self.constraints)
        title = f"{self.name}: {goal}" if self.name else goal
        return Table(title, ("constraint", "rule", "origin"), rows, tuple(notes))


def _unique(kind: str, names: Iterable[Any]) -> None:
    seen: set[str] = set()
    for name in names:
        if not isinstance(name, str) or not name.strip():
            raise ModelError(f"expected the name of a {kind} as text, got {name!r}.", name)
        if name in seen:
            raise DuplicateName(f"the {kind} {name!r} is given twice; give each {kind} a name of its own.", name)
        seen.add(name)


def _check_row(where: str, row: Row, variables: Sequence[str]) -> None:
    if len(row) != len(variables):
        raise ModelError(f"{where}: expected {len(variables)} coefficients, one a variable, got {len(row)}.", row)


def _drop(row: Row, place: int) -> Row:
    return row[:place] + row[place + 1 :]
