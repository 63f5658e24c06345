"""The bases of one vertex, the exchanges between them, and the edges that leave from each."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from fractions import Fraction
from numbers import Integral

from polywalk.errors import WalkError
from polywalk.exact import Row, primitive, short
from polywalk.linear import Dictionary
from polywalk.region import Region, Vertex, vertex_name
from polywalk.table import Shown, Table


def basis_name(number: int) -> str:
    """What basis ``number`` of a vertex is called in every table and picture."""
    return f"B{number}"


@dataclass(frozen=True, repr=False)
class Basis(Shown):
    """One of the bases of a vertex: n constraints held active that meet there and nowhere else.

    Parameters
    ----------
    number : int
        Its place in ``Bases.members``.
    held : (n,) tuple of str
        The constraints, in the model's order; equalities are among them.
    dictionary : Dictionary
        Its columns stand for the slacks of the constraints held.
    """

    number: int
    held: tuple[str, ...]
    dictionary: Dictionary = field(compare=False)

    @property
    def name(self) -> str:
        """What it is called: B0, B1, ..."""
        return basis_name(self.number)

    @property
    def optimal(self) -> bool:
        """Whether it is dual feasible: no slack that may enter improves the objective."""
        return not self.dictionary.improving()

    @property
    def reduced_costs(self) -> dict[str, Fraction]:
        """The change of the objective, in its own sense, per unit of slack of each constraint held."""
        now = self.dictionary
        found = {constraint_name(now, k): now.reduced_cost(j) for j, k in enumerate(now.nonbasic)}
        return {name: found[name] for name in self.held}

    def table(self) -> Table:
        """The constraints held, each with its reduced cost and whether letting it go improves the objective."""
        now = self.dictionary
        better = {constraint_name(now, now.nonbasic[j]) for j in now.improving()}
        rows = tuple((name, cost, name in better) for name, cost in self.reduced_costs.items())
        title = f"{self.name}: {'optimal' if self.optimal else 'not optimal'}"
        return Table(title, ("held active", "reduced cost", "improves"), rows)


@dataclass(frozen=True)
class Exchange:
    """Two bases that differ in one constraint: a degenerate pivot leads from one to the other.

    The simplex method takes it in one direction at most: its entry is the same number, inverted, both ways, and where
    it is negative the reduced cost has opposite signs at its two ends.

    Parameters
    ----------
    start, end : int
        Numbers of the bases: in the direction in which it improves, else from the lower number to the higher.
    entering, leaving : str
        The slacks, as in ``Pivot``.
    improves : bool
        Whether the simplex method may take it, from start to end: the reduced cost improves the objective, and the
        leaving slack falls, so that it runs out at step 0.
    """

    start: int
    end: int
    entering: str
    leaving: str
    improves: bool


@dataclass(frozen=True)
class Exit:
    """An entering slack that nothing stops at once: it leaves the vertex along an edge.

    Parameters
    ----------
    basis : int
        The number of the basis it leaves from.
    entering : str
    step : Fraction or None
        The step length; None along a ray.
    vertex : int or None
        The number of the vertex at the other end.
    ray : int or None
        The number of the ray, where there is no end.
    improves : bool
        Whether the simplex method may take it.
    """

    basis: int
    entering: str
    step: Fraction | None
    vertex: int | None
    ray: int | None
    improves: bool

    @property
    def target(self) -> str:
        """Where it leads: "V3", or "ray 0"."""
        return f"ray {self.ray}" if self.vertex is None else vertex_name(self.vertex)


def gather(first: Dictionary, limit: int) -> tuple[tuple[Basis, ...], bool]:
    """All bases of the first one's point, sorted by the constraints they hold, and whether none is missing.

    Any two of them are joined by exchanges of one constraint for another (the basis exchange of a matroid), so that a
    search along exchanges meets every one.

    References
    ----------
    Whitney, On the abstract properties of linear dependence, Amer. J. Math. 57, 1935.
    """
    found = {frozenset(first.nonbasic): first}
    waiting = [first]
    for now in waiting:
        for row, column in exchanges(now):
            held = frozenset(now.nonbasic) - {now.nonbasic[column]} | {now.basic[row]}
            if held in found:
                continue
            if len(found) == limit:
                return _sorted(found.values()), False
            found[held] = now.pivot(row, column)
            waiting.append(found[held])
    return _sorted(found.values()), True


def _sorted(dictionaries: Iterable[Dictionary]) -> tuple[Basis, ...]:
    listed = sorted(dictionaries, key=_places)
    return tuple(
        Basis(number, tuple(now.slacks.model.constraints[place].name for place in _places(now)), now)
        for number, now in enumerate(listed)
    )


def _places(now: Dictionary) -> list[int]:
    items = now.slacks.items
    return sorted(place for k in now.nonbasic if (place := items[k].constraint) is not None)


def exchanges(now: Dictionary) -> Iterator[tuple[int, int]]:
    """Rows and columns of every pivot that stays at the point: a slack at 0 that depends on the entering one."""
    for row, line in now.blocking_rows():
        if line[0] == 0:
            yield from ((row, j) for j, k in enumerate(now.nonbasic) if line[j + 1] and now.slacks.pivots[k])


def pivots_among(members: Sequence[Basis]) -> tuple[Exchange, ...]:
    """Every exchange between two of the bases, once."""
    numbers = {frozenset(basis.dictionary.nonbasic): basis.number for basis in members}
    found = []
    for basis in members:
        now, better = basis.dictionary, set(basis.dictionary.improving())
        for row, column in exchanges(now):
            entering, leaving = now.nonbasic[column], now.basic[row]
            other = numbers.get(frozenset(now.nonbasic) - {entering} | {leaving})
            if other is None:
                continue
            names, falls = now.slacks.names, now.rows[row][column + 1] < 0
            improves = falls and column in better
            if improves or (basis.number < other and not (falls and now.aim[column + 1])):
                found.append(Exchange(basis.number, other, names[entering], names[leaving], improves))
    return tuple(found)


def exits_from(basis: Basis, seen: Region) -> Iterator[Exit]:
    """Every slack that may enter and moves the point."""
    now, better = basis.dictionary, set(basis.dictionary.improving())
    corners = {vertex.point: number for number, vertex in enumerate(seen.vertices)}
    for column, index in enumerate(now.nonbasic):
        rows = now.first_to_run_out(column) if now.slacks.pivots[index] else None
        if rows is None or (rows and now.rows[rows[0]][0] == 0):
            continue
        name = now.slacks.names[index]
        if rows:
            step = -now.values[now.slacks.names[now.basic[rows[0]]]] / now.rate(rows[0], column)
            end = corners[_moved(now.point, step, now.direction(column))]
            yield Exit(basis.number, name, step, end, None, column in better)
        else:
            ways = [ray.direction for ray in seen.rays]
            yield Exit(basis.number, name, None, None, ways.index(primitive(now.direction(column))), column in better)


def _moved(point: Row, step: Fraction, direction: Row) -> Row:
    return tuple(x + step * rate for x, rate in zip(point, direction, strict=True))


def constraint_name(now: Dictionary, index: int) -> str:
    """The constraint a slack belongs to."""
    place = now.slacks.items[index].constraint
    return now.slacks.names[index] if place is None else now.slacks.model.constraints[place].name


def vertex_number(seen: Region, vertex: object) -> int:
    """A vertex's number, from the number itself, the vertex, or its point."""
    count = len(seen.vertices)
    if count == 0:
        why = "it is empty" if seen.status == "empty" else "it contains a line"
        raise WalkError(f"the region has no vertex, so there are no bases of one: {why}.", culprit=vertex)
    if isinstance(vertex, Integral) and not isinstance(vertex, bool):
        number = int(vertex)
        if not 0 <= number < count:
            raise WalkError(
                f"expected the number of one of the {count} vertices, from 0, got {number}.", culprit=vertex
            )
        return number
    if isinstance(vertex, str) or not isinstance(vertex, Vertex | Sequence | Mapping):
        raise WalkError(f"expected a vertex (its number, the vertex, or its point), got {vertex!r}.", culprit=vertex)
    point = vertex.point if isinstance(vertex, Vertex) else seen.model.point(vertex)
    found = [number for number, corner in enumerate(seen.vertices) if corner.point == point]
    if not found:
        told = ", ".join(map(short, point))
        raise WalkError(f"({told}) is none of the {count} vertices; see region(model).vertices.", culprit=vertex)
    return found[0]
