"""Every proof of every finding is checked by the independent checker, on the zoo and on random awkward models."""

from __future__ import annotations

from collections import Counter
from dataclasses import replace
from random import Random

import pytest
from checker import holds, implies, product
from small import plain, random_degenerate, random_model
from zoo import ZOO

from polywalk.region import region
from polywalk.reviewing import review
from polywalk.scenarios import VARIANTS, harbour_row

SPARE = ("redundant", "redundant-touching", "duplicate", "parallel", "jointly-redundant", "loose-constant", "true-row")


def random_models(count):
    draw = Random(11)
    for k in range(count):
        yield random_degenerate(draw) if k % 5 == 0 else random_model(draw)


MODELS = [model for model, _ in ZOO.values()] + [harbour_row(name) for name in VARIANTS] + list(random_models(160))


@pytest.fixture(scope="module")
def reviews():
    return [review(model) for model in MODELS]


def same(left, right):
    """Whether two regions are the same set."""
    directions = [[ray.direction for ray in one.rays] for one in (left, right)]
    return left.base == right.base and directions[0] == directions[1] and left.lines == right.lines


def proved(told, finding):
    """The proofs of a finding that the checker accepts, as (coefficients, right-hand side)."""
    rows, names = plain(told.model), [row.name for row in told.model.constraints]
    for proof in finding.proofs:
        shares = dict(proof.multipliers)
        assert set(shares) <= set(names)
        assert implies(rows, [shares.get(name, 0) for name in names], proof.coefficients, proof.rhs), finding
    return [(proof.coefficients, proof.rhs) for proof in finding.proofs]


def test_every_proof_adds_up_and_every_point_is_a_plan(reviews):
    met = Counter()
    for told in reviews:
        for finding in told.findings:
            proved(told, finding)
            met[finding.code] += len(finding.proofs)
            if told.outcome != "infeasible" and finding.code != "loose-switch":
                assert all(holds(plain(told.model), point) for point in finding.points)
    for code in ("no-plan", "conflict", "implied-equality", "fixed-variable", "redundant", "redundant-touching"):
        assert met[code] >= 20, code
    assert met["tied-optimum"] >= 20
    assert met["duplicate"] >= 5


def upper(row):
    """A row as coefficients and the most they may come to."""
    sign = -1 if row.sense == ">=" else 1
    return tuple(sign * value for value in row.coefficients), sign * row.rhs


def test_what_is_claimed_is_what_is_proved(reviews):
    for told in reviews:
        for finding in told.of("redundant", "redundant-touching", "duplicate", "parallel", "loose-constant"):
            row = told.model.constraint(finding.constraints[0])
            assert row.name not in finding.multipliers
            coefficients, rhs = upper(row)
            claims = proved(told, finding)
            assert claims[0][0] in (coefficients, tuple(-value for value in coefficients))
            assert row.sense == "==" or claims[0][1] <= rhs
            assert (len(claims) == 2) is (row.sense == "==")
        for finding in told.of("implied-equality"):
            coefficients, rhs = upper(told.model.constraint(finding.constraints[0]))
            assert proved(told, finding) == [(tuple(-value for value in coefficients), -rhs)]
        for finding in told.of("fixed-variable"):
            value, j = finding.amount("value"), told.model.index(finding.variables[0])
            claims = {(coefficients[j], rhs) for coefficients, rhs in proved(told, finding)}
            assert claims == {(1, value), (-1, -value)}
        for finding in told.of("tied-optimum", "near-tie"):
            goal, best = told.model.objective, finding.amount("optimal value")
            sign = 1 if goal.goal == "max" else -1
            wanted = (tuple(sign * value for value in goal.coefficients), sign * (best - goal.constant))
            assert proved(told, finding) == [wanted]


def test_rays_keep_every_row_and_improve(reviews):
    met = 0
    for told in reviews:
        level = [(row, sense, 0) for row, sense, _ in plain(told.model)]
        for finding in told.of("unbounded-objective", "open-region", "line", "tied-optimum"):
            assert all(holds(level, ray) for ray in finding.rays)
        for finding in told.of("unbounded-objective"):
            met += 1
            change = product(told.model.objective.coefficients, finding.rays[0])
            assert change > 0 if told.model.objective.goal == "max" else change < 0
            still = [row for row in told.model.constraints if not row.is_constant]
            still = [row.name for row in still if product(row.coefficients, finding.rays[0]) == 0]
            assert list(finding.constraints) == still
    assert met >= 20


def test_the_bounds_said_to_stop_an_objective_do_and_no_other(reviews):
    for told in reviews:
        for finding in told.of("unbounded-objective"):
            said = {name for name, _ in finding.amounts} - {"change"}
            for name, step in zip(told.model.variables, finding.rays[0], strict=True):
                if step:
                    side, sense = ("upper", "<=") if step > 0 else ("lower", ">=")
                    start = finding.points[0][told.model.index(name)]
                    bounded = region(told.model.with_constraint("stop", {name: 1}, sense, start)).outcome == "optimal"
                    assert (f"{side} bound on {name}" in said) is bounded


def test_all_rows_told_spare_can_go_together_and_none_of_the_others(reviews):
    met = 0
    for told in reviews:
        if told.outcome == "infeasible":
            continue
        whole = region(told.model)
        spare = [finding.constraints[0] for finding in told.of(*SPARE)]
        assert len(spare) == len(set(spare))
        less = told.model.without(*spare)
        assert same(region(less), whole)
        met += len(spare)
        for row in less.constraints:
            assert not same(region(less.without(row.name)), whole), (row.name, told)
    assert met >= 150


def test_ties_and_degenerate_vertices_are_those_of_the_region(reviews):
    for told in reviews:
        whole = region(told.model)
        bent = {vertex.point for vertex in whole.vertices if vertex.degenerate}
        assert {finding.points[0] for finding in told.of("degenerate-vertex")} == bent
        face = whole.optimal
        tied = face is not None and (len(face.vertices) > 1 or bool(face.rays or face.lines))
        assert bool(told.of("tied-optimum")) is (tied and any(told.model.objective.coefficients))


def test_a_review_does_not_depend_on_the_order_of_the_rows():
    """Codes about the region stay; which of two equal rows is kept may change."""
    for model in MODELS[:40]:
        turned = replace(model, constraints=tuple(reversed(model.constraints)))
        one, other = ({f.code for f in review(each).findings} for each in (model, turned))
        stable = {"no-plan", "conflict", "unbounded-objective", "line", "single-point", "implied-equality"}
        stable |= {"fixed-variable", "tied-optimum", "open-region", "flat-region", "split-equality", "near-tie"}
        assert one & stable == other & stable
