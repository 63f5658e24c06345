"""Models in a small text file of our own: TOML tables of algebra, exact to the last fraction."""

from __future__ import annotations

import re
import tomllib
from collections.abc import Mapping
from dataclasses import replace
from decimal import Decimal
from typing import Any

from polywalk.errors import FileError, PolywalkError, unknown
from polywalk.model import Constraint, Model
from polywalk.reading.algebra import from_algebra
from polywalk.reading.textfile import Source, text_of

KINDS: dict[str, tuple[type | tuple[type, ...], str]] = {
    "name": (str, "text"),
    "minimize": (str, "algebra as text"),
    "maximize": (str, "algebra as text"),
    "variables": (list, "a list of names"),
    "integers": (list, "a list of names"),
    "constraints": (dict, "a table of algebra by name"),
    "bounds": (dict, "a table of pairs [lower, upper] by variable"),
    "units": (dict, "a table of units by name"),
    "origins": (dict, "a table of origins by constraint"),
    "names": (dict, "a table of full names by the name in the algebra"),
}
"""The keys of a file, and what each holds."""


def from_toml(path: Source) -> Model:
    """The exact model of a model file.

    The file is TOML. ``minimize`` or ``maximize`` holds the objective, ``[constraints]`` the algebra of every
    constraint by its name, ``[bounds]`` pairs such as ``[0, 4]`` or ``["1/3", inf]``, ``[units]`` units; ``name``,
    ``variables`` (their order), ``integers``, ``[origins]`` and ``[names]`` (full names of variables that algebra
    cannot hold) may be left out. Algebra and numbers are read as in `from_algebra`: exactly.

    Parameters
    ----------
    path : str or path
        In UTF-8, packed by gzip or not.

    Returns
    -------
    Model

    Raises
    ------
    FileError
        No such file, empty, not UTF-8, not TOML (with the line), a key that is none of these, a value of another
        kind, algebra that is not linear: with the place.

    Examples
    --------
    >>> import polywalk as pw, tempfile, pathlib
    >>> path = pathlib.Path(tempfile.mkdtemp()) / "plant.toml"
    >>> _ = path.write_text('''
    ... maximize = "3*pump + 2*chips"
    ... [constraints]
    ... "heat demand" = "pump/3 + chips <= 4"
    ... [bounds]
    ... pump = [0, inf]
    ... ''')
    >>> print(pw.from_toml(path))
    maximize 3 pump + 2 chips
    constraint   rule                  origin
    heat demand  1/3 pump + chips ≤ 4
    pump lower   pump ≥ 0              bounds
    free (no bound of their own): chips

    References
    ----------
    TOML v1.0.0, toml.io, 2021 (the syntax; the keys are our own).
    """
    text = text_of(path)
    try:
        given = tomllib.loads(text, parse_float=Decimal)
    except tomllib.TOMLDecodeError as error:
        found = re.search(r"at line (\d+)", str(error))
        line = int(found[1]) if found else len(text.splitlines())
        raise FileError(f"{path}, line {line}: expected TOML, got something else ({error}).", path, line) from None
    try:
        return _model(given)
    except PolywalkError as error:
        raise FileError(f"{path}: {error}", path, _line_of(text, error.culprit)) from error


def _line_of(text: str, culprit: object) -> int | None:
    """The line the culprit's text stands in, where it stands in one line only."""
    lines = [number for number, line in enumerate(text.splitlines(), 1) if str(culprit) in line]
    return lines[0] if len(lines) == 1 else None


def _model(given: dict[str, Any]) -> Model:
    for key, value in given.items():
        if key not in KINDS:
            raise unknown("key", key, KINDS, "a model file")
        kind, wanted = KINDS[key]
        if not isinstance(value, kind):
            raise FileError(f"{key}: expected {wanted}, got {value!r}.", key)
    _texts(given)
    listed = given.get("variables", [])
    bounds = dict.fromkeys(listed, (None, None)) | given.get("bounds", {})
    model = from_algebra(
        given.get("minimize"),
        given.get("maximize"),
        given.get("constraints", {}),
        bounds=bounds,
        integers=given.get("integers", []),
        units=given.get("units", {}),
        name=given.get("name", ""),
    )
    return _renamed(_with_origins(_ordered(model, listed), given.get("origins", {})), given.get("names", {}))


def _texts(given: dict[str, Any]) -> None:
    """Refuse anything but text where text is wanted."""
    for key in ("variables", "integers", "constraints", "units", "origins", "names"):
        entries = given.get(key, {})
        pairs = entries.items() if isinstance(entries, Mapping) else enumerate(entries, 1)
        for name, value in pairs:
            if not isinstance(value, str):
                raise FileError(f"{key}, {name!r}: expected text, got {value!r}.", name)


def _ordered(model: Model, listed: list[str]) -> Model:
    """With the variables in the order of the file's list; those not listed follow."""
    order = [model.index(name) for name in listed]
    order += [place for place in range(model.n) if place not in set(order)]
    rows = tuple(replace(row, coefficients=tuple(row.coefficients[j] for j in order)) for row in model.constraints)
    goal = model.objective and replace(
        model.objective, coefficients=tuple(model.objective.coefficients[j] for j in order)
    )
    names = tuple(model.variables[j] for j in order)
    return replace(model, variables=names, constraints=rows, objective=goal)


def _with_origins(model: Model, origins: Mapping[str, str]) -> Model:
    for name in origins:
        model.constraint(name)
    rows = tuple(replace(row, origin=origins.get(row.name, row.origin)) for row in model.constraints)
    return replace(model, constraints=rows)


def _renamed(model: Model, names: Mapping[str, str]) -> Model:
    """With the full names of variables; the bounds that bear a variable's name follow it."""
    for name in names:
        model.index(name)
    if not names:
        return model
    return replace(
        model,
        variables=tuple(names.get(name, name) for name in model.variables),
        constraints=tuple(_bound_renamed(row, names) for row in model.constraints),
        units=tuple((names.get(name, name), unit) for name, unit in model.units),
        integers=tuple(names.get(name, name) for name in model.integers),
    )


def _bound_renamed(row: Constraint, names: Mapping[str, str]) -> Constraint:
    stem, _, side = row.name.rpartition(" ")
    follows = row.origin == "bounds" and stem in names and side in {"lower", "upper", "fixed"}
    return replace(row, name=f"{names[stem]} {side}") if follows else row
