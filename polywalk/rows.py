"""The rows of a model: one named constraint, and the objective. Frozen, exact."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import Literal

from polywalk.exact import Row, dot, linear, short

Sense = Literal["<=", ">=", "=="]
Goal = Literal["min", "max"]
SIGN = {"<=": "≤", ">=": "≥", "==": "="}
GOAL = {"min": "minimize", "max": "maximize"}


@dataclass(frozen=True)
class Constraint:
    """One named row: coefficients, sense, right-hand side. A bound is a constraint too.

    Parameters
    ----------
    name : str
        Unique among the constraints of a model.
    coefficients : (n,) tuple of Fraction
        In the order of the model's variables.
    sense : {"<=", ">=", "=="}
    rhs : Fraction
        The right-hand side.
    origin : str, optional
        Where it came from, when no one typed it ("linprog's default").

    Examples
    --------
    >>> from polywalk.rows import Constraint
    >>> from fractions import Fraction
    >>> row = Constraint("heat", (Fraction(1), Fraction(2)), ">=", Fraction(4))
    >>> row.slack((Fraction(1), Fraction(2)))
    Fraction(1, 1)
    """

    name: str
    coefficients: Row
    sense: Sense
    rhs: Fraction
    origin: str = ""

    def slack(self, point: Row) -> Fraction:
        """How far the point is inside: negative where it violates the constraint."""
        room = self.rhs - dot(self.coefficients, point)
        return -room if self.sense == ">=" else room

    def holds(self, point: Row) -> bool:
        """Whether the point satisfies the constraint."""
        slack = self.slack(point)
        return slack == 0 if self.sense == "==" else slack >= 0

    @property
    def inward(self) -> tuple[Fraction, Row]:
        """``(b, a)`` such that the slack is b + a.x: the row as a number that may not be negative."""
        if self.sense == ">=":
            return -self.rhs, self.coefficients
        return self.rhs, tuple(-value for value in self.coefficients)

    @property
    def is_constant(self) -> bool:
        """Whether no variable occurs in it."""
        return not any(self.coefficients)

    def bounds(self) -> tuple[int, Literal["lower", "upper"]] | None:
        """``(j, side)`` where the slack is the distance of variable j to a bound of its own, else None."""
        if self.sense == "==":
            return None
        _, row = self.inward
        found = [j for j, value in enumerate(row) if value]
        if len(found) != 1 or abs(row[found[0]]) != 1:
            return None
        return found[0], "lower" if row[found[0]] > 0 else "upper"

    def text(self, variables: Sequence[str]) -> str:
        """The row as people write it."""
        return f"{linear(self.coefficients, variables)} {SIGN[self.sense]} {short(self.rhs)}"


@dataclass(frozen=True)
class Objective:
    """What is minimized or maximized: a linear function plus a constant.

    Parameters
    ----------
    goal : {"min", "max"}
    coefficients : (n,) tuple of Fraction
        In the order of the model's variables.
    constant : Fraction, optional

    Examples
    --------
    >>> from polywalk.rows import Objective
    >>> from fractions import Fraction
    >>> Objective("max", (Fraction(2), Fraction(0)), Fraction(1)).at((Fraction(3), Fraction(5)))
    Fraction(7, 1)
    """

    goal: Goal
    coefficients: Row
    constant: Fraction = Fraction(0)

    def at(self, point: Row) -> Fraction:
        """The objective's value at a point."""
        return dot(self.coefficients, point) + self.constant

    def better(self, left: Fraction, right: Fraction) -> bool:
        """Whether the value ``left`` is strictly better than ``right``."""
        return left < right if self.goal == "min" else left > right

    @property
    def upward(self) -> Row:
        """The coefficients of the same goal written as a maximum."""
        return self.coefficients if self.goal == "max" else tuple(-value for value in self.coefficients)

    def text(self, variables: Sequence[str]) -> str:
        """The objective as people write it."""
        return f"{GOAL[self.goal]} {linear(self.coefficients, variables, self.constant)}"
