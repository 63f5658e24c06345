"""What a stranger at a design review must be able to read: names where they matter, one letter for one thing."""

from itertools import combinations

import pytest

import polywalk as pw
from polywalk.drawing import Scene, View, figure, scene
from polywalk.drawing.camera import Camera
from polywalk.drawing.projection import laid_flat
from polywalk.drawing.scales import Scale
from polywalk.drawing.tags import letters
from polywalk.drawing.tiles import Tile, halves
from polywalk.scenarios import VARIANTS, circling, harbour_row

CROWD = {f"limit of line {k}": f"{k}*x + {9 - k}*y <= {20 + k}" for k in range(1, 9)}


def crowded() -> pw.Model:
    """Empty in the plane: eight borders meet, and a contract asks for more."""
    rows = CROWD | {"contract with the town council of Nordhaven": "x + y >= 14"}
    return pw.from_algebra(maximize="3*x + 2*y", constraints=rows, bounds={"x": (0, None), "y": (0, None)})


def flat(drawn: Scene) -> Scene:
    return laid_flat(drawn) if drawn.solid else drawn


def pixels(drawn: Scene, point: tuple[float, ...]) -> tuple[float, ...]:
    return tuple((x - axis.low) * unit for x, axis, unit in zip(point, drawn.axes, drawn.scale, strict=True))


def tiles(drawn: Scene) -> list[tuple[str, str, Tile]]:
    return [
        (item.role, item.text, Tile(pixels(drawn, item.point), halves(item.text, item.role), item.angle))
        for item in drawn.labels
    ]


def walked(model: pw.Model) -> View:
    return View(walks=(pw.walk(model), pw.walk(model, rule="bland")))


@pytest.mark.parametrize("model", [circling(), harbour_row(), harbour_row("flat"), harbour_row("unbounded")])
def test_no_stay_lies_on_a_path(model: pw.Model) -> None:
    drawn = flat(scene(model, walked(model)))
    steps = [
        (pixels(drawn, part[0]), pixels(drawn, part[1]))
        for line in drawn.lines
        if line.role in {"walk", "phase 1"}
        for part in line.parts
    ]
    found = [(text, tile) for role, text, tile in tiles(drawn) if role == "stay"]
    assert found
    assert steps
    assert not any(tile.crossed(*step) for _, tile in found for step in steps), found


def test_walks_that_stay_alike_share_a_label_and_others_are_named() -> None:
    model = circling()
    (stay,) = [label for label in scene(model, walked(model)).labels if label.role == "stay"]
    assert stay.text == "both walks 1–6: no move"
    (stay,) = [label for label in scene(harbour_row(), walked(harbour_row())).labels if label.role == "stay"]
    assert stay.text == "bland 4: no move"
    far = View(walks=(pw.walk(model), pw.walk(model, rule="bland"), pw.walk(model, rule="bland", limit=3)))
    texts = [label.text for label in scene(model, far).labels if label.role == "stay"]
    assert texts == ["dantzig, bland 1–6: no move", "bland 1–3: no move"]


def test_a_shared_step_is_numbered_once_where_there_is_little_room() -> None:
    model = harbour_row("flat")
    numbers = [label.text for label in scene(model, walked(model)).labels if label.role == "step"]
    assert sorted(numbers) == ["2", "3", "4", "5"]  # both walks take the same steps
    model = harbour_row()
    numbers = [label.text for label in scene(model, walked(model)).labels if label.role == "step"]
    assert sorted(numbers) == ["1", "1", "2", "2", "3", "3", "4", "5", "6"]  # other steps, or other numbers
    model = harbour_row("two decisions")
    numbers = [label.text for label in scene(model, walked(model)).labels if label.role == "step"]
    assert sorted(numbers) == ["1", "1", "2", "3", "3"]  # only the second is short


@pytest.mark.parametrize("variant", ["base", "degenerate", "tied"])
def test_a_letter_means_the_same_constraint_in_every_picture(variant: str) -> None:
    model = harbour_row(variant)
    region = pw.region(model)
    known = letters(row.name for row in model.constraints)
    meanings = [_meaning(scene(region, View()))]
    meanings += [_meaning(scene(pw.bases(model, k), View())) for k, v in enumerate(region.vertices) if v.degenerate]
    meanings.append(_meaning(scene(pw.difference(model, model.with_rhs("harbour main", 9)).before, View())))
    assert len(meanings) > 2
    for meaning in meanings:
        assert meaning
        assert meaning.items() <= known.items()


def test_letters_of_a_shadow_do_not_take_those_of_the_model() -> None:
    drawn = scene(harbour_row(), View(axes=("pump", "chips")))
    known = letters(row.name for row in harbour_row().constraints)
    shown = _meaning(drawn)
    shown |= {label.longer: label.shorter or label.text for label in drawn.labels if label.longer}
    assert all(known.get(name, letter) == letter for name, letter in shown.items())
    assert not {letter for name, letter in shown.items() if name not in known} & set(known.values())


def _meaning(drawn: Scene) -> dict[str, str]:
    """Constraint to letter, as the key tells."""
    parts = [part for part in drawn.key if part.heading.startswith("Constraints")]
    return {row.text.split(":")[0]: row.tag for part in parts for row in part.rows if row.tag}


@pytest.mark.parametrize("model", [harbour_row("infeasible"), crowded()], ids=["space", "plane"])
@pytest.mark.parametrize("size", ["page", "column"])
def test_every_culprit_of_a_conflict_is_named_in_the_drawing(model: pw.Model, size: str) -> None:
    drawn = flat(scene(model, View(size=size)))
    culprits = pw.farkas(model).multipliers
    texts = [text for role, text, _ in tiles(drawn) if role in {"culprit", "tag", "back tag"}]
    tags = _meaning(drawn)
    for name in (name for name, weight in culprits.items() if weight):
        assert any(name in text or text == tags.get(name) for text in texts), (name, texts)
        if size == "page":
            assert any(name in text for text in texts), (name, texts)
    assert not any(part.heading.startswith("No room") for part in drawn.key) or size == "column"


@pytest.mark.parametrize("variant", VARIANTS)
@pytest.mark.parametrize("size", ["page", "column"])
def test_every_letter_in_the_drawing_is_in_the_key(variant: str, size: str) -> None:
    model = harbour_row(variant)
    view = View(size=size) if variant == "infeasible" else View(walks=walked(model).walks, size=size)
    drawn = flat(scene(model, view))
    told = {row.tag for part in drawn.key for row in part.rows if row.tag}
    for item in drawn.labels:
        if item.role in {"tag", "back tag"}:
            assert set(item.text.split(" ")[0].split(" & ")) <= told, item.text
    for one, other in combinations(tiles(drawn), 2):
        assert not one[2].meets(other[2]), (one[1], other[1])


def test_large_and_small_numbers_stand_in_powers_that_the_title_states() -> None:
    for size, title in ((4_000_000, "x, numbers × 10⁶"), ("0.000004", "x, numbers × 10⁻⁶"), (4, "x")):
        model = pw.from_algebra(
            maximize="x", constraints={"top": f"x + y <= {size}"}, bounds=dict.fromkeys("xy", (0, None))
        )
        svg = pw.picture(model, size="bare").data.decode()
        assert f">{title}</text>" in svg
        assert "1e" not in "".join(part.split("<")[0] for part in svg.split(">"))
    names = [Scale(6).written(value) for value in (1_000_000.5, 1_000_001, -2_500_000, -0.0)]
    assert names == ["1.0000005", "1.000001", "−2.5", "0"]


def test_vertices_with_long_lists_of_names_are_told_by_letters_that_the_key_explains() -> None:
    model = pw.from_algebra(
        maximize="x + y", constraints={f"limit of line {k}": f"{k}*x + {13 - k}*y <= 100" for k in range(1, 13)}
    )
    parts = {part.heading: part.rows for part in scene(model).key}
    (corner,) = parts["Vertices, with the constraints active there, by letter"]
    assert corner.text.endswith(": a, b, c, d, e, f, g, h, i, j, k, l")
    assert [row.tag for row in parts["Constraints"]] == list("abcdefghijkl")


def test_the_border_that_nothing_reaches_is_not_seen_from_its_edge() -> None:
    drawn = scene(harbour_row("infeasible"))
    camera = Camera(drawn.camera, drawn.scale)
    for border in (item for item in drawn.polygons if item.role == "conflict"):
        seen = [camera.see(point)[:2] for point in border.points]
        wide = max(max(values) - min(values) for values in zip(*seen, strict=True))
        area = abs(sum(a[0] * b[1] - a[1] * b[0] for a, b in zip(seen, seen[1:] + seen[:1], strict=True))) / 2
        assert area > 0.2 * wide * wide


@pytest.mark.parametrize("model", [circling(), *(harbour_row(variant) for variant in VARIANTS)])
def test_the_legend_names_each_thing_once_and_every_walk(model: pw.Model) -> None:
    view = View() if pw.region(model).status == "empty" else walked(model)
    data = figure(model, view)["data"]
    entries = [trace["name"] for trace in data if trace.get("showlegend", True)]
    assert len(set(entries)) == len(entries)
    assert all(any(walk.rule in entry for entry in entries) for walk in view.walks)
    assert all(len(trace["x"]) for trace in data if trace.get("showlegend", True))  # plotly hides what has no point
    shown = {trace["name"] for trace in data if trace.get("showlegend", True)}
    letters_drawn = [text for trace in data if trace.get("mode") == "text" for text in trace["text"] if "<b>" in text]
    for letter in (text.removeprefix("<b>").removesuffix("</b>") for text in letters_drawn):
        assert letter.isdigit() or any(entry.startswith(f"{letter}  ") for entry in shown), letter


@pytest.mark.parametrize("model", [circling(), *(harbour_row(variant) for variant in VARIANTS)])
def test_words_in_space_stand_in_front_of_the_body_and_inside_the_axes(model: pw.Model) -> None:
    view = View() if pw.region(model).status == "empty" else walked(model)
    drawn, layout = scene(model, view), figure(model, view)["layout"]
    if not drawn.solid:
        return
    notes = layout["scene"]["annotations"]
    words = [label.text for label in drawn.labels if label.role in {"stay", "note", "culprit", "name"}]
    assert words
    assert all(any(word in note["text"] for note in notes) for word in words)
    for note in notes:
        assert all(axis.low <= note[name] <= axis.high for name, axis in zip("xyz", drawn.axes, strict=True))
        assert note["bgcolor"] == layout["paper_bgcolor"]


def test_a_letter_in_the_plane_is_told_in_the_legend_of_a_figure_too() -> None:
    rows = {"weekly hours of the large hydraulic press in the north hall": "x + y <= 4"}
    rows |= {"storage space in the refrigerated warehouse by the harbour": "2*x + y <= 7", "delivery": "x + 3*y <= 6"}
    model = pw.from_algebra(maximize="3*x + 2*y", constraints=rows, bounds={"x": (0, 3), "y": (0, 2)})
    tags = {label.longer: label.text for label in scene(model).labels if label.role == "tag"}
    assert tags
    names = [trace.get("name") for trace in figure(model)["data"]]
    assert all(f"{letter}  {name}" in names for name, letter in tags.items())
    assert "delivery" in names


def test_the_key_of_a_conflict_tells_what_is_drawn() -> None:
    def said(drawn: Scene) -> str:
        return " ".join(row.text for part in drawn.key if part.heading == "What the marks say" for row in part.rows)

    plane, space = scene(crowded()), scene(harbour_row("infeasible"))
    assert "arrow" not in said(plane)
    assert "strokes" in said(plane)
    assert "arrow" in said(space)
    assert [line for line in space.lines if line.role == "conflict line" and line.arrow]
    shadow = scene(harbour_row("infeasible"), View(axes=("pump", "chips")))
    assert not shadow.polygons
    assert said(shadow) == "nothing is drawn: no point satisfies every constraint"


def test_lost_and_gained_vertices_have_marks_and_names_in_space() -> None:
    model = harbour_row()
    change = pw.difference(model, model.with_rhs("harbour main", 10))
    data = {trace.get("name"): trace for trace in figure(change, View())["data"]}
    lost, gained = data["vertex lost"], data["vertex gained"]
    assert lost["marker"]["symbol"] == "cross"  # plotly draws x in space by a letter that its font lacks
    assert len(lost["text"]) == len(change.vertices("lost"))
    assert all(text.strip().startswith("old V") for text in lost["text"])
    assert [text.strip() for text in gained["text"]] == [f"V{corner.after}" for corner in change.vertices("gained")]
