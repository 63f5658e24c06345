"""Empty models: all conflicts against brute force and published lists, repairs against the region itself."""

from __future__ import annotations

import json
from fractions import Fraction
from itertools import combinations
from pathlib import Path
from random import Random

import pytest
from checker import holds, implies, proves_empty
from small import plain, random_model, typed
from zoo import boxed, build

from polywalk.model import Constraint, Model
from polywalk.region import region
from polywalk.reviewing import Limits, review
from polywalk.scenarios import harbour_row

DATA = Path(__file__).parents[2].parent / "shared" / "data"
no_data = pytest.mark.skipif(not DATA.exists(), reason="shared/data is not here")


def is_empty(model, names):
    """By enumeration, with these constraints alone."""
    return region(model.without(*(row.name for row in model.constraints if row.name not in names))).status == "empty"


def brute(model):
    """All irreducible infeasible subsets by trying every subset, smallest first."""
    names, found = [row.name for row in model.constraints], []
    for size in range(1, len(names) + 1):
        for chosen in map(set, combinations(names, size)):
            if not any(other <= chosen for other in found) and is_empty(model, chosen):
                found.append(chosen)
    return found


def empty_models(count, largest=8):
    draw = Random(4)
    while count:
        model = random_model(draw)
        if len(model.constraints) <= largest and region(model).status == "empty":
            count -= 1
            yield model


def weights(model, multipliers):
    return [multipliers.get(row.name, Fraction(0)) for row in model.constraints]


def as_sets(findings):
    return sorted(sorted(finding.constraints) for finding in findings)


def test_all_conflicts_are_those_of_brute_force():
    several = 0
    for model in empty_models(60):
        told = review(model).of("conflict")
        assert as_sets(told) == sorted(map(sorted, brute(model)))
        assert all(proves_empty(plain(model), weights(model, finding.multipliers)) for finding in told)
        several += len(told) > 1
    assert several >= 10


def test_one_conflict_of_a_larger_model_is_irreducible():
    for model in empty_models(40):
        told = review(model, limits=Limits(conflicts=0))
        (one,) = told.of("conflict")
        assert set(one.constraints) in brute(model)
        assert "others, if any, were not listed" in told.of("no-plan")[0].explanation


@pytest.mark.parametrize("conflicts", [0, 20])
def test_single_repairs_are_the_least_and_none_is_forgotten(conflicts):
    able_ones = none = 0
    for model in empty_models(60):
        told = review(model, limits=Limits(conflicts=conflicts))
        able = {row.name for row in model.constraints if region(model.without(row.name)).status != "empty"}
        assert {finding.constraints[0] for finding in told.of("single-repair")} == able
        assert bool(told.of("no-single-repair")) is not bool(able)
        able_ones, none = able_ones + len(able), none + (not able)
        for finding in told.of("single-repair"):
            name, rhs = finding.constraints[0], finding.amount("right-hand side")
            repaired, old = model.with_rhs(name, rhs), model.constraint(name).rhs
            assert holds(plain(repaired), finding.points[0])
            assert region(model.with_rhs(name, rhs + (old - rhs) / 1000)).status == "empty"
            (proof,) = finding.proofs
            assert name not in dict(proof.multipliers)
            assert implies(plain(model), weights(model, dict(proof.multipliers)), proof.coefficients, proof.rhs)
            assert abs(proof.rhs) == abs(rhs)
        for finding in told.of("no-single-repair"):
            supports = [set(dict(proof.multipliers)) for proof in finding.proofs]
            assert not set.intersection(*supports)
            assert all(proves_empty(plain(model), weights(model, dict(proof.multipliers))) for proof in finding.proofs)
    assert able_ones >= 30
    assert none >= 5


def test_the_least_total_is_reached_and_proved():
    """Any relaxation t has sum |y_i| t_i >= minus the contradiction: a bound on the total where |y_i| <= weight."""
    for model in empty_models(60):
        (finding,) = review(model).of("least-repair")
        named = {name.removeprefix("relax "): value for name, value in finding.amounts if name.startswith("relax ")}
        cost = {row.name: Fraction(1) / (max(map(abs, row.coefficients)) or 1) for row in model.constraints}
        total = finding.amount("least total")
        assert sum(cost[name] * value for name, value in named.items()) == total > 0
        for row in model.constraints:
            slack = row.slack(finding.points[0])
            assert (abs(slack) if row.sense == "==" else max(-slack, 0)) <= named.get(row.name, 0)
        shares = finding.multipliers
        assert all(abs(value) <= cost[name] for name, value in shares.items())
        assert proves_empty(plain(model), weights(model, shares))
        assert -finding.proofs[0].rhs == total


def test_the_callers_weights_decide_what_gives_way():
    model = harbour_row("infeasible")
    (one,) = review(model, weights={"town contract": 10}).of("least-repair")
    (other,) = review(model, weights={"harbour main": 10}).of("least-repair")
    assert (one.constraints, other.constraints) == (("harbour main",), ("town contract",))
    assert "as given for town contract" in one.explanation


def test_harbour_row_with_the_winter_contract():
    told = review(harbour_row("infeasible"))
    assert as_sets(told.of("conflict")) == [["harbour main", "town contract"]]
    assert "0 ≤ -2" in told.of("no-plan")[0].explanation
    assert {f.constraints[0]: f.amount("right-hand side") for f in told.of("single-repair")} == {
        "harbour main": 14,
        "town contract": 12,
    }


def test_a_contradiction_within_a_solvers_tolerance_is_told():
    """CHECKS F: x + y >= 2 + 1e-7 in the unit square is empty, though HiGHS (through scipy, here) calls it optimal."""
    from scipy.optimize import linprog

    model = build("x y", [*boxed("x y"), ("sum", [1, 1], ">=", "2.0000001")], ("max", [1, 1]))
    assert linprog([-1, -1], A_ub=[[-1, -1]], b_ub=[-2.0000001], bounds=[(0, 1), (0, 1)], method="highs").status == 0
    assert "one of those may report a plan" in review(model).of("no-plan")[0].explanation
    larger = model.with_rhs("sum", "2.001")
    assert "one of those" not in review(larger).of("no-plan")[0].explanation


def test_rows_without_variables_conflict_alone():
    model = build("x", [("never", [0], "==", 3), ("x lower", [1], ">=", 0)])
    told = review(model)
    assert as_sets(told.of("conflict")) == [["never"]]
    assert told.of("single-repair")[0].amount("right-hand side") == 0


# published models


def halved(row):
    """An equality as its two halves, named as the published lists name them."""
    if row.sense != "==":
        return [row]
    return [Constraint(f"{row.name}{sense}", row.coefficients, sense, row.rhs) for sense in ("<=", ">=")]


def published(name):
    """One of the small MPS files (no RANGES, bounds UP only), named as in results.json."""
    senses, rows, columns, rhs, upper, part = {}, {}, {}, {}, {}, ""
    for line in (DATA / "mps" / f"{name}.mps").read_text().splitlines():
        words = line.split()
        if not words or line.startswith("*"):
            continue
        if line[0] not in " \t":
            part = words[0]
        elif part == "ROWS":
            senses[words[1]] = {"L": "<=", "G": ">=", "E": "==", "N": ""}[words[0]]
        elif part in {"COLUMNS", "RHS"}:
            for row, value in zip(words[1::2], words[2::2], strict=True):
                (columns.setdefault(words[0], {}) if part == "COLUMNS" else rhs)[row] = Fraction(value)
        elif part == "BOUNDS":
            upper[words[2]] = Fraction(words[3])
    for row, sense in senses.items():
        if sense:
            tag = row if sense == "==" else f"{row}{sense}"
            coefficients = tuple(column.get(row, Fraction(0)) for column in columns.values())
            rows[row] = Constraint(tag, coefficients, sense, rhs.get(row, Fraction(0)))
    units = {name: tuple(Fraction(int(name == other)) for other in columns) for name in columns}
    made = [half for row in rows.values() for half in halved(row)]
    made += [Constraint(f"{name}.lo", unit, ">=", Fraction(0)) for name, unit in units.items()]
    made += [Constraint(f"{name}.up", units[name], "<=", value) for name, value in upper.items()]
    return Model(tuple(columns), tuple(made))


@pytest.mark.needs_shared_data
@no_data
@pytest.mark.parametrize(("name", "count"), [("itest2", 6), ("itest6", 23), ("galenet", 6)])
def test_all_conflicts_of_published_models(name, count):
    """CHECKS F: results.json, recomputed there by vertices of the alternative polyhedron (Gleeson & Ryan 1990)."""
    expected = json.loads((DATA / "mps" / "results.json").read_text())[name]["all_iis"]
    model = published(name)
    told = review(model, limits=Limits(conflicts=40)).of("conflict")
    assert as_sets(told) == sorted(map(sorted, expected))
    assert len(told) == count
    assert all(proves_empty(plain(model), weights(model, finding.multipliers)) for finding in told)


@pytest.mark.needs_shared_data
@no_data
@pytest.mark.parametrize("name", ["itest2", "itest6"])
def test_least_totals_of_published_models(name):
    """results.json, elastic_exact: every constraint relaxed at cost 1."""
    model = published(name)
    given = {row.name: 1 if row.name[0] in "EU" else 10**9 for row in model.constraints}
    (finding,) = review(model, weights=given).of("least-repair")
    assert finding.amount("least total") == Fraction(
        json.loads((DATA / "mps" / "results.json").read_text())[name]["elastic_exact"]
    )


@pytest.mark.needs_shared_data
@no_data
def test_conflicts_of_textbook_models():
    """CHECKS F: textbook.json, one irreducible subset for each infeasible model."""
    entries = [entry for entry in json.loads((DATA / "textbook.json").read_text()) if "iis" in entry["exact"]]
    assert len(entries) >= 6
    for entry in entries:
        rows = [
            (a, "==" if op == "=" else op, b) for a, op, b in zip(entry["A"], entry["ops"], entry["b"], strict=True)
        ]
        lower = [None if value == "-inf" else value for value in entry["lo"]]
        upper = [None if value == "inf" else value for value in entry["hi"]]
        model = typed(entry["sense"], entry["c"], rows, lower, upper)
        told = {tuple(sorted(finding.constraints)) for finding in review(model).of("conflict")}
        for subset in entry["exact"]["iis"]:
            assert tuple(sorted(map(_our_name, subset))) in told, entry["name"]


def _our_name(name):
    """Theirs "r2>=", "x1lo", "x1hi"; ours "r2", "x1 lower", "x1 upper"."""
    return name.rstrip("<>=").replace("lo", " lower").replace("hi", " upper").replace("up", " upper")
