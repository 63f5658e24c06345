"""The parts of a region: vertices, rays, edges, facets. All exact, all frozen."""

from __future__ import annotations

from dataclasses import dataclass, field
from fractions import Fraction
from functools import cached_property

from polywalk.exact import Row, dot
from polywalk.model import Model


def vertex_name(number: int) -> str:
    """What vertex ``number`` of a region is called in every table, picture and widget."""
    return f"V{number}"


@dataclass(frozen=True)
class Vertex:
    """A corner of the region.

    Parameters
    ----------
    point : (n,) tuple of Fraction
        In the order of the model's variables.
    active : tuple of str
        Every constraint that holds with equality here, in the model's order; equalities are among them.
    model : Model
    """

    point: Row
    active: tuple[str, ...]
    model: Model = field(repr=False, compare=False)

    @property
    def objective(self) -> Fraction | None:
        """The objective's value here, its constant included; None without an objective."""
        return None if self.model.objective is None else self.model.objective.at(self.point)

    @property
    def degeneracy(self) -> int:
        """How many more constraints are active than the variables need: 0 at a simple vertex."""
        return len(self.active) - len(self.point)

    @property
    def degenerate(self) -> bool:
        """Whether more constraints are active than there are variables."""
        return self.degeneracy > 0

    @cached_property
    def slacks(self) -> dict[str, Fraction]:
        """The slack of every constraint here, by its name."""
        return {row.name: row.slack(self.point) for row in self.model.constraints}


@dataclass(frozen=True)
class Ray:
    """A direction in which the region goes on for ever.

    Parameters
    ----------
    direction : (n,) tuple of Fraction
        In the smallest integers.
    active : tuple of str
        The constraints whose slack does not change along it, in the model's order.
    model : Model
    """

    direction: Row
    active: tuple[str, ...]
    model: Model = field(repr=False, compare=False)

    @property
    def change(self) -> Fraction | None:
        """The objective's change along one such direction; None without an objective."""
        goal = self.model.objective
        return None if goal is None else dot(goal.coefficients, self.direction)


@dataclass(frozen=True)
class Edge:
    """An edge from a vertex to another one, or along a ray.

    Parameters
    ----------
    start : int
        The number of the vertex it starts at.
    end : int or None
        The number of the vertex it ends at; larger than ``start``.
    ray : int or None
        The number of the ray it follows, where it does not end.
    active : tuple of str
        The constraints that are active all along it, in the model's order.
    """

    start: int
    end: int | None
    ray: int | None
    active: tuple[str, ...]


@dataclass(frozen=True)
class Facet:
    """A face of one dimension less than the region.

    Parameters
    ----------
    constraints : tuple of str
        Every constraint that holds with equality on exactly this face: duplicates stand together.
    vertices : tuple of int
        Numbers of its vertices (of its base points, where the region has a line). In cyclic order where the facet is a
        polygon; an unbounded one runs from the vertex of one ray to the vertex of the other.
    rays : tuple of int
        Numbers of its rays.
    """

    constraints: tuple[str, ...]
    vertices: tuple[int, ...]
    rays: tuple[int, ...]


@dataclass(frozen=True)
class Face:
    """A face named by what generates it.

    Parameters
    ----------
    vertices, rays, lines : tuple of int
        Numbers of vertices (or base points), rays and lines of the region.
    """

    vertices: tuple[int, ...]
    rays: tuple[int, ...]
    lines: tuple[int, ...]
