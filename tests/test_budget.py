"""The child process with a budget: results come back, and time, memory and trouble end with a message."""

import time
from contextlib import suppress
from pathlib import Path
from random import Random
from threading import Thread

import pytest

from polywalk.budget import Budget, Job, in_child
from polywalk.errors import BudgetError
from polywalk.reading import from_algebra
from polywalk.region import region

ROOM = Budget(seconds=30)


def call(function, *arguments, budget=ROOM):
    return in_child(function, *arguments, budget=budget, task="counting 3 rows", remedy="count fewer.")


def test_the_result_comes_back():
    assert call(divmod, 17, 5) == (3, 2)


def test_time_ends_within_a_second():
    began = time.monotonic()
    with pytest.raises(BudgetError, match=r"counting 3 rows passed its budget of 1 seconds; count fewer\.") as caught:
        call(time.sleep, 60, budget=Budget(seconds=1))
    assert time.monotonic() - began < 3
    assert caught.value.culprit == Budget(seconds=1)


def test_memory_ends():
    with pytest.raises(BudgetError, match=r"memory of 300 MB gave out .*count fewer"):
        call(bytearray, 2**31, budget=Budget(seconds=30, megabytes=300))


def test_trouble_in_the_child_is_told():
    with pytest.raises(BudgetError, match=r"child process gave out .*ZeroDivisionError"):
        call(divmod, 1, 0)


def family(job):
    """Which processes of the child's session still run, as Linux lists them."""
    found = []
    for path in Path("/proc").glob("[0-9]*/stat"):
        with suppress(OSError):
            state, _, group = path.read_text().rpartition(")")[2].split()[:3]
            if int(group) == job._child.pid and state != "Z":
                found.append(path)
    return found


def test_a_job_goes_on_beside_and_is_stopped_with_its_own_children():
    draw = Random(1)
    rows = {f"row {k}": " + ".join(f"{draw.randint(1, 20)}*x{j}" for j in range(12)) + " <= 40" for k in range(200)}
    model = from_algebra(constraints=rows, bounds={f"x{j}": (0, None) for j in range(12)})
    job = Job(region, model, budget=ROOM, task="counting 3 rows", remedy="count fewer.")
    seen = []

    def stop():
        for _ in range(200):
            seen[:] = family(job)
            if len(seen) == 2:
                break
            time.sleep(0.05)
        job.stop()

    Thread(target=stop).start()
    with pytest.raises(BudgetError, match="counting 3 rows was stopped; count fewer"):
        job.result()
    assert len(seen) == 2
    time.sleep(0.2)
    assert family(job) == []


def test_a_job_that_is_stopped_before_anyone_waits():
    job = Job(time.sleep, 60, budget=ROOM, task="counting 3 rows", remedy="count fewer.")
    job.stop()
    with pytest.raises(BudgetError, match="was stopped"):
        job.result()
