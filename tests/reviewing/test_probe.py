"""Probing a plan: verdicts, completions and conflicts, and the nearest allowed point proved by its multipliers."""

from fractions import Fraction
from itertools import combinations
from random import Random

import pytest
from checker import holds, proves_empty
from small import plain, random_model
from zoo import ZOO, build

import polywalk as pw
from polywalk.errors import ModelError, NumberError, UnknownName
from polywalk.exact import dot
from polywalk.reviewing.nearest import nearest, nearest_max
from polywalk.reviewing.tolerances import TOLERANCES

HARBOUR = pw.scenarios.harbour_row()


@pytest.mark.parametrize(
    ("plan", "verdict"),
    [
        ((2, 3, 1), "inside"),
        ((4, 4, 4), "boundary"),
        ((5, 5, 5), "outside"),
        ((4, 4 + Fraction(1, 10**7), 4), "within solver tolerance"),
        ((4, 4 + 12 * TOLERANCES.feasibility, 4), "within solver tolerance"),
        ((4, 4 + 13 * TOLERANCES.feasibility, 4), "outside"),
    ],
)
def test_verdicts(plan, verdict):
    said = pw.probe(HARBOUR, plan)
    assert said.verdict == verdict
    assert said.allowed == holds(plain(HARBOUR), plan)
    assert said.allowed == (verdict in {"inside", "boundary"})


def test_active_and_violated_constraints():
    assert pw.probe(HARBOUR, (4, 4, 4)).active == ("harbour main", "quay pipe", "tank upper")
    said = pw.probe(HARBOUR, {"tank": 4, "pump": 6, "chips": 4})
    assert said.violated == (("harbour main", 2), ("grid connection", Fraction(2, 5)), ("quay pipe", 2))
    assert said.plan == (("pump", 6), ("chips", 4), ("tank", 4))
    for words in ("harbour main is missed by 2", "at a distance of 1.41421", "held back by quay pipe"):
        assert words in str(said)


def test_a_missed_equality_and_a_row_without_variables():
    model = build("x", [("fix", [2], "==", 3), ("never", [0], "<=", -1)])
    said = pw.probe(model, [1])
    assert said.violated == (("fix", 1), ("never", 1))
    assert said.nearest is None
    assert said.nearest_max is None
    assert "no plan at all is allowed" in str(said)


def test_a_part_that_can_be_completed():
    said = pw.probe(HARBOUR, {"pump": "9/2"})
    assert said.partial
    assert said.allowed
    assert said.point[0] == Fraction(9, 2)
    assert holds(plain(HARBOUR), said.point)
    assert "can be completed" in str(said)


def test_a_part_that_cannot_be_completed_has_a_proof():
    said = pw.probe(HARBOUR, {"tank": 3, "pump": 6})
    assert (said.verdict, said.point, said.nearest) == ("outside", None, None)
    fixed = HARBOUR.fix("pump", 6).fix("tank", 3)
    weights = [said.conflict.multipliers.get(row.name, 0) for row in fixed.constraints]
    assert proves_empty(plain(fixed), weights)
    assert "nothing completes pump = 6, tank = 3" in str(said)
    assert "pump + tank ≤ 8" in str(said)


@pytest.mark.parametrize(
    ("plan", "error", "words"),
    [
        ({"pumps": 1}, UnknownName, "did you mean 'pump'"),
        ({"pump": "a lot"}, NumberError, "a lot"),
        ({"pump": float("nan")}, NumberError, "finite"),
        ({"pump": None}, NumberError, "expected a number"),
        ((1, 2), ModelError, "expected 3 values"),
        ({}, ModelError, "empty plan"),
        ("4, 4, 4", ModelError, "names and values"),
        (4, ModelError, "names and values"),
    ],
)
def test_bad_plans(plan, error, words):
    with pytest.raises(error, match=words):
        pw.probe(HARBOUR, plan)


# the nearest allowed point


def is_proved(model, plan, found):
    """Karush-Kuhn-Tucker: allowed, and the step is a sum of inward directions of active constraints."""
    rows = {row.name: row for row in model.constraints}
    step = [Fraction(0)] * model.n
    for name, weight in found.multipliers:
        if rows[name].slack(found.point) != 0 or (rows[name].sense != "==" and weight < 0):
            return False
        step = [a + weight * b for a, b in zip(step, rows[name].inward[1], strict=True)]
    reached = [a + b for a, b in zip(plan, step, strict=True)]
    return holds(plain(model), found.point) and reached == list(found.point)


def by_faces(model, plan):
    """The least squared distance over the projections onto all planes of up to n rows that are allowed."""
    best = None
    rows = [row for row in model.constraints if not row.is_constant]
    for size in range(model.n + 1):
        for chosen in combinations(rows, size):
            point = projected(plan, chosen)
            if point is not None and holds(plain(model), point):
                away = sum((a - b) ** 2 for a, b in zip(plan, point, strict=True))
                best = away if best is None else min(best, away)
    return best


def projected(plan, rows):
    """One row at a time, each made orthogonal to those before (Gram-Schmidt); None where they are dependent."""
    point, slopes = list(plan), []
    for row in rows:
        slope = list(row.coefficients)
        for other in slopes:
            share = dot(slope, other) / dot(other, other)
            slope = [a - share * b for a, b in zip(slope, other, strict=True)]
        if not any(slope):
            return None
        length = (row.rhs - dot(row.coefficients, point)) / dot(slope, row.coefficients)
        point = [a + length * b for a, b in zip(point, slope, strict=True)]
        slopes.append(slope)
    return point


def test_nearest_points_are_proved_and_as_near_as_any_face():
    draw, met = Random(4), {"empty": 0, "inside": 0, "equality": 0, "several": 0}
    for _ in range(250):
        model = random_model(draw)
        plan = tuple(Fraction(draw.randint(-12, 12), draw.choice([1, 2])) for _ in range(model.n))
        found = nearest(model, plan)
        if found is None:
            assert pw.region(model).status == "empty"
            met["empty"] += 1
            continue
        assert is_proved(model, plan, found)
        assert found.distance_squared == by_faces(model, plan)
        met["inside"] += not found.multipliers
        met["several"] += len(found.multipliers) > 1
        met["equality"] += any(model.constraint(name).sense == "==" for name, _ in found.multipliers)
    assert min(met.values()) >= 15, met


def test_the_proof_itself_can_fail():
    model = build("x y", [("cap", [1, 1], "<=", 4)])
    found = nearest(model, (Fraction(4), Fraction(2)))
    assert is_proved(model, (4, 2), found)
    assert not is_proved(model, (4, 3), found)


def test_nearest_in_the_max_norm():
    draw, met = Random(5), 0
    for _ in range(120):
        model = random_model(draw)
        plan = tuple(Fraction(draw.randint(-9, 9)) for _ in range(model.n))
        found = nearest_max(model, plan)
        if found is None:
            assert pw.region(model).status == "empty"
            continue
        point, most = found
        assert holds(plain(model), point)
        assert max(abs(a - b) for a, b in zip(point, plan, strict=True)) == most
        if most:
            met += 1
            nearer = boxed(model, plan, most * Fraction(999, 1000))
            proof = pw.farkas(nearer)
            assert proves_empty(plain(nearer), proof.weights)
    assert met >= 30


def boxed(model, plan, size):
    """The model with every variable at most ``size`` away from the plan."""
    for name, value in zip(model.variables, plan, strict=True):
        model = model.with_constraint(f"{name} above", {name: 1}, "<=", value + size)
        model = model.with_constraint(f"{name} below", {name: 1}, ">=", value - size)
    return model


@pytest.mark.parametrize("name", sorted(ZOO))
def test_every_awkward_model_answers(name):
    model = ZOO[name][0]
    said = pw.probe(model, [Fraction(7)] * model.n)
    assert said.allowed == holds(plain(model), [7] * model.n)
    assert (said.nearest is None) == (said.allowed or pw.region(model).status == "empty")
    assert len(said.table().rows) == len(model.constraints)
