"""Ctrl-C in earnest: a shadow in a process of its own, interrupted while HiGHS works."""

from __future__ import annotations

import signal
import subprocess
import sys
import time

import pytest

WORK = """
import time
from polywalk.narrowing import shadow
from polywalk.scenarios import harbour_year
big = harbour_year()
print("ready", flush=True)
found = shadow(big, ("level[415]", "level[419]", "objective"), within=60)
print(found.is_partial, len(found.facets), flush=True)
print(sum(range(10)), flush=True)
"""


@pytest.mark.skipif(sys.platform == "win32", reason="no SIGINT to send")
@pytest.mark.parametrize("after", [0.3, 6.0])
def test_an_interrupt_is_answered_and_the_process_lives(after: float) -> None:
    """Before any point was found it is an ordinary KeyboardInterrupt; later the outline so far, marked partial."""
    with subprocess.Popen(
        [sys.executable, "-c", WORK], stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True
    ) as work:
        assert work.stdout is not None
        assert work.stdout.readline() == "ready\n"
        time.sleep(after)
        work.send_signal(signal.SIGINT)
        begun = time.monotonic()
        said, trouble = work.communicate(timeout=60)
        took = time.monotonic() - begun
    assert took < 5, "a second, and a busy machine"
    if said:
        assert said.split()[0] == "True"
        assert said.split()[-1] == "45"
    else:
        assert trouble.strip().endswith("KeyboardInterrupt")
