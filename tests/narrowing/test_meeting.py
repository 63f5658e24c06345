"""Corners of many facets: rounding splits them, and they are made to meet again."""

from __future__ import annotations

import random
from fractions import Fraction

import numpy as np
import pytest

from polywalk.model import Constraint, Model
from polywalk.narrowing import shadow
from polywalk.narrowing.hull import Hull, independent
from polywalk.narrowing.meeting import Incidence, met
from polywalk.region import Region, region
from polywalk.scenarios import harbour_year


def solid(seed: int) -> tuple[list[tuple[Fraction, ...]], list[tuple[Fraction, ...]], list[frozenset[int]]]:
    """Corners, planes and incidences of the hull of few points on a coarse grid: many corners of four facets."""
    draw = random.Random(seed)
    points = [(1, *(draw.randint(-2, 2) for _ in range(3))) for _ in range(14)]
    first = independent(points)
    hull = Hull([points[k] for k in first])
    for k, point in enumerate(points):
        if k not in first:
            hull.add(point)
    rows = [tuple(map(Fraction, row)) for row in hull.facets]
    shape = region(model(rows))
    corners = [(Fraction(1), *vertex.point) for vertex in shape.vertices]
    on = [frozenset(p for p, corner in enumerate(corners) if not value(row, corner)) for row in rows]
    return corners, rows, on


def value(row: tuple[Fraction, ...], corner: tuple[Fraction, ...]) -> Fraction:
    """b + a.x."""
    return sum((a * b for a, b in zip(row, corner, strict=True)), Fraction(0))


def model(rows: list[tuple[Fraction, ...]]) -> Model:
    """b + a.x >= 0 for each row."""
    return Model(("x", "y", "z"), tuple(Constraint(f"r{k}", row[1:], ">=", -row[0]) for k, row in enumerate(rows)))


def shape(found: Region) -> set[frozenset[str]]:
    """Which constraints meet at each corner."""
    return {frozenset(vertex.active) for vertex in found.vertices}


def rounded(rows: list[tuple[Fraction, ...]], draw: random.Random, size: int) -> list[tuple[Fraction, ...]]:
    """The rows with noise of one part in ``size``."""
    return [
        tuple(
            entry * (1 + Fraction(draw.randint(-999, 999), 999 * size)) + Fraction(draw.randint(-9, 9), 9 * size)
            for entry in row
        )
        for row in rows
    ]


def test_noise_splits_corners_and_meeting_puts_them_together() -> None:
    split = crowded = 0
    for seed in range(40):
        corners, rows, on = solid(seed)
        noisy = rounded(rows, random.Random(seed), 10**10)
        found = met(Incidence(corners, noisy, on, frozenset()))
        assert found is not None
        moved, far = found
        assert far < 1e-8
        assert shape(region(model(moved))) == shape(region(model(rows)))
        crowded += any(len(part) > 3 for part in shape(region(model(rows))))
        split += len(region(model(noisy)).vertices) > len(corners)
    assert crowded > 30
    assert split > 30


def test_planes_that_must_stay_do() -> None:
    for seed in range(10):
        corners, rows, on = solid(seed)
        fixed = frozenset(range(3))
        noisy = [
            row if k in fixed else one
            for k, (row, one) in enumerate(zip(rows, rounded(rows, random.Random(seed), 10**10), strict=True))
        ]
        found = met(Incidence(corners, noisy, on, fixed))
        assert found is not None
        assert all(
            not any(
                a * d - b * c
                for a, b in zip(found[0][k], rows[k], strict=True)
                for c, d in zip(found[0][k], rows[k], strict=True)
            )
            for k in fixed
        )
        assert shape(region(model(found[0]))) == shape(region(model(rows)))


def test_planes_that_cannot_meet_are_given_up() -> None:
    corners, rows, on = solid(1)
    everything = frozenset(range(len(rows)))
    crooked = [(row[0] + Fraction(k, 10**9), *row[1:]) for k, row in enumerate(rows)]
    found = met(Incidence(corners, crooked, on, everything))
    assert found is None


@pytest.mark.parametrize("onto", [("level[10]", "level[15]", "objective"), ("level[30]", "tank[33]", "suboptimality")])
def test_a_float_shadow_has_the_corners_of_the_exact_one(onto: tuple[str, ...]) -> None:
    big = harbour_year(48)
    exact, floats = (shadow(big, onto, within="1%", exact=flag) for flag in (True, False))
    assert any(vertex.degenerate for vertex in exact.region.vertices)
    assert "moved to meet exactly" in str(floats)
    assert len(floats.facets) == len(exact.facets)
    assert len(floats.region.vertices) == len(exact.region.vertices)
    sides = [np.array([[float(x) for x in vertex.point] for vertex in one.region.vertices]) for one in (exact, floats)]
    size = sides[0].max(axis=0) - sides[0].min(axis=0)
    near = np.abs((sides[0][:, None] - sides[1][None]) / size).max(axis=2).argmin(axis=1)
    assert sorted(near.tolist()) == list(range(len(near)))
    assert np.abs((sides[0] - sides[1][near]) / size).max() < 1e-5  # facets at small angles make much of 2e-9
    degrees = [sorted(len(vertex.active) for vertex in one.region.vertices) for one in (exact, floats)]
    assert degrees[0] == degrees[1]
