"""The child process with a budget: results come back, and time, memory and trouble end with a message."""

import time

import pytest

from polywalk.budget import Budget, in_child
from polywalk.errors import BudgetError

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
