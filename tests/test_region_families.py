"""Known polytopes: face counts and volumes against published values, each source beside its check."""

from __future__ import annotations

import random
from fractions import Fraction
from math import comb, factorial

import families as known
import pytest
from zoo import XYZ, boxed, build, nonnegative

from polywalk.exact import exact
from polywalk.model import Model
from polywalk.region import Region, project, region

ZIEGLER = "Ziegler, Lectures on Polytopes, 1995"
ELEMENTARY = "elementary"
COXETER = "Coxeter, Regular Polytopes, 1973"
SLICE = "hypersimplices and their neighbours; Ziegler 1995, example 0.11"

CASES: list[tuple[str, str, Model, tuple[int, ...]]] = [
    *[
        (f"simplex {d}", ZIEGLER, known.simplex(d), tuple(comb(d + 1, k + 1) for k in range(d)))
        for d in (1, 2, 3, 4, 5)
    ],
    *[
        (f"cube {d}", ZIEGLER, known.cube(d), tuple(2 ** (d - k) * comb(d, k) for k in range(d)))
        for d in (1, 2, 3, 4, 5)
    ],
    *[
        (f"cross-polytope {d}", ZIEGLER, known.cross(d), tuple(2 ** (k + 1) * comb(d, k + 1) for k in range(d)))
        for d in (2, 3, 4)
    ],
    ("permutohedron 3", f"{ZIEGLER}, example 0.10", known.permutohedron(3), (6, 6)),
    ("permutohedron 4", f"{ZIEGLER}, example 0.10", known.permutohedron(4), (24, 36, 14)),
    ("Birkhoff 3", f"Birkhoff 1946; {ZIEGLER}, example 0.12", known.transport([1] * 3, [1] * 3), (6, 15, 18, 9)),
    ("associahedron 2", "Loday 2004; OEIS A033282", known.associahedron(3), (5, 5)),
    ("associahedron 3", "Loday 2004; OEIS A033282", known.associahedron(4), (14, 21, 9)),
    ("associahedron 4", "Loday 2004; OEIS A033282", known.associahedron(5), (42, 84, 56, 14)),
    ("pyritohedron", COXETER, known.pyritohedron(), (20, 30, 12)),
    ("24-cell", COXETER, known.cell24(), (24, 96, 96, 24)),
    ("24-cell, middle slice", COXETER, known.cell24(("slice", [0, 0, 0, 1], "==", 0)), (12, 24, 14)),
    ("24-cell, facet slice", COXETER, known.cell24(("slice", [0, 0, 0, 1], "==", 1)), (6, 12, 8)),
    ("cube sliced at 3/2", SLICE, known.unit_cube(3, ("slice", [1] * 3, "==", "3/2")), (6, 6)),
    ("cube sliced at 1", SLICE, known.unit_cube(3, ("slice", [1] * 3, "==", 1)), (3, 3)),
    ("4-cube sliced at 2", SLICE, known.unit_cube(4, ("slice", [1] * 4, "==", 2)), (6, 12, 8)),
    ("4-cube sliced at 1", SLICE, known.unit_cube(4, ("slice", [1] * 4, "==", 1)), (4, 6, 4)),
    ("4-cube sliced at 3/2", SLICE, known.unit_cube(4, ("slice", [1] * 4, "==", "3/2")), (12, 18, 8)),
    *[
        (f"dwarfed cube {d}", "Avis, Bremner & Seidel 1997 (counts recomputed, formula from memory)", model, expected)
        for d, model, expected in (
            (3, known.unit_cube(3, ("dwarf", [1] * 3, "<=", "3/2")), (10, 15, 7)),
            (4, known.unit_cube(4, ("dwarf", [1] * 4, "<=", "3/2")), (17, 34, 26, 9)),
        )
    ],
    *[(f"prism {n}", ELEMENTARY, known.prism(n), (2 * n, 3 * n, n + 2)) for n in (3, 5, 8)],
    *[(f"pyramid {n}", ELEMENTARY, known.pyramid(n), (n + 1, 2 * n, n + 1)) for n in (3, 5, 8)],
    *[(f"bipyramid {n}", ELEMENTARY, known.pyramid(n, both=True), (n + 2, 3 * n, 2 * n)) for n in (3, 5, 8)],
]

CYCLIC = {(8, 3): (8, 18, 12), (12, 3): (12, 30, 20), (7, 4): (7, 21, 28, 14), (8, 4): (8, 28, 40, 20)}
"""McMullen 1970; Gale 1963."""


def check(found: Region, expected: tuple[int, ...]) -> None:
    """Vertices, edges and facets as the region lists them; all faces from its facets; Euler's relation."""
    assert found.dimension == len(expected)
    assert found.status == "bounded"
    assert len(found.vertices) == expected[0]
    if len(expected) > 1:
        assert len(found.edges) == expected[1]
    assert len(found.facets) == expected[-1]
    assert known.counts(found) == expected
    assert sum((-1) ** k * count for k, count in enumerate(expected)) == 1 - (-1) ** len(expected)


@pytest.mark.parametrize(("model", "expected"), [case[2:] for case in CASES], ids=[case[0] for case in CASES])
def test_face_counts(model: Model, expected: tuple[int, ...]) -> None:
    check(region(model), expected)


@pytest.mark.parametrize("size", CYCLIC)
def test_cyclic_polytopes(size: tuple[int, int]) -> None:
    """Through project, which is the convex hull here; the polar turns the counts round (McMullen 1970)."""
    points = known.cyclic(*size)
    check(known.hull(points), CYCLIC[size])
    check(region(known.polar(points)), CYCLIC[size][::-1])


def test_shadows_of_cubes_and_of_the_24_cell() -> None:
    """Coxeter, Regular Polytopes: hexagon, rhombic dodecahedron, cuboctahedron."""
    check(along_the_diagonal(3), (6, 6))
    check(along_the_diagonal(4), (14, 24, 12))
    check(project(region(known.cell24()), ["x1", "x2", "x3"]), (12, 24, 14))


def along_the_diagonal(n: int) -> Region:
    """The unit cube seen along (1, ..., 1): new variables y_j = x_j - x_n."""
    rows = [(name, [*row, *[0] * (n - 1)], sense, rhs) for name, row, sense, rhs in boxed(known.names(n))]
    for j in range(n - 1):
        difference = [int(i == j) - int(i == n - 1) for i in range(n)]
        rows.append((f"y{j}", [*difference, *[-int(i == j) for i in range(n - 1)]], "==", 0))
    model = build(f"{known.names(n)} {known.names(n - 1, 'y')}", rows)
    return project(region(model), known.names(n - 1, "y").split())


def test_transportation_polytopes() -> None:
    """Vertex counts that nondegenerate margins can have: De Loera & Kim 2014 (from memory)."""
    draw = random.Random(2014)
    for m, n, possible in ((2, 3, {3, 4, 5, 6}), (2, 4, {4, 6, 8, 10, 12}), (3, 3, {9, 12, 15, 18})):
        met = {count for _ in range(150) if (count := transport_vertices(m, n, draw))}
        assert met == possible


def transport_vertices(m: int, n: int, draw: random.Random) -> int:
    """The number of vertices for random margins, 0 where they are degenerate."""
    supplies, demands = ([draw.randint(1, draw.choice([4, 60])) for _ in range(k)] for k in (m, n - 1))
    rest = sum(supplies) - sum(demands)
    if rest <= 0:
        return 0
    found = region(known.transport(supplies, [*demands, rest]))
    basic = m + n - 1
    simple = all(sum(value > 0 for value in vertex.point) == basic for vertex in found.vertices)
    return len(found.vertices) if simple else 0


def test_a_solid_with_two_degenerate_vertices() -> None:
    """Bertsimas & Tsitsiklis, Introduction to Linear Optimization, 1997, example 2.1 (from memory)."""
    rows = [
        *XYZ,
        ("first", [1, 1, 2], "<=", 8),
        ("second", [0, 1, 6], "<=", 12),
        ("third", [1, 0, 0], "<=", 4),
        ("fourth", [0, 1, 0], "<=", 6),
    ]
    active = {vertex.point: len(vertex.active) for vertex in region(build("x y z", rows)).vertices}
    assert active[(2, 6, 0)] == 3
    assert active[(4, 0, 2)] == active[(0, 6, 1)] == 4


@pytest.mark.parametrize("d", [1, 2, 3, 4])
def test_volumes_by_closed_formulas(d: int) -> None:
    """Elementary: 2^d, 1/d!, 2^d/d!."""
    assert region(known.cube(d)).volume == 2**d
    assert region(known.simplex(d)).volume == Fraction(1, factorial(d))
    assert region(known.cross(d)).volume == Fraction(2**d, factorial(d))


def test_measures_of_flat_solids() -> None:
    """Birkhoff 3 in its free 2x2 corner: 1/8, its leading Ehrhart coefficient (Stanley, Enumerative Combinatorics I).

    The permutohedron of order n measures n^(n-2) root n (Stanley 1980, from memory); the simplex in the plane
    sum x = 1 measures root n / (n-1)! (elementary).
    """
    corner = project(region(known.transport([1] * 3, [1] * 3)), ["x11", "x12", "x21", "x22"])
    assert corner.volume == Fraction(1, 8)
    assert [region(known.permutohedron(n)).measure_squared for n in (2, 3, 4)] == [2, 3**3, 4**5]
    for n in (2, 3, 4):
        flat = region(build(known.names(n), [*nonnegative(known.names(n)), ("sum", [1] * n, "==", 1)]))
        assert flat.volume == 0
        assert flat.measure_squared == Fraction(n, factorial(n - 1) ** 2)
        assert flat.measure == pytest.approx(n**0.5 / factorial(n - 1))


def test_volume_is_the_leading_coefficient_of_lattice_counts() -> None:
    """Ehrhart: the d-th difference of the counts of the dilates is d! times the volume.

    Octahedron 1, 7, 25, 63 (OEIS A001845); cube (t+1)^3; simplex C(t+3, 3); hexagon 3t^2 + 3t + 1.
    """
    cases = [
        (region(known.cross(3)), [1, 7, 25, 63]),
        (region(known.unit_cube(3)), [(t + 1) ** 3 for t in range(4)]),
        (region(known.simplex(3)), [comb(t + 3, 3) for t in range(4)]),
        (project(region(known.permutohedron(3)), ["x1", "x2"]), [3 * t * t + 3 * t + 1 for t in range(3)]),
    ]
    for found, lattice in cases:
        d = found.model.n
        difference = sum((-1) ** (d - t) * comb(d, t) * lattice[t] for t in range(d + 1))
        assert found.volume == Fraction(difference, factorial(d))
        assert lattice_points(found) == lattice[1]


def lattice_points(found: Region) -> int:
    """All integer points of a small region, by trying each in its box."""
    boxes = [range(int(low or 0), int(high or 0) + 1) for low, high in found.ranges.values()]
    every = [()]
    for box in boxes:
        every = [(*point, Fraction(value)) for point in every for value in box]
    return sum(all(row.holds(point) for row in found.model.constraints) for point in every)


def test_pick() -> None:
    """Pick 1899: area = interior + boundary/2 - 1 for a lattice polygon."""
    draw = random.Random(1899)
    for _ in range(25):
        found = known.hull([[draw.randint(-4, 4), draw.randint(-4, 4)] for _ in range(draw.randint(3, 7))])
        if found.dimension < 2:
            continue
        every = [(exact(x), exact(y)) for x in range(-4, 5) for y in range(-4, 5)]
        slacks = [min(row.slack(point) for row in found.model.constraints) for point in every]
        inner, border = sum(slack > 0 for slack in slacks), sum(slack == 0 for slack in slacks)
        assert found.volume == inner + Fraction(border, 2) - 1


@pytest.mark.parametrize("n", [2, 3, 4, 5])
def test_every_vertex_of_a_goldfarb_cube_shows_in_its_shadow(n: int) -> None:
    """Goldfarb 1994; Amenta & Ziegler 1999 (formula from memory, count published): 2^n vertices in the plane."""
    beta, gamma, delta = 2, Fraction(1, 4), 5
    rows = [("x1 lower", [1] + [0] * (n - 1), ">=", 0), ("x1 upper", [1] + [0] * (n - 1), "<=", 1)]
    for k in range(1, n):
        push = [Fraction(0)] * n
        push[k - 1] = Fraction(beta)
        if k > 1:
            push[k - 2] = -beta * gamma
        own = [int(j == k) for j in range(n)]
        lower = [a - b for a, b in zip(own, push, strict=True)]
        upper = [a + b for a, b in zip(own, push, strict=True)]
        rows += [(f"x{k + 1} lower", lower, ">=", 0), (f"x{k + 1} upper", upper, "<=", delta**k)]
    found = region(build(known.names(n), rows))
    shadow = project(found, found.model.variables[-2:])
    assert len(found.vertices) == len(shadow.vertices) == 2**n
