"""The picture of a vertex's bases: what is drawn is what the bases say, nothing covers a name, parts are told."""

from __future__ import annotations

from itertools import combinations
from math import cos, hypot, sin

import pytest

import polywalk as pw
from polywalk.drawing import Scene, scene
from polywalk.drawing.bases import DISC, MOST
from polywalk.drawing.basis_places import RADIUS
from polywalk.drawing.theme import DEPTH, THEMES
from polywalk.drawing.window import PAPER
from polywalk.errors import DrawingError
from polywalk.model import Model
from polywalk.scenarios import beale, chvatal, circling, harbour_row


def tent(sides: int, goal: str = "3*x + y + z") -> Model:
    """A pyramid over a polygon: as many sides meet at its tip (0, 0, 1)."""
    turns = [
        (round(100 * cos(6.2832 * k / sides + 0.3)), round(100 * sin(6.2832 * k / sides + 0.3))) for k in range(sides)
    ]
    rows = {f"side {k + 1}": f"{a}*x + {b}*y + 100*z <= 100" for k, (a, b) in enumerate(turns)}
    return pw.from_algebra(maximize=goal, constraints=rows, bounds={"z": (0, None)}, name=f"Tent of {sides} sides")


CASES = {
    "Harbour Row": (harbour_row(), 10),
    "degenerate optimum": (harbour_row("degenerate"), (4, 4, 4)),
    "simple vertex": (harbour_row(), 0),
    "circling": (circling(), (0, 0, 0)),
    "pyramid": (tent(4), (0, 0, 1)),
    "optimal tip": (tent(6, "0*x + 0*y + z"), (0, 0, 1)),
    "56 bases": (tent(8), (0, 0, 1)),
    "84 bases": (tent(9), (0, 0, 1)),
    "56 optimal bases": (tent(8, "0*x + 0*y + 0*z"), (0, 0, 1)),
    "beale": (beale(), (0, 0, 0, 0)),
    "chvatal": (chvatal(), (0, 0, 0, 0)),
    "a ray": (pw.from_algebra(maximize="x", constraints={"a": "x >= y", "b": "x + y >= 0", "c": "x >= 0"}), (0, 0)),
}


def pictured(name: str) -> tuple[pw.walks.Bases, tuple[pw.walks.Walk, ...], Scene]:
    model, vertex = CASES[name]
    found = pw.bases(model, vertex)
    far = max(range(len(found.members)), key=lambda k: (found.fewest[k], k))
    walks = (found.walk(far), found.walk(far, "bland"))
    return found, walks, scene(found, pw.View(walks=walks))


@pytest.mark.parametrize("name", CASES)
def test_bases_drawn_are_the_bases(name: str) -> None:
    found, _, drawn = pictured(name)
    marks = {mark.key: mark for mark in drawn.marks if mark.role in {"basis", "optimal basis"}}
    assert len(marks) == min(len(found.members), MOST)
    for key, mark in marks.items():
        basis = found.members[key]
        assert (mark.text, mark.role == "optimal basis") == (basis.name, basis.optimal)
        assert mark.hover.splitlines()[0].endswith(", ".join(basis.held))
    told = f"a part is shown, {MOST} of {len(found.members)} bases" in drawn.subtitle
    assert told == (len(found.members) > MOST)


@pytest.mark.parametrize("name", CASES)
def test_the_letters_of_a_basis_are_its_constraints_in_the_key(name: str) -> None:
    found, _, drawn = pictured(name)
    (part,) = (part for part in drawn.key if part.heading.startswith("Constraints"))
    meaning = {row.tag: row.text.split(":")[0] for row in part.rows if row.tag}
    assert sorted(meaning.values()) == sorted(found.vertex.active)
    names = {label.text.split("\n")[0]: label.text.split("\n") for label in drawn.labels if "basis name" in label.role}
    for basis in found.members:
        if basis.name in names:
            assert [meaning[letter] for letter in names[basis.name][1]] == list(basis.held)
    legend = {line.name for line in drawn.lines if line.role == "letter"}
    assert legend == {f"{letter}  {name}" for letter, name in meaning.items()}


@pytest.mark.parametrize("name", CASES)
def test_nothing_leaves_the_paper_and_no_two_names_overlap(name: str) -> None:
    _, _, drawn = pictured(name)
    discs = [mark.point for mark in drawn.marks if mark.role in {"basis", "optimal basis"}]
    targets = [label.point for label in drawn.labels if label.role == "target"]
    steps = [label.point for label in drawn.labels if label.role == "step"]
    notes = [label.point for label in drawn.labels if label.role == "note"]
    for a, b in combinations(discs, 2):
        assert hypot(a[0] - b[0], a[1] - b[1]) > 2 * RADIUS
    for a, b in combinations(targets, 2):
        assert hypot(a[0] - b[0], a[1] - b[1]) > 18
    for a, b in combinations(notes, 2):
        assert abs(a[0] - b[0]) > 45
    for x, y in [*discs, *targets]:
        assert RADIUS < x < PAPER[0] - 20
        assert RADIUS < y < PAPER[1] - 14 - RADIUS
    assert all(hypot(a[0] - b[0], a[1] - b[1]) > RADIUS for a in steps for b in discs)
    for line in drawn.lines:
        assert all(0 <= x <= PAPER[0] and 0 <= y <= PAPER[1] for part in line.parts for x, y in part)
    crowded = sum(hypot(a[0] - b[0], a[1] - b[1]) < 1.5 * DISC for a, b in combinations(steps, 2))
    assert crowded == 0


@pytest.mark.parametrize("name", CASES)
def test_arrows_join_the_bases_they_should(name: str) -> None:
    found, _, drawn = pictured(name)
    centres = {mark.key: mark.point for mark in drawn.marks if mark.key is not None}
    ends = [(part[0], part[-1]) for line in drawn.lines if line.role in {"pivot", "faint pivot"} for part in line.parts]
    joined = {(_nearest(a, centres), _nearest(b, centres)) for a, b in ends}
    wanted = {(p.start, p.end) for p in found.pivots if p.improves and {p.start, p.end} <= centres.keys()}
    assert joined == wanted
    assert len(ends) == len(wanted)


def _nearest(point: tuple[float, ...], centres: dict[int, tuple[float, ...]]) -> int:
    key = min(centres, key=lambda k: hypot(point[0] - centres[k][0], point[1] - centres[k][1]))
    assert hypot(point[0] - centres[key][0], point[1] - centres[key][1]) < RADIUS + 3
    return key


@pytest.mark.parametrize("name", CASES)
def test_walks_run_through_their_bases_by_number(name: str) -> None:
    found, walks, drawn = pictured(name)
    centres = {mark.key: mark.point for mark in drawn.marks if mark.key is not None}
    for index, walk in enumerate(walks):
        route = found.route(walk)
        line = next(line for line in drawn.lines if (line.role, line.index) == ("walk", index))
        stays = line.parts[: len(route.stays)]
        for part, start, end in zip(stays, route.places[:-1], route.places[1:], strict=True):
            assert hypot(part[0][0] - centres[start][0], part[0][1] - centres[start][1]) < RADIUS + 6
            assert hypot(part[-1][0] - centres[end][0], part[-1][1] - centres[end][1]) < RADIUS + 6
        numbers = [label.text for label in drawn.labels if (label.role, label.index) == ("step", index)]
        leaving = [] if route.departure is None else [route.departure]
        assert numbers == [str(pivot.number) for pivot in (*route.stays, *leaving)]
        assert route.story in [row.text for part in drawn.key for row in part.rows]
        firsts = [mark.point for mark in drawn.marks if mark.role == "first basis"]
        assert centres[route.places[0]] in firsts


def test_bases_nearer_to_leaving_stand_farther_right() -> None:
    found, _, drawn = pictured("56 bases")
    centres = {mark.key: mark.point for mark in drawn.marks if mark.key is not None}
    for near, far in combinations(range(3), 2):
        assert min(centres[k][0] for k in centres if found.fewest[k] == near) > max(
            centres[k][0] for k in centres if found.fewest[k] == far
        )


def test_what_leaves_names_where_to() -> None:
    _, _, drawn = pictured("Harbour Row")
    assert {label.text for label in drawn.labels if label.role == "target"} == {"V6", "V7", "V9", "V11"}
    _, _, open_end = pictured("a ray")
    assert {label.text for label in open_end.labels if label.role == "target"} == {"ray 0", "ray 1"}


def test_a_step_leaves_the_rest_of_the_first_walk_faint() -> None:
    found = pw.bases(circling(), (0, 0, 0))
    drawn = scene(found, pw.View(walks=(pw.walk(circling()),), step=2))
    sizes = {line.role: len(line.parts) for line in drawn.lines if line.role in {"walk", "walk rest"}}
    assert sizes == {"walk": 2, "walk rest": 4}


def test_a_walk_that_does_not_come_is_told_not_drawn() -> None:
    model = harbour_row()
    drawn = scene(pw.bases(model, 10), pw.View(walks=(pw.walk(model),)))
    assert [line.parts for line in drawn.lines if line.role == "walk"] == [()]
    assert any("does not come to V10" in row.text for part in drawn.key for row in part.rows)


@pytest.mark.parametrize("mode", ["light", "dark", "grey"])
def test_both_painters_paint_it(mode: str) -> None:
    found, walks, drawn = pictured("degenerate optimum")
    roles = {item.role for group in (drawn.lines, drawn.marks, drawn.labels) for item in group}
    assert roles <= DEPTH.keys()
    assert all(THEMES[mode].style(role) for role in roles)
    svg = pw.picture(found, walks=walks, mode=mode).data
    assert svg == pw.picture(found, walks=walks, mode=mode).data
    figure = pw.draw(found, walks=walks, mode=mode)
    names = {trace.name for trace in figure.data}
    assert {"basis", "optimal basis", "a  harbour main"} <= names
    hovers = [text for trace in figure.data if trace.name == "optimal basis" for text in trace.hovertext]
    assert len(hovers) == 2
    assert "V8" in figure.layout.title.text


def test_bases_of_five_decisions_are_told_by_letters_in_the_key() -> None:
    """Five letters do not fit into a disc: eight constraints through one point, any five of them a basis."""
    sums = {f"sum {k}": " + ".join(f"{j**k}*x{j}" for j in range(1, 6)) + " <= 0" for k in range(3)}
    bounds = {f"x{j}": (None, 0) for j in range(1, 6)}
    found = pw.bases(pw.from_algebra(maximize="x1 + x2 - x3", constraints=sums, bounds=bounds), (0,) * 5)
    drawn = scene(found)
    assert {label.text for label in drawn.labels if "basis name" in label.role} == {b.name for b in found.members}
    (part,) = (part for part in drawn.key if part.heading.startswith("Bases"))
    told = dict(item.split(" ") for row in part.rows for item in row.text.split("   "))
    letters = dict(zip("abcdefgh", found.vertex.active, strict=True))
    held = {name: [letters[letter] for letter in text] for name, text in told.items()}
    assert held == {basis.name: list(basis.held) for basis in found.members}
    assert len(held) == 56


def test_a_model_without_objective_is_drawn_too() -> None:
    model = pw.from_algebra(constraints={"a": "x + y <= 2", "b": "x <= 2"}, bounds={"x": (0, None), "y": (0, None)})
    drawn = scene(pw.bases(model, (2, 0)))
    assert "without an objective every basis is optimal" in drawn.subtitle


def test_axes_are_refused() -> None:
    found = pw.bases(harbour_row(), 10)
    with pytest.raises(DrawingError, match="no axes"):
        pw.draw(found, axes=("pump", "tank"))
