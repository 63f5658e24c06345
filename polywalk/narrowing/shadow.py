"""The shadow of a big model: its outline in a few variables, every facet with the constraints that stop it there."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import replace
from fractions import Fraction
from math import atan2

from polywalk.bigmodel import BigModel
from polywalk.bigmodel.telling import counted
from polywalk.errors import SolverError
from polywalk.exact import exact as number
from polywalk.linear import farkas
from polywalk.model import Constraint, Goal, Model, Objective
from polywalk.narrowing import building
from polywalk.narrowing.adding import sparse
from polywalk.narrowing.best import costs
from polywalk.narrowing.conflict import conflict_of
from polywalk.narrowing.merging import Merged, from_zero, merged
from polywalk.narrowing.outline import Edge, Outline
from polywalk.narrowing.program import Program
from polywalk.narrowing.proof import Exact, Proof
from polywalk.narrowing.results import Shadow
from polywalk.narrowing.support import EmptyModelError, ExactReach, FloatReach, InexactError
from polywalk.narrowing.tolerances import TOLERANCES
from polywalk.narrowing.widening import SUBOPTIMALITY, VALUE_AXES, Widened, widened


def shadow(big: BigModel | Model, onto: Sequence[str], within: object = None, exact: bool | None = None) -> Shadow:
    """The outline, in one to three variables, of everything a big model allows.

    Support points are found by linear programs (HiGHS, warm-started) in the directions of the facets' normals, until
    every facet is proved. Integer marks are relaxed. Ctrl-C returns the outline found so far, marked partial.

    Parameters
    ----------
    big : BigModel or Model
    onto : sequence of str
        One to three variables; "objective" stands for the objective's value, "suboptimality" for its distance from
        the optimum (0 at the best plan). The shadow has an objective where it is one of these, or depends on these
        alone.
    within : number or str, optional
        Only plans whose objective is at most so far from the optimum: 20 in the objective's unit, or "5%" of it.
    exact : bool, optional
        Whether every vertex and facet is rebuilt and proved in fractions; by default up to
        ``TOLERANCES.nonzeros`` nonzeros. Else floats are used, with the tolerance the result states.

    Returns
    -------
    Shadow
        With ``model`` (an ordinary Model to draw, review, explore), ``region``, ``facets`` and ``facet(name)`` (what
        stops the plan there), ``tolerance`` (None where all is exact) and ``notes``. Empty, flat and unbounded shadows
        are ordinary results.

    Raises
    ------
    UnknownName, DuplicateName, ModelError, NumberError
        A name that is not there or given twice, none or more than three, an objective that is not there.
    SolverError
        HiGHS is missing, or stopped without an answer.

    Examples
    --------
    >>> from polywalk.bigmodel import BigModel
    >>> from polywalk.narrowing import shadow
    >>> from polywalk.scenarios import harbour_row
    >>> big = BigModel.from_model(harbour_row())
    >>> found = shadow(big, onto=("pump", "objective"))
    >>> found.tolerance is None, len(found.region.vertices)
    (True, 6)

    References
    ----------
    Lassez & Lassez, Quantifier elimination for conjunctions of linear constraints via a convex hull algorithm, in
    Symbolic and Numerical Computation for Artificial Intelligence, 1992.
    """
    wide = widened(sparse(big), onto, within)
    program = Program(wide.big, wide.keep, dict(wide.held))
    if exact is None:
        exact = wide.big.nonzeros <= TOLERANCES.nonzeros
    if exact:
        try:
            return _searched(wide, ExactReach(program), 0.0)
        except InexactError:
            said = "exact claims are withheld: HiGHS's basis could not be proved in fractions"
            wide = replace(wide, notes=(*wide.notes, said))
    return _searched(wide, FloatReach(program), TOLERANCES.touch)


def _searched(wide: Widened, asks: ExactReach | FloatReach, touch: float) -> Shadow:
    if wide.start is not None:
        asks.solver.restore(wide.start)
    found = Outline(asks, len(wide.keep), touch)
    try:
        found.search()
    except EmptyModelError as empty:
        return _empty(wide, asks.runs, touch, empty.proof)
    except KeyboardInterrupt:
        if not found.generators:
            raise
        found.wrap()
    wording = building.Wording(wide.near, _value_axis(wide.big, wide.keep))
    if not found.is_complete:
        return _shadow(wide, _partial(found, wording), asks.runs, touch, False)
    edges: Sequence[Edge] = found.edges
    if touch:
        if wording.value is not None and wide.big.variables[wide.keep[wording.value]] == SUBOPTIMALITY:
            from_zero(found, wording.value)
        whole = merged(found)
        edges, wide = whole.edges, replace(wide, notes=(*wide.notes, *_told(whole)))
        touch += whole.moved
    return _shadow(wide, _complete(found, edges, wording), asks.runs, touch, True)


def _told(whole: Merged) -> Iterable[str]:
    """At how many corners more facets meet than would do: moved to meet exactly, or several vertices in the model."""
    if whole.met:
        yield (
            f"{counted(whole.corners, 'corner')}; at {whole.met:,} of them more facets meet than would do, within the "
            "tolerance: they were moved to meet exactly"
        )
    if whole.split:
        yield (
            f"{counted(whole.corners, 'corner')}; at {whole.split:,} of them more facets meet than would do, and "
            "rounding makes several vertices of such a one in the model; exact=True does not, and takes longer"
        )


def _complete(found: Outline, edges: Sequence[Edge], wording: building.Wording) -> list[building.Row]:
    edges = sorted(edges, key=_turn)
    return [building.row_of(edge, not found.touch, wording) for edge in (*edges, *found.equalities)]


def _turn(edge: Edge) -> tuple[float, ...]:
    """Round the outline for two variables; whatever order the search had, the same for any other number."""
    size = max(map(abs, edge.direction))
    row = tuple(value / size for value in edge.direction)
    return (atan2(row[1], row[0]),) if len(row) == 2 else row


def _partial(found: Outline, wording: building.Wording) -> list[building.Row]:
    """The facets of the hull so far, proved or not."""
    proved = {(edge.direction, edge.limit): edge for edge in found.edges}
    return [
        building.row_of(proved.get((face.direction, face.limit), face), not found.touch, wording)
        for face in found.faces()
    ]


def _shadow(wide: Widened, rows: list[building.Row], runs: int, touch: float, complete: bool) -> Shadow:
    big = wide.big
    names = tuple(big.variables[j] for j in wide.keep)
    constraints, facets = building.built(rows, names, not touch)
    notes = list(wide.notes)
    if not complete:
        notes.append("interrupted: the plans inside are allowed, and there may be more outside")
    if touch:
        notes.append("made in floats: whether vertices are degenerate or tied is not claimed")
    model = Model(
        variables=names,
        constraints=tuple(constraints),
        objective=_objective(big, wide.keep),
        units=tuple(pair for pair in big.units if pair[0] in names),
        integers=tuple(name for name in big.integers if name in names),
        name=f"{big.name or 'shadow'} onto {', '.join(names)}",
    )
    return Shadow(model, tuple(facets), touch or None, big, wide.held, runs, not complete, tuple(notes))


def _objective(big: BigModel, keep: tuple[int, ...]) -> Objective | None:
    """The objective, where it is an axis or depends on the kept variables alone."""
    if big.goal is None:
        return None
    place = _value_axis(big, keep)
    if place is not None:
        goal: Goal = "min" if big.variables[keep[place]] == SUBOPTIMALITY else big.goal
        return Objective(goal, tuple(Fraction(int(k == place)) for k in range(len(keep))))
    cost = costs(big)
    if any(value and j not in keep for j, value in enumerate(cost)):
        return None
    return Objective(big.goal, tuple(number(cost[j]) for j in keep), number(big.constant))


def _value_axis(big: BigModel, keep: tuple[int, ...]) -> int | None:
    """The place of the axis that is the objective's value or its distance from the optimum."""
    names = [big.variables[j] for j in keep]
    return next((names.index(name) for name in VALUE_AXES if name in names), None)


def _empty(wide: Widened, runs: int, touch: float, proof: Proof | None) -> Shadow:
    """The shadow of a model that allows nothing: one constraint that no plan keeps."""
    proof = proof or _contradiction(wide.big)
    nothing = Constraint("empty region", (Fraction(0),) * len(wide.keep), "<=", Fraction(-1))
    told = _shadow(wide, [building.Row(nothing, proof)], runs, 0.0 if proof else touch, True)
    said = "the model allows no plan at all; conflict(big) shows which constraints contradict each other"
    return replace(told, notes=(*told.notes, said))


def _contradiction(big: BigModel) -> Proof | None:
    """Multipliers that add up to 0 <= -1, where HiGHS finds no plan; None where it cannot be decided exactly."""
    try:
        found = conflict_of(big)
    except SolverError:
        return None
    if found is None:
        raise SolverError(
            "HiGHS calls the model infeasible, and it has a plan; rescale rows and columns of very different sizes.",
            big.name,
        )
    proof = farkas(found)
    return None if proof is None else Exact(tuple(proof.multipliers.items())).times(-1 / proof.total)
