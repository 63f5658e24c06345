"""Delicate regions from the reference data: counts and points that float arithmetic gets wrong."""

from __future__ import annotations

import json
from fractions import Fraction
from pathlib import Path
from typing import Any

import pytest
from oracle import eliminate
from zoo import plain

from polywalk.region import region

DATA = Path(__file__).parents[2] / "shared" / "data" / "regions.json"

pytestmark = [
    pytest.mark.needs_shared_data,
    pytest.mark.skipif(not DATA.exists(), reason="the reference data ../shared/data/regions.json is not here"),
]


def cases() -> list[dict[str, Any]]:
    return json.loads(DATA.read_text()) if DATA.exists() else []


@pytest.mark.parametrize("case", cases(), ids=lambda case: case["name"])
def test_delicate_region(case: dict[str, Any]) -> None:
    """Each case names its source; its exact counts were made by two independent engines.

    There a cone at the origin counts no vertex: here its apex is one. Equalities of an empty set mean nothing.
    """
    known = case["exact"]
    model = plain(case["A"], case["b"], case.get("eq", []))
    found = region(model)
    if not any(known[part] for part in ("vertices", "rays", "lines")):
        assert found.status == "empty"
        return
    apex = int(not known["vertices"])
    assert len(found.base) == known["vertices"] + apex
    assert len(found.vertices) == (0 if known["lines"] else known["vertices"] + apex)
    assert len(found.rays) == known["rays"]
    assert len(found.lines) == known["lines"]
    assert len(found.facets) == known["irredundant"]
    fixed = [model.constraint(name).coefficients for name in found.equalities]
    assert found.dimension == model.n - len(eliminate(fixed, model.n)[1])
    assert bool(found.equalities) == bool(known["equalities"])
    if known.get("points") and not known["lines"]:
        points = sorted(tuple(map(Fraction, point)) for point in known["points"])
        assert [vertex.point for vertex in found.vertices] == points
