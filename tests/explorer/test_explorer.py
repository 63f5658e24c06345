"""The explorer's widgets hold what the state says, and set it."""

from __future__ import annotations

import gzip

import pytest

import polywalk as pw
from polywalk.explorer.view import FigureView, library


def square() -> pw.Model:
    return pw.from_algebra(
        maximize="x + 2*y", constraints={"<both>": "x + y <= 2"}, bounds={"x": (0, 1), "y": (0, 1)}, name="a & b"
    )


def cube() -> pw.Model:
    return pw.from_algebra(maximize="x + 2*y + 3*z", bounds=dict.fromkeys("xyz", (0, 1)))


def test_every_vertex_is_a_row_and_a_point_of_one_trace() -> None:
    explorer = pw.explore(cube())
    assert len(explorer.vertices.rows.rows) == 8
    traces = [trace for trace in explorer.picture.figure["data"] if trace.get("name") == "vertices"]
    assert len(traces) == 1
    indices = [entry[0] if isinstance(entry, list | tuple) else entry for entry in traces[0]["customdata"]]
    assert sorted(indices) == list(range(8))
    region = pw.region(cube())
    drawn = zip(traces[0]["x"], traces[0]["y"], traces[0]["z"], strict=True)
    assert [tuple(map(float, region.vertices[index].point)) for index in indices] == list(drawn)


def test_a_pick_in_the_page_selects_row_card_and_picture() -> None:
    explorer = pw.explore(square(), vertex=0)
    before = explorer.picture.figure
    explorer.picture.receive({"kind": "pick", "vertex": 3})
    assert (explorer.state.vertex, explorer.vertices.rows.selected) == (3, 3)
    assert "Selected vertex: V3" in explorer.vertices.card.value
    assert explorer.picture.figure != before


def test_a_row_selects_the_vertex_and_a_pivot_row_the_step() -> None:
    explorer = pw.explore(square())
    explorer.vertices.rows.selected = 1
    assert explorer.state.vertex == 1
    explorer.walk.rows.selected = 2
    assert explorer.state.step == 2
    assert "Pivot 2" in explorer.walk.story.value


def test_the_card_tells_point_objective_active_bases_and_ways_out() -> None:
    explorer = pw.explore(square(), vertex=3)
    card = explorer.vertices.card.value
    assert "x = 1, y = 1" in card
    assert "objective 3, the optimum" in card
    assert "active: &lt;both&gt;, x upper, y upper" in card
    assert "degenerate: 3 constraints meet where 2 would do" in card
    assert "3 bases, 2 of them optimal" in card
    first = card[card.index("<td>V1</td>") :].split("</tr>")[0]
    cells = [part.split("</td>")[0].split(">")[-1] for part in first.split("<td")[1:]]
    assert cells == ["&lt;both&gt;, x upper", "1, 1", "-1"] or cells[1:] == ["&lt;both&gt;, x upper", "1, 1", "-1"]
    explorer.state.set_number("7/3", "right-hand side", "<both>")
    explorer.state.set_number("1/3", "right-hand side", "y upper")
    assert "y = 1/3 (≈ 0.333333)" in explorer.vertices.card.value


def test_names_are_escaped_everywhere() -> None:
    explorer = pw.explore(square(), vertex=3, step=1)
    shown = [explorer.vertices.card.value, explorer.walk.story.value, explorer.verdict.value]
    shown.append(explorer._repr_mimebundle_()["text/html"])
    assert "<both>" not in "".join(shown)
    assert "a &amp; b" in explorer.verdict.value


def test_the_verdict_tells_status_optimum_and_vertices() -> None:
    told = pw.explore(square()).verdict.value
    assert "bounded region of dimension 2; optimum 3 at V3; 4 vertices; 1 of them degenerate." in told


def test_buttons_and_keys_step_on_and_back() -> None:
    explorer = pw.explore(cube())
    explorer.walk.on.click()
    assert explorer.state.step == 1
    explorer.picture.receive({"kind": "key", "key": "ArrowRight"})
    assert (explorer.state.step, explorer.walk.rows.selected) == (2, 2)
    explorer.walk.back.click()
    explorer.picture.receive({"kind": "key", "key": "ArrowLeft"})
    assert explorer.state.step == 0
    assert explorer.walk.back.disabled
    explorer.picture.receive({"kind": "key", "key": "End"})
    assert explorer.state.step is None
    explorer.picture.receive({"kind": "key", "key": "ArrowDown"})
    assert explorer.state.vertex is not None


def test_the_ratio_test_is_told_with_rule_slack_rate_and_step() -> None:
    model = pw.from_algebra(maximize="3*x", constraints={"labour": "2*x + y <= 4"}, bounds={"x": (0, 3), "y": (0, 3)})
    explorer = pw.explore(model, step=1)
    told = explorer.walk.story.value
    row = told[told.index("<b>labour</b>") :].split("</tr>")[0]
    cells = [part.split("</td>")[0].split(">")[-1] for part in row.split("<td")[1:]]
    assert cells == ["2 x + y ≤ 4", "4", "-2", "2", "leaves"]


def test_rules_and_start_are_chosen() -> None:
    explorer = pw.explore(cube())
    explorer.walk.rule.value = "bland"
    explorer.walk.other.value = "dantzig"
    assert explorer.state.rules == ("bland", "dantzig")
    assert explorer.walk.summary.value.count("pivots") == 2
    explorer.walk.start.value = explorer.state.region.vertices[7].point
    assert explorer.state.walks[0].pivots == ()
    assert explorer.walk.on.disabled


def test_rules_set_from_python_are_shown() -> None:
    explorer = pw.explore(cube())
    explorer.state.rules = ("bland", "dantzig")
    assert (explorer.walk.rule.value, explorer.walk.other.value) == ("bland", "dantzig")
    explorer.state.rules = ("dantzig",)
    assert (explorer.walk.rule.value, explorer.walk.other.value) == ("dantzig", "none")
    assert explorer.state.rules == ("dantzig",)


def test_an_error_in_a_callback_is_shown_and_goes_away() -> None:
    explorer = pw.explore(cube())
    explorer.picture.receive({"kind": "pick", "vertex": 99})
    assert "expected the index of a vertex, 0 to 7, got 99" in explorer.message.value
    assert 'role="alert"' in explorer.message.value
    assert explorer.state.vertex == 7  # the optimum, as at first
    explorer.picture.receive({"kind": "pick", "vertex": 5})
    assert explorer.message.value == ""


def test_an_unexpected_error_is_shown_with_its_type(monkeypatch: pytest.MonkeyPatch) -> None:
    explorer = pw.explore(cube())
    monkeypatch.setattr("polywalk.explorer.explorer.scene", lambda *_: 1 / 0)
    explorer.picture.receive({"kind": "pick", "vertex": 5})
    assert "ZeroDivisionError" in explorer.message.value


def test_the_camera_is_kept_and_followed() -> None:
    explorer = pw.explore(cube())
    camera = {"eye": {"x": 2.0, "y": 0.5, "z": 0.5}}
    sent: list[object] = []
    explorer.picture.send = lambda content, buffers=None: sent.append(content)  # type: ignore[method-assign]
    explorer.picture.receive({"kind": "camera", "camera": camera})
    assert explorer.state.camera == camera
    assert sent == []
    explorer.state.vertex = 2
    assert explorer.picture.figure["layout"]["scene"]["camera"] == camera
    explorer.state.camera = {"eye": {"x": 0.0, "y": 0.0, "z": 3.0}}
    assert sent == [{"kind": "aim", "camera": explorer.state.camera}]


def test_the_page_says_whether_it_is_dark() -> None:
    explorer = pw.explore(cube())
    light = explorer.picture.figure["layout"]["paper_bgcolor"]
    explorer.picture.receive({"kind": "theme", "dark": True})
    assert explorer.state.dark
    assert explorer.picture.figure["layout"]["paper_bgcolor"] != light


def test_the_revision_is_kept_until_the_axes_change() -> None:
    explorer = pw.explore(cube())
    first = explorer.picture.figure["layout"]["uirevision"]
    explorer.state.model = explorer.state.model.with_rhs("x upper", 2)
    assert explorer.picture.figure["layout"]["uirevision"] == first
    explorer.state.axes = ("x", "y")
    assert explorer.picture.figure["layout"]["uirevision"] != first


def test_the_bar_offers_no_upload() -> None:
    assert pw.explore(cube()).picture.figure["layout"]["modebar"]["remove"][0] == "sendChartToCloud"


def test_plotly_is_sent_only_when_asked() -> None:
    view = FigureView()
    sent: list[tuple[object, list[bytes]]] = []
    view.send = lambda content, buffers=None: sent.append((content, buffers))  # type: ignore[method-assign]
    assert sent == []
    view.receive({"kind": "library"})
    assert sent == [({"kind": "library"}, [library()])]
    assert b"plotly.js" in gzip.decompress(library())[:200]


def test_without_widgets_there_is_a_picture_and_the_vertices() -> None:
    explorer = pw.explore(square())
    bundle = explorer._repr_mimebundle_()
    assert "application/vnd.jupyter.widget-view+json" in bundle
    assert "data:image/svg+xml;base64," in bundle["text/html"]
    assert "<caption" in bundle["text/html"]
    assert "0x" not in bundle["text/plain"]
    assert bundle["text/html"] == pw.explore(square())._repr_mimebundle_()["text/html"]


@pytest.mark.parametrize(
    ("constraints", "says"),
    [
        ({"low": "x <= 1", "high": "x >= 2"}, "empty region"),
        ({"low": "x >= 1", "wide": "y >= 0"}, "unbounded region"),
        ({"flat": "x + y == 1", "wide": "x >= 0", "tall": "y >= 0"}, "bounded region of dimension 1"),
        ({"low": "x >= 1"}, "unbounded region"),
    ],
)
def test_every_kind_of_region_is_shown(constraints: dict[str, str], says: str) -> None:
    explorer = pw.explore(pw.from_algebra(maximize="x + y", constraints=constraints))
    assert says in explorer.verdict.value
    assert explorer.message.value == ""
    assert explorer._repr_mimebundle_()["text/html"]
