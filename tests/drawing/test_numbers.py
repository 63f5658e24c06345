"""Numbers of pictures: they can be told apart, axes say what their numbers mean, and no text leaves the page."""

from fractions import Fraction
from itertools import combinations, pairwise

import pytest

import polywalk as pw
from polywalk.drawing import View, figure, scene
from polywalk.drawing.numbers import apart, brief
from polywalk.drawing.scales import placed, scale
from polywalk.drawing.scene import Axis
from polywalk.drawing.segments import distance
from polywalk.drawing.static import painted_figure
from polywalk.drawing.theme import CONSTRAINTS, THEMES

SPANS = {
    "a million and a little": (1_443_700, 1_443_900),
    "tiny": (0, Fraction(1, 10**7)),
    "tiny and a little": (Fraction(999, 10**10), Fraction(1001, 10**10)),
    "a billion billion": (0, 10**12),
    "far and a little": (10**12 - 100, 10**12 + 100),
    "tens of thousands": (12_000, 98_000),
    "below zero": (-1_443_900, -1_443_700),
}


def box(low: object, high: object) -> pw.Model:
    bounds = {"tank": (low, high), "yearly_cost": (low, high)}
    return pw.from_algebra(minimize="tank", constraints={}, bounds=bounds)


@pytest.mark.parametrize("span", SPANS.values(), ids=SPANS)
@pytest.mark.parametrize("size", ["page", "column"])
def test_no_text_leaves_the_page(span: tuple[object, object], size: str) -> None:
    drawn = scene(box(*span), View(size=size))
    page, _ = painted_figure(drawn, THEMES["light"], size)
    page.dpi = 192  # as it is saved
    page.draw_without_rendering()
    wide, high = page.get_size_inches() * page.dpi
    axes = page.axes[0]
    texts = [page.texts, axes.get_xticklabels(), axes.get_yticklabels(), [axes.xaxis.label, axes.yaxis.label]]
    texts += [other.texts for other in page.axes] if size == "page" else []
    for text in (one for group in texts for one in group if one.get_text()):
        area = text.get_window_extent()
        assert area.x0 >= 0, text
        assert area.y0 >= 0, text
        assert area.x1 <= wide, text
        assert area.y1 <= high, text
    for numbers in (axes.get_xticklabels(), axes.get_yticklabels()):
        areas = [text.get_window_extent() for text in numbers]
        assert len(areas) > 1
        assert not any(one.overlaps(other) for one, other in combinations(areas, 2))
    title = axes.yaxis.label.get_window_extent()
    assert not any(title.overlaps(text.get_window_extent()) for text in axes.get_yticklabels())


@pytest.mark.parametrize("span", SPANS.values(), ids=SPANS)
def test_the_numbers_of_an_axis_with_its_title_give_the_values(span: tuple[object, object]) -> None:
    low, high = (float(value) for value in span)
    said = scale(low, high).titled("x")
    start, factor = 0.0, 1.0
    if " = " in said:
        start = float(said.split(" = ")[1].split(" + ")[0].replace(",", "").translate(_PLAIN).replace("×10", "e"))
    if " × 10" in said:
        factor = 10.0 ** int(said.split(" × 10")[1].translate(_PLAIN))
    found = list(placed(low, high, 460, across=False))
    assert len({text for _, text in found}) == len(found)
    for value, text in found:
        number = float(text.replace(",", "").replace("−", "-"))
        assert start + number * factor == pytest.approx(value, rel=1e-12, abs=1e-6 * (high - low))


_PLAIN = str.maketrans("⁻⁰¹²³⁴⁵⁶⁷⁸⁹−", "-0123456789-")


def test_a_title_without_room_is_cut_but_not_what_its_numbers_mean() -> None:
    said = scale(10**12 - 100, 10**12 + 100).titled("the cost of a very long year in all harbours", 300)
    assert said.endswith("… = 1×10¹² + number")


def test_axes_of_the_figure_make_room_and_group_digits() -> None:
    layout = figure(box(1_443_700, 1_443_900))["layout"]
    for name in ("xaxis", "yaxis"):
        assert layout[name]["automargin"]
        assert layout[name]["separatethousands"]
    assert not figure(box(0, 40))["layout"]["xaxis"]["separatethousands"]


def test_a_key_tells_vertices_apart() -> None:
    model = box("1443751.61", "1443751.684")
    (part,) = [part for part in scene(model).key if part.heading.startswith("Vertices")]
    assert len({row.text.split(":")[0] for row in part.rows}) == 4
    close = [Fraction(10**9 + k, 10**9 * 3) for k in range(4)]
    assert len({apart(close)(value) for value in close}) == 4
    assert apart([Fraction(1, 3), Fraction(3)])(Fraction(1, 3)) == "1/3"
    assert brief(Fraction(8744, 2975)) == "≈2.93916"
    assert brief(Fraction(-149, 99)) == "-149/99"


def test_what_is_missed_is_a_distance_with_its_unit() -> None:
    model = pw.scenarios.harbour_row("infeasible")
    assert [line.name for line in scene(model).lines if line.role == "short"] == ["misses by 2 MW"]
    for rule, miss in (("x + y == -3", "misses by 3"), ("2*x + y == -3", "misses by 3"), ("x + y == 9", "misses by 5")):
        found = pw.from_algebra(minimize="x", constraints={"rule": rule}, bounds={"x": (0, 2), "y": (0, 2)})
        assert [line.name for line in scene(found).lines if line.role == "short"] == [miss]


def test_a_picture_of_what_goes_on_says_that_it_is_an_excerpt() -> None:
    rows = {"demand": "x + y + z == 17", "pipe": "x + z <= 8", "chips": "y <= 8"}
    model = pw.from_algebra(minimize="0*x", constraints=rows, bounds=dict.fromkeys("xyz", (None, None)))
    (row,) = [row for part in scene(model).key for row in part.rows if row.role == "open edge"]
    assert "excerpt" in row.text
    assert row.text.endswith("nothing here keeps x, y, z from being negative")
    whole = pw.from_algebra(minimize="x", constraints={"rule": "x + y >= 9"}, bounds={"x": (0, 2), "y": (0, 2)})
    assert not [row for part in scene(whole).key for row in part.rows if row.role == "open edge"]


def _lab(colour: str) -> tuple[float, float, float]:
    """CIE 1976 L*a*b* of an sRGB colour under D65 (IEC 61966-2-1; CIE 15)."""
    r, g, b = (int(colour[k : k + 2], 16) / 255 for k in (1, 3, 5))
    r, g, b = (v / 12.92 if v <= 0.04045 else ((v + 0.055) / 1.055) ** 2.4 for v in (r, g, b))
    x = (0.4124 * r + 0.3576 * g + 0.1805 * b) / 0.9505
    y = 0.2126 * r + 0.7152 * g + 0.0722 * b
    z = (0.0193 * r + 0.1192 * g + 0.9505 * b) / 1.089
    x, y, z = (v ** (1 / 3) if v > 0.008856 else 7.787 * v + 16 / 116 for v in (x, y, z))
    return 116 * y - 16, 500 * (x - y), 200 * (y - z)


@pytest.mark.parametrize("mode", CONSTRAINTS)
def test_lines_of_one_dash_differ_in_colour_and_neighbours_do_so_well(mode: str) -> None:
    styles = [THEMES[mode].constraint(k) for k in range(32)]
    assert len({(style.colour, style.dash) for style in styles}) == 32

    def differ(one: str, other: str) -> float:
        return sum((a - b) ** 2 for a, b in zip(_lab(one), _lab(other), strict=True)) ** 0.5

    for one, other in combinations(styles[:8], 2):
        if one.dash == other.dash:
            assert differ(one.colour, other.colour) > (10 if mode == "grey" else 25), (one, other)
    for one, other in pairwise(styles):
        assert differ(one.colour, other.colour) > 15, (one, other)


def test_leaders_end_on_their_line_and_away_from_others() -> None:
    rows = {f"limit {k} of the long line by the harbour": f"{k}*x + {20 - k}*y <= 100" for k in range(7, 14)}
    model = pw.from_algebra(maximize="x + y", constraints=rows, bounds={"x": (0, None), "y": (0, None)})
    drawn = scene(model)

    def pixel(point: tuple[float, ...]) -> tuple[float, ...]:
        return tuple((x - axis.low) * unit for x, axis, unit in zip(point, drawn.axes, drawn.scale, strict=True))

    lines = {
        line.index: (pixel(line.parts[0][0]), pixel(line.parts[0][1]))
        for line in drawn.lines
        if line.role == "constraint"
    }
    led = [label for label in drawn.labels if label.target and label.names_border]
    assert led
    for label in led:
        foot = pixel(label.target)
        assert distance(foot, lines[label.index]) < 0.01
        assert min(distance(foot, line) for k, line in lines.items() if k != label.index) > 3
    for one, other in combinations(led, 2):
        assert distance(pixel(one.target), (pixel(other.point), pixel(other.target))) > 4


def test_the_direction_of_the_objective_is_named_on_its_arrow() -> None:
    drawn = scene(pw.scenarios.harbour_row("two decisions"))
    (arrow,) = [line.parts[0] for line in drawn.lines if line.role == "objective"]
    (name,) = [label for label in drawn.labels if label.text.startswith("objective rises")]
    if name.target:
        assert name.target == pytest.approx([sum(values) / 2 for values in zip(*arrow, strict=True)])


def test_axes_in_other_units_each_fill_their_side() -> None:
    bounds = {"x": (0, 2), "y": (0, 5)}
    plain = pw.from_algebra(maximize="x", constraints={}, bounds=bounds)
    mixed = pw.from_algebra(maximize="x", constraints={}, bounds=bounds, units={"x": "MW", "y": "t"})
    assert scene(plain).scale[0] == pytest.approx(scene(plain).scale[1])
    axis = scene(mixed).axes[0]
    assert isinstance(axis, Axis)
    assert axis.high - axis.low < 3
