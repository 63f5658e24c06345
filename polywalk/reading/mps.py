"""Models in MPS files, read by HiGHS after a look through the file."""

from __future__ import annotations

import tempfile
from collections.abc import Iterable
from dataclasses import replace
from pathlib import Path
from typing import Any

from polywalk.bigmodel import BigModel
from polywalk.errors import FileError
from polywalk.reading.highs import from_highs, highspy, quiet_solver
from polywalk.reading.mps_lines import NO_BOUND, TINY, Scan
from polywalk.reading.mps_scan import scan
from polywalk.reading.textfile import Source, text_of

OPTIONS = {"small_matrix_value": TINY, "large_matrix_value": float("inf"), "infinite_bound": NO_BOUND}
"""HiGHS would drop coefficients up to 1e-9 and refuse those from 1e15 on; a reader has no reason to."""

SHOWN = 3
"""Places a note names before it only counts."""


def from_mps(path: Source) -> BigModel:
    """The linear model of an MPS file, fixed or free, packed by gzip or not.

    HiGHS reads the numbers, and the file is looked through first, since HiGHS passes over names that are not there and
    text where a number belongs. What HiGHS alters is kept in the model's ``notes`` and printed with it:

    - coefficients of at most 1e-12, and those given a second time, are left out;
    - free rows (N) after the first one, which is the objective, are left out;
    - numbers with more digits than a float keeps are rounded: 0.33333333333333333333 is read as 0.3333333333333333;
    - bounds and sides of 1e20 and more mean none;
    - an integer variable without a bound gets the upper bound 1; a negative upper bound alone keeps the lower bound 0.

    Integer marks are kept; semi-continuous variables and sections that are not linear are refused. A right-hand side
    of the objective is minus its constant. An objective without any coefficient and constant is no objective.

    Parameters
    ----------
    path : str or path
        Names with spaces, which the format cannot hold, come back from files written by `to_mps`.

    Returns
    -------
    BigModel
        ``from_mps(path).to_model()`` is the exact Model of a small one.

    Raises
    ------
    FileError
        No such file, damaged, cut short, empty, not UTF-8, not linear, or not MPS: with the line and the section.
    SolverError
        Where highspy is not installed.

    Examples
    --------
    >>> import polywalk as pw, tempfile, pathlib
    >>> path = pathlib.Path(tempfile.mkdtemp()) / "plant.mps"
    >>> pw.to_mps(pw.scenarios.harbour_row(), path)
    >>> pw.from_mps(path).to_model().constraint("harbour main").rhs
    Fraction(12, 1)

    References
    ----------
    Murtagh, Advanced Linear Programming: Computation and Practice, 1981 (the format; from memory); Huangfu & Hall,
    Parallelizing the dual revised simplex method, Math. Prog. Comp. 10, 2018 (HiGHS).
    """
    highspy()
    text = text_of(path)
    found = scan(path, text)
    solver = _read(path, text, found)
    big = from_highs(solver, name=found.name or Path(path).name.split(".")[0], notes=tuple(_notes(found.altered)))
    return _checked(_named(big, found), found)


def _read(path: Source, text: str, found: Scan) -> Any:
    """HiGHS after reading a copy: it goes by the file's ending, and by bytes no text editor shows."""
    solver = quiet_solver()
    for option, value in OPTIONS.items():
        solver.setOptionValue(option, value)
    told: list[str] = []
    solver.setOptionValue("output_flag", True)
    solver.setOptionValue("log_to_console", False)
    solver.cbLogging += lambda event: told.append(event.message.strip())
    with tempfile.TemporaryDirectory() as folder:
        copy = Path(folder) / "model.mps"
        copy.write_text(text, encoding="utf-8")
        status = solver.readModel(str(copy))
    solver.setOptionValue("output_flag", False)
    if status == highspy().HighsStatus.kError:
        reasons = [line.removeprefix("ERROR:").strip() for line in told if line.startswith("ERROR")]
        reason = "; ".join(line for line in reasons if "model.mps" not in line) or "no reason given"
        raise FileError(f"{path}: HiGHS could not read it ({reason}); compare it with the MPS format.", path)
    return solver


def _notes(altered: dict[str, list[str]]) -> Iterable[str]:
    for what, places in altered.items():
        more = f" and {len(places) - SHOWN} more" if len(places) > SHOWN else ""
        yield f"{len(places)} {what}: {', '.join(places[:SHOWN])}{more}"


def _named(big: BigModel, found: Scan) -> BigModel:
    """With the names and units that stand in comments."""
    rows, columns = (dict(found.pairs(kind)) for kind in ("row", "variable"))
    if found.remarks.get("name"):
        big = replace(big, name="".join(found.remarks["name"][0]))
    return replace(
        big,
        variables=tuple(columns.get(name, name) for name in big.variables),
        rows=tuple(rows.get(name, name) for name in big.rows),
        integers=tuple(columns.get(name, name) for name in big.integers),
        units=found.pairs("unit"),
    )


def _checked(big: BigModel, found: Scan) -> BigModel:
    """Refuse a reading that lost variables or rows on the way: fixed and free format can be taken for one another."""
    rows = len(found.senses) - sum(kind == "N" for kind in found.senses.values())
    if (big.n, big.m) != (len(found.columns), rows):
        raise FileError(
            f"{found.path}: the file names {len(found.columns)} variables and {rows} rows, and HiGHS read {big.n} and "
            f"{big.m}; names with spaces can be taken apart in two ways: replace the spaces.",
            found.path,
        )
    return big
