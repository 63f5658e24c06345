"""Ctrl-C in earnest: a shadow in a process of its own, interrupted while HiGHS works."""

from __future__ import annotations

import signal
import subprocess
import sys
import time

import pytest

from polywalk.narrowing import solver
from polywalk.narrowing.solver import Solver
from polywalk.scenarios import harbour_year

WORK = """
import time
from polywalk.narrowing import shadow
from polywalk.scenarios import harbour_year
big = harbour_year()
print("ready", flush=True)
try:
    found = shadow(big, ("level[415]", "level[419]", "objective"), within=60)
    print(time.time(), "shadow", found.is_partial, len(found.facets))
except KeyboardInterrupt:
    print(time.time(), "interrupted")
print(sum(range(10)), flush=True)
"""


@pytest.mark.skipif(sys.platform == "win32", reason="no SIGINT to send")
@pytest.mark.parametrize("after", [0.3, 6.0])
def test_an_interrupt_is_answered_and_the_process_lives(after: float) -> None:
    """Before any point was found it is an ordinary KeyboardInterrupt; later the outline so far, marked partial.

    Answered within a second, measured in the process itself; one more second for a machine with other work to do.
    """
    with subprocess.Popen([sys.executable, "-c", WORK], stdout=subprocess.PIPE, text=True) as work:
        assert work.stdout is not None
        assert work.stdout.readline() == "ready\n"
        time.sleep(after)
        begun = time.time()
        work.send_signal(signal.SIGINT)
        answer, alive = work.communicate(timeout=60)[0].splitlines()
    assert work.returncode == 0
    assert alive == "45"
    when, how, *rest = answer.split()
    assert 0 <= float(when) - begun < 2
    assert how == ("interrupted" if after < 1 else how)
    assert rest == [] or (rest[0] == "True" and int(rest[1]) >= 1)


def test_a_run_that_takes_long_goes_on_where_an_interrupt_can_stop_it(monkeypatch: pytest.MonkeyPatch) -> None:
    """The run before was short, this one is not: it is stopped, and finished in a thread of its own."""
    apart = []
    monkeypatch.setattr(solver, "LONGEST", 0.0)
    monkeypatch.setattr(Solver, "_run_apart", lambda self, old=Solver._run_apart: (apart.append(1), old(self)))
    big = harbour_year(200)
    slow, plain = Solver(big), Solver(big)
    slow._lasts = 0.0
    for one in (slow, plain):
        one.aim(range(big.n), (-big.cost).tolist())
    assert (slow.run(), apart) == ("optimal", [1])
    assert plain.run() == "optimal"
    assert slow.value == pytest.approx(plain.value)
