"""The chart of the objective by pivot: drawn heights against the walks, both painters, what a stranger must find."""

import json
from itertools import pairwise

import plotly.graph_objects as go
import pytest
from small import typed

import polywalk as pw
from polywalk.drawing import figure, scene
from polywalk.drawing.chart import APART
from polywalk.drawing.placing import overlap
from polywalk.drawing.theme import THEMES
from polywalk.errors import DrawingError
from polywalk.scenarios import circling, harbour_row, klee_minty
from polywalk.walks import ENTERING

NEEDY = typed("max", [3, 2], [([1, 1], ">=", 2), ([2, 1], "<=", 8), ([1, -1], "<=", 1)], lower=0, upper=[None, 3])
ENDLESS = typed("min", [-3, -2], [([1, -1], "<=", 1)], lower=0)
CASES = {
    "klee": klee_minty(4), "harbour": harbour_row(), "circling": circling(), "needy": NEEDY, "endless": ENDLESS,
    "nothing": typed("max", [1], [([1], "<=", -1)], lower=0), "still": typed("max", [-1], [], lower=0),
    "aimless": typed(None, [0, 0], [([1, 1], "<=", 2)], lower=0),
}  # fmt: skip


def walks_of(model):
    return [pw.walk(model, rule.name) for rule in ENTERING]


def spots(walked):
    """Where each pivot belongs: the objective at the walk's own points, by the model's coefficients."""
    goal = walked.model.objective
    last = len(walked.points) - (walked.end == "unbounded")
    heights = [0.0 if goal is None else float(goal.at(point)) for point in walked.points[:last]]
    return list(enumerate(heights))


@pytest.mark.parametrize("name", CASES)
def test_drawn_heights_are_the_objectives_of_the_walks(name):
    """Each line passes its walk's spots, to within the few pixels that keep walks apart."""
    walks = walks_of(CASES[name])
    drawn = scene(walks)
    for index, walked in enumerate(walks):
        mine = [line for line in drawn.lines if line.index == index and line.role in {"walk", "phase 1"}]
        path = [point for line in mine for part in line.parts for point in part]
        path = [point for k, point in enumerate(path) if point not in path[:k]]
        known = spots(walked)
        if len(known) == 1:
            assert path == []
            continue
        assert len(path) == len(known)
        for point, spot in zip(path, known, strict=True):
            off = [unit * abs(a - b) for unit, a, b in zip(drawn.scale, point, spot, strict=True)]
            assert max(off) <= APART * (len(walks) - 1) / 2 + 1e-6


@pytest.mark.parametrize("name", CASES)
def test_phase_one_is_dotted_and_stays_are_flat_and_hollow(name):
    walks = walks_of(CASES[name])
    drawn = scene(walks)
    for index, walked in enumerate(walks):
        outside = sum(pivot.phase == 1 for pivot in walked.pivots)  # of a primal walk
        dotted = [part for line in drawn.lines if (line.role, line.index) == ("phase 1", index) for part in line.parts]
        assert sum(len(part) - 1 for part in dotted) == outside
        hollow = [mark for mark in drawn.marks if (mark.role, mark.index) == ("stayed", index)]
        assert len(hollow) == walked.stays
        for mark in hollow:
            number = round(mark.point[0])
            assert walked.pivots[number - 1].kind == "degenerate"
            assert f"pivot {number}: {walked.pivots[number - 1].entering} enters" in mark.hover


def test_a_dual_walk_is_dotted_to_its_end():
    model = typed("min", [3, 2], [([1, 1], ">=", 3), ([1, -1], ">=", -1)], lower=0)
    drawn = scene([pw.dual_walk(model), pw.walk(model)])
    (dotted,) = [line for line in drawn.lines if (line.role, line.index) == ("phase 1", 0)]
    assert [len(part) for part in dotted.parts] == [len(pw.dual_walk(model).points)]
    assert "dual with largest-violation: 2 pivots, 2 of them outside the region, no stay, optimal" in {
        row.text for part in drawn.key for row in part.rows
    }


def test_stays_of_one_walk_are_exactly_flat():
    walked = pw.walk(circling(), "bland")
    (line,) = [line for line in scene(walked).lines if line.role == "walk"]
    heights = [point[1] for point in line.parts[0]]
    flat = [one == other for one, other in pairwise(heights)]
    assert flat == [pivot.kind == "degenerate" for pivot in walked.pivots]
    assert flat.count(True) == 6


def test_walks_that_share_a_spot_are_apart():
    walks = walks_of(klee_minty(3))
    drawn = scene(walks)
    starts = [mark.point for mark in drawn.marks if "start at" in mark.hover]
    assert len(starts) == len(set(starts)) == len(walks)
    pixels = [tuple(unit * value for unit, value in zip(drawn.scale, point, strict=True)) for point in starts]
    for one, other in pairwise(sorted(pixels)):
        assert abs(one[0] - other[0]) >= APART - 1e-6


@pytest.mark.parametrize("name", CASES)
def test_every_rule_is_named_at_its_end_and_labels_do_not_cover_one_another(name):
    walks = walks_of(CASES[name])
    drawn = scene(walks)
    names = [label for label in drawn.labels if label.role in {"end", "ends"}]
    told = [row.split(":")[0] for label in names for row in label.text.split("\n")]
    assert sorted(told) == sorted(walked.rule for walked in walks)
    boxes = []
    for label in names:
        x, y = (unit * (v - a.low) for unit, v, a in zip(drawn.scale, label.point, drawn.axes, strict=True))
        rows = label.text.split("\n")
        wide, high = 3.0 * max(map(len, rows)), 7.0 * len(rows)
        boxes.append((x - wide, y - high, x + wide, y + high))
    assert not [1 for k, one in enumerate(boxes) for other in boxes[:k] if overlap(one, other) > 0]


def test_a_walk_without_end_goes_on_in_an_arrow():
    for model, end in ((circling(), "cycling"), (ENDLESS, "unbounded")):
        drawn = scene(pw.walk(model))
        (arrow,) = [line for line in drawn.lines if line.role == "onward"]
        (start, tip), *_ = arrow.parts
        assert arrow.arrow == "end"
        assert tip[0] > start[0]
        assert (tip[1] == start[1]) == (end == "cycling")
        assert drawn.axes[1].low <= tip[1] <= drawn.axes[1].high
        assert end in drawn.labels[0].text
        assert not [line for line in drawn.lines if line.role == "level line"]
    assert tip[1] < start[1]  # a minimum falls without end


def test_the_level_of_the_optimum_and_the_key():
    drawn = scene(walks_of(harbour_row()))
    (level,) = [line for line in drawn.lines if line.role == "level line"]
    assert {point[1] for point in level.parts[0]} == {292.0}
    words = {row.text for part in drawn.key for row in part.rows}
    assert "bland: 6 pivots, 1 stay, optimal" in words
    assert "dantzig: 4 pivots, no stay, optimal" in words
    assert drawn.subtitle.startswith("maximize 23 pump + 18 chips + 32 tank\nfrom (0, 0, 0); flat pieces")


def test_what_tells_walks_apart_is_in_their_names():
    model = harbour_row()
    pairs = [pw.walk(model, "bland", leaving) for leaving in ("lowest-index", "lexicographic")]
    text = str([row.text for part in scene(pairs).key for row in part.rows])
    assert "bland with lowest-index:" in text
    assert "bland with lexicographic:" in text
    starts = [pw.walk(model, start=0), pw.walk(model, start=1)]
    point = ", ".join(str(value) for value in starts[1].start)
    assert f"dantzig from ({point}):" in str([row.text for part in scene(starts).key for row in part.rows])


@pytest.mark.parametrize("mode", THEMES)
@pytest.mark.parametrize("name", CASES)
def test_both_painters_take_it_in_every_mode(name, mode):
    walks = walks_of(CASES[name])
    shown = pw.draw(walks, mode=mode)
    assert isinstance(shown, go.Figure)
    json.dumps(figure(walks), allow_nan=False)
    assert shown.layout.xaxis.dtick == round(shown.layout.xaxis.dtick) >= 1
    listed = [trace.name for trace in shown.data if trace.showlegend and trace.name.split(":")[0] in ALL]
    assert len(listed) == len(walks)
    assert pw.picture(walks, mode=mode).data.startswith(b"<?xml")


ALL = {rule.name for rule in ENTERING}


def test_a_comparison_is_drawn_as_its_walks():
    found = pw.compare(klee_minty(3), ["dantzig", "bland"])
    assert scene(found) == scene(list(found.walks())) == scene(found.walks())
    one = pw.picture(found).data
    assert one == pw.picture(found).data


def test_a_long_walk_has_lines_and_no_marks():
    drawn = scene(pw.walk(klee_minty(8)))
    assert drawn.marks == ()
    assert drawn.axes[0].spacing == 50
    (line,) = [line for line in drawn.lines if line.role == "walk"]
    assert len(line.parts[0]) == 256


@pytest.mark.parametrize(
    ("source", "words"),
    [
        ([], "no walk"),
        (["dantzig"], "'dantzig'"),
        ([1], "got 1"),
    ],
)
def test_what_is_no_walk_is_refused(source, words):
    with pytest.raises(DrawingError, match=words):
        scene(source)


def test_walks_of_different_models_are_refused():
    with pytest.raises(DrawingError, match="different models"):
        scene([pw.walk(klee_minty(3)), pw.walk(klee_minty(4))])


def test_names_are_escaped():
    def odd(dictionary, columns):
        return columns[0]

    odd.__name__ = "<img src=x>"
    html = pw.draw(pw.walk(harbour_row(), odd)).to_json()
    assert "<img" not in html
    assert "&lt;img" in html.replace("\\u0026", "&") or "lt;img" in html
