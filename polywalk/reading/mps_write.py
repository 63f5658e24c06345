"""Models into MPS files, free format: every float as the shortest decimal that reads back as it."""

from __future__ import annotations

import json
from collections.abc import Iterable, Iterator

import numpy as np

from polywalk.bigmodel import BigModel
from polywalk.model import Model
from polywalk.reading.mps_scan import CURVED, LINEAR, REMARK
from polywalk.reading.textfile import Source, put_text

NONE = "inf"
"""How a row without a side says so."""

SETS = ("RHS", "RANGES", "BOUNDS")


def to_mps(model: Model | BigModel, path: Source) -> None:
    """Write a model as an MPS file (free format); packed where the path ends in ".gz".

    `from_mps` gives the same model back: names, sides, bounds, units, integer marks and floats. Two things the format
    cannot hold: names with spaces, for which safe ones are made up and the own ones kept in comments; and fractions
    such as 1/3, which become the nearest float: `to_toml` keeps them. A row whose two sides no RANGES entry in floats
    tells exactly is written as two rows, "row lower" and "row upper", as the exact Model has them.

    Parameters
    ----------
    model : Model or BigModel
    path : str or path

    Raises
    ------
    FileError
        Where the file cannot be written.

    Examples
    --------
    >>> import polywalk as pw, tempfile, pathlib
    >>> path = pathlib.Path(tempfile.mkdtemp()) / "plant.mps.gz"
    >>> pw.to_mps(pw.scenarios.harbour_row(), path)
    >>> print(pw.from_mps(path))
    Harbour Row: maximize 3 of 3 variables, 5 rows, 10 nonzeros
    part       count  of which
    variables  3      0 free, 1 with two bounds, 0 fixed, 0 integer
    rows       5      0 equalities, 0 with two sides, 0 without a side

    References
    ----------
    Murtagh, Advanced Linear Programming: Computation and Practice, 1981 (the format; from memory).
    """
    big = BigModel.from_model(model) if isinstance(model, Model) else model
    put_text(path, "\n".join(_lines(_split(big))) + "\n")


def _split(big: BigModel) -> BigModel:
    """The same model, its two-sided rows as two where a range in floats would miss a side."""
    low, high = big.row_lower, big.row_upper
    two = np.isfinite(low) & np.isfinite(high)
    with np.errstate(invalid="ignore", over="ignore"):
        told = (high - (high - low) == low) | (low + (high - low) == high)
    missed = np.flatnonzero(two & (~told | (low > high)))
    return _apart(big, set(missed.tolist())) if len(missed) else big


def _apart(big: BigModel, apart: set[int]) -> BigModel:
    order, names, lower, upper = [], [], [], []
    for place, name in enumerate(big.rows):
        ends = (float(big.row_lower[place]), float(big.row_upper[place]))
        sides = [(f"{name} lower", ends[0], np.inf), (f"{name} upper", -np.inf, ends[1])]
        for label, low, high in sides if place in apart else [(name, *ends)]:
            order.append(place)
            names.append(label)
            lower.append(low)
            upper.append(high)
    matrix = big.csr()[order]
    return BigModel(
        big.variables,
        tuple(names),
        matrix.indptr,
        matrix.indices,
        matrix.data,
        np.array(lower),
        np.array(upper),
        big.lower,
        big.upper,
        big.cost,
        big.goal,
        big.constant,
        big.integers,
        tuple(pair for pair in big.units if pair[0] in {*big.variables, *names}),
        big.name,
    )


def _lines(big: BigModel) -> Iterator[str]:
    rows, columns = _safe(big.rows, "r"), _safe(big.variables, "x")
    aim = _free_name("objective", set(rows))
    yield from _remarks(big, rows, columns)
    yield f"NAME {_plain(big.name, 'model')}"
    if big.goal == "max":
        yield from ("OBJSENSE", "    MAX")
    yield "ROWS"
    yield f" N {aim}"
    yield from (f" {_kind(big, place)} {name}" for place, name in enumerate(rows))
    yield "COLUMNS"
    yield from _columns(big, aim, rows, columns)
    yield "RHS"
    if big.constant:
        yield f" RHS {aim} {number(-big.constant)}"
    for place, name in enumerate(rows):
        side = _side(big, place)
        if side != "0":
            yield f" RHS {name} {side}"
    yield from _ranges(big, rows)
    yield "BOUNDS"
    whole = set(big.integers)
    for place, name in enumerate(columns):
        ends = float(big.lower[place]), float(big.upper[place])
        yield from (f" {line}" for line in _bounds(name, *ends, big.variables[place] in whole))
    yield "ENDATA"


def _remarks(big: BigModel, rows: list[str], columns: list[str]) -> Iterator[str]:
    if _plain(big.name, "model") != big.name:
        yield f"{REMARK}name {json.dumps([big.name])}"
    yield f'{REMARK}ranges ["lead back to both sides in floats"]'
    for kind, written, own in (("row", rows, big.rows), ("variable", columns, big.variables)):
        for safe, name in zip(written, own, strict=True):
            if safe != name:
                yield f"{REMARK}{kind} {json.dumps([safe, name])}"
    for pair in big.units:
        yield f"{REMARK}unit {json.dumps(pair)}"


def _columns(big: BigModel, aim: str, rows: list[str], columns: list[str]) -> Iterator[str]:
    matrix, whole, marked = big.csc(), set(big.integers), False
    for place, name in enumerate(columns):
        if (big.variables[place] in whole) != marked:
            marked = not marked
            yield f" MARK 'MARKER' '{'INTORG' if marked else 'INTEND'}'"
        part = slice(matrix.indptr[place], matrix.indptr[place + 1])
        if big.cost[place] or part.start == part.stop:
            yield f" {name} {aim} {number(big.cost[place])}"
        for row, value in zip(matrix.indices[part], matrix.data[part], strict=True):
            yield f" {name} {rows[row]} {number(value)}"
    if marked:
        yield " MARK 'MARKER' 'INTEND'"


def _kind(big: BigModel, place: int) -> str:
    """The row's letter; one with two sides is told from the side that its range leads back from."""
    low, high = float(big.row_lower[place]), float(big.row_upper[place])
    if low == high:
        return "E"
    if np.isfinite(low) and np.isfinite(high):
        return "L" if high - (high - low) == low else "G"
    return "G" if np.isfinite(low) else "L"


def _side(big: BigModel, place: int) -> str:
    side = float((big.row_lower if _kind(big, place) == "G" else big.row_upper)[place])
    return number(side) if np.isfinite(side) else NONE


def _ranges(big: BigModel, rows: list[str]) -> Iterator[str]:
    low, high = big.row_lower, big.row_upper
    two = np.flatnonzero(np.isfinite(low) & np.isfinite(high) & (low < high))
    if len(two):
        yield "RANGES"
        yield from (f" RANGES {rows[place]} {number(high[place] - low[place])}" for place in two)


def _bounds(name: str, low: float, high: float, whole: bool) -> Iterator[str]:
    if low == high:
        yield f"FX BOUNDS {name} {number(low)}"
        return
    if np.isinf(low) and np.isinf(high):
        yield f"FR BOUNDS {name}"
        return
    if np.isinf(low):
        yield f"MI BOUNDS {name}"
    elif low or high < 0:
        yield f"LO BOUNDS {name} {number(low)}"
    if np.isfinite(high):
        yield f"UP BOUNDS {name} {number(high)}"
    elif whole:  # without it an old rule gives an integer variable the upper bound 1
        yield f"PL BOUNDS {name}"


def number(value: float) -> str:
    """The shortest decimal that reads back as the float."""
    return repr(float(value)).removesuffix(".0")


def _plain(name: str, stem: str) -> str:
    """The name where a line of the file can hold it."""
    return name if name == " ".join(name.split()) and name.isprintable() else stem


def _safe(names: Iterable[str], stem: str) -> list[str]:
    """Names without spaces and control signs, still different from one another."""
    listed = list(names)
    taken = {name for name in listed if _fits(name)}
    safe = []
    for name in listed:
        word = "".join(sign if sign.isprintable() and not sign.isspace() else "_" for sign in name)
        safe.append(name if _fits(name) else _free_name(word or stem, taken))
        taken.add(safe[-1])
    return safe


def _fits(name: str) -> bool:
    """Whether the format holds the name: one word, no sign of a comment, no number and no word of the format."""
    words = {*LINEAR, *CURVED, *SETS, "MARKER"}
    try:
        float(name)
    except ValueError:
        return name.split() == [name] and name.isprintable() and name[0] not in "*$'\"" and name.upper() not in words
    return False


def _free_name(name: str, taken: set[str]) -> str:
    """The name, or with a number behind it where it is taken or does not fit."""
    number_behind, found = 1, name
    while found in taken or not _fits(found):
        number_behind += 1
        found = f"{name.lstrip(chr(42) + '$' + chr(39) + chr(34))}_n{number_behind}"
    return found
