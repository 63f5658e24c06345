"""Both painters: complete, repeatable, safe with any name, gentle with files."""

import json
from dataclasses import replace
from pathlib import Path

import plotly.graph_objects as go
import pytest
from zoo import ZOO

import polywalk as pw
from polywalk.drawing import View, figure, scene
from polywalk.drawing.projection import laid_flat
from polywalk.drawing.theme import CONSTRAINTS, THEMES, WALKS
from polywalk.scenarios import VARIANTS, circling, cube, harbour_row

NASTY = "<img src=x onerror=alert(1)> $\\frac{1}{0}$ & “äß🚢”"


def renamed(model: pw.Model, name: str) -> pw.Model:
    """The model with its first constraint, its first variable and itself called by a difficult name."""
    first = replace(model.constraints[0], name=name)
    units = tuple((name if key == model.variables[0] else key, unit) for key, unit in model.units)
    variables = (name, *model.variables[1:])
    return replace(model, name=name, constraints=(first, *model.constraints[1:]), variables=variables, units=units)


@pytest.mark.parametrize("name", [name for name, (model, _) in ZOO.items() if model.n <= 3])
def test_plotly_accepts_every_figure(name: str) -> None:
    model, _ = ZOO[name]
    found = pw.draw(model)
    assert isinstance(found, go.Figure)
    json.dumps(figure(model), allow_nan=False)


@pytest.mark.parametrize("mode", THEMES)
@pytest.mark.parametrize("variant", VARIANTS)
def test_both_painters_draw_every_variant_in_every_mode(variant: str, mode: str, tmp_path: Path) -> None:
    model = harbour_row(variant)
    walks = [] if variant == "infeasible" else [pw.walk(model), pw.walk(model, rule="bland")]
    assert pw.draw(model, walks=walks, mode=mode).layout.paper_bgcolor == THEMES[mode].paper
    written = pw.picture(model, tmp_path / "region.svg", walks=walks, mode=mode)
    assert THEMES[mode].paper.lower() in written.data.decode().lower()


@pytest.mark.parametrize("ending", ["png", "svg", "pdf"])
def test_the_same_input_gives_the_same_bytes(ending: str, tmp_path: Path) -> None:
    model = harbour_row()
    first = pw.picture(model, tmp_path / f"a.{ending}", walks=pw.walk(model)).data
    second = pw.picture(harbour_row(), tmp_path / f"b.{ending}", walks=pw.walk(harbour_row())).data
    assert first == second == (tmp_path / f"a.{ending}").read_bytes()
    assert len(first) > 5_000


def test_vertices_are_one_trace_that_knows_their_indices() -> None:
    region = pw.region(harbour_row())
    (trace,) = [trace for trace in figure(region)["data"] if trace.get("name") == "vertices"]
    assert trace["customdata"] == list(range(13))
    assert "degenerate: 4 constraints meet where 3 would do" in trace["hovertext"][10]
    assert "objective 229" in trace["hovertext"][10]


def test_a_fraction_is_hovered_exact_and_rounded() -> None:
    model = pw.from_algebra(maximize="x", constraints={"third": "3*x <= 1"}, bounds={"x": (0, None)})
    (trace,) = [trace for trace in figure(model)["data"] if trace.get("name") == "vertices"]
    assert "x 1/3 ≈ 0.333333" in trace["hovertext"][1]


@pytest.mark.parametrize("variant", ["base", "two decisions", "infeasible"])
def test_a_name_stays_text_in_both_painters(variant: str, tmp_path: Path) -> None:
    model = renamed(harbour_row(variant), NASTY)
    assert "<img" not in json.dumps(figure(model), ensure_ascii=False)
    assert len(pw.picture(model, tmp_path / "region.png").data) > 5_000


def test_the_legend_switches_a_walk_with_its_arrows_and_numbers() -> None:
    model = harbour_row()
    data = pw.draw(model, walks=pw.walk(model)).data
    parts = [trace for trace in data if trace.legendgroup == "walk 0"]
    assert {trace.type for trace in parts} == {"scatter3d", "mesh3d"}
    assert sum(bool(trace.showlegend) for trace in parts) == 1


def test_a_walk_that_never_moves_is_in_the_legend() -> None:
    model = circling()
    names = [trace.name for trace in pw.draw(model, walks=pw.walk(model)).data]
    assert "dantzig: 6 pivots, 6 stays, cycling" in names


def test_camera_and_zoom_survive_a_new_figure() -> None:
    model = harbour_row()
    assert figure(model)["layout"]["uirevision"] == figure(model.with_rhs("harbour main", 11))["layout"]["uirevision"]


def test_from_outside_a_cube_three_faces_and_seven_corners_are_seen() -> None:
    flat = laid_flat(scene(cube(3)))
    roles = [polygon.role for polygon in flat.polygons]
    assert (roles.count("facet"), roles.count("back")) == (3, 3)
    assert sum(mark.index for mark in flat.marks if mark.key is not None) == 1
    hidden = [len(line.parts) for line in flat.lines if line.role == "hidden edge"]
    assert hidden == [3]


def test_the_picture_is_replaced_only_when_complete(tmp_path: Path) -> None:
    target = tmp_path / "region.svg"
    target.write_text("kept")
    with pytest.raises(pw.PolywalkError):
        pw.picture(cube(4), target)
    assert target.read_text() == "kept"
    pw.picture(cube(3), target)
    assert target.read_text().startswith("<?xml")
    assert [path.name for path in tmp_path.iterdir()] == ["region.svg"]


@pytest.mark.parametrize(("path", "said"), [("region.jpeg", "ending in .png"), ("none/region.png", "does not exist")])
def test_a_path_that_cannot_be_written_is_refused(path: str, said: str, tmp_path: Path) -> None:
    with pytest.raises(pw.PolywalkError, match=said):
        pw.picture(cube(3), tmp_path / path)


def test_unknown_fields_and_modes_are_refused() -> None:
    with pytest.raises(pw.PolywalkError, match="expected one of axes"):
        pw.draw(cube(3), colour="red")
    with pytest.raises(pw.PolywalkError, match="light, dark or grey"):
        pw.draw(cube(3), view=View(mode="light"), mode="sepia")  # type: ignore[arg-type]


def luminance(colour: str) -> float:
    """Relative luminance (WCAG 2.2, definition of relative luminance)."""
    parts = [int(colour[k : k + 2], 16) / 255 for k in (1, 3, 5)]
    linear = [c / 12.92 if c <= 0.04045 else ((c + 0.055) / 1.055) ** 2.4 for c in parts]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def contrast(one: str, other: str) -> float:
    """Contrast ratio (WCAG 2.2, success criterion 1.4.3)."""
    high, low = sorted((luminance(one), luminance(other)), reverse=True)
    return (high + 0.05) / (low + 0.05)


@pytest.mark.parametrize("mode", THEMES)
def test_lines_and_words_are_told_from_the_ground(mode: str) -> None:
    theme = THEMES[mode]
    for colour in (theme.text, theme.quiet):
        assert contrast(colour, theme.paper) >= 4.5  # WCAG 2.2, 1.4.3: text
    for colour in (*CONSTRAINTS[mode], *WALKS[mode]):
        assert contrast(colour, theme.paper) >= 3.0  # WCAG 2.2, 1.4.11: graphical objects
        assert contrast(colour, theme.face) >= 2.4  # measured floor on the region's own fill, no source


def test_names_in_the_plane_do_not_cover_one_another() -> None:
    from polywalk.drawing.placing import Sheet, boxes, overlap
    from polywalk.drawing.window import Window

    for variant in VARIANTS:
        drawn = scene(harbour_row(variant))
        if drawn.solid:
            continue
        sheet = Sheet(Window(tuple(a.low for a in drawn.axes), tuple(a.high for a in drawn.axes)))
        areas = [boxes(label.text, sheet.pixel(label.point), label.angle) for label in drawn.labels]
        for k, one in enumerate(areas):
            for other in areas[k + 1 :]:
                assert sum(overlap(a, b) for a in one for b in other) == 0


@pytest.mark.parametrize("variant", ["base", "tied", "degenerate", "unbounded", "flat", "infeasible"])
def test_words_on_a_solid_keep_clear_of_one_another(variant: str) -> None:
    from polywalk.drawing.tiles import Tile, halves

    model = harbour_row(variant)
    walks = () if variant == "infeasible" else (pw.walk(model), pw.walk(model, rule="bland"))
    words = laid_flat(scene(model, View(walks=walks))).labels
    tiles = [Tile(label.point, halves(label.text, label.role), label.angle) for label in words]
    clashes = [
        (words[k].text, words[m].text)
        for k, tile in enumerate(tiles)
        for m in range(k + 1, len(tiles))
        if tile.meets(tiles[m])
    ]
    assert not clashes


def test_two_walks_on_one_edge_are_apart_on_paper() -> None:
    model = harbour_row()
    flat = laid_flat(scene(model, View(walks=(pw.walk(model), pw.walk(model, rule="bland")))))
    first, second = (line for line in flat.lines if line.role == "walk")
    (a, _), (b, _) = first.parts[-1], second.parts[-1]
    assert 5 < ((a[0] - b[0]) ** 2 + (a[1] - b[1]) ** 2) ** 0.5 < 12
