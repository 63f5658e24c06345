"""Where a point that someone computed lies: which vertex or face it is, whether it is allowed, whether it is best."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field
from fractions import Fraction

from polywalk.exact import Row
from polywalk.model import Constraint, Model
from polywalk.region import Region, vertex_name
from polywalk.region.spans import rank
from polywalk.reviewing.telling import listed
from polywalk.reviewing.tolerances import TOLERANCES, within
from polywalk.reviewing.verdicts import Verdict, judged, worst


@dataclass(frozen=True)
class Place:
    """The verdict on a point.

    Parameters
    ----------
    model : Model
    point : (n,) tuple of Fraction
        As it was given, decimals taken as decimals.
    active : tuple of str
        The constraints it lies on, exactly or within solver tolerance.
    violated : tuple of (str, Fraction)
        The constraints it violates, however little, and by how much.
    feasible : Verdict
    optimal : Verdict or None
        How far the objective is from the optimal value, for a feasible point; None where the model has no optimum.
    vertices : tuple of str
        The vertices of the smallest face that holds all constraints it lies on; empty where none is known.
    words : str
        The same as a phrase: "V3", "on the edge between V3 and V8", ...
    """

    model: Model = field(repr=False)
    point: Row
    active: tuple[str, ...]
    violated: tuple[tuple[str, Fraction], ...]
    feasible: Verdict
    optimal: Verdict | None
    vertices: tuple[str, ...]
    words: str

    @property
    def right(self) -> bool:
        """Whether it is an optimal point, exactly or within solver tolerance."""
        return self.feasible.right and self.optimal is not None and self.optimal.right

    @property
    def objective(self) -> Fraction | None:
        """The objective's value there."""
        return None if self.model.objective is None else self.model.objective.at(self.point)


def place(model: Model, point: Row, whole: Region | None, value: Fraction | None) -> Place:
    """Where the point lies.

    Parameters
    ----------
    model : Model
    point : (n,) tuple of Fraction
    whole : Region or None
        The model's region, where it is small enough to be listed.
    value : Fraction or None
        The optimal value.
    """
    near = [row for row in model.constraints if not row.is_constant and _is_near(row, point)]
    broken = [(row, _excess(row, point)) for row in model.constraints if not row.holds(point)]
    feasible = worst([judged(off, row.rhs, TOLERANCES.feasibility) for row, off in broken])
    goal = model.objective
    optimal = None if value is None or goal is None else judged(goal.at(point) - value, value, TOLERANCES.objective)
    names = tuple(row.name for row in near)
    corners = _corners(whole, set(names)) if feasible.right and whole is not None else ()
    words = "".join(_words(near, model.n, whole, corners)) if feasible.right else _outside(broken)
    violated = tuple((row.name, off) for row, off in broken)
    return Place(model, point, names, violated, feasible, optimal, tuple(map(vertex_name, corners)), words)


def _is_near(row: Constraint, point: Row) -> bool:
    return within(row.slack(point), row.rhs, TOLERANCES.feasibility)


def _excess(row: Constraint, point: Row) -> Fraction:
    return abs(row.slack(point))


def _outside(broken: list[tuple[Constraint, Fraction]]) -> str:
    names = [row.name for row, off in broken if not within(off, row.rhs, TOLERANCES.feasibility)]
    return f"outside: it violates {listed(names)}"


def _corners(whole: Region, names: set[str]) -> tuple[int, ...]:
    return tuple(k for k, vertex in enumerate(whole.vertices) if names <= set(vertex.active))


def _words(near: list[Constraint], n: int, whole: Region | None, corners: tuple[int, ...]) -> Iterator[str]:
    """The smallest face, in a phrase."""
    names = {row.name for row in near}
    left = n - rank([row.coefficients for row in near])
    on = f"where {listed(row.name for row in near)} {'is' if len(near) == 1 else 'are'} active"
    if whole is not None and left == whole.dimension:
        yield "inside the region" + (f", {on} all over" if near else "")
    elif whole is None or whole.lines or not corners:
        yield ("the point " if left == 0 else "on the face ") + on
        yield "" if whole is None or whole.lines else ", which is near the region and no vertex of it"
    elif left == 0:
        yield vertex_name(corners[0])
    else:
        ways = [f"ray {k}" for k, ray in enumerate(whole.rays) if names <= set(ray.active)]
        ends = (
            f"from {vertex_name(corners[0])} along {ways[0]}"
            if ways
            else f"between {listed(map(vertex_name, corners))}"
        )
        yield f"on the edge {ends}" if left == 1 else f"on the side of {listed([*map(vertex_name, corners), *ways])}"
        yield f", {on}"
