"""Sections: the same region as fixing variables exactly; what became constant, what was snapped, what is refused."""

from __future__ import annotations

from fractions import Fraction

import numpy as np
import pandas as pd
import pytest
from random_models import random_model
from zoo import build

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError, UnknownName
from polywalk.linear import optimum
from polywalk.narrowing import section
from polywalk.region import region
from polywalk.scenarios import harbour_day, harbour_row

ROW = BigModel.from_model(harbour_row())


def test_a_section_is_the_model_with_the_others_fixed() -> None:
    met = 0
    for seed in range(120):
        model, keep = random_model(seed)
        found = region(model)
        if not found.vertices or len(keep) == model.n:
            continue
        met += 1
        values = dict(zip(model.variables, found.vertices[-1].point, strict=True))
        cut = section(BigModel.from_model(model), keep, values)
        expected = model
        for name in set(model.variables) - set(keep):
            expected = expected.fix(name, values[name])
        order = [expected.index(name) for name in keep]
        points = sorted(tuple(vertex.point[j] for j in order) for vertex in region(expected).vertices)
        assert sorted(vertex.point for vertex in region(cut.model).vertices) == points
        assert all(one.verdict == "satisfied" for one in cut.settled)
        assert not cut.snaps
    assert met > 25


def test_at_the_optimum_the_values_are_exact() -> None:
    cut = section(ROW, ("pump", "chips"))
    assert region(cut.model).value == 292
    assert "rebuilt exactly" in str(cut)
    assert "tank = 4" not in cut.model.name
    day = section(harbour_day(), ("pump[7]", "tank[7]"))
    assert region(day.model).value == optimum(harbour_day().to_model()).value


def test_values_from_a_series_and_from_a_vector_are_the_same() -> None:
    plan = [4.0, 4.0, 3.5]
    cuts = [section(ROW, ("pump",), at) for at in (plan, np.array(plan), pd.Series(plan, index=list(ROW.variables)))]
    assert cuts[0].model == cuts[1].model == cuts[2].model
    assert region(cuts[0].model).ranges["pump"] == (0, Fraction(9, 2))


def test_every_snap_is_reported() -> None:
    cut = section(ROW, ("pump",), {"chips": 4.000000000123, "tank": 0.33333333333})
    assert [(one.variable, one.given, one.taken) for one in cut.snaps] == [
        ("chips", 4.000000000123, 4),
        ("tank", 0.33333333333, Fraction(1, 3)),
    ]
    assert "tank: 0.33333333333 was taken for 1/3" in str(cut)
    assert not section(ROW, ("pump",), {"chips": 0.1, "tank": "1/3"}).snaps
    assert not section(ROW, ("pump",), {"chips": 0.123456, "tank": 2}).snaps


def test_what_became_constant_has_one_of_three_verdicts() -> None:
    rows = [
        ("sum", [1, 1, 0], "==", 3),
        ("near", [0, 1, 1], "<=", 3),
        ("far", [0, 0, 1], ">=", 1),
        ("x", [1, 0, 0], ">=", 0),
    ]
    big = BigModel.from_model(build("x y z", rows))
    settled = {one.constraint: one for one in section(big, ("x",), {"y": "2.0000001", "z": 1}).settled}
    assert settled["near"].verdict == "violated within solver tolerance"
    assert settled["near"].slack == Fraction(-1, 10**7)
    assert (settled["far"].verdict, settled["far"].slack) == ("satisfied", 0)
    broken = section(big, ("x",), {"y": 2, "z": 0})
    assert {one.constraint: one.verdict for one in broken.settled}["far"] == "violated"
    assert region(broken.model).status == "empty"
    assert "far: violated, by 1" in str(broken)


def test_a_section_that_is_a_point_offers_the_shadow() -> None:
    big = BigModel.from_model(
        build("x y z", [("sum", [1, 1, 1], "==", 6), ("twin", [1, -1, 0], "==", 0), ("z", [0, 0, 1], ">=", 0)])
    )
    cut = section(big, ("x", "y"), {"z": 2})
    assert "a single point" in str(cut)
    assert "shadow(big, onto=('x', 'y'))" in str(cut)


def test_a_section_that_is_empty_by_noise_says_so() -> None:
    rows = [("a", [1, 0, 1], "==", 3), ("b", [1, 0, 2], "==", 5), ("y", [0, 1, 0], ">=", 0)]
    big = BigModel.from_model(build("x y z", rows))
    noisy = section(big, ("x", "y"), {"z": Fraction("2.00000001")})
    assert region(noisy.model).status == "empty"
    assert "less than solver tolerance" in str(noisy)
    assert "empty at these values" in str(section(big, ("x", "y"), {"z": 3}))


def test_what_cannot_be_cut_is_refused() -> None:
    with pytest.raises(UnknownName, match="did you mean 'tank'"):
        section(ROW, ("pump",), {"chips": 1, "tnk": 2})
    with pytest.raises(UnknownName, match="did you mean 'pump'"):
        section(ROW, ("pmp",), {"chips": 1, "tank": 2})
    with pytest.raises(ModelError, match="'tank' has none"):
        section(ROW, ("pump",), {"chips": 1})
    with pytest.raises(ModelError, match="'tank' violates its bound 'tank upper' by 1"):
        section(ROW, ("pump",), {"chips": 1, "tank": 5})
    with pytest.raises(ModelError, match="expected 3 values"):
        section(ROW, ("pump",), [1, 2])
    with pytest.raises(ModelError, match="conflict"):
        section(BigModel.from_model(harbour_row("infeasible")), ("pump",))
    with pytest.raises(ModelError, match="escape"):
        section(BigModel.from_model(harbour_row("unbounded")), ("pump",))
    with pytest.raises(ModelError, match="as a list"):
        section(ROW, "pump")
