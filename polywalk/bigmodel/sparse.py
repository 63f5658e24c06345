"""The sparse model of many variables, in floats: what files hold and what narrowing cuts small, exact models from.

A float means the shortest decimal that prints as it, as everywhere: 0.1 is 1/10. Its constraints go by the names they
have in the exact Model: a row with two different sides is "row lower" and "row upper", a bound is "x lower" or
"x upper", two equal bounds are "x fixed".
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field, fields, replace
from functools import cached_property
from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from polywalk.bigmodel.checking import check, frozen
from polywalk.bigmodel.exchange import from_model, to_model
from polywalk.bigmodel.keeping import only
from polywalk.bigmodel.naming import dropped, moved
from polywalk.bigmodel.telling import missing, overview
from polywalk.errors import unknown
from polywalk.exact import exact
from polywalk.model import Goal, Model
from polywalk.table import Shown, Table

Floats = NDArray[np.float64]
Places = NDArray[np.int64]


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

    References
    ----------
    Duff, Erisman & Reid, Direct Methods for Sparse Matrices, 1986, chapter 2 (a matrix stored by rows; from memory).
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
    cost: Floats = field(default_factory=lambda: np.zeros(0))
    goal: Goal | None = None
    constant: float = 0.0
    integers: tuple[str, ...] = ()
    units: tuple[tuple[str, str], ...] = ()
    name: str = ""
    notes: tuple[str, ...] = ()

    def __post_init__(self) -> None:
        if not len(self.cost):
            object.__setattr__(self, "cost", np.zeros(len(self.variables)))
        for label in _ARRAYS:
            object.__setattr__(self, label, frozen(getattr(self, label), np.int64 if label in _WHOLE else np.float64))
        object.__setattr__(self, "constant", float(self.constant))
        check(self)

    def __eq__(self, other: object) -> bool:
        if not isinstance(other, BigModel):
            return NotImplemented
        pairs = ((getattr(self, part.name), getattr(other, part.name)) for part in fields(self))
        return all(np.array_equal(a, b) if isinstance(a, np.ndarray) else a == b for a, b in pairs)

    def __hash__(self) -> int:
        return hash((self.variables, self.rows, self.name))

    if not TYPE_CHECKING:  # a type checker names what is missing by itself

        def __getattr__(self, name: str) -> Any:
            raise missing(self, name)

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
    def places(self) -> dict[str, int]:
        """The place of every variable."""
        return {name: place for place, name in enumerate(self.variables)}

    @cached_property
    def row_places(self) -> dict[str, int]:
        """The place of every row."""
        return {name: place for place, name in enumerate(self.rows)}

    def index(self, variable: str) -> int:
        """The place of a variable; raises UnknownName."""
        try:
            return self.places[variable]
        except KeyError:
            raise unknown("variable", variable, self.variables) from None

    def row_index(self, row: str) -> int:
        """The place of a row; raises UnknownName."""
        try:
            return self.row_places[row]
        except KeyError:
            raise unknown("row", row, self.rows) from None

    def row(self, name: str) -> dict[str, float]:
        """The coefficients of a row by the variables' names; raises UnknownName."""
        place = self.row_index(name)
        part = slice(self.indptr[place], self.indptr[place + 1])
        pairs = zip(self.indices[part], self.data[part], strict=True)
        return {self.variables[column]: float(value) for column, value in pairs}

    @cached_property
    def _unit_of(self) -> dict[str, str]:
        return dict(self.units)

    def unit(self, name: str) -> str:
        """The unit of a variable or row, or "" where none was given."""
        return self._unit_of.get(name, "")

    def csr(self) -> Any:
        """The matrix as a scipy.sparse.csr_array; the arrays are shared and read-only."""
        from scipy.sparse import csr_array

        return csr_array((self.data, self.indices, self.indptr), shape=(self.m, self.n))

    def csc(self) -> Any:
        """The matrix as a scipy.sparse.csc_array."""
        return self.csr().tocsc()

    def with_rhs(self, name: str, rhs: object) -> BigModel:
        """A copy with another right-hand side: of a row or a bound, by its name in the exact Model."""
        value = float(exact(rhs))
        return moved(self, name, value, value)

    def without(self, *names: str) -> BigModel:
        """A copy without the named rows or bounds, by their names in the exact Model or by the row's own."""
        changed = self
        for name in names:
            changed = dropped(changed, name)
        return changed

    def with_objective(self, coefficients: Mapping[str, object], goal: Goal, constant: object = 0) -> BigModel:
        """A copy with another objective; variables that are not named get coefficient 0."""
        cost = np.zeros(self.n)
        for name, value in coefficients.items():
            cost[self.index(name)] = float(exact(value))
        return replace(self, cost=cost, goal=goal, constant=float(exact(constant)))

    def without_objective(self) -> BigModel:
        """A copy without an objective."""
        return replace(self, cost=np.zeros(self.n), goal=None, constant=0.0)

    def fix(self, variable: str, value: object) -> BigModel:
        """A copy in which both bounds of a variable are the value; it stays, since floats would round the rest."""
        place = self.index(variable)
        lower, upper = self.lower.copy(), self.upper.copy()
        lower[place] = upper[place] = float(exact(value))
        return replace(self, lower=lower, upper=upper)

    def only(self, *variables: str) -> BigModel:
        """A copy with these variables and the rows that have no others; its last note names the rows left out."""
        return only(self, variables)

    def to_model(self) -> Model:
        """The exact Model with the same rows and bounds; a row without a side is left out.

        Raises
        ------
        ModelError
            Past `polywalk.bigmodel.LARGEST_DENSE` cells: the exact Model keeps every zero. Take a section first.
        """
        return to_model(self)

    @classmethod
    def from_model(cls, model: Model) -> BigModel:
        """The sparse model in floats; a fraction that no float prints as is rounded to the nearest one.

        Constraints named as bounds ("x lower") become bounds again, and "row lower" with "row upper" one row.
        """
        return from_model(cls, model)

    def table(self) -> Table:
        """Counts, not contents: how many variables, rows and nonzeros, and of which kinds."""
        return overview(self)


_WHOLE = ("indptr", "indices")
_ARRAYS = (*_WHOLE, "data", "row_lower", "row_upper", "lower", "upper", "cost")
