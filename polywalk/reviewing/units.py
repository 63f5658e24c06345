"""Units: what was given for variables, constraints and coefficients must fit together."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Iterator, Mapping

from polywalk.errors import unknown
from polywalk.exact import Row
from polywalk.model import Model
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding

Given = tuple[tuple[str, str, str], ...]
Unit = tuple[tuple[str, int], ...]
OBJECTIVE = "objective"

_PART = re.compile(r"\s*([*·/]?)\s*([^\s*·/^]+)(?:\^(-?\d+))?")


def read_unit(text: str) -> Unit:
    """A unit as symbols with powers: "EUR/MWh" is (("EUR", 1), ("MWh", -1)); "" and "1" are pure numbers.

    Symbols are taken as they are: "MWh" is one symbol, not "MW*h", and kW is not a thousandth of MW. After a "/" only
    the next symbol is divided by. Text of another form, such as "MW (thermal)", is one symbol as it stands.

    Examples
    --------
    >>> from polywalk.reviewing.units import read_unit
    >>> read_unit("kg*m^2/s"), read_unit("1/h"), read_unit("")
    ((('kg', 1), ('m', 2), ('s', -1)), (('h', -1),), ())
    """
    powers: Counter[str] = Counter()
    place = 0
    while text[place:].strip():
        found = _PART.match(text, place)
        if found is None or (place and not found[1]):
            return ((text.strip(), 1),)
        if found[2] != "1":
            powers[found[2]] += int(found[3] or 1) * (-1 if found[1] == "/" else 1)
        place = found.end()
    return tuple(sorted((symbol, power) for symbol, power in powers.items() if power))


def times(left: Unit, right: Unit) -> Unit:
    """The product of two units."""
    powers = Counter(dict(left))
    for symbol, power in right:
        powers[symbol] += power
    return tuple(sorted((symbol, power) for symbol, power in powers.items() if power))


def unit_text(unit: Unit) -> str:
    """The unit as people write it."""
    over = "*".join(symbol + (f"^{power}" if power > 1 else "") for symbol, power in unit if power > 0)
    under = "".join("/" + symbol + (f"^{-power}" if power < -1 else "") for symbol, power in unit if power < 0)
    return (over or ("1" if under else "a pure number")) + under


def units_given(model: Model, given: Mapping[tuple[str, str], str]) -> Given:
    """The caller's units of coefficients, names checked; raises UnknownName."""
    rows = [OBJECTIVE, *(row.name for row in model.constraints)]
    for row, variable in given:
        model.index(variable)
        if row not in rows:
            raise unknown("constraint", row, rows, "the model (coefficient_units)")
    return tuple((row, variable, text) for (row, variable), text in given.items())


def unit_mismatches(case: Case) -> Iterator[Finding]:
    """Rows whose terms, or whose terms and right-hand side, have different units.

    A coefficient of 1 or -1 without a unit of its own counts as a pure number; of any other coefficient without one
    nothing is known, so its term is left out.
    """
    model = case.model
    named: list[tuple[str, Row]] = [(row.name, row.coefficients) for row in model.constraints]
    if model.objective is not None:
        named.append((OBJECTIVE, model.objective.coefficients))
    for name, coefficients in named:
        terms = _terms(case, name, coefficients)
        stated = model.unit(name)
        if stated:
            terms.append(("its right-hand side", read_unit(stated)))
        if len({unit for _, unit in terms}) > 1:
            yield _mismatch(name, terms, model)


def _terms(case: Case, name: str, coefficients: Row) -> list[tuple[str, Unit]]:
    given = {(row, variable): text for row, variable, text in case.coefficient_units}
    found = []
    for variable, value in zip(case.model.variables, coefficients, strict=True):
        own = given.get((name, variable), "" if abs(value) == 1 else None)
        if value and own is not None and (case.model.unit(variable) or (name, variable) in given):
            found.append((variable, times(read_unit(own), read_unit(case.model.unit(variable)))))
    return found


def _mismatch(name: str, terms: list[tuple[str, Unit]], model: Model) -> Finding:
    told = ", ".join(f"{term} in {unit_text(unit)}" for term, unit in terms)
    return Finding(
        "unit-mismatch",
        f"{name} adds different units",
        f"in {name} there is {told}; only amounts of the same unit can be added or compared. Coefficients of 1 without "
        "a unit count as pure numbers.",
        "convert one of them, or give its coefficient the unit it has.",
        () if name == OBJECTIVE else (name,),
        tuple(term for term, _ in terms if term in model.variables),
    )
