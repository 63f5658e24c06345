"""Slips in a row that couples everything: found fast, told first, proved; families folded; time that is up."""

from __future__ import annotations

from fractions import Fraction
from time import monotonic

import numpy as np
import pytest
from checker import proves_empty
from random_models import random_model

from polywalk.bigmodel import BigModel
from polywalk.errors import NumberError
from polywalk.exact import short
from polywalk.linear import farkas, optimum
from polywalk.model import Model
from polywalk.narrowing import conflict
from polywalk.narrowing import culprits as culprits_room
from polywalk.narrowing.circuit import circuit, contradiction, pivots_of
from polywalk.narrowing.conflict import irreducible
from polywalk.narrowing.culprits import families, folded, ordered
from polywalk.region import region
from polywalk.scenarios import harbour_day, harbour_year

SLIP = harbour_day().with_rhs("timber", 11.96)


def test_a_slip_in_a_coupling_row_stands_first_with_what_repairs_it() -> None:
    found = conflict(SLIP)
    assert found is not None
    first = found.constraints[0]
    assert first.name == "timber"
    assert first.origin == "relaxed to ≈98.1042 it alone suffices"
    assert conflict(SLIP.with_rhs("timber", 98.105)) is None
    assert conflict(SLIP.with_rhs("timber", 98.104)) is not None
    proof = farkas(found)
    assert proof is not None
    assert all(proof.weights)
    assert proves_empty([(row.coefficients, row.sense, row.rhs) for row in found.constraints], proof.weights)
    matrix = np.array([[float(value) for value in row.coefficients] for row in found.constraints])
    assert np.linalg.matrix_rank(matrix) == len(found.constraints) - 1  # so none is to spare


def test_large_families_come_last_and_are_folded() -> None:
    found = conflict(SLIP)
    assert found is not None
    rows = folded(found).rows
    assert len(rows) < 20
    assert rows[0][0] == "timber"
    assert str(rows[-1][0]).endswith("alike")
    counted = sum(int(str(row[0]).split(": ")[1].split()[0]) if "alike" in str(row[0]) else 1 for row in rows)
    assert counted == len(found.constraints)
    assert max(len(str(row[1])) for row in rows) < 100
    assert families(f"a[{k}]" for k in range(6)) == [f"a[{k}]" for k in range(6)]


def test_a_conflict_too_large_is_added_up_to_two(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(culprits_room, "TRYING", 1.0)
    big = harbour_year(500).with_rhs("timber", 111)
    begun = monotonic()
    found = conflict(big)
    assert monotonic() - begun < 60  # 200 s and more with deletion filtering
    assert found is not None
    assert (found.n, found.constraints[0].name) == (1, "timber")
    assert "1,028 constraints added up to two" in found.name
    assert region(found).status == "empty"
    against = found.constraints[1]
    assert (against.sense, "demand[1] ... " in against.origin) == (">=", True)
    assert len(f"{float(against.rhs)}") < 8
    least = conflict(big.with_rhs("timber", float(against.rhs) - 0.01))
    assert least is not None  # what the others say holds: so little timber never suffices


def test_what_is_said_to_suffice_alone_does_and_nothing_nearer() -> None:
    met = 0
    for seed in range(60):
        model, _ = random_model(seed)
        found = conflict(BigModel.from_model(model))
        for row in found.constraints if found is not None else ():
            less = model.without(row.name)
            if not row.origin:
                assert region(less).status == "empty" or row.sense == "==" or _is_crossed(model), (seed, row.name)
                continue
            met += 1
            assert row.origin == f"relaxed to {short(_nearest(model, row.name))} it alone suffices", (seed, row.name)
    assert met >= 30


def _is_crossed(model: Model) -> bool:
    big = BigModel.from_model(model)
    return bool((big.lower > big.upper).any())


def _nearest(model: Model, name: str) -> Fraction:
    row = model.constraint(name)
    entries = dict(zip(model.variables, row.coefficients, strict=True))
    ends = [optimum(model.without(name).with_objective(entries, goal)) for goal in ("min", "max")]
    values = [end.value for end in ends if end.value is not None]
    return min(values, key=lambda value: abs(value - row.rhs))


def test_circuits_of_random_models_are_irreducible() -> None:
    met = 0
    for seed in range(150):
        big = BigModel.from_model(random_model(seed)[0])
        found = None if (big.lower > big.upper).any() else contradiction(big)
        if found is None:
            continue
        met += 1
        model = big.to_model()
        named = [(model.constraint(name), weight) for name, weight in found.multipliers]
        assert proves_empty(
            [(row.coefficients, row.sense, row.rhs) for row, _ in named], [weight for _, weight in named]
        )
        assert sum(weight * row.rhs for row, weight in named) == found.value
        for out, _ in found.multipliers:
            others = [name for name, _ in found.multipliers if name != out]
            assert farkas(model.without(*(row.name for row in model.constraints if row.name not in others))) is None
    assert met >= 20


def test_multipliers_that_prove_nothing_are_no_circuit() -> None:
    big = harbour_day()
    assert circuit(big, np.zeros(big.m)) is None
    assert circuit(big, np.ones(big.m)) is None
    assert contradiction(big) is None


def test_a_rank_by_elimination() -> None:
    draw = np.random.default_rng(5)
    for _ in range(50):
        matrix = draw.integers(-2, 3, (7, 4)) @ draw.integers(-2, 3, (4, 8))
        lines = [{j: int(value) for j, value in enumerate(row) if value} for row in matrix]
        pivots = [pivot for pivot in pivots_of(lines) if pivot is not None]
        assert len(pivots) == len(set(pivots)) == np.linalg.matrix_rank(matrix)


def test_time_that_is_up_is_told(monkeypatch: pytest.MonkeyPatch) -> None:
    found = conflict(SLIP, seconds=0)
    assert found is not None
    assert not any(row.origin for row in found.constraints)
    rows = [("a", "x >= 1"), ("b", "x <= 0"), ("c", "y >= 1"), ("d", "y <= 0")]
    from polywalk.reading import from_algebra

    model = from_algebra(constraints=dict(rows))
    proof = farkas(model)
    assert proof is not None
    both = type(proof)(model, (Fraction(-1), Fraction(1), Fraction(-1), Fraction(1)))  # a proof with two to spare
    assert len(irreducible(BigModel.from_model(model), both).constraints) == 2
    late = irreducible(BigModel.from_model(model), both, end=0.0)
    assert len(late.constraints) == 4
    assert "not proved irreducible" in late.name
    with pytest.raises(NumberError, match="seconds"):
        conflict(SLIP, seconds="soon")  # type: ignore[arg-type]
    monkeypatch.setattr(culprits_room, "TRYING", -1.0)
    assert ordered(SLIP, ["demand[1]", "demand[2]", "timber"], 1e12)[0] == ("timber", "")
