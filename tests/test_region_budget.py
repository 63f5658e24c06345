"""Work that is too large ends with its budget or with Ctrl-C, and the session lives."""

from __future__ import annotations

import random
import subprocess
import sys
import time

import families as known
import pytest
from zoo import ZOO, build

from polywalk.budget import Budget
from polywalk.errors import BudgetError
from polywalk.model import Model
from polywalk.region import project, region


def hopeless() -> Model:
    """Forty random half-spaces in ten variables: hours of work."""
    draw = random.Random(10)
    rows = [(f"r{k}", [draw.randint(-999, 999) for _ in range(10)], "<=", 1000) for k in range(40)]
    return build(known.names(10), rows)


def test_a_spent_budget_says_size_and_remedy_and_the_session_lives() -> None:
    start = time.monotonic()
    with pytest.raises(BudgetError, match=r"40 constraints in 10 variables.*budget of 0\.5 seconds.*Budget\(seconds="):
        region(hopeless(), Budget(seconds=0.5))
    assert time.monotonic() - start < 1.5
    assert len(region(known.cube(3)).vertices) == 8


@pytest.mark.parametrize("name", ["pyramid", "strip with a line", "cone at the origin", "empty", "flat in space"])
def test_a_child_process_gives_the_same_answer(name: str) -> None:
    model, _ = ZOO[name]
    assert region(model, Budget()) == region(model)


def test_a_shadow_keeps_to_a_budget_too() -> None:
    found = region(known.cube(3))
    assert project(found, ["x1", "x2"], Budget()) == project(found, ["x1", "x2"])


def test_large_models_go_to_a_child_of_themselves(monkeypatch: pytest.MonkeyPatch) -> None:
    sent = []
    from polywalk.region import engine

    monkeypatch.setattr(
        engine, "in_child", lambda function, *given, **said: sent.append(said["task"]) or function(*given)
    )
    region(known.cube(3))
    region(known.transport([1] * 3, [1] * 3))
    assert sent == []
    region(known.cube(9))
    assert sent == ["listing the vertices of 18 constraints in 9 variables"]


INTERRUPTED = """
import os, signal, sys, threading, time
sys.path.insert(0, {tests!r})
from test_region_budget import hopeless
from polywalk.region import region

pressed = []
def press():
    pressed.append(time.monotonic())
    os.kill(os.getpid(), signal.SIGINT)

threading.Timer(1.0, press).start()
try:
    region(hopeless())
except KeyboardInterrupt:
    print("ended after", time.monotonic() - pressed[0])
"""


def test_ctrl_c_ends_the_work_within_a_second() -> None:
    script = INTERRUPTED.format(tests=str(__file__).rpartition("test_region_budget")[0])
    done = subprocess.run([sys.executable, "-c", script], capture_output=True, text=True, timeout=60, check=True)
    said, _, seconds = done.stdout.strip().rpartition(" ")
    assert said == "ended after"
    assert float(seconds) < 1
