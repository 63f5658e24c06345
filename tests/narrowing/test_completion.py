"""Plans put to a big model: beside the exact answers of small ones, and what would have to give."""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction

import numpy as np
import pytest
from checker import proves_empty
from random_models import random_model

import polywalk as pw
from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError, NumberError, SolverError, UnknownName
from polywalk.linear import farkas, optimum
from polywalk.model import Model
from polywalk.narrowing.solver import Solver

HARBOUR = pw.scenarios.harbour_row()
DAY = pw.scenarios.harbour_day()


def test_random_plans_as_the_exact_model_answers_them() -> None:
    """Partial and whole plans of 200 random models: verdict, plan, conflict and its ends, nearest values."""
    met = {"possible": 0, "impossible": 0}
    for seed in range(200):
        model, _ = random_model(seed)
        draw = np.random.default_rng(seed)
        count = int(draw.integers(1, model.n + 1))
        plan = {model.variables[j]: Fraction(int(draw.integers(-4, 9)), 2) for j in draw.permutation(model.n)[:count]}
        said, known = pw.probe(BigModel.from_model(model), plan), pw.probe(model, plan)
        assert (said.allowed, said.partial) == (known.allowed, known.partial), seed
        met[said.verdict] += 1
        if said.allowed:
            point = model.point(dict(said.values))
            assert all(row.holds(point) for row in model.constraints)
            assert all(dict(said.values)[name] == value for name, value in plan.items())
        elif said.partial:
            assert_ends(said.conflict, dict(said.relaxed))
        else:
            assert sorted(said.violated) == sorted(known.violated)
        if not said.allowed:
            assert (said.nearest == ()) == (farkas(model) is not None)
            assert said.nearest == () or distance(plan, dict(said.nearest)) == least(model, plan), seed
    assert min(met.values()) >= 20


@pytest.mark.parametrize("variant", ["base", "degenerate", "tied", "flat", "unbounded"])
def test_a_completion_is_the_best_there_is_and_says_what_it_costs(variant: str) -> None:
    model = pw.scenarios.harbour_row(variant)
    big, best, met = BigModel.from_model(model), pw.optimum(model), set()
    draw = np.random.default_rng(3)
    for _ in range(25):
        count = int(draw.integers(1, 4))
        plan = {model.variables[j]: Fraction(int(draw.integers(0, 9)), 2) for j in draw.permutation(3)[:count]}
        said, held = pw.probe(big, plan), model
        for name, value in plan.items():
            held = held.with_constraint(f"{name} held", {name: 1}, "==", value)
        known = pw.optimum(held)
        met.add(known.outcome)
        assert said.allowed == (known.outcome != "infeasible")
        assert said.objective == (known.value if known.outcome == "optimal" else None)
        if known.outcome == "optimal":
            assert said.optimum == best.value
            told = "as good as any plan" if known.value == best.value else "from the optimum"
            assert (told in str(said)) == (best.value is not None)
    assert "optimal" in met
    assert ("unbounded" in met) == (variant == "unbounded")


def assert_ends(conflict: Model | None, ends: dict[str, Fraction]) -> None:
    """The conflict is one, by a checked proof; at its end it is none any more, and just before it still is."""
    assert conflict is not None
    proof = farkas(conflict)
    assert proof is not None
    assert proves_empty([(row.coefficients, row.sense, row.rhs) for row in conflict.constraints], proof.weights)
    assert set(ends) == {row.name for row in conflict.constraints}
    for name, rhs in ends.items():
        now = conflict.constraint(name).rhs
        assert farkas(conflict.with_rhs(name, rhs)) is None
        assert farkas(conflict.with_rhs(name, now + (rhs - now) * Fraction(999, 1000))) is not None


def distance(plan: dict[str, Fraction], other: dict[str, Fraction]) -> Fraction:
    return sum((abs(other[name] - value) for name, value in plan.items()), Fraction(0))


def least(model: Model, plan: dict[str, Fraction]) -> Fraction | None:
    """The least total change, by the exact simplex method on a model with one more variable for each value."""
    names = [f"off {name}" for name in plan]
    zeros = (Fraction(0),) * len(names)
    wide = replace(
        model,
        variables=(*model.variables, *names),
        constraints=tuple(replace(row, coefficients=(*row.coefficients, *zeros)) for row in model.constraints),
        objective=None,
        units=(),
        integers=(),
    )
    for off, (name, value) in zip(names, plan.items(), strict=True):
        wide = wide.with_constraint(f"{off} up", {name: 1, off: -1}, "<=", value)
        wide = wide.with_constraint(f"{off} down", {name: 1, off: 1}, ">=", value)
    return optimum(wide.with_objective(dict.fromkeys(names, 1), "min")).value


def test_it_reads_as_an_answer() -> None:
    said = str(pw.probe(DAY, {"pump[7]": 5, "level[9]": 100}))
    assert "pump[7] = 5, level[9] = 100: impossible" in said
    assert "level[9] upper" in said
    assert "possible with the least change in total: pump[7] = 1000/237, level[9] = 12" in said
    yes = str(pw.probe(DAY, {"pump[7]": 4}))
    assert yes.splitlines()[2].split() == ["pump[7]", "4"]
    assert "chips[7]" in yes, "what shares a row with the pump comes next"
    assert "more variables, see .values" in yes


def test_values_beyond_the_bounds_are_an_answer() -> None:
    said = pw.probe(DAY, {"pump[7]": -1})
    assert said.conflict is not None
    assert [row.name for row in said.conflict.constraints] == ["pump[7] lower", "pump[7] as planned"]
    assert said.limits == (("pump[7]", 0, Fraction(1000, 237)),)


def test_the_conflict_of_one_value_ends_where_its_range_does() -> None:
    """Many constraints contradict a pump of 100 MW; those that stop it at 5 MW are told."""
    said = pw.probe(BigModel.from_model(HARBOUR), {"pump": 100})
    assert said.relaxed == (("grid connection", 40), ("pump as planned", 5))
    assert said.limits == (("pump", 0, 5),)


def test_whole_plans() -> None:
    big = BigModel.from_model(HARBOUR)
    assert pw.probe(big, [4, 4, 4]).verdict == "possible"
    assert pw.probe(big, np.array([4.0, 4, 4 + 1e-7])).verdict == "possible within solver tolerance"
    said = pw.probe(big, [5, 5, 5])
    assert said.violated == (("harbour main", 3), ("quay pipe", 2), ("tank upper", 1))
    assert "quay pipe     pump + tank ≤ 8           2" in str(said)


def test_a_third_is_a_third() -> None:
    big = BigModel(("x", "y"), ("thirds",), [0, 2], [0, 1], [3, 1], [1], [1], [0, 0], [9, 9])
    assert pw.probe(big, {"x": "1/3"}).verdict == "possible"
    no = pw.probe(big, {"x": Fraction(1, 3) + Fraction(1, 10**12)})
    assert no.verdict == "impossible", "by far less than HiGHS's tolerance, and small enough to decide exactly"
    assert no.conflict is not None


def test_a_model_without_any_plan_says_so() -> None:
    big = BigModel.from_model(pw.scenarios.harbour_row("infeasible"))
    for plan in ({"pump": 1}, [1, 1, 1]):
        said = pw.probe(big, plan)
        assert not said.allowed
        assert said.nearest == ()
        assert "no plan at all" in str(said)


@pytest.mark.parametrize(
    ("plan", "kind", "words"),
    [
        ({"pmp": 3}, UnknownName, "did you mean 'pump'"),
        ({}, ModelError, "empty plan"),
        ("pump", ModelError, "names and values"),
        (3, ModelError, "names and values"),
        ([1, 2], ModelError, "expected 3 values"),
        ({"pump": "many"}, NumberError, "many"),
        ({"pump": float("nan")}, NumberError, "finite"),
    ],
)
def test_bad_plans(plan: object, kind: type[Exception], words: str) -> None:
    with pytest.raises(kind, match=words):
        pw.probe(BigModel.from_model(HARBOUR), plan)  # type: ignore[call-overload]


def test_highs_stopping_at_a_limit_is_told(monkeypatch: pytest.MonkeyPatch) -> None:
    def stopped(solver: Solver) -> str:
        solver._solver.setOptionValue("time_limit", 0.0)
        solver._solver.run()
        return "unclear"

    monkeypatch.setattr(Solver, "run", stopped)
    with pytest.raises(SolverError, match=r"possible \(Time limit reached\)"):
        pw.probe(pw.scenarios.harbour_year(400), {"pump[7]": 4})


def test_a_value_that_is_no_number_is_refused_with_its_variable() -> None:
    with pytest.raises(NumberError, match=r"'pump\[7\]': expected a number.*got 'four'"):
        pw.probe(DAY, {"pump[7]": "four"})
