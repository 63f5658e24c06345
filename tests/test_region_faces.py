"""Edges and facets of regions with more vertices than are compared pair by pair: counts from their formulas."""

from __future__ import annotations

import families as known
import pytest
from zoo import ZOO

from polywalk.model import Model
from polywalk.region import faces, region

ZIEGLER = "Ziegler, Lectures on Polytopes, 1995"
CASES: list[tuple[str, str, Model, tuple[int, int, int]]] = [
    ("prism 60", "elementary", known.prism(60), (120, 180, 62)),
    ("pyramid 110", "elementary", known.pyramid(110), (111, 220, 111)),
    ("bipyramid 105", "elementary", known.pyramid(105, both=True), (107, 315, 210)),
    ("cube 7", ZIEGLER, known.cube(7), (128, 448, 14)),
    ("permutohedron 5", f"{ZIEGLER}, example 0.10", known.permutohedron(5), (120, 240, 30)),
]


@pytest.mark.parametrize(("name", "source", "model", "counts"), CASES, ids=[case[0] for case in CASES])
def test_edges_and_facets_of_many_vertices(name: str, source: str, model: Model, counts: tuple[int, int, int]) -> None:
    found = region(model)
    assert len(found.vertices) > faces.MANY
    assert (len(found.vertices), len(found.edges), len(found.facets)) == counts, source


def test_looking_along_sides_finds_the_same_edges(monkeypatch: pytest.MonkeyPatch) -> None:
    """Segments, single points, open and flat regions too: every edge lies on a side, unless two generators are all."""
    models = [model for model, _ in ZOO.values()]
    models += [known.cube(3), known.cell24(), known.transport([1] * 3, [1] * 3), known.pyramid(6), known.simplex(1)]
    plain = [region(model).edges for model in models]
    monkeypatch.setattr(faces, "MANY", 2)
    assert [region(model).edges for model in models] == plain
