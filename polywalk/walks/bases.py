"""All bases of a vertex, the degenerate pivots among them, and the edges that leave: where a walk can stall."""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cached_property
from typing import Any

from polywalk.errors import WalkError
from polywalk.exact import short
from polywalk.linear import dictionary_of
from polywalk.model import Model
from polywalk.region import Region, Vertex, region, vertex_name
from polywalk.table import Shown, Table
from polywalk.walks.basis import Basis, Exchange, Exit, basis_name, exits_from, gather, pivots_among, vertex_number
from polywalk.walks.order import ranks
from polywalk.walks.results import Walk
from polywalk.walks.routes import Route, route
from polywalk.walks.start import first_dictionary
from polywalk.walks.trace import walk


@dataclass(frozen=True, repr=False)
class Bases(Shown):
    """Every basis of one vertex and what leads from each.

    Parameters
    ----------
    region : Region
    number : int
        The number of the vertex in ``region.vertices``.
    members : tuple of Basis
        Sorted by the constraints they hold; B3 is ``members[3]``.
    complete : bool
        False where the search stopped at its limit, so that bases are missing.
    """

    region: Region = field(compare=False)
    number: int
    members: tuple[Basis, ...]
    complete: bool

    @property
    def model(self) -> Model:
        """The model."""
        return self.region.model

    @property
    def vertex(self) -> Vertex:
        """The vertex."""
        return self.region.vertices[self.number]

    @cached_property
    def pivots(self) -> tuple[Exchange, ...]:
        """Every pair of bases one degenerate pivot apart, in the direction in which it improves."""
        return pivots_among(self.members)

    @cached_property
    def exits(self) -> tuple[Exit, ...]:
        """Every edge that leaves, once for each basis it leaves from."""
        return tuple(found for basis in self.members for found in exits_from(basis, self.region))

    @property
    def optimal(self) -> tuple[int, ...]:
        """Numbers of the optimal bases; none unless the vertex is optimal."""
        return tuple(basis.number for basis in self.members if basis.optimal)

    @cached_property
    def onward(self) -> tuple[tuple[int, ...], ...]:
        """For each basis the numbers of those that an improving degenerate pivot leads to."""
        found: list[list[int]] = [[] for _ in self.members]
        for pivot in self.pivots:
            if pivot.improves:
                found[pivot.start].append(pivot.end)
        return tuple(tuple(sorted(ends)) for ends in found)

    @cached_property
    def fewest(self) -> tuple[int | None, ...]:
        """For each basis the fewest degenerate pivots to one that is optimal or can leave: what no rule can beat.

        0 where no degenerate pivot is needed. None only where bases are missing.
        """
        ends = {*self.optimal, *(found.basis for found in self.exits if found.improves)}
        done = dict.fromkeys(sorted(ends), 0)
        back: dict[int, list[int]] = {}
        for pivot in self.pivots:
            if pivot.improves:
                back.setdefault(pivot.end, []).append(pivot.start)
        waiting = list(done)
        for number in waiting:
            for other in back.get(number, []):
                if other not in done:
                    done[other] = done[number] + 1
                    waiting.append(other)
        return tuple(done.get(basis.number) for basis in self.members)

    def walk(self, start: int, rule: Any = "dantzig", **options: Any) -> Walk:
        """The walk of a rule from basis ``start``, to the end of the model; options as for ``walk``."""
        return walk(self.model, rule, start=self._member(start).held, **options)

    def route(self, walked: Walk) -> Route:
        """The part of a walk that stays here.

        Raises
        ------
        WalkError
            A walk of another model; or, where bases are missing, one that meets a missing one.
        """
        return route(walked, self.members, self.number, self.region)

    def reachable(self, start: int, rule: Any = None, **options: Any) -> tuple[int, ...]:
        """Numbers of the bases that degenerate pivots lead to from basis ``start``, itself included.

        Parameters
        ----------
        start : int
        rule : optional
            An entering rule; None for any sequence of improving pivots whatever.
        **options
            As for ``walk``, such as ``leaving``.
        """
        if rule is not None:
            return tuple(sorted(set(self.route(self.walk(start, rule, **options)).places)))
        waiting = [self._member(start).number]
        for number in waiting:
            waiting += [other for other in self.onward[number] if other not in waiting]
        return tuple(sorted(waiting))

    def _member(self, number: int) -> Basis:
        if isinstance(number, bool) or not isinstance(number, int) or not 0 <= number < len(self.members):
            raise WalkError(
                f"expected the number of one of the {len(self.members)} bases of {vertex_name(self.number)}, counted "
                f"from 0, got {number!r}.",
                culprit=number,
            )
        return self.members[number]

    def table(self) -> Table:
        """The bases, one row each."""
        ways: dict[int, list[str]] = {}
        for found in self.exits:
            if found.improves:
                ways.setdefault(found.basis, []).append(found.target)
        rows = tuple(
            (
                basis.name,
                ", ".join(basis.held),
                basis.optimal,
                ", ".join(map(basis_name, self.onward[basis.number])),
                ", ".join(ways.get(basis.number, [])),
            )
            for basis in self.members
        )
        columns = ("basis", "held active", "optimal", "may pivot to", "may leave for")
        return Table(self.title, columns, rows, self._notes())

    @property
    def title(self) -> str:
        """The vertex, how many constraints meet there, and how many bases that makes."""
        point = ", ".join(map(short, self.vertex.point))
        meet, count = len(self.vertex.active), len(self.members)
        more = f"{meet} constraints meet" + (f" where {self.model.n} would do" if self.vertex.degenerate else "")
        found = f"{count} {'basis' if count == 1 else 'bases'}{'' if self.complete else ' found, and there are more'}"
        return f"{vertex_name(self.number)} ({point}): {more}; {found}"

    def _notes(self) -> tuple[str, ...]:
        notes = []
        if self.optimal and len(self.optimal) < len(self.members):
            notes.append(
                f"the vertex is optimal, but only {len(self.optimal)} of the {len(self.members)} bases show it: at the "
                "others the simplex method goes on pivoting without moving"
            )
        if not self.optimal:
            away = [steps for steps in self.fewest if steps is not None]
            most = max(away, default=0)
            count = f"{most} degenerate {'pivot' if most == 1 else 'pivots'}"
            notes.append(f"from every basis at most {count} would lead out, well chosen")
        if not self.complete:
            notes.append(f"the search stopped at {len(self.members)} bases; ask for more with limit=...")
        return tuple(notes)


def bases(model: Model, vertex: object, limit: int = 5_000) -> Bases:
    """All bases of a vertex: every way to hold n constraints active there.

    Equalities are held active in every basis; where they depend on one another, the first independent ones.

    Parameters
    ----------
    model : Model
    vertex : int, Vertex, sequence or mapping
        A vertex's number in ``region(model).vertices``, the vertex, or its point.
    limit : int, optional
        The most bases to find; ``Bases.complete`` and the table say where it was reached.

    Returns
    -------
    Bases

    Raises
    ------
    WalkError
        No such vertex; a region without vertices; a limit that is no number of bases.
    UnknownName, NumberError
        A point that is no point of the model's decisions.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="2*x + y", constraints={"labour": "x + y <= 2", "press": "2*x + y <= 4"},
    ...                         bounds={"x": (0, None), "y": (0, None)})
    >>> found = pw.bases(model, (2, 0))
    >>> print(found)
    V2 (2, 0): 3 constraints meet where 2 would do; 3 bases
    basis  held active      optimal  may pivot to  may leave for
    B0     labour, press    yes
    B1     labour, y lower  yes
    B2     press, y lower   yes
    >>> print(found.route(pw.walk(model)))
    dantzig with lowest-index: B1 (0 stays), optimal here

    References
    ----------
    Gal, On the structure of the set bases of a degenerate point, J. Optim. Theory Appl. 45, 1985 (bases as a graph of
    degenerate pivots; from memory); Whitney, On the abstract properties of linear dependence, Amer. J. Math. 57, 1935
    (exchange reaches all of them).
    """
    if isinstance(limit, bool) or not isinstance(limit, int) or limit < 1:
        raise WalkError(f"expected as limit a number of bases, 1 or more, got {limit!r}.", culprit=limit)
    seen = region(model)
    number = vertex_number(seen, vertex)
    opened = dictionary_of(model)
    first = first_dictionary(opened, seen.vertices[number].point, ranks(opened.slacks, None)).dictionary
    return Bases(seen, number, *gather(first, limit))
