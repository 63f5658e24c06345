"""Conflicts: empty, and without any one constraint not; the published irreducible subsets; ways out; partial plans."""

from __future__ import annotations

import json
from dataclasses import replace
from fractions import Fraction
from itertools import pairwise
from pathlib import Path

import numpy as np
import pytest
from checker import proves_empty, proves_unbounded
from random_models import random_model
from zoo import build

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError, UnknownName
from polywalk.linear import farkas, improving_ray, optimum
from polywalk.model import Model
from polywalk.narrowing import Axes, AxisRange, completion, conflict, escape, suggest_axes
from polywalk.region import region
from polywalk.scenarios import harbour_day, harbour_row, harbour_year

SHARED = Path(__file__).parents[3] / "shared" / "data" / "mps"


def is_irreducible(model: Model) -> bool:
    """Whether the model is empty, by a checked proof, and without any one constraint has a plan."""
    proof = farkas(model)
    rows = [(row.coefficients, row.sense, row.rhs) for row in model.constraints]
    if proof is None or not proves_empty(rows, proof.weights):
        return False
    less = [tuple(row for row in model.constraints if row is not out) for out in model.constraints]
    return all(farkas(replace(model, constraints=rows, units=())) is None for rows in less)


def test_conflicts_of_random_models() -> None:
    met = 0
    for seed in range(150):
        model, _ = random_model(seed)
        found = conflict(BigModel.from_model(model))
        assert (found is None) == (region(model).status != "empty"), seed
        if found is not None:
            met += 1
            assert is_irreducible(found), seed
            assert all(_same(model, found, row.name) for row in found.constraints)
    assert met >= 40


def _same(model: Model, found: Model, name: str) -> bool:
    whole, part = model.constraint(name), found.constraint(name)
    named = dict(zip(found.variables, part.coefficients, strict=True))
    return (
        part.rhs == whole.rhs
        and part.sense == whole.sense
        and whole.coefficients == tuple(named.get(v, 0) for v in model.variables)
    )


@pytest.mark.needs_shared_data
@pytest.mark.parametrize("name", ["galenet", "itest2", "itest6"])
def test_published_conflicts(name: str) -> None:
    """All irreducible subsets of these files, computed by enumeration (Gleeson & Ryan 1990): CHECKS F and G."""
    if not SHARED.is_dir():
        pytest.skip("reference data is not part of the project")
    from polywalk.reading import from_mps

    listed = json.loads((SHARED / "results.json").read_text())[name]["all_iis"]
    found = conflict(from_mps(SHARED / f"{name}.mps"))
    assert found is not None
    assert is_irreducible(found)
    assert _members(found) in [sorted(one) for one in listed]


def _members(found: Model) -> list[str]:
    """The constraints as the list names them: "row<=", "row>=", "x.lo", "x.up"; the sign tells an equality's half."""
    proof = farkas(found)
    assert proof is not None
    named = []
    for row in found.constraints:
        stem, _, end = row.name.rpartition(" ")
        if stem in found.variables and end in {"lower", "upper"}:
            named.append(f"{stem}.{end[:2] if end == 'upper' else 'lo'}")
        else:
            half = row.sense if row.sense != "==" else ("<=" if proof.multipliers[row.name] > 0 else ">=")
            named.append(f"{stem if end in {'lower', 'upper'} and stem else row.name}{half}")
    return sorted(named)


def test_a_conflict_far_inside_a_large_model() -> None:
    """A year in which one hour's demand is beyond what its sources can give."""
    big = harbour_year(2000).with_rhs("demand[700]", 40)
    found = conflict(big)
    assert found is not None
    assert is_irreducible(found)
    assert "demand[700]" in [row.name for row in found.constraints]
    assert len(found.constraints) < 12


def test_a_conflict_of_bounds_alone() -> None:
    big = harbour_day()
    crossed = replace(big, lower=np.where(np.array(big.variables) == "tank[3]", 6.0, big.lower))
    found = conflict(crossed)
    assert found is not None
    assert [row.name for row in found.constraints] == ["tank[3] lower", "tank[3] upper"]


def test_an_emptiness_below_solver_tolerance_is_found() -> None:
    """x + y >= 2 + 1e-7 in the unit square is empty, and HiGHS calls it optimal (CHECKS F)."""
    rows = [("sum", [1, 1], ">=", "2.0000001"), ("x upper", [1, 0], "<=", 1), ("y upper", [0, 1], "<=", 1)]
    found = conflict(BigModel.from_model(build("x y", rows)))
    assert found is not None
    assert is_irreducible(found)


def test_a_model_with_a_plan_has_no_conflict_and_a_bounded_one_no_way_out() -> None:
    assert conflict(harbour_day()) is None
    assert escape(harbour_day()) is None
    assert escape(BigModel.from_model(harbour_row("infeasible"))) is None
    with pytest.raises(ModelError, match="objective"):
        escape(harbour_day().without_objective())


def test_ways_out_of_random_models() -> None:
    met = 0
    for seed in range(150):
        model, _ = random_model(seed)
        costs = {name: (-1) ** k * (k + 1) for k, name in enumerate(model.variables)}
        model = model.with_objective(costs, "max" if seed % 2 else "min")
        found = escape(BigModel.from_model(model))
        assert (found is None) == (optimum(model).outcome != "unbounded"), seed
        if found is not None:
            met += 1
            assert _is_unbounded(found), seed
            assert set(found.variables) <= set(model.variables)
            assert {row.name for row in found.constraints} <= {row.name for row in model.constraints}
    assert met >= 40


def _is_unbounded(model: Model) -> bool:
    ray = improving_ray(model)
    rows = [(row.coefficients, row.sense, row.rhs) for row in model.constraints]
    goal = model.objective
    assert goal is not None
    return ray is not None and proves_unbounded(goal.goal, goal.coefficients, rows, ray.point, ray.direction)


def test_a_way_out_of_a_large_model_is_small() -> None:
    big = harbour_year(500)
    cost = np.where(np.array(big.variables) == "chips[40]", -1.0, big.cost)
    free = replace(big, cost=cost).without("chips[40] upper", "demand[40]", "timber")
    found = escape(free)
    assert found is not None
    assert found.variables == ("chips[40]",)
    assert _is_unbounded(found)


def test_a_partial_plan_is_completed_or_forbidden() -> None:
    big = harbour_day()
    yes = completion(big, {"pump[7]": 4})
    assert yes.verdict == "possible"
    assert dict(yes.values)["pump[7]"] == 4
    model = big.to_model()
    point = model.point(dict(yes.values))
    assert all(row.holds(point) for row in model.constraints)
    no = completion(big, {"pump[7]": "4.5"})
    assert no.verdict == "impossible"
    assert no.conflict is not None
    assert is_irreducible(no.conflict)
    assert {"pump[7] as planned", "grid connection[7]"} == {row.name for row in no.conflict.constraints}
    assert no.limits == (("pump[7]", 0, Fraction(1000, 237)),)
    assert "pump[7] can be from 0 to" in str(no)
    with pytest.raises(UnknownName, match=r"pump\[7\]"):
        completion(big, {"pmp[7]": 4})


def test_axes_are_ranked_by_their_range_among_near_optimal_plans() -> None:
    big = BigModel.from_model(harbour_row())
    held = harbour_row().with_constraint("near", {"pump": 23, "chips": 18, "tank": 32}, ">=", Fraction(99, 100) * 292)
    ranges = region(held).ranges
    found = suggest_axes(big, within="1%")
    widths = {one.variable: one.width for one in found.ranked}
    assert widths == pytest.approx({name: float(high - low) for name, (low, high) in ranges.items()})  # type: ignore[operator]
    assert [one.width for one in found.ranked] == sorted(widths.values(), reverse=True)
    assert all(one.is_measured for one in found.ranked)
    assert "suggested axes" in str(found)


def test_axes_of_a_part_within_the_time_given() -> None:
    found = suggest_axes(harbour_day(), among=["pump[7]", "tank[7]", "chips[8]", "level[9]"], seconds=0)
    assert len(found.ranked) == 4
    assert found.measured == 3
    assert "3 of 4" in str(found)
    with pytest.raises(UnknownName):
        suggest_axes(harbour_day(), among=["pmp[7]"])
    with pytest.raises(ModelError, match="infeasible"):
        suggest_axes(BigModel.from_model(harbour_row("infeasible")))


def test_ties_of_axes_are_told_and_broken_by_stem() -> None:
    found = suggest_axes(harbour_day(), seconds=60)
    assert "variables tie at a range of 12" in str(found)
    assert "e-1" not in str(found)
    hours = sorted(int(name.partition("[")[2][:-1]) for name in found.names)
    assert min(later - hour for hour, later in pairwise(hours)) > 5  # all that tie are levels: not those of one evening
    flat = BigModel(
        ("a[1]", "a[2]", "a[3]", "b[1]", "c", "d"),
        ("sum",),
        [0, 6],
        list(range(6)),
        [1] * 6,
        [-np.inf],
        [100],
        [0] * 6,
        [12, 12, 12, 12, 12, 3],
        cost=[0] * 6,
        goal="max",
    )
    told = suggest_axes(flat, within=1)
    assert told.names == ("a[1]", "c", "b[1]")
    assert "5 variables tie at a range of 12" in str(told)
    clear = suggest_axes(replace(flat, upper=np.array([12.0, 11, 10, 9, 8, 3])), within=1)
    assert clear.names == ("a[1]", "a[2]", "a[3]")
    assert "tie" not in str(clear)


def test_rounding_is_printed_as_0() -> None:
    ranges = (AxisRange("x", -1.7e-13, 12.0, True), AxisRange("y", 0.0, 2e-9, True), AxisRange("z", -np.inf, 1, True))
    shown = Axes(ranges, "1%", ("x", "y", "z"), 3).table().rows
    assert shown == (("x", "0", "12", "12"), ("y", "0", "0", "0"), ("z", "-inf", "1", "inf"))
