"""For every vertex the objectives for which it is optimal: its normal cone, seen from both sides.

The cone is made of the costs of the active constraints (each constraint, taken as the objective, is optimal all along
it), and it ends where a neighbouring vertex, or a ray, becomes as good.

References
----------
Ziegler, Lectures on Polytopes, 1995, chapter 7 (the normal fan).
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from fractions import Fraction

from polywalk.exact import Row, dot, exact, linear, primitive
from polywalk.model import Goal, Model
from polywalk.region import Region, region, vertex_name
from polywalk.table import Shown, Table, cell

SIGN = {"max": "≤", "min": "≥"}
TURNED = {"≤": "≥", "≥": "≤", "=": "="}


@dataclass(frozen=True)
class Condition:
    """One side of a cone: the objective may not improve along an edge.

    Parameters
    ----------
    toward : str
        Where the edge leads: "V3", or "ray 0"; "line 0" where the objective may not change at all.
    direction : (n,) tuple of Fraction
        Of the edge, in the smallest integers: costs times it, added, may not be positive (of a minimum: negative).
    """

    toward: str
    direction: Row


@dataclass(frozen=True, repr=False)
class Cone(Shown):
    """All objectives for which one vertex is optimal (where the region has a line: one base point).

    Parameters
    ----------
    region : Region
    number : int
        The number of the vertex, or of the base point.
    goal : {"max", "min"}
    generators : tuple of (str, (n,) tuple of Fraction)
        Constraints active here and the costs each gives; the cone is all their sums with multipliers >= 0.
    lines : tuple of (str, (n,) tuple of Fraction)
        The same for equalities, stated or implied, whose multipliers may have any sign.
    conditions : tuple of Condition
        The same cone as conditions on the costs, one an edge.
    """

    region: Region = field(compare=False)
    number: int
    goal: Goal
    generators: tuple[tuple[str, Row], ...]
    lines: tuple[tuple[str, Row], ...]
    conditions: tuple[Condition, ...]

    @property
    def model(self) -> Model:
        """The model."""
        return self.region.model

    @property
    def point(self) -> Row:
        """The vertex."""
        return self.region.base[self.number]

    @property
    def name(self) -> str:
        """What the vertex is called."""
        return f"base point {self.number}" if self.region.lines else vertex_name(self.number)

    def holds(self, costs: Mapping[str, object]) -> bool:
        """Whether the vertex is optimal for these costs; variables that are not named have cost 0.

        Raises
        ------
        UnknownName, NumberError
            A name that is no variable, a cost that is no number.
        """
        row = [Fraction(0)] * self.model.n
        for name, value in costs.items():
            row[self.model.index(name)] = exact(value)
        return all(self._keeps(condition, tuple(row)) for condition in self.conditions)

    def _keeps(self, condition: Condition, costs: Row) -> bool:
        change = dot(costs, condition.direction)
        if condition.toward.startswith("line"):
            return change == 0
        return change <= 0 if self.goal == "max" else change >= 0

    def table(self) -> Table:
        """The conditions on the costs, one row an edge; the constraints that make the cone as a note."""
        names = [f"cost of {name}" for name in self.model.variables]
        rows = []
        for condition in self.conditions:
            way, sign = condition.direction, "=" if condition.toward.startswith("line") else SIGN[self.goal]
            if next(value for value in way if value) < 0:
                way, sign = tuple(-value for value in way), TURNED[sign]
            rows.append((condition.toward, f"{linear(way, names)} {sign} 0"))
        made = [f"{name} {cell(costs)}" for name, costs in self.generators]
        made += [f"{name} ±{cell(costs)}" for name, costs in self.lines]
        word = "maximize" if self.goal == "max" else "minimize"
        title = f"{self.name} {cell(self.point)} is optimal ({word}) as long as"
        return Table(title, ("beside", "condition"), tuple(rows), (f"made of {'; '.join(made) or 'nothing'}",))


@dataclass(frozen=True, repr=False)
class Cones(Shown):
    """The cone of every vertex; together they hold every objective that has an optimum.

    Parameters
    ----------
    region : Region
    members : tuple of Cone
        In the order of ``region.vertices``.
    """

    region: Region = field(compare=False)
    members: tuple[Cone, ...]

    def best(self, costs: Mapping[str, object]) -> tuple[str, ...]:
        """Names of the vertices that are optimal for these costs; none where they have no optimum."""
        return tuple(cone.name for cone in self.members if cone.holds(costs))

    def table(self) -> Table:
        """A row a vertex and edge."""
        told = [(cone, cone.table()) for cone in self.members]
        rows = tuple((cone.name, cone.point, *row) for cone, table in told for row in table.rows)
        return Table("each vertex is optimal as long as", ("vertex", "point", "beside", "condition"), rows)


def cones(source: Model | Region) -> Cones:
    """For every vertex the cone of objectives for which it is optimal, in the goal of the model.

    Parameters
    ----------
    source : Model or Region
        Of an objective only the goal counts; without one it is "max".

    Returns
    -------
    Cones
        Without members where the region is empty.

    Raises
    ------
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.cones import cones
    >>> model = pw.from_algebra(maximize="3*x + 2*y", constraints={"labour": "2*x + y <= 4"},
    ...                         bounds={"x": (0, None), "y": (0, 3)})
    >>> found = cones(model)
    >>> print(found.members[2])
    V2 (0.5, 3) is optimal (maximize) as long as
    beside  condition
    V1      cost of x ≥ 0
    V3      cost of x - 2 cost of y ≤ 0
    made of labour (2, 1); y upper (0, 1)
    >>> found.best({"x": 2, "y": 1})
    ('V2', 'V3')

    References
    ----------
    Ziegler, Lectures on Polytopes, 1995, chapter 7 (the normal fan).
    """
    whole = source if isinstance(source, Region) else region(source)
    goal: Goal = whole.model.objective.goal if whole.model.objective else "max"
    return Cones(whole, tuple(_cone(whole, number, goal) for number in range(len(whole.base))))


def _cone(whole: Region, number: int, goal: Goal) -> Cone:
    flat = set(whole.equalities)
    point = whole.base[number]
    generators, lines = list[tuple[str, Row]](), list[tuple[str, Row]]()
    for row in whole.model.constraints:
        if row.is_constant or row.slack(point) != 0:
            continue
        _, inward = row.inward
        costs = inward if goal == "min" else tuple(-value for value in inward)
        (lines if row.name in flat else generators).append((row.name, costs))
    return Cone(whole, number, goal, tuple(generators), tuple(lines), _conditions(whole, number))


def _conditions(whole: Region, number: int) -> tuple[Condition, ...]:
    """One an edge; where the region has a line, one for every other base point, ray and line."""
    if whole.lines:
        return _conditions_with_lines(whole, number)
    found = []
    for edge in whole.edges:
        if edge.ray is not None and edge.start == number:
            found.append(Condition(f"ray {edge.ray}", whole.rays[edge.ray].direction))
        elif edge.end is not None and number in {edge.start, edge.end}:
            other = edge.end if edge.start == number else edge.start
            found.append(Condition(vertex_name(other), _way(whole, number, other)))
    return tuple(found)


def _conditions_with_lines(whole: Region, number: int) -> tuple[Condition, ...]:
    others = [other for other in range(len(whole.base)) if other != number]
    found = [Condition(f"base point {other}", _way(whole, number, other)) for other in others]
    found += [Condition(f"ray {k}", ray.direction) for k, ray in enumerate(whole.rays)]
    return tuple(found + [Condition(f"line {k}", line) for k, line in enumerate(whole.lines)])


def _way(whole: Region, start: int, end: int) -> Row:
    return primitive([b - a for a, b in zip(whole.base[start], whole.base[end], strict=True)])
