"""Shadows of random models of up to 7 variables beside exact enumeration and projection, every facet checked."""

from __future__ import annotations

from collections import Counter

import pytest
from proved import every_facet_is_proved
from random_models import random_model

from polywalk.bigmodel import BigModel
from polywalk.narrowing import shadow
from polywalk.region import Region, project, region
from polywalk.region.spans import echelon

MET: Counter[str] = Counter()


def told(found: Region) -> tuple[object, ...]:
    """What two equal regions have in common however they were described."""
    lines = tuple(map(tuple, echelon(list(found.lines))[0])) if found.lines else ()
    points = tuple(vertex.point for vertex in found.vertices)
    rays = len(found.rays) if found.lines else tuple(ray.direction for ray in found.rays)
    rows = {(row.sense, row.coefficients, row.rhs) for row in found.model.constraints}
    return found.status, found.dimension, points, rays, lines, rows if found.dimension == found.model.n else ()


@pytest.mark.parametrize("block", range(10))
def test_shadows_agree_with_enumeration_and_projection(block: int) -> None:
    for seed in range(20 * block, 20 * block + 20):
        model, onto = random_model(seed)
        expected = project(region(model), onto)
        for exact in (True, False):
            found = shadow(BigModel.from_model(model), onto, exact=exact)
            assert (found.tolerance is None) == (exact or expected.status == "empty")
            assert told(found.region) == told(expected), (seed, exact)
            size = len(expected.vertices) + len(expected.facets) + len(expected.rays) + len(expected.lines)
            assert found.programs <= 2 * size + 10, seed
            assert not exact or every_facet_is_proved(found), seed
        MET.update([expected.status, "flat" if expected.dimension < len(onto) else "full"])
        MET.update(["line"] if expected.lines else [])


def test_enough_of_every_kind_was_met() -> None:
    """Runs after the blocks above; the seeds are fixed."""
    if sum(MET[kind] for kind in ("empty", "bounded", "unbounded")) < 200:
        pytest.skip("needs all blocks") if MET else None
    else:
        assert min(MET["empty"], MET["bounded"], MET["unbounded"]) >= 40
        assert MET["line"] >= 8
        assert MET["flat"] - MET["empty"] >= 8
