"""The part of a walk that stays at one vertex: which of its bases it passes, and how that ends."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Literal

from polywalk.errors import WalkError
from polywalk.exact import Row, primitive
from polywalk.linear import Dictionary
from polywalk.region import Region, vertex_name
from polywalk.table import Shown, Table
from polywalk.walks.basis import Basis, basis_name
from polywalk.walks.pivots import Pivot
from polywalk.walks.results import Walk

RouteEnd = Literal["leaves", "optimal", "cycling", "stopped", "elsewhere"]


@dataclass(frozen=True, repr=False)
class Route(Shown):
    """The way of one walk among the bases of one vertex.

    Parameters
    ----------
    vertex : int
        The number of the vertex.
    walk : Walk
    places : tuple of int
        Numbers of the bases in the order met; none where the walk does not come here. A cycle ends at the basis it
        goes round from.
    stays : tuple of Pivot
        The degenerate pivots between them, one less than ``places``.
    arrival, departure : Pivot or None
        The pivot it came by (None where it starts here) and the one it left by (None where it does not leave).
    target : str
        Where it left for: "V3" or "ray 0"; empty where it does not leave.
    """

    vertex: int
    walk: Walk = field(compare=False)
    places: tuple[int, ...]
    stays: tuple[Pivot, ...] = field(compare=False)
    arrival: Pivot | None = field(compare=False)
    departure: Pivot | None = field(compare=False)
    target: str

    @property
    def end(self) -> RouteEnd:
        """How the stay ends; "elsewhere" for a walk that does not come here."""
        if not self.places:
            return "elsewhere"
        if self.departure is not None:
            return "leaves"
        end = self.walk.end
        return end if end in {"optimal", "cycling"} else "stopped"

    @property
    def story(self) -> str:
        """The route in one line."""
        if not self.places:
            return f"{self._rule} does not come to {vertex_name(self.vertex)}"
        path = " → ".join(basis_name(number) for number in self.places)
        return f"{self._rule}: {path} ({self._count}), {self._ending()}"

    @property
    def brief(self) -> str:
        """The same without the way: rule, stays, how it ends."""
        if not self.places:
            return f"{self._rule}: elsewhere"
        return f"{self._rule}: {self._count}, {f'to {self.target}' if self.target else self.end}"

    @property
    def _rule(self) -> str:
        return f"{self.walk.rule} with {self.walk.leaving}"

    @property
    def _count(self) -> str:
        return f"{len(self.stays)} {'stay' if len(self.stays) == 1 else 'stays'}"

    def _ending(self) -> str:
        if self.departure is not None:
            return f"then pivot {self.departure.number} leaves for {self.target}"
        if self.end == "cycling":
            return f"and again from {basis_name(self.places[-1])}, for ever"
        return "optimal here" if self.end == "optimal" else "stopped at the limit"

    def table(self) -> Table:
        """The stays, one row each."""
        pairs = zip(self.stays, self.places[:-1], self.places[1:], strict=True)
        rows = tuple((p.number, basis_name(a), p.entering, p.leaving, basis_name(b)) for p, a, b in pairs)
        columns = ("pivot", "from", "entering", "leaving", "to")
        return Table(self.story, columns if rows else (), rows)


def route(walk: Walk, members: Sequence[Basis], vertex: int, seen: Region) -> Route:
    """The part of a walk that is at a vertex whose bases are given.

    A walk improves with every step, so it is there in one stretch. Phase I pivots at the vertex are left out: they
    have the auxiliary variable in their dictionary and are no bases of the model.

    Raises
    ------
    WalkError
        A walk of another model, or one that meets a basis that is not among those given.
    """
    if walk.model != seen.model:
        raise WalkError("the walk belongs to another model; walk the model whose bases these are.", culprit=walk)
    numbers = {frozenset(basis.dictionary.nonbasic): basis.number for basis in members}
    places, stays = list[int](), list[Pivot]()
    arrival = departure = None
    if _is_here(walk.first, seen.vertices[vertex].point):
        places.append(_number(walk.first, numbers))
    for pivot in walk.pivots:
        after = pivot.kind != "ray" and _is_here(pivot.after, seen.vertices[vertex].point)
        if places and not after:
            departure = pivot
            break
        if places:
            stays.append(pivot)
        elif after:
            arrival = pivot
        if after:
            places.append(_number(pivot.after, numbers))
    target = "" if departure is None else _target(departure, seen)
    return Route(vertex, walk, tuple(places), tuple(stays), arrival, departure, target)


def _is_here(now: Dictionary, point: Row) -> bool:
    return now.phase == 2 and now.feasible and now.point == point


def _number(now: Dictionary, numbers: dict[frozenset[int], int]) -> int:
    found = numbers.get(frozenset(now.nonbasic))
    if found is None:
        held = ", ".join(now.slacks.names[k] for k in now.nonbasic)
        raise WalkError(
            f"the walk meets a basis ({held}) that is not among the {len(numbers)} found; raise limit in bases(...).",
            culprit=tuple(now.nonbasic),
        )
    return found


def _target(pivot: Pivot, seen: Region) -> str:
    if pivot.kind == "ray":
        return f"ray {[ray.direction for ray in seen.rays].index(primitive(pivot.direction))}"
    return vertex_name([vertex.point for vertex in seen.vertices].index(pivot.point_after))
