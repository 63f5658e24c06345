"""What is drawn is where the region is: coordinates of the scene against the exact region."""

from math import isclose

import pytest
from zoo import ZOO

import polywalk as pw
from polywalk.drawing import Scene, View, scene
from polywalk.drawing.scene import Line, Mark
from polywalk.model import Constraint, Model
from polywalk.scenarios import VARIANTS, circling, cube, harbour_row, klee_minty

DRAWABLE = {name: model for name, (model, _) in ZOO.items() if model.n <= 3}
DRAWABLE |= {f"Harbour Row {name}": harbour_row(name) for name in VARIANTS}
PLANE = {name: model for name, model in DRAWABLE.items() if model.n == 2}


def lines(drawn: Scene, role: str) -> list[Line]:
    return [line for line in drawn.lines if line.role == role]


def marks(drawn: Scene, role: str) -> list[Mark]:
    return [mark for mark in drawn.marks if mark.role == role]


def gap(row: Constraint, point: tuple[float, ...]) -> float:
    """How far inside a drawn point is, relative to the size of the row's terms."""
    terms = [float(a) * x for a, x in zip(row.coefficients, point, strict=False)]
    room = float(row.rhs) - sum(terms)
    size = 1 + abs(float(row.rhs)) + sum(abs(term) for term in terms)
    return (-room if row.sense == ">=" else room) / size


@pytest.mark.parametrize("name", DRAWABLE)
def test_every_vertex_is_marked_where_it_is(name: str) -> None:
    model = DRAWABLE[name]
    region = pw.region(model)
    drawn = scene(region)
    found = marks(drawn, "vertex")
    assert [mark.key for mark in found] == list(range(len(region.vertices)))
    for mark, vertex in zip(found, region.vertices, strict=True):
        assert mark.point[: model.n] == tuple(map(float, vertex.point))
    rings = sorted(mark.point[: model.n] for mark in marks(drawn, "degenerate"))
    assert rings == sorted(tuple(map(float, v.point)) for v in region.vertices if v.degenerate)


@pytest.mark.parametrize("name", DRAWABLE)
def test_the_optimum_is_marked_and_told(name: str) -> None:
    region = pw.region(DRAWABLE[name])
    drawn = scene(region)
    if region.value is None or region.lines:
        assert not marks(drawn, "optimum")
        return
    best = [tuple(map(float, region.vertices[k].point)) for k in region.optimal.vertices]
    assert sorted(mark.point[: DRAWABLE[name].n] for mark in marks(drawn, "optimum")) == sorted(best)
    assert "optimum" in drawn.subtitle


@pytest.mark.parametrize("name", PLANE)
def test_constraint_lines_lie_on_their_borders_and_strokes_on_the_forbidden_side(name: str) -> None:
    model = PLANE[name]
    drawn = scene(model)
    seen = lines(drawn, "constraint") + lines(drawn, "conflict line")
    assert seen or not any(not row.is_constant for row in model.constraints)
    for line in seen:
        for point in line.parts[0]:
            assert abs(gap(model.constraint(line.name), point)) < 1e-9
    for line in lines(drawn, "hatch"):
        for foot, tip in line.parts:
            row = model.constraint(line.name)
            assert abs(gap(row, foot)) < 1e-9
            assert gap(row, tip) < -1e-6


@pytest.mark.parametrize("name", DRAWABLE)
def test_nothing_of_the_region_is_drawn_outside_it(name: str) -> None:
    model = DRAWABLE[name]
    drawn = scene(model)
    points = [p for polygon in drawn.polygons if polygon.role in {"region", "facet"} for p in polygon.points]
    points += [p for role in ("edge", "open edge") for line in lines(drawn, role) for part in line.parts for p in part]
    if pw.region(model).status != "empty":
        assert points or pw.region(model).dimension == 0
        assert all(
            gap(row, point) > -1e-7 for point in points for row in model.constraints
        )  # float drawing of 1e-9 cuts


@pytest.mark.parametrize("name", DRAWABLE)
def test_every_edge_is_drawn_once(name: str) -> None:
    region = pw.region(DRAWABLE[name])
    drawn = scene(region)
    if region.status == "empty" or region.lines:  # an edge of a strip is a line: it leaves at both ends
        assert not lines(drawn, "edge") or region.status == "empty"
        return
    closed = sum(len(line.parts) for line in lines(drawn, "edge"))
    leaving = sum(len(line.parts) for line in lines(drawn, "open edge"))
    assert closed == sum(edge.end is not None for edge in region.edges)
    assert leaving == sum(edge.end is None for edge in region.edges)


@pytest.mark.parametrize("variant", ["base", "two decisions", "tied", "degenerate"])
def test_the_level_passes_through_the_optimum(variant: str) -> None:
    region = pw.region(harbour_row(variant))
    drawn = scene(region)
    goal = region.model.objective
    (level,) = lines(drawn, "level line")
    for point in level.parts[0]:
        value = sum(float(a) * x for a, x in zip(goal.coefficients, point, strict=True)) + float(goal.constant)
        assert isclose(value, float(region.value), rel_tol=1e-9)


def test_the_objective_arrow_points_the_better_way() -> None:
    for variant in ("base", "two decisions"):
        model = harbour_row(variant)
        for aimed in (model, model.with_objective({"pump": 1, "chips": 2}, "min")):
            (arrow,) = lines(scene(aimed), "objective")
            foot, head = arrow.parts[0]
            change = sum(float(a) * (y - x) for a, x, y in zip(aimed.objective.coefficients, foot, head, strict=True))
            assert change > 0 if aimed.objective.goal == "max" else change < 0


def test_a_walk_is_drawn_through_its_points_in_order() -> None:
    model = klee_minty(3)
    walk = pw.walk(model)
    drawn = scene(model, View(walks=(walk,)))
    (path,) = lines(drawn, "walk")
    points = [path.parts[0][0], *(part[1] for part in path.parts)]
    assert points == [tuple(map(float, point)) for point in walk.points]
    numbers = [label.text for label in drawn.labels if label.role == "step"]
    assert numbers == ["1", "2", "3", "4", "5", "6", "7"]


def test_walks_on_one_edge_run_side_by_side() -> None:
    model = harbour_row("two decisions")
    walks = (pw.walk(model, rule="dantzig"), pw.walk(model, rule="bland"))
    drawn = scene(model, View(walks=walks))
    first, second = lines(drawn, "walk")
    shared = list(zip(first.parts, second.parts, strict=True))
    assert shared
    assert all(a != b for a, b in shared)


def test_stays_are_counted_at_their_vertex() -> None:
    model = circling()
    drawn = scene(model, View(walks=(pw.walk(model, rule="bland"),)))
    (stay,) = [label for label in drawn.labels if label.role == "stay"]
    assert stay.text == "1–6: no move"
    assert stay.target == (0.0, 0.0, 0.0)


def test_a_step_leaves_the_rest_of_the_walk_faint() -> None:
    model = klee_minty(3)
    drawn = scene(model, View(walks=(pw.walk(model),), step=3))
    assert len(lines(drawn, "walk")[0].parts) == 3
    assert len(lines(drawn, "walk rest")[0].parts) == 4


def test_open_edges_run_along_the_rays() -> None:
    model = harbour_row("unbounded")
    region = pw.region(model)
    for line in lines(scene(region), "open edge"):
        for foot, tip in line.parts:
            way = [b - a for a, b in zip(foot, tip, strict=True)]
            size = max(map(abs, way))
            assert any(
                all(abs(w / size - float(d)) < 1e-6 for w, d in zip(way, ray.direction, strict=True))
                for ray in region.rays
            )


def test_an_empty_region_shows_its_conflict() -> None:
    drawn = scene(harbour_row("infeasible"))
    assert "harbour main and town contract cannot hold together" in drawn.subtitle
    assert {line.name for line in lines(drawn, "conflict line")} == {"town contract"}
    assert any("without town contract" in row.text for part in drawn.key for row in part.rows)


def test_more_variables_are_projected_and_the_title_says_so() -> None:
    model = cube(4)
    drawn = scene(model, View(axes=model.variables[:3]))
    assert "projection of 4 variables" in drawn.title
    assert len(marks(drawn, "vertex")) == 8


def test_the_key_tells_optimum_degeneracy_open_sides_and_paths() -> None:
    text = [row.text for part in scene(harbour_row(), View(walks=(pw.walk(harbour_row()),))).key for row in part.rows]
    assert "optimum: objective 292 at V8 (4, 4, 4)" in text
    assert "degenerate: at V10 4 constraints meet, 3 would do" in text
    assert "dantzig: 4 pivots, no stay, optimal: V0 → V1 → V2 → V7 → V8" in text
    text = [row.text for part in scene(harbour_row("unbounded")).key for row in part.rows]
    open_side = (
        "no limit along (pump, chips, tank) = (0, 1, 0), and the objective improves without end; it slides along "
    )
    assert open_side + "grid connection, quay pipe, pump lower, tank lower, tank upper" in text
    assert "the point of that nearest to town contract, (0, 8, 4), misses by 2 MW" in [
        row.text for part in scene(harbour_row("infeasible")).key for row in part.rows
    ]


@pytest.mark.parametrize(
    ("view", "said"),
    [
        (View(), "choice of one to three axes"),
        (View(axes=("x1", "x2", "x3", "x4")), "one to three axes, got 4"),
        (View(axes=("x1", "x2"), vertex=99), "expected a vertex from 0 to 3"),
    ],
)
def test_axes_that_do_not_fit_are_refused_with_the_remedy(view: View, said: str) -> None:
    with pytest.raises(pw.PolywalkError, match=said):
        scene(cube(4), view)


def test_an_axis_that_is_not_there_is_refused() -> None:
    with pytest.raises(KeyError, match="did you mean"):
        scene(harbour_row(), View(axes=("pumps", "tank")))


def test_a_model_of_one_decision_is_drawn_on_a_line() -> None:
    model = Model(("x",), (Constraint("low", (pw.exact(2),), ">=", pw.exact(1)),), None)
    drawn = scene(model)
    assert [mark.point for mark in marks(drawn, "vertex")] == [(0.5, 0.0)]
    assert drawn.axes[1].title == ""


def test_an_optimum_inside_the_shadow_is_marked_there() -> None:
    drawn = scene(harbour_row(), View(axes=("pump", "chips")))
    assert [mark.point for mark in marks(drawn, "optimum")] == [(4.0, 4.0)]
    assert "optimum: objective 292 at the shadow (4, 4)" in [row.text for part in drawn.key for row in part.rows]
