"""The section of a big model: all variables but a few set to values, the rest an exact small model."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from fractions import Fraction
from typing import Any, Literal

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError
from polywalk.exact import Row, exact, short
from polywalk.model import Constraint, Model, Objective
from polywalk.narrowing.adding import sparse
from polywalk.narrowing.best import best, costs
from polywalk.narrowing.given import names_of, values_of
from polywalk.narrowing.program import Program
from polywalk.narrowing.settling import Settled, relaxed, settled_by, telling
from polywalk.narrowing.tolerances import simple
from polywalk.region import region
from polywalk.sides import bound_rows, sided_rows, unit_row
from polywalk.table import Shown, Table

Values = Mapping[str, object] | Sequence[object] | Literal["optimum"] | Any


@dataclass(frozen=True)
class Snap:
    """A float that was taken for the simple fraction beside it.

    Parameters
    ----------
    variable : str
    given : float
    taken : Fraction
    """

    variable: str
    given: float
    taken: Fraction


@dataclass(frozen=True, repr=False)
class Section(Shown):
    """An exact small model cut out of a big one.

    Parameters
    ----------
    model : Model
        In the kept variables. A constraint that became constant and is violated beyond solver tolerance stays in it
        (it makes the section empty).
    settled : tuple of Settled
        What became constant: every such row, and the bounds of the set variables that are violated.
    snaps : tuple of Snap
        Floats that were taken for a simple fraction near by.
    notes : tuple of str

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import section
    >>> from polywalk.scenarios import harbour_row
    >>> found = section(BigModel.from_model(harbour_row()), keep=("pump", "chips"), at={"tank": 4})
    >>> print(found)
    Harbour Row at tank = 4: maximize 23 pump + 18 chips + 128
    constraint          rule              origin
    harbour main        pump + chips ≤ 8
    grid connection     0.4 pump ≤ 2
    return temperature  pump - chips ≤ 4
    reheating           -chips ≤ -2
    quay pipe           pump ≤ 4
    pump lower          pump ≥ 0
    chips lower         chips ≥ 0
    units: pump in MW, chips in MW
    no constraint became constant
    """

    model: Model
    settled: tuple[Settled, ...]
    snaps: tuple[Snap, ...] = ()
    notes: tuple[str, ...] = ()

    def table(self) -> Table:
        """The small model; notes tell what became constant and which numbers were snapped."""
        told = self.model.table()
        snaps = [f"{one.variable}: {one.given!r} was taken for {short(one.taken)}" for one in self.snaps[:8]]
        if len(self.snaps) > 8:
            snaps.append(f"and {len(self.snaps) - 8} more snapped numbers, see .snaps")
        return replace(told, notes=(*told.notes, *telling(self.settled), *snaps, *self.notes))


def section(big: BigModel | Model, keep: Sequence[str], at: Values = "optimum") -> Section:
    """A big model with all but the kept variables set to values.

    Parameters
    ----------
    big : BigModel or Model
    keep : sequence of str
        The variables that stay free to move.
    at : mapping, pandas.Series, (n,) sequence or "optimum", optional
        A value for every other variable, by name, or a whole plan in the order of the variables; "optimum" (the
        default) takes HiGHS's optimum, rebuilt exactly from its basis where that proves it. A float near a simple
        fraction is taken for it, and the section says so; other numbers are taken as they are.

    Returns
    -------
    Section
        With ``model`` (an ordinary Model), ``settled`` (the constraints that became constant), ``snaps`` and ``notes``.

    Raises
    ------
    UnknownName, ModelError, NumberError
        A kept variable or a value's name that is not there, a variable without a value, a value beyond the bounds of
        its variable, a model without optimum for "optimum".

    Examples
    --------
    >>> import polywalk as pw
    >>> found = pw.section(pw.scenarios.harbour_row(), keep=("pump", "chips"), at={"tank": 2})
    >>> found.model.variables, found.model.constraint("harbour main").rhs
    (('pump', 'chips'), Fraction(10, 1))

    References
    ----------
    Applegate, Cook, Dash & Espinoza, Exact solutions to linear programming problems, Oper. Res. Lett. 35, 2007 (the
    optimum read exactly from a solver's basis).
    """
    big = sparse(big)
    keep = tuple(dict.fromkeys(names_of(keep, "the variables to keep")))
    kept = [big.index(name) for name in keep]
    values, snaps, notes = _values(big, at, set(kept))
    program = Program(big, tuple(kept))
    settled = settled_by(program, values)
    _refuse(big, settled)
    model = _model(program, values, settled, notes)
    return Section(model, settled, tuple(snaps), (*notes[1:], *_noise(model, keep)))


def _values(big: BigModel, at: Values, kept: set[int]) -> tuple[dict[int, Fraction], list[Snap], list[str]]:
    """The values of the variables that are not kept, by place; the first note says where they come from."""
    if isinstance(at, str):
        return _optimal(big, at, kept)
    found, snaps = dict[int, Fraction](), []
    for name, value in values_of(big, at).items():
        place = big.index(name)
        if place in kept:
            continue
        number = exact(value)
        near = simple(float(number)) if isinstance(value, float) else None
        if near is not None and near != number:
            snaps.append(Snap(big.variables[place], float(number), near))
        found[place] = number if near is None else near
    missing = [name for j, name in enumerate(big.variables) if j not in found and j not in kept]
    if missing:
        more = f" and {len(missing) - 1} more have" if len(missing) > 1 else " has"
        raise ModelError(
            f"expected a value for every variable that is not kept; {missing[0]!r}{more} none. "
            'Give them, keep them, or take at="optimum".',
            missing[0],
        )
    told = ", ".join(f"{big.variables[j]} = {short(value)}" for j, value in list(found.items())[:3])
    return found, snaps, [told + (f" and {len(found) - 3} more" if len(found) > 3 else "")]


def _optimal(big: BigModel, at: str, kept: set[int]) -> tuple[dict[int, Fraction], list[Snap], list[str]]:
    if at != "optimum":
        raise ModelError(f'at: expected values or "optimum", got {at!r}.', at)
    found = best(big)
    if found.point is None:
        said = "conflict(big) shows why" if found.outcome == "infeasible" else "escape(big) shows why"
        raise ModelError(f'at="optimum": the model is {found.outcome} and has none; {said}.', big.name)
    how = "rebuilt exactly from HiGHS's basis" if found.is_exact else "HiGHS's floats, near simple fractions snapped"
    values = {j: value for j, value in enumerate(found.point) if j not in kept}
    marks = ["integer marks are relaxed: the optimum is the relaxation's"] if big.integers else []
    return values, [], [f"the optimum {short(found.value or Fraction(0))}", f"values: {how}", *marks]


def _refuse(big: BigModel, settled: Sequence[Settled]) -> None:
    """A value beyond its variable's own bounds is no place to cut at."""
    for one in settled:
        if one.is_bound and one.verdict == "violated":
            raise ModelError(
                f"the value of {one.variable!r} violates its bound {one.constraint!r} by {short(-one.slack)}; "
                "give a value inside, or change the bound with with_rhs.",
                one.variable,
            )


def _model(program: Program, values: dict[int, Fraction], settled: Sequence[Settled], notes: list[str]) -> Model:
    big, keep = program.big, program.keep
    place = {j: k for k, j in enumerate(keep)}
    rows: list[Constraint] = []
    violated = {one.constraint: one for one in settled if one.verdict == "violated"}
    low, high = program.row_sides
    for i, (line, scale) in enumerate(zip(program.lines, program.scales, strict=True)):
        row = [Fraction(0)] * len(keep)
        moved = Fraction(0)
        for j, value in line:
            if j in place:
                row[place[j]] = Fraction(value, scale)
            else:
                moved += Fraction(value, scale) * values[j]
        ends = [None if side is None else side - moved for side in (low[i], high[i])]
        made = sided_rows(big.rows[i], tuple(row), ends[0], ends[1])
        rows += [one for one in made if not one.is_constant or one.name in violated]
    low, high = program.bounds
    for k, j in enumerate(keep):
        rows += bound_rows(big.variables[j], unit_row(k, len(keep)), low[j], high[j])
    names = tuple(big.variables[j] for j in keep)
    known = {*names, *(row.name for row in rows)}
    return Model(
        names,
        tuple(rows),
        _objective(big, keep, values),
        tuple(pair for pair in big.units if pair[0] in known),
        tuple(name for name in big.integers if name in names),
        f"{big.name or 'section'} at {notes[0]}",
    )


def _objective(big: BigModel, keep: Sequence[int], values: dict[int, Fraction]) -> Objective | None:
    if big.goal is None:
        return None
    cost = costs(big)
    constant = sum((exact(cost[j]) * value for j, value in values.items() if cost[j]), exact(big.constant))
    row: Row = tuple(exact(cost[j]) for j in keep)
    return Objective(big.goal, row, constant)


def _noise(model: Model, keep: Sequence[str]) -> list[str]:
    """What to say of a section that leaves nothing, or a single plan."""
    found = region(model) if len(keep) <= 3 else None
    if found is None or found.dimension > 0 or (len(keep) == 1 and found.dimension == 0 and not found.equalities):
        return []
    offer = f"shadow(big, onto={tuple(keep)!r}) shows what they can be when the others may follow"
    if found.status == "empty":
        by_noise = region(relaxed(model)).status != "empty"
        why = "by less than solver tolerance: the values are not exact" if by_noise else "at these values"
        return [f"the section is empty {why}; {offer}"]
    held = ", ".join(found.equalities[:4])
    return [f"the section is a single point: {held} leave the kept variables no freedom at these values; {offer}"]
