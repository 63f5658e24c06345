"""Texts of 200 random models, in the plane and from three cameras in space: none on another, none outside the paper.

Whatever found no room is named in the key. Widths are those matplotlib measures, not those the layout reckons with.
"""

import random
from collections.abc import Iterator
from functools import cache
from itertools import pairwise

import pytest

import polywalk as pw
from polywalk.drawing import Scene, View, scene
from polywalk.drawing.projection import laid_flat
from polywalk.drawing.scene import Label
from polywalk.drawing.tiles import BOLD, PADS, SIZES, USUAL, Tile, halves
from polywalk.model import Constraint, Model, Objective

MODELS, SEED = 200, 20260131
CAMERAS = ("isometric", "along x", "along z")
LETTERS = "abcdefghij klmnop qrstuvwxyzWM0123456789_-%é"
HEADING = "No room in the picture for"


def name_of(draw: random.Random) -> str:
    """A name of 1 to 40 characters."""
    return "".join(draw.choice(LETTERS) for _ in range(draw.randint(1, 40))).strip() or "x"


def model_of(draw: random.Random, n: int) -> Model:
    """A bounded model around the origin: a box, and 1 to 7 rows that keep the origin inside."""
    variables = ("x", "y", "z")[:n]
    names = iter(dict.fromkeys(name_of(draw) for _ in range(60)))
    rows = []
    for j in range(n):
        unit = tuple(pw.exact(int(j == k)) for k in range(n))
        rows.append(Constraint(next(names), unit, ">=", pw.exact(-draw.randint(0, 9))))
        rows.append(Constraint(next(names), unit, "<=", pw.exact(draw.randint(1, 12))))
    for _ in range(draw.randint(1, 7)):
        row = tuple(pw.exact(draw.randint(-5, 5)) for _ in range(n))
        if any(row):
            rows.append(Constraint(next(names), row, "<=", pw.exact(draw.randint(0, 30))))
    goal = tuple(pw.exact(draw.randint(-5, 5)) for _ in range(n))
    return Model(variables, tuple(rows), Objective("max", goal), name=name_of(draw))


def pictures() -> Iterator[tuple[int, Scene]]:
    """Every second model in the plane, the others in space from three cameras; every fifth as a column."""
    draw = random.Random(SEED)
    for k in range(MODELS):
        model = model_of(draw, 2 + k % 2)
        walks = (pw.walk(model), pw.walk(model, rule="bland")) if k % 3 == 0 else ()
        size = "column" if k % 5 == 0 else "page"
        found = pw.region(model)
        if model.n == 2:
            yield k, scene(found, View(walks=walks, size=size))
        else:
            for camera in CAMERAS:
                yield k, laid_flat(scene(found, View(walks=walks, camera=camera, size=size)))


def pixels(drawn: Scene, point: tuple[float, ...]) -> tuple[float, ...]:
    return tuple((x - axis.low) * unit for x, axis, unit in zip(point, drawn.axes, drawn.scale, strict=True))


def tiles(drawn: Scene, half: object = halves) -> list[tuple[Label, Tile]]:
    return [
        (label, Tile(pixels(drawn, label.point), half(label.text, label.role), label.angle)) for label in drawn.labels
    ]  # type: ignore[operator]


@cache
def measured() -> object:
    """matplotlib's own ruler."""
    from matplotlib.backends.backend_agg import FigureCanvasAgg
    from matplotlib.figure import Figure
    from matplotlib.font_manager import FontProperties

    renderer = FigureCanvasAgg(Figure(dpi=288)).get_renderer()
    fonts = {
        bold: {
            size: FontProperties(family="DejaVu Sans", size=size * 0.75, weight="bold" if bold else "normal")
            for size in (10.0, 11.0, 12.0)
        }
        for bold in (False, True)
    }

    def half(text: str, role: str) -> tuple[float, float]:
        font = fonts[role in BOLD][SIZES.get(role, USUAL)]
        wide, high, _ = renderer.get_text_width_height_descent(text, font, ismath=False)
        pad = PADS.get(role, 0.0)
        return wide / 288 * 96 / 2 + pad - 0.6, high / 288 * 96 / 2 + min(pad, 2.4)

    return half


def test_no_text_of_200_random_models_lies_on_another_or_on_the_frame() -> None:
    texts, unplaced, led, shortened = 0, 0, 0, 0
    for k, drawn in pictures():
        found = tiles(drawn)
        ruled = [tile for _, tile in tiles(drawn, measured())]
        texts += len(found)
        led += sum(label.target is not None for label, _ in found)
        shortened += sum(label.role == "tag" for label, _ in found) if k % 2 == 0 else 0
        unplaced += sum(part.heading == HEADING for part in drawn.key)
        for one, (label, tile) in enumerate(found):
            assert tile.within(drawn.paper), (k, label.text)
            for other in range(one + 1, len(found)):
                assert not tile.meets(found[other][1]), (k, label.text, found[other][0].text)
                assert not ruled[one].meets(ruled[other]), (k, label.text, found[other][0].text)
    assert texts > 4_000
    assert min(led, shortened, unplaced) > 10  # each way out was taken


def test_no_name_in_the_plane_lies_on_a_line() -> None:
    draw, count = random.Random(SEED + 1), 0
    for _ in range(40):
        drawn = scene(model_of(draw, 2))
        lines = [
            (pixels(drawn, a), pixels(drawn, b))
            for line in drawn.lines
            if line.role in {"constraint", "edge", "hatch", "level line"}
            for part in line.parts
            for a, b in pairwise(part)
        ]
        for label, tile in tiles(drawn):
            count += 1
            assert not any(tile.crossed(*line) for line in lines), label.text
    assert count > 300


def test_every_name_is_written_or_listed() -> None:
    draw = random.Random(SEED + 2)
    for k in range(40):
        model = model_of(draw, 2)
        region = pw.region(model)
        drawn = scene(region, View(size="column" if k % 2 else "page"))
        listed = " ".join(row.text for part in drawn.key if part.heading == HEADING for row in part.rows)
        written = {label.text for label in drawn.labels} | {label.longer for label in drawn.labels}
        passing = {line.name for line in drawn.lines if line.role == "constraint"}
        for name in [*passing, *(f"V{index}" for index in range(len(region.vertices)))]:
            assert name in written or name in listed, name
        letters = {row.tag: row.text for part in drawn.key if part.heading == "Constraints" for row in part.rows}
        for label in drawn.labels:
            if label.role == "tag":
                assert letters[label.text].startswith(label.longer)


@pytest.mark.parametrize("mode", ["light", "dark", "grey"])
@pytest.mark.parametrize("size", ["slide", "column"])
def test_slides_and_columns_have_their_size_and_repeat_their_bytes(size: str, mode: str) -> None:
    model = pw.scenarios.harbour_row()
    first = pw.picture(model, walks=[pw.walk(model)], size=size, mode=mode).data
    assert first == pw.picture(pw.scenarios.harbour_row(), walks=[pw.walk(model)], size=size, mode=mode).data
    head = first[:600].decode()
    assert ('width="1280px" height="720' in head) if size == "slide" else ('width="240.75pt"' in head)  # 321 px, 85 mm


def test_a_camera_is_named_or_refused() -> None:
    model = pw.scenarios.harbour_row()
    for name, way in (
        ("isometric", (1.0, -1.0, 1.0)),
        ("along pump", (1.0, 0.0, 0.0)),
        ("along tank", (0.0, 0.0, 1.0)),
    ):
        assert scene(model, View(camera=name)).camera == way
    for camera in ("along boiler", (0.0, 0.0, 0.0), (1.0, 1.0)):
        with pytest.raises(pw.PolywalkError, match=r"expected (the|a) camera"):
            pw.draw(model, camera=camera)
    with pytest.raises(pw.PolywalkError, match="expected the size"):
        pw.picture(model, size="poster")
