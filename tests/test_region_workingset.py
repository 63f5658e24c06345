"""A region from a working set of rows is the region of all rows, part by part, whatever floats propose."""

from __future__ import annotations

import random
import subprocess
import sys
from collections import Counter
from collections.abc import Iterable
from fractions import Fraction
from pathlib import Path

import pytest
from crowds import KINDS, crowd
from zoo import build, nonnegative

from polywalk.budget import Budget
from polywalk.model import Model
from polywalk.region import Region, engine, region, sieve, workingset

EACH = 40
"""Models of each kind."""


@pytest.fixture
def listed(monkeypatch: pytest.MonkeyPatch) -> list[int]:
    """How many rows cddlib was given, each time; working sets are tried from two rows on, all in this process."""
    sizes: list[int] = []
    original = workingset.list_generators

    def counted(rows, equal):
        sizes.append(len(rows))
        return original(rows, equal)

    monkeypatch.setattr(workingset, "list_generators", counted)
    monkeypatch.setattr(workingset, "WORTHWHILE", 2)
    monkeypatch.setattr(engine, "is_small", lambda rows, straight: True)
    monkeypatch.setattr(sieve, "MANY", 0)
    return sizes


def plain(model: Model) -> Region:
    """The region from all rows at once."""
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(workingset, "WORTHWHILE", 10**9)
        for room in (engine, workingset):
            patch.setattr(room, "is_small", lambda rows, straight: True)
        patch.setattr(sieve, "MANY", 10**9)
        return region(model)


def everything(found: Region) -> tuple[object, ...]:
    """All that was listed, and what is read off it."""
    listed = found.vertices, found.rays, found.lines, found.base, found._active
    return (*listed, found.status, found.edges, found.facets, found.equalities, found.dimension, found.outline)


def traits(found: Region) -> Iterable[str]:
    """What kind of region it turned out to be."""
    yield found.status
    yield "line" if found.lines else "no line"
    yield "flat" if 0 <= found.dimension < found.model.n else "solid"
    yield "crowded corner" if any(vertex.degeneracy > 9 for vertex in found.vertices) else "simple corners"


def test_the_same_as_from_all_rows(listed: list[int]) -> None:
    draw, met = random.Random(1), Counter()
    for kind in KINDS:
        for _ in range(EACH):
            model = crowd(draw, kind)
            listed.clear()
            found = region(model)
            rows = sum(not row.is_constant for row in model.constraints)
            met["few rows were enough" if max(listed, default=0) < rows else "all rows"] += 1
            assert everything(found) == everything(plain(model)), (kind, model)
            met.update(traits(found))
    least = {"bounded": 90, "unbounded": 60, "empty": 30, "line": 30, "flat": 45, "crowded corner": 45}
    assert all(met[trait] >= count for trait, count in least.items()), met
    assert met["few rows were enough"] >= 0.8 * len(KINDS) * EACH, met


GUESSES = {
    "no row at all": lambda rows, equal, affordable: set(),
    "one row": lambda rows, equal, affordable: {len(rows) - 1},
    "rows at random": lambda rows, equal, affordable: set(random.Random(len(rows)).sample(range(len(rows)), 9)),
    "every row but a few": lambda rows, equal, affordable: set(range(5, len(rows))),
}


@pytest.mark.parametrize("name", GUESSES)
def test_a_bad_guess_changes_nothing(name: str, listed: list[int], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(workingset, "guess", GUESSES[name])
    draw, rounds = random.Random(name), 0
    for kind in KINDS:
        for _ in range(4):
            model = crowd(draw, kind)
            listed.clear()
            assert everything(region(model)) == everything(plain(model)), (kind, model)
            rounds = max(rounds, len(listed))
    assert rounds > 3 or name == "every row but a few"


def test_rows_that_floats_cannot_tell_apart(listed: list[int]) -> None:
    """Planes of a box, each many times over and tilted by less than a float shows: exact rounds find the ends."""
    model = hairs(300)
    found = region(model)
    assert max(listed) < 40
    assert everything(found) == everything(plain(model))


def test_where_rounds_run_out_all_rows_are_listed(listed: list[int], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(workingset, "ROUNDS", 1)
    model = hairs(100)
    assert region(model) == plain(model)
    assert listed[-2:] == [100, 100]


def test_where_every_row_bounds_all_rows_are_listed_at_once(listed: list[int]) -> None:
    """Tangents of a parabola: floats alone see that no row can be left out, so cddlib is asked once."""
    rows = [(f"tangent {k}", [2 * k, -1], "<=", k * k) for k in range(80)]
    model = build("x y", [*rows, ("roof", [0, 1], "<=", 10_000)])
    assert len(region(model).facets) == 81
    assert listed == [81]


def test_many_needless_rows_stay_in_this_process(monkeypatch: pytest.MonkeyPatch) -> None:
    """All thousand rows at once are too much work to be uninterruptible; the few that bound are not."""
    monkeypatch.setattr(engine, "in_child", lambda *given, **said: pytest.fail("a child process was started"))
    for model in (capacities(300), capacities(1_000)):
        assert everything(region(model)) == everything(plain(model))


def test_what_stays_large_goes_to_a_child_under_its_own_size(monkeypatch: pytest.MonkeyPatch) -> None:
    sent = []
    monkeypatch.setattr(engine, "in_child", lambda *given, **said: sent.append(said["task"]) or ([], set()))
    rows = [(f"tangent {k}", [2 * k, -1, k % 2], "<=", k * k) for k in range(300)]
    region(build("x y z", [*rows, ("floor", [0, 0, 1], ">=", 0)]))
    assert sent == ["listing the vertices of 301 constraints in 3 variables"]


def test_in_a_child_too_few_rows_are_listed() -> None:
    model = capacities(300)
    assert region(model, Budget()) == region(model)


def test_equalities_alone_are_enough(listed: list[int]) -> None:
    sides = [(f"side {k}", [k % 7 - 3, 1 + k % 5], "<=", 100 + k) for k in range(90)]
    model = build("x y", [("one", [1, 1], "==", 2), ("two", [1, -1], "==", 0), ("again", [2, 0], "==", 2), *sides])
    found = region(model)
    assert (found.base, max(listed) < 20) == (((1, 1),), True)
    assert everything(found) == everything(plain(model))


def capacities(m: int) -> Model:
    """x >= 0 and random capacity rows in small integers, of which a dozen bound."""
    draw = random.Random(m)
    rows = [(f"r{k}", [draw.randint(1, 20) for _ in range(3)], "<=", draw.randint(20, 60)) for k in range(m - 3)]
    return build("x y z", [*nonnegative("x y z"), *rows])


def hairs(m: int) -> Model:
    """x >= 0 and x + y + z <= 9, each many times over, every number of each copy off by 1e-12 to 1e-25."""
    draw = random.Random(m)
    sides = [[0, 1, 0, 0], [0, 0, 1, 0], [0, 0, 0, 1], [9, -1, -1, -1]]
    rows = []
    for k in range(m):
        b, *a = [value + Fraction(draw.randint(-9, 9), 10 ** draw.randint(12, 25)) for value in sides[k % 4]]
        rows.append((f"r{k}", a, ">=", -b))
    return build("x y z", rows)


INTERRUPTED = """
import os, signal, sys, threading, time
sys.path.insert(0, {tests!r})
from test_region_workingset import bowl
from polywalk.region import region

model, pressed = bowl(32), []
def press():
    pressed.append(time.monotonic())
    os.kill(os.getpid(), signal.SIGINT)

threading.Timer({after}, press).start()
try:
    region(model)
    print("finished")
except KeyboardInterrupt:
    print("ended after", time.monotonic() - pressed[0])
"""


@pytest.mark.parametrize("after", [0.1, 1.5])
def test_ctrl_c_ends_guessing_and_listing_within_a_second(after: float) -> None:
    script = INTERRUPTED.format(tests=str(Path(__file__).parent), after=after)
    done = subprocess.run([sys.executable, "-c", script], capture_output=True, text=True, timeout=60, check=True)
    said, _, seconds = done.stdout.strip().rpartition(" ")
    assert said == "ended after"
    assert float(seconds) < 1


def bowl(size: int) -> Model:
    """Tangent planes of z = x^2 + y^2 at size x size points, none redundant, under a roof: seconds of work at 32."""
    at = [(a, b) for a in range(size) for b in range(size)]
    rows = [(f"{a} {b}", [2 * a, 2 * b, -1], "<=", a * a + b * b) for a, b in at]
    return build("x y z", [*rows, ("roof", [0, 0, 1], "<=", 10 * size**2)])
