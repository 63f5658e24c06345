"""Vertices at which more constraints meet than there are variables."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from polywalk.region import vertex_name
from polywalk.reviewing.case import Case
from polywalk.reviewing.findings import Finding
from polywalk.reviewing.proofs import place
from polywalk.reviewing.telling import listed


def degenerate_vertices(case: Case) -> Iterator[Finding]:
    """Each degenerate vertex: its degree, and which of its constraints could go without changing the region."""
    names = [row.name for row in case.model.constraints]
    spare = {names[k] for k, standing in case.standing.items() if standing.kind != "needed"}
    for number, vertex in enumerate(case.region.vertices):
        if vertex.degenerate:
            able = [name for name in vertex.active if name in spare]
            told = f"{listed(able)} could go without changing the region." if able else "none of them could go."
            best = case.region.optimal is not None and number in case.region.optimal.vertices
            prices = "and as it is optimal, shadow prices need not be unique" if best else "but it is not optimal"
            yield Finding(
                "degenerate-vertex",
                f"{len(vertex.active)} constraints meet at {vertex_name(number)}, {case.model.n} would do",
                f"at {vertex_name(number)} ({place(case.model, vertex.point)}) {listed(vertex.active)} all hold with "
                f"equality; {told} Several bases describe this vertex, so a walk may pivot without moving, {prices}.",
                f"remove {listed(able)}." if able else _remedy(best),
                vertex.active,
                points=(vertex.point,),
                amounts=(("degree", Fraction(vertex.degeneracy)),),
            )


def _remedy(best: bool) -> str:
    if best:
        return "expect prices to depend on the solver; ask for left and right prices."
    return "nothing needs to be done."
