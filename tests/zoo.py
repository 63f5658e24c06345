"""The awkward models, named once: small enough that every fact beside them was worked out by hand.

``ZOO`` maps a name to a model and the facts known of its region: status, dimension, points (of the vertices, or of the
base where there is a line), rays, number of lines, edges and facets, outcome, value, volume, square of the measure,
equalities, degenerate points. A fact that is not named is not claimed.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from polywalk.exact import exact
from polywalk.model import Constraint, Model, Objective

Row = tuple[str, Sequence[object], str, object]


def build(variables: str, rows: Sequence[Row], goal: tuple[str, Sequence[object]] | None = None) -> Model:
    """A model from names in one string, rows (name, coefficients, sense, right-hand side) and (goal, coefficients)."""
    listed = tuple(Constraint(name, tuple(map(exact, row)), sense, exact(rhs)) for name, row, sense, rhs in rows)
    objective = Objective(goal[0], tuple(map(exact, goal[1]))) if goal else None
    return Model(tuple(variables.split()), listed, objective)


def plain(a: Sequence[Sequence[object]], b: Sequence[object], equal: Sequence[int] = ()) -> Model:
    """A model from A x <= b, rows named by their number, those in ``equal`` as equalities."""
    rows = [(f"row {k}", row, "==" if k in equal else "<=", b[k]) for k, row in enumerate(a)]
    return build(" ".join(f"x{j + 1}" for j in range(len(a[0]))), rows)


def unit(n: int, j: int) -> list[int]:
    """The coefficients of variable j alone."""
    return [int(i == j) for i in range(n)]


def nonnegative(variables: str) -> list[Row]:
    """The lower bounds 0, named as "x lower"."""
    names = variables.split()
    return [(f"{name} lower", unit(len(names), j), ">=", 0) for j, name in enumerate(names)]


def boxed(variables: str, size: object = 1) -> list[Row]:
    """Bounds 0 and ``size`` of every variable."""
    rows = nonnegative(variables)
    return rows + [(name.replace("lower", "upper"), row, "<=", size) for name, row, _, _ in rows]


XY, XYZ = nonnegative("x y"), nonnegative("x y z")
SQUARE, CUBE = boxed("x y"), boxed("x y z")
PYRAMID: list[Row] = [
    ("floor", [0, 0, 1], ">=", 0),
    ("east", [1, 0, 1], "<=", 1),
    ("west", [-1, 0, 1], "<=", 1),
    ("north", [0, 1, 1], "<=", 1),
    ("south", [0, -1, 1], "<=", 1),
]

ZOO: dict[str, tuple[Model, dict[str, Any]]] = {
    "empty": (
        build("x y", [*XY, ("cap", [1, 1], "<=", -1)], ("max", [1, 0])),
        {"status": "empty", "dimension": -1, "points": [], "rays": [], "lines": 0, "edges": 0, "facets": 0}
        | {"outcome": "empty", "value": None, "volume": 0, "squared": 0, "equalities": ()},
    ),
    "empty though its directions go on": (
        build("x y", [("more", [1, 0], ">=", 1), ("less", [1, 0], "<=", 0), ("y lower", [0, 1], ">=", 0)]),
        {"status": "empty", "dimension": -1, "points": [], "rays": [], "lines": 0, "outcome": "empty"},
    ),
    "empty by a row without variables": (
        build("x y", [*SQUARE, ("never", [0, 0], "<=", -1)]),
        {"status": "empty", "dimension": -1, "points": [], "facets": 0},
    ),
    "empty by an equality without variables": (
        build("x", [("never", [0], "==", 1)]),
        {"status": "empty", "dimension": -1, "points": [], "lines": 0},
    ),
    "a row without variables that says nothing": (
        build("x y", [*SQUARE, ("always", [0, 0], "<=", 0)]),
        {"status": "bounded", "dimension": 2, "points": [(0, 0), (0, 1), (1, 0), (1, 1)], "facets": 4}
        | {"equalities": (), "degenerate": []},
    ),
    "single point": (
        build("x y", [("sum", [1, 1], "==", 3), ("gap", [1, -1], "==", 1)], ("max", [1, 1])),
        {"status": "bounded", "dimension": 0, "points": [(2, 1)], "edges": 0, "facets": 0, "value": 3, "squared": 1}
        | {"equalities": ("sum", "gap"), "volume": 0, "degenerate": []},
    ),
    "single point at the origin": (
        build("x y", [*XY, ("cap", [1, 1], "<=", 0)], ("min", [1, 0])),
        {"status": "bounded", "dimension": 0, "points": [(0, 0)], "rays": [], "edges": 0, "facets": 0, "value": 0}
        | {"equalities": ("x lower", "y lower", "cap"), "degenerate": [(0, 0)]},
    ),
    "interval": (
        build("x", [("low", [2], ">=", 1), ("high", [1], "<=", 2)], ("max", [3])),
        {"status": "bounded", "dimension": 1, "points": [("1/2",), (2,)], "edges": 1, "facets": 2, "value": 6}
        | {"volume": "3/2", "squared": "9/4"},
    ),
    "half-line": (
        build("x", [("low", [1], ">=", 5)], ("min", [2])),
        {"status": "unbounded", "dimension": 1, "points": [(5,)], "rays": [(1,)], "edges": 1, "facets": 1, "value": 10}
        | {"volume": None, "squared": None},
    ),
    "segment in the plane": (
        build("x y", [*XY, ("sum", [1, 1], "==", 2)], ("max", [0, 1])),
        {"status": "bounded", "dimension": 1, "points": [(0, 2), (2, 0)], "edges": 1, "facets": 2, "value": 2}
        | {"volume": 0, "squared": 8, "equalities": ("sum",)},
    ),
    "segment by two inequalities": (
        build("x y", [*XY, ("most", [1, 1], "<=", 2), ("least", [2, 2], ">=", 4)]),
        {"status": "bounded", "dimension": 1, "points": [(0, 2), (2, 0)], "edges": 1, "facets": 2}
        | {"squared": 8, "equalities": ("most", "least"), "degenerate": [(0, 2), (2, 0)]},
    ),
    "ray in the plane": (
        build("x y", [("level", [0, 1], "==", 0), ("x lower", [1, 0], ">=", 0)]),
        {"status": "unbounded", "dimension": 1, "points": [(0, 0)], "rays": [(1, 0)], "edges": 1, "facets": 1},
    ),
    "ray in the plane beside a loose row": (
        build("x y", [("level", [0, 1], "==", 0), ("x lower", [1, 0], ">=", 0), ("loose", [0, 1], "<=", 5)]),
        {"status": "unbounded", "dimension": 1, "points": [(0, 0)], "rays": [(1, 0)], "edges": 1, "facets": 1},
    ),
    "flat in space": (
        build("x y z", [*XYZ, ("sum", [1, 1, 1], "==", 1)], ("max", [1, 2, 3])),
        {"status": "bounded", "dimension": 2, "points": [(0, 0, 1), (0, 1, 0), (1, 0, 0)], "edges": 3, "facets": 3}
        | {"value": 3, "volume": 0, "squared": "3/4", "equalities": ("sum",), "outline": 3},
    ),
    "flat and unbounded in space": (
        build("x y z", [*XYZ, ("gap", [1, -1, 0], "==", 0)]),
        {"status": "unbounded", "dimension": 2, "points": [(0, 0, 0)], "rays": [(0, 0, 1), (1, 1, 0)], "edges": 2}
        | {"facets": 2, "equalities": ("gap",), "outline": 1, "degenerate": [(0, 0, 0)]},
    ),
    "redundant equality": (
        build("x y", [*XY, ("sum", [1, 1], "==", 2), ("twice", [2, 2], "==", 4)], ("min", [1, 0])),
        {"status": "bounded", "dimension": 1, "points": [(0, 2), (2, 0)], "edges": 1, "equalities": ("sum", "twice")}
        | {"degenerate": [(0, 2), (2, 0)], "value": 0},
    ),
    "contradicting equalities": (
        build("x y", [("sum", [1, 1], "==", 2), ("twice", [2, 2], "==", 5)]),
        {"status": "empty", "dimension": -1, "points": [], "lines": 0},
    ),
    "strip with a line": (
        build("x y", [("low", [1, 1], ">=", 0), ("high", [1, 1], "<=", 2)], ("max", [1, 1])),
        {"status": "unbounded", "dimension": 2, "points": [(0, 0), (0, 2)], "rays": [], "lines": 1, "edges": 0}
        | {"facets": 2, "outcome": "optimal", "value": 2, "outline": 0},
    ),
    "strip with a line, objective along it": (
        build("x y", [("low", [1, 1], ">=", 0), ("high", [1, 1], "<=", 2)], ("max", [1, 0])),
        {"status": "unbounded", "lines": 1, "outcome": "unbounded", "value": None},
    ),
    "wedge with a line": (
        build("x y z", [("right", [1, 1, 0], "<=", 1), ("left", [-1, 1, 0], "<=", 1)]),
        {"status": "unbounded", "dimension": 3, "points": [(0, 1, 0)], "rays": [(-1, -1, 0), (1, -1, 0)], "lines": 1}
        | {"edges": 0, "facets": 2},
    ),
    "line in space": (
        build("x y z", [("level", [0, 0, 1], "==", 2), ("gap", [1, -1, 0], "==", 0)]),
        {"status": "unbounded", "dimension": 1, "points": [(0, 0, 2)], "rays": [], "lines": 1, "facets": 0},
    ),
    "whole space": (
        build("x y", [], ("min", [0, 0])),
        {"status": "unbounded", "dimension": 2, "points": [(0, 0)], "rays": [], "lines": 2, "edges": 0, "facets": 0}
        | {"outcome": "optimal", "value": 0, "equalities": ()},
    ),
    "half-space": (
        build("x y", [("cap", [1, 1], "<=", 1)], ("max", [1, 1])),
        {"status": "unbounded", "dimension": 2, "rays": [(0, -1)], "points": [(0, 1)], "lines": 1, "facets": 1}
        | {"value": 1},
    ),
    "cone at the origin": (
        build("x y", XY, ("min", [1, 1])),
        {"status": "unbounded", "dimension": 2, "points": [(0, 0)], "rays": [(0, 1), (1, 0)], "edges": 2, "facets": 2}
        | {"value": 0, "outline": 1, "degenerate": []},
    ),
    "cone at the origin with loose rows": (
        build("x y", [*XY, ("loose", [1, 1], ">=", -1), ("touching", [1, 1], ">=", 0)], ("max", [1, 1])),
        {"status": "unbounded", "dimension": 2, "points": [(0, 0)], "rays": [(0, 1), (1, 0)], "edges": 2, "facets": 2}
        | {"outcome": "unbounded", "degenerate": [(0, 0)]},
    ),
    "square cone in space": (
        build(
            "x y z",
            [(f"side {x}{y}", [x, y, 1], ">=", 0) for x, y in ((1, 0), (-1, 0), (0, 1), (0, -1))],
        ),
        {"status": "unbounded", "dimension": 3, "points": [(0, 0, 0)], "edges": 4, "facets": 4}
        | {"rays": [(-1, -1, 1), (-1, 1, 1), (1, -1, 1), (1, 1, 1)], "degenerate": [(0, 0, 0)]},
    ),
    "unbounded with two vertices": (
        build("x y", [*XY, ("least", [1, 1], ">=", 1)], ("max", [1, -1])),
        {"status": "unbounded", "dimension": 2, "points": [(0, 1), (1, 0)], "rays": [(0, 1), (1, 0)], "edges": 3}
        | {"facets": 3, "outcome": "unbounded", "value": None, "outline": 2, "degenerate": []},
    ),
    "unbounded with a bounded objective": (
        build("x y", [*XY, ("least", [1, 1], ">=", 1)], ("min", [1, 1])),
        {"status": "unbounded", "outcome": "optimal", "value": 1, "optimal": ((0, 1), (), ())},
    ),
    "unbounded optimal face": (
        build("x y", [*XY, ("cap", [0, 1], "<=", 2)], ("max", [0, 1])),
        {"status": "unbounded", "points": [(0, 0), (0, 2)], "rays": [(1, 0)], "edges": 3, "facets": 3, "value": 2}
        | {"optimal": ((1,), (0,), ()), "outline": 2},
    ),
    "tied optimum": (
        build("x y", [*XY, ("cap", [1, 1], "<=", 2)], ("max", [3, 3])),
        {"status": "bounded", "points": [(0, 0), (0, 2), (2, 0)], "value": 6, "optimal": ((1, 2), (), ()), "volume": 2},
    ),
    "pyramid": (
        build("x y z", PYRAMID, ("max", [0, 0, 1])),
        {"status": "bounded", "dimension": 3, "edges": 8, "facets": 5, "value": 1, "volume": "4/3"}
        | {"points": [(-1, -1, 0), (-1, 1, 0), (0, 0, 1), (1, -1, 0), (1, 1, 0)], "degenerate": [(0, 0, 1)]},
    ),
    "bevelled corner": (
        build("x y z", [*CUBE, ("bevel", [1, 1, 1], "<=", "5/2")], ("max", [1, 1, 1])),
        {"status": "bounded", "dimension": 3, "edges": 15, "facets": 7, "value": "5/2", "volume": "47/48"}
        | {"optimal": ((4, 7, 9), (), ()), "degenerate": []},
    ),
    "touching redundant row": (
        build("x y", [*SQUARE, ("touch", [1, 1], "<=", 2)], ("max", [1, 1])),
        {"status": "bounded", "points": [(0, 0), (0, 1), (1, 0), (1, 1)], "edges": 4, "facets": 4, "volume": 1}
        | {"degenerate": [(1, 1)], "value": 2},
    ),
    "row touching along an edge": (
        build("x y z", [*CUBE, ("touch", [1, 1, 0], "<=", 2)]),
        {"status": "bounded", "edges": 12, "facets": 6, "volume": 1, "degenerate": [(1, 1, 0), (1, 1, 1)]},
    ),
    "duplicate rows": (
        build(
            "x y",
            [*XY, ("cap", [1, 1], "<=", 1), ("third", ["1/3", "1/3"], "<=", "1/3"), ("again", [-3, -3], ">=", -3)],
        ),
        {"status": "bounded", "points": [(0, 0), (0, 1), (1, 0)], "edges": 3, "facets": 3, "volume": "1/2"}
        | {"degenerate": [(0, 1), (1, 0)]},
    ),
}
