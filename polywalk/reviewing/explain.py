"""A solver's answer explained: which vertex and which prices it is, whether it is right, and why two answers differ."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from fractions import Fraction

from polywalk.errors import ModelError, unknown
from polywalk.linear import slacks_of
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.reviewing.best import is_small
from polywalk.reviewing.differing import differing
from polywalk.reviewing.places import Place, place
from polywalk.reviewing.pricing import Pricing, pricing
from polywalk.reviewing.ranges import BasisRanges, basis_ranges
from polywalk.reviewing.recounting import answer_rows, heading
from polywalk.reviewing.sensitivity import Sensitivity, sensitivity
from polywalk.reviewing.tolerances import STATED
from polywalk.table import Shown, Table

PARTS = ("x", "prices", "basis")


@dataclass(frozen=True)
class Answer:
    """What one run of a solver gave, judged; None for what was not given, or has nothing to be judged by."""

    point: Place | None = None
    prices: Pricing | None = None
    basis: BasisRanges | None = None

    @property
    def right(self) -> bool:
        """Whether all that was given is right, exactly or within solver tolerance."""
        point = self.point is None or self.point.right
        prices = self.prices is None or self.prices.right
        return point and prices and (self.basis is None or self.basis.optimal)


@dataclass(frozen=True, repr=False)
class Explanation(Shown):
    """A solver's answer, or two side by side, judged exactly.

    Parameters
    ----------
    model : Model
    best : Sensitivity
        The exact optimum with its prices.
    answer : Answer
    versus : Answer or None
        The second run.
    """

    model: Model
    best: Sensitivity
    answer: Answer
    versus: Answer | None = field(default=None)

    @property
    def point(self) -> Place | None:
        """Where the point of the (first) answer lies."""
        return self.answer.point

    @property
    def prices(self) -> Pricing | None:
        """Which optimal dual its prices are."""
        return self.answer.prices

    @property
    def basis(self) -> BasisRanges | None:
        """Its basis, with ranges."""
        return self.answer.basis

    @property
    def why(self) -> tuple[str, ...]:
        """Why the two answers differ; for one answer, why another solver may give another one."""
        return self.best.why if self.versus is None else differing(self.best, self.answer, self.versus)

    def table(self) -> Table:
        """A row a question, a column an answer; the reasons as notes."""
        answers = [self.answer] if self.versus is None else [self.answer, self.versus]
        columns = ("question", "answer") if self.versus is None else ("question", "first", "second")
        rows = answer_rows(self.best, answers)
        tolerances = [STATED] if any("solver tolerance" in str(text) for row in rows for text in row[1:]) else []
        return Table(heading(self.best), columns, rows, (*self.why, *tolerances))


def explain(
    source: Model | Region,
    *,
    x: Mapping[str, object] | Sequence[object] | None = None,
    prices: Mapping[str, object] | Sequence[object] | None = None,
    basis: Sequence[str] | None = None,
    versus: Mapping[str, object] | None = None,
) -> Explanation:
    """Judge a solver's answer: which vertex or face it is, which optimal prices, and whether it is right.

    Parameters
    ----------
    source : Model or Region
    x : mapping or (n,) sequence of numbers, optional
        The whole plan, by variable or in the model's order.
    prices : mapping or sequence of numbers, optional
        By constraint, or in the model's order: one a constraint, or one a constraint that is not named as a bound is
        ("pump upper"). Bounds of a variable that are left out follow from its cost; other constraints that are left
        out have price 0. A price is the change of the optimal value, in the objective's own sense, per unit of
        right-hand side; where the prices are right in another sign convention only, the answer says in which.
    basis : sequence of str, optional
        The n constraints held active, or the basic slacks as a walk names them (a variable's own slack by its name).
    versus : mapping, optional
        A second run: any of "x", "prices" and "basis" as above.

    Returns
    -------
    Explanation
        Each part is exact, within solver tolerance (see ``polywalk.reviewing.tolerances``), or wrong and by how much.

    Raises
    ------
    ModelError, UnknownName, NumberError
        Nothing to explain; a length that does not fit; a name that is not there; an entry that is no number.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.explain import explain
    >>> model = pw.from_algebra(maximize="3*x + 5*y", bounds={"x": (0, 4), "y": (0, None)},
    ...                         constraints={"doors": "2*y <= 12", "hours": "3*x + 2*y <= 18"})
    >>> print(explain(model, x=[2, 5.9999999999], prices=[-1.5, -1]))
    the optimal value is 36 at V2 (2, 6)
    question      answer
    where         V2
    allowed       exact
    optimal       within solver tolerance (off by 5e-10)
    prices        wrong by 3; right with all signs turned round
    which prices  nearest are the only optimal ones: doors 1.5, hours 1
    signs         no optimum gives doors and hours a price of this sign
    solver tolerance: 1e-06 of a right-hand side, 1e-06 of the optimal value, 1e-06 of a price (below size 1, as of 1)

    References
    ----------
    Schrijver, Theory of Linear and Integer Programming, 1986, chapter 7 (duality, complementary slackness); the
    tolerances as in ``polywalk.reviewing.tolerances``.
    """
    model = source.model if isinstance(source, Region) else source
    whole = source if isinstance(source, Region) else region(model) if is_small(model) else None
    best = sensitivity(whole or model)
    parts: Mapping[str, object] = {"x": x, "prices": prices, "basis": basis}
    if all(value is None for value in parts.values()):
        raise ModelError("expected something to explain; give x=, prices= or basis= of the solver's answer.", parts)
    for name in versus or {}:
        if name not in PARTS:
            raise unknown("part", name, PARTS, "the second answer (versus)")
    first = _answer(best, whole, parts)
    return Explanation(model, best, first, None if versus is None else _answer(best, whole, versus))


def _answer(best: Sensitivity, whole: Region | None, given: Mapping[str, object]) -> Answer:
    model = best.model
    x, prices, basis = (given.get(name) for name in PARTS)
    return Answer(
        None if x is None else place(model, _plan(model, x), whole, best.value),
        None if prices is None or best.duals is None else pricing(best.duals, prices),
        None if basis is None else basis_ranges(model, _held(model, basis)),
    )


def _plan(model: Model, x: object) -> tuple[Fraction, ...]:
    if isinstance(x, str) or not (isinstance(x, Mapping) or hasattr(x, "__iter__")):
        raise ModelError(f"expected x as a mapping from variable to number or as a sequence, got {x!r}.", x)
    return model.point(x)


def _held(model: Model, basis: object) -> list[str]:
    """The constraints held active by a basis, which may be given by them or by the basic slacks."""
    if isinstance(basis, str) or not hasattr(basis, "__iter__"):
        raise ModelError(f"expected the basis as a sequence of names, got {basis!r}.", basis)
    names = list(basis)
    items = slacks_of(model)
    if all(name in items.of_constraint for name in names) and len(names) == model.n:
        return names
    known = items.names[: items.auxiliary]
    for name in names:
        if name not in known and name not in items.of_constraint:
            raise unknown("constraint or slack", name, [*known, *items.of_constraint], "the model (basis)")
    basic = len(known) - model.n
    if len(set(names)) != basic or len(names) != basic or not set(names) <= set(known):
        raise ModelError(
            f"expected a basis as the {model.n} constraints held active, or as the {basic} basic slacks among "
            f"{', '.join(known)}; got {len(names)}: {', '.join(map(str, names))}.",
            tuple(names),
        )
    left = [k for k, name in enumerate(known) if name not in names]
    return [_constraint(model, items.items[k].constraint, known[k]) for k in left]


def _constraint(model: Model, place_: int | None, name: str) -> str:
    if place_ is None:
        raise ModelError(f"{name!r} is free, no bound holds it, so it must be basic; add it to the basis.", name)
    return model.constraints[place_].name
