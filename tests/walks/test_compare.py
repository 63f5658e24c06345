"""Comparisons: every number counted again from the walks themselves, yardsticks against brute force, true advice."""

from __future__ import annotations

import re
import sys
from collections import Counter
from dataclasses import replace
from fractions import Fraction
from itertools import groupby
from math import isclose, sqrt
from random import Random
from statistics import mean, median

import pytest
from oracle import truth, value
from small import random_degenerate, random_model, typed

import polywalk as pw
from polywalk.errors import UnknownName, WalkError
from polywalk.region import region
from polywalk.scenarios import beale, circling, cube, harbour_row, klee_minty
from polywalk.walks import ENTERING, LEAVING, Comparison
from polywalk.walks.advice import advice
from polywalk.walks.yardsticks import yardsticks

ALL = [rule.name for rule in ENTERING]


def last_allowed(dictionary, columns):
    return columns[-1]


PAIRS = [
    ("dantzig", "first-row"),
    ("bland", "random"),
    ("steepest-edge", "lexicographic"),
    ("random-edge", "largest-pivot"),
    ("shadow-vertex", "lowest-index"),
    ("greatest-improvement", "first-row"),
    (last_allowed, "first-row"),
    (last_allowed, "lowest-index"),
]


def models(seed, count):
    """Random models with a vertex, every other one degenerate at the origin."""
    draw, found = Random(seed), []
    while len(found) < count:
        model = random_degenerate(draw) if len(found) % 2 else random_model(draw)
        if region(model).vertices:
            found.append(model)
    return found


def counted(walked):
    """Pivots, moves, stays, longest stall and length, from the points alone."""
    pivots = [pivot for pivot in walked.pivots if pivot.leaving is not None]
    same = [before == after for before, after in zip(walked.points, walked.points[1:], strict=False)][: len(pivots)]
    still = [pivot.phase == 2 and stays for pivot, stays in zip(pivots, same, strict=True)]
    still = [stays or (pivot.phase == 1 and pivot.step == 0) for pivot, stays in zip(pivots, still, strict=True)]
    stall = max((len(list(run)) for stays, run in groupby(still) if stays), default=0)
    squares = [
        sum((a - b) ** 2 for a, b in zip(one, other, strict=True))
        for one, other in zip(walked.points, walked.points[1:], strict=False)
    ]
    return len(pivots), same.count(False), sum(still), stall, sum(sqrt(square) for square in squares)


@pytest.mark.parametrize("starts", [None, "vertices", "bases"])
def test_every_row_is_what_the_walk_itself_comes_to(starts):
    """Shared dictionaries and remembered choices change nothing, not even under rules that look at the rows' order."""
    met = Counter()
    for model in models(5, 16):
        found = pw.compare(model, PAIRS, starts, seed=3)
        assert len(found.tallies) == len(PAIRS) * len(found.starts)
        for tally in found.tallies:
            entering, leaving = tally.pair.given
            walked = pw.walk(model, entering, leaving, start=tally.start.given, seed=3)
            *counts, length = counted(walked)
            assert [tally.pivots, tally.moves, tally.stays, tally.stall] == counts
            assert isclose(tally.length, length, abs_tol=1e-12)
            assert (tally.end, tally.value) == (walked.end, walked.value)
            assert (tally.pair.rule, tally.pair.leaving) == (walked.rule, walked.leaving)
            met[walked.end] += 1
            met["stall"] += tally.stall > 1
    least = {"optimal": 60, "unbounded": 12, "stall": 5}
    assert not {name for name, count in least.items() if met[name] < count}, met


def fewest(model, improving):
    """The fewest moves from every vertex, by brute force: edges from ranks, then rounds of relaxation."""
    known, goal = truth(model), model.objective
    sense = 1 if goal.goal == "max" else -1
    height = {x: sense * value(goal.coefficients, x) for x in known.vertices}
    rises = {way for way in known.rays if sense * value(goal.coefficients, way) > 0}
    if known.outcome == "optimal":
        done = {x: 0 for x in height if height[x] == max(height.values())}
    else:
        done = {x: 0 for x in height if any(frozenset({x, way}) in known.edges for way in rises)}
    for count in range(1, len(height)):
        for x, low in height.items():
            near = {y: high for y, high in height.items() if frozenset({x, y}) in known.edges and y != x}
            able = [y for y, high in near.items() if not improving or high > low]
            if x not in done and any(done.get(y) == count - 1 for y in able):
                done[x] = count
    return done


def test_yardsticks_are_those_of_brute_force_and_no_rule_beats_them():
    met = Counter()
    for model in models(8, 40):
        seen, measured = region(model), yardsticks(region(model))
        for improving, numbers in ((False, measured.shortest), (True, measured.improving)):
            known = fewest(model, improving)
            assert numbers == tuple(known[vertex.point] for vertex in seen.vertices)
        for tally in pw.compare(model, ALL, "vertices").tallies:
            assert tally.finished is False or tally.pivots >= tally.moves >= tally.improving >= tally.shortest
            met["reached"] += tally.finished and 0 < tally.pivots == tally.improving
            met["detour"] += tally.improving > tally.shortest
            met[tally.end] += 1
    least = {"reached": 50, "unbounded": 50, "optimal": 200, "detour": 3}
    assert not {name for name, count in least.items() if met[name] < count}, met


def test_the_shortest_path_may_have_to_fall_first():
    """A pentagon by hand: from (2, 1) down to (0, 0) and up the left side to (0, 4), or up the right side in three."""
    sides = [([1, -2], "<=", 0), ([1, -1], "<=", 1), ([1, 0], "<=", 3), ([1, 3], "<=", 12)]
    pentagon = region(typed("max", [0, 1], sides, lower=[0, None], upper=[None, None], names=["x", "y"]))
    measured, at = yardsticks(pentagon), {vertex.point: k for k, vertex in enumerate(pentagon.vertices)}
    assert {point: measured.shortest[k] for point, k in at.items()} == {
        (0, 0): 1, (2, 1): 2, (3, 2): 2, (3, 3): 1, (0, 4): 0
    }  # fmt: skip
    assert measured.improving[at[2, 1]] == 3


def test_equal_objectives_are_no_improving_edge_and_every_tied_vertex_is_an_end():
    flat = typed("max", [0, 1], [], lower=0, upper=[1, 1], names=["x", "y"])
    measured = yardsticks(region(flat))
    heights = [vertex.objective for vertex in region(flat).vertices]
    assert measured.improving == measured.shortest == tuple(int(height == 0) for height in heights)
    assert set(yardsticks(region(replace(cube(3), objective=None))).shortest) == {0}


@pytest.mark.parametrize("n", [2, 3, 4, 5])
def test_klee_minty_rows_are_the_published_walk_lengths(n):
    """Klee & Minty 1972; Avis & Chvatal 1978 (Bland: 3, 5, 9, 15, ...); both yardsticks by hand: one edge."""
    found = {tally.pair.rule: tally for tally in pw.compare(klee_minty(n)).tallies}
    bland = {2: 3, 3: 5, 4: 9, 5: 15}
    assert found["dantzig"].pivots == 2**n - 1
    assert found["bland"].pivots == bland[n]
    assert found["greatest-improvement"].pivots == 1
    assert {(tally.shortest, tally.improving) for tally in found.values()} == {(1, 1)}


def test_a_cycle_is_told_where_it_starts():
    """Six bases at the origin (computed, no source: the model was found by search); Beale 1955 at rest."""
    found = pw.compare(circling(), ["dantzig", "bland"], "bases")
    dantzig, bland = found.standings
    again = [start.name for start in found.starts if pw.walk(circling(), start=start.given).end == "cycling"]
    assert [start.name for start in dantzig.cycles] == again
    assert len(again) >= 6
    assert bland.cycles == bland.unfinished == ()
    assert pw.compare(beale()).standings[0].cycles[0].name == "rest (V0)"


def test_distribution_is_that_of_the_rows():
    found = pw.compare(harbour_row(), starts="bases")
    frame = found.frame()
    spread = found.standings_table().frame().set_index("rule")
    assert len(frame) == len(ALL) * len(found.starts)
    for rule, rows in frame.groupby("rule"):
        numbers = list(rows["pivots"])
        row = spread.loc[rule]
        assert (row["fewest pivots"], row["most"]) == (min(numbers), max(numbers))
        assert (row["median"], row["mean"]) == (median(map(Fraction, numbers)), mean(map(Fraction, numbers)))
        assert rows.set_index("start")["pivots"][row["worst start"]] == max(numbers)
        assert row["longest stall"] == max(rows["longest stall"])


def judged(found):
    """By the rows alone: what each rule comes to, less is better."""
    rows = {}
    for tally in found.tallies:
        rows.setdefault(tally.pair, []).append(tally)
    ends = {pair: [tally.pivots for tally in tallies if tally.finished] for pair, tallies in rows.items()}
    return {
        pair: (len(rows[pair]) - len(done), max(done, default=0), Fraction(sum(done), len(done) or 1))
        for pair, done in ends.items()
    }


def test_the_recommendation_follows_from_the_table():
    met = Counter()
    for model in [*models(21, 30), circling(), beale(), klee_minty(4), harbour_row()]:
        for starts in (None, "vertices"):
            found = pw.compare(model, starts=starts)
            judgement = judged(found)
            top = min(judgement.values())
            chosen = [pair.rule for pair, rank in judgement.items() if rank == top]
            text = found.recommendation
            assert text.startswith("recommendation: ")
            opening = text.removeprefix("recommendation: ").split(" need")[0].split(" end")[0]
            assert re.split(", | and ", opening.removesuffix(" each")) == chosen
            assert top[0] == 0  # Bland's rule always ends
            told = int(re.search(r"needs? (?:at most )?(\d+) pivot", text).group(1))
            assert told == top[1]
            cycling = {tally.pair.rule for tally in found.tallies if tally.end == "cycling"}
            assert {rule for rule in ALL if f"{rule} cycles" in text} == cycling
            unbeatable = all(t.pivots == t.improving for t in found.tallies if t.pair.rule == chosen[0])
            assert ("no rule can need fewer" in text) == unbeatable
            ahead = [rank[1] for pair, rank in judgement.items() if pair.rule not in chosen and rank[0] == 0]
            strictly = bool(ahead) and min(ahead) > top[1]
            assert ("fewer than any other" in text or "lowest worst case of all" in text) == strictly
            met["tie"] += 1 < len(chosen) < len(ALL)
            met["all alike"] += len(chosen) == len(ALL)
            met["alone"] += len(chosen) == 1
            met["by mean"] += "lowest mean" in text
    assert not {name for name in ("tie", "all alike", "alone", "by mean") if not met[name]}, met


def test_advice_where_nothing_ends():
    found = pw.compare(circling(), ["dantzig", ("dantzig", "lowest-index")])
    assert found.recommendation.startswith("recommendation: none of these: ")
    two = pw.compare(circling(), ["dantzig"], "vertices")
    assert "none of these ends from every start; dantzig fails from the fewest, 2 of 5" in two.recommendation
    assert advice([]).startswith("recommendation: none")
    alone = pw.compare(circling(), "bland")
    assert "bland needs 7 pivots from rest (V0); nothing else was compared" in alone.recommendation


def test_one_walk_stopped_at_the_limit_is_no_answer():
    found = pw.compare(klee_minty(4), ["dantzig", "bland"], limit=10)
    assert [tally.end for tally in found.tallies] == ["stopped", "optimal"]
    assert "dantzig was stopped at the limit" in found.recommendation
    assert "bland needs 9 pivots" in found.recommendation


def interrupting(after):
    """A rule of one's own that presses Ctrl-C at its given call."""
    calls = []

    def pressed(dictionary, columns):
        calls.append(1)
        if len(calls) == after:
            raise KeyboardInterrupt
        return columns[0]

    return pressed


def test_an_interrupt_keeps_the_finished_rows():
    found = pw.compare(klee_minty(3), ["dantzig", interrupting(7)], "vertices")
    whole = pw.compare(klee_minty(3), ["dantzig", "bland"], "vertices")
    count = len(found.tallies)
    assert not found.complete
    assert whole.complete
    assert 2 < count < len(whole.tallies)
    rows = [(tally.start, tally.pivots, tally.end) for tally in found.tallies]
    assert rows == [(tally.start, tally.pivots, tally.end) for tally in whole.tallies][:count]
    assert f"interrupted: {count} of 16 walks are finished" in str(found)
    assert {len(standing.tallies) for standing in found.standings} == {count // 2}


def test_an_interrupt_before_anything_is_finished_is_an_interrupt():
    with pytest.raises(KeyboardInterrupt):
        pw.compare(klee_minty(3), [interrupting(1)])


def test_an_interrupt_within_the_first_start_has_rows_and_no_advice():
    found = pw.compare(klee_minty(3), ["dantzig", interrupting(1)])
    assert len(found.tallies) == 1
    assert found.recommendation == "recommendation: none, since no start was walked from by every rule."
    assert found.standings == ()
    assert "interrupted: 1 of 2" in str(found)


def test_default_rules_are_all_there_are_at_the_time(monkeypatch):
    assert [pair.rule for pair in pw.compare(cube(2)).pairs] == ALL
    monkeypatch.setattr(sys.modules["polywalk.walks.compare"], "ENTERING", ENTERING[:1])
    assert [pair.rule for pair in pw.compare(cube(2)).pairs] == ALL[:1]


@pytest.mark.parametrize("leaving", [rule.name for rule in LEAVING])
def test_any_leaving_rule_goes_with_all(leaving):
    found = pw.compare(circling(), leaving=leaving, limit=200)
    assert {tally.pair.leaving for tally in found.tallies} == {leaving}
    assert all(tally.value == 2 for tally in found.tallies if tally.end == "optimal")


def test_starts_have_names_that_others_use():
    found = pw.compare(circling(), "bland", "bases")
    for start in found.starts:
        corner, basis = start.name.split()
        held = pw.bases(circling(), int(corner[1:])).members[int(basis[1:])].held
        assert held == start.given
    listed = pw.compare(circling(), "bland", [None, 2, (2, 1, 0), ("x lower", "y lower", "z lower")])
    names = [start.name for start in listed.starts]
    assert names == ["rest (V0)", "V2", names[2], "V0: x lower, y lower, z lower"]
    assert listed.tallies[2].pivots == 0


def test_walks_are_those_of_the_rows():
    found = pw.compare(harbour_row(), ["dantzig", ("bland", "lexicographic")], "vertices", order="slacks first")
    for start in found.starts:
        pivots = [len(walked.pivots) for walked in found.walks(start.name)]
        assert pivots == [tally.pivots for tally in found.tallies if tally.start == start]
    with pytest.raises(UnknownName, match="V99"):
        found.walks("V99")


NEEDY = typed("max", [3, 2], [([1, 1], ">=", 2), ([2, 1], "<=", 8)], lower=0, upper=[None, 3], names=["x", "y"])


def test_a_start_outside_the_region_has_no_yardstick():
    found = pw.compare(NEEDY)
    assert found.starts[0].name == "rest (outside)"
    assert {(tally.shortest, tally.improving) for tally in found.tallies} == {(None, None)}
    assert "no rule can" not in str(found)


def test_answers_that_are_no_optimum():
    empty = typed("max", [1], [([1], "<=", -1)], lower=0)
    assert {tally.end for tally in pw.compare(empty).tallies} == {"infeasible"}
    assert "recommendation: " in str(pw.compare(empty))
    clash = typed("max", [1], [([1], "==", 1), ([1], "==", 2)], lower=0)
    assert {(t.end, t.pivots) for t in pw.compare(clash).tallies} == {("infeasible", 0)}
    endless = typed("max", [1, 1], [([1, -1], "<=", 1)], lower=0)
    found = pw.compare(endless, "bland", "vertices")
    assert {tally.end for tally in found.tallies} == {"unbounded"}
    assert [tally.pivots for tally in found.tallies] == [1, 0]  # the lowest index, x, is held by the row; y is not
    assert [tally.improving for tally in found.tallies] == [0, 0]


@pytest.mark.parametrize(
    ("options", "words"),
    [
        ({"rules": ["dantzig", "blend"]}, "blend"),
        ({"rules": [("bland", "lexicografic")]}, "lexicografic"),
        ({"rules": []}, "list of rules is empty"),
        ({"leaving": "highest"}, "highest"),
        ({"starts": "corners"}, "corners"),
        ({"starts": []}, "list of starts is empty"),
        ({"starts": [0, (1, 1, 1)]}, "no vertex|not feasible"),
        ({"starts": [("x lower", "y lower", "row 9")]}, "row 9"),
        ({"starts": [99]}, "99"),
        ({"order": "backwards"}, "backwards"),
        ({"seed": 0.5}, "seed"),
        ({"limit": -1}, "limit"),
        ({"rules": [lambda dictionary, columns: 99]}, "99"),
    ],
)
def test_bad_input_is_named(options, words):
    with pytest.raises(WalkError, match=words):
        pw.compare(circling(), **options)


def test_regions_without_vertices_are_refused():
    with pytest.raises(WalkError, match="region is empty"):
        pw.compare(typed("max", [1], [([1], "<=", -1)], lower=0), starts="vertices")
    with pytest.raises(WalkError, match="line"):
        pw.compare(typed("max", [1, 1], [([1, 1], "<=", 1)]))


def test_it_prints_in_three_places():
    model = pw.from_algebra(maximize="x", constraints={"<b>": "x + y <= 3"}, bounds={"x": (0, 2), "y": (0, 2)})
    single, many = pw.compare(model), pw.compare(model, starts="vertices")
    for found in (single, many):
        assert isinstance(found, Comparison)
        assert str(found) == repr(found)
        assert "<b>" not in found._repr_html_().replace("<b></b>", "")
        assert str(found).splitlines()[-1] == found.recommendation
        assert len(found.frame()) == len(found.tallies)
    assert "worst start" in str(many)
    assert "longest stall" in str(single)


def test_an_integer_model_says_it_is_walked_as_its_relaxation():
    whole = pw.from_algebra(maximize="x", constraints={"cap": "2*x <= 3"}, bounds={"x": (0, None)}, integers=["x"])
    assert "walked as the relaxation: x marked integer" in str(pw.compare(whole))
