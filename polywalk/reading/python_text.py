"""A model as Python text that makes it again: as algebra where that says all of it, else row by row."""

from __future__ import annotations

from fractions import Fraction
from json import dumps
from typing import Any

from polywalk.errors import PolywalkError
from polywalk.exact import Row, full
from polywalk.model import Model
from polywalk.reading.algebra import from_algebra


def to_python(model: Model) -> str:
    """Python text that makes the model again, exactly; it expects ``import polywalk as pw``.

    Parameters
    ----------
    model : Model

    Returns
    -------
    str
        A call of ``pw.from_algebra`` where that gives this very model, else of ``pw.Model``.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reading.python_text import to_python
    >>> model = pw.from_algebra(maximize="x/3 + y", constraints={"both": "x + 2*y <= 4"}, bounds={"x": (0, None)})
    >>> print(to_python(model))
    pw.from_algebra(
        maximize="1/3*x + y",
        constraints={
            "both": "x + 2*y <= 4",
        },
        bounds={
            "x": (0, None),
        },
    )
    """
    for every in (False, True):
        try:
            arguments = _arguments(model, every)
            if from_algebra(**arguments) == model:
                return _call("pw.from_algebra", arguments)
        except PolywalkError:
            break  # a name that algebra cannot spell
    return _row_by_row(model)


def _arguments(model: Model, every: bool) -> dict[str, Any]:
    """What ``from_algebra`` would have been given; ``every`` variable named in the objective keeps their order."""
    found: dict[str, Any] = {}
    goal = model.objective
    if goal is not None:
        terms = _algebra(goal.coefficients, model, every)
        constant = f" + {full(goal.constant)}" if goal.constant else ""
        found["maximize" if goal.goal == "max" else "minimize"] = terms + constant
    bounds, ours = _bounds(model)
    rows = [row for row in model.constraints if row.name not in ours]
    found["constraints"] = {
        row.name: f"{_algebra(row.coefficients, model)} {row.sense} {full(row.rhs)}" for row in rows
    }
    found["bounds"] = bounds
    found["units"], found["integers"], found["name"] = dict(model.units), model.integers, model.name
    return {name: value for name, value in found.items() if value}


def _algebra(row: Row, model: Model, every: bool = False) -> str:
    terms = [_term(a, name) for a, name in zip(row, model.variables, strict=True) if a or every]
    return " + ".join(terms).replace("+ -", "- ") or "0"


def _term(factor: Fraction, name: str) -> str:
    return f"{'-' * (factor < 0)}{name}" if abs(factor) == 1 else f"{full(factor)}*{name}"


def _bounds(model: Model) -> tuple[dict[str, tuple[object, object]], set[str]]:
    """Variables' bounds as ``from_algebra`` takes them, and the names of their constraints."""
    bounds: dict[str, tuple[object, object]] = {}
    ours: set[str] = set()
    for name in model.variables:
        found = [_bound(model, f"{name} {side}") for side in ("lower", "upper", "fixed")]
        if any(value is not None for value in found):
            lower, upper, fixed = found
            bounds[name] = (lower, upper) if fixed is None else (fixed, fixed)
            ours |= {f"{name} {side}" for side, end in zip(("lower", "upper", "fixed"), found, strict=True) if end}
    return bounds, ours


def _bound(model: Model, name: str) -> object:
    row = next((row for row in model.constraints if row.name == name and row.origin == "bounds"), None)
    return None if row is None else _Written(full(row.rhs))


class _Written(str):
    """A number as it is typed: bare, or in quotes where only a fraction says it exactly."""

    def __repr__(self) -> str:
        return super().__repr__().replace("'", '"') if "/" in self else str(self)


def _call(name: str, arguments: dict[str, Any]) -> str:
    lines = [f"    {key}={_value(value)}," for key, value in arguments.items()]
    return "\n".join([f"{name}(", *lines, ")"])


def _value(value: Any) -> str:
    if isinstance(value, dict):
        rows = [f"        {_quoted(key)}: {_value(item)}," for key, item in value.items()]
        return "\n".join(["{", *rows, "    }"])
    return _quoted(value) if type(value) is str else repr(value)


def _quoted(text: str) -> str:
    return dumps(text, ensure_ascii=False)


def _row_by_row(model: Model) -> str:
    """The model's own parts, number by number."""
    rows = [
        f"        pw.Constraint({_quoted(row.name)}, {_numbers(row.coefficients)}, {_quoted(row.sense)}, "
        f"{_number(row.rhs)}, {_quoted(row.origin)}),"
        for row in model.constraints
    ]
    goal = model.objective
    aim = (
        f"pw.Objective({_quoted(goal.goal)}, {_numbers(goal.coefficients)}, {_number(goal.constant)})" if goal else None
    )
    return "\n".join(
        [
            "pw.Model(",
            f"    {model.variables!r},",
            "    (",
            *rows,
            "    ),",
            f"    {aim},",
            f"    units={model.units!r},",
            f"    integers={model.integers!r},",
            f"    name={_quoted(model.name)},",
            ")",
        ]
    )


def _numbers(row: Row) -> str:
    return f"({', '.join(map(_number, row))},)"


def _number(value: Fraction) -> str:
    return f'pw.exact("{full(value)}")'
