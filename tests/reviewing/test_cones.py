"""The cone of every vertex: beside brute force for random costs, and beside the cost ranges."""

from __future__ import annotations

from collections import Counter
from fractions import Fraction
from random import Random

import pytest
from boxed import brute
from small import plain, random_degenerate, random_model
from zoo import ZOO

import polywalk as pw
from polywalk.errors import NumberError, UnknownName
from polywalk.exact import dot


@pytest.mark.parametrize("make", [random_model, random_degenerate])
def test_a_vertex_is_optimal_where_its_cone_says_so(make):
    draw, met = Random(8), Counter()
    while met["costs"] < (80 if make is random_model else 60):
        model = make(draw)
        found = pw.cones(model)
        if not found.members:
            continue
        costs = [draw.choice([-2, -1, 0, 0, 1]) for _ in model.variables]
        goal = model.objective.goal
        outcome, _, points = brute(goal, costs, 0, plain(model))
        best = {cone.point for cone in found.members if cone.holds(dict(zip(model.variables, costs, strict=True)))}
        if found.region.lines:
            assert bool(best) == (outcome == "optimal")
        else:
            assert best == set(points)
        met["costs"] += 1
        met["tied"] += len(points) > 1
        met["unbounded"] += outcome == "unbounded"
        met["lines"] += bool(found.region.lines)
    assert met["tied"] >= 3, met
    assert met["unbounded"] >= 5, met


@pytest.mark.parametrize("name", sorted(ZOO))
def test_generators_keep_every_condition(name):
    """The two descriptions of a cone agree: what makes it lies in it, and each condition is met with equality."""
    found = pw.cones(ZOO[name][0])
    assert len(found.members) == len(found.region.base)
    for cone in found.members:
        turned = 1 if cone.goal == "max" else -1
        for condition in cone.conditions:
            changes = [turned * dot(costs, condition.direction) for _, costs in cone.generators]
            assert max(changes, default=0) <= 0
            assert all(dot(costs, condition.direction) == 0 for _, costs in cone.lines)
        assert str(cone)
    assert str(found)


def test_cost_ranges_end_where_the_cone_ends():
    draw, checked = Random(12), 0
    while checked < 60:
        model = draw.choice([random_model, random_degenerate])(draw)
        found = pw.sensitivity(model)
        cones = {cone.name: cone for cone in pw.cones(model).members}
        for corner, ranges in found.cost_ranges.items():
            for item in ranges:
                costs = dict(zip(model.variables, model.objective.coefficients, strict=True))
                for end, way in ((item.low, -1), (item.high, 1)):
                    if isinstance(end, Fraction):
                        assert cones[corner].holds(costs | {item.variable: end})
                        assert not cones[corner].holds(costs | {item.variable: end + Fraction(way, 999)})
                        checked += 1
                    else:
                        assert cones[corner].holds(costs | {item.variable: way * 10**6})


def test_a_square_by_hand():
    model, _ = ZOO["tied optimum"]  # x, y >= 0, x + y <= 2
    found = pw.cones(model)
    assert found.best({"x": 3, "y": 3}) == ("V1", "V2")
    assert found.best({"x": 1}) == ("V2",)
    assert found.best({"x": -1, "y": -1}) == ("V0",)
    assert found.best({}) == ("V0", "V1", "V2")
    assert found.members[0].generators == (("x lower", (-1, 0)), ("y lower", (0, -1)))


def test_bad_costs_are_told():
    cone = pw.cones(ZOO["tied optimum"][0]).members[0]
    with pytest.raises(UnknownName, match="variable 'z'"):
        cone.holds({"z": 1})
    with pytest.raises(NumberError):
        cone.holds({"x": "dear"})
