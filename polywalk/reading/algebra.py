"""Models typed as algebra."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from fractions import Fraction

from polywalk.errors import ModelError
from polywalk.model import Constraint, Goal, Model, Objective, Sense
from polywalk.reading.assembly import pair
from polywalk.reading.expression import Linear, comparison, expression, variable
from polywalk.sides import bound_rows, unit_row

_FLIPPED: dict[str, Sense] = {"<=": ">=", ">=": "<=", "==": "=="}
_SENSES: dict[str, Sense] = {"<=": "<=", ">=": ">=", "==": "=="}
_Row = tuple[str, Linear, Sense, Fraction]


def from_algebra(
    minimize: str | None = None,
    maximize: str | None = None,
    constraints: Mapping[str, str] | Sequence[str] = (),
    *,
    bounds: Mapping[str, object] | None = None,
    units: Mapping[str, str] | None = None,
    integers: Iterable[str] = (),
    name: str = "",
) -> Model:
    """A model from algebra typed as text.

    Text joins numbers and names with ``+ - * /``, parentheses and powers of numbers. A name is a Python identifier,
    alone or indexed (``pump[7]``, ``x[1,2]``, ``flow[north]``); spaces in an index do not matter. Decimals mean
    decimals. ``≤``, ``≥`` and a pasted ``−`` or ``·`` are understood. The text is parsed, never evaluated.

    Parameters
    ----------
    minimize, maximize : str, optional
        The objective; at most one of the two. A constant in it is kept.
    constraints : mapping of name to str, or sequence of str
        Each with ``<=``, ``>=`` or ``==``; variables and constants may stand on both sides. A chain
        ``2 <= x <= 5`` gives two constraints, "name lower" and "name upper". Texts without names are called
        "constraint 1", "constraint 2" and so on.
    bounds : mapping of variable to (lower, upper), optional
        None or infinity means no bound on that side. Variables are free unless bounded here or by a constraint.
        The constraints are called "x lower" and "x upper", or "x fixed" where both are equal.
    units : mapping of name to str, optional
        The unit of a variable or of a constraint.
    integers : iterable of str, optional
        Variables to be marked as integer.
    name : str, optional
        Shown in titles.

    Returns
    -------
    Model
        Its variables in order of first appearance: objective, constraints, bounds. A variable that only has bounds
        is a variable of the model, too. A term that cancels (``x - x``) still names its variable.

    Raises
    ------
    AlgebraError
        Text that is not linear; it carries the text and the column (``place``), and shows them.
    ModelError
        Both objectives, no variable at all, bounds that are no pair, a lower bound above the upper one.
    DuplicateName, UnknownName, NumberError
        A name given twice, a unit or mark for a name that is not there, a bound that is no number.

    Examples
    --------
    >>> import polywalk as pw
    >>> print(pw.from_algebra(minimize="0.1*pump + chips/3", constraints={"heat demand": "9 <= pump + 2*(chips - 1)"},
    ...                       bounds={"pump": (0, None)}))
    minimize 0.1 pump + 1/3 chips
    constraint   rule                 origin
    heat demand  pump + 2 chips ≥ 11
    pump lower   pump ≥ 0             bounds
    free (no bound of their own): chips

    References
    ----------
    Own notation, close to Python's; no published source.
    """
    goal, aim = _objective(minimize, maximize)
    rows = [row for label, text in _named(constraints) for row in _rows(label, text)]
    pairs = _bounds(bounds or {})
    variables = tuple(dict.fromkeys(name for terms in _mentions(aim, rows, pairs) for name in terms))
    if not variables:
        raise ModelError("expected at least one variable, got none in objective, constraints and bounds.")
    listed = [Constraint(label, _dense(terms, variables), sense, rhs) for label, terms, sense, rhs in rows]
    for place, variable_name in enumerate(variables):
        if variable_name in pairs:
            row = unit_row(place, len(variables))
            listed += bound_rows(variable_name, row, *pairs[variable_name], origin="bounds")
    objective = Objective(goal, _dense(aim, variables), aim.constant) if goal and aim else None
    known = {constraint.name for constraint in listed}
    return Model(
        variables,
        tuple(listed),
        objective,
        tuple((key if key in known else variable(key, "units"), unit) for key, unit in (units or {}).items()),
        tuple(variable(key, "integers") for key in ([integers] if isinstance(integers, str) else integers)),
        name,
    )


def _objective(minimize: str | None, maximize: str | None) -> tuple[Goal | None, Linear | None]:
    if minimize is not None and maximize is not None:
        raise ModelError("expected minimize or maximize, got both; a model has one objective.", (minimize, maximize))
    if minimize is not None:
        return "min", expression(minimize, "minimize")
    if maximize is not None:
        return "max", expression(maximize, "maximize")
    return None, None


def _named(constraints: Mapping[str, str] | Sequence[str]) -> list[tuple[str, str]]:
    if isinstance(constraints, Mapping):
        return list(constraints.items())
    if isinstance(constraints, str):
        raise ModelError(
            "expected constraints as a mapping of name to text or a list of texts, got one text.", constraints
        )
    return [(f"constraint {number}", text) for number, text in enumerate(constraints, 1)]


def _rows(label: str, text: str) -> list[_Row]:
    """One constraint, or the two of a chain, lower one first."""
    sides, senses = comparison(text, f"constraint {label!r}")
    if len(senses) == 1:
        return [_row(label, sides[0], senses[0], sides[1])]
    first, second = ("lower", "upper") if senses[0] == "<=" else ("upper", "lower")
    rows = [
        _row(f"{label} {first}", sides[0], senses[0], sides[1]),
        _row(f"{label} {second}", sides[1], senses[1], sides[2]),
    ]
    return rows if first == "lower" else rows[::-1]


def _row(label: str, left: Linear, sense: str, right: Linear) -> _Row:
    """Variables to the left, constants to the right; the side that has the variables keeps its signs."""
    mention = Linear(dict.fromkeys([*left.terms, *right.terms], Fraction(0)))
    turned = not left.terms and bool(right.terms)
    mention.add(left, Fraction(-1 if turned else 1))
    mention.add(right, Fraction(1 if turned else -1))
    return label, mention, _FLIPPED[sense] if turned else _SENSES[sense], -mention.constant


def _bounds(bounds: Mapping[str, object]) -> dict[str, tuple[Fraction | None, Fraction | None]]:
    pairs: dict[str, tuple[Fraction | None, Fraction | None]] = {}
    for key, value in bounds.items():
        name = variable(key, "bounds")
        if name in pairs:
            raise ModelError(f"the bounds of {name!r} are given twice; keep one pair.", name)
        pairs[name] = pair(value, f"bounds of {name!r}")
    return pairs


def _mentions(aim: Linear | None, rows: list[_Row], pairs: Mapping[str, object]) -> list[Iterable[str]]:
    return [aim.terms if aim else (), *(terms.terms for _, terms, _, _ in rows), pairs]


def _dense(terms: Linear, variables: tuple[str, ...]) -> tuple[Fraction, ...]:
    return tuple(terms.terms.get(name, Fraction(0)) for name in variables)
