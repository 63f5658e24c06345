"""The sieve's answers are those of integers, also where floats overflow, cancel or tie."""

from __future__ import annotations

from operator import mul
from random import Random

import numpy as np
import pytest

from polywalk.region import sieve
from polywalk.region.sieve import Sieve, nearest


def slack(row, head) -> int:
    return sum(map(mul, row, head))


def number(draw: Random) -> int:
    """Small, beyond what a float holds exactly, beyond what a float holds at all, or zero."""
    size = draw.choice([0, 1, 9, 10**6, 2**60, 10**40, 10**95, 10**200, 10**400])
    return draw.randint(-size, size)


def nearly(draw: Random, row) -> tuple[int, ...]:
    """A head at which the row is zero, or one unit off in its last place: a tie that floats cannot decide."""
    head = [draw.randint(1, 10**20), draw.randint(-(10**20), 10**20), draw.choice([0, 1, -1])]
    rest = row[0] * head[0] + row[1] * head[1]
    return (head[0] * row[2], head[1] * row[2], -rest + head[2]) if row[2] else tuple(head)


@pytest.fixture
def cases(monkeypatch: pytest.MonkeyPatch):
    """Rows and heads; floats are tried however few they are, and a few heads at a time."""
    monkeypatch.setattr(sieve, "MANY", 0)
    monkeypatch.setattr(sieve, "AT_ONCE", 50)
    draw = Random(5)
    made = []
    for _ in range(150):
        rows = [tuple(number(draw) for _ in range(3)) for _ in range(12)]
        rows = [row if any(row[1:]) else (row[0], 1, 0) for row in rows]
        heads = [tuple(number(draw) for _ in range(3)) for _ in range(4)] + [(0, 0, 0)]
        made.append((rows, heads + [nearly(draw, row) for row in rows]))
    return made


def test_zeros_are_exactly_the_zeros(cases) -> None:
    met = 0
    for rows, heads in cases:
        known = [tuple(k for k, row in enumerate(rows) if slack(row, head) == 0) for head in heads]
        assert Sieve(rows).zeros(heads) == known
        met += sum(map(len, known))
    assert met > 500


def test_a_broken_row_is_named_exactly_where_there_is_one(cases) -> None:
    whole = 0
    for rows, heads in cases:
        for head in heads:
            negative = {k for k, row in enumerate(rows) if slack(row, head) < 0}
            found = Sieve(rows).broken([head])
            assert found <= negative
            assert bool(found) == bool(negative)
            whole += not negative
    assert whole > 100


def test_the_most_broken_for_its_size() -> None:
    rows = [(-1, 1, 0), (-30, 10, 0), (-100, 100, 0)]
    assert Sieve(rows).broken([(1, 0, 0)]) == {1}
    long = [tuple(value * 10**400 for value in row) for row in rows]
    assert Sieve(long).broken([(1, 0, 0)]) == {1}
    wide = [(-1, 10**400, 0), (-3, 1, 1)]
    assert Sieve(wide).broken([(1, 0, 0)]) == {1}


def test_what_floats_cannot_hold_is_not_guessed() -> None:
    found = nearest([(1, 2, 3), (10**400, 3 * 10**400, 0), (10**400, 1, 0)])
    assert found[0].tolist() == [1, 2, 3]
    assert found[1, 1] / found[1, 0] == pytest.approx(3)
    assert np.isnan(found[2]).all()
