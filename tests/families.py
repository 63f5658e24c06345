"""Families of polytopes from their formulas, and face counts from nothing but which vertex lies on which facet."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from itertools import combinations, product

from oracle import eliminate
from zoo import Row, boxed, build, nonnegative

from polywalk.model import Model
from polywalk.region import Region, project, region


def names(n: int, letter: str = "x") -> str:
    """x1 x2 ... xn."""
    return " ".join(f"{letter}{j + 1}" for j in range(n))


def simplex(d: int) -> Model:
    """x >= 0, sum x <= 1."""
    return build(names(d), [*nonnegative(names(d)), ("sum", [1] * d, "<=", 1)])


def cube(d: int) -> Model:
    """-1 <= x <= 1."""
    sides = [(j, s) for j in range(d) for s in (1, -1)]
    return build(names(d), [(f"side {j} {s}", [s * (i == j) for i in range(d)], "<=", 1) for j, s in sides])


def unit_cube(d: int, *more: Row) -> Model:
    """0 <= x <= 1 and further rows."""
    return build(names(d), [*boxed(names(d)), *more])


def cross(d: int) -> Model:
    """The sum of |x_j| is at most 1."""
    return build(names(d), [(f"{signs}", signs, "<=", 1) for signs in product((1, -1), repeat=d)])


def hull(points: Sequence[Sequence[object]]) -> Region:
    """The convex hull of points, as the shadow of all their weighted means."""
    count, d = len(points), len(points[0])
    rows: list[Row] = [(name, [*row, *[0] * d], sense, rhs) for name, row, sense, rhs in nonnegative(names(count, "w"))]
    rows.append(("weights", [1] * count + [0] * d, "==", 1))
    for j in range(d):
        rows.append((f"mean {j}", [*(point[j] for point in points), *[-int(i == j) for i in range(d)]], "==", 0))
    return project(region(build(f"{names(count, 'w')} {names(d)}", rows)), names(d).split())


def cyclic(n: int, d: int) -> list[list[int]]:
    """n points of the moment curve (t, t^2, ..., t^d)."""
    return [[t**k for k in range(1, d + 1)] for t in range(n)]


def polar(points: Sequence[Sequence[int]]) -> Model:
    """v.x <= 1 for every point v, the points moved so that their mean is the origin."""
    mean = [Fraction(sum(column), len(points)) for column in zip(*points, strict=True)]
    moved = [[value - middle for value, middle in zip(point, mean, strict=True)] for point in points]
    return build(names(len(mean)), [(f"row {k}", row, "<=", 1) for k, row in enumerate(moved)])


def permutohedron(n: int) -> Model:
    """The hull of all permutations of 1..n: every k coordinates sum to at least k(k+1)/2 (Rado 1952)."""
    return _sums(n, [chosen for k in range(1, n) for chosen in combinations(range(n), k)])


def associahedron(n: int) -> Model:
    """Loday's: the permutohedron's rows for consecutive coordinates only; of dimension n - 1."""
    return _sums(n, [tuple(range(a, b)) for a in range(n) for b in range(a + 1, n + 1) if b - a < n])


def _sums(n: int, subsets: Sequence[Sequence[int]]) -> Model:
    rows: list[Row] = [("all", [1] * n, "==", n * (n + 1) // 2)]
    for chosen in subsets:
        k = len(chosen)
        rows.append((f"{chosen}", [int(j in chosen) for j in range(n)], ">=", k * (k + 1) // 2))
    return build(names(n), rows)


def transport(supplies: Sequence[int], demands: Sequence[int]) -> Model:
    """Shipments x >= 0 with these row and column sums."""
    m, n = len(supplies), len(demands)
    cells = [f"x{i + 1}{j + 1}" for i in range(m) for j in range(n)]
    rows = nonnegative(" ".join(cells))
    rows += [(f"supply {i}", [int(k // n == i) for k in range(m * n)], "==", supplies[i]) for i in range(m)]
    rows += [(f"demand {j}", [int(k % n == j) for k in range(m * n)], "==", demands[j]) for j in range(n)]
    return build(" ".join(cells), rows)


def pyritohedron() -> Model:
    """Vertices (+-1,+-1,+-1) and cyclic (0,+-3/2,+-3/4): twelve planes such as x + 2y = 3."""
    rows = []
    for shift, s, t in product(range(3), (1, -1), (1, -1)):
        row = [s, 2 * t, 0]
        rows.append((f"{shift} {s} {t}", row[-shift:] + row[:-shift], "<=", 3))
    return build(names(3), rows)


def cell24(*more: Row) -> Model:
    """The hull of all (+-1,+-1,0,0): |x_j| <= 1 and the sum of |x_j| at most 2."""
    sides = [(f"side {j} {s}", [s * (i == j) for i in range(4)], "<=", 1) for j in range(4) for s in (1, -1)]
    sums = [(f"{signs}", signs, "<=", 2) for signs in product((1, -1), repeat=4)]
    return build(names(4), [*sides, *sums, *more])


def polygon(n: int) -> list[tuple[list[int], int]]:
    """Rows (a, b), a.x <= b, of the n-gon with vertices (t, t^2), t = 0..n-1."""
    sides = [([2 * t + 1, -1], t * (t + 1)) for t in range(n - 1)]
    return [*sides, ([-(n - 1), 1], 0)]


def prism(n: int) -> Model:
    """The n-gon times 0 <= z <= 1."""
    rows = [(f"side {k}", [*a, 0], "<=", b) for k, (a, b) in enumerate(polygon(n))]
    return build("x y z", [*rows, ("floor", [0, 0, 1], ">=", 0), ("roof", [0, 0, 1], "<=", 1)])


def pyramid(n: int, both: bool = False) -> Model:
    """Over the n-gon, with apexes one above (and, for both, one below) the mean of its vertices."""
    middle = [Fraction(sum(t**k for t in range(n)), n) for k in (1, 2)]
    rows: list[Row] = [] if both else [("floor", [0, 0, 1], ">=", 0)]
    for k, (a, b) in enumerate(polygon(n)):
        room = b - a[0] * middle[0] - a[1] * middle[1]
        rows += [(f"side {k} {s}", [*a, s * room], "<=", b) for s in ((1, -1) if both else (1,))]
    return build("x y z", rows)


def counts(found: Region) -> tuple[int, ...]:
    """How many faces of dimension 0, 1, ..., d - 1 a bounded region has, from its facets' vertices alone."""
    facets = {frozenset(facet.vertices) for facet in found.facets}
    faces, fresh = set(facets), set(facets)
    while fresh:
        fresh = {face & facet for face in fresh for facet in facets} - faces - {frozenset()}
        faces |= fresh
    sizes = [_dimension([found.vertices[k].point for k in face]) for face in faces]
    return tuple(sizes.count(k) for k in range(found.dimension))


def _dimension(points: Sequence[Sequence[Fraction]]) -> int:
    first = points[0]
    rows = [tuple(a - b for a, b in zip(point, first, strict=True)) for point in points[1:]]
    return len(eliminate(rows, len(first))[1]) if rows else 0
