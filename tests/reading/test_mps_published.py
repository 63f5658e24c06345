"""MPS files of others: read with their sizes, and with the optimum that is published for them."""

import json
from dataclasses import replace
from fractions import Fraction
from pathlib import Path

import pytest

import polywalk as pw

SHARED = Path(pw.__file__).parents[1].parent / "shared" / "data" / "mps"


def needs_files(test):
    """Skip a test where the reference data is not there."""
    absent = pytest.mark.skipif(not SHARED.is_dir(), reason="the reference data is not there")
    return pytest.mark.needs_shared_data(absent(test))


def known_results():
    return json.loads((SHARED / "results.json").read_text(encoding="utf-8")) if SHARED.is_dir() else {}


def relaxed_optimum(path):
    """The status and the value that HiGHS gives an MPS file itself, integer marks relaxed."""
    from polywalk.reading.highs import quiet_solver

    solver = quiet_solver()
    solver.readModel(str(path))
    solver.setOptionValue("solve_relaxation", True)
    solver.run()
    return solver.modelStatusToString(solver.getModelStatus()), solver.getInfoValue("objective_function_value")[1]


def half_a_digit(text):
    """Half a unit of the last digit that a number is published with."""
    return Fraction(1, 2 * 10 ** len(text.partition(".")[2]))


@needs_files
def test_every_published_file_is_listed():
    assert {path.stem for path in SHARED.glob("*.mps")} == {*known_results(), "stigler"}


@needs_files
@pytest.mark.parametrize("name", known_results())
def test_published_files_read_with_their_published_optimum(tmp_path, name):
    """CHECKS G: sizes, netlib's published optima (netlib lp/data readme) and the exact ones computed from the files.

    Our own optimum is the exact one; what is published is it to the last digit printed; HiGHS reads the same from the
    file that we write.
    """
    from polywalk.narrowing.best import best

    known, big = known_results()[name], pw.from_mps(SHARED / f"{name}.mps")
    assert (big.n, big.m, big.nonzeros, len(big.integers)) == tuple(
        known.get(key, 0) for key in ("cols", "rows", "nz", "int")
    )
    written = tmp_path / f"{name}.mps"
    pw.to_mps(big, written)
    assert replace(pw.from_mps(written), notes=()) == replace(big, notes=())
    status, value = relaxed_optimum(written)
    assert status == known["status"]
    if status == "Infeasible":
        assert best(big if big.goal else big.with_objective({}, "min")).outcome == "infeasible"
        return
    found = best(big)
    assert found.is_exact
    assert found.value == Fraction(known.get("exact", str(known["highs_obj"])))
    assert value == pytest.approx(float(found.value), rel=1e-9)
    if "published_optimum" in known:
        assert abs(found.value - Fraction(known["published_optimum"])) <= half_a_digit(known["published_optimum"])


@needs_files
def test_the_diet_of_1939_costs_what_is_published():
    """The least cost of Stigler's diet is 39.66 dollars a year at prices of 1939 (CHECKS G; the file's are a day's).

    Stigler 1945 found 39.93 by trial, and the best plan buys five foods (both from memory); the fourth decimal is
    computed, no source.
    """
    from polywalk.narrowing.best import best

    big = pw.from_mps(SHARED / "stigler.mps")
    assert (big.n, big.m) == (77, 9)
    found = best(big)
    assert found.is_exact
    year = 365 * found.value
    assert abs(year - Fraction("39.66")) <= half_a_digit("39.66")
    assert abs(year - Fraction("39.6617")) <= half_a_digit("39.6617")
    assert year < Fraction("39.93")
    bought = {name for name, value in zip(big.variables, found.point, strict=True) if value}
    assert len(bought) == 5
