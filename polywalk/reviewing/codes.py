"""Every code a finding can have: how bad it is, and what it means. The order is that of a review among equals."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Severity = Literal["error", "warning", "note"]
SEVERITIES: tuple[Severity, ...] = ("error", "warning", "note")


@dataclass(frozen=True)
class Code:
    """What a code stands for.

    Parameters
    ----------
    severity : {"error", "warning", "note"}
        error: there is no answer. warning: probably not what was meant. note: true, and worth knowing.
    meaning : str
        One phrase.
    """

    severity: Severity
    meaning: str


CODES: dict[str, Code] = {
    "no-plan": Code("error", "no plan satisfies every constraint"),
    "false-row": Code("error", "a constraint without variables that is never true"),
    "conflict": Code("error", "constraints that contradict each other, none of which can be spared for that"),
    "unbounded-objective": Code("error", "the objective improves without end"),
    "line": Code("warning", "the region goes on without end in a direction and in its opposite"),
    "single-point": Code("warning", "exactly one plan is allowed"),
    "implied-equality": Code("warning", "an inequality that can only hold with equality"),
    "fixed-variable": Code("warning", "a variable that can take one value only"),
    "tied-optimum": Code("warning", "more than one plan is optimal"),
    "duplicate": Code("warning", "a constraint that says the same as another"),
    "true-row": Code("warning", "a constraint without variables that is always true"),
    "loose-constant": Code("warning", "a constraint whose constant is so large that it never binds"),
    "loose-switch": Code("warning", "a yes-or-no variable whose coefficient is larger than it need be"),
    "sliver": Code("warning", "the region is very thin in one direction"),
    "nearly-parallel": Code("warning", "two constraints with almost the same direction"),
    "wide-row": Code("warning", "coefficients of very different size in one constraint"),
    "wide-model": Code("warning", "coefficients of very different size across the model"),
    "unit-mismatch": Code("warning", "units that do not fit together"),
    "single-repair": Code("note", "one constraint whose relaxation alone makes the model feasible"),
    "no-single-repair": Code("note", "no constraint whose relaxation alone makes the model feasible"),
    "least-repair": Code("note", "the least weighted relaxation of all constraints together"),
    "open-region": Code("note", "the region is unbounded, the objective is not"),
    "flat-region": Code("note", "the region has fewer dimensions than there are variables"),
    "split-equality": Code("note", "two inequalities that are one equality"),
    "parallel": Code("note", "a constraint that a tighter one with the same direction makes superfluous"),
    "redundant": Code("note", "a constraint that others imply and that never binds"),
    "redundant-touching": Code("note", "a constraint that others imply and that only touches the region"),
    "jointly-redundant": Code("note", "one constraint of a group can go, but not the whole group"),
    "degenerate-vertex": Code("note", "more constraints meet at a vertex than there are variables"),
    "near-tie": Code("note", "a second plan is almost as good as the best"),
    "no-objective": Code("note", "nothing is optimized: every plan is as good as any other"),
    "unit-slip": Code("note", "a hint: two constraints differ by a factor between common units"),
}
