"""Models of many rows that few rows would describe, awkward on purpose. For the tests only.

A few rows round a point are typed first; the rest are sums of them with some room: none (it touches), a little (down to
1e-30, where floats see none), plenty, or a little too few, which cuts.
"""

from __future__ import annotations

from collections.abc import Callable
from fractions import Fraction
from random import Random

from polywalk.model import Constraint, Model

Row = tuple[Fraction, ...]
"""(b, a) with b + a.x >= 0."""


def crowd(draw: Random, kind: str, m: int = 60) -> Model:
    """A model of m rows, or a few more, of one of the KINDS."""
    n = draw.choice([2, 3, 3, 3, 4]) if kind != "line" else draw.choice([2, 3, 3])
    few, equal = KINDS[kind](draw, n)
    rows = [*few, *(_sum(draw, few, _room(draw, kind)) for _ in range(m - len(few)))]
    senses = [*["=="] * equal, *[">="] * (len(rows) - equal)]
    order = draw.sample(range(len(rows)), len(rows))
    named = [_written(draw, f"r{k}", rows[place], senses[place]) for k, place in enumerate(order)]
    return Model(tuple("wxyz"[:n]), tuple(named))


def _box(draw: Random, n: int) -> tuple[list[Row], int]:
    """A box with some corners cut off."""
    sides = [_unit(draw.randint(0, 3), j, n) for j in range(n)]
    sides += [tuple(-value if j else draw.randint(1, 4) for j, value in enumerate(row)) for row in list(sides)]
    return [*sides, *(_around(draw, n) for _ in range(draw.randint(0, 6)))], 0


def _open(draw: Random, n: int) -> tuple[list[Row], int]:
    """Rows that all allow one direction, and often more."""
    way = [draw.randint(0, 3) for _ in range(n)]
    rows = [_around(draw, n) for _ in range(12)]
    kept = [row for row in rows if sum(a * b for a, b in zip(row[1:], way, strict=True)) >= 0]
    return [*kept, _around(draw, n) if not kept else kept[0]] + [_unit(0, j, n) for j in range(n)], 0


def _cone(draw: Random, n: int) -> tuple[list[Row], int]:
    """Every row through the origin."""
    rows = [_unit(0, j, n) for j in range(n)]
    rows += [(Fraction(0), *(Fraction(draw.randint(-1, 5)) for _ in range(n))) for _ in range(4)]
    return [row for row in rows if any(row)], 0


def _flat(draw: Random, n: int) -> tuple[list[Row], int]:
    """Held in a plane by an equality, or by two rows back to back."""
    rows, _ = _box(draw, n)
    plane = (Fraction(draw.randint(-1, 1)), *(Fraction(draw.choice([-2, -1, 1, 2])) for _ in range(n)))
    if draw.random() < 0.5:
        return [plane, *rows], 1
    return [plane, tuple(-value for value in plane), *rows], 0


def _line(draw: Random, n: int) -> tuple[list[Row], int]:
    """Nothing holds one direction, which is an axis half the time."""
    rows, _ = draw.choice([_box, _open])(draw, n - 1)
    tilt = draw.choice([0, 0, 1, Fraction(1, 3)])
    return [(*row, tilt * row[-1]) for row in rows], 0


def _empty(draw: Random, n: int) -> tuple[list[Row], int]:
    """A row and its opposite with no room between them, by much or by a hair."""
    rows, _ = _box(draw, n)
    b, *a = draw.choice(rows)
    return [*rows, (-b - draw.choice([1, _hair(draw)]), *(-value for value in a))], 0


def _long(draw: Random, n: int) -> tuple[list[Row], int]:
    """Numbers of fifty digits, and units so odd that coefficients differ by up to four hundred powers of ten."""
    rows, _ = draw.choice([_box, _open, _flat])(draw, n)
    stretch = [Fraction(10) ** draw.choice([0, 9, -9, 120, -200]) for _ in range(n)]
    bend = [1 + Fraction(draw.randint(-(10**50), 10**50), 7**70) for _ in range(n)]
    unit = [Fraction(1), *(a * b for a, b in zip(stretch, bend, strict=True))]
    return [tuple(a * b for a, b in zip(row, unit, strict=True)) for row in rows], 0


def _pointed(draw: Random, n: int) -> tuple[list[Row], int]:
    """Many rows through one corner: tangents of a cone, cut off by one more."""
    apex = [draw.randint(1, 5) for _ in range(n)]
    rows = [tuple(Fraction(draw.randint(-5, 5)) for _ in range(n - 1)) for _ in range(12)]
    sides = [
        (sum(a * x for a, x in zip(row, apex, strict=False)) + 4 * apex[-1], *(-a for a in row), Fraction(-4))
        for row in rows
    ]
    return [*sides, _unit(0, n - 1, n)], 0


KINDS: dict[str, Callable[[Random, int], tuple[list[Row], int]]] = {
    "bounded": _box,
    "open": _open,
    "cone": _cone,
    "flat": _flat,
    "line": _line,
    "empty": _empty,
    "long": _long,
    "pointed": _pointed,
}


def _room(draw: Random, kind: str) -> Fraction:
    """How much further out than it need be."""
    if kind == "cone":
        return Fraction(0)
    return draw.choice(
        [Fraction(0), Fraction(draw.randint(1, 9)), _hair(draw), -_hair(draw) if draw.random() < 0.1 else 1]
    )


def _hair(draw: Random) -> Fraction:
    return Fraction(draw.randint(1, 9), 10 ** draw.randint(12, 30))


def _sum(draw: Random, rows: list[Row], room: Fraction) -> Row:
    """A sum of one to three rows with room; of one row it is the same again, or parallel to it."""
    some = draw.choices(rows, k=draw.randint(1, 3))
    weights = [draw.choice([1, 1, 2, Fraction(1, 3)]) for _ in some]
    b, *a = (sum(w * row[j] for w, row in zip(weights, some, strict=True)) for j in range(len(rows[0])))
    return (b + room, *a)


def _around(draw: Random, n: int) -> Row:
    """A row that the origin satisfies."""
    return (Fraction(draw.randint(0, 9)), *(Fraction(draw.randint(-5, 5)) for _ in range(n)))


def _unit(b: int, place: int, n: int) -> Row:
    return (Fraction(b), *(Fraction(int(j == place)) for j in range(n)))


def _written(draw: Random, name: str, row: Row, sense: str) -> Constraint:
    """As someone may have typed it: either way round, in any scale."""
    scale = draw.choice([1, 1, 6, Fraction(2, 7)])
    b, *a = (scale * value for value in row)
    if draw.random() < 0.5:
        return Constraint(name, tuple(a), sense, -b)  # type: ignore[arg-type]
    return Constraint(name, tuple(-value for value in a), "==" if sense == "==" else "<=", b)
