"""Shadows of known polytopes: face counts from the literature, exact and in floats. Sources: CHECKS A and D."""

from __future__ import annotations

from itertools import combinations

import families as known
import pytest
from families import counts, names
from proved import every_facet_is_proved
from zoo import boxed, build

from polywalk.bigmodel import BigModel
from polywalk.model import Model
from polywalk.narrowing import shadow
from polywalk.scenarios import goldfarb


def along_ones(d: int) -> Model:
    """The unit d-cube with the coordinates x_i - x_d of its projection along (1, ..., 1) as variables u_i."""
    rows = [(name, [*row, *[0] * (d - 1)], sense, rhs) for name, row, sense, rhs in boxed(names(d))]
    for i in range(d - 1):
        row = [int(j == i) - int(j == d - 1) for j in range(d)]
        rows.append((f"way {i}", [*row, *[-int(j == i) for j in range(d - 1)]], "==", 0))
    return build(f"{names(d)} {names(d - 1, 'u')}", rows)


def points_shadow(points: list[list[int]]) -> Model:
    """All weighted means of points: weights w and coordinates x."""
    count, d = len(points), len(points[0])
    rows = [(f"w{k} lower", [int(i == k) for i in range(count + d)], ">=", 0) for k in range(count)]
    rows.append(("weights", [1] * count + [0] * d, "==", 1))
    for j in range(d):
        rows.append((f"mean {j}", [*(point[j] for point in points), *[-int(i == j) for i in range(d)]], "==", 0))
    return build(f"{names(count, 'w')} {names(d)}", rows)


CASES = {
    "3-cube along (1,1,1): hexagon (Coxeter)": (along_ones(3), ("u1", "u2"), (6, 6)),
    "4-cube along (1,1,1,1): rhombic dodecahedron (Coxeter)": (along_ones(4), ("u1", "u2", "u3"), (14, 24, 12)),
    "24-cell onto three coordinates: cuboctahedron (Coxeter)": (known.cell24(), ("x1", "x2", "x3"), (12, 24, 14)),
    "cyclic C(8,3) (Gale 1963)": (points_shadow(known.cyclic(8, 3)), ("x1", "x2", "x3"), (8, 18, 12)),
    "cyclic C(12,3) (Gale 1963)": (points_shadow(known.cyclic(12, 3)), ("x1", "x2", "x3"), (12, 30, 20)),
    "permutohedron of order 4, three coordinates (Ziegler 1995, Ex. 0.10)": (
        known.permutohedron(4),
        ("x1", "x2", "x3"),
        (24, 36, 14),
    ),
    "associahedron (Loday 2004)": (known.associahedron(4), ("x1", "x2", "x3"), (14, 21, 9)),
    "pyritohedron (elementary)": (known.pyritohedron(), ("x1", "x2", "x3"), (20, 30, 12)),
    "hypersimplex, 4-cube at sum = 2: octahedron (Ziegler 1995)": (
        known.unit_cube(4, ("slice", [1, 1, 1, 1], "==", 2)),
        ("x1", "x2", "x3"),
        (6, 12, 8),
    ),
    "bipyramid over a 7-gon (elementary)": (known.pyramid(7, both=True), ("x", "y", "z"), (9, 21, 14)),
}


@pytest.mark.parametrize("exact", [True, False])
@pytest.mark.parametrize("name", CASES)
def test_known_shadows(name: str, exact: bool) -> None:
    model, onto, expected = CASES[name]
    found = shadow(BigModel.from_model(model), onto, exact=exact)
    assert counts(found.region) == expected
    assert len(found.facets) == expected[-1]
    assert found.programs <= 2 * (expected[0] + expected[-1]) + 10
    assert (found.tolerance is None) == exact
    if exact:
        assert every_facet_is_proved(found)


@pytest.mark.parametrize("exact", [True, False])
@pytest.mark.parametrize("n", range(2, 8))
def test_goldfarbs_cube_shows_all_its_vertices(n: int, exact: bool) -> None:
    """Goldfarb 1994; Amenta & Ziegler 1999: all 2^n vertices appear on the last two coordinates."""
    found = shadow(BigModel.from_model(goldfarb(n)), (f"x{n - 1}", f"x{n}"), exact=exact)
    assert len(found.region.vertices) == len(found.facets) == 2**n
    assert found.programs <= 2 * (2**n + 2**n) + 10
    assert not exact or every_facet_is_proved(found)


def test_every_pair_of_a_4_cube_is_a_square() -> None:
    big = BigModel.from_model(known.cube(4))
    for onto in combinations(big.variables, 2):
        assert counts(shadow(big, onto).region) == (4, 4)
