"""The optimal points of a model: its optimal vertices, by the names they have in the region."""

from __future__ import annotations

from dataclasses import dataclass

from polywalk.exact import Row
from polywalk.linear import Optimum
from polywalk.model import Model
from polywalk.region import Region, region, vertex_name
from polywalk.region.engine import SMALL_WORK, work


@dataclass(frozen=True)
class BestPoint:
    """An optimal vertex (a base point where the region has a line).

    Parameters
    ----------
    name : str
        As in the region, "V3", where the region is small enough to be listed; else "optimal vertex 1", ...
    point : (n,) tuple of Fraction
    active : tuple of str
        The constraints active there, in the model's order.
    """

    name: str
    point: Row
    active: tuple[str, ...]

    @property
    def degenerate(self) -> bool:
        """Whether more constraints are active than there are variables."""
        return len(self.active) > len(self.point)


def best_points(source: Model | Region, best: Optimum) -> tuple[tuple[BestPoint, ...], tuple[Row, ...]]:
    """The optimal vertices, and the directions in which the optimal points go on for ever."""
    model = best.model
    whole = source if isinstance(source, Region) else region(model) if is_small(model) else None
    if whole is not None and whole.optimal is not None:
        face = whole.optimal
        points = [(_name(whole, k), whole.base[k]) for k in face.vertices]
        ways = [whole.rays[k].direction for k in face.rays]
    elif _sole(best):
        assert best.point is not None
        whole, points, ways = None, [("optimal vertex 1", best.point)], []
    else:
        assert best.face is not None
        whole = region(best.face)
        points = [(f"optimal vertex {k + 1}", point) for k, point in enumerate(whole.base)]
        ways = [ray.direction for ray in whole.rays]
    lines = whole.lines if whole else ()
    ways += [tuple(sign * value for value in line) for line in lines for sign in (1, -1)]
    return tuple(BestPoint(name, point, active(model, point)) for name, point in points), tuple(ways)


def active(model: Model, point: Row) -> tuple[str, ...]:
    """The constraints that hold with equality at a point."""
    return tuple(row.name for row in model.constraints if not row.is_constant and row.slack(point) == 0)


def is_small(model: Model) -> bool:
    return work(model.n, len(model.constraints)) <= SMALL_WORK


def _name(whole: Region, k: int) -> str:
    return f"base point {k}" if whole.lines else vertex_name(k)


def _sole(best: Optimum) -> bool:
    """Whether the last dictionary shows that there is no other optimal point."""
    last = best.dictionary
    kinds = [last.slacks.items[k].kind for k in last.nonbasic]
    return all(kind == "equality" or (kind == "slack" and last.reduced_cost(j)) for j, kind in enumerate(kinds))
