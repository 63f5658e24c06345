"""Generators by a working set: few rows are listed exactly, then every other row is held against what they generate.

Rows that some generator breaks join the working set, until none is broken: then the few rows describe the region of
all. Floats only propose the first working set; emptiness, and that nothing is broken, are decided in integers.

References
----------
Dantzig, Fulkerson & Johnson, Solution of a large-scale traveling-salesman problem, Journal of the Operations
Research Society of America 2, 1954.
Clarkson, More output-sensitive geometric algorithms, FOCS 1994.
"""

from __future__ import annotations

from collections.abc import Callable
from collections.abc import Set as AbstractSet

from polywalk.exact import integer_row
from polywalk.region.effort import is_small, work
from polywalk.region.guess import guess
from polywalk.region.listing import Listed, Rows, infinity, list_generators
from polywalk.region.sieve import Sieve

WORTHWHILE = 64
"""Rows from which a working set is tried. Where most were redundant it broke even between 40 rows (in 5 variables) and
80 (in 2), was 1.5 to 2 times as fast at 120, and took up to twice the time at 20.
"""

SHARE = 4
"""Working sets together may cost one part in so many of what all rows would: what is lost where none helps."""

ROUNDS = 12
"""Exact rounds at most: each costs little, yet rows that floats cannot tell apart might need one a row."""

Small = Callable[[Rows, frozenset[int]], bool]


def list_needed(sieve: Sieve, equal: frozenset[int], small: Small | None = None) -> Listed | None:
    """The generators of all rows, from as few as prove enough; None where listing them is not ``small``.

    Equal to what `list_generators` says of all rows, but for how points and rays of a region with a line stand along
    it, and for the apex of a cone at the origin, which is among them only where a working set was enough.
    """
    is_many = len(sieve.rows) >= WORTHWHILE or not is_small(sieve.rows, equal)
    found = _by_rounds(sieve, equal, small) if is_many else None
    if found is None and (small is None or small(sieve.rows, equal)):
        return list_generators(sieve.rows, equal)
    return found


def _by_rounds(sieve: Sieve, equal: frozenset[int], small: Small | None) -> Listed | None:
    """The generators of all rows from a working set; None where it grows too large."""
    rows, n = sieve.rows, len(sieve.rows[0]) - 1
    left = work(n, len(rows)) // SHARE

    def affordable(chosen: AbstractSet[int]) -> bool:
        return work(n, len(chosen)) <= left and (small is None or small(*_part(rows, equal, chosen)))

    chosen = equal | guess(sieve.floats, equal, affordable)
    for _ in range(ROUNDS):
        if not affordable(chosen):
            return None
        left -= work(n, len(chosen))
        listed = list_generators(*_part(rows, equal, chosen))
        broken = sieve.broken(_heads(listed))
        if not broken:
            return listed
        chosen |= broken
    return None


def _part(rows: Rows, equal: frozenset[int], chosen: AbstractSet[int]) -> tuple[Rows, frozenset[int]]:
    """The chosen rows with the plane at infinity after them, and which of them are equalities."""
    places, far = sorted(chosen), infinity(len(rows[0]) - 1)
    part = [*(rows[place] for place in places), far]
    return part, frozenset([k for k, place in enumerate(places) if place in equal])


def _heads(listed: Listed) -> Rows:
    """What the listed generators are in integers, a line both ways; nothing where there is no point: it is empty."""
    array, lines = listed
    heads = [integer_row(row)[0] for row in array]
    if not any(head[0] for head in heads):
        return []
    return heads + [tuple([-value for value in heads[k]]) for k in lines]
