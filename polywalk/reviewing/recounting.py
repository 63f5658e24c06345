"""A judged answer as rows of a table."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from typing import TYPE_CHECKING

from polywalk.exact import Row, short
from polywalk.model import Model
from polywalk.reviewing.extended import told
from polywalk.reviewing.pricing import Pricing
from polywalk.reviewing.telling import listed
from polywalk.reviewing.worth import where

if TYPE_CHECKING:
    from polywalk.reviewing.explain import Answer
    from polywalk.reviewing.sensitivity import Sensitivity


def heading(best: Sensitivity) -> str:
    """What the right answer is."""
    if best.outcome == "no objective":
        return "the model has no objective: every feasible point is as good as any other, and there are no prices"
    if best.value is None:
        return f"the model is {best.outcome}: it has no optimum, and no prices"
    return f"the optimal value is {told(best.value)} at {where(best)}"


def answer_rows(best: Sensitivity, answers: Sequence[Answer]) -> tuple[tuple[object, ...], ...]:
    """One row a question that some answer has something to say on."""
    told_answers = [_told(best, answer) for answer in answers]
    asked = [name for name in QUESTIONS if any(name in answer for answer in told_answers)]
    return tuple((name, *(answer.get(name) for answer in told_answers)) for name in asked)


QUESTIONS = ("where", "allowed", "violated", "optimal", "prices", "which prices", "signs", "from the costs", "basis")


def _told(best: Sensitivity, answer: Answer) -> dict[str, str]:
    return _point(best, answer) | _prices(best, answer) | _basis(answer)


def _point(best: Sensitivity, answer: Answer) -> dict[str, str]:
    point = answer.point
    if point is None:
        return {}
    found = {"where": point.words, "allowed": str(point.feasible)}
    if not point.feasible.right:
        found["violated"] = listed(f"{name} by {short(off)}" for name, off in point.violated)
    if best.value is None:
        found["optimal"] = f"nothing is: the model {_ending(best)}"
    elif not point.feasible.right:
        found["optimal"] = "no, since it is not allowed"
    elif point.optimal is not None:
        found["optimal"] = str(point.optimal)
    return found


def _ending(best: Sensitivity) -> str:
    return "has no objective" if best.outcome == "no objective" else f"is {best.outcome}"


def _prices(best: Sensitivity, answer: Answer) -> dict[str, str]:
    priced = answer.prices
    if priced is None:
        return {}
    found = {"prices": str(priced.verdict)}
    if priced.convention:
        found["prices"] += f"; right {priced.convention}"
    found["which prices"] = which(best, priced)
    if priced.wrong_signs and not priced.verdict.right:
        found["signs"] = f"no optimum gives {listed(priced.wrong_signs)} a price of this sign"
    if priced.derived:
        found["from the costs"] = f"the price of {listed(priced.derived)}"
    return found


def which(best: Sensitivity, priced: Pricing) -> str:
    """The optimal dual the prices are, or are nearest to, with its numbers."""
    near = "" if priced.verdict.right else "nearest are "
    shown = prices_text(best.model, priced.nearest)
    if best.unique_prices:
        return f"{near}the only optimal ones: {shown}"
    if not priced.mix:
        return f"{near}one of very many optimal lists: {shown}"
    if len(priced.mix) == 1 and best.duals is not None and best.duals.corners[priced.mix[0][0]] == priced.nearest:
        return f"{near}extreme dual D{priced.mix[0][0]}: {shown}"
    mixed = listed(f"{short(share)} of D{k}" for k, share in priced.mix)
    return f"{near}a mix of extreme duals ({mixed}): {shown}"


def prices_text(model: Model, prices: Row) -> str:
    """The prices that are not 0, each after its constraint's name."""
    pairs = zip(model.constraints, prices, strict=True)
    return ", ".join(f"{row.name} {short(price)}" for row, price in pairs if price) or "all 0"


def _basis(answer: Answer) -> dict[str, str]:
    basis = answer.basis
    if basis is None:
        return {}
    word = (
        "optimal" if basis.optimal else "not optimal, its prices have wrong signs" if basis.feasible else "infeasible"
    )
    point = ", ".join(short(value) for value in basis.point)
    return {"basis": f"{', '.join(basis.held)} active, at ({point}): {word}"}


def apart(left: Row, right: Row) -> Fraction:
    """The largest difference of two rows."""
    return max(abs(a - b) for a, b in zip(left, right, strict=True))
