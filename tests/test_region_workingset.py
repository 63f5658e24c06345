"""A region from a working set of rows is the region of all rows, part by part, whatever floats propose."""

from __future__ import annotations

import random
from collections import Counter
from collections.abc import Iterable

import pytest
from crowds import KINDS, crowd

from polywalk.model import Model
from polywalk.region import Region, engine, region, sieve, workingset

EACH = 40
"""Models of each kind."""


@pytest.fixture
def listed(monkeypatch: pytest.MonkeyPatch) -> list[int]:
    """How many rows cddlib was given, each time; working sets are tried from two rows on, all in this process."""
    sizes: list[int] = []
    original = workingset.list_generators

    def counted(rows, equal):
        sizes.append(len(rows))
        return original(rows, equal)

    monkeypatch.setattr(workingset, "list_generators", counted)
    monkeypatch.setattr(workingset, "WORTHWHILE", 2)
    monkeypatch.setattr(engine, "is_small", lambda rows, straight: True)
    monkeypatch.setattr(sieve, "MANY", 0)
    return sizes


def plain(model: Model) -> Region:
    """The region from all rows at once."""
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(workingset, "WORTHWHILE", 10**9)
        patch.setattr(sieve, "MANY", 10**9)
        return region(model)


def everything(found: Region) -> tuple[object, ...]:
    """All that was listed, and what is read off it."""
    listed = found.vertices, found.rays, found.lines, found.base, found._active
    return (*listed, found.status, found.edges, found.facets, found.equalities, found.dimension, found.outline)


def traits(found: Region) -> Iterable[str]:
    """What kind of region it turned out to be."""
    yield found.status
    yield "line" if found.lines else "no line"
    yield "flat" if 0 <= found.dimension < found.model.n else "solid"
    yield "crowded corner" if any(vertex.degeneracy > 9 for vertex in found.vertices) else "simple corners"


def test_the_same_as_from_all_rows(listed: list[int]) -> None:
    draw, met = random.Random(1), Counter()
    for kind in KINDS:
        for _ in range(EACH):
            model = crowd(draw, kind)
            listed.clear()
            found = region(model)
            rows = sum(not row.is_constant for row in model.constraints)
            met["few rows were enough" if max(listed, default=0) < rows else "all rows"] += 1
            assert everything(found) == everything(plain(model)), (kind, model)
            met.update(traits(found))
    least = {"bounded": 90, "unbounded": 60, "empty": 30, "line": 30, "flat": 45, "crowded corner": 45}
    assert all(met[trait] >= count for trait, count in least.items()), met
    assert met["few rows were enough"] >= 0.8 * len(KINDS) * EACH, met
