"""The edges out of a vertex, beside the pivots of a dictionary and the objective at both ends."""

from __future__ import annotations

import polywalk as pw
from polywalk.region import ways


def test_steps_are_those_of_the_walks_pivots() -> None:
    model = pw.scenarios.harbour_row()
    seen, walked = pw.region(model), pw.walk(model)
    places = {vertex.point: k for k, vertex in enumerate(seen.vertices)}
    told = 0
    for pivot in walked.pivots:
        found = ways(seen, places[pivot.point_before])
        way = next(way for way in found if way.vertex == places[pivot.point_after])
        assert way.change == pivot.objective_after - pivot.objective_before
        assert way.steps is not None
        assert pivot.step in way.steps
        told += 1
    assert told >= 3


def test_every_edge_is_told_at_both_its_ends() -> None:
    for model in (pw.scenarios.harbour_row(), pw.scenarios.harbour_row("unbounded")):
        seen = pw.region(model)
        found = [ways(seen, k) for k in range(len(seen.vertices))]
        assert sum(len(list(out)) for out in found) == sum(1 if e.end is None else 2 for e in seen.edges)
        for k, out in enumerate(found):
            for way in out:
                if way.vertex is None:
                    assert way.steps is None
                    assert way.change == seen.rays[way.ray].change
                else:
                    assert way.change == seen.vertices[way.vertex].objective - seen.vertices[k].objective
                    assert set(way.released) == set(seen.vertices[k].active) - set(seen.vertices[way.vertex].active)
                    assert all(step > 0 for step in way.steps)


def test_a_degenerate_vertex_lets_several_go() -> None:
    seen = pw.region(pw.scenarios.harbour_row("degenerate"))
    crowded = next(k for k, vertex in enumerate(seen.vertices) if vertex.degenerate)
    assert max(len(way.released) for way in ways(seen, crowded)) >= 2
