"""The sparse model of many variables, in floats: what files hold and what narrowing cuts small, exact models from.

A float means the shortest decimal that prints as it, as everywhere: 0.1 is 1/10. Its constraints go by the names they
have in the exact Model: a row with two different sides is "row lower" and "row upper", a bound is "x lower" or
"x upper", two equal bounds are "x fixed".
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass, fields, replace
from fractions import Fraction
from functools import cached_property
from math import isinf
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

from polywalk.errors import DuplicateName, ModelError, unknown
from polywalk.exact import exact
from polywalk.model import GOAL, Constraint, Goal, Model, Objective
from polywalk.sides import bound_rows, sided_rows, unit_row
from polywalk.table import Shown, Table

Floats = NDArray[np.float64]
Places = NDArray[np.int64]
Side = Literal["lower", "upper", "both"]

LARGEST_DENSE = 4_000_000
"""Cells (variables times constraints) up to which the exact Model is made: it keeps every zero."""


@dataclass(frozen=True, repr=False, eq=False)
class BigModel(Shown):
    """A sparse linear model in floats.

    Parameters
    ----------
    variables, rows : tuple of str
        (n,) and (m,) names, unique among themselves.
    indptr, indices, data : (m + 1,), (k,), (k,) array_like
        The matrix by rows: row i has the coefficients ``data[indptr[i]:indptr[i + 1]]`` in the columns ``indices`` of
        the same places.
    row_lower, row_upper : (m,) array_like
        The two sides of every row; infinite where there is none.
    lower, upper : (n,) array_like
        The bounds of the variables. A lower one above its upper one makes the region empty, which is an answer.
    cost : (n,) array_like, optional
        The objective's coefficients; zeros by default.
    goal : {"min", "max"} or None, optional
        None where there is no objective.
    constant : float, optional
        The objective's constant.
    integers : tuple of str, optional
        Variables marked integer.
    units : tuple of (str, str), optional
        Pairs of a variable's or row's name and its unit.
    name : str, optional
    notes : tuple of str, optional
        What a reader had to alter or leave out, in words.

    Raises
    ------
    ModelError, DuplicateName, UnknownName
        Arrays that do not fit, a number that is not finite, a name given twice, a mark for a name that is not there.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> import numpy as np
    >>> big = BigModel(("x", "y"), ("sum",), [0, 2], [0, 1], [1, 1], [-np.inf], [4], [0, 0], [np.inf, 3], [3, 2], "max")
    >>> print(big)
    maximize 2 of 2 variables, 1 row, 2 nonzeros
    part       count  of which
    variables  2      0 free, 1 with two bounds, 0 fixed, 0 integer
    rows       1      0 equalities, 0 with two sides, 0 without a side
    >>> big.row("sum")
    {'x': 1.0, 'y': 1.0}
    >>> big.with_rhs("y upper", 5).to_model().constraint("y upper").rhs
    Fraction(5, 1)
    """

    variables: tuple[str, ...]
    rows: tuple[str, ...]
    indptr: Places
    indices: Places
    data: Floats
    row_lower: Floats
    row_upper: Floats
    lower: Floats
    upper: Floats
    cost: Floats | None = None
    goal: Goal | None = None
    constant: float = 0.0
    integers: tuple[str, ...] = ()
    units: tuple[tuple[str, str], ...] = ()
    name: str = ""
    notes: tuple[str, ...] = ()

    def __post_init__(self) -> None:
        cost = np.zeros(len(self.variables)) if self.cost is None else self.cost
        for label, values in (("cost", cost), *((label, getattr(self, label)) for label in _ARRAYS)):
            object.__setattr__(self, label, _frozen(values, np.int64 if label in _WHOLE else np.float64))
        object.__setattr__(self, "constant", float(self.constant))
        check(self)

    def __eq__(self, other: object) -> bool:
        if not isinstance(other, BigModel):
            return NotImplemented
        pairs = ((getattr(self, part.name), getattr(other, part.name)) for part in fields(self))
        return all(np.array_equal(a, b) if isinstance(a, np.ndarray) else a == b for a, b in pairs)

    def __hash__(self) -> int:
        return hash((self.variables, self.rows, self.name))

    def __reduce__(self) -> tuple[Any, ...]:  # arrays come back writable otherwise
        return type(self), tuple(getattr(self, part.name) for part in fields(self))

    @property
    def n(self) -> int:
        """The number of variables."""
        return len(self.variables)

    @property
    def m(self) -> int:
        """The number of rows; a row with two sides counts once, bounds do not."""
        return len(self.rows)

    @property
    def nonzeros(self) -> int:
        """The number of stored coefficients."""
        return len(self.data)

    @cached_property
    def _columns(self) -> dict[str, int]:
        return {name: place for place, name in enumerate(self.variables)}

    @cached_property
    def _lines(self) -> dict[str, int]:
        return {name: place for place, name in enumerate(self.rows)}

    def index(self, variable: str) -> int:
        """The place of a variable; raises UnknownName."""
        try:
            return self._columns[variable]
        except KeyError:
            raise unknown("variable", variable, self.variables) from None

    def row_index(self, row: str) -> int:
        """The place of a row; raises UnknownName."""
        try:
            return self._lines[row]
        except KeyError:
            raise unknown("row", row, self.rows) from None

    def row(self, name: str) -> dict[str, float]:
        """The coefficients of a row by the variables' names; raises UnknownName."""
        place = self.row_index(name)
        part = slice(self.indptr[place], self.indptr[place + 1])
        pairs = zip(self.indices[part], self.data[part], strict=True)
        return {self.variables[column]: float(value) for column, value in pairs}

    def unit(self, name: str) -> str:
        """The unit of a variable or row, or "" where none was given."""
        return dict(self.units).get(name, "")

    def csr(self) -> Any:
        """The matrix as a scipy.sparse.csr_array; the arrays are shared and read-only."""
        from scipy.sparse import csr_array

        return csr_array((self.data, self.indices, self.indptr), shape=(self.m, self.n))

    def csc(self) -> Any:
        """The matrix as a scipy.sparse.csc_array."""
        return self.csr().tocsc()

    # edits: each returns a changed copy

    def with_rhs(self, name: str, rhs: float) -> BigModel:
        """A copy with another right-hand side: of a row or a bound, by its name in the exact Model."""
        return _moved(self, name, lambda _: float(exact(rhs)))

    def without(self, *names: str) -> BigModel:
        """A copy without the named rows or bounds; a row without a side stays, and allows everything."""
        changed = self
        for name in names:
            changed = _moved(changed, name, lambda sign: sign * np.inf)
        return changed

    def with_objective(self, coefficients: Mapping[str, object], goal: Goal, constant: object = 0) -> BigModel:
        """A copy with another objective; variables that are not named get coefficient 0."""
        cost = np.zeros(self.n)
        for name, value in coefficients.items():
            cost[self.index(name)] = float(exact(value))
        return replace(self, cost=cost, goal=goal, constant=float(exact(constant)))

    def without_objective(self) -> BigModel:
        """A copy without an objective."""
        return replace(self, cost=None, goal=None, constant=0.0)

    def fix(self, variable: str, value: object) -> BigModel:
        """A copy in which both bounds of a variable are the value; it stays, since floats would round the rest."""
        place = self.index(variable)
        lower, upper = self.lower.copy(), self.upper.copy()
        lower[place] = upper[place] = float(exact(value))
        return replace(self, lower=lower, upper=upper)

    # to the exact model and back

    def to_model(self) -> Model:
        """The exact Model with the same rows and bounds; a row without a side is left out.

        Raises
        ------
        ModelError
            Past `LARGEST_DENSE` cells: the exact Model keeps every zero. Take a section or a shadow first.
        """
        if self.n * (self.m + self.n) > LARGEST_DENSE:
            raise ModelError(
                f"{self.n} variables and {self.m} rows are too many for the exact model, which keeps every zero "
                f"(at most {LARGEST_DENSE} cells); cut it down with section or shadow first.",
                self.name,
            )
        goal = None
        if self.goal is not None:
            goal = Objective(self.goal, tuple(map(_exact_float, self.cost)), _exact_float(self.constant))
        found = tuple(_constraints(self))
        named = {*self.variables, *(row.name for row in found)}
        units = tuple(pair for pair in self.units if pair[0] in named)
        return Model(self.variables, found, goal, units, self.integers, self.name)

    @classmethod
    def from_model(cls, model: Model) -> BigModel:
        """The sparse model in floats; a fraction that no float prints as is rounded to the nearest one.

        Constraints named as bounds ("x lower") become bounds again, and "row lower" with "row upper" one row.
        """
        return from_model(cls, model)

    def table(self) -> Table:
        """Counts, not contents: how many variables, rows and nonzeros, and of which kinds."""
        goal = "no objective"
        if self.goal is not None:
            goal = f"{GOAL[self.goal]} {np.count_nonzero(self.cost)} of {counted(self.n, 'variable')}"
        title = f"{goal}, {counted(self.m, 'row')}, {counted(self.nonzeros, 'nonzero')}"
        low, high = np.isfinite(self.lower), np.isfinite(self.upper)
        fixed = self.lower == self.upper
        of_columns = (
            f"{(~low & ~high).sum()} free, {(low & high & ~fixed).sum()} with two bounds, {fixed.sum()} fixed, "
            f"{len(self.integers)} integer"
        )
        low, high = np.isfinite(self.row_lower), np.isfinite(self.row_upper)
        equal = low & (self.row_lower == self.row_upper)
        of_rows = (
            f"{equal.sum()} equalities, {(low & high & ~equal).sum()} with two sides, "
            f"{(~low & ~high).sum()} without a side"
        )
        lines = (("variables", self.n, of_columns), ("rows", self.m, of_rows))
        return Table(f"{self.name}: {title}" if self.name else title, ("part", "count", "of which"), lines, self.notes)


_WHOLE = ("indptr", "indices")
_ARRAYS = (*_WHOLE, "data", "row_lower", "row_upper", "lower", "upper")


def counted(count: int, what: str) -> str:
    """ "1 row", "2 rows"."""
    return f"{count} {what}{'' if count == 1 else 's'}"


def _frozen(values: Any, kind: type) -> Any:
    array = np.array(values, dtype=kind)
    array.setflags(write=False)
    return array


def _exact_float(value: float) -> Fraction:
    return exact(float(value))


def _end(value: float) -> Fraction | None:
    return None if isinf(value) else _exact_float(value)


def _constraints(big: BigModel) -> Iterable[Constraint]:
    for place, name in enumerate(big.rows):
        row = [Fraction(0)] * big.n
        for k in range(big.indptr[place], big.indptr[place + 1]):
            row[big.indices[k]] = _exact_float(big.data[k])
        yield from sided_rows(name, tuple(row), _end(big.row_lower[place]), _end(big.row_upper[place]))
    for place, name in enumerate(big.variables):
        yield from bound_rows(name, unit_row(place, big.n), _end(big.lower[place]), _end(big.upper[place]))


def _moved(big: BigModel, name: str, value: Callable[[int], float]) -> BigModel:
    """A copy with one side moved to ``value(sign)``; the sign is -1 for a lower and +1 for an upper side."""
    what, place, side = locate(big, name)
    changes = {}
    for label, sign in ((f"{what}lower", -1), (f"{what}upper", +1)):
        if side in {"both", label.removeprefix("row_")}:
            array = getattr(big, label).copy()
            array[place] = value(sign)
            changes[label] = array
    return replace(big, **changes)


def locate(big: BigModel, name: str) -> tuple[Literal["row_", ""], int, Side]:
    """Where a constraint of the exact Model sits: "row_" or "" (a bound), its place, and which of the sides.

    Raises
    ------
    UnknownName
        A row with two sides goes by the name of one of them.
    """
    if name in big._lines:
        place = big._lines[name]
        low, high = float(big.row_lower[place]), float(big.row_upper[place])
        if low == high:
            return "row_", place, "both"
        if isinf(low) or isinf(high):
            return "row_", place, "lower" if not isinf(low) else "upper"
        raise unknown("constraint", name, [f"{name} lower", f"{name} upper"])
    stem, _, side = name.rpartition(" ")
    if side in {"lower", "upper"} and stem in big._lines:
        return "row_", big._lines[stem], side  # type: ignore[return-value]
    if side in {"lower", "upper", "fixed"} and stem in big._columns:
        return "", big._columns[stem], "both" if side == "fixed" else side  # type: ignore[return-value]
    raise unknown("constraint", name, [*big.rows, *(f"{v} {end}" for v in big.variables[:200] for end in _ENDS)])


_ENDS = ("lower", "upper")


def check(big: BigModel) -> None:
    """Refuse parts that make no model, by name."""
    if not big.variables:
        raise ModelError("expected at least one variable, got none; name the decisions of the model.")
    for kind, names in (("variable", big.variables), ("row", big.rows)):
        _unique(kind, names)
    _fits(big)
    for label, names in (("data", ()), ("cost", big.variables)):
        values = getattr(big, label)
        if not np.isfinite(values).all():
            wrong = int(np.flatnonzero(~np.isfinite(values))[0])
            where = repr(names[wrong]) if names else f"entry {wrong}"
            raise ModelError(f"{label}: expected finite numbers, got {values[wrong]} at {where}.", where)
    for label, names in (
        ("lower", big.variables),
        ("upper", big.variables),
        ("row_lower", big.rows),
        ("row_upper", big.rows),
    ):
        values = getattr(big, label)
        wrong = np.isnan(values) | (values == (np.inf if label.endswith("lower") else -np.inf))
        if wrong.any():
            place = int(np.flatnonzero(wrong)[0])
            raise ModelError(f"{label} of {names[place]!r}: {values[place]} allows no value at all.", names[place])
    if big.goal not in (None, *GOAL):
        raise ModelError(f"expected the goal 'min', 'max' or None, got {big.goal!r}.", big.goal)
    for name in big.integers:
        big.index(name)


def _fits(big: BigModel) -> None:
    sizes = {"indptr": big.m + 1, "row_lower": big.m, "row_upper": big.m, "lower": big.n, "upper": big.n, "cost": big.n}
    for label, size in (*sizes.items(), ("indices", len(big.data))):
        shape = getattr(big, label).shape
        if shape != (size,):
            raise ModelError(f"{label}: expected {size} entries, got {shape}.", label)
    steps = np.diff(big.indptr)
    if big.indptr[0] != 0 or big.indptr[-1] != len(big.data) or (steps < 0).any():
        raise ModelError("indptr: expected to rise from 0 to the number of coefficients.", "indptr")
    if len(big.data) and not (big.indices.min() >= 0 and big.indices.max() < big.n):
        raise ModelError(f"indices: expected columns from 0 to {big.n - 1}.", "indices")
    cells = np.repeat(np.arange(big.m), steps) * big.n + big.indices
    if len(np.unique(cells)) != len(cells):
        raise ModelError("the matrix holds a coefficient of the same row and variable twice; add them up.", "indices")


def _unique(kind: str, names: Sequence[str]) -> None:
    if len(set(names)) == len(names):
        return
    seen: set[str] = set()
    for name in names:
        if name in seen:
            raise DuplicateName(f"the {kind} {name!r} is given twice; give each {kind} a name of its own.", name)
        seen.add(name)


def from_model(kind: type[BigModel], model: Model) -> BigModel:
    """The sparse model of an exact one."""
    bounds, lines = [[-np.inf, np.inf] for _ in model.variables], {}
    names = {row.name for row in model.constraints}
    for row in model.constraints:
        ends = _span(row)
        place = _bound_of(row, model)
        if place is not None:
            bounds[place] = [max(bounds[place][0], ends[0]), min(bounds[place][1], ends[1])]
            continue
        stem, _, side = row.name.rpartition(" ")
        name = row.name
        if side in _ENDS and stem not in names and {f"{stem} {end}" for end in _ENDS} <= names:
            pair = [model.constraint(f"{stem} {end}") for end in _ENDS]
            if pair[0].coefficients == pair[1].coefficients and [p.sense for p in pair] == [">=", "<="]:
                name, ends = stem, [_span(pair[0])[0], _span(pair[1])[1]]
        lines[name] = (row.coefficients, ends)
    return _assembled(kind, model, bounds, lines)


def _span(row: Constraint) -> list[float]:
    value = float(row.rhs)
    return [-np.inf if row.sense == "<=" else value, np.inf if row.sense == ">=" else value]


def _bound_of(row: Constraint, model: Model) -> int | None:
    """The place of the variable this row is a named bound of, else None."""
    stem, _, side = row.name.rpartition(" ")
    sense = {"lower": ">=", "upper": "<=", "fixed": "=="}.get(side)
    if row.sense != sense or stem not in model.variables:
        return None
    place = model.index(stem)
    return place if row.coefficients == unit_row(place, model.n) else None


def _assembled(kind: type[BigModel], model: Model, bounds: list[list[float]], lines: dict[str, Any]) -> BigModel:
    indptr, indices, data = [0], [], []
    for coefficients, _ in lines.values():
        found = [(j, float(value)) for j, value in enumerate(coefficients) if value]
        indices += [j for j, _ in found]
        data += [value for _, value in found]
        indptr.append(len(data))
    goal = model.objective
    known = {*model.variables, *lines}
    return kind(
        model.variables,
        tuple(lines),
        np.array(indptr),
        np.array(indices, dtype=np.int64),
        np.array(data),
        np.array([ends[0] for _, ends in lines.values()]),
        np.array([ends[1] for _, ends in lines.values()]),
        np.array([low for low, _ in bounds]),
        np.array([high for _, high in bounds]),
        None if goal is None else np.array([float(value) for value in goal.coefficients]),
        None if goal is None else goal.goal,
        0.0 if goal is None else float(goal.constant),
        model.integers,
        tuple(pair for pair in model.units if pair[0] in known),
        model.name,
    )
