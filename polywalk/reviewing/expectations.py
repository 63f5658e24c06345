"""What may be expected of a model, and which findings speak against it."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Outcome = Literal["optimal", "unbounded", "infeasible", "no objective"]


@dataclass(frozen=True)
class Expectation:
    """What speaks against an expectation.

    Parameters
    ----------
    codes : tuple of str
        Codes, or severities, of findings that break it.
    outcomes : tuple of str
        The outcomes without which it cannot hold; any, where empty.
    """

    codes: tuple[str, ...]
    outcomes: tuple[Outcome, ...] = ()


_FEASIBLE: tuple[Outcome, ...] = ("optimal", "unbounded", "no objective")
_SPARE = ("redundant", "redundant-touching", "jointly-redundant", "duplicate", "parallel", "true-row", "loose-constant")

EXPECTATIONS: dict[str, Expectation] = {
    "feasible": Expectation(("no-plan",), _FEASIBLE),
    "infeasible": Expectation((), ("infeasible",)),
    "bounded": Expectation(("unbounded-objective",), ("optimal", "no objective")),
    "bounded-region": Expectation(("unbounded-objective", "open-region", "line"), _FEASIBLE),
    "no-line": Expectation(("line",), _FEASIBLE),
    "full-dimensional": Expectation(("flat-region", "single-point", "implied-equality"), _FEASIBLE),
    "no-fixed-variable": Expectation(("fixed-variable", "single-point"), _FEASIBLE),
    "unique-optimum": Expectation(("tied-optimum", "no-objective"), ("optimal",)),
    "clear-optimum": Expectation(("tied-optimum", "near-tie", "no-objective"), ("optimal",)),
    "no-redundant": Expectation(_SPARE, _FEASIBLE),
    "nondegenerate": Expectation(("degenerate-vertex",), _FEASIBLE),
    "good-numbers": Expectation(
        ("wide-row", "wide-model", "nearly-parallel", "sliver", "loose-constant", "loose-switch")
    ),
    "units-agree": Expectation(("unit-mismatch",)),
    "no-errors": Expectation(("error",)),
    "no-warnings": Expectation(("error", "warning")),
}
"""By name, as ``Review.require`` takes them."""
