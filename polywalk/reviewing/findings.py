"""What a review hands out: findings with their proofs, the worst first, and what was expected of the model."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace
from fractions import Fraction

from polywalk.errors import ExpectationError, PolywalkError, unknown
from polywalk.exact import Row
from polywalk.model import Model
from polywalk.reviewing import telling
from polywalk.reviewing.codes import CODES, SEVERITIES, Severity
from polywalk.reviewing.expectations import EXPECTATIONS, Outcome
from polywalk.table import Shown, Table


@dataclass(frozen=True)
class Proof:
    """A row that follows from the model's constraints, multiplied and added.

    Each multiplier is >= 0 on a <=, <= 0 on a >= and of any sign on an equality; so every plan satisfies
    ``coefficients . x <= rhs``. All coefficients 0 and a negative rhs: a contradiction.

    Parameters
    ----------
    multipliers : tuple of (str, Fraction)
        Constraints by name; those that are 0 are left out.
    coefficients : (n,) tuple of Fraction
    rhs : Fraction
    """

    multipliers: tuple[tuple[str, Fraction], ...]
    coefficients: Row
    rhs: Fraction


@dataclass(frozen=True, repr=False)
class Finding(Shown):
    """One thing worth knowing about a model, with its evidence.

    Parameters
    ----------
    code : str
        One of ``polywalk.reviewing.CODES``.
    title : str
        One line.
    explanation, remedy : str
        Plain words with the model's own names and numbers.
    constraints, variables : tuple of str
        Those it is about, the main one first.
    points : tuple of (n,) tuple of Fraction
    rays : tuple of (n,) tuple of Fraction
        Directions.
    proofs : tuple of Proof
    amounts : tuple of (str, Fraction)
        Named numbers.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="x", constraints={"cap": "x <= 3", "far": "x <= 5"}, bounds={"x": (0, None)})
    >>> print(pw.review(model).findings[0])
    parallel (note): far is weaker than cap
    far (x ≤ 5) points the same way as cap (x ≤ 3), which is tighter by 2; far never binds.
    Remedy: remove far, or check whether its number was mistyped.
    """

    code: str
    title: str
    explanation: str
    remedy: str = ""
    constraints: tuple[str, ...] = ()
    variables: tuple[str, ...] = ()
    points: tuple[Row, ...] = ()
    rays: tuple[Row, ...] = ()
    proofs: tuple[Proof, ...] = ()
    amounts: tuple[tuple[str, Fraction], ...] = ()

    @property
    def severity(self) -> Severity:
        """How bad it is: the code says."""
        return CODES[self.code].severity

    @property
    def multipliers(self) -> dict[str, Fraction]:
        """The multipliers of the first proof, by constraint."""
        return dict(self.proofs[0].multipliers) if self.proofs else {}

    def amount(self, name: str) -> Fraction:
        """A named number of the evidence; raises UnknownName."""
        known = dict(self.amounts)
        if name not in known:
            raise unknown("amount", name, known, f"the finding {self.code!r}")
        return known[name]

    def table(self) -> Table:
        """The finding in words, its evidence as rows."""
        return telling.finding_table(self)

    def __str__(self) -> str:
        return telling.finding_text(self)

    __repr__ = __str__


@dataclass(frozen=True, repr=False)
class Review(Shown):
    """Everything the checks found in a model.

    Parameters
    ----------
    model : Model
    outcome : {"optimal", "unbounded", "infeasible", "no objective"}
    findings : tuple of Finding
        The worst first.
    checked : tuple of str
        What was checked and what that showed, one line a check.
    accepted : tuple of (Finding, str)
        Findings set aside, each with the reason.

    Examples
    --------
    >>> import polywalk as pw
    >>> told = pw.review(pw.scenarios.harbour_row())
    >>> [(finding.code, finding.points) for finding in told.findings]
    [('degenerate-vertex', ((Fraction(5, 1), Fraction(1, 1), Fraction(3, 1)),))]
    >>> told.require("feasible", "bounded", "unique-optimum").outcome
    'optimal'
    """

    model: Model
    outcome: Outcome
    findings: tuple[Finding, ...]
    checked: tuple[str, ...] = ()
    accepted: tuple[tuple[Finding, str], ...] = ()

    @property
    def clean(self) -> bool:
        """Whether nothing is left but notes."""
        return all(finding.severity == "note" for finding in self.findings)

    def of(self, *codes: str) -> tuple[Finding, ...]:
        """The findings with one of these codes; raises UnknownName for a code that does not exist."""
        for code in codes:
            if code not in CODES:
                raise unknown("code", code, CODES, "a review")
        return tuple(finding for finding in self.findings if finding.code in codes)

    def require(self, *expectations: str) -> Review:
        """This review, if all expectations hold; findings that were accepted do not count against them.

        Parameters
        ----------
        *expectations : str
            Names in ``polywalk.reviewing.EXPECTATIONS``: "feasible", "bounded", "unique-optimum", ...

        Raises
        ------
        ExpectationError
            Some do not hold; the message has the table of what speaks against them.
        UnknownName
            An expectation that does not exist.
        PolywalkError
            None given.
        """
        if not expectations:
            raise PolywalkError(f"expected at least one expectation: {', '.join(EXPECTATIONS)}.")
        for name in expectations:
            if name not in EXPECTATIONS:
                raise unknown("expectation", name, EXPECTATIONS, "a review")
        failed = tuple(name for name in expectations if self._broken(name) or not self._can_hold(name))
        if failed:
            against = [finding for finding in self.findings if any(finding in self._broken(name) for name in failed)]
            said = ", ".join(repr(name) for name in failed)
            ended = "" if all(map(self._can_hold, failed)) else f"; the model is {self.outcome}"
            because = telling.review_table(replace(self, findings=tuple(against), accepted=()))
            raise ExpectationError(f"expected {said}, which does not hold{ended}.\n{because}", culprit=failed)
        return self

    def _broken(self, expectation: str) -> tuple[Finding, ...]:
        """The findings that speak against an expectation."""
        against = EXPECTATIONS[expectation]
        return tuple(item for item in self.findings if item.code in against.codes or item.severity in against.codes)

    def _can_hold(self, expectation: str) -> bool:
        needed = EXPECTATIONS[expectation].outcomes
        return not needed or self.outcome in needed

    def accept(self, code: str, constraint: str | None = None, *, because: str) -> Review:
        """A copy in which findings of this code are set aside; the reason stays visible.

        Parameters
        ----------
        code : str
        constraint : str, optional
            Only findings about this constraint.
        because : str
            The reason.

        Raises
        ------
        UnknownName
            No finding fits.
        PolywalkError
            No reason given.
        """
        if not because.strip():
            raise PolywalkError(f"expected a reason for accepting {code!r}; say because='...'.", culprit=because)
        if constraint is not None:
            self.model.constraint(constraint)
        named = self.of(code)
        chosen = tuple(item for item in named if constraint is None or constraint in item.constraints)
        if not chosen and named:
            raise unknown("finding on constraint", constraint, _constraints(named), f"the review, under {code!r},")
        if not chosen:
            raise unknown("finding", code, dict.fromkeys(item.code for item in self.findings), "the review")
        kept = tuple(item for item in self.findings if item not in chosen)
        return replace(self, findings=kept, accepted=(*self.accepted, *((item, because) for item in chosen)))

    def table(self) -> Table:
        """One row a finding, accepted ones last."""
        return telling.review_table(self)

    def __str__(self) -> str:
        return telling.review_text(self)

    __repr__ = __str__

    def _repr_html_(self) -> str:
        return telling.review_html(self)


def _constraints(findings: Iterable[Finding]) -> dict[str, None]:
    return dict.fromkeys(name for item in findings for name in item.constraints)


def worst_first(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """Sorted by severity, then in the order of CODES; equal ones stay in their order."""
    order = {code: place for place, code in enumerate(CODES)}
    return tuple(sorted(findings, key=lambda item: (SEVERITIES.index(item.severity), order[item.code])))
