"""Regions against two independent oracles: brute force on small models, Qhull on well-conditioned ones."""

from __future__ import annotations

import random
from collections import Counter
from fractions import Fraction

import numpy as np
import pytest
from oracle import Truth, truth
from scipy.spatial import HalfspaceIntersection
from zoo import ZOO, build, unit

from polywalk.model import Model
from polywalk.region import Region, region

KINDS = ("any", "degenerate", "flat", "empty", "unbounded", "tied")
EACH = 85
"""Models of each kind built on purpose: 6 x 85 = 510."""


def small(kind: str, draw: random.Random) -> Model:
    """A small model that is of its kind by construction, except for "any"; x >= 0 keeps most of them without a line."""
    n = draw.choice([1, 2, 2, 3, 3])
    at = [draw.randint(0, 3) for _ in range(n)]
    rows = [(f"x{j} lower", unit(n, j), ">=", 0) for j in range(n) if kind != "any" or draw.random() < 0.85]
    if kind != "unbounded":
        rows += [(f"x{j} upper", unit(n, j), "<=", 4) for j in range(n) if kind != "any" or draw.random() < 0.7]
    rows += [random_row(f"r{k}", n, at, draw, kind) for k in range(draw.randint(1, 3))]
    if kind == "flat":
        row = some(n, draw)
        rows.append(("level", row, "==", sum(a * b for a, b in zip(row, at, strict=True))))
    if kind == "empty":
        row = some(n, draw)
        rhs = draw.randint(-3, 3)
        rows += [("most", row, "<=", rhs), ("least", [2 * a for a in row], ">=", 2 * rhs + draw.randint(1, 3))]
    if kind == "degenerate":  # one vertex with more rows through it than variables, since x = at is feasible for all
        rows += [(f"fix{j}", unit(n, j), "<=", at[j]) for j in range(n)]
        row = [abs(a) + 1 for a in some(n, draw)]
        rows.append(("touch", row, "<=", sum(a * b for a, b in zip(row, at, strict=True))))
    goal = [draw.randint(-2, 2) for _ in range(n)]
    if kind == "tied":  # the objective is a row that holds with equality somewhere: a whole face may be optimal
        goal = [int(j == 0) for j in range(n)] if n > 1 else [0]
    draw.shuffle(rows)
    return build(" ".join(f"x{j}" for j in range(n)), rows, (draw.choice(["min", "max"]), goal))


def random_row(name: str, n: int, at: list[int], draw: random.Random, kind: str) -> tuple:
    """A row the point ``at`` satisfies (for "any": perhaps not), with tight and repeated ones now and then."""
    row = some(n, draw)
    room = draw.choice([0, 0, 1, 2]) if kind != "any" else draw.randint(-1, 2)
    if kind == "unbounded":
        row = [abs(a) for a in row]
        return name, row, ">=", sum(a * b for a, b in zip(row, at, strict=True)) - room
    return name, row, "<=", sum(a * b for a, b in zip(row, at, strict=True)) + room


def some(n: int, draw: random.Random) -> list[int]:
    """A random row that is not zero."""
    row = [draw.randint(-2, 2) for _ in range(n)]
    return row if any(row) else unit(n, 0)


def agree(found: Region, expected: Truth) -> None:
    """Every answer of the region against brute force."""
    assert bool(found.lines) == (expected.line and found.status != "empty")
    if expected.line:
        return
    assert found.status == expected.status
    assert found.dimension == expected.dimension
    assert {vertex.point: vertex.active for vertex in found.vertices} == expected.vertices
    assert len(found.vertices) == len(expected.vertices)
    assert {ray.direction: ray.active for ray in found.rays} == (expected.rays if expected.vertices else {})
    ends = [found.vertices[e.end].point if e.end is not None else found.rays[e.ray].direction for e in found.edges]  # type: ignore[index]
    pairs = [frozenset({found.vertices[e.start].point, end}) for e, end in zip(found.edges, ends, strict=True)]
    assert frozenset(pairs) == expected.edges
    assert len(pairs) == len(expected.edges)
    assert frozenset(facet.constraints for facet in found.facets) == expected.facets
    assert len(found.facets) == len(expected.facets)
    assert (found.outcome, found.value) == (expected.outcome, expected.value)


def test_the_zoo_agrees_with_brute_force() -> None:
    for model, _ in ZOO.values():
        agree(region(model), truth(model))


def test_brute_force_on_510_small_models() -> None:
    draw, met = random.Random(1947), Counter[str]()
    for kind in KINDS:
        for _ in range(EACH):
            model = small(kind, draw)
            found, expected = region(model), truth(model)
            agree(found, expected)
            if expected.line:
                met["line"] += 1
                continue
            met["degenerate"] += any(len(names) > model.n for names in expected.vertices.values())
            met["flat"] += 0 <= expected.dimension < model.n
            met[expected.status] += 1
            best = [x for x in expected.vertices if model.objective.at(x) == expected.value]  # type: ignore[union-attr]
            met["tied"] += len(best) > 1
    assert sum(met[kind] for kind in ("empty", "bounded", "unbounded", "line")) >= 500
    assert all(met[kind] >= 60 for kind in ("degenerate", "flat", "empty", "unbounded", "tied")), met


def well_conditioned(draw: random.Random) -> tuple[Model, np.ndarray]:
    """Planes at distance 0.5 to 2 from the origin in random directions inside a box: the origin is well inside."""
    n = draw.choice([2, 3, 3, 4])
    rows = [(f"box {j}{s}", [s * v for v in unit(n, j)], "<=", 2) for j in range(n) for s in (1, -1)]
    for k in range(draw.randint(3, 9)):
        way = np.array([draw.gauss(0, 1) for _ in range(n)])
        way = np.round(way / np.linalg.norm(way), 3)
        rows.append((f"cut {k}", [Fraction(str(v)) for v in way], "<=", Fraction(draw.randint(50, 200), 100)))
    half = np.array([[*map(float, row), -float(rhs)] for _, row, _, rhs in rows])
    return build(" ".join(f"x{j}" for j in range(n)), rows), half


def test_qhull_finds_the_same_vertices_of_200_models() -> None:
    """Qhull: Barber, Dobkin & Huhdanpaa 1996, through scipy.spatial.HalfspaceIntersection."""
    draw, compared = random.Random(1996), 0
    for _ in range(200):
        model, half = well_conditioned(draw)
        theirs = HalfspaceIntersection(half, np.zeros(model.n)).intersections
        theirs = np.unique(np.round(theirs, 7), axis=0)
        ours = np.array([[float(v) for v in vertex.point] for vertex in region(model).vertices])
        assert len(ours) == len(theirs)
        gaps = np.abs(ours[:, None, :] - theirs[None, :, :]).max(axis=2)
        assert gaps.min(axis=1).max() < 1e-6
        assert gaps.min(axis=0).max() < 1e-6
        compared += len(ours)
    assert compared > 2000


@pytest.mark.parametrize("wrong", ["sense", "missing"])
def test_the_oracle_notices_a_wrong_answer(wrong: str) -> None:
    """The comparison can fail: it refuses the region of a slightly different model."""
    model, _ = ZOO["bevelled corner"]
    other = model.with_rhs("bevel", 2) if wrong == "sense" else model.without("bevel")
    with pytest.raises(AssertionError):
        agree(region(other), truth(model))
