"""Can a plan, or a part of one, be carried out? A completion of it, or the constraints that forbid it."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from fractions import Fraction

import numpy as np

from polywalk.bigmodel import BigModel, locate
from polywalk.errors import ModelError, SolverError, UnknownName
from polywalk.exact import exact
from polywalk.linear import farkas, optimum
from polywalk.model import Model
from polywalk.narrowing.adding import sparse, with_row
from polywalk.narrowing.answer import SHOWN, Completion, Named, Range, Verdict
from polywalk.narrowing.best import best, costs
from polywalk.narrowing.certify import Basis, holds
from polywalk.narrowing.conflict import conflict_of, irreducible
from polywalk.narrowing.cutting import only
from polywalk.narrowing.given import named_number, values_of
from polywalk.narrowing.nearby import ends, nearby
from polywalk.narrowing.program import Program
from polywalk.narrowing.results import Shadow
from polywalk.narrowing.settling import settled_by
from polywalk.narrowing.shadow import shadow
from polywalk.narrowing.solver import Solver, Status
from polywalk.narrowing.tolerances import TOLERANCES, simple

NO_PLAN = "the model allows no plan at all, whatever the values; conflict(big) shows why"


def completion(big: BigModel | Model, plan: Mapping[str, object] | Iterable[object]) -> Completion:
    """Whether some variables of a big model can have these values, and what stops them.

    Parameters
    ----------
    big : BigModel or Model
        Integer marks are not applied.
    plan : mapping of str to number, or (n,) sequence of numbers
        The values of some variables, or of all.

    Returns
    -------
    Completion
        A whole plan with these values, the best there is, and how far it is from the optimum; or the constraints that
        contradict them, with what would have to change. A value beyond the bounds of its variable is such an answer
        too.

    Raises
    ------
    UnknownName, ModelError, NumberError
        A name that is not there, an empty plan, a sequence of the wrong length, a value that is no number.
    SolverError
        HiGHS is missing, or stopped without an answer.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import completion
    >>> from polywalk.scenarios import harbour_row
    >>> print(completion(BigModel.from_model(harbour_row()), {"pump": 5, "chips": 0}))
    pump = 5, chips = 0: impossible
    constraint          rule              the conflict ends at
    return temperature  pump - chips ≤ 4  ≥ 5
    pump as planned     pump = 5          ≤ 4
    chips as planned    chips = 0         ≥ 1
    possible with the least change in total: chips = 1

    References
    ----------
    Applegate, Cook, Dash & Espinoza, Exact solutions to linear programming problems, Oper. Res. Lett. 35, 2007 (a
    solver's basis read exactly); for what stops it see `conflict`.
    """
    big = sparse(big)
    asked = _entries(big, plan)
    if len(asked) == big.n:
        return _whole(big, asked)
    program = _held(big, asked)
    solver = Solver(program.big)
    status, is_best = _solved(solver)
    proved = _plan(program, solver) if status == "optimal" else None
    if proved is not None:
        return _possible(big, asked, proved, is_best)
    if program.big.n * (program.big.n + program.big.m) <= TOLERANCES.cells:
        return _decided(big, asked, program)
    if status == "optimal":
        near = [exact(value) if (near := simple(value)) is None else near for value in solver.point().tolist()]
        return _possible(big, asked, near, is_best, "possible within solver tolerance")
    found = conflict_of(program.big) if status == "infeasible" else None
    if found is None:
        raise SolverError(
            f"HiGHS could not tell whether the plan is possible ({solver.status_text}); rescale rows and columns of "
            "very different sizes.",
            solver.status_text,
        )
    return _impossible(big, asked, found)


def _solved(solver: Solver) -> tuple[Status, bool]:
    """Whether there is a plan, and whether it is the best: any where none is."""
    big = solver.big
    if big.goal is not None:
        sign = 1 if big.goal == "max" else -1
        solver.aim(range(big.n), [sign * value for value in costs(big)])
        status = solver.run()
        if status != "unbounded":
            return status, True
    solver.aim(range(big.n), [0.0] * big.n)
    return solver.run(), False


def _held(big: BigModel, asked: Named) -> Program:
    """The big model with a row for every asked value, which is kept exactly beside its float."""
    held = big
    for name, value in asked:
        held = with_row(held, _planned(name), ([big.index(name)], [1.0]), float(value), float(value))
    return Program(held, (), {row: value for row, (_, value) in zip(held.rows[big.m :], asked, strict=True)})


def _entries(big: BigModel, plan: Mapping[str, object] | Iterable[object]) -> Named:
    """Names and values in the order of the variables."""
    given = values_of(big, plan)
    if not given:
        raise ModelError("expected a value for at least one variable, got an empty plan.", plan)
    places = {big.index(name): value for name, value in given.items()}
    return tuple((big.variables[place], named_number(big.variables[place], places[place])) for place in sorted(places))


def _plan(program: Program, solver: Solver) -> list[Fraction] | None:
    """The plan of HiGHS's basis, if it keeps everything exactly."""
    statuses = solver.basis()
    try:
        plan = None if statuses is None else Basis(program, statuses).point()
    except ValueError:
        return None
    if plan is None or not holds(program, plan):
        return None
    return [plan.at(j) for j in range(program.big.n)]


def _decided(big: BigModel, asked: Named, program: Program) -> Completion:
    """The answer of the exact simplex method, where HiGHS's does not hold exactly and the model is small."""
    model = program.big.to_model()
    for name, value in program.held.items():
        model = model.with_rhs(name, value)
    found = optimum(model)
    is_best = found.outcome == "optimal"
    if found.outcome == "unbounded":
        found = optimum(model.without_objective())
    if found.point is not None:
        return _possible(big, asked, found.point, is_best)
    assert found.infeasibility is not None
    return _impossible(big, asked, irreducible(program.big, found.infeasibility))


def _possible(
    big: BigModel, asked: Named, values: Sequence[Fraction], is_best: bool, verdict: Verdict = "possible"
) -> Completion:
    """A whole plan: first what was asked, then what shares a row with it."""
    mine = [big.index(name) for name, _ in asked]
    matrix = big.csr()
    rows = matrix.tocsc()[:, mine].tocoo().row
    near = matrix[np.unique(rows)].indices.tolist()
    order = list(dict.fromkeys([*mine, *sorted(near)]))
    beside = len(order)
    order = list(dict.fromkeys([*order, *range(big.n)]))
    named = tuple((big.variables[j], values[j]) for j in order)
    value, best_value = _worth(big, values) if is_best else (None, None)
    return Completion(asked, verdict, named, beside, objective=value, optimum=best_value)


def _worth(big: BigModel, values: Sequence[Fraction]) -> tuple[Fraction | None, Fraction | None]:
    """The objective's value at a plan, and the best of any plan; None where there is none."""
    if big.goal is None:
        return None, None
    terms = (exact(cost) * value for cost, value in zip(costs(big), values, strict=True) if cost)
    return sum(terms, exact(big.constant)), best(big).value


def _impossible(big: BigModel, asked: Named, found: Model) -> Completion:
    """The conflict, and what would have to change."""
    if all(_is_own(big, row.name) for row in found.constraints):
        return Completion(asked, "impossible", conflict=found, relaxed=ends(found), notes=(NO_PLAN,))
    near, is_exact = nearby(big, asked)
    limits: tuple[Range, ...] = ()
    if len(asked) == 1 and near:
        wanted = shadow(big, (asked[0][0],))
        limits = tuple((name, *ends) for name, ends in wanted.region.ranges.items())
        found = _at_the_limit(big, asked[0], wanted) or found
    return Completion(
        asked,
        "impossible",
        conflict=found,
        relaxed=ends(found),
        nearest=near,
        is_nearest_proved=is_exact,
        limits=limits,
        notes=() if near else (NO_PLAN,),
    )


def _at_the_limit(big: BigModel, asked: tuple[str, Fraction], wanted: Shadow) -> Model | None:
    """The conflict that ends where the variable's range does, of what stops it there; None where that is not proved."""
    name, value = asked
    for row, facet in zip(wanted.model.constraints, wanted.facets, strict=True):
        if row.holds((value,)) or not facet.is_proved or len(facet.multipliers) > SHOWN:
            continue
        used = [other for other, _ in (*facet.multipliers, *facet.backward)]
        proof = farkas(only(big, list(dict.fromkeys(used))).with_constraint(_planned(name), {name: 1}, "==", value))
        return None if proof is None else irreducible(big, proof)
    return None


def _planned(name: str) -> str:
    """What the row is called that holds a variable at its asked value."""
    return f"{name} as planned"


def _is_own(big: BigModel, name: str) -> bool:
    """Whether a constraint is one of the big model, not of the plan."""
    try:
        locate(big, name)
    except UnknownName:
        return False
    return True


def _whole(big: BigModel, asked: Named) -> Completion:
    """Every constraint at a whole plan, in fractions."""
    values = {j: value for j, (_, value) in enumerate(asked)}
    broken = sorted(
        (one for one in settled_by(Program(big, ()), values) if one.verdict != "satisfied"), key=lambda one: one.slack
    )
    if not broken:
        value, best_value = _worth(big, [value for _, value in asked])
        return Completion(asked, "possible", asked, len(asked), is_whole=True, objective=value, optimum=best_value)
    close = all(one.verdict == "violated within solver tolerance" for one in broken)
    near, is_exact = nearby(big, asked)
    title = big.name or "the big model"
    return Completion(
        asked,
        "possible within solver tolerance" if close else "impossible",
        conflict=only(big, [one.constraint for one in broken[:SHOWN]], f"what a plan breaks in {title}"),
        violated=tuple((one.constraint, -one.slack) for one in broken),
        nearest=near,
        is_nearest_proved=is_exact,
        is_whole=True,
        notes=() if near else (NO_PLAN,),
    )
