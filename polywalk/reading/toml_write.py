"""Models into a small text file of our own, exact to the last fraction."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping, Sequence
from fractions import Fraction
from itertools import count
from json import dumps

from polywalk.errors import PolywalkError
from polywalk.exact import full
from polywalk.model import Constraint, Model
from polywalk.reading.expression import variable
from polywalk.reading.textfile import Source, put_text
from polywalk.sides import bound_rows, unit_row

Ends = tuple[Fraction | None, Fraction | None]


def to_toml(model: Model, path: Source) -> None:
    """Write a model as a model file; packed where the path ends in ".gz".

    `from_toml` gives an equal model back: names, order, fractions, units, marks and origins.

    Parameters
    ----------
    model : Model
    path : str or path

    Raises
    ------
    FileError
        Where the file cannot be written.

    Examples
    --------
    >>> import polywalk as pw, tempfile, pathlib
    >>> path = pathlib.Path(tempfile.mkdtemp()) / "plant.toml"
    >>> model = pw.from_algebra(maximize="x/3", constraints={"labour": "x <= 0.1"}, bounds={"x": (0, None)})
    >>> pw.to_toml(model, path)
    >>> print(path.read_text())
    maximize = "1/3*x"
    variables = ["x"]
    <BLANKLINE>
    [constraints]
    labour = "x <= 0.1"
    <BLANKLINE>
    [bounds]
    x = [0, inf]
    <BLANKLINE>
    >>> pw.from_toml(path) == model
    True

    References
    ----------
    See `from_toml`.
    """
    put_text(path, toml_text(model))


def toml_text(model: Model) -> str:
    """The text of a model file."""
    return "\n".join(_lines(model)) + "\n"


def _lines(model: Model) -> Iterator[str]:
    words = _words(model.variables)
    rows, bounds = _parted(model)
    if model.name:
        yield f"name = {_text(model.name)}"
    if model.objective is not None:
        goal = model.objective
        yield f"{goal.goal}imize = {_text(_algebra(goal.coefficients, words, goal.constant))}"
    yield f"variables = {_list(words)}"
    if model.integers:
        yield f"integers = {_list([words[model.index(name)] for name in model.integers])}"
    yield from _table("constraints", {row.name: _text(_comparison(row, words)) for row in rows})
    yield from _table("bounds", {words[place]: _pair(ends) for place, ends in bounds.items()})
    named = dict(zip(model.variables, words, strict=True))
    yield from _table("units", {_unit_name(name, named, rows): _text(unit) for name, unit in model.units})
    yield from _table("origins", {row.name: _text(row.origin) for row in rows if row.origin})
    yield from _table("names", {word: _text(name) for name, word in named.items() if word != name})


def _parted(model: Model) -> tuple[tuple[Constraint, ...], dict[int, Ends]]:
    """The rows, and the bounds that end the model just as the reader of algebra makes them."""
    bounds: dict[int, Ends] = {}
    for start in range(len(model.constraints) + 1):
        bounds = _as_bounds(model, model.constraints[start:])
        made = [
            row
            for place, ends in bounds.items()
            for row in bound_rows(model.variables[place], unit_row(place, model.n), *ends, origin="bounds")
        ]
        if tuple(made) == model.constraints[start:]:
            return model.constraints[:start], bounds
    return model.constraints, {}


def _as_bounds(model: Model, rows: Sequence[Constraint]) -> dict[int, Ends]:
    found: dict[int, Ends] = {}
    for row in rows:
        place = next((j for j, value in enumerate(row.coefficients) if value), 0)
        lower, upper = found.get(place, (None, None))
        found[place] = (row.rhs if row.sense != "<=" else lower, row.rhs if row.sense != ">=" else upper)
    return dict(sorted(found.items()))


def _words(names: Sequence[str]) -> list[str]:
    """Names that algebra can hold, still different from one another."""
    taken = set(names)
    spare = (f"v{number}" for number in count(1))
    return [name if _is_word(name) else next(word for word in spare if word not in taken) for name in names]


def _is_word(name: str) -> bool:
    try:
        return variable(name, "names") == name
    except PolywalkError:
        return False


def _unit_name(name: str, named: Mapping[str, str], rows: Sequence[Constraint]) -> str:
    return name if any(row.name == name for row in rows) else named.get(name, name)


def _algebra(coefficients: Sequence[Fraction], words: Sequence[str], constant: Fraction = Fraction(0)) -> str:
    terms = [(value, word) for value, word in zip(coefficients, words, strict=True) if value]
    if constant or not terms:
        terms.append((constant, ""))
    text = ""
    for value, word in terms:
        sign = ("-" if value < 0 else "") if not text else (" - " if value < 0 else " + ")
        size = full(abs(value))
        text += sign + (word if word and size == "1" else f"{size}*{word}" if word else size)
    return text


def _comparison(row: Constraint, words: Sequence[str]) -> str:
    return f"{_algebra(row.coefficients, words)} {row.sense} {full(row.rhs)}"


def _pair(ends: Ends) -> str:
    lower, upper = (None if end is None else _number(end) for end in ends)
    return f"[{lower or '-inf'}, {upper or 'inf'}]"


def _number(value: Fraction) -> str:
    return full(value) if "/" not in full(value) else _text(full(value))


def _table(title: str, entries: Mapping[str, str]) -> Iterator[str]:
    if entries:
        yield from ("", f"[{title}]")
        yield from (f"{_key(name)} = {value}" for name, value in entries.items())


def _key(name: str) -> str:
    return name if re.fullmatch(r"[A-Za-z0-9_-]+", name) else _text(name)


def _text(text: str) -> str:
    """The text as TOML writes it, which is as JSON does but for one sign."""
    return dumps(text, ensure_ascii=False).replace("\x7f", "\\u007f")


def _list(names: Sequence[str]) -> str:
    return f"[{', '.join(map(_text, names))}]"
